import { SAMPLE } from '../dynamics/sample-layout';
import { jdFromTdbSeconds } from '../time/convert';
import { formatIso } from '../time/format';

const AXES = ['xKm', 'yKm', 'zKm', 'vxKmS', 'vyKmS', 'vzKmS'];

const COLUMNS = [
  'jdTdb',
  'tdbSeconds',
  'utc',
  ...AXES.map((axis) => `heliocentricIcrf.${axis}`),
  ...AXES.map((axis) => `geocentricIcrf.${axis}`),
  'distanceEarthKm',
  'distanceMoonKm',
  'distanceSunKm',
  'speedEarthKmS',
];

/**
 * The trajectory as CSV (RFC 4180): one row a sample, units in the column names.
 *
 * @param samples rows in the layout of SAMPLE, in order of time
 */
export function writeEphemerisCsv(samples: Float64Array): string {
  const lines = [COLUMNS.join(',')];
  for (let at = 0; at < samples.length; at += SAMPLE.stride) {
    const row = samples.subarray(at, at + SAMPLE.stride);
    const part = (from: number): number[] => Array.from(row.subarray(from, from + 6));
    const geocentric = part(SAMPLE.object);
    const earth = part(SAMPLE.earth);
    const moon = part(SAMPLE.moon);
    const heliocentric = geocentric.map((value, k) => value + earth[k]);
    lines.push(
      [
        jdFromTdbSeconds(row[SAMPLE.tdbSeconds]),
        row[SAMPLE.tdbSeconds],
        formatIso(row[SAMPLE.tdbSeconds], 'UTC', 3),
        ...heliocentric,
        ...geocentric,
        Math.hypot(geocentric[0], geocentric[1], geocentric[2]),
        Math.hypot(...[0, 1, 2].map((k) => geocentric[k] - moon[k])),
        Math.hypot(heliocentric[0], heliocentric[1], heliocentric[2]),
        Math.hypot(geocentric[3], geocentric[4], geocentric[5]),
      ].join(','),
    );
  }
  return `${lines.join('\r\n')}\r\n`;
}

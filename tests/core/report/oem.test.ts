import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { SAMPLE } from '../../../core/dynamics/sample-layout';
import { sealReport } from '../../../core/report/canonical';
import { writeEphemerisCsv } from '../../../core/report/ephemeris-csv';
import { writeOem } from '../../../core/report/oem';
import { REPORT_VERSION, type Report } from '../../../core/report/report';
import { draftOf, instantOf, PASS } from './drafts';
import { readOem } from './read-oem';

/** The OEM and the CSV of hand-made samples. */

function reportOf(changes: Partial<Report['case']> = {}, cautions: string[] = []): Report {
  const draft = draftOf([PASS]);
  return sealReport({
    format: 'skimline-report',
    version: REPORT_VERSION,
    madeAt: '2040-12-01T00:00:00.000Z',
    ...draft,
    case: { ...draft.case, ...changes },
    findings: [],
    cautions,
  });
}

/** Samples from geocentric states of the object; the Earth and the Moon stand at fixed places. */
const EARTH = [1.25e8, -7.5e7, -3.25e7, 15.5, 22.25, 9.75];
const MOON = [3e5, 2e5, 1e5, -0.5, 0.75, 0.25];

function samplesOf(rows: { tdbSeconds: number; geocentric: number[] }[]): Float64Array {
  const samples = new Float64Array(rows.length * SAMPLE.stride);
  for (const [i, { tdbSeconds, geocentric }] of rows.entries()) {
    const at = i * SAMPLE.stride;
    samples[at + SAMPLE.tdbSeconds] = tdbSeconds;
    samples.set(geocentric, at + SAMPLE.object);
    samples.set(EARTH, at + SAMPLE.earth);
    samples.set(MOON, at + SAMPLE.moon);
  }
  return samples;
}

const T0 = instantOf('2041-03-08T00:00:00').tdbSeconds;
/** Straight through the sphere of influence (925 000 km): out, in, in, in, out. */
const THROUGH = [-9.3e5, -9.2e5, 1e4, 9.2e5, 9.3e5].map((x, i) => ({
  tdbSeconds: T0 + i * 90000.125,
  geocentric: [x, 20000.5, -300.25, 11.125, 0.5, -1e-7],
}));

describe('the reader of OEM used here', () => {
  const good = writeOem(reportOf(), samplesOf(THROUGH));

  it('takes a good message', () => {
    expect(readOem(good).segments).toHaveLength(2);
  });

  it('refuses what the standard does not allow', () => {
    const maimed: [string, string][] = [
      [good.replace('ORIGINATOR = SKIMLINE\n', ''), 'ORIGINATOR is missing'],
      [good.replace('OBJECT_NAME = Sample\n', ''), 'OBJECT_NAME is missing'],
      [good.replace(/(REF_FRAME = .*\n)(TIME_SYSTEM = .*\n)/, '$2$1'), 'out of order'],
      [good.replace('Sample', 'Sämple'), 'not printable ASCII'],
      [good.replace('Sample', 'S'.repeat(255)), 'a line of'],
      [good.replace(/(\d\.\d{15})e/, '$19e'), 'more than 16 digits'],
      [good.replace(/\n(2041.*)\n(2041.*)\n/, '\n$2\n$1\n'), 'does not rise'],
      [good.replace(/(\n2041\S*) \S+/, '$1'), '5 values'],
      [good.replace(/START_TIME = 2041/, 'START_TIME = 2040'), 'not the first and last'],
    ];
    for (const [text, message] of maimed) expect(() => readOem(text)).toThrow(message);
  });
});

describe('the OEM', () => {
  it('names its maker, its object and its time of making', () => {
    const { header, segments, comments } = readOem(
      writeOem(reportOf({ name: 'Invented Z', objectId: '2041 ZZ' }), samplesOf(THROUGH)),
    );
    expect(header.get('CCSDS_OEM_VERS')).toBe('3.0');
    expect(header.get('CREATION_DATE')).toBe('2040-12-01T00:00:00.000');
    expect(header.get('ORIGINATOR')).toBe('SKIMLINE');
    expect(segments[0].meta.get('OBJECT_NAME')).toBe('Invented Z');
    expect(segments[0].meta.get('OBJECT_ID')).toBe('2041 ZZ');
    const report = reportOf({ name: 'Invented Z', objectId: '2041 ZZ' });
    expect(comments.join(' ')).toContain(report.fingerprint);
  });

  it('has a heliocentric segment of all samples and a geocentric one inside the sphere', () => {
    const [sun, earth, ...more] = readOem(writeOem(reportOf(), samplesOf(THROUGH))).segments;
    expect(more).toHaveLength(0);
    for (const segment of [sun, earth]) {
      expect(segment.meta.get('REF_FRAME')).toBe('ICRF');
      expect(segment.meta.get('TIME_SYSTEM')).toBe('TDB');
    }
    expect(sun.meta.get('CENTER_NAME')).toBe('SUN');
    expect(earth.meta.get('CENTER_NAME')).toBe('EARTH');
    expect(sun.states).toHaveLength(5);
    expect(earth.states).toHaveLength(3);
    for (const [i, row] of THROUGH.entries()) {
      for (const [k, value] of row.geocentric.entries()) {
        const heliocentric = value + EARTH[k];
        // 16 digits: half a unit of the last is 5e-16 of the leading one.
        const limit = 5.1e-16 * 10 ** Math.ceil(Math.log10(Math.abs(heliocentric)));
        expect(Math.abs(sun.states[i][k] - heliocentric)).toBeLessThanOrEqual(limit);
        if (i > 0 && i < 4) expect(earth.states[i - 1][k]).toBe(value);
      }
    }
  });

  it('writes epochs in TDB to the microsecond', () => {
    const { epochs } = readOem(writeOem(reportOf(), samplesOf(THROUGH))).segments[0];
    for (const [i, epoch] of epochs.entries()) {
      const ms = Date.parse(`${epoch.slice(0, 19)}Z`) - Date.UTC(2000, 0, 1, 12);
      const seconds = ms / 1000 + Number(`0${epoch.slice(19)}`);
      // Half a microsecond written, 1.2e-7 s of the double that holds it, twice.
      expect(Math.abs(seconds - THROUGH[i].tdbSeconds)).toBeLessThanOrEqual(0.5e-6 + 2.4e-7);
    }
  });

  it('gives each stay inside the sphere a segment of its own', () => {
    const x = [2e6, 1e5, 2e5, 2e6, 3e5, 1e5, 2e6];
    const rows = x.map((value, i) => ({
      tdbSeconds: T0 + i * 90000,
      geocentric: [value, 0, 0, 1, 0, 0],
    }));
    const { segments } = readOem(writeOem(reportOf(), samplesOf(rows)));
    expect(segments.map((segment) => segment.meta.get('CENTER_NAME'))).toEqual([
      'SUN',
      'EARTH',
      'EARTH',
    ]);
    expect(segments.map((segment) => segment.states.length)).toEqual([7, 2, 2]);
  });

  it('holds to the standard whatever the numbers, the times and the names', () => {
    const value = fc.double({ min: -1e10, max: 1e10, noNaN: true });
    const row = fc.record({
      step: fc.double({ min: 0, max: 1e6, noNaN: true }),
      geocentric: fc.array(value, { minLength: 6, maxLength: 6 }),
    });
    fc.assert(
      fc.property(
        fc.array(row, { minLength: 0, maxLength: 8 }),
        fc.string({ unit: 'binary', maxLength: 300 }),
        fc.option(fc.string({ unit: 'binary', maxLength: 20 })),
        (rows, name, objectId) => {
          let tdbSeconds = T0;
          const placed = [
            { tdbSeconds: T0 - 100, geocentric: [1e5, 0, 0, 0, 1, 0] },
            ...rows.map(({ step, geocentric }) => {
              tdbSeconds += step;
              return { tdbSeconds, geocentric };
            }),
            { tdbSeconds: T0 + 1e7, geocentric: [1e5, 0, 0, 0, 1, 0] },
          ];
          const text = writeOem(reportOf({ name, objectId }), samplesOf(placed));
          expect(readOem(text).segments.length).toBeGreaterThan(0);
        },
      ),
    );
  });

  it('carries the cautions of the report', () => {
    const caution = 'This is an invented case: no such object exists.';
    const { comments } = readOem(writeOem(reportOf({}, [caution]), samplesOf(THROUGH)));
    expect(comments).toContain(caution);
  });
});

describe('the CSV', () => {
  const lines = writeEphemerisCsv(samplesOf(THROUGH)).split('\r\n');
  const head = lines[0].split(',');

  it('is RFC 4180: one header, rows of as many fields, CRLF after every line', () => {
    expect(lines.at(-1)).toBe('');
    expect(lines).toHaveLength(THROUGH.length + 2);
    for (const line of lines.slice(0, -1)) {
      expect(line.split(',')).toHaveLength(head.length);
      expect(line).not.toMatch(/[\s"]/);
    }
    expect(new Set(head).size).toBe(head.length);
  });

  it('has in each column what its name says', () => {
    for (const [i, { tdbSeconds, geocentric }] of THROUGH.entries()) {
      const fields = lines[i + 1].split(',');
      const of = (name: string): number => Number(fields[head.indexOf(name)]);
      expect(of('tdbSeconds')).toBe(tdbSeconds);
      expect(of('jdTdb')).toBe(2451545 + tdbSeconds / 86400);
      // TDB less UTC since 2017: 69.184 s to 2 ms; the text has milliseconds.
      const utc = Date.parse(fields[head.indexOf('utc')]) / 1000;
      const expected = Date.UTC(2000, 0, 1, 12) / 1000 + tdbSeconds - 69.184;
      expect(Math.abs(utc - expected)).toBeLessThan(0.0026);
      for (const [k, axis] of ['xKm', 'yKm', 'zKm', 'vxKmS', 'vyKmS', 'vzKmS'].entries()) {
        expect(of(`geocentricIcrf.${axis}`)).toBe(geocentric[k]);
        expect(of(`heliocentricIcrf.${axis}`)).toBe(geocentric[k] + EARTH[k]);
      }
      const length = (from: number, to: (k: number) => number): number =>
        Math.sqrt([0, 1, 2].reduce((sum, k) => sum + to(from + k) ** 2, 0));
      const near = (name: string, value: number): void => {
        // Rounding of the square root and of the sum.
        expect(Math.abs(of(name) / value - 1)).toBeLessThan(1e-15);
      };
      near(
        'distanceEarthKm',
        length(0, (k) => geocentric[k]),
      );
      near(
        'distanceMoonKm',
        length(0, (k) => geocentric[k] - MOON[k]),
      );
      near(
        'distanceSunKm',
        length(0, (k) => geocentric[k] + EARTH[k]),
      );
      near(
        'speedEarthKmS',
        length(3, (k) => geocentric[k]),
      );
    }
  });
});

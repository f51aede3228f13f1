import { SPHERE_OF_INFLUENCE_KM } from '../constants';
import { SAMPLE } from '../dynamics/sample-layout';
import { formatIso } from '../time/format';
import type { Report } from './report';

/** Microseconds: an object at 70 km/s moves 7 cm. */
const DECIMALS = 6;
/** The standard's numbers (7.5) have at most 16 digits, the point behind the first: 1e-8 km at 1 au. */
const MANTISSA_DECIMALS = 15;

/**
 * The trajectory as a CCSDS Orbit Ephemeris Message, KVN.
 *
 * @param report  names the object and the time of making
 * @param samples rows in the layout of SAMPLE, in order of time
 * @returns       one heliocentric segment over the whole span and, where the object comes within the
 *                Earth's sphere of influence, geocentric segments over that time; ICRF, TDB, km, km/s
 * Source: CCSDS 502.0-B-3 (2023), chapter 5.
 */
export function writeOem(report: Report, samples: Float64Array): string {
  const rows = rowsOf(samples);
  const name = printable(report.case.name);
  const id = printable(report.case.objectId ?? '');
  const lines = [
    'CCSDS_OEM_VERS = 3.0',
    `COMMENT Report fingerprint ${report.fingerprint}`,
    ...report.cautions.map((caution) => `COMMENT ${printable(caution)}`),
    `CREATION_DATE = ${report.madeAt.replace(/Z$/, '')}`,
    'ORIGINATOR = SKIMLINE',
    '',
  ];
  const segment = (
    centre: string,
    part: Float64Array[],
    state: (row: Float64Array) => number[],
  ) => {
    if (part.length < 2) return;
    lines.push(
      'META_START',
      `OBJECT_NAME = ${name}`,
      `OBJECT_ID = ${id}`,
      `CENTER_NAME = ${centre}`,
      'REF_FRAME = ICRF',
      'TIME_SYSTEM = TDB',
      `START_TIME = ${formatIso(part[0][SAMPLE.tdbSeconds], 'TDB', DECIMALS)}`,
      `STOP_TIME = ${formatIso(part[part.length - 1][SAMPLE.tdbSeconds], 'TDB', DECIMALS)}`,
      'INTERPOLATION = HERMITE',
      'INTERPOLATION_DEGREE = 3',
      'META_STOP',
      '',
      ...part.map((row) =>
        [
          formatIso(row[SAMPLE.tdbSeconds], 'TDB', DECIMALS),
          ...state(row).map((value) => value.toExponential(MANTISSA_DECIMALS)),
        ].join(' '),
      ),
      '',
    );
  };
  segment('SUN', rows, (row) =>
    components.map((k) => row[SAMPLE.object + k] + row[SAMPLE.earth + k]),
  );
  for (const part of insideSphere(rows)) {
    segment('EARTH', part, (row) => components.map((k) => row[SAMPLE.object + k]));
  }
  return lines.join('\n');
}

/** Text that a KVN line may carry (7.3): printable ASCII, short enough for its 254 characters. */
function printable(text: string): string {
  const plain = text
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .replace(/\s+/g, ' ')
    .replace(/[^ -~]/gu, '?')
    .trim();
  return plain === '' ? 'UNKNOWN' : plain.slice(0, 200);
}

const components = [0, 1, 2, 3, 4, 5];

/** Rows with epochs that stay apart when written. */
function rowsOf(samples: Float64Array): Float64Array[] {
  const rows: Float64Array[] = [];
  let last = Number.NEGATIVE_INFINITY;
  for (let at = 0; at < samples.length; at += SAMPLE.stride) {
    const row = samples.subarray(at, at + SAMPLE.stride);
    if (row[SAMPLE.tdbSeconds] - last < 2 * 10 ** -DECIMALS) continue;
    last = row[SAMPLE.tdbSeconds];
    rows.push(row);
  }
  return rows;
}

function insideSphere(rows: Float64Array[]): Float64Array[][] {
  const parts: Float64Array[][] = [];
  let part: Float64Array[] = [];
  for (const row of rows) {
    const at = SAMPLE.object;
    if (Math.hypot(row[at], row[at + 1], row[at + 2]) <= SPHERE_OF_INFLUENCE_KM) part.push(row);
    else if (part.length > 0) {
      parts.push(part);
      part = [];
    }
  }
  if (part.length > 0) parts.push(part);
  return parts;
}

import { EARTH_MOON_MASS_RATIO } from '../constants';
import {
  DECADES,
  FILE_VERSION,
  FIRST_RECORD_S,
  fileNameOf,
  HEADER_BYTES,
  MAGIC,
  RECORD_COUNT,
  RECORD_DOUBLES,
  RECORD_S,
  recordsOf,
  SERIES,
} from './layout';

/** What the packed ephemeris covers, TDB seconds past J2000. */
export const EPHEMERIS_COVERAGE = {
  fromTdbSeconds: FIRST_RECORD_S,
  toTdbSeconds: FIRST_RECORD_S + RECORD_COUNT * RECORD_S,
  text: `${isoDate(FIRST_RECORD_S)} to ${isoDate(FIRST_RECORD_S + RECORD_COUNT * RECORD_S)} (TDB)`,
} as const;

/** An instant outside the ephemeris. */
export class EphemerisRangeError extends Error {
  readonly code = 'ephemeris-range';
  override name = 'EphemerisRangeError';
}

/** A file that is not a packed ephemeris, or one of another version. */
export class EphemerisFileError extends Error {
  readonly code = 'ephemeris-file';
  override name = 'EphemerisFileError';
}

/**
 * Positions and velocities of Sun, planets and Moon from the Chebyshev series of DE405.
 *
 * Time is given as a base (a whole number of TDB seconds past J2000) and an offset of at most some
 * weeks, so that the place in a record carries no rounding of a large number: a double of 1e9 s
 * steps by 1.2e-7 s, in which the Earth moves 4 mm.
 *
 * Bodies come in the order of `BODIES`: barycentric ICRF, km and km/s.
 * Accuracy: the coefficients are those published, bit for bit.
 */
export class Ephemeris {
  /** The packed record by its number; null while its file has not been added. */
  private readonly records: (Float64Array | null)[] = new Array(RECORD_COUNT).fill(null);

  /** Takes the bytes of one packed file. */
  addFile(bytes: ArrayBuffer): void {
    const view = new DataView(bytes);
    const bad = (why: string): EphemerisFileError =>
      new EphemerisFileError(`A packed ephemeris file cannot be read: ${why}.`);
    if (bytes.byteLength < HEADER_BYTES || view.getUint32(0, true) !== MAGIC) {
      throw bad('it does not begin as one');
    }
    if (view.getUint32(4, true) !== FILE_VERSION) throw bad('it is of another version');
    const first = view.getUint32(8, true);
    const count = view.getUint32(12, true);
    const complete = bytes.byteLength === HEADER_BYTES + count * RECORD_DOUBLES * 8;
    if (!complete || first + count > RECORD_COUNT) throw bad('its length is not what it says');
    for (let i = 0; i < count; i++) {
      const record = new Float64Array(RECORD_DOUBLES);
      const from = HEADER_BYTES + i * RECORD_DOUBLES * 8;
      for (let k = 0; k < RECORD_DOUBLES; k++) record[k] = view.getFloat64(from + k * 8, true);
      this.records[first + i] = record;
    }
  }

  /** Whether every record between two instants is there. */
  covers(fromTdbSeconds: number, toTdbSeconds: number): boolean {
    const last = recordNumber(toTdbSeconds);
    for (let i = recordNumber(fromTdbSeconds); i <= last; i++) {
      if ((this.records[i] ?? null) === null) return false;
    }
    return true;
  }

  /**
   * Positions of all bodies.
   *
   * @param base   whole TDB seconds past J2000
   * @param offset seconds past the base
   * @param out    receives 11 × 3 numbers, km
   * @throws       EphemerisRangeError
   */
  positions(base: number, offset: number, out: Float64Array): void {
    this.evaluate(base, offset, out, 3, -1);
  }

  /**
   * Positions of all bodies, and the velocity of the Sun behind them: what the force model needs.
   *
   * @param out receives 11 × 3 numbers, km, then 3, km/s
   */
  positionsAndSunVelocity(base: number, offset: number, out: Float64Array): void {
    this.evaluate(base, offset, out, 3, 33);
  }

  /**
   * Positions and velocities of all bodies.
   *
   * @param out receives 11 × 6 numbers, km and km/s
   */
  states(base: number, offset: number, out: Float64Array): void {
    this.evaluate(base, offset, out, 6, -1);
  }

  /** Hot loop: allocates nothing. `sunVelocityAt` below 0 leaves the Sun's velocity out. */
  private evaluate(
    base: number,
    offset: number,
    out: Float64Array,
    stride: number,
    sunVelocityAt: number,
  ): void {
    let number = Math.floor((base - FIRST_RECORD_S + offset) / RECORD_S);
    // The end of the coverage belongs to the last record.
    if (number === RECORD_COUNT && base - FIRST_RECORD_S + offset === RECORD_COUNT * RECORD_S) {
      number -= 1;
    }
    const record = this.records[number] ?? null;
    if (record === null) throw this.missing(base + offset, number);
    // Exact: base and the record's start are whole numbers.
    const seconds = base - (FIRST_RECORD_S + number * RECORD_S) + offset;
    for (let body = 0; body < 11; body++) {
      const terms = TERMS[body];
      const length = RECORD_S / PARTS[body];
      let part = Math.floor(seconds / length);
      if (part >= PARTS[body]) part = PARTS[body] - 1;
      const from = STARTS[body] + part * terms * 3;
      const to = body * stride;
      const x = (2 * (seconds - part * length)) / length - 1;
      if (stride === 6) {
        series(record, from, terms, x, 2 / length, out, to, to + 3);
      } else if (body === SUN && sunVelocityAt >= 0) {
        series(record, from, terms, x, 2 / length, out, to, sunVelocityAt);
      } else {
        place(record, from, terms, x, out, to);
      }
    }
    // Earth and Moon from their barycentre and the geocentric Moon.
    const earth = 2 * stride;
    const moon = 9 * stride;
    for (let k = 0; k < stride; k++) {
      const geocentric = out[moon + k];
      out[earth + k] -= geocentric / (1 + EARTH_MOON_MASS_RATIO);
      out[moon + k] = out[earth + k] + geocentric;
    }
  }

  private missing(tdbSeconds: number, number: number): Error {
    if (number < 0 || number >= RECORD_COUNT) return outOfRange(tdbSeconds);
    return new EphemerisFileError(
      `The ephemeris file for ${isoDate(tdbSeconds)} has not been loaded.`,
    );
  }
}

/** Layout of the series as typed arrays, for the hot loop. */
const STARTS = Int32Array.from(SERIES, (series) => series.at);
const TERMS = Int32Array.from(SERIES, (series) => series.terms);
const PARTS = Int32Array.from(SERIES, (series) => series.parts);
const SUN = 10;

/** Chebyshev sums of three components: hot loop, allocates nothing. */
function place(
  record: Float64Array,
  from: number,
  terms: number,
  x: number,
  out: Float64Array,
  to: number,
): void {
  const second = from + terms;
  const third = second + terms;
  const twice = 2 * x;
  let t0 = 1;
  let t1 = x;
  let sx = record[from] + record[from + 1] * x;
  let sy = record[second] + record[second + 1] * x;
  let sz = record[third] + record[third + 1] * x;
  for (let k = 2; k < terms; k++) {
    const t = twice * t1 - t0;
    t0 = t1;
    t1 = t;
    sx += record[from + k] * t;
    sy += record[second + k] * t;
    sz += record[third + k] * t;
  }
  out[to] = sx;
  out[to + 1] = sy;
  out[to + 2] = sz;
}

/** The same with derivatives (rate = 2 / length of the interval). */
function series(
  record: Float64Array,
  from: number,
  terms: number,
  x: number,
  rate: number,
  out: Float64Array,
  to: number,
  velocityTo: number,
): void {
  place(record, from, terms, x, out, to);
  const second = from + terms;
  const third = second + terms;
  const twice = 2 * x;
  // Derivatives of the polynomials: k times those of the second kind, U(k−1).
  let u0 = 1;
  let u1 = twice;
  let sx = record[from + 1];
  let sy = record[second + 1];
  let sz = record[third + 1];
  for (let k = 2; k < terms; k++) {
    const d = k * u1;
    sx += record[from + k] * d;
    sy += record[second + k] * d;
    sz += record[third + k] * d;
    const u = twice * u1 - u0;
    u0 = u1;
    u1 = u;
  }
  out[velocityTo] = sx * rate;
  out[velocityTo + 1] = sy * rate;
  out[velocityTo + 2] = sz * rate;
}

export const createEphemeris = (): Ephemeris => new Ephemeris();

function recordNumber(tdbSeconds: number): number {
  const number = Math.floor((tdbSeconds - FIRST_RECORD_S) / RECORD_S);
  return tdbSeconds === EPHEMERIS_COVERAGE.toTdbSeconds ? RECORD_COUNT - 1 : number;
}

/** Calendar date of an instant, for messages (Fliegel & Van Flandern 1968). */
function isoDate(tdbSeconds: number): string {
  let l = Math.floor(tdbSeconds / 86400 + 2451545.5) + 68569;
  const n = Math.floor((4 * l) / 146097);
  l -= Math.floor((146097 * n + 3) / 4);
  const i = Math.floor((4000 * (l + 1)) / 1461001);
  l = l - Math.floor((1461 * i) / 4) + 31;
  const j = Math.floor((80 * l) / 2447);
  const day = l - Math.floor((2447 * j) / 80);
  l = Math.floor(j / 11);
  const month = j + 2 - 12 * l;
  const year = 100 * (n - 49) + i + l;
  const two = (x: number): string => String(x).padStart(2, '0');
  return `${year}-${two(month)}-${two(day)}`;
}

function outOfRange(tdbSeconds: number): EphemerisRangeError {
  return new EphemerisRangeError(
    `${isoDate(tdbSeconds)} is outside the ephemeris, which covers ${EPHEMERIS_COVERAGE.text}.`,
  );
}

/** Names of the files that carry all records between two instants. */
export function ephemerisFileNames(fromTdbSeconds: number, toTdbSeconds: number): string[] {
  const from = recordNumber(fromTdbSeconds);
  const to = recordNumber(toTdbSeconds);
  return DECADES.filter((decade) => {
    const { first, last } = recordsOf(decade);
    // A record on an edge stands in both neighbours: one of them is enough.
    const onlyNext = from === last && last !== RECORD_COUNT - 1;
    const onlyBefore = to === first && from < first;
    return from <= last && to >= first && !onlyNext && !onlyBefore;
  }).map(fileNameOf);
}

/**
 * Loads what an ephemeris lacks between two instants.
 *
 * @param fetchFile gives the bytes of a packed file by its name
 * @throws          EphemerisRangeError when an instant is not covered; what `fetchFile` throws
 */
export async function loadEphemeris(
  ephemeris: Ephemeris,
  fromTdbSeconds: number,
  toTdbSeconds: number,
  fetchFile: (name: string) => Promise<ArrayBuffer>,
): Promise<void> {
  for (const t of [fromTdbSeconds, toTdbSeconds]) {
    if (!(t >= EPHEMERIS_COVERAGE.fromTdbSeconds && t <= EPHEMERIS_COVERAGE.toTdbSeconds)) {
      throw outOfRange(t);
    }
  }
  if (ephemeris.covers(fromTdbSeconds, toTdbSeconds)) return;
  const names = ephemerisFileNames(fromTdbSeconds, toTdbSeconds);
  for (const bytes of await Promise.all(names.map(fetchFile))) ephemeris.addFile(bytes);
}

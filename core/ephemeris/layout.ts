/** Layout of the packed planetary ephemeris: shared by the packer and the reader. */

/** Length of a record, s TDB. */
export const RECORD_S = 32 * 86400;

/** Start of record 0, TDB seconds past J2000: MJD 36912, 1959-12-10. */
export const FIRST_RECORD_S = (36912 - 51544.5) * 86400;

/** Records of the published package: the last ends at MJD 73488, 2060-01-30 0 h. */
export const RECORD_COUNT = 1143;

/** One body of a record: components are three; coefficients by sub-interval, then component. */
export interface Series {
  /** Place in the packed record, doubles. */
  at: number;
  /** Coefficients a component. */
  terms: number;
  /** Sub-intervals a record. */
  parts: number;
}

/**
 * Series of the packed record in the order of DE405: Mercury, Venus, Earth–Moon barycentre, Mars,
 * Jupiter, Saturn, Uranus, Neptune, Pluto, Moon (geocentric), Sun. Standish (1998), JPL IOM 312.F-98-048.
 */
export const SERIES: readonly Series[] = [
  { at: 0, terms: 14, parts: 4 },
  { at: 168, terms: 10, parts: 2 },
  { at: 228, terms: 13, parts: 2 },
  { at: 306, terms: 11, parts: 1 },
  { at: 339, terms: 8, parts: 1 },
  { at: 363, terms: 7, parts: 1 },
  { at: 384, terms: 6, parts: 1 },
  { at: 402, terms: 6, parts: 1 },
  { at: 420, terms: 6, parts: 1 },
  { at: 438, terms: 13, parts: 8 },
  { at: 750, terms: 11, parts: 2 },
];

/** Doubles a packed record: DE405's without the nutations and librations that nothing here uses. */
export const RECORD_DOUBLES = 816;

/** Header of a file: magic, version, first record, number of records; 32-bit words. */
export const HEADER_BYTES = 16;
export const MAGIC = 0x45444b53;
export const FILE_VERSION = 1;

/** Name of the file that carries a decade. */
export const fileNameOf = (decade: number): string => `de405-${decade}s.bin`;

const DAY = 86400;
/** Days from J2000 to 1 January 0 h of a year of the Gregorian calendar. */
const newYear = (year: number): number => {
  const y = year - 1;
  return 365 * y + Math.floor(y / 4) - Math.floor(y / 100) + Math.floor(y / 400) - 730119.5;
};

/** First and last record that a decade's file carries; edge records stand in both neighbours. */
export function recordsOf(decade: number): { first: number; last: number } {
  const record = (seconds: number): number => Math.floor((seconds - FIRST_RECORD_S) / RECORD_S);
  return {
    first: Math.max(0, record(newYear(decade) * DAY)),
    last: Math.min(RECORD_COUNT - 1, record(newYear(decade + 10) * DAY)),
  };
}

/** Decades that have a file; the first and last edge records stand in their inner neighbour. */
export const DECADES: readonly number[] = [
  1960, 1970, 1980, 1990, 2000, 2010, 2020, 2030, 2040, 2050,
];

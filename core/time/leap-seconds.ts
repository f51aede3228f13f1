import { SECONDS_PER_DAY } from '../constants';

/** TAI − UTC from 1960 on: the adjustable-rate UTC up to 1971, whole leap seconds since 1972. */

/** What the report says about leap seconds. */
export const LEAP_SECONDS_KNOWN_TO =
  'Last known leap second at the end of 2016-12-31: TAI − UTC = 37 s since 2017-01-01. ' +
  'None is assumed after it (IERS Bulletin C as known in 2026).';

/**
 * First day (MJD, UTC), TAI − UTC there extrapolated to the reference day, s; reference day, MJD;
 * drift, s per day of UTC.
 * Source: the table of TAI − UTC kept by the US Naval Observatory (tai-utc.dat), with the 5 ms step
 * of 1961 from the Explanatory Supplement (1992) section 2.58; values as carried by ERFA 2.0.0.
 */
const RUBBER_SECONDS: readonly (readonly [number, number, number, number])[] = [
  [36934, 1.417818, 37300, 0.001296],
  [37300, 1.422818, 37300, 0.001296],
  [37512, 1.372818, 37300, 0.001296],
  [37665, 1.845858, 37665, 0.0011232],
  [38334, 1.945858, 37665, 0.0011232],
  [38395, 3.24013, 38761, 0.001296],
  [38486, 3.34013, 38761, 0.001296],
  [38639, 3.44013, 38761, 0.001296],
  [38761, 3.54013, 38761, 0.001296],
  [38820, 3.64013, 38761, 0.001296],
  [38942, 3.74013, 38761, 0.001296],
  [39004, 3.84013, 38761, 0.001296],
  [39126, 4.31317, 39126, 0.002592],
  [39887, 4.21317, 39126, 0.002592],
];

/** First days (MJD, UTC) of TAI − UTC = 10 s, 11 s, … 37 s. Source: IERS Bulletin C. */
const LEAP_SECOND_DAYS: readonly number[] = [
  41317, 41499, 41683, 42048, 42413, 42778, 43144, 43509, 43874, 44239, 44786, 45151, 45516, 46247,
  47161, 47892, 48257, 48804, 49169, 49534, 50083, 50630, 51179, 53736, 54832, 56109, 57204, 57754,
];
const TAI_MINUS_UTC_1972 = 10;

const UTC_BEGINS = RUBBER_SECONDS[0][0];

/** One day of UTC. */
export interface UtcDay {
  /** TAI − UTC at 0 h UTC, s. */
  readonly offsetAtStart: number;
  /** Growth of TAI − UTC over this day, s (zero since 1972). */
  readonly driftPerDay: number;
  /** Length in seconds of UTC: 86401 with a leap second; some days before 1972 are 0.1 s off. */
  readonly lengthSeconds: number;
}

function offsetAndDrift(mjd: number): readonly [number, number] {
  for (let i = LEAP_SECOND_DAYS.length - 1; i >= 0; i--) {
    if (mjd >= LEAP_SECOND_DAYS[i]) return [TAI_MINUS_UTC_1972 + i, 0];
  }
  for (let i = RUBBER_SECONDS.length - 1; i >= 0; i--) {
    const [firstDay, base, reference, drift] = RUBBER_SECONDS[i];
    if (mjd >= firstDay) return [base + (mjd - reference) * drift, drift];
  }
  const [, base, reference, drift] = RUBBER_SECONDS[0];
  return [base + (UTC_BEGINS - reference) * drift, 0];
}

/**
 * TAI − UTC through one day of UTC.
 *
 * @param mjd  modified Julian day number of the UTC day, a whole number
 * @returns    offset at its start, drift, and length, s
 * Domain: any day. UTC begins on 1960-01-01; before that the offset of that day (0.943482 s) is
 * held. After 2017-01-01 no further leap second is assumed.
 */
export function utcDay(mjd: number): UtcDay {
  const [offsetAtStart, driftPerDay] = offsetAndDrift(mjd);
  const [offsetAtEnd] = offsetAndDrift(mjd + 1);
  const step = offsetAtEnd - (offsetAtStart + driftPerDay);
  return {
    offsetAtStart,
    driftPerDay,
    lengthSeconds: SECONDS_PER_DAY + step / (1 + driftPerDay / SECONDS_PER_DAY),
  };
}

/**
 * TAI − UTC.
 *
 * @param mjdUtc  modified Julian date, UTC, days with fraction
 * @returns       seconds; during a leap second a Julian date does not tell the second before from
 *                the one after it: use `utcDay` there
 * Domain: as `utcDay`. Accuracy: exact by definition since 1972; the published expressions before.
 */
export function taiMinusUtc(mjdUtc: number): number {
  const mjd = Math.floor(mjdUtc);
  const [offset, drift] = offsetAndDrift(mjd);
  return offset + drift * (mjdUtc - mjd);
}

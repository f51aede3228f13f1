import { DAYS_PER_JULIAN_CENTURY, JD_J2000, SECONDS_PER_DAY } from '../constants';
import type { Epoch, TimeScale } from './epoch';
import { EpochError } from './epoch-error';
import { utcDay } from './leap-seconds';

/** Between an epoch in a named scale and TDB seconds past J2000. */

/** Day that contains J2000.0 (12 h), as a modified Julian day number. */
const MJD_J2000_DAY = 51544;
const HALF_DAY = SECONDS_PER_DAY / 2;
/** By definition of TT (IAU 1991 Resolution A4). */
const TT_MINUS_TAI = 32.184;
/** GPS time started equal to UTC on 1980-01-06 and has no leap seconds. IS-GPS-200. */
const TAI_MINUS_GPS = 19;
/** The domain of conversions, s: the years −5900 to 9900. */
const LIMIT_SECONDS = 2.5e11;
const LIMIT_TEXT = 'a year from −5900 to 9900';

/**
 * TDB − TT at the geocentre, s.
 *
 * @param seconds  seconds past J2000, TT or TDB (the difference is immaterial here)
 * Accuracy: 10 µs over 1600–2200 as published; 7.9 µs at most measured there against the full
 * Fairhead & Bretagnon (1990) series.
 * Source: USNO Circular 179 (Kaplan 2005), eq. 2.6, after Fairhead & Bretagnon (1990).
 */
function tdbMinusTt(seconds: number): number {
  const t = seconds / (SECONDS_PER_DAY * DAYS_PER_JULIAN_CENTURY);
  return (
    0.001657 * Math.sin(628.3076 * t + 6.2401) +
    0.000022 * Math.sin(575.3385 * t + 4.297) +
    0.000014 * Math.sin(1256.6152 * t + 6.1969) +
    0.000005 * Math.sin(606.9777 * t + 4.0212) +
    0.000005 * Math.sin(52.9691 * t + 0.4444) +
    0.000002 * Math.sin(21.3299 * t + 5.5431) +
    0.00001 * t * Math.sin(628.3076 * t + 4.249)
  );
}

function checkEpoch(epoch: Epoch): void {
  const { scale, mjd, secondOfDay } = epoch;
  if (!Number.isInteger(mjd) || !Number.isFinite(secondOfDay)) {
    throw new EpochError(
      'not-an-instant',
      `day ${mjd}, second ${secondOfDay}`,
      'a whole modified Julian day number and a finite second of the day',
    );
  }
  const length = scale === 'UTC' ? Math.max(SECONDS_PER_DAY, utcDay(mjd).lengthSeconds) : 86400;
  if (secondOfDay < 0 || secondOfDay >= length) {
    throw new EpochError(
      'not-an-instant',
      `second ${secondOfDay} of the ${scale} day with modified Julian day number ${mjd}`,
      `a second of the day from 0 to below ${length}`,
    );
  }
}

/**
 * TDB seconds past J2000 of an epoch in any scale.
 *
 * @param epoch  whole modified Julian day number and second of that day, in the epoch's own scale
 * @returns      s, TDB, past JD 2451545.0 TDB
 * @throws       EpochError `not-an-instant` when the day is not a whole number or the second lies
 *               outside the day; `out-of-range` outside the years −5900 to 9900
 * Accuracy: 10 µs from the series for TDB − TT; arithmetic within 2.4e-7 s (one unit in the last
 * place of the result) up to 68 years from J2000.
 * Source: definitions of the scales; TDB − TT as `tdbMinusTt`; TAI − UTC as leap-seconds.ts.
 */
export function tdbSecondsFromEpoch(epoch: Epoch): number {
  checkEpoch(epoch);
  const { scale, mjd, secondOfDay } = epoch;
  const dayStart = (mjd - MJD_J2000_DAY) * SECONDS_PER_DAY - HALF_DAY;
  if (Math.abs(dayStart) > LIMIT_SECONDS) {
    throw new EpochError('out-of-range', `modified Julian day ${mjd}`, LIMIT_TEXT);
  }
  if (scale === 'TDB') return dayStart + secondOfDay;
  // The small parts are added first, so that only the last addition rounds at the size of the sum.
  let tt = secondOfDay;
  if (scale === 'TAI') tt += TT_MINUS_TAI;
  else if (scale === 'GPS') tt += TAI_MINUS_GPS + TT_MINUS_TAI;
  else if (scale === 'UTC') {
    const day = utcDay(mjd);
    tt += day.offsetAtStart + (day.driftPerDay * secondOfDay) / SECONDS_PER_DAY + TT_MINUS_TAI;
  }
  return dayStart + (tt + tdbMinusTt(dayStart + tt));
}

/** Day and second with the second brought into [0, 86400); guards against rounding up to 86400. */
function normalised(scale: TimeScale, mjd: number, seconds: number): Epoch {
  const days = Math.floor(seconds / SECONDS_PER_DAY);
  const secondOfDay = seconds - days * SECONDS_PER_DAY;
  return secondOfDay >= SECONDS_PER_DAY
    ? { scale, mjd: mjd + days + 1, secondOfDay: 0 }
    : { scale, mjd: mjd + days, secondOfDay };
}

/** UTC of a TAI day and second: a leap second comes out as second 86400 of the day that it ends. */
function utcFromTai(tai: Epoch): Epoch {
  let mjd = tai.mjd;
  let day = utcDay(mjd);
  let taiSeconds = tai.secondOfDay - day.offsetAtStart;
  if (taiSeconds < 0) {
    mjd -= 1;
    day = utcDay(mjd);
    taiSeconds = tai.secondOfDay - day.offsetAtStart + SECONDS_PER_DAY;
  }
  const secondOfDay = taiSeconds / (1 + day.driftPerDay / SECONDS_PER_DAY);
  return secondOfDay >= Math.max(SECONDS_PER_DAY, day.lengthSeconds)
    ? { scale: 'UTC', mjd: mjd + 1, secondOfDay: 0 }
    : { scale: 'UTC', mjd, secondOfDay };
}

/**
 * The epoch in a named scale of an instant.
 *
 * @param tdbSeconds  s, TDB, past J2000
 * @param scale       scale of the result
 * @returns           day number and second of the day in that scale; for UTC a leap second has
 *                    secondOfDay in [86400, 86401)
 * @throws            EpochError `out-of-range` when not finite or outside the years −5900 to 9900
 * Accuracy: the inverse of `tdbSecondsFromEpoch` within 1e-6 s up to 68 years from J2000 (two units
 * in the last place of tdbSeconds).
 */
export function epochFromTdbSeconds(tdbSeconds: number, scale: TimeScale): Epoch {
  if (!(Math.abs(tdbSeconds) <= LIMIT_SECONDS)) {
    throw new EpochError('out-of-range', `${tdbSeconds} s past J2000`, LIMIT_TEXT);
  }
  const days = Math.floor((tdbSeconds + HALF_DAY) / SECONDS_PER_DAY);
  const mjd = MJD_J2000_DAY + days;
  const tdb = tdbSeconds - days * SECONDS_PER_DAY + HALF_DAY;
  if (scale === 'TDB') return normalised(scale, mjd, tdb);
  const tt = tdb - tdbMinusTt(tdbSeconds);
  if (scale === 'TT') return normalised(scale, mjd, tt);
  const tai = normalised('TAI', mjd, tt - TT_MINUS_TAI);
  if (scale === 'TAI') return tai;
  if (scale === 'GPS') return normalised(scale, tai.mjd, tai.secondOfDay - TAI_MINUS_GPS);
  return utcFromTai(tai);
}

/**
 * Julian date (TDB) of an instant.
 *
 * @param tdbSeconds  s, TDB, past J2000
 * @returns           days; one unit in the last place near the present is 40 µs
 */
export function jdFromTdbSeconds(tdbSeconds: number): number {
  return JD_J2000 + tdbSeconds / SECONDS_PER_DAY;
}

/**
 * Instant of a Julian date (TDB).
 *
 * @param jdTdb  days, TDB; a double holds it to 40 µs: read text with `readEpochText` instead
 * @returns      s, TDB, past J2000
 */
export function tdbSecondsFromJdTdb(jdTdb: number): number {
  return (jdTdb - JD_J2000) * SECONDS_PER_DAY;
}

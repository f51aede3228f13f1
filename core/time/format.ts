import { SECONDS_PER_DAY } from '../constants';
import { calendarFromMjd } from './calendar';
import { epochFromTdbSeconds } from './convert';
import type { TimeScale } from './epoch';
import { utcDay } from './leap-seconds';

const padded = (value: number, width: number): string => String(value).padStart(width, '0');

/**
 * ISO 8601 calendar text of an instant, rounded to a number of decimals of the second.
 *
 * @param tdbSeconds  s, TDB, past J2000
 * @param scale       scale in which the text is written; UTC gets the suffix Z, others none
 * @param decimals    digits after the second, 0 to 9 (beyond 6 the double itself is coarser)
 * @returns           "2031-05-14T03:12:40.123Z"; rounding carries into minutes, days and years, and
 *                    a UTC leap second reads 23:59:60. Years before 0 have a sign and six digits.
 * @throws            EpochError when tdbSeconds is not finite or outside the years −5900 to 9900;
 *                    RangeError for decimals outside 0 to 9
 */
export function formatIso(tdbSeconds: number, scale: TimeScale, decimals: number): string {
  if (!Number.isInteger(decimals) || decimals < 0 || decimals > 9) {
    throw new RangeError(`formatIso: ${decimals} decimals; expected a whole number from 0 to 9`);
  }
  const epoch = epochFromTdbSeconds(tdbSeconds, scale);
  const perSecond = 10 ** decimals;
  const length = scale === 'UTC' ? utcDay(epoch.mjd).lengthSeconds : SECONDS_PER_DAY;
  let mjd = epoch.mjd;
  let ticks = Math.round(epoch.secondOfDay * perSecond);
  if (ticks >= length * perSecond) {
    mjd += 1;
    ticks = 0;
  }
  const fraction = ticks % perSecond;
  const seconds = (ticks - fraction) / perSecond;
  // Seconds past 86399 belong to the last minute of the day.
  const minuteOfDay = Math.min(Math.floor(seconds / 60), 1439);
  const date = calendarFromMjd(mjd);
  const year = date.year < 0 ? `-${padded(-date.year, 6)}` : padded(date.year, 4);
  const clock = [Math.floor(minuteOfDay / 60), minuteOfDay % 60, seconds - 60 * minuteOfDay];
  return (
    `${year}-${padded(date.month, 2)}-${padded(date.day, 2)}` +
    `T${clock.map((part) => padded(part, 2)).join(':')}` +
    (decimals > 0 ? `.${padded(fraction, decimals)}` : '') +
    (scale === 'UTC' ? 'Z' : '')
  );
}

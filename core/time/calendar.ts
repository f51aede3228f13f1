/** The Gregorian calendar, proleptic before 1582 as ISO 8601 has it, against day numbers. */

/** Modified Julian day number of 0000-03-01, where the counting below starts. */
const MJD_MARCH_YEAR_0 = -678881;
const DAYS_PER_400_YEARS = 146097;

export interface CalendarDate {
  readonly year: number;
  readonly month: number;
  readonly day: number;
}

/**
 * Modified Julian day number (0 h) of a calendar date.
 *
 * @param year   astronomical year number (0 is 1 BC), a whole number
 * @param month  1 to 12
 * @param day    1 to the month's length; days beyond count on into the next month
 * @returns      whole days since 1858-11-17
 * Accuracy: exact for |year| below 1e12.
 * Source: counting years from March so that the leap day comes last, as in Richards (2013),
 * Explanatory Supplement to the Astronomical Almanac, 3rd ed., section 15.11.
 */
export function mjdFromCalendar(year: number, month: number, day: number): number {
  const marchYear = month <= 2 ? year - 1 : year;
  const marchMonth = (month + 9) % 12;
  const dayOfYear = Math.floor((153 * marchMonth + 2) / 5) + day - 1;
  const leapDays =
    Math.floor(marchYear / 4) - Math.floor(marchYear / 100) + Math.floor(marchYear / 400);
  return MJD_MARCH_YEAR_0 + 365 * marchYear + leapDays + dayOfYear;
}

/**
 * Calendar date of a modified Julian day number.
 *
 * @param mjd  whole days since 1858-11-17
 * @returns    the Gregorian date; year 0 is 1 BC
 * Accuracy: exact for |mjd| below 1e14.
 * Source: the inverse of `mjdFromCalendar`, by cycles of 400 years.
 */
export function calendarFromMjd(mjd: number): CalendarDate {
  const days = mjd - MJD_MARCH_YEAR_0;
  const cycle = Math.floor(days / DAYS_PER_400_YEARS);
  const dayOfCycle = days - cycle * DAYS_PER_400_YEARS;
  const yearOfCycle = Math.floor(
    (dayOfCycle -
      Math.floor(dayOfCycle / 1460) +
      Math.floor(dayOfCycle / 36524) -
      Math.floor(dayOfCycle / 146096)) /
      365,
  );
  const dayOfYear =
    dayOfCycle - (365 * yearOfCycle + Math.floor(yearOfCycle / 4) - Math.floor(yearOfCycle / 100));
  const marchMonth = Math.floor((5 * dayOfYear + 2) / 153);
  const day = dayOfYear - Math.floor((153 * marchMonth + 2) / 5) + 1;
  const month = marchMonth < 10 ? marchMonth + 3 : marchMonth - 9;
  const year = 400 * cycle + yearOfCycle + (month <= 2 ? 1 : 0);
  return { year, month, day };
}

/** Number of days of a month (1 to 12) of a year. */
export function daysInMonth(year: number, month: number): number {
  return month === 12 ? 31 : mjdFromCalendar(year, month + 1, 1) - mjdFromCalendar(year, month, 1);
}

import { daysInMonth, mjdFromCalendar } from './calendar';
import { EpochError } from './epoch-error';

/** Calendar dates as people write them, without time of day and time scale. */

export interface DateReading {
  readonly form: 'iso' | 'calendar';
  readonly mjd: number;
  /** Decimal digits of the day, as written; null when the day is whole. */
  readonly fractionDigits: string | null;
}

const MONTHS = [
  'january',
  'february',
  'march',
  'april',
  'may',
  'june',
  'july',
  'august',
  'september',
  'october',
  'november',
  'december',
];

/** Three bare numbers are a date only when the first can be a year that anybody would paste. */
const BARE_YEARS = [1600, 2399] as const;

const WORD = '([A-Za-z]{3,9})';
const FRACTION = '(?:[.,](\\d+))?';
const ORDINAL_ENDING = '(?:st|nd|rd|th)?';

const YEAR_DAY = new RegExp(`^(\\d{4})-(\\d{3})${FRACTION}$`);
const YEAR_MONTH_DAY = new RegExp(`^(\\d{4})( ?[-/.] ?| )(\\d{1,2})\\2(\\d{1,2})${FRACTION}$`);
const YEAR_WORD_DAY = new RegExp(`^(\\d{4})[-/. ]*${WORD}[-/. ]*(\\d{1,2})${FRACTION}$`);
const DAY_WORD_YEAR = new RegExp(
  `^(\\d{1,2})${FRACTION}${ORDINAL_ENDING}[-/. ]*${WORD}[-/., ]*(\\d{4})$`,
  'i',
);
const WORD_DAY_YEAR = new RegExp(
  `^${WORD}[-/. ]*(\\d{1,2})(?:\\.(\\d+))?${ORDINAL_ENDING}(?: ?, ?|[-/ ]+)(\\d{4})$`,
  'i',
);
const NUMBER_NUMBER_YEAR = /^(\d{1,2})([-/.])(\d{1,2})\2(\d{4})$/;

/** Month number (1 to 12) of an English month name or its beginning; null for another word. */
export function monthOfWord(word: string): number | null {
  const start = word.toLowerCase();
  if (start.length < 3) return null;
  const index = MONTHS.findIndex((month) => month.startsWith(start));
  return index < 0 ? null : index + 1;
}

function dated(
  text: string,
  form: 'iso' | 'calendar',
  [year, month, day]: readonly [number, number, number],
  fractionDigits: string | undefined,
): DateReading {
  if (month < 1 || month > 12) {
    throw new EpochError('month', `month ${month} in "${text}"`, 'a month from 1 to 12');
  }
  const last = daysInMonth(year, month);
  if (day < 1 || day > last) {
    throw new EpochError(
      'day',
      `day ${day} in "${text}"`,
      `a day from 1 to ${last} in month ${month} of ${year}`,
    );
  }
  const mjd = mjdFromCalendar(year, month, day);
  return { form, mjd, fractionDigits: fractionDigits === undefined ? null : fractionDigits };
}

function wordMonth(text: string, word: string): number {
  const month = monthOfWord(word);
  if (month === null) {
    throw new EpochError('month', `month "${word}" in "${text}"`, 'an English month name, as May');
  }
  return month;
}

const isoText = (year: string, month: string, day: string): string =>
  `${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`;

/** Day and month order is told only by a number above 12; otherwise both readings are said. */
function orderedDate(
  text: string,
  after: string,
  [, first, , second, year]: readonly string[],
): DateReading {
  const a = Number(first);
  const b = Number(second);
  if (a <= 12 && b <= 12 && a !== b) {
    const readings = [isoText(year, second, first) + after, isoText(year, first, second) + after];
    throw new EpochError('ambiguous-date', `"${text}"`, readings.join(' or '), readings);
  }
  const [day, month] = b > 12 ? [b, a] : [a, b];
  return dated(text, 'calendar', [Number(year), month, day], undefined);
}

/**
 * A calendar date: ISO 8601 calendar or ordinal, or year, month and day with a month name or
 * separators, the day possibly with decimals; Gregorian, proleptic before 1582.
 *
 * @param text   a date alone: no time of day, no scale; single spaces
 * @param after  what follows the date in its text, to go behind the readings of an ambiguous one
 * @returns      day number and what was written; null when the text has no such shape
 * @throws       EpochError for a shape that fits with a month, day or day of year that does not
 *              exist, and `ambiguous-date` (with both readings) where day and month cannot be told
 * Source: ISO 8601-1:2019; CCSDS 301.0-B-4, section 3.5 (time codes A and B).
 */
export function readDateText(text: string, after: string): DateReading | null {
  let m = YEAR_DAY.exec(text);
  if (m !== null) {
    const [, year, dayOfYear, fraction] = m;
    const first = mjdFromCalendar(Number(year), 1, 1);
    const length = mjdFromCalendar(Number(year) + 1, 1, 1) - first;
    const number = Number(dayOfYear);
    if (number < 1 || number > length) {
      const read = `day of year ${number} in "${text}"`;
      throw new EpochError('day-of-year', read, `a day of year from 1 to ${length}`);
    }
    return {
      form: fraction === undefined ? 'iso' : 'calendar',
      mjd: first + number - 1,
      fractionDigits: fraction === undefined ? null : fraction,
    };
  }
  m = YEAR_MONTH_DAY.exec(text);
  if (m !== null) {
    const [, year, separator, month, day, fraction] = m;
    const y = Number(year);
    if (separator === ' ' && (y < BARE_YEARS[0] || y > BARE_YEARS[1])) return null;
    const iso = separator === '-' && month.length === 2 && day.length === 2 && !fraction;
    return dated(text, iso ? 'iso' : 'calendar', [y, Number(month), Number(day)], fraction);
  }
  m = YEAR_WORD_DAY.exec(text);
  if (m !== null) {
    const [, year, word, day, fraction] = m;
    const date = [Number(year), wordMonth(text, word), Number(day)] as const;
    return dated(text, 'calendar', date, fraction);
  }
  m = DAY_WORD_YEAR.exec(text);
  if (m !== null) {
    const [, day, fraction, word, year] = m;
    const date = [Number(year), wordMonth(text, word), Number(day)] as const;
    return dated(text, 'calendar', date, fraction);
  }
  m = WORD_DAY_YEAR.exec(text);
  if (m !== null) {
    const [, word, day, fraction, year] = m;
    const month = monthOfWord(word);
    if (month === null) return null;
    return dated(text, 'calendar', [Number(year), month, Number(day)], fraction);
  }
  m = NUMBER_NUMBER_YEAR.exec(text);
  return m === null ? null : orderedDate(text, after, m);
}

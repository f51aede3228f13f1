import { SECONDS_PER_DAY } from '../constants';
import { type DateReading, monthOfWord, readDateText } from './date-text';
import type { TimeScale } from './epoch';
import { EpochError } from './epoch-error';
import { utcDay } from './leap-seconds';

export { EpochError } from './epoch-error';

/** Epochs as people write them. */

export interface EpochReading {
  readonly form: 'iso' | 'jd' | 'mjd' | 'calendar';
  /** Modified Julian day number (0 h of the scale), a whole number. */
  readonly mjd: number;
  /** [0, 86400), on a UTC day with a leap second [0, 86401). */
  readonly secondOfDay: number;
  /** Null when the text does not say. */
  readonly scale: TimeScale | null;
  /** Size of the last digit written, s: 86400 for a date alone, 0.001 for milliseconds. */
  readonly precisionSeconds: number;
}

const SCALES: Readonly<Record<string, TimeScale>> = {
  UTC: 'UTC',
  UT: 'UTC',
  GMT: 'UTC',
  Z: 'UTC',
  TDB: 'TDB',
  ET: 'TDB',
  TT: 'TT',
  TDT: 'TT',
  TAI: 'TAI',
  GPS: 'GPS',
};
/** Scales of the trade that are not carried here; named so that they are refused in words. */
const REFUSED_SCALES = ['UT0', 'UT1', 'UT2', 'TCB', 'TCG'];

const SCALE = 'UTC|UT[012](?!\\d)|UT|GMT|TDB|TDT|TT|ET|TAI|GPS|TCB|TCG';
const DAY_COUNT = 'MJD|JDE|JED|JD';
const ERA = 'A\\. ?D\\.?|AD|CE';
const HEAD_DAY_COUNT = new RegExp(`^(${DAY_COUNT})(?=(?:${SCALE})(?![A-Za-z])|[^A-Za-z]|$)`, 'i');
const HEAD_WORD = new RegExp(`^(${SCALE}|${ERA})(?![A-Za-z])`, 'i');
const TAIL_WORD = new RegExp(`(?<![A-Za-z])(${SCALE}|Z|${DAY_COUNT}|${ERA})$`, 'i');
const HEAD_PUNCTUATION = /^[\s()[\]=:,;_]+/;
const TAIL_PUNCTUATION = /[\s()[\]=:,;_.]+$/;

const NUMBER = /^([+-]?)(\d+)(?:[.,](\d*))?$/;
const GROUPED_JULIAN_DATE = /^(\d)([.,'’])(\d{3})\2(\d{3})(?:(?!\2)[.,](\d+))?$/;
const COMPACT_ISO = /^(\d{4})(\d{2})(\d{2})T(\d{2})(\d{2})(?:(\d{2})([.,]\d+)?)?$/i;
const DATE_THEN_CLOCK = /^(.*?)(?: ?T ?|[ ,;:]+)(\d{1,2}:.*)$/i;
const DATE_THEN_HOUR = /^(.*\d)T(\d{1,2})$/i;
const CLOCK = /^(\d{1,2})(?::(\d{2})(?::(\d{2}))?(?:[.,](\d+))?)?$/;
const ZONE = /^(.*\d) ?((?:UTC|GMT)? ?[+-]\d{1,2}(?::?\d{2})?)$/i;
const BEGINS_LIKE_ISO = /^\d{4}-W?\d{1,3}(?:[-T :]|$)/i;

/** No epoch is longer; keeps the patterns from running over whole pages. */
const LONGEST_TEXT = 80;

/** A text stripped of the words about it: what they said, and the rest. */
interface Labelled {
  rest: string;
  form: 'jd' | 'mjd' | null;
  scale: TimeScale | null;
  /** A scale that is named but not carried. */
  refused: string | null;
}

function takeWord(text: string, labelled: Labelled, word: string): void {
  const name = word.toUpperCase();
  if (REFUSED_SCALES.includes(name)) labelled.refused = name;
  if (name === 'MJD') labelled.form = 'mjd';
  else if (name.startsWith('J')) labelled.form = 'jd';
  const said = SCALES[name];
  if (said === undefined) return;
  if (labelled.scale !== null && labelled.scale !== said) {
    const read = `time scales ${labelled.scale} and ${said} in "${text}"`;
    throw new EpochError('scale', read, 'one time scale');
  }
  labelled.scale = said;
}

function takeLabels(text: string): Labelled {
  const labelled: Labelled = { rest: text, form: null, scale: null, refused: null };
  let ephemerisDate = false;
  for (;;) {
    labelled.rest = labelled.rest.replace(HEAD_PUNCTUATION, '').replace(TAIL_PUNCTUATION, '');
    const head = HEAD_DAY_COUNT.exec(labelled.rest) ?? HEAD_WORD.exec(labelled.rest);
    const found = head ?? TAIL_WORD.exec(labelled.rest);
    if (found === null) break;
    const word = found[1];
    labelled.rest =
      head === null ? labelled.rest.slice(0, -word.length) : labelled.rest.slice(word.length);
    takeWord(text, labelled, word);
    if (/^J(ED|DE)$/i.test(word)) ephemerisDate = true;
  }
  // Julian ephemeris dates count ephemeris time, today's TDB, unless another scale is named.
  if (ephemerisDate) labelled.scale ??= 'TDB';
  return labelled;
}

/** A fraction of a day and its last digit, in seconds, from the digits after the decimal mark. */
function dayFraction(digits: string): { seconds: number; precisionSeconds: number } {
  return {
    seconds: Number(`0.${digits}0`) * SECONDS_PER_DAY,
    precisionSeconds: SECONDS_PER_DAY * 10 ** -digits.length,
  };
}

/** Day and second from a whole day and seconds after it, which may pass the day's end. */
function reading(
  form: EpochReading['form'],
  scale: TimeScale | null,
  mjd: number,
  seconds: number,
  precisionSeconds: number,
  daySeconds: number = SECONDS_PER_DAY,
): EpochReading {
  return seconds >= daySeconds
    ? { form, scale, mjd: mjd + 1, secondOfDay: seconds - daySeconds, precisionSeconds }
    : { form, scale, mjd, secondOfDay: seconds, precisionSeconds };
}

/** Whole and decimal digits stay apart, so that no digit of a long Julian date is lost. */
function readDayCount(text: string, labelled: Labelled): EpochReading | null {
  const grouped = GROUPED_JULIAN_DATE.exec(labelled.rest);
  const rest =
    grouped === null
      ? labelled.rest
      : `${grouped[1]}${grouped[3]}${grouped[4]}.${grouped[5] ?? ''}`;
  const m = NUMBER.exec(rest);
  let form = labelled.form;
  if (form === null) {
    if (m === null || m[1] !== '') return null;
    if (/^2\d{6}$/.test(m[2])) form = 'jd';
    else if (/^[4-7]\d{4}$/.test(m[2])) form = 'mjd';
    else return null;
  }
  const wanted =
    form === 'jd'
      ? 'a Julian date: seven digits, then decimals, as 2463392.03 (a modified one has MJD before it)'
      : 'a modified Julian date: up to six digits, then decimals, as 63391.53';
  if (m === null) {
    if (!/^[+-]?\d/.test(labelled.rest)) return null;
    throw new EpochError('number', `"${text}"`, wanted);
  }
  const [, sign, whole, decimals] = m;
  const fits = form === 'jd' ? sign !== '-' && whole.length === 7 : whole.length <= 6;
  if (!fits) throw new EpochError('number', `"${text}"`, wanted);
  const { seconds, precisionSeconds } = dayFraction(decimals ?? '');
  if (form === 'jd') {
    const dayOfNoon = Number(whole) - 2400001;
    const sinceMidnight = seconds + SECONDS_PER_DAY / 2;
    return reading('jd', labelled.scale, dayOfNoon, sinceMidnight, precisionSeconds);
  }
  if (sign !== '-') return reading('mjd', labelled.scale, Number(whole), seconds, precisionSeconds);
  const back = seconds > 0 ? SECONDS_PER_DAY - seconds : 0;
  const day = 0 - Number(whole) - (seconds > 0 ? 1 : 0);
  return reading('mjd', labelled.scale, day, back, precisionSeconds);
}

function readClock(text: string, clock: string, date: DateReading, scale: TimeScale | null) {
  const m = CLOCK.exec(clock);
  if (m === null) {
    const expected = 'a time of day as 03:04 or 03:04:05.678, on the 24-hour clock';
    throw new EpochError('unreadable', `"${clock}" in "${text}"`, expected);
  }
  const [, hourText, minuteText, secondText, digits] = m;
  const hour = Number(hourText);
  const minute = Number(minuteText ?? '0');
  const second = Number(secondText ?? '0');
  if (hour > 23) {
    const expected = 'an hour from 0 to 23 (24:00 is 00:00 of the next day)';
    throw new EpochError('hour', `hour ${hour} in "${text}"`, expected);
  }
  if (minute > 59) {
    throw new EpochError('minute', `minute ${minute} in "${text}"`, 'a minute from 0 to 59');
  }
  if (second > 60) {
    throw new EpochError('second', `second ${second} in "${text}"`, 'a second from 0 to 59');
  }
  // The digits belong to the last part written: seconds, or minutes as ISO 8601 allows.
  const unit = secondText !== undefined ? 1 : minuteText !== undefined ? 60 : 3600;
  const fraction = Number(`0.${digits ?? ''}0`) * unit;
  const precisionSeconds = unit * 10 ** -(digits ?? '').length;
  const seconds = 3600 * hour + 60 * minute + (second + fraction);
  const { lengthSeconds } = utcDay(date.mjd);
  if (second === 60) {
    const real = hour === 23 && minute === 59 && seconds < lengthSeconds;
    if (!real || (scale !== null && scale !== 'UTC')) {
      throw new EpochError(
        'leap-second',
        `second 60 in "${text}"${scale === null ? '' : ` (${scale})`}`,
        'a second from 0 to 59: 60 stands only in UTC at 23:59 of a day that ends with a leap second',
      );
    }
    // Only UTC has a 60th second, so the text has said its scale.
    return reading(date.form, 'UTC', date.mjd, seconds, precisionSeconds, lengthSeconds);
  }
  const daySeconds = scale === 'UTC' ? Math.max(SECONDS_PER_DAY, lengthSeconds) : SECONDS_PER_DAY;
  return reading(date.form, scale, date.mjd, seconds, precisionSeconds, daySeconds);
}

/** Splits off the time of day, and a zone after it: only one equal to UTC is read. */
function splitClock(text: string, labelled: Labelled): { date: string; clock: string | null } {
  const compact = COMPACT_ISO.exec(labelled.rest);
  if (compact !== null) {
    const [, year, month, day, hour, minute, second, fraction] = compact;
    const seconds = second === undefined ? '' : `:${second}${fraction ?? ''}`;
    return { date: `${year}-${month}-${day}`, clock: `${hour}:${minute}${seconds}` };
  }
  const m = DATE_THEN_CLOCK.exec(labelled.rest) ?? DATE_THEN_HOUR.exec(labelled.rest);
  if (m === null) return { date: labelled.rest, clock: null };
  const [, date, clock] = m;
  const zone = ZONE.exec(clock);
  if (zone === null) return { date, clock };
  if (/[1-9]/.test(zone[2]) || (labelled.scale !== null && labelled.scale !== 'UTC')) {
    const read = `time zone ${zone[2].trim()} in "${text}"`;
    throw new EpochError('time-zone', read, 'UTC (suffix Z) or a time scale by name');
  }
  labelled.scale = 'UTC';
  return { date, clock: zone[1] };
}

/** True for a text that is an epoch by its looks, so that failing to read it is an error. */
function looksLikeDate(text: string): boolean {
  if (BEGINS_LIKE_ISO.test(text)) return true;
  const words = text.match(/[A-Za-z]{3,9}/g) ?? [];
  return /\b\d{4}\b/.test(text) && words.some((word) => monthOfWord(word) !== null);
}

function readDate(text: string, labelled: Labelled): EpochReading | null {
  if (labelled.form !== null || !/\d/.test(labelled.rest)) return null;
  const { date: dateText, clock } = splitClock(text, labelled);
  const { scale } = labelled;
  const after = (clock === null ? '' : ` ${clock}`) + (scale === null ? '' : ` ${scale}`);
  const date = readDateText(dateText, after);
  if (date === null) {
    if (!looksLikeDate(labelled.rest)) return null;
    const expected =
      'an epoch as 2031-05-12T03:04:05, 2031 May 12.5, JD 2463392.03 or MJD 63391.53';
    throw new EpochError('unreadable', `"${text}"`, expected);
  }
  if (date.fractionDigits === null) {
    return clock === null
      ? reading(date.form, scale, date.mjd, 0, SECONDS_PER_DAY)
      : readClock(text, clock, date, scale);
  }
  if (clock !== null) {
    const read = `decimals of the day and a time of day in "${text}"`;
    throw new EpochError('unreadable', read, 'one of the two');
  }
  const { seconds, precisionSeconds } = dayFraction(date.fractionDigits);
  return reading(date.form, scale, date.mjd, seconds, precisionSeconds);
}

/**
 * An epoch in any of the forms a person would paste.
 *
 * Read: ISO 8601 calendar and ordinal dates with or without time (also CCSDS time codes A and B),
 * Julian dates (seven digits), modified Julian dates (with MJD before or after, or five bare digits
 * from 40000 to 79999), calendar dates with a month name or separators and decimals of the day. A
 * scale may stand before or after: UTC, UT and GMT and Z (all taken as UTC), TDB and ET (TDB), TT
 * and TDT (TT), TAI, GPS; "A.D." is ignored. A decimal mark is a point or a comma.
 *
 * @param text  one epoch, with nothing else but its scale
 * @returns     whole day and second of it, in the scale said (null when not said); the calendar is
 *              Gregorian, proleptic before 1582. Null when the text is not an epoch at all.
 * @throws      EpochError when the text has the shape of an epoch but names an instant that does
 *              not exist (month 13, 30 February, 25 h, second 60 without a leap second), two time
 *              scales or one that is not carried, another time zone than UTC, or may be read in two
 *              ways (`ambiguous-date`, with both readings)
 * Accuracy: 1e-11 s: whole and decimal digits of a Julian date are read apart.
 * Source: ISO 8601-1:2019; CCSDS 301.0-B-4, section 3.5.
 */
export function readEpochText(text: string): EpochReading | null {
  const clean = text
    .replace(/\s+/g, ' ')
    .replace(/\u2212/g, '-')
    .trim();
  if (clean.length > LONGEST_TEXT) return null;
  const labelled = takeLabels(clean);
  const result = readDayCount(clean, labelled) ?? readDate(clean, labelled);
  if (result !== null && labelled.refused !== null) {
    const read = `time scale ${labelled.refused} in "${clean}"`;
    throw new EpochError('scale', read, 'UTC, TAI, TT, TDB or GPS');
  }
  return result;
}

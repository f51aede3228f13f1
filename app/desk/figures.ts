/** How the desk writes figures: grouped by thin spaces, a true minus, the unit after a thin space. */

const THIN_SPACE = '\u2009';
const MINUS = '\u2212';
const MONTHS = 'Jan Feb Mar Apr May Jun Jul Aug Sep Oct Nov Dec'.split(' ');

/**
 * A number with its digits grouped by threes.
 *
 * @param decimals digits after the point, 0 to 20
 */
export function grouped(value: number, decimals = 0): string {
  const [whole, fraction] = Math.abs(value).toFixed(decimals).split('.');
  const groups = whole.replace(/\B(?=(\d{3})+$)/g, THIN_SPACE);
  const digits = fraction === undefined ? groups : `${groups}.${fraction}`;
  return value < 0 && /[1-9]/.test(digits) ? MINUS + digits : digits;
}

/** The unit after a thin space; the degree sign close up. */
export function withUnit(figure: string, unit: string): string {
  if (unit === '' || unit === '°') return figure + unit;
  return figure + THIN_SPACE + unit;
}

/** The same words with no place for a line to end within a figure, or between it and its unit. */
export function unbroken(text: string): string {
  return text.replaceAll(THIN_SPACE, '\u202f');
}

/** A probability in per cent: two digits of it, or of what is missing to certainty. */
export function percentage(probability: number): string {
  const percent = probability * 100;
  const small = Math.min(percent, 100 - percent);
  const decimals = small > 0 ? Math.min(20, Math.max(0, 1 - Math.floor(Math.log10(small)))) : 0;
  return withUnit(grouped(percent, decimals), '%');
}

/** A constant or a tolerance as it is: no digit is dropped. */
export function plain(value: number): string {
  return String(value).replaceAll('-', MINUS);
}

/** The report's UTC text, "2031-05-14T03:12:40.4Z", as "2031 May 14 03:12:40", rounded to seconds. */
export function utcWords(utc: string): string {
  const parts = /^(\d{4})-(\d\d)-(\d\d)T(\d\d):(\d\d):(\d\d)(\.\d+)?Z?$/.exec(utc);
  if (parts === null) return utc;
  const [year, month, day, hour, minute, second] = parts.slice(1, 7).map(Number);
  const up = Number(`0${parts[7] ?? ''}`) >= 0.5 ? 1 : 0;
  // A leap second stays one; only whole seconds are carried.
  if (second + up > 59 && second < 60) {
    return words(new Date(Date.UTC(year, month - 1, day, hour, minute, second + up)).toISOString());
  }
  return words(utc.slice(0, 17) + String(second === 60 ? 60 : second + up).padStart(2, '0'));
}

function words(iso: string): string {
  const month = MONTHS[Number(iso.slice(5, 7)) - 1];
  return `${iso.slice(0, 4)} ${month} ${iso.slice(8, 10)} ${iso.slice(11, 19)}`;
}

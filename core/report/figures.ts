import { formatIso } from '../time/format';

/**
 * Figures with the digits they deserve, as text: digits grouped by thin spaces, unit after a thin
 * space, a true minus sign. Without a covariance the digits say how well the model is computed, not
 * how well the orbit is known; the findings say so.
 */

const THIN = '\u2009';
const MINUS = '\u2212';

/** A number with so many decimals, grouped. */
export function formatNumber(value: number, decimals: number): string {
  const [whole, fraction] = Math.abs(value).toFixed(decimals).split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+(?!\d))/g, THIN);
  const digits = fraction === undefined ? grouped : `${grouped}.${fraction}`;
  return value < 0 && Number(digits.replaceAll(THIN, '')) !== 0 ? MINUS + digits : digits;
}

/** Whole kilometres to a million, then three figures of a million. */
export function formatKm(km: number): string {
  return Math.abs(km) < 1e6
    ? `${formatNumber(km, Math.abs(km) < 10 ? 1 : 0)}${THIN}km`
    : `${formatNumber(km / 1e6, 3)} million${THIN}km`;
}

export const formatAu = (au: number): string => `${formatNumber(au, au < 0.01 ? 5 : 4)}${THIN}au`;

export const formatSpeed = (kmS: number): string => `${formatNumber(kmS, 2)}${THIN}km/s`;

export const formatDegrees = (deg: number, decimals = 1): string =>
  `${formatNumber(deg, decimals)}°`;

/** "12.3° N 45.6° E". */
export function formatPlace(latitudeDeg: number, longitudeDeg: number): string {
  const latitude = `${Math.abs(latitudeDeg).toFixed(2)}°${THIN}${latitudeDeg < 0 ? 'S' : 'N'}`;
  const longitude = `${Math.abs(longitudeDeg).toFixed(2)}°${THIN}${longitudeDeg < 0 ? 'W' : 'E'}`;
  return `${latitude} ${longitude}`;
}

/** A length of time in the two units a person would say. */
export function formatDuration(seconds: number): string {
  const s = Math.abs(seconds);
  if (s < 120) return `${formatNumber(s, s < 10 ? 1 : 0)}${THIN}s`;
  if (s < 7200) return `${formatNumber(s / 60, 1)}${THIN}min`;
  if (s < 172800) return `${formatNumber(s / 3600, 1)}${THIN}h`;
  return `${formatNumber(s / 86400, 1)} days`;
}

/** A probability as a person says it: "1 in 2 300", "0.34", "below 1 in a million million". */
export function formatProbability(p: number): string {
  if (p < 1e-12) return 'below 1 in a million million';
  if (p > 0.1) return formatNumber(p, 2);
  const digits = 10 ** Math.floor(Math.log10(1 / p) - 1);
  return `1 in ${formatNumber(Math.round(1 / p / digits) * digits, 0)}`;
}

const MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];

/** "2031 May 14 at 03:12:40 UTC". */
export function formatMoment(tdbSeconds: number): string {
  const [date, clock] = formatIso(tdbSeconds, 'UTC', 0).replace('Z', '').split('T');
  const [year, month, day] = date.split('-');
  return `${year} ${MONTHS[Number(month) - 1]} ${Number(day)} at ${clock} UTC`;
}

/** "2031 May 14". */
export const formatDay = (tdbSeconds: number): string => formatMoment(tdbSeconds).split(' at ')[0];

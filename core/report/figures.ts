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

/** A small figure or a standard deviation: whole from ten up, two significant figures below. */
export function formatSmall(value: number): string {
  const size = Math.abs(value);
  const decimals = size >= 10 || size === 0 ? 0 : 1 - Math.floor(Math.log10(size));
  return formatNumber(value, Math.min(decimals, 15));
}

/**
 * A distance: whole kilometres from ten up, since the ephemeris is known to about one; thousands of
 * kilometres, written as millions, from a million up; metres below 100 m.
 */
export function formatKm(km: number): string {
  const size = Math.abs(km);
  if (size >= 1e6) return `${formatNumber(km / 1e6, 3)} million${THIN}km`;
  if (size >= 10 || size === 0) return `${formatNumber(km, 0)}${THIN}km`;
  return size >= 0.1 ? `${formatNumber(km, 1)}${THIN}km` : `${formatSmall(km * 1000)}${THIN}m`;
}

/** To 15 000 km; nearer than a hundredth to 1 500 km. */
export const formatAu = (au: number): string => `${formatNumber(au, au < 0.01 ? 5 : 4)}${THIN}au`;

/** 10 m/s: a person hears no more. */
export const formatSpeed = (kmS: number): string => `${formatNumber(kmS, 2)}${THIN}km/s`;

export const formatDegrees = (deg: number, decimals = 1): string =>
  `${formatNumber(deg, decimals)}°`;

/** "12.34° N 45.60° E": a hundredth of a degree is 1 km on the ground. */
export function formatPlace(latitudeDeg: number, longitudeDeg: number): string {
  const latitude = `${Math.abs(latitudeDeg).toFixed(2)}°${THIN}${latitudeDeg < 0 ? 'S' : 'N'}`;
  const longitude = `${Math.abs(longitudeDeg).toFixed(2)}°${THIN}${longitudeDeg < 0 ? 'W' : 'E'}`;
  return `${latitude} ${longitude}`;
}

/** A length of time, without its sign, in the unit a person would say. */
export function formatDuration(seconds: number): string {
  const s = Math.abs(seconds);
  if (s < 120) return `${formatSmall(s)}${THIN}s`;
  if (s < 7200) return `${formatNumber(s / 60, 1)}${THIN}min`;
  if (s < 172800) return `${formatNumber(s / 3600, 1)}${THIN}h`;
  return `${formatNumber(s / 86400, 1)} days`;
}

/** A probability as a person says it: "1 in 2 300", "0.34"; never certain one way or the other. */
export function formatProbability(p: number): string {
  if (p < 1e-12) return 'below 1 in a million million';
  if (p >= 0.995) return 'above 0.99';
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

/** "2031 May 14", of the report's UTC text. */
export function formatUtcDay(utc: string): string {
  const [year, month, day] = utc.split('T')[0].split('-');
  return `${year} ${MONTHS[Number(month) - 1]} ${Number(day)}`;
}

/** "2031 May 14 at 03:12:40 UTC", rounded to the second. */
export function formatMoment(tdbSeconds: number): string {
  const utc = formatIso(tdbSeconds, 'UTC', 0);
  return `${formatUtcDay(utc)} at ${utc.slice(utc.indexOf('T') + 1, -1)} UTC`;
}

/** "2031 May 14". */
export const formatDay = (tdbSeconds: number): string =>
  formatUtcDay(formatIso(tdbSeconds, 'UTC', 0));

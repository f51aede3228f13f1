import { grouped, utcWords, withUnit } from '../desk/figures';
import { AU_KM, formatIso, SECONDS_PER_DAY } from '../worker/core-values';

/** How the ribbon, the charts and the plate write distances, spans and instants. */

const MINUTE = 60;
const HOUR = 3600;
const DAY = SECONDS_PER_DAY;
export const YEAR = 365.25 * DAY;
const MINUS = '\u2212';

/** "16 240 km", "3.12 million km", "0.133 au". */
export function distanceWords(km: number): string {
  if (km < 1e6) return withUnit(grouped(km), 'km');
  if (km < 0.05 * AU_KM) return withUnit(grouped(km / 1e6, 2), 'million km');
  return withUnit(grouped(km / AU_KM, 3), 'au');
}

/** The unit that a span is said in: the largest of which it holds at least `least`. */
function unitFor(seconds: number, least: number): { size: number; name: string } {
  const units = [
    { size: YEAR, name: 'yr' },
    { size: DAY, name: 'd' },
    { size: HOUR, name: 'h' },
    { size: MINUTE, name: 'min' },
  ];
  return units.find(({ size }) => seconds >= least * size) ?? { size: 1, name: 's' };
}

/** A span with about two digits: "3.2 h", "45 s", "14 min", "2.5 yr". */
export function spanWords(seconds: number): string {
  const size = Math.abs(seconds);
  const unit = unitFor(size, 1.5);
  const value = size / unit.size;
  return withUnit(grouped(value, value < 9.95 ? 1 : 0), unit.name);
}

/** A whole span as a tick says it: "−60 d", "+10 min", "0". */
export function tickWords(seconds: number): string {
  if (seconds === 0) return '0';
  const size = Math.abs(seconds);
  const unit = unitFor(size, 1);
  return (seconds < 0 ? MINUS : '+') + withUnit(grouped(size / unit.size), unit.name);
}

/** "2031 May 14 03:12:40", with decimals of the second when asked. */
export function momentWords(tdbSeconds: number, decimals = 0): string {
  const iso = formatIso(tdbSeconds, 'UTC', decimals);
  const fraction = decimals === 0 ? '' : iso.slice(19, -1);
  return utcWords(`${iso.slice(0, 19)}Z`) + fraction;
}

/**
 * The date of a tick with the parts that matter at its distance from the ribbon's zero; the zero's
 * own is whole.
 *
 * @param awaySeconds how far the tick is from the zero
 */
export function tickDateWords(tdbSeconds: number, awaySeconds: number): string {
  const whole = momentWords(tdbSeconds);
  const away = Math.abs(awaySeconds);
  if (away === 0) return whole;
  if (away >= 30 * DAY) return whole.slice(0, 11);
  if (away >= DAY) return whole.slice(5, 11);
  return away >= HOUR ? whole.slice(12, 17) : whole.slice(12);
}

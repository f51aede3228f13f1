import { grouped, withUnit } from '../desk/figures';
import { AU_KM, EARTH_RADIUS_KM, MOON_MEAN_DISTANCE_KM } from '../worker/core-values';

/** How the scenes write lengths and places. */

/** From this distance on lengths are written in au, km. */
const IN_AU_FROM_KM = 0.1 * AU_KM;
const IN_RADII_BELOW_KM = 30 * EARTH_RADIUS_KM;

export function kilometres(km: number): string {
  return withUnit(grouped(km, Math.abs(km) < 100 ? 1 : 0), 'km');
}

export function astronomicalUnits(km: number): string {
  return withUnit((km / AU_KM).toFixed(4), 'au');
}

export function distance(km: number): string {
  return km < IN_AU_FROM_KM ? kilometres(km) : astronomicalUnits(km);
}

/** A geocentric distance in the unit people picture: Earth radii when near, Moon's distances beyond. */
export function pictured(km: number): string {
  if (km < IN_RADII_BELOW_KM) return withUnit((km / EARTH_RADIUS_KM).toFixed(2), 'Earth radii');
  const moons = km / MOON_MEAN_DISTANCE_KM;
  return withUnit(grouped(moons, moons < 100 ? 2 : 0), 'Moon’s distances');
}

export function speed(kmS: number): string {
  return withUnit(kmS.toFixed(2), 'km/s');
}

/** "12.34° N 120.50° W". */
export function place(latitudeDeg: number, longitudeDeg: number): string {
  const latitude = `${Math.abs(latitudeDeg).toFixed(2)}° ${latitudeDeg < 0 ? 'S' : 'N'}`;
  return `${latitude} ${Math.abs(longitudeDeg).toFixed(2)}° ${longitudeDeg < 0 ? 'W' : 'E'}`;
}

const NBSP = '\u00a0';

/** Time from the pass: "−3 d", "+12 h", "+5 min". */
export function offset(seconds: number): string {
  const size = Math.abs(seconds);
  const sign = seconds < 0 ? '\u2212' : '+';
  if (size >= 86400) return `${sign}${round(size / 86400)}${NBSP}d`;
  if (size >= 3600) return `${sign}${round(size / 3600)}${NBSP}h`;
  return `${sign}${round(size / 60)}${NBSP}min`;
}

function round(value: number): string {
  return String(Math.round(value * 10) / 10);
}

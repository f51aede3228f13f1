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

/** A geocentric distance in the unit people picture: Earth radii when near, lunar distances beyond. */
export function pictured(km: number): string {
  if (km < IN_RADII_BELOW_KM) return withUnit((km / EARTH_RADIUS_KM).toFixed(2), 'Earth radii');
  const moons = km / MOON_MEAN_DISTANCE_KM;
  return withUnit(grouped(moons, moons < 100 ? 2 : 0), 'lunar distances');
}

export function speed(kmS: number): string {
  return withUnit(kmS.toFixed(2), 'km/s');
}

/** "12.34° N 120.50° W". */
export function place(latitudeDeg: number, longitudeDeg: number): string {
  const latitude = `${Math.abs(latitudeDeg).toFixed(2)}° ${latitudeDeg < 0 ? 'S' : 'N'}`;
  return `${latitude} ${Math.abs(longitudeDeg).toFixed(2)}° ${longitudeDeg < 0 ? 'W' : 'E'}`;
}

const MINUS = '\u2212';
const HALF_HOUR_S = 1800;
const DAY_S = 86400;

/**
 * Time from the pass, "−3 d", "+36 h", "+20 min", in the unit of the step it is counted in.
 *
 * @param stepS  spacing of the marks, s
 */
export function offset(seconds: number, stepS: number): string {
  const sign = seconds < 0 ? MINUS : '+';
  const [unitS, unit] =
    stepS < HALF_HOUR_S ? [60, 'min'] : stepS < DAY_S ? [3600, 'h'] : [DAY_S, 'd'];
  const size = Math.abs(seconds) / unitS;
  return `${sign}${withUnit(grouped(size, Number.isInteger(size) ? 0 : 1), unit)}`;
}

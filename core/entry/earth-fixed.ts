import { EARTH_FLATTENING, EARTH_RADIUS_KM, EARTH_ROTATION_RAD_S } from '../constants';
import { celestialToTerrestrial, earthOrientation } from '../frames/earth-orientation';
import { itrfFromGeodetic, velocityRelativeToAir } from '../frames/geodetic';
import { add, cross, rotate, rotateBack, type Vec3 } from '../math/vector';

/** States in axes that turn with the Earth, in which still air stands still. */

/** A place and a motion in ITRF axes; the velocity is that seen from the ground. */
export interface EarthFixedState {
  readonly rKm: Vec3;
  readonly vKmS: Vec3;
}

/**
 * State seen from the turning ground.
 *
 * @param r          geocentric position, km, ICRF axes (3)
 * @param v          geocentric velocity, km/s, ICRF axes (3)
 * @param tdbSeconds TDB seconds past J2000
 * @returns          km and km/s, ITRF axes
 * Accuracy: of the Earth's orientation (UT1 = UTC assumed).
 */
export function earthFixedFromIcrf(r: Vec3, v: Vec3, tdbSeconds: number): EarthFixedState {
  const orientation = earthOrientation(tdbSeconds);
  const matrix = celestialToTerrestrial(orientation);
  return {
    rKm: rotate(matrix, r),
    vKmS: rotate(matrix, velocityRelativeToAir(r, v, orientation)),
  };
}

/**
 * Geocentric state in ICRF axes: the inverse of `earthFixedFromIcrf`.
 *
 * @param state      km and km/s, ITRF axes
 * @param tdbSeconds TDB seconds past J2000
 * @returns          km and km/s, ICRF axes
 */
export function icrfFromEarthFixed(
  state: EarthFixedState,
  tdbSeconds: number,
): { rKm: Vec3; vKmS: Vec3 } {
  const matrix = celestialToTerrestrial(earthOrientation(tdbSeconds));
  return { rKm: rotateBack(matrix, state.rKm), vKmS: rotateBack(matrix, inertialVelocity(state)) };
}

/** Velocity among the stars of an Earth-fixed state, km/s, along the ITRF axes of that moment. */
export const inertialVelocity = (state: EarthFixedState): Vec3 =>
  add(state.vKmS, cross([0, 0, EARTH_ROTATION_RAD_S], state.rKm));

/** Place and motion over the ground; what `EntryPoint` of the encounter carries is enough. */
export interface AirEntry {
  readonly latitudeRad: number;
  readonly longitudeRad: number;
  readonly altitudeKm: number;
  readonly airSpeedKmS: number;
  /** Above the geodetic horizontal; negative going down. */
  readonly airFlightPathAngleRad: number;
  /** From north through east. */
  readonly airAzimuthRad: number;
}

/**
 * State of a body from its place, speed and angles relative to the turning air.
 *
 * @param entry  radians, km, km/s
 * @returns      km and km/s, ITRF axes
 * Accuracy: rounding.
 */
export function earthFixedFromEntry(entry: AirEntry): EarthFixedState {
  const { latitudeRad, longitudeRad, airFlightPathAngleRad, airAzimuthRad } = entry;
  const level = entry.airSpeedKmS * Math.cos(airFlightPathAngleRad);
  const up = entry.airSpeedKmS * Math.sin(airFlightPathAngleRad);
  const north = level * Math.cos(airAzimuthRad);
  const east = level * Math.sin(airAzimuthRad);
  const sinLat = Math.sin(latitudeRad);
  const cosLat = Math.cos(latitudeRad);
  const sinLon = Math.sin(longitudeRad);
  const cosLon = Math.cos(longitudeRad);
  const outward = up * cosLat - north * sinLat;
  return {
    rKm: itrfFromGeodetic(entry),
    vKmS: [
      outward * cosLon - east * sinLon,
      outward * sinLon + east * cosLon,
      up * sinLat + north * cosLat,
    ],
  };
}

const B = EARTH_RADIUS_KM * (1 - EARTH_FLATTENING);

/**
 * Altitude over the ellipsoid along the radius: what a flight asks for thousands of times.
 *
 * @param x, y, z position, km, ITRF axes
 * @returns       km
 * Accuracy: within 0.6 m of the geodetic altitude up to 100 km, 6 m up to 1000 km.
 */
export function radialAltitudeKm(x: number, y: number, z: number): number {
  const p2 = x * x + y * y;
  const z2 = z * z;
  const r2 = p2 + z2;
  const r = Math.sqrt(r2);
  const surface =
    (EARTH_RADIUS_KM * B * r) / Math.sqrt(B * B * p2 + EARTH_RADIUS_KM * EARTH_RADIUS_KM * z2);
  return r - surface;
}

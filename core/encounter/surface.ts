import { celestialToTerrestrial, earthOrientation } from '../frames/earth-orientation';
import { geodeticFromItrf, localAngles, velocityRelativeToAir } from '../frames/geodetic';
import { moonBodyFixed, selenographic } from '../frames/moon-orientation';
import { dot, norm, rotate, type Vec3 } from '../math/vector';

/** Place and motion at a boundary over the turning Earth; angles in radians. */
export interface EntryPoint {
  latitudeRad: number;
  longitudeRad: number;
  altitudeKm: number;
  /** Relative to the Earth's centre, inertial axes. */
  speedKmS: number;
  flightPathAngleRad: number;
  azimuthRad: number;
  /** Relative to air that turns with the Earth. */
  airSpeedKmS: number;
  airFlightPathAngleRad: number;
  airAzimuthRad: number;
}

/**
 * Geodetic place, speed and direction of a geocentric state over WGS 84.
 *
 * @param r          geocentric position, km, ICRF (3)
 * @param v          geocentric velocity, km/s, ICRF (3)
 * @param tdbSeconds TDB seconds past J2000
 * @returns          angles in radians: flight-path angle from the geodetic horizontal, negative going
 *                   down; azimuth of motion from north through east, [0, 2π)
 * Accuracy: of the Earth's orientation (UT1 = UTC assumed: up to 0.9 s, 420 m at the equator).
 */
export function entryPoint(r: Vec3, v: Vec3, tdbSeconds: number): EntryPoint {
  const orientation = earthOrientation(tdbSeconds);
  const place = geodeticFromItrf(rotate(celestialToTerrestrial(orientation), r));
  const air = velocityRelativeToAir(r, v, orientation);
  const inertial = localAngles(r, v, orientation);
  const relative = localAngles(r, air, orientation);
  return {
    latitudeRad: place.latitudeRad,
    longitudeRad: place.longitudeRad,
    altitudeKm: place.altitudeKm,
    speedKmS: norm(v),
    flightPathAngleRad: inertial.flightPathAngleRad,
    azimuthRad: inertial.azimuthRad,
    airSpeedKmS: norm(air),
    airFlightPathAngleRad: relative.flightPathAngleRad,
    airAzimuthRad: relative.azimuthRad,
  };
}

/** Where a body's surface is met; angles in radians. */
export interface SurfacePoint {
  latitudeRad: number;
  longitudeRad: number;
  speedKmS: number;
  flightPathAngleRad: number;
}

/**
 * Selenographic place of a state at the Moon's surface (mean Earth/polar axis).
 *
 * @param r          position from the Moon's centre, km, ICRF (3)
 * @param v          velocity relative to the Moon's centre, km/s, ICRF (3)
 * @param tdbSeconds TDB seconds past J2000
 */
export function lunarSurfacePoint(r: Vec3, v: Vec3, tdbSeconds: number): SurfacePoint {
  const place = selenographic(rotate(moonBodyFixed(tdbSeconds), r));
  return {
    latitudeRad: place.latitudeRad,
    longitudeRad: place.longitudeRad,
    speedKmS: norm(v),
    flightPathAngleRad: radialAngle(r, v),
  };
}

/** Angle of motion above the plane normal to the radius, radians; negative going down. */
export function radialAngle(r: Vec3, v: Vec3): number {
  return Math.asin(Math.min(1, Math.max(-1, dot(r, v) / (norm(r) * norm(v)))));
}

import { EARTH_FLATTENING, EARTH_RADIUS_KM, EARTH_ROTATION_RAD_S } from '../constants';
import { rotate, type Vec3 } from '../math/vector';
import { celestialToTerrestrial, type EarthOrientation } from './earth-orientation';

/** Places over the WGS 84 ellipsoid, and motion as seen from the ground and the air there. */

export interface Geodetic {
  /** [−π/2, π/2], the angle of the ellipsoid's normal with the equator. */
  readonly latitudeRad: number;
  /** (−π, π], east of the prime meridian. */
  readonly longitudeRad: number;
  /** Along the normal, km; negative below the ellipsoid. */
  readonly altitudeKm: number;
}

const A = EARTH_RADIUS_KM;
const B = EARTH_RADIUS_KM * (1 - EARTH_FLATTENING);
const A2_MINUS_B2 = A * A - B * B;
/** Bisection, the slowest way there, halves π/2 down to 1e-16 in as many steps. */
const MAX_STEPS = 54;

/**
 * Reduced latitude of the foot of the normal through a point, radians, [0, π/2].
 *
 * The foot (A cos β, B sin β) satisfies A p sin β − B z cos β − (A² − B²) sin β cos β = 0, which is
 * not positive at 0 and not negative at π/2: Newton's method, kept inside that bracket.
 *
 * @param p  distance from the axis, km, above zero
 * @param z  distance from the equator's plane, km, zero or above
 */
function reducedLatitude(p: number, z: number): number {
  let low = 0;
  let high = Math.PI / 2;
  // Exact on the ellipsoid; elsewhere a few minutes of arc off at most above it.
  let beta = Math.atan2(A * z, B * p);
  for (let i = 0; i < MAX_STEPS; i++) {
    const sine = Math.sin(beta);
    const cosine = Math.cos(beta);
    const value = A * p * sine - B * z * cosine - A2_MINUS_B2 * sine * cosine;
    const slope = A * p * cosine + B * z * sine - A2_MINUS_B2 * (cosine - sine) * (cosine + sine);
    if (value > 0) high = beta;
    else low = beta;
    let next = beta - value / slope;
    if (!(next >= low && next <= high)) next = (low + high) / 2;
    const step = Math.abs(next - beta);
    beta = next;
    // Newton's error after this step is about the step's square: far below rounding.
    if (step < 1e-9) break;
  }
  return beta;
}

/**
 * Geodetic latitude, longitude and altitude of a point.
 *
 * @param r  position, km, ITRF axes (3)
 * @returns  place over the WGS 84 ellipsoid. On the polar axis the longitude is 0; at the centre
 *           itself the nearest point of the ellipsoid is taken to be the north pole (latitude π/2,
 *           altitude −6356.752 km)
 * Domain: any point. Within 43 km of the centre a point has more than one normal: one is returned.
 * Accuracy: 1e-14 rad and 3e-8 km measured against ERFA's gd2gc from 100 km off the centre to 1e8 km
 * altitude.
 * Source: condition of the normal in the reduced latitude, as in Fukushima (2006), J. Geod. 79, 689;
 * WGS 84 (NIMA TR8350.2).
 */
export function geodeticFromItrf(r: Vec3): Geodetic {
  const p = Math.sqrt(r[0] * r[0] + r[1] * r[1]);
  const z = Math.abs(r[2]);
  const south = r[2] < 0 ? -1 : 1;
  if (p === 0) {
    return { latitudeRad: (south * Math.PI) / 2, longitudeRad: 0, altitudeKm: z - B };
  }
  const beta = reducedLatitude(p, z);
  const sine = Math.sin(beta);
  const cosine = Math.cos(beta);
  const latitude = Math.atan2(A * sine, B * cosine);
  // Projected on the normal: no cancellation near the pole or the equator.
  const altitudeKm = (p - A * cosine) * Math.cos(latitude) + (z - B * sine) * Math.sin(latitude);
  return {
    latitudeRad: south * latitude,
    longitudeRad: Math.atan2(r[1], r[0]),
    altitudeKm,
  };
}

/**
 * Altitude of a point over the WGS 84 ellipsoid: that of `geodeticFromItrf`.
 *
 * @param r  position, km, ITRF axes (3)
 * @returns  km, along the normal
 */
export function geodeticAltitudeKm(r: Vec3): number {
  return geodeticFromItrf(r).altitudeKm;
}

/**
 * Position of a place over the WGS 84 ellipsoid.
 *
 * @param place  geodetic latitude and longitude, radians; altitude, km
 * @returns      km, ITRF axes (3)
 * Accuracy: rounding. Source: WGS 84 (NIMA TR8350.2), eq. 4-14.
 */
export function itrfFromGeodetic(place: Geodetic): Vec3 {
  const sine = Math.sin(place.latitudeRad);
  const cosine = Math.cos(place.latitudeRad);
  const normal = (A * A) / Math.hypot(A * cosine, B * sine);
  const p = (normal + place.altitudeKm) * cosine;
  return [
    p * Math.cos(place.longitudeRad),
    p * Math.sin(place.longitudeRad),
    ((B * B * normal) / (A * A) + place.altitudeKm) * sine,
  ];
}

/**
 * Velocity relative to air that turns with the Earth: v − ω × r, ω along the pole of date.
 *
 * @param r  geocentric position, km, ICRF axes (3)
 * @param v  geocentric velocity, km/s, ICRF axes (3)
 * @param o  orientation of the Earth at that moment
 * @returns  km/s, ICRF axes (3)
 * Accuracy: no wind; the pole's own motion (below 1e-6 km/s at the ground) is neglected.
 * Source: rotation rate of IERS Conventions (2010), eq. 5.15.
 */
export function velocityRelativeToAir(r: Vec3, v: Vec3, o: EarthOrientation): Vec3 {
  const wx = EARTH_ROTATION_RAD_S * o.xRad;
  const wy = EARTH_ROTATION_RAD_S * o.yRad;
  const wz = EARTH_ROTATION_RAD_S * Math.sqrt(1 - o.xRad * o.xRad - o.yRad * o.yRad);
  return [
    v[0] - (wy * r[2] - wz * r[1]),
    v[1] - (wz * r[0] - wx * r[2]),
    v[2] - (wx * r[1] - wy * r[0]),
  ];
}

export interface LocalAngles {
  /** Above the geodetic horizontal, [−π/2, π/2]; negative going down. */
  readonly flightPathAngleRad: number;
  /** From north through east, [0, 2π). */
  readonly azimuthRad: number;
}

/**
 * Direction of a motion against the geodetic horizontal under it.
 *
 * @param r  geocentric position, km, ICRF axes (3)
 * @param v  velocity, inertial or relative to the air, km/s, ICRF axes (3)
 * @param o  orientation of the Earth at that moment
 * @returns  flight-path angle and azimuth; a vanishing velocity gives zero for both, a vertical one
 *           an azimuth without meaning; on the polar axis azimuths count from the prime meridian
 * Accuracy: rounding, beyond that of the orientation.
 */
export function localAngles(r: Vec3, v: Vec3, o: EarthOrientation): LocalAngles {
  const matrix = celestialToTerrestrial(o);
  const { latitudeRad, longitudeRad } = geodeticFromItrf(rotate(matrix, r));
  const [vx, vy, vz] = rotate(matrix, v);
  const sinLat = Math.sin(latitudeRad);
  const cosLat = Math.cos(latitudeRad);
  const sinLon = Math.sin(longitudeRad);
  const cosLon = Math.cos(longitudeRad);
  const outward = vx * cosLon + vy * sinLon;
  const east = -vx * sinLon + vy * cosLon;
  const north = -outward * sinLat + vz * cosLat;
  const up = outward * cosLat + vz * sinLat;
  const azimuth = Math.atan2(east, north);
  return {
    flightPathAngleRad: Math.atan2(up, Math.hypot(east, north)),
    // A tiny negative angle plus a turn rounds to the whole turn, which is north: 0.
    azimuthRad: azimuth < 0 ? (azimuth + 2 * Math.PI) % (2 * Math.PI) : azimuth,
  };
}

import { add, cross, eclipticToIcrf, scale, type Vec3 } from '../worker/core-geometry';

/**
 * Where a scene is looked at from: a turntable about the pole of the ecliptic.
 *
 * Four numbers and a target say it all, so a station, a hand's turn and the way between two
 * stations are the same kind of thing.
 */

export interface Camera {
  /** What the camera looks at, km from the scene's centre, ICRF axes. */
  readonly target: Vec3;
  /** Ecliptic longitude of the camera seen from the target. */
  readonly longitudeRad: number;
  /** Ecliptic latitude of the camera seen from the target, [−π/2, π/2]. */
  readonly latitudeRad: number;
  /** From the target, km. */
  readonly distanceKm: number;
}

/** Half of the angle that the shorter side of the picture takes in: narrow, as on a drawn plate. */
const HALF_FIELD_RAD = (15 * Math.PI) / 180;

export const NEAREST_KM = 1;
/** 60 au. */
export const FARTHEST_KM = 9e9;

/** Distance between lens and picture, px: a length at distance d is seen `length * focal / d` long. */
export function focalPx(widthPx: number, heightPx: number): number {
  return Math.min(widthPx, heightPx) / 2 / Math.tan(HALF_FIELD_RAD);
}

/** Distance from which a circle of a radius about the target just fits the shorter side. */
export function distanceToFrame(radiusKm: number): number {
  return radiusKm / Math.tan(HALF_FIELD_RAD);
}

interface CameraAxes {
  /** Rightwards, upwards and into the picture; unit vectors, ICRF axes. */
  readonly right: Vec3;
  readonly up: Vec3;
  readonly forward: Vec3;
}

export function axesOf(camera: Camera): CameraAxes {
  const { longitudeRad, latitudeRad } = camera;
  const back = directionOf(longitudeRad, latitudeRad);
  const right = eclipticToIcrf([-Math.sin(longitudeRad), Math.cos(longitudeRad), 0]);
  return { right, up: cross(back, right), forward: scale(back, -1) };
}

export function eyeOf(camera: Camera): Vec3 {
  const back = directionOf(camera.longitudeRad, camera.latitudeRad);
  return add(camera.target, scale(back, camera.distanceKm));
}

/** Unit vector, ICRF axes, of a direction in the ecliptic of J2000. */
function directionOf(longitudeRad: number, latitudeRad: number): Vec3 {
  const c = Math.cos(latitudeRad);
  return eclipticToIcrf([
    c * Math.cos(longitudeRad),
    c * Math.sin(longitudeRad),
    Math.sin(latitudeRad),
  ]);
}

/** The camera a share of the way from one to another: turned the short way, distance by ratio. */
export function between(from: Camera, to: Camera, share: number): Camera {
  const turn = to.longitudeRad - from.longitudeRad;
  const short = turn - 2 * Math.PI * Math.round(turn / (2 * Math.PI));
  return {
    target: add(scale(from.target, 1 - share), scale(to.target, share)),
    longitudeRad: from.longitudeRad + short * share,
    latitudeRad: from.latitudeRad + (to.latitudeRad - from.latitudeRad) * share,
    distanceKm: from.distanceKm * (to.distanceKm / from.distanceKm) ** share,
  };
}

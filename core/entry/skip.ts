import { EARTH_RADIUS_KM, GM_KM3_S2, SPHERE_OF_INFLUENCE_KM } from '../constants';
import { cross, dot, norm } from '../math/vector';
import { type EarthFixedState, inertialVelocity } from './earth-fixed';

/** What a pass through the air made of an orbit about the Earth. */

/** A conic about the Earth's centre. */
export interface GeocentricOrbit {
  /** Negative for a hyperbola. */
  readonly semiMajorAxisKm: number;
  readonly eccentricity: number;
  /** Above the equatorial radius. */
  readonly perigeeAltitudeKm: number;
  /** Null for a hyperbola. */
  readonly apogeeAltitudeKm: number | null;
  /** Null for an ellipse. */
  readonly excessSpeedKmS: number | null;
}

/** A body that leaves the air again. */
export interface SkipOut {
  /** At 100 km, climbing. */
  readonly state: EarthFixedState;
  /** Since the entry. */
  readonly seconds: number;
  readonly massKg: number;
  /** Relative to the Earth's centre, from the speed that the orbit before had at the exit's distance. */
  readonly speedLostKmS: number;
  readonly before: GeocentricOrbit;
  readonly after: GeocentricOrbit;
  /** Whether it comes back: bound, and not beyond the sphere of influence. */
  readonly returns: boolean;
}

/**
 * Two-body orbit about the Earth of an Earth-fixed state.
 *
 * Accuracy: of the conic; J2 shifts the axis of a low orbit by some 10 km along its way.
 */
function geocentricOrbit(state: EarthFixedState): GeocentricOrbit {
  const gm = GM_KM3_S2.DE431.Earth;
  const v = inertialVelocity(state);
  const r = norm(state.rKm);
  const energy = dot(v, v) / 2 - gm / r;
  const h = norm(cross(state.rKm, v));
  const semiMajorAxisKm = -gm / (2 * energy);
  const eccentricity = Math.sqrt(Math.max(0, 1 + (2 * energy * h * h) / (gm * gm)));
  const perigee = (h * h) / gm / (1 + eccentricity);
  const bound = energy < 0;
  return {
    semiMajorAxisKm,
    eccentricity,
    perigeeAltitudeKm: perigee - EARTH_RADIUS_KM,
    apogeeAltitudeKm: bound ? 2 * semiMajorAxisKm - perigee - EARTH_RADIUS_KM : null,
    excessSpeedKmS: bound ? null : Math.sqrt(2 * energy),
  };
}

/**
 * Compares a body's orbit at the entry and at the exit.
 *
 * @param entry   at the entry interface, ITRF axes of that moment
 * @param exit    at the exit, ITRF axes of that moment
 * @param seconds between them
 * @param massKg  what is left of it
 */
export function skipOut(
  entry: EarthFixedState,
  exit: EarthFixedState,
  seconds: number,
  massKg: number,
): SkipOut {
  const gm = GM_KM3_S2.DE431.Earth;
  const before = geocentricOrbit(entry);
  const after = geocentricOrbit(exit);
  const speedBefore = Math.sqrt(gm * (2 / norm(exit.rKm) - 1 / before.semiMajorAxisKm));
  return {
    state: exit,
    seconds,
    massKg,
    speedLostKmS: speedBefore - norm(inertialVelocity(exit)),
    before,
    after,
    returns:
      after.apogeeAltitudeKm !== null &&
      after.apogeeAltitudeKm + EARTH_RADIUS_KM < SPHERE_OF_INFLUENCE_KM,
  };
}

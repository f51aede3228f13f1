import { cross, dot, norm, scale, subtract, unit, type Vec3 } from '../math/vector';
import { meanFromTrueAnomaly, meanMotion, sinhMinusX } from './kepler';

/** A straight-line orbit: no plane, no elements. */
export class DegenerateOrbit extends Error {
  readonly code = 'degenerate-orbit';
  override name = 'DegenerateOrbit';
}

/** What fixes a state on a conic. */
export interface ConicPlace {
  semiLatusRectumKm: number;
  eccentricity: number;
  inclinationRad: number;
  nodeRad: number;
  argumentOfPeriapsisRad: number;
  trueAnomalyRad: number;
}

export interface Elements extends ConicPlace {
  periapsisKm: number;
  /** Negative for a hyperbola, null for a parabola. */
  semiMajorAxisKm: number | null;
  /** Elliptic [0, 2π); hyperbolic any sign; parabolic Barker's D + D³/3, D = tan(ν/2). */
  meanAnomalyRad: number;
  /** Seconds since the nearest periapsis; negative before it. */
  timeFromPeriapsisS: number;
  /** Null for open orbits. */
  periodS: number | null;
  /** Whether periapsis or node have no direction of their own and were set (see the function). */
  degenerate: { circular: boolean; equatorial: boolean };
}

/**
 * Eccentricity and sine of the inclination below which rounding of the state (some 1e-16, a few
 * times over) has more to say of the direction of periapsis or node than the orbit has.
 */
const NO_DIRECTION = 1e-13;

/** Energy over that of rest at the same distance below which rounding hides it: a parabola. */
const NO_ENERGY = 1e-14;

/** Angle brought into [0, 2π); a negative one below rounding becomes 0. */
function positive(angle: number): number {
  const turned = angle % (2 * Math.PI);
  const up = turned < 0 ? turned + 2 * Math.PI : turned;
  return up < 2 * Math.PI ? up : 0;
}

/**
 * Elliptic, parabolic or hyperbolic elements of a state about one attracting centre.
 *
 * @param r  position, km, any inertial axes (3)
 * @param v  velocity, km/s, the same axes (3)
 * @param gm gravitational parameter of the centre, km^3/s^2
 * @returns  elements; angles in radians, node, periapsis and true anomaly in [0, 2π). Equatorial: the
 *           node is set to 0 (along x). Circular: the argument of periapsis is set to 0 and the true
 *           anomaly counts from the node.
 * @throws   DegenerateOrbit for rectilinear motion (|r × v| below 1e-12 |r||v|)
 * Accuracy: round trip within 1e-12 of the state for 0 ≤ e ≤ 10 out to 300 semi-latus recta (check).
 *           Farther out a true anomaly no longer holds the distance: 2e-16 e r/p of it per rounding.
 * Source: Vallado, Fundamentals of Astrodynamics (2013), algorithm 9; e and 1/a from the energy.
 */
export function elementsFromState(r: Vec3, v: Vec3, gm: number): Elements {
  const distance = norm(r);
  const h = cross(r, v);
  const momentum = norm(h);
  if (!(momentum > 1e-12 * distance * norm(v))) {
    throw new DegenerateOrbit(
      'Position and velocity lie on one line: the orbit has no plane and no elements.',
    );
  }
  const p = (momentum * momentum) / gm;
  const eVector = subtract(scale(cross(v, h), 1 / gm), scale(r, 1 / distance));
  const pole = scale(h, 1 / momentum);
  const inPlane = Math.hypot(pole[0], pole[1]);
  const equatorial = inPlane <= NO_DIRECTION;
  const node: Vec3 = equatorial ? [1, 0, 0] : [-pole[1] / inPlane, pole[0] / inPlane, 0];
  const ahead = unit(cross(pole, node));
  const measured = norm(eVector);
  const circular = measured <= NO_DIRECTION;
  const periapsis = circular ? 0 : Math.atan2(dot(eVector, ahead), dot(eVector, node));
  const trueAnomaly = positive(Math.atan2(dot(r, ahead), dot(r, node)) - periapsis);
  // 1/a from the energy, without the loss that p/(1 − e²) has near e = 1.
  const inverse = 2 / distance - dot(v, v) / gm;
  const parabolic = Math.abs(inverse) * distance <= 2 * NO_ENERGY;
  const e = parabolic ? 1 : Math.sqrt(Math.max(0, 1 - p * inverse));
  const eccentricity = measured < 0.5 ? measured : keepKind(e, inverse, parabolic);
  const q = p / (1 + eccentricity);
  const semiMajorAxis = parabolic ? null : 1 / inverse;
  const { mean, motion } =
    semiMajorAxis !== null && semiMajorAxis < 0
      ? hyperbolicMean(dot(r, v), q, -semiMajorAxis, eccentricity, gm)
      : {
          mean: meanFromTrueAnomaly(
            trueAnomaly > Math.PI ? trueAnomaly - 2 * Math.PI : trueAnomaly,
            eccentricity,
          ),
          motion: meanMotion(q, eccentricity, gm),
        };
  const closed = semiMajorAxis !== null && semiMajorAxis > 0;
  return {
    semiLatusRectumKm: p,
    eccentricity,
    periapsisKm: q,
    semiMajorAxisKm: semiMajorAxis,
    inclinationRad: Math.atan2(inPlane, pole[2]),
    nodeRad: positive(Math.atan2(node[1], node[0])),
    argumentOfPeriapsisRad: positive(periapsis),
    trueAnomalyRad: trueAnomaly,
    meanAnomalyRad: closed ? positive(mean) : mean,
    timeFromPeriapsisS: mean / motion,
    periodS: closed ? 2 * Math.PI * Math.sqrt(semiMajorAxis ** 3 / gm) : null,
    degenerate: { circular, equatorial },
  };
}

/**
 * Mean anomaly and motion on a hyperbola from r·v = e sinh H sqrt(gm a): a true anomaly near the
 * asymptote does not hold the digits.
 */
function hyperbolicMean(
  radial: number,
  q: number,
  a: number,
  e: number,
  gm: number,
): { mean: number; motion: number } {
  const x = Math.asinh(radial / (Math.sqrt(gm * a) * e));
  return { mean: (q / a) * x + e * sinhMinusX(x), motion: Math.sqrt(gm / a) / a };
}

/** Keeps e on the side of 1 that the energy says, where rounding would lose it. */
function keepKind(e: number, inverse: number, parabolic: boolean): number {
  if (parabolic) return 1;
  if (inverse > 0) return Math.min(e, 1 - Number.EPSILON / 2);
  return Math.max(e, 1 + Number.EPSILON);
}

/**
 * State at a place on a conic.
 *
 * @param place semi-latus rectum km, angles in radians
 * @param gm    gravitational parameter of the centre, km^3/s^2
 * @returns     position km and velocity km/s in the axes of the angles
 * Source: Vallado, Fundamentals of Astrodynamics (2013), algorithm 10.
 */
export function stateFromElements(place: ConicPlace, gm: number): { r: Vec3; v: Vec3 } {
  const { semiLatusRectumKm: p, eccentricity: e, trueAnomalyRad: anomaly } = place;
  const { p: toPeriapsis, q: across } = planeAxes(place);
  const cos = Math.cos(anomaly);
  const sin = Math.sin(anomaly);
  const distance = p / (1 + e * cos);
  const speed = Math.sqrt(gm / p);
  const mix = (a: number, b: number): Vec3 => [
    a * toPeriapsis[0] + b * across[0],
    a * toPeriapsis[1] + b * across[1],
    a * toPeriapsis[2] + b * across[2],
  ];
  return { r: mix(distance * cos, distance * sin), v: mix(-speed * sin, speed * (e + cos)) };
}

/** Unit vectors of the orbit's plane: towards periapsis, and a quarter turn ahead. */
export function planeAxes(
  place: Pick<ConicPlace, 'inclinationRad' | 'nodeRad' | 'argumentOfPeriapsisRad'>,
): { p: Vec3; q: Vec3 } {
  const ci = Math.cos(place.inclinationRad);
  const si = Math.sin(place.inclinationRad);
  const cn = Math.cos(place.nodeRad);
  const sn = Math.sin(place.nodeRad);
  const cw = Math.cos(place.argumentOfPeriapsisRad);
  const sw = Math.sin(place.argumentOfPeriapsisRad);
  return {
    p: [cn * cw - sn * sw * ci, sn * cw + cn * sw * ci, sw * si],
    q: [-cn * sw - sn * cw * ci, -sn * sw + cn * cw * ci, cw * si],
  };
}

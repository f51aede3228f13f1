import { add, cross, dot, norm, scale, subtract, unit, type Vec3 } from '../math/vector';
import { sinhMinusX } from './kepler';

/** The two-body hyperbola of an encounter, about the body. */
export interface Hyperbola {
  /** Negative. */
  semiMajorAxisKm: number;
  eccentricity: number;
  periapsisKm: number;
  impactParameterKm: number;
  excessSpeedKmS: number;
  turnAngleRad: number;
  /** True anomaly of the outgoing asymptote; the incoming one has its negative. */
  asymptoteTrueAnomalyRad: number;
  periapsisSpeedKmS: number;
  /** Seconds until periapsis; negative after it. */
  timeToPeriapsisS: number;
  /** Unit vectors in the axes of the state: direction of motion before the encounter, periapsis, pole. */
  incomingAsymptote: Vec3;
  periapsisDirection: Vec3;
  normal: Vec3;
}

/**
 * Hyperbola of a state about a body, or null when the state is bound.
 *
 * @param r  position relative to the body, km (3)
 * @param v  velocity relative to the body, km/s, the same axes (3)
 * @param gm gravitational parameter of the body, km^3/s^2
 * @returns  the hyperbola; a straight fall (|r × v| = 0) has periapsis 0 and no normal: null as well
 * Accuracy: e − 1 = q v∞²/gm is formed without the cancellation of e² − 1 for slow encounters.
 * Source: Bate, Mueller & White, Fundamentals of Astrodynamics (1971), 1.9; Vallado (2013), 2.4.
 */
export function hyperbolaFromState(r: Vec3, v: Vec3, gm: number): Hyperbola | null {
  const distance = norm(r);
  const energy2 = dot(v, v) - (2 * gm) / distance;
  const h = cross(r, v);
  const momentum = norm(h);
  if (!(energy2 > 0) || !(momentum > 0)) return null;
  const excess = Math.sqrt(energy2);
  const b = momentum / excess;
  const a = gm / energy2;
  // q = sqrt(a² + b²) − a, as b²/(sqrt(a² + b²) + a): no cancellation for a deep or slow pass.
  const c = Math.hypot(a, b);
  const q = (b * b) / (c + a);
  const e = c / a;
  const normal = scale(h, 1 / momentum);
  // Towards periapsis: the eccentricity vector.
  const toPeriapsis = unit(subtract(scale(cross(v, h), 1 / gm), scale(r, 1 / distance)));
  const ahead = cross(normal, toPeriapsis);
  // Motion on the incoming asymptote: cos = 1/e towards periapsis, sin = sqrt(1 − 1/e²) = b/c ahead.
  const incomingAsymptote = unit(add(scale(toPeriapsis, a / c), scale(ahead, b / c)));
  return {
    semiMajorAxisKm: -a,
    eccentricity: e,
    periapsisKm: q,
    impactParameterKm: b,
    excessSpeedKmS: excess,
    turnAngleRad: 2 * Math.atan2(a, b),
    asymptoteTrueAnomalyRad: Math.PI / 2 + Math.atan2(a, b),
    periapsisSpeedKmS: momentum / q,
    timeToPeriapsisS: -timeFromPeriapsis(dot(r, v), a, e, q, gm),
    incomingAsymptote,
    periapsisDirection: toPeriapsis,
    normal,
  };
}

/** Seconds since periapsis from r·v = e sinh H sqrt(gm a); e − 1 is q/a. */
function timeFromPeriapsis(radial: number, a: number, e: number, q: number, gm: number): number {
  const x = Math.asinh(radial / (Math.sqrt(gm * a) * e));
  return Math.sqrt((a * a * a) / gm) * ((q / a) * x + e * sinhMinusX(x));
}

/**
 * Speed at a distance from the body, km/s (vis-viva).
 *
 * @param hyperbola the encounter
 * @param radiusKm  distance from the body's centre, km
 * @param gm        gravitational parameter of the body, km^3/s^2
 */
export function speedAtRadius(hyperbola: Hyperbola, radiusKm: number, gm: number): number {
  return Math.sqrt(hyperbola.excessSpeedKmS ** 2 + (2 * gm) / radiusKm);
}

/**
 * Flight-path angle at a distance on the way in, radians, negative.
 *
 * @param hyperbola the encounter
 * @param radiusKm  distance from the body's centre, km
 * @returns         null when the periapsis is farther out
 * Accuracy: rounding, at periapsis too: v_r² r² = v∞² (r − q)(r + q + 2a), no arccosine near 1.
 */
export function flightPathAngleAtRadius(hyperbola: Hyperbola, radiusKm: number): number | null {
  const { periapsisKm: q, semiMajorAxisKm: a, impactParameterKm: b } = hyperbola;
  if (radiusKm < q) return null;
  return -Math.atan2(Math.sqrt((radiusKm - q) * (radiusKm + q - 2 * a)), b);
}

/**
 * Seconds from one distance on the way in to a smaller one, by the hyperbolic Kepler equation.
 *
 * @param hyperbola    the encounter
 * @param fromRadiusKm distance at the start, km
 * @param toRadiusKm   distance at the end, km
 * @param gm           gravitational parameter of the body, km^3/s^2
 * @returns            null when the periapsis is farther out than one of the two
 */
export function travelTime(
  hyperbola: Hyperbola,
  fromRadiusKm: number,
  toRadiusKm: number,
  gm: number,
): number | null {
  const from = timeToPeriapsisFrom(hyperbola, fromRadiusKm, gm);
  const to = timeToPeriapsisFrom(hyperbola, toRadiusKm, gm);
  return from === null || to === null ? null : from - to;
}

/**
 * Seconds from a distance on the way in to periapsis.
 *
 * @param hyperbola the encounter
 * @param radiusKm  distance at the start, km
 * @param gm        gravitational parameter of the body, km^3/s^2
 * @returns         null when the periapsis is farther out
 */
export function timeToPeriapsisFrom(
  hyperbola: Hyperbola,
  radiusKm: number,
  gm: number,
): number | null {
  if (radiusKm < hyperbola.periapsisKm) return null;
  const a = -hyperbola.semiMajorAxisKm;
  const e = hyperbola.eccentricity;
  // cosh H = (1 + r/a)/e; cosh H − 1 = (r − q)/(a e), and H from it without cancellation.
  const half = Math.asinh(Math.sqrt((radiusKm - hyperbola.periapsisKm) / (2 * a * e)));
  const x = 2 * half;
  return Math.sqrt((a * a * a) / gm) * ((hyperbola.periapsisKm / a) * x + e * sinhMinusX(x));
}

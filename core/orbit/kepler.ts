/**
 * Kepler's equation for all conics.
 *
 * Both equations are written so that nothing cancels near the parabola and the periapsis:
 * (1 − e)E + e(E − sin E) = M and (e − 1)H + e(sinh H − H) = M, with series for the brackets.
 *
 * Largest errors against 60-digit arithmetic, |M| from 1e-12 to 1e4 (tests/checks/orbit-exact):
 *
 *     e                    anomaly, roundings   true anomaly, roundings   true anomaly, rad
 *     0 to 0.9                   1.0                    2.0                  2.8e-13
 *     0.97 to 0.999              1.3                    1.4                  4.4e-14
 *     1 − 1e-5 to 1 − 1e-16      1.3                    1.4                  4.4e-16
 *     1                           –                     1.6                  4.4e-16
 *     1 + 2e-16 to 1 + 1e-5      1.3                    1.4                  2.2e-16
 *     1.001 to 1.1               1.4                    1.5                  2.2e-16
 *     1.5 to 10                  1.6                    2.1                  4.4e-16
 *
 * A rounding is half a unit in the last place of the answer and of M together; the third column is
 * the reduction of M by up to 1600 turns.
 */

/** Newton steps before an iteration gives up; it takes 5 at most over the table's domain. */
const MOST_STEPS = 60;

/** Newton's method squares the relative error: after a step this small the next is below rounding. */
const LAST_STEP = 1e-9;

/** x − sin x without cancellation. */
function xMinusSin(x: number): number {
  if (Math.abs(x) > 1) return x - Math.sin(x);
  return oddSeries(x, -x * x);
}

/** sinh x − x without cancellation. */
export function sinhMinusX(x: number): number {
  if (Math.abs(x) > 1) return Math.sinh(x) - x;
  return oddSeries(x, x * x);
}

/** x³/3! (1 + z/(4·5) + z²/(4·5·6·7) + …) for |z| ≤ 1. */
function oddSeries(x: number, z: number): number {
  let term = (x * x * x) / 6;
  let sum = term;
  for (let k = 4; k < 24; k += 2) {
    term *= z / (k * (k + 1));
    sum += term;
  }
  return sum;
}

/** Angle reduced to [−π, π]. */
function wrapped(angle: number): number {
  return angle - 2 * Math.PI * Math.round(angle / (2 * Math.PI));
}

/**
 * Eccentric anomaly of an ellipse.
 *
 * @param meanAnomaly  radians, any
 * @param eccentricity 0 ≤ e < 1
 * @returns            eccentric anomaly, radians, in [−π, π] for the reduced mean anomaly
 * @throws             RangeError outside the domain
 * Accuracy: the table above.
 * Source: Kepler's equation; Newton's method kept in a bracket (Press et al. 2007, 9.4).
 */
export function eccentricAnomaly(meanAnomaly: number, eccentricity: number): number {
  const e = eccentricity;
  if (!(e >= 0 && e < 1) || !Number.isFinite(meanAnomaly)) {
    throw new RangeError(`eccentricAnomaly: e = ${e}, M = ${meanAnomaly}; expected 0 ≤ e < 1`);
  }
  const m = Math.abs(wrapped(meanAnomaly));
  const sign = wrapped(meanAnomaly) < 0 ? -1 : 1;
  let low = m;
  let high = Math.min(Math.PI, m + e);
  // The cubic for small anomalies bounds the root from above as well.
  let x = Math.min(high, cubicStart(1 - e, e / 6, m) * 1.1);
  if (x < low) x = low;
  for (let i = 0; i < MOST_STEPS; i++) {
    const f = (1 - e) * x + e * xMinusSin(x) - m;
    if (f === 0) break;
    if (f > 0) high = x;
    else low = x;
    const slope = 1 - e + 2 * e * Math.sin(0.5 * x) ** 2;
    const change = f / slope;
    const next = x - change;
    const last = Math.abs(change) <= LAST_STEP * Math.abs(x);
    x = last || (next > low && next < high) ? next : 0.5 * (low + high);
    if (last) break;
  }
  return sign * x;
}

/**
 * Hyperbolic anomaly.
 *
 * @param meanAnomaly  radians, any sign
 * @param eccentricity e > 1
 * @returns            hyperbolic anomaly H of e sinh H − H = M
 * @throws             RangeError outside the domain
 * Accuracy: the table above.
 */
export function hyperbolicAnomaly(meanAnomaly: number, eccentricity: number): number {
  if (!(eccentricity > 1) || !Number.isFinite(meanAnomaly)) {
    throw new RangeError(
      `hyperbolicAnomaly: e = ${eccentricity}, M = ${meanAnomaly}; expected e > 1`,
    );
  }
  return solveHyperbola(meanAnomaly, eccentricity, eccentricity - 1);
}

/**
 * Root H of (e − 1)H + e(sinh H − H) = M, for a caller that knows e − 1 better than e holds it.
 *
 * @param meanAnomaly radians, finite
 * @param e           eccentricity, 1 or more
 * @param above       e − 1; 0 for a straight line
 * Source: Newton's method from an upper bound of the root, where the equation is convex. Both
 * bounds follow from sinh H − H ≥ H³/6.
 */
export function solveHyperbola(meanAnomaly: number, e: number, above: number): number {
  const m = Math.abs(meanAnomaly);
  const cubic = cubicStart(above, e / 6, m);
  let x = Math.min(cubic, Math.asinh((m + cubic) / e));
  for (let i = 0; i < MOST_STEPS; i++) {
    const f = above * x + e * sinhMinusX(x) - m;
    const slope = above + 2 * e * Math.sinh(0.5 * x) ** 2;
    if (f === 0 || slope === 0) break;
    const next = x - f / slope;
    const change = Math.abs(next - x);
    x = next;
    if (change <= LAST_STEP * Math.abs(x)) break;
  }
  return meanAnomaly < 0 ? -x : x;
}

/** The positive root of a x + b x³ = m, without cancellation. */
function cubicStart(a: number, b: number, m: number): number {
  if (m === 0) return 0;
  if (!(b > 1e-100 * a)) return m / a;
  const p = a / (3 * b);
  const q = m / (2 * b);
  const w = Math.cbrt(q + Math.sqrt(q * q + p * p * p));
  if (!(w > 1e-100)) return a > 0 ? m / a : Math.cbrt(m / b);
  // w − p/w cancels for small m: use the identity x = 2q / (w² + p + p²/w²).
  return (2 * q) / (w * w + p + (p * p) / (w * w));
}

/**
 * True anomaly from the mean anomaly of any conic.
 *
 * @param meanAnomaly  radians; for e = 1 Barker's D + D³/3, D = tan(ν/2)
 * @param eccentricity e ≥ 0
 * @returns            true anomaly, radians, (−π, π]
 * @throws             RangeError outside the domain
 */
export function trueAnomalyFromMean(meanAnomaly: number, eccentricity: number): number {
  const e = eccentricity;
  if (e === 1) {
    const d = cubicStart(1, 1 / 3, Math.abs(meanAnomaly));
    return 2 * Math.atan(meanAnomaly < 0 ? -d : d);
  }
  if (e < 1) {
    const half = 0.5 * eccentricAnomaly(meanAnomaly, e);
    return 2 * Math.atan2(Math.sqrt(1 + e) * Math.sin(half), Math.sqrt(1 - e) * Math.cos(half));
  }
  const half = 0.5 * hyperbolicAnomaly(meanAnomaly, e);
  return 2 * Math.atan(Math.sqrt((e + 1) / (e - 1)) * Math.tanh(half));
}

/**
 * Mean anomaly from the true anomaly of any conic: the inverse of `trueAnomalyFromMean`.
 *
 * @returns radians; elliptic (−π, π]
 * @throws  RangeError for an anomaly beyond a hyperbola's asymptote
 */
export function meanFromTrueAnomaly(trueAnomaly: number, eccentricity: number): number {
  const e = eccentricity;
  const d = Math.tan(0.5 * trueAnomaly);
  if (e === 1) return d + (d * d * d) / 3;
  if (e < 1) {
    const half = 0.5 * wrapped(trueAnomaly);
    const x = 2 * Math.atan2(Math.sqrt(1 - e) * Math.sin(half), Math.sqrt(1 + e) * Math.cos(half));
    return (1 - e) * x + e * xMinusSin(x);
  }
  const t = Math.sqrt((e - 1) / (e + 1)) * d;
  if (!(Math.abs(t) < 1)) {
    throw new RangeError(
      `meanFromTrueAnomaly: a true anomaly of ${trueAnomaly} rad lies beyond the asymptote for e = ${e}`,
    );
  }
  const x = 2 * Math.atanh(t);
  return (e - 1) * x + e * sinhMinusX(x);
}

/** Mean motion of a conic with periapsis distance q, rad/s (for e = 1 of Barker's variable). */
export function meanMotion(periapsisKm: number, eccentricity: number, gm: number): number {
  if (eccentricity === 1) return Math.sqrt(gm / (2 * periapsisKm ** 3));
  return Math.sqrt(gm * (Math.abs(1 - eccentricity) / periapsisKm) ** 3);
}

/**
 * True anomaly a given time after periapsis.
 *
 * @param dtS          seconds since periapsis, any sign
 * @param periapsisKm  periapsis distance, km
 * @param eccentricity e ≥ 0
 * @param gm           gravitational parameter, km^3/s^2
 * @returns            true anomaly, radians, (−π, π]
 */
export function trueAnomalyFromTimeSincePeriapsis(
  dtS: number,
  periapsisKm: number,
  eccentricity: number,
  gm: number,
): number {
  return trueAnomalyFromMean(meanMotion(periapsisKm, eccentricity, gm) * dtS, eccentricity);
}

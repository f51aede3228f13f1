import { dot, norm, type Vec3 } from '../math/vector';

/** The universal Kepler equation found no root: the state is not finite or lies on the centre. */
export class KeplerFailure extends Error {
  readonly code = 'kepler-failure';
  override name = 'KeplerFailure';
}

const MOST_STEPS = 100;
/** Stumpff functions of the last call of `stumpff`: c1, c2, c3. */
const c = new Float64Array(4);

/** Stumpff functions c0 to c3 of x (Danby 1988, 6.9): series near zero, closed forms elsewhere. */
function stumpff(x: number): void {
  if (Math.abs(x) < 0.5) {
    let c3 = 0;
    let c2 = 0;
    for (let k = 9; k >= 1; k--) {
      c2 = (1 - x * c2) / ((2 * k - 1) * (2 * k));
      c3 = (1 - x * c3) / (2 * k * (2 * k + 1));
    }
    c[2] = c2;
    c[3] = c3;
    c[1] = 1 - x * c3;
    c[0] = 1 - x * c2;
    return;
  }
  if (x > 0) {
    const s = Math.sqrt(x);
    c[0] = Math.cos(s);
    c[1] = Math.sin(s) / s;
    c[2] = (2 * Math.sin(0.5 * s) ** 2) / x;
  } else {
    const s = Math.sqrt(-x);
    c[0] = Math.cosh(s);
    c[1] = Math.sinh(s) / s;
    c[2] = (2 * Math.sinh(0.5 * s) ** 2) / -x;
  }
  c[3] = (1 - c[1]) / x;
}

/**
 * Two-body motion: the state a given time later or earlier, for every conic.
 *
 * @param r   position, km, any inertial axes (3)
 * @param v   velocity, km/s, the same axes (3)
 * @param gm  gravitational parameter of the centre, km^3/s^2
 * @param dtS seconds, any sign; whole periods of a closed orbit are taken off first
 * @returns   position km and velocity km/s at that time
 * @throws    KeplerFailure for a state that is not finite or lies on the centre
 * Accuracy: round trip within 1e-12 relative for 0 ≤ e ≤ 10 (property test).
 * Source: universal variables with Stumpff functions, Danby, Fundamentals of Celestial Mechanics
 * (1988), 6.9; Newton's method kept in a bracket (the equation rises everywhere: its slope is r).
 */
export function propagateTwoBody(r: Vec3, v: Vec3, gm: number, dtS: number): { r: Vec3; v: Vec3 } {
  const distance = norm(r);
  const alpha = (2 * gm) / distance - dot(v, v);
  if (!(distance > 0) || !Number.isFinite(alpha) || !Number.isFinite(dtS)) {
    throw new KeplerFailure('Two-body motion needs a finite state away from the centre.');
  }
  const eta = dot(r, v);
  let dt = dtS;
  if (alpha > 0) {
    const period = (2 * Math.PI * gm) / alpha ** 1.5;
    dt -= period * Math.round(dt / period);
  }
  // Below this nothing moves, and the products of the search would underflow.
  if (Math.abs(dt) < 1e-100) return { r, v };
  const time = (s: number): number => {
    stumpff(alpha * s * s);
    return s * (distance * c[1] + s * (eta * c[2] + gm * s * c[3]));
  };
  const s = solve(
    time,
    (at) => {
      stumpff(alpha * at * at);
      return distance * c[0] + at * (eta * c[1] + gm * at * c[2]);
    },
    dt,
    distance,
    alpha,
  );
  stumpff(alpha * s * s);
  const g2 = s * s * c[2];
  const g1 = s * c[1];
  const radius = distance * c[0] + eta * g1 + gm * g2;
  const f = 1 - (gm / distance) * g2;
  const g = distance * g1 + eta * g2;
  const fRate = (-gm * g1) / (radius * distance);
  const gRate = 1 - (gm / radius) * g2;
  return {
    r: [f * r[0] + g * v[0], f * r[1] + g * v[1], f * r[2] + g * v[2]],
    v: [fRate * r[0] + gRate * v[0], fRate * r[1] + gRate * v[1], fRate * r[2] + gRate * v[2]],
  };
}

/** Root s of time(s) = dt. */
function solve(
  time: (s: number) => number,
  slope: (s: number) => number,
  dt: number,
  distance: number,
  alpha: number,
): number {
  const forward = dt > 0 ? 1 : -1;
  // Bracket: s grows at the rate 1/r; doubled until the time is passed.
  let near = 0;
  let far = dt / distance;
  const longest = alpha > 0 ? Math.PI / Math.sqrt(alpha) : Number.POSITIVE_INFINITY;
  for (let i = 0; (time(far) - dt) * forward < 0; i++) {
    if (i === 200) throw new KeplerFailure('Two-body motion: the time could not be bracketed.');
    near = far;
    far *= 2;
    if (Math.abs(far) > 4 * longest) far = 4 * longest * forward;
  }
  let s = 0.5 * (near + far);
  for (let i = 0; i < MOST_STEPS; i++) {
    const miss = time(s) - dt;
    if (miss === 0) break;
    if (miss * forward > 0) far = s;
    else near = s;
    let next = s - miss / slope(s);
    if (!((next - near) * forward > 0 && (far - next) * forward > 0)) next = 0.5 * (near + far);
    const change = Math.abs(next - s);
    s = next;
    if (change <= 2e-16 * Math.abs(s)) break;
  }
  return s;
}

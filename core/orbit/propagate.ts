/**
 * Two-body motion: the state at another time.
 *
 * Closed orbits and the parabola go by universal variables from the given state. There every term
 * of the universal equation stays of the size of the time. On a hyperbola the terms grow with cosh
 * and cancel, so the equation is counted from periapsis, where all terms have one sign.
 *
 * Largest errors of the place against 60-digit arithmetic, mean anomalies from −1e4 to 1e4
 * (tests/checks/orbit-exact), in units of what half a unit in the last place of the given state and
 * time moves, and relative where that is below 1e-13:
 *
 *     e                     in those units     relative
 *     0 to 0.7                   0.6           1.1e-15
 *     0.97 to 0.999              0.8           5.5e-15
 *     1 − 1e-6, 1 − 1e-10        1.6           8.4e-15
 *     1 within rounding          1.4           3.3e-14
 *     1 + 1e-10, 1 + 1e-6        0.9           1.3e-15
 *     1.001 to 1.1               1.7           4.6e-15
 *     1.5 to 10                  1.1           3.4e-14
 */
import { add, cross, dot, norm, scale, subtract, unit, type Vec3 } from '../math/vector';
import { sinhMinusX, solveHyperbola } from './kepler';

/** Two-body motion has no answer: the state is not finite, lies on the centre or ends there. */
export class KeplerFailure extends Error {
  readonly code = 'kepler-failure';
  override name = 'KeplerFailure';
}

interface State {
  r: Vec3;
  v: Vec3;
}

/** Newton steps before the solver gives up; it takes 21 at most, very near a parabola. */
const MOST_STEPS = 100;

/** Newton's method squares the relative error: after a step this small the next is below rounding. */
const LAST_STEP = 1e-9;

/**
 * Two-body motion: the state a given time later or earlier, for every conic.
 *
 * @param r   position, km, any inertial axes (3)
 * @param v   velocity, km/s, the same axes (3)
 * @param gm  gravitational parameter of the centre, km^3/s^2
 * @param dtS seconds, any sign; whole periods of a closed orbit are taken off first
 * @returns   position km and velocity km/s at that time
 *            (a straight fall comes back the way it fell, as ever deeper passes do)
 * @throws    KeplerFailure for a state that is not finite, lies on the centre or ends there
 * Accuracy: the table above.
 * Source: universal variables with Stumpff functions, Danby, Fundamentals of Celestial Mechanics
 * (1988), 6.9, and Vallado (2013), algorithm 8; Newton's method kept in a bracket (the equation
 * rises everywhere: its slope is the distance).
 */
export function propagateTwoBody(r: Vec3, v: Vec3, gm: number, dtS: number): State {
  const distance = norm(r);
  /** gm/a: twice the binding energy. */
  const alpha = (2 * gm) / distance - dot(v, v);
  if (!(distance > 0) || !Number.isFinite(alpha) || !Number.isFinite(dtS)) {
    throw new KeplerFailure('Two-body motion needs a finite state away from the centre.');
  }
  const moved = alpha < 0 ? onHyperbola(r, v, gm, alpha, dtS) : onClosedOrbit(r, v, gm, alpha, dtS);
  if (!Number.isFinite(dot(moved.r, moved.r) + dot(moved.v, moved.v))) {
    throw new KeplerFailure('Two-body motion ends on the centre.');
  }
  return moved;
}

function onHyperbola(r: Vec3, v: Vec3, gm: number, alpha: number, dtS: number): State {
  const distance = norm(r);
  const h = cross(r, v);
  const rate = Math.sqrt(-alpha);
  const a = gm / -alpha;
  const b = norm(h) / rate;
  const c = Math.hypot(a, b);
  const e = c / a;
  // q/a = e − 1 without the cancellation, as in hyperbola.ts.
  const above = (b * b) / (c + a) / a;
  const before = Math.asinh((dot(r, v) * rate) / (gm * e));
  const mean = above * before + e * sinhMinusX(before);
  const after = solveHyperbola(mean + (rate / a) * dtS, e, above);
  const g0 = 2 * Math.sinh(0.5 * after) ** 2;
  const radius = a * (above + e * g0);
  const anomaly = after - before;
  if (before * after >= 0 || Math.abs(anomaly) < 1) {
    const g1 = Math.sinh(anomaly) / rate;
    const g2 = 2 * (Math.sinh(0.5 * anomaly) / rate) ** 2;
    return combine(r, v, gm, radius, g1, g2, dtS - (gm * sinhMinusX(anomaly)) / rate ** 3);
  }
  // Through periapsis f and g cancel as well: go by the orbit's own axes.
  const p = unit(subtract(scale(cross(v, h), 1 / gm), scale(r, 1 / distance)));
  // A straight fall has no second axis, and b = 0 is its share.
  const q = b > 0 ? unit(cross(h, p)) : p;
  const sinh = Math.sinh(after);
  const turned = rate / radius;
  const at = (x: number, y: number): Vec3 => add(scale(p, x), scale(q, y));
  return {
    r: at(a * (above - g0), b * sinh),
    v: at(-turned * a * sinh, turned * b * Math.cosh(after)),
  };
}

function onClosedOrbit(r: Vec3, v: Vec3, gm: number, alpha: number, dtS: number): State {
  const distance = norm(r);
  const radial = dot(r, v);
  let dt = dtS;
  const period = (2 * Math.PI * gm) / alpha ** 1.5;
  const turns = Math.round(dt / period);
  if (turns !== 0) dt -= turns * period;
  // Below this nothing moves, and the products of the search would underflow.
  if (Math.abs(dt) < 1e-100) return { r, v };
  const forward = dt > 0 ? 1 : -1;
  // s grows at the rate 1/r; a whole turn is 2π/√α, and dt is at most half a period.
  const turn = (2 * Math.PI) / Math.sqrt(alpha);
  let near = 0;
  let far = forward * Math.min(Math.abs(dt) / distance, turn);
  for (let i = 0; ; i++) {
    stumpff(alpha * far * far);
    const passed = far * (distance * c[1] + far * (radial * c[2] + gm * far * c[3]));
    if ((passed - dt) * forward >= 0) break;
    if (i === 200) throw new KeplerFailure('Two-body motion: the time could not be bracketed.');
    near = far;
    far = forward * Math.min(2 * Math.abs(far), turn * (1 + 1e-9));
  }
  let s = 0.5 * (near + far);
  for (let i = 0; i < MOST_STEPS; i++) {
    stumpff(alpha * s * s);
    const miss = s * (distance * c[1] + s * (radial * c[2] + gm * s * c[3])) - dt;
    if (miss === 0) break;
    if (miss * forward > 0) far = s;
    else near = s;
    const change = miss / (distance * c[0] + s * (radial * c[1] + gm * s * c[2]));
    const next = s - change;
    const inside = (next - near) * forward > 0 && (far - next) * forward > 0;
    const last = Math.abs(change) <= LAST_STEP * Math.abs(s);
    s = inside || last ? next : 0.5 * (near + far);
    if (last) break;
  }
  stumpff(alpha * s * s);
  const g1 = s * c[1];
  const g2 = s * s * c[2];
  const radius = distance * c[0] + radial * g1 + gm * g2;
  return combine(r, v, gm, radius, g1, g2, distance * g1 + radial * g2);
}

/** The new state in terms of the old one (Lagrange's coefficients f and g). */
function combine(
  r: Vec3,
  v: Vec3,
  gm: number,
  radius: number,
  g1: number,
  g2: number,
  g: number,
): State {
  const distance = norm(r);
  const f = 1 - (gm / distance) * g2;
  const fRate = (-gm * g1) / (radius * distance);
  const gRate = 1 - (gm / radius) * g2;
  return {
    r: [f * r[0] + g * v[0], f * r[1] + g * v[1], f * r[2] + g * v[2]],
    v: [fRate * r[0] + gRate * v[0], fRate * r[1] + gRate * v[1], fRate * r[2] + gRate * v[2]],
  };
}

/** Stumpff functions of the last call of `stumpff`: c0 to c3. */
const c = new Float64Array(4);

/** Stumpff functions c0 to c3 of x ≥ 0 (Danby 1988, 6.9): series near zero, closed forms beyond. */
function stumpff(x: number): void {
  if (x < 2) {
    let c3 = 0;
    let c2 = 0;
    // 2^11/24! is below 1e-20.
    for (let k = 11; k >= 1; k--) {
      c2 = (1 - x * c2) / ((2 * k - 1) * (2 * k));
      c3 = (1 - x * c3) / (2 * k * (2 * k + 1));
    }
    c[0] = 1 - x * c2;
    c[1] = 1 - x * c3;
    c[2] = c2;
    c[3] = c3;
    return;
  }
  const s = Math.sqrt(x);
  c[0] = Math.cos(s);
  c[1] = Math.sin(s) / s;
  c[2] = (2 * Math.sin(0.5 * s) ** 2) / x;
  c[3] = (1 - c[1]) / x;
}

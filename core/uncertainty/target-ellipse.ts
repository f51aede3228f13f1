import { carried, eigenSymmetric } from '../math/symmetric';
import { cross, dot, norm, scale, unit, type Vec3, vec3 } from '../math/vector';
import { hyperbolaFromState } from '../orbit/hyperbola';

/** First-order uncertainty of a close approach. */
export interface FirstOrder {
  sigmaDistanceKm: number;
  sigmaTimeS: number;
  sigmaSpeedKmS: number;
  /** On the target plane; null where the object is bound. */
  ellipse: {
    semiMajorKm: number;
    semiMinorKm: number;
    /** From T towards R, radians in (−π/2, π/2]. */
    angleRad: number;
    /** Covariance of B·T and B·R, km²: TT, TR, RR. */
    covariance: [number, number, number];
  } | null;
  /** 3-σ range of the distance, km; never below zero. */
  range: [number, number];
}

/** An approach with what its uncertainty needs. */
export interface ApproachState {
  /** At closest approach, or (for an impact) on a sphere that it passes on the way in. */
  kind: 'closest' | 'sphere';
  /** Relative to the body, km, km/s, ICRF. */
  r: Vec3;
  v: Vec3;
  /** Acceleration relative to the body, km/s². */
  a: Vec3;
  gm: number;
  /** Axes T and R of the target plane; null where the object is bound. */
  axes: { t: Vec3; r: Vec3 } | null;
  bDotTKm: number;
  bDotRKm: number;
  distanceKm: number;
}

/**
 * Standard deviations of an approach and its ellipse on the target plane.
 *
 * @param state      the approach
 * @param covariance of place and velocity at its instant, ICRF (6 × 6), km and km/s
 * @returns          standard deviations of distance, time and speed at the moving time of closest
 *                   approach; the ellipse of B; the range of distance from the 3-σ ellipse, where the
 *                   distance follows from |B| by the hyperbola
 * Source: Milani & Gronchi, Theory of Orbit Determination (2010), ch. 12.
 */
export function firstOrderOf(state: ApproachState, covariance: Float64Array): FirstOrder {
  const { r, v, a } = state;
  const out = unit(r);
  const ahead = unit(v);
  const b = targetPlaneJacobian(state);
  const jacobian = new Float64Array(18);
  if (state.kind === 'closest') {
    // r·v = 0 moves with its own time: δt = −(v·δr + r·δv) / (v² + r·a).
    const rate = -1 / (dot(v, v) + dot(r, a));
    jacobian.set([...out, 0, 0, 0]);
    jacobian.set([...scale(v, rate), ...scale(r, rate)], 6);
  } else {
    // |r| = R moves with its own time: δt = −(r·δr) / (r·v); the distance is the osculating periapsis.
    jacobian.set(periapsisGradient(state));
    jacobian.set([...scale(out, -1 / dot(out, v)), 0, 0, 0], 6);
  }
  const along = dot(ahead, a);
  for (let k = 0; k < 6; k++)
    jacobian[12 + k] = (k < 3 ? 0 : ahead[k - 3]) + along * jacobian[6 + k];
  const own = carried(jacobian, covariance, 6);
  const sigma = (i: number): number => Math.sqrt(Math.max(0, own[i * 4]));
  const ellipse = state.axes === null ? null : ellipseOf(carried(b, covariance, 6));
  return {
    sigmaDistanceKm: sigma(0),
    sigmaTimeS: sigma(1),
    sigmaSpeedKmS: sigma(2),
    ellipse,
    range:
      ellipse === null || state.distanceKm > HYPERBOLIC_KM
        ? [Math.max(0, state.distanceKm - 3 * sigma(0)), state.distanceKm + 3 * sigma(0)]
        : rangeOf(state, ellipse.covariance),
  };
}

/** Farther out the Sun bends the path as much as the body: the straight range is the better one, km. */
const HYPERBOLIC_KM = 1e6;

const excessSpeed2 = (state: ApproachState): number =>
  dot(state.v, state.v) - (2 * state.gm) / norm(state.r);

function ellipseOf(p: Float64Array): FirstOrder['ellipse'] {
  const { values, vectors } = eigenSymmetric(p, 2);
  const angle = Math.atan2(vectors[1], vectors[0]);
  const half = Math.PI / 2;
  return {
    semiMajorKm: Math.sqrt(Math.max(0, values[0])),
    semiMinorKm: Math.sqrt(Math.max(0, values[1])),
    angleRad: angle > half ? angle - Math.PI : angle <= -half ? angle + Math.PI : angle,
    covariance: [p[0], p[1], p[3]],
  };
}

/**
 * Derivatives of B·T and B·R by the state (2 × 6), the axes held.
 *
 * Central differences of the closed-form hyperbola: smooth, so steps of 1e-5 of the state's own size
 * leave 1e-9 relative.
 */
function targetPlaneJacobian(state: ApproachState): Float64Array {
  const { r, v, gm, axes } = state;
  const jacobian = new Float64Array(12);
  if (axes === null) return jacobian;
  const b = (x: number[]): [number, number] => {
    const place = vec3(x);
    const motion = vec3(x, 3);
    const h = hyperbolaFromState(place, motion, gm);
    if (h === null) return [Number.NaN, Number.NaN];
    const vector = scale(cross(h.incomingAsymptote, cross(place, motion)), 1 / h.excessSpeedKmS);
    return [dot(vector, axes.t), dot(vector, axes.r)];
  };
  const x = [...r, ...v];
  for (let k = 0; k < 6; k++) {
    const step = 1e-5 * (k < 3 ? norm(r) : norm(v));
    const up = b(x.map((value, i) => (i === k ? value + step : value)));
    const down = b(x.map((value, i) => (i === k ? value - step : value)));
    jacobian[k] = (up[0] - down[0]) / (2 * step);
    jacobian[6 + k] = (up[1] - down[1]) / (2 * step);
  }
  return jacobian;
}

/**
 * Derivatives of the periapsis distance q = h² / (GM (1 + e)) by the state (6), bound or not.
 *
 * Central differences, steps as for the target plane.
 */
function periapsisGradient({ r, v, gm }: ApproachState): number[] {
  const size = (x: readonly number[]): number => {
    const [place, motion] = [vec3(x), vec3(x, 3)];
    const h = norm(cross(place, motion));
    const energy = dot(motion, motion) / 2 - gm / norm(place);
    const eccentricity = Math.sqrt(Math.max(0, 1 + (2 * energy * h * h) / (gm * gm)));
    return (h * h) / (gm * (1 + eccentricity));
  };
  const x = [...r, ...v];
  return x.map((_, k) => {
    const step = 1e-5 * (k < 3 ? norm(r) : norm(v));
    const moved = (by: number): number[] => x.map((value, i) => (i === k ? value + by : value));
    return (size(moved(step)) - size(moved(-step))) / (2 * step);
  });
}

/** Least and largest distance on the 3-σ ellipse of B, the distance following from |B|. */
function rangeOf(state: ApproachState, [tt, tr, rr]: [number, number, number]): [number, number] {
  const { values, vectors } = eigenSymmetric(Float64Array.of(tt, tr, tr, rr), 2);
  const axis = (i: number): [number, number] => {
    const size = 3 * Math.sqrt(Math.max(0, values[i]));
    return [size * vectors[i * 2], size * vectors[i * 2 + 1]];
  };
  const [major, minor] = [axis(0), axis(1)];
  const b = [state.bDotTKm, state.bDotRKm];
  let least = Number.POSITIVE_INFINITY;
  let most = 0;
  for (let k = 0; k < 3600; k++) {
    const angle = (2 * Math.PI * k) / 3600;
    const [c, s] = [Math.cos(angle), Math.sin(angle)];
    const size = Math.hypot(b[0] + c * major[0] + s * minor[0], b[1] + c * major[1] + s * minor[1]);
    least = Math.min(least, size);
    most = Math.max(most, size);
  }
  // Inside the ellipse the centre itself is within reach.
  const centred = [0, 1].map((i) => {
    const size = 3 * Math.sqrt(Math.max(0, values[i]));
    return size === 0
      ? Number.POSITIVE_INFINITY
      : (b[0] * vectors[i * 2] + b[1] * vectors[i * 2 + 1]) / size;
  });
  const inside = Math.hypot(centred[0], centred[1]) < 1;
  const a = state.gm / excessSpeed2(state);
  const periapsis = (size: number): number => (size * size) / (Math.hypot(a, size) + a);
  return [inside ? 0 : periapsis(least), periapsis(most)];
}

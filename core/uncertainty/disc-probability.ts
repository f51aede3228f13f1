import { normalBetween } from '../math/erfc';
import { eigenSymmetric } from '../math/symmetric';

/** Nodes and weights of the eight-point Gauss–Legendre rule on [−1, 1] (Abramowitz & Stegun 25.4.30). */
const NODES = [0.1834346424956498, 0.525532409916329, 0.7966664774136267, 0.9602898564975363];
const WEIGHTS = [0.362683783378362, 0.3137066458778873, 0.2223810344533745, 0.1012285362903763];
/** Panels between two breakpoints. */
const PANELS = 24;
/** Beyond so many standard deviations a Gaussian counts as nothing: 1e-27. */
const FAR = 11;

/**
 * Probability that a Gaussian in the plane falls into a disc about the origin.
 *
 * @param mean       centre of the Gaussian, km (2)
 * @param covariance xx, xy, yy, km²
 * @param radius     of the disc, km
 * @returns          the probability; a covariance without width counts as a point or a line
 * Accuracy: 1e-9 relative against an independent integration over offsets and axis ratios up to 1e4
 * (check). Integrated over one principal axis in closed form, over the other by Gauss–Legendre panels
 * broken where the first changes fast.
 */
export function discProbability(
  mean: readonly [number, number],
  [xx, xy, yy]: readonly [number, number, number],
  radius: number,
): number {
  const { values, vectors } = eigenSymmetric(Float64Array.of(xx, xy, xy, yy), 2);
  const tiny = radius * 1e-9;
  const major = Math.max(Math.sqrt(Math.max(0, values[0])), tiny);
  const minor = Math.max(Math.sqrt(Math.max(0, values[1])), tiny);
  const u0 = mean[0] * vectors[0] + mean[1] * vectors[1];
  const v0 = mean[0] * vectors[2] + mean[1] * vectors[3];
  const from = Math.max(-radius, u0 - FAR * major);
  const to = Math.min(radius, u0 + FAR * major);
  if (!(from < to)) return 0;
  const density = (u: number): number => {
    const half = Math.sqrt(Math.max(0, radius * radius - u * u));
    const z = (u - u0) / major;
    const across = normalBetween((-half - v0) / minor, (half - v0) / minor);
    return (Math.exp(-0.5 * z * z) / (major * Math.sqrt(2 * Math.PI))) * across;
  };
  let sum = 0;
  const marks = breakpoints(from, to, u0, v0, major, minor, radius);
  for (let i = 1; i < marks.length; i++) sum += integrate(density, marks[i - 1], marks[i], radius);
  return Math.min(1, sum);
}

/** Where the integrand changes fast: about the peak, and where the chord's end passes the Gaussian. */
function breakpoints(
  from: number,
  to: number,
  u0: number,
  v0: number,
  major: number,
  minor: number,
  radius: number,
): number[] {
  const marks = [from, to];
  for (const k of [-4, -1.5, 0, 1.5, 4]) marks.push(u0 + k * major);
  for (const k of [-8, -3, 0, 3, 8]) {
    const half = Math.abs(v0) + k * minor;
    if (half > 0 && half < radius) {
      const u = Math.sqrt(radius * radius - half * half);
      marks.push(u, -u);
    }
  }
  return [...new Set(marks.filter((mark) => mark >= from && mark <= to))].sort((a, b) => a - b);
}

/** Panels in the angle of u = R sin θ: the ends of the chord have an infinite slope in u. */
function integrate(f: (u: number) => number, from: number, to: number, radius: number): number {
  const angle = (u: number): number => Math.asin(Math.max(-1, Math.min(1, u / radius)));
  const [a, b] = [angle(from), angle(to)];
  const step = (b - a) / PANELS;
  let sum = 0;
  for (let p = 0; p < PANELS; p++) {
    const middle = a + (p + 0.5) * step;
    for (let i = 0; i < NODES.length; i++) {
      for (const sign of [-1, 1]) {
        const theta = middle + (sign * NODES[i] * step) / 2;
        sum += WEIGHTS[i] * f(radius * Math.sin(theta)) * radius * Math.cos(theta);
      }
    }
  }
  return (sum * step) / 2;
}

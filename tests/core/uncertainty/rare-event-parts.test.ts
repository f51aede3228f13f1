import { describe, expect, it } from 'vitest';
import { normalsOf } from '../../../core/math/random';
import { captureMoments } from '../../../core/uncertainty/capture-moments';
import { discProbability } from '../../../core/uncertainty/disc-probability';
import {
  distance2,
  gaussian,
  identity,
  type Mixture,
  mixtureWeight,
  movedTowards,
  pointOf,
} from '../../../core/uncertainty/gaussian-mixture';
import { plainRelativeError } from '../../../core/uncertainty/mixture-sampling';

describe('moments of a Gaussian cut to a disc', () => {
  it.each([
    [
      [0, 0],
      [5000, 3000],
    ],
    [
      [30_000, 4000],
      [8000, 9000],
    ],
    [
      [2e6, 3000],
      [8e5, 40],
    ],
    [
      [12_000, 0],
      [300, 2],
    ],
  ] as const)('give the probability of the Gaussian about %j with σ %j', (centre, sigma) => {
    const truth = discProbability(centre, [sigma[0] ** 2, 0, sigma[1] ** 2], 10_000);
    const { probability } = captureMoments(centre, sigma, 10_000);
    // Midpoint rule on 96 × 48 points: a figure to plan with.
    expect(probability / truth).toBeGreaterThan(0.97);
    expect(probability / truth).toBeLessThan(1.03);
  });

  it('are those of a uniform disc where the Gaussian is very wide', () => {
    // Uniform disc: variance R²/4 along each axis; here R is 0.01 σ.
    const { mean, covariance } = captureMoments([0, 0], [1e6, 1e6], 1e4);
    expect(Math.hypot(mean[0], mean[1])).toBeLessThan(1e-9);
    expect(covariance[0] / (1e-4 / 4)).toBeCloseTo(1, 2);
    expect(covariance[2] / (1e-4 / 4)).toBeCloseTo(1, 2);
    expect(Math.abs(covariance[1])).toBeLessThan(1e-10);
  });

  it('name the likeliest point where the disc is far out', () => {
    // The rim at 10 000 km seen from 110 000 km with σ 5000 km: 20 σ.
    const { sigmas, mean } = captureMoments([110_000, 0], [5000, 5000], 10_000);
    expect(sigmas).toBeCloseTo(20, 9);
    expect(mean[0]).toBeCloseTo(-20, 9);
    expect(mean[1]).toBeCloseTo(0, 6);
  });
});

describe('a mixture of Gaussians', () => {
  const covariance = Float64Array.of(0.5, 0.2, 0.2, 0.3);
  const one = gaussian(Float64Array.of(1.5, -0.5), covariance);

  it('draws points with the mean and covariance asked for', () => {
    const n = 20_000;
    const normals = new Float64Array(2 * n);
    normalsOf(3, 0, 0, n, 2, normals);
    let [x, y, xy] = [0, 0, 0];
    for (let i = 0; i < n; i++) {
      const z = pointOf(one, normals.subarray(2 * i, 2 * i + 2));
      x += z[0] / n;
      y += z[1] / n;
      xy += ((z[0] - 1.5) * (z[1] + 0.5)) / n;
    }
    // Standard errors 0.005, 0.004 and 0.003; four of them.
    expect(Math.abs(x - 1.5)).toBeLessThan(0.02);
    expect(Math.abs(y + 0.5)).toBeLessThan(0.016);
    expect(Math.abs(xy - 0.2)).toBeLessThan(0.012);
  });

  it('measures distance by the inverse covariance', () => {
    // (1, 0) with [[0.5, 0.2], [0.2, 0.3]]: 0.3 / (0.15 − 0.04), by hand.
    expect(distance2(one, Float64Array.of(2.5, -0.5))).toBeCloseTo(0.3 / 0.11, 10);
  });

  it('weights its points back to the standard normal distribution', () => {
    const origin = gaussian(new Float64Array(2), identity(2));
    const mixture: Mixture = { parts: [origin, one], shares: [0.25, 0.75] };
    const n = 40_000;
    const normals = new Float64Array(2 * n);
    normalsOf(5, 0, 0, n, 2, normals);
    let [total, tail] = [0, 0];
    for (let i = 0; i < n; i++) {
      const z = pointOf(mixture.parts[i % 4 === 0 ? 0 : 1], normals.subarray(2 * i, 2 * i + 2));
      const weight = mixtureWeight(mixture, z);
      // No weight above one over the plain part's share, but for rounding of its density.
      expect(weight).toBeLessThan(4 * (1 + 1e-12));
      total += weight / n;
      if (z[0] > 2) tail += weight / n;
    }
    // The whole is 1; beyond 2 σ lie 0.02275 (table of the normal distribution). Standard errors
    // below 0.008 and 0.0004 (weights from 0 to 4); four of them.
    expect(Math.abs(total - 1)).toBeLessThan(0.032);
    expect(Math.abs(tail - 0.02275)).toBeLessThan(0.0016);
  });

  it('moves wholly to many points and hardly to one', () => {
    const points = Array.from({ length: 4000 }, (_, i) =>
      Float64Array.of(3 + Math.cos(i), 1 + Math.sin(i)),
    );
    const many = movedTowards(one, points, new Array(4000).fill(1), 4);
    // Points on a unit circle about (3, 1): covariance half the identity.
    expect(many.mean[0]).toBeCloseTo(3, 1);
    expect(many.mean[1]).toBeCloseTo(1, 1);
    expect(many.covariance[0]).toBeCloseTo(0.5, 1);
    expect(many.covariance[1]).toBeCloseTo(0, 1);
    const few = movedTowards(one, [Float64Array.of(2.5, -0.5)], [1], 4);
    expect(few.mean[0]).toBeCloseTo(1.5 + 1 / 5, 10);
  });
});

describe('the relative error of a plain count', () => {
  it('is the binomial one where the count is large, and above nothing where all hit', () => {
    expect(plainRelativeError(1000, 10_000) / Math.sqrt(0.9 / 1000)).toBeCloseTo(1, 1);
    expect(plainRelativeError(500, 500)).toBeGreaterThan(0);
  });
});

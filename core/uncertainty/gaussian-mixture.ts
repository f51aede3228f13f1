import { eigenSymmetric } from '../math/symmetric';

/** Gaussians in standard normal space, alone and mixed. */

export interface Gaussian {
  mean: Float64Array;
  /** d × d. */
  covariance: Float64Array;
  /** Principal axes by rows, and σ along them. */
  axes: Float64Array;
  sigmas: Float64Array;
}

/** Covariances are kept from closing in on a point or a plane, σ. */
const LEAST_SIGMA = 1e-9;

export function gaussian(mean: Float64Array, covariance: Float64Array): Gaussian {
  const d = mean.length;
  const { values, vectors } = eigenSymmetric(covariance, d);
  const sigmas = values.map((value) => Math.max(LEAST_SIGMA, Math.sqrt(Math.max(0, value))));
  return { mean, covariance, axes: vectors, sigmas };
}

export const identity = (d: number): Float64Array =>
  Float64Array.from({ length: d * d }, (_, i) => (i % (d + 1) === 0 ? 1 : 0));

/** The point of a Gaussian that d standard normal numbers stand for. */
export function pointOf({ mean, axes, sigmas }: Gaussian, normals: Float64Array): Float64Array {
  const d = mean.length;
  const z = Float64Array.from(mean);
  for (let i = 0; i < d; i++) {
    const along = normals[i] * sigmas[i];
    for (let k = 0; k < d; k++) z[k] += along * axes[i * d + k];
  }
  return z;
}

/** Squared Mahalanobis distance of a point. */
export function distance2({ mean, axes, sigmas }: Gaussian, z: Float64Array): number {
  const d = mean.length;
  let sum = 0;
  for (let i = 0; i < d; i++) {
    let along = 0;
    for (let k = 0; k < d; k++) along += (z[k] - mean[k]) * axes[i * d + k];
    sum += (along / sigmas[i]) ** 2;
  }
  return sum;
}

/** Density of a Gaussian over that of the standard normal one. */
function densityRatio(one: Gaussian, z: Float64Array): number {
  let log = -0.5 * distance2(one, z);
  for (let k = 0; k < z.length; k++) log += 0.5 * z[k] * z[k] - Math.log(one.sigmas[k]);
  return Math.exp(log);
}

export interface Mixture {
  parts: readonly Gaussian[];
  /** Share of each part; they sum to 1. */
  shares: readonly number[];
}

/**
 * Weight of a point that was drawn from a mixture: standard normal density over the mixture's.
 *
 * Drawing fixed numbers from each part and weighting by the whole mixture is unbiased, whatever the
 * parts: the mean of hits × weights is the integral of the standard normal density over the hits.
 * Source: Veach & Guibas (1995), balance heuristic; Owen & Zhou (2000), JASA 95, 135, section 4.
 */
export function mixtureWeight({ parts, shares }: Mixture, z: Float64Array): number {
  let sum = 0;
  for (const [i, part] of parts.entries()) sum += shares[i] * densityRatio(part, z);
  return 1 / sum;
}

/**
 * A Gaussian moved towards weighted points.
 *
 * @param trust  so many points' worth is left to the Gaussian as it was
 * Source: Rubinstein (1999), Methodology and Computing in Applied Probability 1, 127 (cross-entropy).
 */
export function movedTowards(
  old: Gaussian,
  points: readonly Float64Array[],
  weights: readonly number[],
  trust: number,
): Gaussian {
  const d = old.mean.length;
  const total = weights.reduce((sum, w) => sum + w, 0);
  const squares = weights.reduce((sum, w) => sum + w * w, 0);
  if (total === 0) return old;
  const effective = (total * total) / squares;
  const share = effective / (effective + trust);
  const mean = new Float64Array(d);
  for (const [i, z] of points.entries()) {
    for (let k = 0; k < d; k++) mean[k] += (weights[i] / total) * z[k];
  }
  for (let k = 0; k < d; k++) mean[k] = share * mean[k] + (1 - share) * old.mean[k];
  const covariance = old.covariance.map((value) => value * (1 - share));
  for (const [i, z] of points.entries()) {
    const w = (share * weights[i]) / total;
    for (let j = 0; j < d; j++) {
      for (let k = 0; k < d; k++) {
        covariance[j * d + k] += w * (z[j] - mean[j]) * (z[k] - mean[k]);
      }
    }
  }
  return gaussian(mean, covariance);
}

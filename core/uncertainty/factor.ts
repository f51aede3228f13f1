import { eigenSymmetric } from '../math/symmetric';

/** Directions whose share of the scaled variance is smaller are left out: rounding of the matrix. */
const ROUNDING = 1e-14;

/**
 * L with P = L Lᵀ: standard normal numbers to deviations.
 *
 * The matrix is scaled to unit variances first, so that units do not decide what counts as rounding.
 *
 * @param covariance n × n, positive semi-definite
 * @returns          the factor (n × dimension, by rows) and its number of columns, the rank
 */
export function factorOf(
  covariance: Float64Array,
  n: number,
): { factor: Float64Array; dimension: number } {
  const sigma = Float64Array.from({ length: n }, (_, i) =>
    Math.sqrt(Math.max(0, covariance[i * n + i])),
  );
  const scaled = covariance.map((value, k) => {
    const size = sigma[Math.floor(k / n)] * sigma[k % n];
    return size > 0 ? value / size : 0;
  });
  const { values, vectors } = eigenSymmetric(scaled, n);
  const dimension = values.filter((value) => value > ROUNDING * n).length;
  const factor = new Float64Array(n * dimension);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < dimension; k++) {
      factor[i * dimension + k] = sigma[i] * vectors[k * n + i] * Math.sqrt(values[k]);
    }
  }
  return { factor, dimension };
}

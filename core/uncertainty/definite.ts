import { eigenSymmetric } from '../math/symmetric';

/** A covariance that is none: negative along some direction by more than rounding. */
export class IndefiniteCovariance extends Error {
  readonly code = 'indefinite-covariance';
  override name = 'IndefiniteCovariance';
  constructor(readonly eigenvalue: number) {
    super(
      `The covariance is not positive semi-definite: scaled to unit variances its least eigenvalue is ${eigenvalue.toPrecision(3)}. Check signs, units and the order of its entries.`,
    );
  }
}

/** Negative eigenvalues this small against one are rounding of printed digits and are repaired. */
const ROUNDING = 1e-6;

/**
 * A covariance made positive semi-definite where only rounding keeps it from being so.
 *
 * @param matrix n × n, symmetric, any units
 * @returns      the matrix (repaired or as it was), and the eigenvalue that was lifted to zero, of the
 *               matrix scaled to unit variances; null when nothing was
 * @throws       IndefiniteCovariance with that eigenvalue when it is more than rounding
 */
export function definite(
  matrix: Float64Array,
  n: number,
): { matrix: Float64Array; lifted: number | null } {
  const scale = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const variance = matrix[i * n + i];
    if (variance < 0) throw new IndefiniteCovariance(variance);
    scale[i] = variance > 0 ? Math.sqrt(variance) : 1;
  }
  const scaled = matrix.map((value, k) => value / (scale[Math.floor(k / n)] * scale[k % n]));
  const { values, vectors } = eigenSymmetric(scaled, n);
  const least = values[n - 1];
  if (least < -ROUNDING) throw new IndefiniteCovariance(least);
  if (least >= -1e-14) return { matrix, lifted: null };
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      let sum = 0;
      for (let k = 0; k < n; k++) {
        sum += Math.max(0, values[k]) * vectors[k * n + i] * vectors[k * n + j];
      }
      out[i * n + j] = sum * scale[i] * scale[j];
    }
  }
  return { matrix: out, lifted: least };
}

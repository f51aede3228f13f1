/** Small symmetric matrices, by rows in Float64Array. */

/**
 * J P Jᵀ: a covariance carried by a linear map.
 *
 * @param jacobian rows × n
 * @param p        n × n
 */
export function carried(jacobian: Float64Array, p: Float64Array, n: number): Float64Array {
  const rows = jacobian.length / n;
  const half = new Float64Array(rows * n);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < n; j++) {
      let sum = 0;
      for (let k = 0; k < n; k++) sum += jacobian[i * n + k] * p[k * n + j];
      half[i * n + j] = sum;
    }
  }
  const out = new Float64Array(rows * rows);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = 0;
      for (let k = 0; k < n; k++) sum += half[i * n + k] * jacobian[j * n + k];
      out[i * rows + j] = sum;
      out[j * rows + i] = sum;
    }
  }
  return out;
}

/**
 * Eigenvalues and eigenvectors of a symmetric matrix by cyclic Jacobi rotations.
 *
 * @param matrix n × n; left as it is
 * @returns      values in falling order; vectors by rows, in the same order
 * Source: Golub & Van Loan, Matrix Computations (1996), 8.4. At most 60 sweeps.
 */
export function eigenSymmetric(
  matrix: Float64Array,
  n: number,
): { values: Float64Array; vectors: Float64Array } {
  const a = Float64Array.from(matrix);
  const v = new Float64Array(n * n);
  for (let i = 0; i < n; i++) v[i * n + i] = 1;
  for (let sweep = 0; sweep < 60; sweep++) {
    let off = 0;
    let diagonal = 0;
    for (let i = 0; i < n; i++) {
      diagonal += a[i * n + i] ** 2;
      for (let j = 0; j < i; j++) off += a[i * n + j] ** 2;
    }
    if (off <= 1e-34 * diagonal) break;
    for (let p = 0; p < n; p++) {
      for (let q = p + 1; q < n; q++) rotatePair(a, v, n, p, q);
    }
  }
  const order = Array.from({ length: n }, (_, i) => i).sort((i, j) => a[j * n + j] - a[i * n + i]);
  const vectors = new Float64Array(n * n);
  for (const [row, column] of order.entries()) {
    for (let k = 0; k < n; k++) vectors[row * n + k] = v[k * n + column];
  }
  return { values: Float64Array.from(order, (i) => a[i * n + i]), vectors };
}

/** One rotation that clears the entry (p, q). */
function rotatePair(a: Float64Array, v: Float64Array, n: number, p: number, q: number): void {
  const apq = a[p * n + q];
  if (apq === 0) return;
  const theta = (a[q * n + q] - a[p * n + p]) / (2 * apq);
  const t = (theta >= 0 ? 1 : -1) / (Math.abs(theta) + Math.hypot(theta, 1));
  const c = 1 / Math.hypot(t, 1);
  const s = t * c;
  for (let k = 0; k < n; k++) {
    const akp = a[k * n + p];
    const akq = a[k * n + q];
    a[k * n + p] = c * akp - s * akq;
    a[k * n + q] = s * akp + c * akq;
  }
  for (let k = 0; k < n; k++) {
    const apk = a[p * n + k];
    const aqk = a[q * n + k];
    a[p * n + k] = c * apk - s * aqk;
    a[q * n + k] = s * apk + c * aqk;
    const vkp = v[k * n + p];
    const vkq = v[k * n + q];
    v[k * n + p] = c * vkp - s * vkq;
    v[k * n + q] = s * vkp + c * vkq;
  }
}

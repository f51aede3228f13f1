/**
 * Cubic Hermite interpolation of a moving point from position and velocity at both ends.
 *
 * @param a     array that holds position (3) and velocity (3) at the interval's start, from `ia`
 * @param b     the same at its end, from `ib`
 * @param h     length of the interval, s
 * @param u     place in the interval, 0 to 1
 * @param out   receives position (3) and velocity (3) from `at`
 * Accuracy: h^4/384 of the fourth derivative of the motion.
 */
export function hermiteState(
  a: Float64Array,
  ia: number,
  b: Float64Array,
  ib: number,
  h: number,
  u: number,
  out: Float64Array,
  at: number,
): void {
  const u2 = u * u;
  const w = 1 - u;
  const h00 = (1 + 2 * u) * w * w;
  const h10 = u * w * w * h;
  const h01 = u2 * (3 - 2 * u);
  const h11 = u2 * (u - 1) * h;
  const d00 = (6 * u2 - 6 * u) / h;
  const d10 = 1 - 4 * u + 3 * u2;
  const d11 = 3 * u2 - 2 * u;
  for (let k = 0; k < 3; k++) {
    const p0 = a[ia + k];
    const v0 = a[ia + 3 + k];
    const p1 = b[ib + k];
    const v1 = b[ib + 3 + k];
    out[at + k] = h00 * p0 + h10 * v0 + h01 * p1 + h11 * v1;
    out[at + 3 + k] = d00 * (p0 - p1) + d10 * v0 + d11 * v1;
  }
}

/**
 * Index of the last row whose first number is not above a value; clamped so that index + 1 is a row.
 *
 * @param rows         of `stride` numbers each, the first of them rising
 * @param first, count rows to look at; the index counts from the first
 */
export function lastNotAfter(
  rows: Float64Array,
  stride: number,
  first: number,
  count: number,
  value: number,
): number {
  let low = 0;
  let high = count - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (rows[(first + middle) * stride] <= value) low = middle;
    else high = middle;
  }
  return low;
}

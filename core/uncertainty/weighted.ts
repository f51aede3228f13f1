import type { Spread } from './corridor';

/** Statistics of weighted rows. */

/** Values below which the given shares of the weight lie, shares in rising order. */
export function quantilesOf(
  values: ArrayLike<number>,
  weights: ArrayLike<number>,
  shares: readonly number[],
): number[] {
  const order = Int32Array.from({ length: values.length }, (_, i) => i).sort(
    (a, b) => values[a] - values[b],
  );
  const total = order.reduce((sum, i) => sum + weights[i], 0);
  let held = 0;
  let at = 0;
  return shares.map((share) => {
    while (at < order.length - 1 && held + weights[order[at]] < share * total) {
      held += weights[order[at]];
      at += 1;
    }
    return values[order[at]];
  });
}

/** 5, 50 and 95 % of the weight. */
export function spreadOf(values: ArrayLike<number>, weights: ArrayLike<number>): Spread {
  const [low, middle, high] = quantilesOf(values, weights, [0.05, 0.5, 0.95]);
  return [low, middle, high];
}

/** Effective sample size, (Σw)² / Σw². Source: Kish, Survey Sampling (1965), 11.7. */
export function effectiveSize(weights: ArrayLike<number>): number {
  let sum = 0;
  let squares = 0;
  for (let i = 0; i < weights.length; i++) {
    sum += weights[i];
    squares += weights[i] ** 2;
  }
  return squares === 0 ? 0 : (sum * sum) / squares;
}

import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { clopperPearson } from '../../../core/math/beta';

const { rows } = JSON.parse(
  readFileSync(new URL('../../checks/data/beta.json', import.meta.url), 'utf8'),
) as { rows: [number, number, number, number, number][] };

describe('the exact binomial interval', () => {
  it('agrees with SciPy (source in the data’s header) for counts to a million', () => {
    expect(rows.length).toBeGreaterThan(200);
    let largest = 0;
    let where: number[] = [];
    for (const [impacts, count, confidence, low, high] of rows) {
      const mine = clopperPearson(impacts, count, confidence);
      for (const [value, expected] of [
        [mine[0], low],
        [mine[1], high],
      ]) {
        const error = expected === 0 ? Math.abs(value) : Math.abs(value / expected - 1);
        if (error > largest) {
          largest = error;
          where = [impacts, count, confidence, value, expected];
        }
      }
    }
    // What the interval is said to be good to: exponents of up to 1e6 rounded at 1e-16.
    expect({ largest, where, close: largest < 1e-9 }).toEqual({ largest, where, close: true });
  });

  it('starts at zero without an impact and ends at one when all are', () => {
    expect(clopperPearson(0, 1000, 0.95)[0]).toBe(0);
    expect(clopperPearson(1000, 1000, 0.95)[1]).toBe(1);
  });

  it('is the closed form 1 − (α/2)^(1/n) where nothing was seen', () => {
    // I_x(1, n) = 1 − (1 − x)^n; 1e-9 as above.
    for (const count of [1, 10, 10000]) {
      const exact = -Math.expm1(Math.log(0.025) / count);
      expect(Math.abs(clopperPearson(0, count, 0.95)[1] / exact - 1)).toBeLessThan(1e-9);
    }
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cumulativePalermo, palermo, torino } from '../../../core/uncertainty/scales';

const YEAR_S = 365.25 * 86400;

describe('the Palermo scale', () => {
  it('is zero where the impact is as likely as the background', () => {
    // f_B = 0.03 a year at 1 Mt (Chesley et al. 2002): 0.3 in ten years.
    expect(palermo(0.3, 1, 10 * YEAR_S)).toBeCloseTo(0, 12);
  });

  it('is not defined without probability, energy or time ahead', () => {
    expect(palermo(0, 1, YEAR_S)).toBeNull();
    expect(palermo(0.1, 0, YEAR_S)).toBeNull();
    expect(palermo(0.1, 1, 0)).toBeNull();
    expect(palermo(0.1, 1, -YEAR_S)).toBeNull();
    expect(cumulativePalermo([null])).toBeNull();
  });

  it('summed over ten equal dates is one more', () => {
    expect(cumulativePalermo([...Array(10).fill(-3), null])).toBeCloseTo(-2, 12);
  });

  it('is finite or null for every probability, energy and time', () => {
    const any = fc.double({ noNaN: true });
    fc.assert(
      fc.property(any, any, any, (p, mt, s) => {
        const value = palermo(p, mt, s);
        return value === null || Number.isFinite(value);
      }),
    );
  });
});

describe('the Torino scale by its words (categories of Morrison et al. 2004; limits from memory)', () => {
  // Background over thirty years (Chesley et al. 2002): 0.9 E^(−0.8), so 0.0036 at 1000 Mt, 9e-5 at 1e5 Mt.
  it.each([
    ['a sure impact of local size', 1, 50, [8, 8]],
    ['a sure impact of regional size', 0.995, 1000, [9, 9]],
    ['a sure impact of global size', 1, 1e6, [10, 10]],
    ['at least 1 % of local destruction', 0.02, 8, [3, 3]],
    ['at least 1 % of regional devastation', 0.03, 1600, [4, 5]],
    ['at least 1 % of a global catastrophe', 0.03, 1e6, [6, 7]],
    ['what burns up in the air, however sure', 1, 0.5, [0, 0]],
    ['no impact', 0, 1e6, [0, 0]],
    ['well below the background', 1e-6, 1000, [0, 0]],
    ['near the background', 5e-4, 1000, [0, 1]],
    ['as likely as the background', 3.6e-3, 1000, [1, 2]],
    ['far above the background, of global size', 5e-3, 1e5, [2, 6]],
  ])('%s', (_, probability, energy, range) => {
    expect(torino(probability, energy, 10 * YEAR_S)).toEqual(range);
  });

  it('never falls with probability', () => {
    for (const energy of [2, 50, 500, 1e4, 1e6]) {
      let before = [0, 0];
      for (let exponent = -9; exponent <= 0; exponent += 0.05) {
        const range = torino(Math.min(1, 10 ** exponent), energy, YEAR_S);
        expect(range).not.toBeNull();
        const [low, high] = range ?? [-1, -1];
        expect(low).toBeGreaterThanOrEqual(before[0]);
        expect(high).toBeGreaterThanOrEqual(before[1]);
        before = [low, high];
      }
    }
  });

  it('is not defined beyond a hundred years or in the past', () => {
    expect(torino(1, 1e6, 101 * YEAR_S)).toBeNull();
    expect(torino(1, 1e6, -YEAR_S)).toBeNull();
  });
});

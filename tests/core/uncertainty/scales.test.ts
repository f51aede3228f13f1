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

describe('the Torino scale where words decide (categories of Morrison et al. 2004; limits from memory)', () => {
  it.each([
    ['a sure impact of local size', 1, 50, 8],
    ['a sure impact of regional size', 0.995, 1000, 9],
    ['a sure impact of global size', 1, 1e6, 10],
    ['at least 1 % of local destruction', 0.02, 8, 3],
    ['what burns up in the air, however sure', 1, 0.5, 0],
    ['no impact', 0, 1e6, 0],
    ['what the diagram decides, below 1 %', 1e-3, 8, null],
    ['what the diagram decides, regional', 0.03, 1600, null],
  ])('%s', (_, probability, energy, level) => {
    expect(torino(probability, energy, 10 * YEAR_S)).toBe(level);
  });

  it('is not defined beyond a hundred years or in the past', () => {
    expect(torino(1, 1e6, 101 * YEAR_S)).toBeNull();
    expect(torino(1, 1e6, -YEAR_S)).toBeNull();
  });
});

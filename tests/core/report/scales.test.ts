import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { type ScalesInput, scalesSchema, scalesSection } from '../../../core/report/scales';
import { scalesFinding } from '../../../core/report/scales-findings';

const YEAR_S = 365.25 * 86400;
const earth = (years: number, value: number) => ({
  body: 'Earth',
  tdbSeconds: years * YEAR_S,
  value,
  impactSpeedKmS: 20,
});
const input = (change: Partial<ScalesInput> = {}): ScalesInput => ({
  dates: [earth(40, 1e-4)],
  // 2.092e10 kg at 20 km/s: 1000 Mt by the definition of the ton of TNT.
  physical: { diameterM: (2.092e10 / ((Math.PI / 6) * 2600)) ** (1 / 3), densityKgM3: 2600 },
  madeAtTdbSeconds: 30 * YEAR_S,
  epochTdbSeconds: 20 * YEAR_S,
  ...change,
});
const words = (given: ScalesInput): string => {
  const scales = scalesSection(given);
  return scales === null ? '' : (scalesFinding(scales, null)?.text ?? '');
};

describe('the scales of the report', () => {
  it('count the time left from the time of making', () => {
    const scales = scalesSection(input());
    expect(v.is(scalesSchema, scales)).toBe(true);
    expect(scales?.countedFrom).toBe('day-of-making');
    // Chesley et al. 2002 by hand: 1e-4 / (0.03 · 1000^−0.8 · 10) = 0.083729, log10 −1.0771.
    expect(scales?.dates[0].palermo?.[1]).toBeCloseTo(-1.0771, 4);
    expect(scales?.cumulativePalermo?.[1]).toBeCloseTo(-1.0771, 4);
  });

  it('count it from the epoch, and say so, where the date is before the time of making', () => {
    const scales = scalesSection(input({ madeAtTdbSeconds: 50 * YEAR_S }));
    expect(scales?.countedFrom).toBe('epoch');
    expect(scales?.dates[0].yearsLeft).toBeCloseTo(20, 9);
    expect(scales?.assumed.join(' ')).toContain('from the epoch');
  });

  it('hold no Palermo value for a probability of zero, and no number that is not finite', () => {
    const scales = scalesSection(input({ dates: [earth(40, 0)] }));
    expect(scales?.dates[0].palermo).toBeNull();
    expect(scales?.cumulativePalermo).toBeNull();
    expect(scales?.highestTorino).toEqual([0, 0]);
    expect(v.is(scalesSchema, scales)).toBe(true);
  });

  it('are absent without a date of the Earth', () => {
    expect(scalesSection(input({ dates: [{ ...earth(40, 0.1), body: 'Moon' }] }))).toBeNull();
  });

  it('say why where the size is unknown', () => {
    const scales = scalesSection(input({ physical: { albedo: 0.2 } }));
    expect(scales?.why).toContain('absolute magnitude');
    expect(scales?.dates).toEqual([]);
    expect(v.is(scalesSchema, scales)).toBe(true);
    expect(words(input({ physical: {} }))).toContain('no energy');
  });

  it('give the highest level of the dates, over sizes and over the categories left open', () => {
    const one = scalesSection(input({ dates: [earth(40, 0)] }));
    const both = scalesSection(input({ dates: [earth(40, 0), earth(41, 0.02)] }));
    expect(one?.highestTorino).toEqual([0, 0]);
    // 1000 Mt at 2 %: regional, category 4 or 5 (Morrison et al. 2004).
    expect(both?.highestTorino).toEqual([4, 5]);
  });

  it('are read aloud with the range that an unknown size gives', () => {
    const text = words(input({ physical: { absoluteMagnitude: 22 } }));
    expect(text).toMatch(/Palermo scale −\d\.\d \(−\d\.\d to −\d\.\d\)/);
    expect(text).toContain('Albedo 0.14');
    expect(words(input())).toContain('Palermo scale −1.1;');
  });

  it('name the Torino level where the words decide it', () => {
    const small = { diameterM: 60, densityKgM3: 2600 };
    // 60 m and 2600 kg/m³ at 20 km/s are 14 Mt: at 2 % the third category (Morrison et al. 2004).
    expect(words(input({ dates: [earth(40, 0.02)], physical: small }))).toContain(
      'Torino scale 3.',
    );
  });
});

import { describe, expect, it } from 'vitest';
import { energyMt, sizeOf } from '../../../core/uncertainty/size';

describe('the size of an object', () => {
  it('from H and albedo is the published diameter of a body measured in the infrared', () => {
    // Small-body record, solution 199: H 19.7 ± 0.4 and albedo 0.23, diameter 0.325 ± 0.015 km
    // (Müller 2013; H of another author, hence the whole stated error as tolerance).
    const size = sizeOf({ absoluteMagnitude: 19.7, albedo: 0.23 });
    expect(Math.abs((size?.diameterM[1] ?? 0) - 325)).toBeLessThan(15);
  });

  it('spreads by the square root of the albedo where that is unknown', () => {
    const [low, nominal, high] = sizeOf({ absoluteMagnitude: 20 })?.diameterM ?? [0, 0, 0];
    // √(0.5/0.03) and √(0.14/0.03), worked by hand to five digits.
    expect(high / low).toBeCloseTo(4.0825, 4);
    expect(high / nominal).toBeCloseTo(2.1602, 4);
  });

  it('takes a diameter that is given before H', () => {
    const size = sizeOf({ absoluteMagnitude: 20, diameterM: 100, densityKgM3: 2600 });
    expect(size?.diameterM).toEqual([100, 100, 100]);
    expect(size?.assumed).toEqual([]);
    // π/6 · 2600 · 1e6, worked by hand to five digits.
    expect((size?.massKg[1] ?? 0) / 1.3614e9).toBeCloseTo(1, 4);
  });

  it('says what it assumed, albedo and density', () => {
    expect(sizeOf({ absoluteMagnitude: 20 })?.assumed.join(' ')).toMatch(/Albedo 0\.14.*2600/);
  });

  it('is not known without H and diameter', () => {
    expect(sizeOf({ albedo: 0.2, densityKgM3: 2600 })).toBeNull();
    expect(sizeOf({ diameterM: 0 })).toBeNull();
  });

  it('gives one megaton for 4.184e15 J', () => {
    // ½ m v² with v = 20 km/s: m = 2.092e7 kg, by the definition of the ton of TNT.
    expect(energyMt([2.092e7, 2.092e7, 4.184e7], 20)).toEqual([1, 1, 2]);
  });
});

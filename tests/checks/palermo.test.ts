import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { cumulativePalermo, palermo, torino } from '../../core/uncertainty/scales';
import { energyMt } from '../../core/uncertainty/size';

interface Row {
  date: string;
  ip: string;
  energy: string;
  dt: string;
  ps: string;
  ts: string;
  mass: string;
  v_imp: string;
}

const { rows } = JSON.parse(
  readFileSync(new URL('data/palermo.json', import.meta.url), 'utf8'),
) as { rows: Row[] };

const YEAR_S = 365.25 * 86400;
const psOf = (ip: number, row: Row) => palermo(ip, Number(row.energy), Number(row.dt) * YEAR_S);

describe('published impact possibilities of the open small-body record (source in the data’s header)', () => {
  it('have the published Palermo scale', () => {
    expect(rows).toHaveLength(12);
    for (const row of rows) {
      const [digits, power] = row.ip.split('e');
      const ip = Number(row.ip);
      // The probability is published to 0.1 of its leading digit, the scale to 0.01; half of each.
      const tolerance = Math.log10(Number(digits) / (Number(digits) - 0.05)) + 0.005;
      const value = psOf(ip, row) ?? Number.NaN;
      const close = Math.abs(value - Number(row.ps)) <= tolerance;
      expect([row.date, power, value, close]).toEqual([row.date, power, value, true]);
    }
  });

  it('have the published Torino scale, where it is defined', () => {
    let defined = 0;
    for (const row of rows) {
      const range = torino(Number(row.ip), Number(row.energy), Number(row.dt) * YEAR_S);
      if (range === null) continue;
      defined += 1;
      expect([row.date, range]).toEqual([row.date, [Number(row.ts), Number(row.ts)]]);
    }
    expect(defined).toBe(rows.filter((row) => Number(row.dt) <= 100).length);
  });

  it('add up to the sum of their powers of ten', () => {
    const published = rows.map((row) => Number(row.ps));
    const sum = Math.log10(published.reduce((total, ps) => total + 10 ** ps, 0));
    // Rounding of a sum of twelve.
    expect(cumulativePalermo(published)).toBeCloseTo(sum, 12);
  });

  it('have the published energy from mass and speed', () => {
    for (const row of rows) {
      const mass = Number(row.mass);
      const [, energy] = energyMt([mass, mass, mass], Number(row.v_imp));
      // Published digits of the speed: 0.08 %; the published energies go with 4.2e15 J/Mt, 0.38 %
      // from the 4.184e15 of the definition.
      expect(Math.abs(energy / Number(row.energy) - 1)).toBeLessThan(0.005);
    }
  });
});

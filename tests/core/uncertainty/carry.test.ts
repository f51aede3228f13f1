import { describe, expect, it } from 'vitest';
import { DEMOS } from '../../../app/desk/demos';
import { BODIES } from '../../../core/constants';
import { normalsOf } from '../../../core/math/random';
import { createCarrier } from '../../../core/uncertainty/carry';
import { CLONE_OUTCOME, CLONE_ROW } from '../../../core/uncertainty/clones';
import { integrateOne, planClones } from '../../helpers/clones';

/** Clones carried in step against the same clones integrated one by one at the tight tolerance. */

const SIZE = CLONE_ROW.size;
const textOf = (id: string): string => DEMOS.find((demo) => demo.id === id)?.text ?? '';

const draw = (count: number, dimension: number): Float64Array => {
  const z = new Float64Array(count * dimension);
  normalsOf(3, 0, 0, count, dimension, z);
  return z;
};

interface Worst {
  distanceKm: number;
  timeS: number;
  compared: number;
  unmatched: number;
}

async function compare(
  text: string,
  days: number,
  options: { scale?: number; sigmaKm?: number; sigmaKmS?: number },
  checked: number,
): Promise<Worst> {
  const planned = await planClones(text, days, options);
  const { plan, ephemeris } = planned;
  const z = draw(256, plan.dimension);
  const { rows } = createCarrier(plan, ephemeris).carry(z);
  const worst: Worst = { distanceKm: 0, timeS: 0, compared: 0, unmatched: 0 };
  for (let clone = 0; clone < checked; clone++) {
    const own = z.subarray(clone * plan.dimension, (clone + 1) * plan.dimension);
    const events = integrateOne(planned, own);
    for (let at = 0; at < rows.length; at += SIZE) {
      if (rows[at + CLONE_ROW.clone] !== clone) continue;
      const hit = rows[at + CLONE_ROW.outcome] === CLONE_OUTCOME.impact;
      const time = rows[at + (hit ? CLONE_ROW.groundTdbSeconds : CLONE_ROW.tdbSeconds)];
      const event = events.find(
        (item) =>
          item.body === BODIES[rows[at + CLONE_ROW.body]] &&
          Math.abs(item.tdbSeconds - time) < 3600 &&
          (hit ? item.boundary === 'ground' && item.direction === 'in' : item.kind === 'minimum'),
      );
      if (event === undefined) {
        worst.unmatched += 1;
        continue;
      }
      worst.compared += 1;
      worst.timeS = Math.max(worst.timeS, Math.abs(event.tdbSeconds - time));
      if (!hit) {
        const off = Math.abs(event.distanceKm - rows[at + CLONE_ROW.distanceKm]);
        worst.distanceKm = Math.max(worst.distanceKm, off);
      }
    }
  }
  return worst;
}

// The limits are those of the trade-off between speed and what a briefing needs: 0.1 km and 0.5 s.
describe('clones carried in step', () => {
  it.each([
    ['a low pass ten weeks ahead', 'pass', 76, {}, 24],
    ['a pass with thirty times its covariance', 'pass', 76, { scale: 30 }, 24],
    ['a grazing pass', 'graze', 76, {}, 16],
    ['a certain impact', 'impact', 120, {}, 16],
    ['an impact with a cloud of ten Earth radii', 'impact', 120, { sigmaKmS: 5e-3 }, 24],
    ['a near miss of the Moon', 'lunar-near-miss', 90, {}, 16],
  ] as const)(
    'agree with single integrations within 0.1 km and 0.5 s: %s',
    async (_, id, days, options, checked) => {
      const worst = await compare(textOf(id), days, options, checked);
      expect(worst.compared).toBeGreaterThanOrEqual(checked);
      expect(worst.unmatched).toBe(0);
      expect(worst.distanceKm).toBeLessThan(0.1);
      expect(worst.timeS).toBeLessThan(0.5);
    },
  );

  it('hit exactly when their single integrations do', async () => {
    const planned = await planClones(textOf('impact'), 120, { sigmaKmS: 5e-3 });
    const { plan, ephemeris } = planned;
    const count = 48;
    const z = draw(count, plan.dimension);
    const { rows } = createCarrier(plan, ephemeris).carry(z);
    const hits = new Set<number>();
    for (let at = 0; at < rows.length; at += SIZE) {
      if (rows[at + CLONE_ROW.outcome] === CLONE_OUTCOME.impact)
        hits.add(rows[at + CLONE_ROW.clone]);
    }
    const expected = new Set<number>();
    for (let clone = 0; clone < count; clone++) {
      const own = z.subarray(clone * plan.dimension, (clone + 1) * plan.dimension);
      if (integrateOne(planned, own).some((event) => event.boundary === 'ground'))
        expected.add(clone);
    }
    expect(expected.size).toBeGreaterThan(4);
    expect(expected.size).toBeLessThan(44);
    expect([...hits].sort()).toEqual([...expected].sort());
  });

  it('give the same rows to the bit when the same batch is carried again', async () => {
    const { plan, ephemeris } = await planClones(textOf('pass'), 76);
    const z = draw(64, plan.dimension);
    const first = createCarrier(plan, ephemeris);
    const rows = first.carry(z).rows;
    expect(first.carry(z).rows).toEqual(rows);
    expect(createCarrier(plan, ephemeris).carry(z).rows).toEqual(rows);
  });
});

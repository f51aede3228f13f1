import { describe, expect, it } from 'vitest';
import { DEMOS } from '../../app/desk/demos';
import { BODY_INDEX } from '../../core/constants';
import { clopperPearson } from '../../core/math/beta';
import { normalsOf } from '../../core/math/random';
import { type CarryClones, CLONE_OUTCOME, CLONE_ROW } from '../../core/uncertainty/clones';
import { estimateRareEvent } from '../../core/uncertainty/rare-event';
import { assessText, withCovariance } from '../helpers/estimate';

/**
 * The rare-event estimate on an invented encounter, against counts of plain clones where those can be
 * counted (about 1e-2, 1e-3, 1e-4), and against the simplest importance sampling where they cannot: the
 * covariance is made smaller step by step.
 */

const SHORT = { spanFrom: '2031-03-01', spanTo: '2031-05-18' };

async function estimate(widening: number) {
  const text = withCovariance(DEMOS[0].text, widening ** 2);
  const { assessed, basis, host } = await assessText(text, SHORT);
  const { approaches } = assessed.report;
  const rare = await estimateRareEvent({
    dimension: basis.plan.dimension,
    seed: 3,
    parallel: 1,
    carry: host.carry,
    nominal: approaches
      .filter(({ body }) => body === 'Earth')
      .map(({ tdbSeconds }) => ({ tdbSeconds, direction: null })),
    relativeError: 0.08,
    progress: () => {},
    stopped: () => false,
  });
  return { rare, basis, host };
}

describe('the rare-event estimate of an invented encounter', () => {
  it.each([
    ['1e-2', 40, 10_000],
    ['1e-3', 28, 25_000],
    ['1e-4', 25, 60_000],
  ])('is within the 99.9 %% interval of a plain count near %s', async (_, widening, count) => {
    const { rare, basis, host } = await estimate(widening);
    let hits = 0;
    for (let first = 0; first < count; first += 1000) {
      const z = new Float64Array(1000 * basis.plan.dimension);
      normalsOf(17, 0, first, 1000, basis.plan.dimension, z);
      const { rows } = await host.carry(z);
      hits += hitsOf(rows).length;
    }
    expect(hits).toBeGreaterThan(8);
    const [low, high] = clopperPearson(hits, count, 0.999);
    const error = rare.relativeError ?? Number.NaN;
    expect(error).toBeLessThan(0.2);
    // Three of its own standard errors on top.
    expect(rare.value).toBeGreaterThan(low * (1 - 3 * error));
    expect(rare.value).toBeLessThan(high * (1 + 3 * error));
  });

  it.each([
    ['1e-6', 18.5],
    ['1e-8', 15],
  ])(
    'is that of a plain shifted Gaussian near %s, within four standard errors',
    async (_, widening) => {
      const { rare, basis, host } = await estimate(widening);
      const error = rare.relativeError ?? Number.NaN;
      expect(error).toBeLessThan(0.2);
      expect(rare.samples).toBeLessThan(20_000);
      const shifted = await shiftedGaussian(host.carry, basis.plan.dimension);
      const together = Math.hypot(error * rare.value, shifted.error);
      expect(shifted.error / shifted.value).toBeLessThan(0.2);
      expect(Math.abs(rare.value - shifted.value)).toBeLessThan(4 * together);
    },
  );
});

/**
 * Importance sampling at its simplest: the standard normal moved to the nearest hit among clones drawn
 * four times as wide; weight exp(μ²/2 − μ·z). Unbiased for any shift.
 */
async function shiftedGaussian(
  carry: CarryClones,
  d: number,
): Promise<{ value: number; error: number }> {
  const count = 1000;
  const draw = (seed: number, first: number): Float64Array => {
    const z = new Float64Array(count * d);
    normalsOf(seed, 0, first, count, d, z);
    return z;
  };
  let shift: Float64Array | null = null;
  const size2 = (z: Float64Array): number => z.reduce((sum, x) => sum + x * x, 0);
  for (let first = 0; first < 10_000; first += count) {
    const z = draw(19, first).map((x) => 4 * x);
    for (const clone of hitsOf((await carry(z)).rows)) {
      const own = z.slice(clone * d, clone * d + d);
      if (shift === null || size2(own) < size2(shift)) shift = own;
    }
  }
  if (shift === null) throw new Error('no clone hits');
  const mean = shift;
  let sum = 0;
  let sum2 = 0;
  const total = 20_000;
  for (let first = 0; first < total; first += count) {
    const z = draw(23, first).map((x, i) => x + mean[i % d]);
    for (const clone of hitsOf((await carry(z)).rows)) {
      let dot = 0;
      for (let k = 0; k < d; k++) dot += mean[k] * z[clone * d + k];
      const weight = Math.exp(size2(mean) / 2 - dot);
      sum += weight;
      sum2 += weight * weight;
    }
  }
  const value = sum / total;
  return { value, error: Math.sqrt((sum2 / total - value * value) / total) };
}

/** Numbers of the clones that hit the Earth. */
function hitsOf(rows: Float64Array): number[] {
  const hits: number[] = [];
  for (let at = 0; at < rows.length; at += CLONE_ROW.size) {
    const hit = rows[at + CLONE_ROW.outcome] === CLONE_OUTCOME.impact;
    if (hit && rows[at + CLONE_ROW.body] === BODY_INDEX.Earth)
      hits.push(rows[at + CLONE_ROW.clone]);
  }
  return hits;
}

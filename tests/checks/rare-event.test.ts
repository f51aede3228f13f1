import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { BODY_INDEX, SECONDS_PER_DAY } from '../../core/constants';
import { normalsOf } from '../../core/math/random';
import { type CarryClones, CLONE_OUTCOME, CLONE_ROW } from '../../core/uncertainty/clones';
import { discProbability } from '../../core/uncertainty/disc-probability';
import { estimateRareEvent, type RareEvent } from '../../core/uncertainty/rare-event';

/** Toy maps from standard normal numbers to target planes, whose impact probability is known otherwise. */

const published = JSON.parse(
  readFileSync(new URL('data/rare-event.json', import.meta.url), 'utf8'),
);

const RADIUS_KM = 10_000;
const LIMIT_KM = 1.5e7;
const YEAR_S = 365.25 * SECONDS_PER_DAY;

/** A pass: where on its target plane a clone comes through; null where it does not come near. */
type Pass = (z: Float64Array) => { tdbSeconds: number; b: readonly [number, number] } | null;

function carryOf(passes: readonly Pass[], dimension: number): CarryClones {
  return async (batch) => {
    const count = batch.length / dimension;
    const rows: number[] = [];
    for (let clone = 0; clone < count; clone++) {
      const z = batch.subarray(clone * dimension, (clone + 1) * dimension);
      for (const pass of passes) {
        const at = pass(z);
        if (at === null) continue;
        const distance = Math.hypot(at.b[0], at.b[1]);
        if (distance > LIMIT_KM) continue;
        const isImpact = distance < RADIUS_KM;
        const row = new Array<number>(CLONE_ROW.size).fill(Number.NaN);
        row[CLONE_ROW.clone] = clone;
        row[CLONE_ROW.body] = BODY_INDEX.Earth;
        row[CLONE_ROW.tdbSeconds] = at.tdbSeconds;
        row[CLONE_ROW.distanceKm] = distance;
        row[CLONE_ROW.bDotTKm] = at.b[0];
        row[CLONE_ROW.bDotRKm] = at.b[1];
        row[CLONE_ROW.impactRadiusKm] = RADIUS_KM;
        row[CLONE_ROW.outcome] = isImpact ? CLONE_OUTCOME.impact : CLONE_OUTCOME.pass;
        rows.push(...row);
        if (isImpact) break;
      }
    }
    return { count, rows: Float64Array.from(rows) };
  };
}

const dot = (a: readonly number[], z: Float64Array): number =>
  a.reduce((sum, value, k) => sum + value * z[k], 0);

const linear =
  (
    centre: readonly [number, number],
    t: readonly number[],
    r: readonly number[],
    years = 10,
  ): Pass =>
  (z) => ({
    tdbSeconds: years * YEAR_S + 3600 * z[0],
    b: [centre[0] + dot(t, z), centre[1] + dot(r, z)],
  });

const estimate = (
  passes: readonly Pass[],
  dimension: number,
  seed: number,
  extra: { parallel?: number; nominalYears?: number } = {},
): Promise<RareEvent> =>
  estimateRareEvent({
    dimension,
    seed,
    parallel: extra.parallel ?? 2,
    carry: carryOf(passes, dimension),
    nominal: [{ tdbSeconds: (extra.nominalYears ?? 10) * YEAR_S, direction: null }],
    relativeError: 0.08,
    progress: () => undefined,
    stopped: () => false,
  });

/** Plain sampling of a toy: share of hits, and its standard error. */
async function bruteForce(passes: readonly Pass[], dimension: number, count: number) {
  const carry = carryOf(passes, dimension);
  const z = new Float64Array(10_000 * dimension);
  let hits = 0;
  for (let at = 0; at < count; at += 10_000) {
    normalsOf(99, 7, at, 10_000, dimension, z);
    const { rows } = await carry(z);
    for (let i = CLONE_ROW.outcome; i < rows.length; i += CLONE_ROW.size) {
      if (rows[i] === CLONE_OUTCOME.impact) hits += 1;
    }
  }
  return { value: hits / count, error: Math.sqrt(hits) / count };
}

/** Deviation from the truth in stated standard errors. */
const deviation = ({ value, relativeError }: RareEvent, truth: number): number =>
  (value - truth) / (value * (relativeError ?? Number.NaN));

// Among so many comparisons as are in this file (about 50 of three seeds) one beyond 4 σ comes by
// chance in 300 runs; the seeds are fixed, so that the outcome never changes by itself.
const MOST_SIGMAS = 4;

const T = [800_000, 30_000, -5000, 0, 20_000, 100];
const R = [120_000, -2000, 9000, 3000, 0, 40];
const product = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((sum, value, k) => sum + value * b[k], 0);

async function agrees(passes: readonly Pass[], dimension: number, truth: number): Promise<void> {
  for (const seed of [1, 2, 3]) {
    const found = await estimate(passes, dimension, seed);
    expect(found.relativeError).toBeLessThanOrEqual(0.08);
    expect(Math.abs(deviation(found, truth))).toBeLessThan(MOST_SIGMAS);
    expect(found.samples).toBeLessThan(10_000);
    const shares = found.impacts.weights.reduce((sum, w) => sum + w, 0);
    // A sum of some thousand numbers in another order.
    expect(shares / found.value).toBeCloseTo(1, 10);
    expect(found.impacts.rows).toHaveLength(found.impacts.weights.length * CLONE_ROW.size);
  }
}

describe('the rare-event estimate against answers known otherwise (source in the data’s header)', () => {
  it.each<{ d: number; s: number; p: number }>(published.iso)(
    'gives the noncentral chi-square probability $p',
    async ({ d, s, p }) => {
      await agrees([linear([0.6 * d, 0.8 * d], [s, 0, 0, 0, 0, 0], [0, 0, s, 0, 0, 0])], 6, p);
    },
  );

  it.each([0, 2, 3, 4, 5])('gives a stretched Gaussian %d σ off over the disc', async (sigmas) => {
    const centre = [sigmas * 800_000, sigmas * 120_000 + 3000] as const;
    const covariance = [product(T, T), product(T, R), product(R, R)] as const;
    // `discProbability` is held against SciPy in uncertainty.test.ts.
    await agrees([linear(centre, T, R)], 6, discProbability(centre, covariance, RADIUS_KM));
  });

  it('finds a tight orbit in nine dimensions, two of them without effect', async () => {
    const t = [244, 1, 0, 0, 0, 0, 0, 0, 0];
    const r = [0, 2, 2, 0, 0, 0, 0, 0, 0.5];
    const covariance = [product(t, t), product(t, r), product(r, r)] as const;
    await agrees(
      [linear([11_000, 300], t, r)],
      9,
      discProbability([11_000, 300], covariance, RADIUS_KM),
    );
  });

  it('follows a curved region', async () => {
    const curved: Pass = (z) => ({
      tdbSeconds: 10 * YEAR_S,
      b: [3000 + 4000 * z[0], 30_000 + 4000 * z[1] - 2500 * z[0] * z[0]],
    });
    await agrees([curved], 6, published.curved);
  });

  it('sums two regions of one date', async () => {
    const twice: Pass = (z) => ({
      tdbSeconds: 10 * YEAR_S,
      b: [300_000 * (z[0] * z[0] - 6) + 50_000 * z[1], 20_000 * z[2] + 3000 * z[0]],
    });
    await agrees([twice], 6, published.twice);
    expect((await estimate([twice], 6, 1)).regions).toBe(2);
  });

  it('finds a return that exists for a small part of the line alone', async () => {
    const first: Pass = (z) => ({
      tdbSeconds: 10 * YEAR_S,
      b: [400_000 + 100_000 * z[0], 50_000 + 3000 * z[1]],
    });
    const back: Pass = (z) => {
      const b = 2e8 * (z[0] + 2.5) + 1e5 * z[1];
      return Math.abs(b) > LIMIT_KM ? null : { tdbSeconds: 17 * YEAR_S + b / 10, b: [b, 2000] };
    };
    await agrees([first, back], 6, published.strand);
  });

  it('gives the sum over thirteen keyholes within its error, and finds nearly all of them', async () => {
    const first = (z: Float64Array): [number, number] => [
      60_000 + 150_000 * z[0],
      40_000 + 3 * z[1],
    ];
    const back: Pass = (z) => {
      const [x, y] = first(z);
      const phase = (3e5 * x) / (x * x + y * y);
      const b = 9.4e8 * (phase - Math.round(phase));
      return Math.abs(b) > LIMIT_KM ? null : { tdbSeconds: 13 * YEAR_S, b: [b, 1500] };
    };
    const passes: Pass[] = [(z) => ({ tdbSeconds: 10 * YEAR_S, b: first(z) }), back];
    await agrees(passes, 6, published.returns);
    // The five narrowest hold 1.5 to 2 % of the whole each, and not every one of them is found: below
    // the stated error. None is taken for two.
    const { regions } = await estimate(passes, 6, 1);
    expect(regions).toBeLessThanOrEqual(published.returnCount);
    expect(regions).toBeGreaterThanOrEqual(published.returnCount - 2);
  });

  it('counts a clone that would hit twice once, and both dates', async () => {
    const t = [20_000, 0, 0, 0, 0, 0];
    const r = [0, 20_000, 0, 0, 0, 0];
    const other = [0, 0, 20_000, 0, 0, 0];
    const one = linear([60_000, 0], t, r, 10);
    const two = linear([0, 60_000], t, other, 20);
    const p = published.iso[5].p;
    // Each alone has probability p; clones that would hit both times count for the first alone, how
    // many they are plain sampling says.
    const { value, error } = await bruteForce([one, two], 6, 400_000);
    const found = await estimate([one, two], 6, 5);
    const stated = found.value * (found.relativeError ?? Number.NaN);
    expect(Math.abs(found.value - value)).toBeLessThan(MOST_SIGMAS * Math.hypot(stated, error));
    const late = found.impacts.weights.filter(
      (_, i) => found.impacts.rows[i * CLONE_ROW.size + CLONE_ROW.tdbSeconds] > 15 * YEAR_S,
    );
    const second = late.reduce((sum, w) => sum + w, 0);
    expect(found.value - second).toBeGreaterThan(0.7 * p);
    expect(second).toBeGreaterThan(0.7 * p);
    expect(found.value).toBeLessThan(2 * p * 1.3);
  });

  it.each([
    [1e-2, 50_000],
    [1e-3, 300_000],
    [1e-4, 1_000_000],
  ])('agrees with plain sampling near %d', async (p, count) => {
    // Distances of an isotropic Gaussian of σ 5000 that give about these probabilities.
    const d = p === 1e-2 ? 20_900 : p === 1e-3 ? 24_900 : 28_000;
    const toy = linear([d, 0], [5000, 0, 0, 0, 0, 0], [0, 5000, 0, 0, 0, 0]);
    const plain = await bruteForce([toy], 6, count);
    const found = await estimate([toy], 6, 11);
    const stated = found.value * (found.relativeError ?? Number.NaN);
    expect(plain.value / p).toBeGreaterThan(0.5);
    expect(plain.value / p).toBeLessThan(2);
    expect(Math.abs(found.value - plain.value)).toBeLessThan(
      MOST_SIGMAS * Math.hypot(stated, plain.error),
    );
  });
});

describe('the error that the rare-event estimate states', () => {
  it('holds the truth within 1.96 σ as often as it should, over 200 seeds', async () => {
    const { d, s, p } = published.iso[3];
    const toy = linear([d, 0], [s, 0, 0, 0, 0, 0], [0, s, 0, 0, 0, 0]);
    let inside = 0;
    let sum = 0;
    for (let seed = 1; seed <= 200; seed++) {
      const off = deviation(await estimate([toy], 6, seed), p);
      sum += off;
      if (Math.abs(off) < 1.96) inside += 1;
    }
    // 190 ± 3.1 expected (binomial): 179 to 199 is 3.5 σ down and 3 σ up.
    expect(inside).toBeGreaterThanOrEqual(179);
    expect(inside).toBeLessThanOrEqual(199);
    // The mean of 200 deviations is normal with σ 0.071: four of these.
    expect(Math.abs(sum / 200)).toBeLessThan(0.29);
  });
});

describe('the rare-event estimate at its edges', () => {
  const near = linear([100, 100], [10, 0, 0, 0, 0, 0], [0, 20, 0, 0, 0, 0]);
  const far = linear([5e6, 8e5], T, R);

  it('says nothing was found where nothing is within 6.5 σ', async () => {
    const found = await estimate([far], 6, 1);
    expect(found.value).toBe(0);
    expect(found.relativeError).toBeNull();
    expect(found.regions).toBe(0);
  });

  it('counts plainly what is not rare, up to certainty', async () => {
    const found = await estimate([near], 6, 1);
    expect(found.method).toBe('plain sampling');
    expect(found.value).toBe(1);
    expect(found.relativeError).toBeLessThan(0.01);
  });

  it('does not depend on the number of batches in flight', async () => {
    const toy = linear(
      [40_000, 0],
      T.map((x) => x / 50),
      R,
    );
    const one = await estimate([toy], 6, 4, { parallel: 1 });
    const five = await estimate([toy], 6, 4, { parallel: 5 });
    expect(five).toEqual(one);
  });

  it('finds what no nominal approach leads to from plain clones', async () => {
    const toy = linear([50_000, 20_000], [1e4, 0, 0, 0, 0, 0], [0, 1e4, 0, 0, 0, 0]);
    const truth = discProbability([50_000, 20_000], [1e8, 0, 1e8], RADIUS_KM);
    const found = await estimate([toy], 6, 1, { nominalYears: 40 });
    expect(found.lines[0].points).toHaveLength(0);
    expect(Math.abs(deviation(found, truth))).toBeLessThan(MOST_SIGMAS);
  });

  it('tells from when on neighbours of the line part, and not without need', async () => {
    const first = linear([400_000, 50_000], [100_000, 0, 0, 0, 0, 0], [0, 3000, 0, 0, 0, 0]);
    const chaos: Pass = (z) => {
      const b = Math.sin(1e13 * z[0]) * 2e8;
      return Math.abs(b) > LIMIT_KM ? null : { tdbSeconds: 30 * YEAR_S, b: [b, 1000] };
    };
    // 30 Julian years after J2000.
    expect((await estimate([first, chaos], 6, 1)).reliability).toContain('From 2030-01-01 on');
    expect((await estimate([first], 6, 1)).reliability).toBeNull();
  });

  it('hands out the line of variations in order, its aims on the linear map', async () => {
    const toy = linear([400_000, 0], [1e5, 0, 0, 0, 0, 0], [0, 3000, 0, 0, 0, 0]);
    const { points } = (await estimate([toy], 6, 1)).lines[0];
    expect(points.length).toBeGreaterThan(100);
    // The direction's sign is free: both ends of it are looked at.
    const sign = points[0].bDotTKm < points[points.length - 1].bDotTKm ? 1 : -1;
    for (const [i, { sigma, bDotTKm }] of points.entries()) {
      if (i > 0) expect(sigma).toBeGreaterThan(points[i - 1].sigma);
      // The direction comes of central differences: its cosine is 1 within rounding, 1e-9.
      expect(Math.abs(bDotTKm - (400_000 + sign * 1e5 * sigma))).toBeLessThan(1);
    }
    expect(points[0].sigma).toBeGreaterThanOrEqual(-5);
    expect(points[points.length - 1].sigma).toBeLessThanOrEqual(5);
  });
});

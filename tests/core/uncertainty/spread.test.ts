import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { DEMOS } from '../../../app/desk/demos';
import { readCase } from '../../../core/case/read';
import { BODY_INDEX } from '../../../core/constants';
import { createForceModel } from '../../../core/dynamics/force-model';
import { createPropagator } from '../../../core/dynamics/propagate';
import { carried, eigenSymmetric } from '../../../core/math/symmetric';
import { distanceRange } from '../../../core/uncertainty/spread';
import { SPREAD } from '../../../core/uncertainty/spread-layout';
import { assessCase } from '../../helpers/assess';
import { type PlannedClones, planClones } from '../../helpers/clones';

const DAY = 86400;
const { stride } = SPREAD;

const matrixOf = (row: Float64Array): Float64Array => {
  const [xx, xy, xz, yy, yz, zz] = row.subarray(SPREAD.covariance, SPREAD.covariance + 6);
  return Float64Array.of(xx, xy, xz, xy, yy, yz, xz, yz, zz);
};

/** Place about the Earth at instants ahead of the epoch, of a state displaced by a factor's column. */
function placesOf(
  { plan, ephemeris }: PlannedClones,
  column: number,
  share: number,
  instants: readonly number[],
): Float64Array[] {
  const state = plan.state.map((x, i) => x + share * plan.factor[i * plan.dimension + column]);
  const model = createForceModel(ephemeris, { gm: plan.gm, nonGravitational: null });
  const start = { tdbSeconds: plan.epochTdbSeconds, state };
  const propagator = createPropagator(model, start, 1, { longestStepS: 40 * DAY });
  const end = new Float64Array(6);
  const bodies = new Float64Array(66);
  return instants.map((instant) => {
    for (;;) {
      const segment = propagator.step(instant);
      if (segment.baseSeconds + segment.endOffset < instant) continue;
      segment.exactState(instant - segment.baseSeconds, end);
      ephemeris.states(segment.baseSeconds, instant - segment.baseSeconds, bodies);
      return end.subarray(0, 3).map((x, i) => x - bodies[BODY_INDEX.Earth * 6 + i]);
    }
  });
}

describe('the spread along the trajectory of a case with a covariance', () => {
  let rows: Float64Array = new Float64Array(0);
  let planned: PlannedClones;
  let approach = 0;
  beforeAll(async () => {
    const text = DEMOS.find((demo) => demo.id === 'pass')?.text ?? '';
    const orbit = readCase(text, {}).case;
    if (orbit === null) throw new Error('the case does not read');
    const { report } = await assessCase(orbit, (event) => {
      if (event.type === 'spread') rows = event.rows;
    });
    approach = report.approaches[report.principal ?? 0].tdbSeconds;
    planned = await planClones(
      text,
      (approach - report.case.normalised.epochTdbSeconds) / DAY + 40,
    );
  });
  const all = (): Float64Array[] =>
    Array.from({ length: rows.length / stride }, (_, i) =>
      rows.subarray(i * stride, (i + 1) * stride),
    );

  it('has finite rows in order of time, each once, a few hundred to two thousand', () => {
    expect(rows.every(Number.isFinite)).toBe(true);
    const times = all().map((row) => row[SPREAD.tdbSeconds]);
    expect(times.length).toBeGreaterThan(100);
    expect(times.length).toBeLessThan(2000);
    for (let i = 1; i < times.length; i++) expect(times[i]).toBeGreaterThan(times[i - 1]);
  });

  it('is positive semi-definite everywhere, with a range of distance about its middle', () => {
    for (const row of all()) {
      const { values } = eigenSymmetric(matrixOf(row), 3);
      // Rounding of sums of squares as large as the greatest value.
      expect(values[2]).toBeGreaterThan(-1e-12 * values[0]);
      expect(row[SPREAD.low]).toBeGreaterThanOrEqual(0);
      expect(row[SPREAD.high]).toBeGreaterThan(row[SPREAD.low]);
    }
  });

  it('is what displaced orbits do, integrated one by one, before and after the pass', () => {
    const epoch = planned.plan.epochTdbSeconds;
    const ahead = all().filter(
      (row) => row[SPREAD.tdbSeconds] > epoch + DAY && row[SPREAD.tdbSeconds] < approach + 30 * DAY,
    );
    const step = Math.ceil(ahead.length / 40);
    const checked = ahead.filter((_, i) => i % step === 0);
    const instants = checked.map((row) => row[SPREAD.tdbSeconds]);
    const { dimension } = planned.plan;
    // A hundredth of a σ: what bends the map falls out of central differences to 1e-4 of it.
    const share = 0.01;
    const maps = instants.map(() => new Float64Array(3 * dimension));
    for (let column = 0; column < dimension; column++) {
      const up = placesOf(planned, column, share, instants);
      const down = placesOf(planned, column, -share, instants);
      for (const [k, map] of maps.entries()) {
        for (let i = 0; i < 3; i++) {
          map[i * dimension + column] = (up[k][i] - down[k][i]) / (2 * share);
        }
      }
    }
    const identity = new Float64Array(dimension * dimension);
    for (let i = 0; i < dimension; i++) identity[i * dimension + i] = 1;
    for (const [k, row] of checked.entries()) {
      const expected = carried(maps[k], identity, dimension);
      const { values } = eigenSymmetric(expected, 3);
      // Twice 0.1 % of a standard deviation: the interpolation of the transition matrix.
      for (const [i, value] of matrixOf(row).entries()) {
        expect(Math.abs(value - expected[i])).toBeLessThan(2e-3 * values[0]);
      }
    }
  });
});

describe('the range of distance of an ellipsoid', () => {
  const part = fc.double({ min: -1e6, max: 1e6, noNaN: true });
  const factor = fc.array(fc.double({ min: -1e5, max: 1e5, noNaN: true }), {
    minLength: 9,
    maxLength: 9,
  });
  const covarianceOf = (values: number[], rank: number): Float64Array => {
    const own = Float64Array.from(values, (value, i) => (i % 3 < rank ? value : 0));
    return carried(own, Float64Array.of(1, 0, 0, 0, 1, 0, 0, 0, 1), 3);
  };

  it('is r ± 3 σ for a sphere, and starts at zero with the origin inside', () => {
    const sphere = Float64Array.of(4, 0, 0, 0, 4, 0, 0, 0, 4);
    const [low, high] = distanceRange([30, 40, 0], sphere, 3);
    expect(low).toBeCloseTo(44, 9);
    expect(high).toBeCloseTo(56, 9);
    expect(distanceRange([3, 1, 2], sphere, 3)[0]).toBe(0);
  });

  it('is the nearest and the farthest of a needle, beside the origin and across it', () => {
    const needle = Float64Array.of(100, 0, 0, 0, 0, 0, 0, 0, 0);
    const [low, high] = distanceRange([10, 7, 0], needle, 3);
    expect(low).toBeCloseTo(7, 9);
    expect(high).toBeCloseTo(Math.hypot(40, 7), 6);
    const [beside, far] = distanceRange([0, 7, 0], needle, 3);
    expect(beside).toBeCloseTo(7, 9);
    expect(far).toBeCloseTo(Math.hypot(30, 7), 6);
  });

  it('takes an ellipsoid whose squares vanish for a point', () => {
    // A variance of 2.5e-324 km²: found by a drawn case, NaN before.
    const covariance = new Float64Array(9);
    covariance[8] = Number.MIN_VALUE;
    expect(distanceRange([0, 0, 0], covariance, 3)).toEqual([0, 0]);
    expect(distanceRange([0, 0, 5], covariance, 3)).toEqual([5, 5]);
  });

  it('holds every point of the ellipsoid, of any rank, and is finite', () => {
    fc.assert(
      fc.property(
        fc.tuple(part, part, part),
        factor,
        fc.integer({ min: 0, max: 3 }),
        fc.tuple(part, part, part),
        (place, values, rank, direction) => {
          const size = Math.hypot(...direction);
          fc.pre(size > 1);
          const [low, high] = distanceRange(place, covarianceOf(values, rank), 3);
          const z = direction.map((x, i) => (i < rank ? (3 * x) / size : 0));
          const point = place.map(
            (x, i) => x + [0, 1, 2].reduce((sum, k) => sum + values[3 * i + k] * z[k], 0),
          );
          const distance = Math.hypot(...point);
          // Rounding of the eigenvalues: 1e-16 of the squares, a root of it near a flat ellipsoid.
          const slack = 1e-6 * (Math.hypot(...place) + 3 * Math.hypot(...values)) + 1e-6;
          expect(low).toBeLessThanOrEqual(distance + slack);
          expect(high).toBeGreaterThanOrEqual(distance - slack);
          expect(Number.isFinite(high)).toBe(true);
        },
      ),
      { numRuns: 300 },
    );
  });
});

import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { AU_KM, BODY_INDEX } from '../../../core/constants';
import { createForceModel } from '../../../core/dynamics/force-model';
import {
  createPropagator,
  GoalBehind,
  type Segment,
  StepCollapse,
} from '../../../core/dynamics/propagate';
import { createEphemeris, type Ephemeris, loadEphemeris } from '../../../core/ephemeris';
import { fetchPacked } from '../../helpers/assess';

const START = 31.3 * 365.25 * 86400;
const DAY = 86400;
const OPTIONS = { longestStepS: 40 * DAY };

let ephemeris: Ephemeris;
beforeAll(async () => {
  ephemeris = createEphemeris();
  await loadEphemeris(ephemeris, START - 900 * DAY, START + 900 * DAY, fetchPacked);
});

/** Barycentric state with a given offset from the Earth. */
function fromEarth(r: number[], v: number[], at = START): Float64Array {
  const all = new Float64Array(66);
  ephemeris.states(Math.floor(at), at - Math.floor(at), all);
  const earth = BODY_INDEX.Earth * 6;
  return Float64Array.from([...r, ...v].map((x, i) => x + all[earth + i]));
}

function run(
  start: number,
  state: Float64Array,
  goal: number,
): { segments: Segment[]; end: Float64Array } {
  const model = createForceModel(ephemeris, { gm: 'DE431', nonGravitational: null });
  const direction = goal > start ? 1 : -1;
  const propagator = createPropagator(model, { tdbSeconds: start, state }, direction, OPTIONS);
  const segments: Segment[] = [];
  const end = new Float64Array(6);
  for (;;) {
    const segment = propagator.step(goal);
    segments.push(segment);
    if ((segment.baseSeconds + segment.endOffset - goal) * direction >= 0) {
      segment.evaluate(segment.endOffset, end);
      return { segments, end };
    }
    if (segments.length > 20000) throw new Error('too many steps');
  }
}

const distance = (a: Float64Array, b: Float64Array): number =>
  Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);

describe('the n-body integration', () => {
  it('comes back to its start from a year away and from the far side of a pass', () => {
    // Tolerance 1e-14 of 1.5e8 km a step, some 100 steps, stretched by the pass (a factor of 1e3).
    const far = fromEarth([3e7, 2e7, 1e6], [-6, -3, 1]);
    const there = run(START, far, START + 365 * DAY);
    expect(distance(run(START + 365 * DAY, there.end, START).end, far)).toBeLessThan(1e-3);
    const deep = fromEarth([9000, 0, 2000], [1, 11, 2]);
    const out = run(START, deep, START - 40 * DAY);
    expect(distance(run(START - 40 * DAY, out.end, START).end, deep)).toBeLessThan(1e-2);
  });

  it('comes back to its start from anywhere among the inner planets, in either direction', () => {
    const unit = { noNaN: true, min: -1, max: 1 };
    const three = fc.tuple(fc.double(unit), fc.double(unit), fc.double(unit));
    fc.assert(
      fc.property(three, three, fc.constantFrom(1, -1), (place, speed, direction) => {
        const distanceAu = Math.hypot(...place);
        fc.pre(distanceAu > 0.3);
        // At least 0.3 au from the Earth, at most 35 km/s slower or faster than it.
        const state = fromEarth(
          place.map((x) => x * AU_KM),
          speed.map((x) => x * 20),
        );
        const goal = START + direction * 200 * DAY;
        const there = run(START, state, goal);
        // 1e-14 of 1.5e8 km a step, 60 steps each way, stretched a few times by the Sun's pull: 1e-3 km;
        // one of many orbits may pass the Sun within a few radii, which stretches it tenfold more.
        expect(distance(run(goal, there.end, START).end, state)).toBeLessThan(1e-2);
      }),
      { seed: 853, numRuns: 40 },
    );
  });

  it('agrees between the dense output and a fresh step inside every step', () => {
    const { segments } = run(START, fromEarth([2e6, 1e6, 1e5], [-8, -4, 0.5]), START + 60 * DAY);
    const dense = new Float64Array(6);
    const exact = new Float64Array(6);
    let worst = 0;
    for (const segment of segments) {
      for (const u of [0, 0.13, 0.5, 0.77, 1]) {
        const offset = segment.startOffset + u * (segment.endOffset - segment.startOffset);
        segment.evaluate(offset, dense);
        segment.exactState(offset, exact);
        worst = Math.max(worst, distance(dense, exact));
      }
    }
    // The dense output is one order below the step: it draws and brackets, it does not decide.
    expect(worst).toBeLessThan(1e-2);
  });

  it('survives a fall to within a few kilometres of the centre of the Earth', () => {
    // Angular momentum 2400 km²/s: a periapsis at h²/2GM = 7 km from the centre of a point mass.
    const falling = fromEarth([60000, 0, 0], [-5, 0.04, 0]);
    const { segments } = run(START, falling, START + DAY / 2);
    let nearest = Number.POSITIVE_INFINITY;
    const state = new Float64Array(6);
    const all = new Float64Array(66);
    for (const segment of segments) {
      segment.evaluate(segment.endOffset, state);
      ephemeris.states(segment.baseSeconds, segment.endOffset, all);
      nearest = Math.min(nearest, distance(state, all.subarray(12, 18)));
    }
    expect(nearest).toBeLessThan(60);
    expect(segments.length).toBeLessThan(3000);
  });

  it('ends with a typed error, not a hang, where the state is not a number or lies on a centre', () => {
    expect(() => run(START, new Float64Array(6).fill(Number.NaN), START + DAY)).toThrow(
      StepCollapse,
    );
    expect(() => run(START, fromEarth([0, 0, 0], [0, 0, 0]), START + DAY)).toThrow(StepCollapse);
  });

  it('refuses a goal that is not ahead of it, in either direction, and one that is not a number', () => {
    for (const direction of [1, -1] as const) {
      const model = createForceModel(ephemeris, { gm: 'DE431', nonGravitational: null });
      const state = fromEarth([3e7, 2e7, 1e6], [-6, -3, 1]);
      const start = { tdbSeconds: START, state };
      const propagator = createPropagator(model, start, direction, OPTIONS);
      for (const goal of [START, START - direction, Number.NaN]) {
        expect(() => propagator.step(goal)).toThrow(GoalBehind);
      }
      expect((propagator.step(START + direction).endOffset - (START % 1)) * direction).toBe(1);
    }
  });

  it('reaches its goal exactly, and the steps join', () => {
    const { segments } = run(START, fromEarth([3e7, 2e7, 1e6], [-6, -3, 1]), START + 100.25 * DAY);
    const last = segments[segments.length - 1];
    expect(last.baseSeconds + last.endOffset).toBe(START + 100.25 * DAY);
    const a = new Float64Array(6);
    for (let i = 1; i < segments.length; i++) {
      segments[i - 1].evaluate(segments[i - 1].endOffset, a);
      // A sum of seven terms of the step's size: rounding of 1e8 km.
      expect(distance(a, segments[i].start)).toBeLessThan(1e-6);
    }
  });
});

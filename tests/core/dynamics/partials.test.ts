import { beforeAll, describe, expect, it } from 'vitest';
import { BODY_INDEX } from '../../../core/constants';
import { createForceModel } from '../../../core/dynamics/force-model';
import { ForcePartials } from '../../../core/dynamics/partials';
import { createPropagator, type Segment } from '../../../core/dynamics/propagate';
import { PARAMETERS, TransitionMatrix } from '../../../core/dynamics/transition';
import { createEphemeris, type Ephemeris, loadEphemeris } from '../../../core/ephemeris';
import { fetchPacked } from '../../helpers/assess';

const AT = Math.round(31.3 * 365.25 * 86400);
const DAY = 86400;
let ephemeris: Ephemeris;
beforeAll(async () => {
  ephemeris = createEphemeris();
  await loadEphemeris(ephemeris, AT - 900 * DAY, AT + 900 * DAY, fetchPacked);
});

function fromBody(body: 'Earth' | 'Sun', r: number[], v: number[]): Float64Array {
  const all = new Float64Array(66);
  ephemeris.states(AT, 0, all);
  return Float64Array.from([...r, ...v].map((x, i) => x + all[BODY_INDEX[body] * 6 + i]));
}

const force = (a: number[] = [0, 0, 0]) =>
  createForceModel(ephemeris, {
    gm: 'DE405',
    nonGravitational: { a1: a[0], a2: a[1], a3: a[2] },
  });

describe('the partials of the acceleration', () => {
  it('are the central differences of the force model, near the Earth, about the Sun and close to it', () => {
    const states = [
      fromBody('Earth', [7000, 1500, -3000], [1, 9, 4]),
      fromBody('Earth', [4e5, -2e5, 1e5], [-5, 3, 1]),
      fromBody('Sun', [1.2e8, 0.9e8, 1e7], [-20, 22, 3]),
      fromBody('Sun', [1.5e7, -2e7, 5e6], [50, 60, -10]),
    ];
    const partials = new ForcePartials(ephemeris, 'DE405');
    const up = new Float64Array(6);
    const down = new Float64Array(6);
    for (const state of states) {
      partials.evaluate(AT, 0, state);
      const size = Math.max(...partials.place.map(Math.abs));
      for (let k = 0; k < 6; k++) {
        const step = k < 3 ? 1 : 1e-1;
        const moved = (by: number): Float64Array =>
          state.map((x, i) => (i === k ? x + by * step : x));
        force().derivative(AT, 0, moved(1), up, 0);
        force().derivative(AT, 0, moved(-1), down, 0);
        for (let i = 0; i < 3; i++) {
          const difference = (up[3 + i] - down[3 + i]) / (2 * step);
          if (k < 3) {
            // h²/6 of the third derivative at 8000 km, and rounding of the place.
            expect(Math.abs(partials.place[i * 3 + k] - difference)).toBeLessThan(1e-6 * size);
          } else {
            // Rounding of an acceleration of up to 1e-2 km/s² over 0.2 km/s.
            expect(Math.abs(partials.velocity[i * 3 + k - 3] - difference)).toBeLessThan(1e-16);
          }
        }
      }
      for (let k = 0; k < 3; k++) {
        const a = [0, 0, 0];
        a[k] = 1e-9;
        force(a).derivative(AT, 0, state, up, 0);
        force().derivative(AT, 0, state, down, 0);
        for (let i = 0; i < 3; i++) {
          const difference = (up[3 + i] - down[3 + i]) / 1e-9;
          expect(Math.abs(partials.forces[i * 3 + k] - difference)).toBeLessThan(1e-6 * 100);
        }
      }
    }
  });
});

describe('the transition matrix', () => {
  const run = (
    state: Float64Array,
    a: number[],
    days: number,
  ): { segments: Segment[]; end: Float64Array } => {
    const propagator = createPropagator(force(a), { tdbSeconds: AT, state }, 1, {
      longestStepS: 40 * DAY,
    });
    const segments: Segment[] = [];
    const end = new Float64Array(6);
    for (;;) {
      const segment = propagator.step(AT + days * DAY);
      segments.push(segment);
      if (segment.baseSeconds + segment.endOffset >= AT + days * DAY) {
        segment.exactState(segment.endOffset, end);
        return { segments, end };
      }
    }
  };

  it('is the central difference of the trajectory, through a pass of the Earth', () => {
    const state = fromBody('Earth', [-8e5, 3e4, 2e4], [6, 0.2, -0.3]);
    const days = 4;
    const { segments } = run(state, [0, 0, 0], days);
    const matrix = new TransitionMatrix(new ForcePartials(ephemeris, 'DE405'));
    for (const segment of segments) matrix.advance(segment);
    for (let k = 0; k < PARAMETERS; k++) {
      const step = k < 3 ? 0.1 : k < 6 ? 1e-6 : 1e-11;
      const end = (sign: number): Float64Array => {
        const moved = state.map((x, i) => (i === k ? x + sign * step : x));
        const a = [0, 0, 0];
        if (k >= 6) a[k - 6] = sign * step;
        return run(moved, a, days).end;
      };
      const [up, down] = [end(1), end(-1)];
      const column = Array.from({ length: 6 }, (_, i) => matrix.values[i * PARAMETERS + k]);
      const size = [0, 3].map((from) => Math.hypot(...column.slice(from, from + 3)));
      for (let i = 0; i < 6; i++) {
        const difference = (up[i] - down[i]) / (2 * step);
        // Third order of the differences, the integration's 1e-6 km over the step, and the J2 of date.
        expect(Math.abs(column[i] - difference)).toBeLessThan(2e-4 * size[i < 3 ? 0 : 1]);
      }
    }
  });
});

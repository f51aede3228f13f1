import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { linearTimeScale, stretchedTimeScale, type TimeScale } from '../../app/ribbon/time-scale';

const DAY = 86400;

/** Spans of up to ten years about a passage whose time scale is a minute to a month. */
const scales = fc
  .record({
    centre: fc.double({ min: -1e9, max: 1.9e9, noNaN: true }),
    before: fc.double({ min: 0, max: 3650 * DAY, noNaN: true }),
    after: fc.double({ min: DAY, max: 3650 * DAY, noNaN: true }),
    scaleSeconds: fc.double({ min: 60, max: 30 * DAY, noNaN: true }),
    isLinear: fc.boolean(),
  })
  .map(({ centre, before, after, scaleSeconds, isLinear }): TimeScale => {
    const from = centre - before;
    const to = centre + after;
    return isLinear
      ? linearTimeScale(from, to)
      : stretchedTimeScale(from, to, { centreTdbSeconds: centre, scaleSeconds });
  });
const unit = fc.double({ min: 0, max: 1, noNaN: true });

describe('the time scale of the ribbon', () => {
  it('comes back to the same place through the clock', () => {
    fc.assert(
      fc.property(scales, unit, (scale, u) => {
        // The clock holds 2.4e-7 s at most of rounding, against a minute and more of ribbon scale.
        expect(Math.abs(scale.unitAt(scale.timeAt(u)) - u)).toBeLessThan(1e-9);
      }),
    );
  });

  it('never runs backwards', () => {
    fc.assert(
      fc.property(scales, unit, unit, (scale, a, b) => {
        fc.pre(Math.abs(a - b) > 1e-6);
        expect(scale.timeAt(Math.max(a, b))).toBeGreaterThan(scale.timeAt(Math.min(a, b)));
      }),
    );
  });

  it('begins and ends with the trajectory', () => {
    fc.assert(
      fc.property(scales, (scale) => {
        expect(scale.unitAt(scale.fromTdbSeconds)).toBeCloseTo(0, 12);
        expect(scale.unitAt(scale.toTdbSeconds)).toBeCloseTo(1, 12);
      }),
    );
  });

  it('has a pace that is the derivative of time along the ribbon', () => {
    fc.assert(
      fc.property(scales, fc.double({ min: 0.01, max: 0.99, noNaN: true }), (scale, u) => {
        // Central difference: its own error is of order h² (50 e-folds at most over a ribbon) and
        // the clock's rounding over 2h.
        const h = 1e-5;
        const slope = (scale.timeAt(u + h) - scale.timeAt(u - h)) / (2 * h);
        const rounding = 5e-7 / (2 * h);
        expect(Math.abs(slope - scale.secondsPerUnit(u))).toBeLessThan(1e-6 * slope + rounding);
      }),
    );
  });

  it('gives the last ten minutes before a pass the room of a finger at months of span', () => {
    const scale = stretchedTimeScale(-90 * DAY, 90 * DAY, {
      centreTdbSeconds: 0,
      scaleSeconds: 900,
    });
    const minutes = scale.unitAt(0) - scale.unitAt(-600);
    // By hand: asinh(600/900) / (2 asinh(90·86400/900)) = 0.6251 / 19.512 = 0.03204.
    expect(minutes).toBeCloseTo(0.03204, 4);
    expect(linearTimeScale(-90 * DAY, 90 * DAY).unitAt(600) - 0.5).toBeLessThan(1e-4);
  });
});

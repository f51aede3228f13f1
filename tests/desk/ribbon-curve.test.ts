import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anchorOf } from '../../app/ribbon/anchor';
import { distanceCurve } from '../../app/ribbon/curve';
import { linearTimeScale, stretchedTimeScale } from '../../app/ribbon/time-scale';
import { Trajectory } from '../../app/worker/trajectory';
import { inventedReport } from './fixtures/report';
import { evenTimes, straightDistance, straightTrajectory } from './ribbon-straight-path';

const DAY = 86400;
const SLOTS = 300;

const paths = fc
  .record({
    missKm: fc.double({ min: 1000, max: 1e6, noNaN: true }),
    speedKmS: fc.double({ min: 1, max: 30, noNaN: true }),
    count: fc.integer({ min: 2, max: 3000 }),
    shift: fc.double({ min: -20 * DAY, max: 20 * DAY, noNaN: true }),
    stretched: fc.boolean(),
  })
  .map(({ missKm, speedKmS, count, shift, stretched }) => {
    const times = evenTimes(shift - 30 * DAY, shift + 30 * DAY, count);
    const path = { missKm, speedKmS, times };
    const [from, to] = [times[0], times[count - 1]];
    return {
      path,
      trajectory: straightTrajectory(path),
      scale: stretched
        ? stretchedTimeScale(from, to, { centreTdbSeconds: 0, scaleSeconds: missKm / speedKmS })
        : linearTimeScale(from, to),
    };
  });

describe('the curve of the ribbon', () => {
  it('keeps the least distance of all samples, in at most two points a slot', () => {
    fc.assert(
      fc.property(paths, ({ path, trajectory, scale }) => {
        const points = distanceCurve(trajectory, 'object', scale, SLOTS);
        expect(points.length / 2).toBeLessThanOrEqual(2 * SLOTS);
        const least = Math.min(...path.times.map((t) => straightDistance(path, t)));
        const drawn = points.filter((_, i) => i % 2 === 1);
        // Interpolated slots may lie a little lower still: the straight line is met to rounding.
        expect(Math.min(...drawn)).toBeLessThanOrEqual(least * (1 + 1e-12));
      }),
      { numRuns: 60 },
    );
  });

  it('lies on the path and runs forward in time', () => {
    fc.assert(
      fc.property(paths, ({ path, trajectory, scale }) => {
        const points = distanceCurve(trajectory, 'object', scale, SLOTS);
        for (let i = 0; i < points.length; i += 2) {
          const expected = straightDistance(path, points[i]);
          // Cubic Hermite is exact on a straight line; positions of 1e8 km round at 1e-8 km.
          expect(Math.abs(points[i + 1] - expected)).toBeLessThan(1e-6 * expected);
          if (i > 0) expect(points[i]).toBeGreaterThanOrEqual(points[i - 2]);
        }
      }),
      { numRuns: 30 },
    );
  });

  it('draws the Moon and the unperturbed path from the Earth’s centre', () => {
    const path = { missKm: 20000, speedKmS: 10, times: evenTimes(-DAY, DAY, 99) };
    const trajectory = straightTrajectory(path);
    const scale = linearTimeScale(-DAY, DAY);
    const moon = distanceCurve(trajectory, 'moon', scale, SLOTS);
    expect(moon.filter((_, i) => i % 2 === 1).every((km) => Math.abs(km - 384400) < 1e-6)).toBe(
      true,
    );
    const unperturbed = distanceCurve(trajectory, 'unperturbed', scale, SLOTS);
    // The middle sample is at time 0: 1 000 km beyond the object's 20 000 km.
    const km = unperturbed.filter((_, i) => i % 2 === 1);
    expect(Math.min(...km)).toBeCloseTo(21000, 6);
  });

  it('is empty before two states have arrived', () => {
    expect(distanceCurve(new Trajectory(), 'object', linearTimeScale(0, 1), SLOTS)).toHaveLength(0);
  });
});

describe('the zero of the ribbon', () => {
  const path = { missKm: 20000, speedKmS: 10, times: evenTimes(-DAY, DAY, 99) };

  it('is the nearest sample, and its distance over its speed, while there is no report', () => {
    const anchor = anchorOf(null, straightTrajectory(path));
    expect(anchor?.centreTdbSeconds).toBeCloseTo(0, 6);
    expect(anchor?.scaleSeconds).toBeCloseTo(2000, 6);
  });

  it('is the principal approach of the report', () => {
    const anchor = anchorOf(inventedReport(), straightTrajectory(path));
    expect(anchor).toEqual({
      centreTdbSeconds: 43200,
      scaleSeconds: 20000 / 12,
      words: 'closest approach',
    });
  });

  it('is the surface and not the unreached periapsis where the path ends there', () => {
    const report = inventedReport();
    const surfaceImpact = {
      jdTdb: 2451545.4,
      tdbSeconds: 34560,
      utc: '2000-01-01T21:34:55.816Z',
      latitudeDeg: 0,
      longitudeDeg: 0,
      speedKmS: 15,
      flightPathAngleDeg: -30,
      note: '',
    };
    const [approach] = report.approaches;
    const struck = { ...approach, distanceKm: 3000, distanceRadii: 0.5, surfaceImpact };
    const anchor = anchorOf({ ...report, approaches: [struck] }, straightTrajectory(path));
    // Radius 3000/0.5 = 6 000 km over 12 km/s.
    expect(anchor).toEqual({ centreTdbSeconds: 34560, scaleSeconds: 500, words: 'impact' });
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Vec3 } from '../../../core/math/vector';
import { elementsFromState, stateFromElements } from '../../../core/orbit/elements';

const GM = 398600.4418;
const CIRCLE = Math.sqrt(GM / 8000);
const ESCAPE = Math.sqrt((2 * GM) / 8000);

describe('elements of a state', () => {
  it('of a circle count the true anomaly from the node and say that periapsis is set', () => {
    const e = elementsFromState([0, 8000 * Math.SQRT1_2, 8000 * Math.SQRT1_2], [-CIRCLE, 0, 0], GM);
    expect(e.degenerate).toEqual({ circular: true, equatorial: false });
    expect(e.argumentOfPeriapsisRad).toBe(0);
    expect(e.nodeRad).toBeCloseTo(0, 12);
    expect(e.trueAnomalyRad).toBeCloseTo(Math.PI / 2, 12);
    expect(e.inclinationRad).toBeCloseTo(Math.PI / 4, 12);
  });

  it('in the plane of reference set the node along x, both ways round', () => {
    for (const turn of [1, -1]) {
      const e = elementsFromState([0, 8000, 0], [-turn * 1.1 * CIRCLE, 0, 0], GM);
      expect(e.degenerate).toEqual({ circular: false, equatorial: true });
      expect(e.nodeRad).toBe(0);
      expect(e.inclinationRad).toBeCloseTo(turn > 0 ? 0 : Math.PI, 12);
      // Periapsis lies on +y: a quarter turn ahead of x, or three quarters when going back.
      expect(e.argumentOfPeriapsisRad).toBeCloseTo(turn > 0 ? Math.PI / 2 : 1.5 * Math.PI, 12);
      expect(e.trueAnomalyRad).toBeCloseTo(0, 12);
    }
  });

  it('of a general orbit are not degenerate', () => {
    const e = elementsFromState([6000, -3000, 4000], [2, 6, 3], GM);
    expect(e.degenerate).toEqual({ circular: false, equatorial: false });
  });

  it('at escape speed are a parabola: no semi-major axis, no period, Barker’s anomaly', () => {
    // Position along the semi-latus rectum, ν = 90°: D = 1 and D + D³/3 = 4/3; flight path at 45°.
    const v: Vec3 = [-ESCAPE * Math.SQRT1_2, ESCAPE * Math.SQRT1_2, 0];
    const e = elementsFromState([0, 8000, 0], v, GM);
    const back = elementsFromState([0, 8000, 0], [v[0], -v[1], 0], GM);
    for (const item of [e, back]) {
      expect(item.eccentricity).toBe(1);
      expect(item.semiMajorAxisKm).toBeNull();
      expect(item.periodS).toBeNull();
      expect(item.periapsisKm).toBeCloseTo(4000, 8);
    }
    expect(e.meanAnomalyRad).toBeCloseTo(4 / 3, 12);
    expect(back.meanAnomalyRad).toBeCloseTo(-4 / 3, 12);
    // Barker: t = (4/3) sqrt(2 q³/GM).
    expect(e.timeFromPeriapsisS).toBeCloseTo((4 / 3) * Math.sqrt((2 * 4000 ** 3) / GM), 6);
    expect(back.timeFromPeriapsisS).toBeCloseTo(-e.timeFromPeriapsisS, 6);
  });

  it('cross the parabola without a jump in the time since periapsis', () => {
    const times = [-1e-7, -1e-9, -1e-12, 0, 1e-12, 1e-9, 1e-7].map((more) => {
      const k = ESCAPE * Math.SQRT1_2 * (1 + more);
      return elementsFromState([0, 8000, 0], [-k, k, 0], GM).timeFromPeriapsisS;
    });
    // Speed changes by 1e-7 of itself and less, so the time does by a few times that.
    for (const t of times) expect(Math.abs(t / times[3] - 1)).toBeLessThan(1e-6);
    expect(Math.abs(times[2] / times[4] - 1)).toBeLessThan(1e-11);
  });

  it('at the far end of a nearly parabolic ellipse hold its period', () => {
    // Apoapsis of e = 1 − 1e-9 and q = 7000 km: a = q/(1 − e), and 2π sqrt(a³/GM) from it.
    const a = 7000 / 1e-9;
    const speed = Math.sqrt((GM / a) * (1e-9 / (2 - 1e-9)));
    const e = elementsFromState([-(2 * a - 7000), 0, 0], [0, -speed, 0], GM);
    expect(Math.abs((e.semiMajorAxisKm ?? 0) / a - 1)).toBeLessThan(1e-9);
    expect(Math.abs((e.periodS ?? 0) / (2 * Math.PI * Math.sqrt(a ** 3 / GM)) - 1)).toBeLessThan(
      1e-9,
    );
  });

  it('far out on a hyperbola give the mean anomaly that its Kepler equation needs', () => {
    // A metre off a straight hit: the true anomaly rounds to the asymptote, r = 7e11 times p.
    const e = elementsFromState([7.5e7, 0, 0], [-20, 1e-10, 0], GM);
    expect(e.eccentricity).toBeGreaterThan(1);
    // Falling on a line, t = ∫ dr / sqrt(v² + 2GM(1/r − 1/r0)), with the closed form in sinh.
    const a = GM / (400 - (2 * GM) / 7.5e7);
    const x = Math.acosh(1 + 7.5e7 / a);
    const expected = -Math.sqrt(a ** 3 / GM) * (Math.sinh(x) - x);
    expect(Math.abs(e.timeFromPeriapsisS / expected - 1)).toBeLessThan(1e-9);
  });

  it('keep every angle in [0, 2π)', () => {
    const real = (min: number, max: number) => fc.double({ min, max, noNaN: true });
    const angles = fc.oneof(
      real(0, 2 * Math.PI),
      fc.constantFrom(0, Math.PI / 2, Math.PI, 1.5 * Math.PI, -1e-17),
    );
    fc.assert(
      fc.property(
        fc.constantFrom(0, 0.3, 0.99),
        fc.constantFrom(0, 0.5, Math.PI),
        angles,
        angles,
        angles,
        (eccentricity, inclinationRad, nodeRad, argumentOfPeriapsisRad, trueAnomalyRad) => {
          const { r, v } = stateFromElements(
            {
              semiLatusRectumKm: 9000,
              eccentricity,
              inclinationRad,
              nodeRad,
              argumentOfPeriapsisRad,
              trueAnomalyRad,
            },
            GM,
          );
          const e = elementsFromState(r, v, GM);
          for (const angle of [
            e.nodeRad,
            e.argumentOfPeriapsisRad,
            e.trueAnomalyRad,
            e.meanAnomalyRad,
          ]) {
            expect(angle).toBeGreaterThanOrEqual(0);
            expect(angle).toBeLessThan(2 * Math.PI);
          }
        },
      ),
      { seed: 4, numRuns: 2000 },
    );
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { norm, subtract } from '../../../core/math/vector';
import {
  type ConicPlace,
  type Elements,
  elementsFromState,
  stateFromElements,
} from '../../../core/orbit/elements';
import { moid } from '../../../core/orbit/moid';

const AU = 149597870.7;
const GM = 132712440041.9394;
const real = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const angle = real(0, 2 * Math.PI);

const placeOf = (q: number, e: number, i: number, node: number, argument: number): ConicPlace => ({
  semiLatusRectumKm: q * AU * (1 + e),
  eccentricity: e,
  inclinationRad: i,
  nodeRad: node,
  argumentOfPeriapsisRad: argument,
  trueAnomalyRad: 0.2,
});
function orbitOf(place: ConicPlace): Elements {
  const { r, v } = stateFromElements(place, GM);
  return elementsFromState(r, v, GM);
}
const ellipse = fc.tuple(real(0.1, 1.3), real(0, 0.97), real(0, Math.PI), angle, angle);

describe('the least distance of two orbits', () => {
  it('is not more than that of any two places on them', () => {
    fc.assert(
      fc.property(
        ellipse,
        ellipse,
        fc.array(fc.tuple(angle, angle), { minLength: 40 }),
        (a, b, at) => {
          const [one, two] = [orbitOf(placeOf(...a)), orbitOf(placeOf(...b))];
          const least = moid(one, two).distanceKm;
          for (const [x, y] of at) {
            const p = stateFromElements({ ...one, trueAnomalyRad: x }, GM).r;
            const q = stateFromElements({ ...two, trueAnomalyRad: y }, GM).r;
            expect(norm(subtract(p, q))).toBeGreaterThan(least - 1e-3);
          }
        },
      ),
      { seed: 11, numRuns: 60 },
    );
  });

  it('of two ellipses is the same either way round', () => {
    fc.assert(
      fc.property(ellipse, ellipse, (a, b) => {
        const [one, two] = [orbitOf(placeOf(...a)), orbitOf(placeOf(...b))];
        // 1 m: rounding of an au is 3e-5 km.
        expect(Math.abs(moid(one, two).distanceKm - moid(two, one).distanceKm)).toBeLessThan(1e-3);
      }),
      { seed: 12, numRuns: 150 },
    );
  });

  it('of coaxial circles, crossing circles and a chain of two is what geometry says', () => {
    const circle = (radius: number, inclination: number): Elements =>
      orbitOf(placeOf(radius, 0, inclination, 0.3, 0));
    expect(moid(circle(1.1, 0.2), circle(1, 0.2)).distanceKm / AU).toBeCloseTo(0.1, 12);
    expect(moid(circle(1, 1), circle(1, 0)).distanceKm / AU).toBeCloseTo(0, 12);
    // Circles of radii 1 and 1.2 in planes at a right angle: nearest on the common node.
    expect(moid(circle(1.2, Math.PI / 2), circle(1, 0)).distanceKm / AU).toBeCloseTo(0.2, 12);
  });

  it('refuses an open second orbit', () => {
    const open = orbitOf(placeOf(0.5, 1.4, 0.2, 1, 2));
    expect(() => moid(open, open)).toThrow(RangeError);
  });
});

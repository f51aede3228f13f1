import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cross, dot, norm, subtract, type Vec3 } from '../../../core/math/vector';
import {
  flightPathAngleAtRadius,
  type Hyperbola,
  hyperbolaFromState,
  speedAtRadius,
  timeToPeriapsisFrom,
  travelTime,
} from '../../../core/orbit/hyperbola';
import { propagateTwoBody } from '../../../core/orbit/propagate';

const GM = 398600.4418;
const real = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const SEED = { seed: 20290413, numRuns: 1000 };

/** The hyperbola of a state that must have one. */
function hyperbolaOf(r: Vec3, v: Vec3): Hyperbola {
  const found = hyperbolaFromState(r, v, GM);
  if (found === null) throw new Error('expected a hyperbola');
  return found;
}

/** Periapsis distance and excess speed, from e − 1 = 1e-6 to e = 1e4. */
const encounter = fc
  .record({ q: real(1000, 1e6), above: real(-6, 4) })
  .map(({ q, above }) => ({ q, e: 1 + 10 ** above }));

/** The state at periapsis on x, moving along y. */
const atPeriapsis = (q: number, e: number): [Vec3, Vec3] => [
  [q, 0, 0],
  [0, Math.sqrt((GM * (1 + e)) / q), 0],
];

describe('the hyperbola of a state', () => {
  it('is null for a bound one, for escape speed and for a straight fall', () => {
    expect(hyperbolaFromState([8000, 0, 0], [0, 8, 0], GM)).toBeNull();
    expect(hyperbolaFromState([2 * GM, 0, 0], [0, 1, 0], GM)).toBeNull();
    expect(hyperbolaFromState([9e5, 0, 0], [-12, 0, 0], GM)).toBeNull();
  });

  it('has the textbook parameters of its periapsis, from e − 1 = 1e-6 to e = 1e4', () => {
    fc.assert(
      fc.property(encounter, ({ q, e }) => {
        const [r, v] = atPeriapsis(q, e);
        const h = hyperbolaOf(r, v);
        // v² and 2GM/q cancel to e − 1 of themselves: that many digits are in the state.
        const tolerance = 1e-14 + 2e-15 / (e - 1);
        const near = (value: number, expected: number): void =>
          expect(Math.abs(value / expected - 1)).toBeLessThan(tolerance);
        near(h.periapsisKm, q);
        near(h.eccentricity, e);
        near(h.semiMajorAxisKm, -q / (e - 1));
        near(h.excessSpeedKmS, Math.sqrt((GM * (e - 1)) / q));
        near(h.impactParameterKm, q * Math.sqrt((e + 1) / (e - 1)));
        near(h.turnAngleRad, 2 * Math.asin(1 / e));
        near(h.asymptoteTrueAnomalyRad, Math.acos(-1 / e));
        near(h.periapsisSpeedKmS, v[1]);
        expect(Math.abs(h.timeToPeriapsisS)).toBe(0);
        expect(norm(subtract(h.periapsisDirection, [1, 0, 0]))).toBeLessThan(1e-14);
        expect(norm(subtract(h.normal, [0, 0, 1]))).toBeLessThan(1e-14);
        // Before the encounter it moves towards periapsis by 1/e of its speed, and along y.
        expect(Math.abs(h.incomingAsymptote[0] - 1 / e)).toBeLessThan(tolerance);
        expect(h.incomingAsymptote[1]).toBeGreaterThan(0);
      }),
      SEED,
    );
  });

  it('is the same from every state on the way, inbound and outbound', () => {
    fc.assert(
      fc.property(real(1000, 1e5), real(1.05, 20), real(-2e5, 2e5), (q, e, dt) => {
        const [r, v] = atPeriapsis(q, e);
        const there = propagateTwoBody(r, v, GM, dt);
        const h = hyperbolaOf(there.r, there.v);
        const first = hyperbolaOf(r, v);
        // Rounding of a far state turns its aim by 1e-16 of the distance over the impact parameter.
        const tolerance = (1e-13 * (norm(there.r) / first.impactParameterKm + 1)) / (e - 1);
        expect(norm(subtract(h.incomingAsymptote, first.incomingAsymptote))).toBeLessThan(
          tolerance,
        );
        expect(norm(subtract(h.periapsisDirection, first.periapsisDirection))).toBeLessThan(
          tolerance,
        );
        expect(Math.abs(h.periapsisKm / q - 1)).toBeLessThan(10 * tolerance);
        expect(Math.abs(h.timeToPeriapsisS + dt)).toBeLessThan(
          10 * tolerance * (Math.abs(dt) + q / norm(v)),
        );
      }),
      SEED,
    );
  });
});

describe('on the way in', () => {
  const [r, v] = atPeriapsis(7000, 1.8);
  const h = hyperbolaOf(r, v);

  it('speed, flight-path angle and time at a distance are those of two-body motion there', () => {
    for (const radius of [7000.001, 7100, 42164, 384400, 925000]) {
      const time = timeToPeriapsisFrom(h, radius, GM) ?? Number.NaN;
      const there = propagateTwoBody(r, v, GM, -time);
      expect(norm(there.r) / radius).toBeCloseTo(1, 12);
      expect(speedAtRadius(h, radius, GM) / norm(there.v)).toBeCloseTo(1, 12);
      const angle = Math.atan2(dot(there.r, there.v), norm(cross(there.r, there.v)));
      // 1e-9: a thousandth of a km above periapsis, rounding of r (1e-12) shows in its root.
      expect(Math.abs((flightPathAngleAtRadius(h, radius) ?? 0) - angle)).toBeLessThan(1e-9);
    }
  });

  it('the flight-path angle is level at periapsis, and there is none below', () => {
    expect(Math.abs(flightPathAngleAtRadius(h, h.periapsisKm) ?? Number.NaN)).toBe(0);
    expect(flightPathAngleAtRadius(h, h.periapsisKm * 0.999)).toBeNull();
  });

  it('travel times add up, and there is none to a distance below periapsis', () => {
    const whole = travelTime(h, 925000, 7100, GM) ?? Number.NaN;
    const outer = travelTime(h, 925000, 42164, GM) ?? Number.NaN;
    const inner = travelTime(h, 42164, 7100, GM) ?? Number.NaN;
    expect(outer).toBeGreaterThan(0);
    expect((outer + inner) / whole).toBeCloseTo(1, 12);
    expect(travelTime(h, 925000, 6900, GM)).toBeNull();
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { add, norm, subtract, type Vec3 } from '../../../core/math/vector';
import { type ClassicalInput, classicalEncounter } from '../../../core/orbit/classical';
import { stateFromElements } from '../../../core/orbit/elements';
import { propagateTwoBody } from '../../../core/orbit/propagate';

const AU = 149597870.7;
const DAY = 86400;
const GM_SUN = 132712440041.9394;
const GM_EARTH = 398600.435436;
const GM_BOTH = 403503.235502;
const EARTH = stateFromElements(
  {
    semiLatusRectumKm: AU * (1 - 0.0167 ** 2),
    eccentricity: 0.0167,
    inclinationRad: 0.4091,
    nodeRad: 0,
    argumentOfPeriapsisRad: 1.8,
    trueAnomalyRad: 1,
  },
  GM_SUN + GM_BOTH,
);

/** An encounter whose Earth sits on the barycentre. */
const inputOf = (
  object: { r: Vec3; v: Vec3 },
  spanS: readonly [number, number],
): ClassicalInput => ({
  object,
  earth: EARTH,
  gmSun: GM_SUN,
  gmEarthMoon: GM_BOTH,
  gmEarth: GM_EARTH,
  earthOffset: () => ({ r: [0, 0, 0], v: [0, 0, 0] }),
  spanS,
  sphereOfInfluenceKm: 925000,
  entryRadiusKm: 6478.137,
});

/** An object at a geocentric state at the epoch. */
const beside = (r: Vec3, v: Vec3): { r: Vec3; v: Vec3 } => ({
  r: add(EARTH.r, r),
  v: add(EARTH.v, v),
});

describe('the search for approaches', () => {
  it('finds every one below 0.5 au that a sampling of a tenth of a day shows', () => {
    const real = (min: number, max: number) => fc.double({ min, max, noNaN: true });
    const angle = real(0, 2 * Math.PI);
    let seen = 0;
    fc.assert(
      fc.property(
        fc.tuple(real(0.6, 1.1), real(0, 1.3), real(0, 0.3), angle, angle, real(-2, 2)),
        ([q, e, inclinationRad, nodeRad, argumentOfPeriapsisRad, trueAnomalyRad]) => {
          const object = stateFromElements(
            {
              semiLatusRectumKm: q * AU * (1 + e),
              eccentricity: e,
              inclinationRad,
              nodeRad,
              argumentOfPeriapsisRad,
              trueAnomalyRad,
            },
            GM_SUN,
          );
          const [from, to] = [-100 * DAY, 800 * DAY];
          const found = classicalEncounter(inputOf(object, [from, to]));
          const distance = (t: number): number =>
            norm(
              subtract(
                propagateTwoBody(object.r, object.v, GM_SUN, t).r,
                propagateTwoBody(EARTH.r, EARTH.v, GM_SUN + GM_BOTH, t).r,
              ),
            );
          const step = 0.1 * DAY;
          const samples = Array.from({ length: 9001 }, (_, i) => distance(from + i * step));
          const sampled: number[] = [];
          for (let i = 1; i < 9000; i++) {
            const lowest = samples[i] <= samples[i - 1] && samples[i] < samples[i + 1];
            if (lowest && samples[i] < 0.49 * AU) sampled.push(from + i * step);
          }
          for (const t of sampled) {
            expect(found.approaches.some((item) => Math.abs(item.dtS - t) <= step)).toBe(true);
          }
          seen += sampled.length;
          // A sample may lie nearer only by rounding of 1 au.
          expect(found.closest.distanceKm).toBeLessThan(Math.min(...samples) + 1e-3);
        },
      ),
      { seed: 5, numRuns: 60 },
    );
    expect(seen).toBeGreaterThan(30);
  });

  it('takes the nearer end of the span when nothing nearer lies inside', () => {
    const leaving = beside([2e6, 0, 0], [12, 1, 0]);
    const found = classicalEncounter(inputOf(leaving, [0, 10 * DAY]));
    expect(found.closest.dtS).toBe(0);
    expect(found.closest.distanceKm).toBeCloseTo(2e6, 3);
    expect(found.approaches).toEqual([]);
    expect(found.sphereEntry).toBeNull();
  });
});

describe('an object inside the sphere of influence at the epoch', () => {
  it('outbound, with a nearer approach a year later, is given that one’s own entry', () => {
    // Speed of the Earth's own period: back at the same place after a year, and nearer to it.
    const r: Vec3 = [300000, -200000, 80000];
    const speed = Math.sqrt(GM_SUN * (2 / norm(add(EARTH.r, r)) - 1 / AU));
    const tilted = add(EARTH.v, [0, 0, 9]);
    const object = {
      r: add(EARTH.r, r),
      v: tilted.map((x) => (x * speed) / norm(tilted)) as unknown as Vec3,
    };
    const found = classicalEncounter(inputOf(object, [100 * DAY, 400 * DAY]));
    expect(found.closest.distanceKm).toBeLessThan(925000);
    expect(found.sphereEntry).not.toBeNull();
    expect(found.sphereEntry?.dtS).toBeGreaterThan(360 * DAY);
    expect(found.sphereEntry?.dtS).toBeLessThan(found.closest.dtS);
  });

  it('and bound to the Earth counts as entering at the epoch, with no hyperbola', () => {
    const object = beside([400000, 0, 0], [-0.1, 0.9, 0.2]);
    const found = classicalEncounter(inputOf(object, [-5 * DAY, 5 * DAY]));
    expect(found.sphereEntry?.dtS).toBe(0);
    expect(found.hyperbola).toBeNull();
    expect(found.periapsis).toBeNull();
    expect(found.periapsisBelowInterface).toBe(false);
  });

  it('has the same hyperbola as its state at the epoch', () => {
    const object = beside([-500000, 60000, 20000], [9, -0.8, -0.3]);
    const found = classicalEncounter(inputOf(object, [-5 * DAY, 20 * DAY]));
    expect(norm(found.sphereEntry?.r ?? [0, 0, 0])).toBeCloseTo(925000, 4);
    expect(found.sphereEntry?.dtS).toBeLessThan(0);
    // Energy of the state at the epoch, about the Earth.
    const epoch = subtract(object.v, EARTH.v);
    const energy = norm(epoch) ** 2 - (2 * GM_EARTH) / norm(subtract(object.r, EARTH.r));
    expect(found.hyperbola?.excessSpeedKmS).toBeCloseTo(Math.sqrt(energy), 9);
    const travel = found.interface?.travelTimeS ?? found.periapsis?.travelTimeS ?? 0;
    expect(travel + (found.sphereEntry?.dtS ?? 0)).toBeGreaterThan(0);
  });
});

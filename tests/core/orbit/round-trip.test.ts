import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cross, dot, norm, subtract, type Vec3 } from '../../../core/math/vector';
import {
  DegenerateOrbit,
  elementsFromState,
  stateFromElements,
} from '../../../core/orbit/elements';
import { hyperbolaFromState, timeToPeriapsisFrom } from '../../../core/orbit/hyperbola';
import {
  eccentricAnomaly,
  hyperbolicAnomaly,
  meanFromTrueAnomaly,
  trueAnomalyFromMean,
} from '../../../core/orbit/kepler';
import { propagateTwoBody } from '../../../core/orbit/propagate';

const GM = 398600.4418;
const real = (min: number, max: number) => fc.double({ min, max, noNaN: true });
/** Eccentricities of every kind, the parabola and its neighbours among them. */
const eccentricity = fc.oneof(
  real(0, 0.999),
  real(0.999, 1.001),
  real(1.001, 10),
  fc.constant(1),
  fc.constant(0),
);
const angle = real(0, 2 * Math.PI);
const SEED = { seed: 20260102, numRuns: 2000 };

/** A place on a conic away from the asymptotes. */
const place = fc
  .record({
    q: real(6500, 1e6),
    e: eccentricity,
    i: real(0, Math.PI),
    node: angle,
    argp: angle,
    u: real(-0.95, 0.95),
  })
  .map(({ q, e, i, node, argp, u }) => ({
    semiLatusRectumKm: q * (1 + e),
    eccentricity: e,
    inclinationRad: i,
    nodeRad: node,
    argumentOfPeriapsisRad: argp,
    trueAnomalyRad: u * (e < 1 ? Math.PI : Math.acos(-1 / e)),
  }));

const relative = (a: Vec3, b: Vec3): number => norm(subtract(a, b)) / norm(b);

describe('Kepler’s equation', () => {
  it('is solved for every ellipse, |M| up to 1e4', () => {
    fc.assert(
      fc.property(real(-1e4, 1e4), real(0, 0.9999999), (m, e) => {
        const x = eccentricAnomaly(m, e);
        const turned = m - 2 * Math.PI * Math.round(m / (2 * Math.PI));
        // The reduction of M by whole turns rounds to 1e4 · 2.2e-16.
        expect(Math.abs(x - e * Math.sin(x) - turned)).toBeLessThan(4e-12);
      }),
      SEED,
    );
  });

  it('is solved for every hyperbola up to e = 10, |M| up to 1e4', () => {
    fc.assert(
      fc.property(real(-1e4, 1e4), real(1.0000001, 10), (m, e) => {
        const x = hyperbolicAnomaly(m, e);
        expect(Math.abs(e * Math.sinh(x) - x - m)).toBeLessThan(1e-12 * Math.max(1, Math.abs(m)));
      }),
      SEED,
    );
  });

  it('inverts the mean anomaly of every conic', () => {
    fc.assert(
      fc.property(place, ({ eccentricity: e, trueAnomalyRad: nu }) => {
        const back = trueAnomalyFromMean(meanFromTrueAnomaly(nu, e), e);
        // Near an asymptote or an apoapsis the anomaly hardly moves the mean one: angles lose digits.
        const slope = Math.abs(1 + e * Math.cos(nu));
        expect(Math.abs(back - nu)).toBeLessThan(1e-12 * Math.max(1, 10 / slope));
      }),
      SEED,
    );
  });
});

describe('two-body motion', () => {
  it('goes from elements to state to elements to state within 1e-12', () => {
    fc.assert(
      fc.property(place, (item) => {
        const a = stateFromElements(item, GM);
        const b = stateFromElements(elementsFromState(a.r, a.v, GM), GM);
        // Far out on a near-parabola the distance p/(1 + e cos ν) amplifies the rounding of ν.
        const slope = 1 + item.eccentricity * Math.cos(item.trueAnomalyRad);
        const tolerance = 1e-12 * Math.max(1, 1 / slope);
        expect(relative(b.r, a.r)).toBeLessThan(tolerance);
        expect(relative(b.v, a.v)).toBeLessThan(tolerance);
      }),
      SEED,
    );
  });

  it('comes back from later and from earlier within 1e-12 of the way', () => {
    fc.assert(
      fc.property(place, real(-2e5, 2e5), (item, dt) => {
        const a = stateFromElements(item, GM);
        const there = propagateTwoBody(a.r, a.v, GM, dt);
        const back = propagateTwoBody(there.r, there.v, GM, -dt);
        // Falling back from far out magnifies what was rounded there by the ratio of the distances.
        const stretch = Math.max(1, norm(there.r) / norm(a.r)) ** 1.5;
        const turns = Math.max(1, (Math.abs(dt) * norm(a.v)) / norm(a.r));
        expect(relative(back.r, a.r)).toBeLessThan(1e-12 * stretch * turns);
      }),
      SEED,
    );
  });

  it('keeps energy and angular momentum', () => {
    fc.assert(
      fc.property(place, real(-2e5, 2e5), (item, dt) => {
        const a = stateFromElements(item, GM);
        const b = propagateTwoBody(a.r, a.v, GM, dt);
        const energy = (r: Vec3, v: Vec3): number => dot(v, v) / 2 - GM / norm(r);
        const size = Math.max(dot(a.v, a.v), dot(b.v, b.v)) / 2;
        expect(Math.abs(energy(b.r, b.v) - energy(a.r, a.v))).toBeLessThan(1e-11 * size);
        expect(relative(cross(b.r, b.v), cross(a.r, a.v))).toBeLessThan(
          1e-11 * Math.max(1, (norm(b.r) * norm(b.v)) / norm(cross(a.r, a.v))),
        );
      }),
      SEED,
    );
  });

  it('counts the time since periapsis that brings the state from there', () => {
    fc.assert(
      fc.property(place, (item) => {
        const a = stateFromElements(item, GM);
        const e = elementsFromState(a.r, a.v, GM);
        const there = propagateTwoBody(a.r, a.v, GM, -e.timeFromPeriapsisS);
        const slope = 1 + item.eccentricity * Math.cos(item.trueAnomalyRad);
        expect(Math.abs(norm(there.r) / e.periapsisKm - 1)).toBeLessThan(1e-9 / slope);
      }),
      SEED,
    );
  });

  it('refuses a straight fall in words', () => {
    expect(() => elementsFromState([7000, 0, 0], [5, 0, 0], GM)).toThrow(DegenerateOrbit);
  });
});

describe('elements of special orbits', () => {
  it('of circular and equatorial ones keep the state', () => {
    const speed = Math.sqrt(GM / 7000);
    const states: [Vec3, Vec3][] = [
      [
        [7000, 0, 0],
        [0, speed, 0],
      ],
      [
        [7000, 0, 0],
        [0, -speed, 0],
      ],
      [
        [0, 7000, 0],
        [0, 0, speed],
      ],
      [
        [0, 7000, 0],
        [1.1 * speed, 0, 0],
      ],
      [
        [4000, 5000, 0],
        [-6, 6, 0],
      ],
    ];
    for (const [r, v] of states) {
      const back = stateFromElements(elementsFromState(r, v, GM), GM);
      expect(relative(back.r, r)).toBeLessThan(1e-12);
      expect(relative(back.v, v)).toBeLessThan(1e-12);
    }
  });
});

describe('the hyperbola of an encounter', () => {
  const incoming = fc.record({
    distance: real(2e5, 1e6),
    speed: real(0.3, 40),
    b: real(500, 1e5),
    turn: angle,
  });

  it('has the asymptote, impact parameter and excess speed of its state far out', () => {
    fc.assert(
      fc.property(incoming, ({ distance, speed, b, turn }) => {
        const r: Vec3 = [-distance, b * Math.cos(turn), b * Math.sin(turn)];
        const h = hyperbolaFromState(r, [speed, 0, 0], GM);
        if (h === null) return;
        expect(h.impactParameterKm * h.excessSpeedKmS).toBeCloseTo(b * speed, 5);
        expect(norm(h.incomingAsymptote)).toBeCloseTo(1, 12);
        expect(dot(h.incomingAsymptote, h.normal)).toBeCloseTo(0, 12);
        // b² = q² + 2 q GM/v∞²: energy and angular momentum at periapsis.
        const q = h.periapsisKm;
        const identity = q * q + (2 * q * GM) / h.excessSpeedKmS ** 2;
        expect(h.impactParameterKm ** 2 / identity - 1).toBeCloseTo(0, 10);
        // Run back a long way the motion is along the asymptote.
        const back = propagateTwoBody(r, [speed, 0, 0], GM, -1e9);
        const tilt = norm(cross(back.v, h.incomingAsymptote)) / norm(back.v);
        expect(tilt).toBeLessThan((3 * GM) / (h.excessSpeedKmS ** 2 * norm(back.r)) + 1e-9);
      }),
      SEED,
    );
  });

  it('reaches its periapsis after the time it says', () => {
    fc.assert(
      fc.property(incoming, ({ distance, speed, b, turn }) => {
        const r: Vec3 = [-distance, b * Math.cos(turn), b * Math.sin(turn)];
        const v: Vec3 = [speed, 0, 0];
        const h = hyperbolaFromState(r, v, GM);
        if (h === null) return;
        const there = propagateTwoBody(r, v, GM, h.timeToPeriapsisS);
        expect(norm(there.r) / h.periapsisKm - 1).toBeCloseTo(0, 7);
        const from = timeToPeriapsisFrom(h, norm(r), GM);
        expect((from ?? 0) / h.timeToPeriapsisS - 1).toBeCloseTo(0, 8);
      }),
      SEED,
    );
  });
});

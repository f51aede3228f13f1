import { describe, expect, it } from 'vitest';
import { AU_KM, DEG_TO_RAD, SECONDS_PER_DAY } from '../../core/constants';
import type { Vec3 } from '../../core/math/vector';
import { elementsFromState, stateFromElements } from '../../core/orbit/elements';
import { hyperbolaFromState, speedAtRadius } from '../../core/orbit/hyperbola';
import {
  meanMotion,
  trueAnomalyFromMean,
  trueAnomalyFromTimeSincePeriapsis,
} from '../../core/orbit/kepler';
import { propagateTwoBody } from '../../core/orbit/propagate';

/**
 * Worked examples of handbooks and published elements. Where a reference library carries the numbers
 * it is named; the others are from memory, with the digits the books print. Tolerances are half a
 * unit or so of the last printed digit, or that digit's effect where the givens are printed too.
 */

const deg = (radians: number): number => radians / DEG_TO_RAD;

describe('examples of Vallado, Fundamentals of Astrodynamics (from memory)', () => {
  it('2-2: 53.7874 min after periapsis of a parabola of p = 25 512 km, tan(ν/2) = 0.81775', () => {
    const anomaly = trueAnomalyFromTimeSincePeriapsis(53.7874 * 60, 25512 / 2, 1, 398600.4418);
    expect(Math.tan(anomaly / 2)).toBeCloseTo(0.81775, 4);
  });
});

describe('examples of Curtis, Orbital Mechanics for Engineering Students', () => {
  const GM = 398600;

  it('4.3: elements of a state, as python3-poliastro 0.17.0 (Debian) carries them', () => {
    // Docstring of poliastro.core.elements.rv2coe, with gm 398600.4418 km^3/s^2.
    const e = elementsFromState([-6045, -3490, 2500], [-3.457, 6.618, 2.533], 398600.4418);
    // 1e-11 relative: both are rounding of the same formulae.
    expect(Math.abs(e.semiLatusRectumKm / 8530.47436396927 - 1)).toBeLessThan(1e-11);
    expect(e.eccentricity).toBeCloseTo(0.17121118195416898, 12);
    expect(deg(e.inclinationRad)).toBeCloseTo(153.2492285182475, 10);
    expect(deg(e.nodeRad)).toBeCloseTo(255.27928533439618, 10);
    expect(deg(e.argumentOfPeriapsisRad)).toBeCloseTo(20.068139973005362, 9);
    expect(deg(e.trueAnomalyRad)).toBeCloseTo(28.445804984192122, 9);
  });

  it('4.7: the state of elements (from memory)', () => {
    const { r, v } = stateFromElements(
      {
        semiLatusRectumKm: 80000 ** 2 / GM,
        eccentricity: 1.4,
        inclinationRad: 30 * DEG_TO_RAD,
        nodeRad: 40 * DEG_TO_RAD,
        argumentOfPeriapsisRad: 60 * DEG_TO_RAD,
        trueAnomalyRad: 30 * DEG_TO_RAD,
      },
      GM,
    );
    const expected = [-4040, 4815, 3629, -10.39, -4.772, 1.744];
    for (let k = 0; k < 3; k++) {
      expect(Math.abs(r[k] - expected[k])).toBeLessThan(1);
      expect(Math.abs(v[k] - expected[k + 3])).toBeLessThan(0.006);
    }
  });

  it('3.1 and 3.2: time and true anomaly on an ellipse (from memory)', () => {
    const e = (21000 - 9600) / (21000 + 9600);
    const at = trueAnomalyFromTimeSincePeriapsis(4077, 9600, e, GM);
    expect(deg(at)).toBeCloseTo(120, 1);
    const later = deg(trueAnomalyFromTimeSincePeriapsis(3 * 3600, 9600, e, GM));
    expect(later + 360).toBeCloseTo(193.2, 1);
  });

  it('3.5: a hyperbola of 15 km/s at a perigee of 6678 km (from memory)', () => {
    const start: { r: Vec3; v: Vec3 } = { r: [6678, 0, 0], v: [0, 15, 0] };
    const e = elementsFromState(start.r, start.v, GM);
    expect(e.eccentricity).toBeCloseTo(2.7696, 3);
    const at = trueAnomalyFromTimeSincePeriapsis(4141.4, e.periapsisKm, e.eccentricity, GM);
    expect(deg(at)).toBeCloseTo(100, 2);
    const later = propagateTwoBody(start.r, start.v, GM, 4141.4 + 3 * 3600);
    expect(Math.abs(Math.hypot(...later.r) - 163180)).toBeLessThan(30);
    const hyperbola = hyperbolaFromState(start.r, start.v, GM);
    if (hyperbola === null) throw new Error('expected a hyperbola');
    expect(speedAtRadius(hyperbola, 163180, GM)).toBeCloseTo(10.51, 2);
    expect(deg(hyperbola.asymptoteTrueAnomalyRad)).toBeCloseTo(111.17, 1);
  });

  it('3.7: an hour of an ellipse in its plane (from memory)', () => {
    const { r, v } = propagateTwoBody([7000, -12124, 0], [2.6679, 4.621, 0], GM, 3600);
    // 1 km and 1e-3 km/s: the digits of the given speed move as much within the hour.
    expect(Math.hypot(r[0] + 3297.8, r[1] - 7413.4)).toBeLessThan(1);
    expect(Math.hypot(v[0] + 8.2977, v[1] + 0.96404)).toBeLessThan(1e-3);
  });
});

/**
 * Osculating elements published by JPL Horizons, as the tests of python3-skyfield 1.45 (Debian)
 * carry them in test_elementslib.py: e, periapsis km, mean motion °/s, mean and true anomaly °, a km,
 * and the time since periapsis in days (epoch less the printed time of periapsis).
 */
const horizons = [
  {
    name: 'the Moon about the Earth, 2015-03-02 02:00',
    e: 5.569337304355707e-2,
    q: 3.628019705296879e5,
    motion: 1.528309256597703e-4,
    mean: 1.486020417866582e2,
    trueAnomaly: 1.51738496323283e2,
    a: 3.841993269696947e5,
    days: 2457083.5 + 2 / 24 - 2457072.329517839,
  },
  {
    name: 'Io about the Sun a minute before it would escape',
    e: 9.993434925710607e-1,
    q: 1.163126430217223e8,
    motion: 2.798965463884538e-10,
    mean: 9.764838165348996e-3,
    trueAnomaly: 1.351769989470609e2,
    a: 1.771688146920545e11,
    days: 2457083.5 + (17 + 26 / 60) / 24 - 2456680.4380545728,
  },
  {
    name: 'Io about the Sun a minute later',
    e: 1.000249165282725,
    q: 1.176022222580809e8,
    motion: 6.437043762782399e-11,
    mean: 2.246667771669457e-3,
    trueAnomaly: 1.348525808471548e2,
    a: -4.719847844449893e11,
    days: 2457083.5 + (17 + 27 / 60) / 24 - 2456680.2668157415,
  },
];

describe('published osculating elements agree among themselves', () => {
  it.each(horizons)('$name', ({ e, q, motion, mean, trueAnomaly, a, days }) => {
    const gm = (motion * DEG_TO_RAD) ** 2 * Math.abs(a) ** 3;
    // e is printed to 1e-15, so 1 − e to 2e-12 of itself: 1e-9 degrees covers what that moves.
    expect(deg(trueAnomalyFromMean(mean * DEG_TO_RAD, e))).toBeCloseTo(trueAnomaly, 9);
    expect(meanMotion(q, e, gm) / (motion * DEG_TO_RAD)).toBeCloseTo(1, 10);
    const byTime = trueAnomalyFromTimeSincePeriapsis(days * SECONDS_PER_DAY, q, e, gm);
    // 1e-7 degrees: a Julian date in a double is good to 4e-5 s.
    expect(Math.abs(deg(byTime) - trueAnomaly)).toBeLessThan(1e-7);
    const place = { semiLatusRectumKm: q * (1 + e), inclinationRad: 0.4, nodeRad: 1 };
    const angles = { argumentOfPeriapsisRad: 2, trueAnomalyRad: trueAnomaly * DEG_TO_RAD };
    const state = stateFromElements({ ...place, ...angles, eccentricity: e }, gm);
    const back = elementsFromState(state.r, state.v, gm);
    // 1e-11: 1 − e is 7e-4 and 2e-4 here, and a is 1/(1 − e) times as sensitive as the state.
    expect(Math.abs((back.semiMajorAxisKm ?? 0) / a - 1)).toBeLessThan(1e-11);
    expect(Math.abs(deg(back.meanAnomalyRad) / mean - 1)).toBeLessThan(1e-11);
    expect(back.timeFromPeriapsisS / SECONDS_PER_DAY).toBeCloseTo(days, 6);
  });

  it('the place of Ceres is the published one to 1 mm', () => {
    // JPL Horizons, 2020-02-07 TDB, as python3-skyfield 1.45 (Debian) carries it in test_keplerlib.py:
    // equatorial elements, and the barycentric place of Ceres less that of the Sun, au.
    const e = 7.705857791518426e-2;
    const { r } = stateFromElements(
      {
        semiLatusRectumKm: 2.768873850275102 * AU_KM * (1 - e * e),
        eccentricity: e,
        inclinationRad: 2.718528770987308e1 * DEG_TO_RAD,
        nodeRad: 2.336112629072238e1 * DEG_TO_RAD,
        argumentOfPeriapsisRad: 1.328964361683606e2 * DEG_TO_RAD,
        trueAnomalyRad: trueAnomalyFromMean(1.382501360489816e2 * DEG_TO_RAD, e),
      },
      132712440042,
    );
    const sun = [-0.004105894975783999, 0.006739680703224941, 0.002956344702049446];
    const ceres = [1.334875927366032, -2.239607658161781, -1.328895183461897];
    for (let k = 0; k < 3; k++) {
      // 1 mm: what the library's own test asks for; an au has rounding of 0.03 mm.
      expect(Math.abs(r[k] - (ceres[k] - sun[k]) * AU_KM)).toBeLessThan(1e-6);
    }
  });
});

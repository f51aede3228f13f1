import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { AU_KM, DEG_TO_RAD } from '../../core/constants';
import { type Elements, elementsFromState, stateFromElements } from '../../core/orbit/elements';
import { eccentricAnomaly, hyperbolicAnomaly } from '../../core/orbit/kepler';
import { moid } from '../../core/orbit/moid';
import { propagateTwoBody } from '../../core/orbit/propagate';
import { assessCase } from '../helpers/assess';
import { publishedCase } from '../helpers/record';

const read = (name: string) =>
  JSON.parse(readFileSync(new URL(`data/${name}`, import.meta.url), 'utf8'));
const near = (value: number, expected: number, tolerance: number): void =>
  expect(Math.abs(value - expected)).toBeLessThan(tolerance);

/** Vallado's gravitational parameter of the Earth, km^3/s^2. */
const GM = 398600.4418;

describe('examples of Vallado, Fundamentals of Astrodynamics (2013); values from memory', () => {
  it('2-5: elements of a state, to the digits printed', () => {
    const e = elementsFromState(
      [6524.834, 6862.875, 6448.296],
      [4.901327, 5.533756, -1.976341],
      GM,
    );
    near(e.semiLatusRectumKm, 11067.79, 0.05);
    near(e.semiMajorAxisKm ?? 0, 36127.343, 0.5);
    near(e.eccentricity, 0.832853, 2e-6);
    near(e.inclinationRad / DEG_TO_RAD, 87.87, 0.005);
    near(e.nodeRad / DEG_TO_RAD, 227.898, 0.005);
    near(e.argumentOfPeriapsisRad / DEG_TO_RAD, 53.38, 0.006);
    near(e.trueAnomalyRad / DEG_TO_RAD, 92.335, 0.005);
  });

  it('2-6: the state of elements', () => {
    const { r, v } = stateFromElements(
      {
        semiLatusRectumKm: 11067.79,
        eccentricity: 0.83285,
        inclinationRad: 87.87 * DEG_TO_RAD,
        nodeRad: 227.89 * DEG_TO_RAD,
        argumentOfPeriapsisRad: 53.38 * DEG_TO_RAD,
        trueAnomalyRad: 92.335 * DEG_TO_RAD,
      },
      GM,
    );
    // The elements are printed to five digits: 1e-4 rad of 11 500 km.
    for (const [k, x] of [6525.344, 6861.535, 6449.125].entries()) near(r[k], x, 0.5);
    for (const [k, x] of [4.902276, 5.533124, -1.975709].entries()) near(v[k], x, 5e-4);
  });

  it('2-1 and 2-3: Kepler’s equation for an ellipse and a hyperbola', () => {
    const ellipse = eccentricAnomaly(235.4 * DEG_TO_RAD, 0.4);
    near((((ellipse / DEG_TO_RAD) % 360) + 360) % 360, 220.512074767522, 1e-10);
    near(hyperbolicAnomaly(235.4 * DEG_TO_RAD, 2.4), 1.6013761449, 1e-9);
  });

  it('2-4: the state forty minutes later', () => {
    const { r, v } = propagateTwoBody(
      [1131.34, -2282.343, 6672.423],
      [-5.64305, 4.30333, 2.42879],
      GM,
      2400,
    );
    for (const [k, x] of [-4219.7527, 4363.0292, -3958.7666].entries()) near(r[k], x, 5e-3);
    for (const [k, x] of [3.689866, -1.916735, -6.112511].entries()) near(v[k], x, 5e-6);
  });
});

describe('Curtis, Orbital Mechanics for Engineering Students, example 4.3; values from memory', () => {
  it('gives the elements printed', () => {
    const e = elementsFromState([-6045, -3490, 2500], [-3.457, 6.618, 2.533], 398600);
    near(Math.sqrt(e.semiLatusRectumKm * 398600), 58310, 5);
    near(e.inclinationRad / DEG_TO_RAD, 153.2, 0.06);
    near(e.nodeRad / DEG_TO_RAD, 255.3, 0.06);
    near(e.eccentricity, 0.1712, 6e-5);
    near(e.argumentOfPeriapsisRad / DEG_TO_RAD, 20.07, 6e-3);
    near(e.trueAnomalyRad / DEG_TO_RAD, 28.45, 6e-3);
  });
});

describe('two-body motion against a numerical integration (source in the data’s header)', () => {
  it('agrees within 1e-10 for e from 0 to 10, forward and back', () => {
    const { gm, rows } = read('two-body.json');
    expect(rows).toHaveLength(54);
    let worst = 0;
    for (const row of rows) {
      const { r, v } = propagateTwoBody(row.r, row.v, gm, row.dt);
      const end: number[] = row.end;
      const miss = Math.hypot(...r.map((x, k) => x - end[k])) / Math.hypot(...end.slice(0, 3));
      const rate = Math.hypot(...v.map((x, k) => x - end[k + 3])) / Math.hypot(...end.slice(3));
      worst = Math.max(worst, miss, rate);
    }
    // The integration's own error: rtol 3e-14 a step over some hundred steps, stretched near periapsis.
    expect(worst).toBeLessThan(1e-10);
  });
});

describe('the minimum orbit intersection distance', () => {
  it('agrees with dense searches for invented orbits, tangent and very eccentric ones among them', () => {
    const { earth, rows } = read('moid.json');
    expect(rows).toHaveLength(15);
    const orbit = (o: {
      q: number;
      e: number;
      i: number;
      node: number;
      argp: number;
    }): Elements => {
      const place = stateFromElements(
        {
          semiLatusRectumKm: o.q * AU_KM * (1 + o.e),
          eccentricity: o.e,
          inclinationRad: o.i,
          nodeRad: o.node,
          argumentOfPeriapsisRad: o.argp,
          trueAnomalyRad: 0.3,
        },
        1.32712440041939e11,
      );
      return elementsFromState(place.r, place.v, 1.32712440041939e11);
    };
    for (const row of rows) {
      const { distanceKm } = moid(orbit(row), orbit(earth));
      const more = distanceKm / AU_KM - row.moidAu;
      expect(more).toBeLessThan(1e-8);
      // In the flat valley of two orbits that are much alike the reference stops 6e-8 au short.
      expect(more).toBeGreaterThan(-1e-7);
    }
  });

  it('of the open small-body record is that published', async () => {
    // The record's field moid, au; the Earth's orbit is the one that it osculates at the epoch.
    const published = Number(read('apophis.json').orbit.moid);
    const { report } = await assessCase(publishedCase('2454700.5', '2454760.5'));
    // DE405 and DE431 put the Earth 1 km (7e-9 au) apart; six digits are published.
    near(report.classical?.moid.distanceAu ?? 0, published, 1e-8);
  });
});

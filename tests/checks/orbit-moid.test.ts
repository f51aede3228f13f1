import { describe, expect, it } from 'vitest';
import {
  AU_KM,
  BODY_INDEX,
  DEG_TO_RAD,
  GM_KM3_S2,
  JD_J2000,
  SECONDS_PER_DAY,
} from '../../core/constants';
import { createEphemeris, loadEphemeris } from '../../core/ephemeris';
import { icrfToEcliptic } from '../../core/frames/ecliptic';
import { subtract, vec3 } from '../../core/math/vector';
import { type Elements, elementsFromState, stateFromElements } from '../../core/orbit/elements';
import { moid } from '../../core/orbit/moid';
import { fetchPacked } from '../helpers/assess';
import record from './data/apophis.json';
import reference from './data/orbit-moid.json';

/**
 * Least distances of orbits against brute force (scipy; the script is in the data file) and against
 * a published one (the open small-body record; its source is in its header).
 */

const GM_SUN = GM_KM3_S2.DE431.Sun;

/** An orbit of the data: periapsis au, e, inclination, node, argument of periapsis in degrees. */
function orbitOf([q, e, i, node, argument]: number[], trueAnomalyRad = 0.4): Elements {
  const state = stateFromElements(
    {
      semiLatusRectumKm: q * AU_KM * (1 + e),
      eccentricity: e,
      inclinationRad: i * DEG_TO_RAD,
      nodeRad: node * DEG_TO_RAD,
      argumentOfPeriapsisRad: argument * DEG_TO_RAD,
      trueAnomalyRad,
    },
    GM_SUN,
  );
  return elementsFromState(state.r, state.v, GM_SUN);
}

describe('the least distance of two orbits is that of a brute-force search', () => {
  it.each(reference.rows)('for one $name', ({ a, b, moidAu, trueAnomalyARad, trueAnomalyBRad }) => {
    const [first, second] = [orbitOf(a), orbitOf(b)];
    const found = moid(first, second);
    // 1e-12 au (15 cm): the orbits pass through a state here, which costs some 1e-15 each, and
    // where they run nearly parallel the search itself stops at 1e-13.
    expect(Math.abs(found.distanceKm / AU_KM - moidAu)).toBeLessThan(1e-12);
    // A minimum is flat: 4e-7 rad in place (1 − cos of it is 1e-13) is 1e-13 in distance.
    expect(Math.cos(found.trueAnomalyARad - trueAnomalyARad)).toBeGreaterThan(1 - 1e-13);
    expect(Math.cos(found.trueAnomalyBRad - trueAnomalyBRad)).toBeGreaterThan(1 - 1e-13);
  });

  it('lies between the places given on the two orbits', () => {
    for (const { a, b } of reference.rows) {
      const [first, second] = [orbitOf(a), orbitOf(b)];
      const found = moid(first, second);
      const one = stateFromElements({ ...first, trueAnomalyRad: found.trueAnomalyARad }, GM_SUN).r;
      const two = stateFromElements({ ...second, trueAnomalyRad: found.trueAnomalyBRad }, GM_SUN).r;
      // 1 m: rounding of an au is 3e-5 km.
      expect(Math.abs(Math.hypot(...subtract(one, two)) - found.distanceKm)).toBeLessThan(1e-3);
    }
  });
});

describe('the least distance of the open small-body record', () => {
  it('is the published one with the Earth’s own osculating orbit at the record’s epoch', async () => {
    const element = (label: string): number =>
      Number(record.orbit.elements.find((item) => item.label === label)?.value);
    const object = orbitOf(['q', 'e', 'i', 'node', 'peri'].map(element));
    const seconds = (Number(record.orbit.epoch) - JD_J2000) * SECONDS_PER_DAY;
    const ephemeris = createEphemeris();
    await loadEphemeris(ephemeris, seconds, seconds + 1, fetchPacked);
    const bodies = new Float64Array(66);
    ephemeris.states(seconds, 0, bodies);
    const [earth, sun] = [BODY_INDEX.Earth * 6, BODY_INDEX.Sun * 6];
    const r = subtract(vec3(bodies, earth), vec3(bodies, sun));
    const v = subtract(vec3(bodies, earth + 3), vec3(bodies, sun + 3));
    const orbit = elementsFromState(icrfToEcliptic(r), icrfToEcliptic(v), GM_SUN);
    const published = Number(record.orbit.moid);
    // The record does not say which Earth orbit its publisher took. The Moon swings the Earth's
    // osculating orbit by some 3e-4 au within a month, so a match to 1e-8 au can be no other than
    // this one: the Earth's own centre, GM of the Sun alone. (The barycentre's orbit gives
    // 0.000179 au.) Tolerance 2e-8 au: 2.7 km between DE405 and the publisher's DE431.
    expect(Math.abs(moid(object, orbit).distanceKm / AU_KM - published)).toBeLessThan(2e-8);
  });
});

import { describe, expect, it } from 'vitest';
import { AU_KM, DEG_TO_RAD, GM_KM3_S2 } from '../../core/constants';
import { subtract } from '../../core/math/vector';
import { type Elements, elementsFromState, stateFromElements } from '../../core/orbit/elements';
import { moid } from '../../core/orbit/moid';
import reference from './data/orbit-moid.json';

/** Least distances of orbits against brute force (scipy; the script is in the data file). */

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

import { describe, expect, it } from 'vitest';
import type { Vec3 } from '../../core/math/vector';
import { type ClassicalEncounter, classicalEncounter } from '../../core/orbit/classical';
import reference from './data/orbit-classical.json';

/**
 * The classical chain on invented encounters against an independent run of it: heliocentric orbits
 * in 30-digit arithmetic, the fall to the Earth by numerical integration with events (mpmath and
 * scipy; the script is in the data file).
 */

const { swingKm, swingRadS, cases } = reference;

/** The invented swing of the Earth about the barycentre: the script's three lines. */
function earthOffset(dtS: number): { r: Vec3; v: Vec3 } {
  const c = swingKm * Math.cos(swingRadS * dtS);
  const s = swingKm * Math.sin(swingRadS * dtS);
  return {
    r: [c, 0.9 * s, 0.4 * s],
    v: [-swingRadS * s, 0.9 * swingRadS * c, 0.4 * swingRadS * c],
  };
}

const state = ({ r, v }: { r: number[]; v: number[] }): { r: Vec3; v: Vec3 } => ({
  r: r as unknown as Vec3,
  v: v as unknown as Vec3,
});

const run = (item: (typeof cases)[number]): ClassicalEncounter =>
  classicalEncounter({
    object: state(item.object),
    earth: state(reference.earth),
    gmSun: reference.gmSun,
    gmEarthMoon: reference.gmEarthMoon,
    gmEarth: reference.gmEarth,
    earthOffset,
    spanS: item.spanS as [number, number],
    sphereOfInfluenceKm: reference.sphereOfInfluenceKm,
    entryRadiusKm: reference.entryRadiusKm,
  });

/** Seconds: the search's own tolerance of 1e-3 s. */
const TIME_S = 2e-3;
/** km: what 1e-3 s of time is worth at 65 km/s, with the root's own last step. */
const PLACE_KM = 0.2;

const entered = cases.filter((item) => item.entry !== null);

describe('the two-body orbits come closest where and when the reference says', () => {
  it.each(cases)('for $name', (item) => {
    const found = run(item);
    const [dtS, distanceKm] = item.closest;
    expect(Math.abs(found.closest.dtS - dtS)).toBeLessThan(TIME_S);
    // At a minimum 1e-3 s of time moves the distance by nothing: 1e-4 km is rounding of 1 au.
    expect(Math.abs(found.closest.distanceKm - distanceKm)).toBeLessThan(1e-4);
    expect(found.approaches).toHaveLength(item.approaches.length);
    item.approaches.forEach(([at, distance], i) => {
      // A shallow far minimum is rounded off to 1e-2 s.
      expect(Math.abs(found.approaches[i].dtS - at)).toBeLessThan(1e-2);
      expect(Math.abs(found.approaches[i].distanceKm - distance)).toBeLessThan(1e-4);
    });
  });

  it('and the wide miss has no sphere entry, hyperbola, interface or periapsis', () => {
    const misses = cases.filter((item) => item.entry === null);
    expect(misses).toHaveLength(1);
    const { sphereEntry, hyperbola, interface: crossing, periapsis } = run(misses[0]);
    expect([sphereEntry, hyperbola, crossing, periapsis]).toEqual([null, null, null, null]);
  });
});

describe('the sphere of influence is entered, and the Earth passed, as the reference says', () => {
  it.each(entered)('for $name', (item) => {
    const found = run(item);
    if (item.entry === null || item.hyperbola === undefined || item.periapsis === undefined) {
      throw new Error('no entry in the data');
    }
    const { sphereEntry, hyperbola, periapsis } = found;
    if (sphereEntry === null || hyperbola === null || periapsis === null) {
      throw new Error('expected an entry');
    }
    expect(Math.abs(sphereEntry.dtS - item.entry.dtS)).toBeLessThan(TIME_S);
    for (let k = 0; k < 3; k++) {
      expect(Math.abs(sphereEntry.r[k] - item.entry.r[k])).toBeLessThan(PLACE_KM);
      // 1e-7 km/s: the pull at the sphere's edge, 5e-7 km/s², over the time's tolerance, and more
      // for rounding of two heliocentric speeds.
      expect(Math.abs(sphereEntry.v[k] - item.entry.v[k])).toBeLessThan(1e-7);
    }
    const expected = item.hyperbola;
    // The impact parameter does not move along the path: 0.01 km is sideways rounding, 1e-8 km/s
    // of 1 au's speeds over 9e5 km. Others follow by their size.
    expect(Math.abs(hyperbola.impactParameterKm - expected.impactParameterKm)).toBeLessThan(0.01);
    expect(Math.abs(hyperbola.periapsisKm - expected.periapsisKm)).toBeLessThan(0.01);
    expect(Math.abs(hyperbola.semiMajorAxisKm - expected.semiMajorAxisKm)).toBeLessThan(0.01);
    expect(Math.abs(hyperbola.eccentricity / expected.eccentricity - 1)).toBeLessThan(1e-6);
    expect(Math.abs(hyperbola.excessSpeedKmS - expected.excessSpeedKmS)).toBeLessThan(1e-7);
    expect(Math.abs(hyperbola.turnAngleRad - expected.turnAngleRad)).toBeLessThan(1e-6);
    expect(
      Math.abs(hyperbola.asymptoteTrueAnomalyRad - expected.asymptoteTrueAnomalyRad),
    ).toBeLessThan(1e-6);
    const [atS, distanceKm, speedKmS, travelTimeS] = item.periapsis;
    expect(Math.abs(periapsis.dtS - atS)).toBeLessThan(TIME_S);
    expect(Math.abs(periapsis.travelTimeS - travelTimeS)).toBeLessThan(2 * TIME_S);
    expect(Math.abs(periapsis.distanceKm - distanceKm)).toBeLessThan(0.01);
    expect(Math.abs(periapsis.speedKmS - speedKmS)).toBeLessThan(1e-5);
  });

  it.each(entered)('with the entry interface reached or not, for $name', (item) => {
    const found = run(item);
    const expected = item.interface ?? null;
    expect(found.periapsisBelowInterface).toBe(expected !== null);
    if (expected === null || found.interface === null) {
      expect(found.interface).toBe(expected);
      return;
    }
    const [atS, speedKmS, angleRad, travelTimeS] = expected;
    expect(Math.abs(found.interface.dtS - atS)).toBeLessThan(TIME_S);
    expect(Math.abs(found.interface.speedKmS - speedKmS)).toBeLessThan(1e-6);
    // 1e-5 rad: 0.01 km of the impact parameter over the interface's radius, twice over.
    expect(Math.abs(found.interface.flightPathAngleRad - angleRad)).toBeLessThan(1e-5);
    expect(Math.abs(found.interface.travelTimeS - travelTimeS)).toBeLessThan(2 * TIME_S);
  });

  it('both with and without an interface crossing, and from inside the sphere twice', () => {
    expect(entered.filter((item) => item.interface)).toHaveLength(3);
    expect(entered.filter((item) => item.name.startsWith('inside the sphere'))).toHaveLength(2);
  });
});

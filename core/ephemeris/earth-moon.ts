import { BODY_INDEX, EARTH_MOON_MASS_RATIO } from '../constants';
import { scale, subtract, type Vec3, vec3 } from '../math/vector';
import type { Ephemeris } from './ephemeris';

/** Single states from the ephemeris, and those of Earth and Moon about one another: km, km/s, ICRF. */

/** Barycentric state of a body at an instant, TDB seconds past J2000. */
export function bodyState(
  ephemeris: Ephemeris,
  body: number,
  tdbSeconds: number,
): { r: Vec3; v: Vec3 } {
  const base = Math.floor(tdbSeconds);
  const all = new Float64Array(66);
  ephemeris.states(base, tdbSeconds - base, all);
  return { r: vec3(all, body * 6), v: vec3(all, body * 6 + 3) };
}

/** The Earth's centre relative to the Earth–Moon barycentre. */
export function earthFromBarycentre(
  ephemeris: Ephemeris,
  tdbSeconds: number,
): { r: Vec3; v: Vec3 } {
  const earth = bodyState(ephemeris, BODY_INDEX.Earth, tdbSeconds);
  const moon = bodyState(ephemeris, BODY_INDEX.Moon, tdbSeconds);
  const share = 1 / (1 + EARTH_MOON_MASS_RATIO);
  return {
    r: scale(subtract(earth.r, moon.r), share),
    v: scale(subtract(earth.v, moon.v), share),
  };
}

/** Heliocentric state of the Earth–Moon barycentre. */
export function earthMoonBarycentre(
  ephemeris: Ephemeris,
  tdbSeconds: number,
): { r: Vec3; v: Vec3 } {
  const earth = bodyState(ephemeris, BODY_INDEX.Earth, tdbSeconds);
  const sun = bodyState(ephemeris, BODY_INDEX.Sun, tdbSeconds);
  const offset = earthFromBarycentre(ephemeris, tdbSeconds);
  return {
    r: subtract(subtract(earth.r, sun.r), offset.r),
    v: subtract(subtract(earth.v, sun.v), offset.v),
  };
}

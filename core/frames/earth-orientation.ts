import { DAYS_PER_JULIAN_CENTURY, SECONDS_PER_DAY } from '../constants';
import type { Mat3 } from '../math/vector';
import { epochFromTdbSeconds } from '../time/convert';
import { celestialPole } from './celestial-pole';

/** How the Earth stands among the stars: from ICRF axes to axes that turn with the ground. */

/** The Earth's orientation; each quantity is smooth enough to be interpolated between samples. */
export interface EarthOrientation {
  /** x and y of the celestial intermediate pole, unit vector in ICRF axes (small, hence radians). */
  readonly xRad: number;
  readonly yRad: number;
  /** Celestial intermediate origin's locator s. */
  readonly sRad: number;
  /** Earth rotation angle, counted on over all turns since J2000 (not reduced to one turn). */
  readonly eraRad: number;
}

const MJD_J2000 = 51544.5;
/** Earth rotation angle at J2000, turns, and turns per day of UT1. Capitaine et al. (2000). */
const ERA_TURNS_AT_J2000 = 0.779057273264;
const ERA_TURNS_PER_DAY = 1.00273781191135448;

/**
 * Orientation of the Earth by IAU 2006 precession, IAU 2000B nutation and Earth rotation angle.
 *
 * Stated assumptions: UT1 = UTC (at most 0.9 s, 420 m at the equator; by that the angle steps back
 * by 1 s of rotation at a leap second), polar motion neglected (at most 0.6″, 20 m), TT = TDB in
 * the precession and nutation (2 ms).
 *
 * @param tdbSeconds  s, TDB, past J2000
 * @returns           pole, locator and unwrapped rotation angle
 * @throws            EpochError outside the years −5900 to 9900; meant for 1900–2100
 * Accuracy: measured against ERFA's c2t06a (IAU 2006/2000A) with the same UT1 and no polar motion,
 * 1960–2060: pole 0.71 mas, locator 5 µas, rotation angle 6e-11 rad, ground point 2.4 cm at most.
 * Source: IERS Conventions (2010), chapter 5.
 */
export function earthOrientation(tdbSeconds: number): EarthOrientation {
  const pole = celestialPole(tdbSeconds / (SECONDS_PER_DAY * DAYS_PER_JULIAN_CENTURY));
  const utc = epochFromTdbSeconds(tdbSeconds, 'UTC');
  const days = utc.mjd - MJD_J2000 + utc.secondOfDay / SECONDS_PER_DAY;
  const turns = ERA_TURNS_AT_J2000 + ERA_TURNS_PER_DAY * days;
  return { xRad: pole.x, yRad: pole.y, sRad: pole.sRad, eraRad: 2 * Math.PI * turns };
}

/**
 * Rotation matrix from ICRF axes to terrestrial (ITRF) axes.
 *
 * @param o  orientation of the Earth
 * @returns  3 × 3 row-major: position in ITRF axes = matrix × geocentric position in ICRF axes
 * Accuracy: orthogonal within 4e-16.
 * Source: IERS Conventions (2010), eqs 5.5 and 5.10, R3(ERA − s) times the pole's matrix.
 */
export function celestialToTerrestrial(o: EarthOrientation): Mat3 {
  const { xRad: x, yRad: y } = o;
  const z = Math.sqrt(1 - x * x - y * y);
  const a = 1 / (1 + z);
  const c = Math.cos(o.eraRad - o.sRad);
  const s = Math.sin(o.eraRad - o.sRad);
  const xx = 1 - a * x * x;
  const xy = -a * x * y;
  const yy = 1 - a * y * y;
  return [
    c * xx + s * xy,
    c * xy + s * yy,
    -c * x - s * y,
    c * xy - s * xx,
    c * yy - s * xy,
    s * x - c * y,
    x,
    y,
    z,
  ];
}

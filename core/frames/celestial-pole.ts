import { ARCSEC_TO_RAD } from '../constants';
import { delaunayArguments } from './delaunay-arguments';
import { nutation } from './nutation';

/** Where the Earth's axis points among the stars, and the origin of right ascension on its equator. */

const polynomial = (coefficients: readonly number[], t: number): number =>
  coefficients.reduceRight((sum, coefficient) => sum * t + coefficient, 0);

/** Fukushima–Williams angles with frame bias, arcseconds. Hilton et al. (2006), IAU 2006. */
const GAMMA = [-0.052928, 10.556378, 0.4932044, -0.00031238, -0.000002788, 0.000000026];
const PHI = [84381.412819, -46.811016, 0.0511268, 0.00053289, -0.00000044, -0.0000000176];
const PSI = [-0.041775, 5038.481484, 1.5584175, -0.00018522, -0.000026452, -0.0000000148];
const EPSILON = [84381.406, -46.836769, -0.0001831, 0.0020034, -0.000000576, -0.0000000434];

/** Polynomial part of s + XY/2, arcseconds. Capitaine, Wallace & Chapront (2003), IAU 2006. */
const LOCATOR = [94e-6, 3808.65e-6, -122.68e-6, -72574.11e-6, 27.98e-6, 15.62e-6];

/**
 * Periodic part of s + XY/2, microarcseconds: the terms above 1 µas (0.03 mm on the ground).
 * Source: the same; IERS Conventions (2010), table 5.2d.
 */
function locatorTerms(t: number): number {
  const [, lp, f, d, om] = delaunayArguments(t);
  const sun = 2 * f - 2 * d;
  return (
    -2640.73 * Math.sin(om) -
    63.53 * Math.sin(2 * om) -
    11.75 * Math.sin(sun + 3 * om) -
    11.21 * Math.sin(sun + om) +
    4.57 * Math.sin(sun + 2 * om) -
    2.02 * Math.sin(2 * f + 3 * om) -
    1.98 * Math.sin(2 * f + om) +
    1.72 * Math.sin(3 * om) +
    1.41 * Math.sin(lp + om) +
    1.26 * Math.sin(lp - om) +
    t * (1.73 * Math.sin(om) + 3.57 * Math.cos(2 * om)) +
    t *
      t *
      (743.52 * Math.sin(om) +
        56.91 * Math.sin(sun + 2 * om) +
        9.84 * Math.sin(2 * f + 2 * om) -
        8.85 * Math.sin(2 * om) -
        6.38 * Math.sin(lp)) -
    t * t * t * 23.42 * Math.cos(om)
  );
}

export interface CelestialPole {
  /** x and y of the celestial intermediate pole, a unit vector in ICRF axes. */
  readonly x: number;
  readonly y: number;
  /** Celestial intermediate origin's locator, radians. */
  readonly sRad: number;
}

/**
 * Celestial intermediate pole and origin by IAU 2006 precession and IAU 2000B nutation.
 *
 * @param centuries  Julian centuries of TT past J2000
 * @returns          pole's x and y in ICRF axes, and locator s, radians
 * Accuracy: 1 mas against IAU 2006/2000A (3 cm on the ground).
 * Source: Capitaine & Wallace (2006), Astron. Astrophys. 450, 855 (X, Y of the Fukushima–Williams
 * angles); Hilton et al. (2006), Celest. Mech. Dyn. Astron. 94, 351.
 */
export function celestialPole(centuries: number): CelestialPole {
  const { longitudeRad, obliquityRad } = nutation(centuries);
  const gamma = polynomial(GAMMA, centuries) * ARCSEC_TO_RAD;
  const phi = polynomial(PHI, centuries) * ARCSEC_TO_RAD;
  const psi = polynomial(PSI, centuries) * ARCSEC_TO_RAD + longitudeRad;
  const epsilon = polynomial(EPSILON, centuries) * ARCSEC_TO_RAD + obliquityRad;
  const across = Math.sin(epsilon) * Math.sin(psi);
  const along =
    Math.sin(epsilon) * Math.cos(psi) * Math.cos(phi) - Math.cos(epsilon) * Math.sin(phi);
  const x = across * Math.cos(gamma) - along * Math.sin(gamma);
  const y = across * Math.sin(gamma) + along * Math.cos(gamma);
  const sum = polynomial(LOCATOR, centuries) + locatorTerms(centuries) * 1e-6;
  return { x, y, sRad: sum * ARCSEC_TO_RAD - (x * y) / 2 };
}

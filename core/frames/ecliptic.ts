import { ARCSEC_TO_RAD, OBLIQUITY_J2000_ARCSEC } from '../constants';
import type { Vec3 } from '../math/vector';

/** Ecliptic and equinox of J2000 against ICRF axes: one rotation about x, no frame bias. */

const COS_OBLIQUITY = Math.cos(OBLIQUITY_J2000_ARCSEC * ARCSEC_TO_RAD);
const SIN_OBLIQUITY = Math.sin(OBLIQUITY_J2000_ARCSEC * ARCSEC_TO_RAD);

/** North pole of the ecliptic of J2000, unit vector, ICRF axes. */
export const ECLIPTIC_POLE_ICRF: Vec3 = [0, -SIN_OBLIQUITY, COS_OBLIQUITY];

/**
 * Turns a vector from ecliptic axes of J2000 to ICRF axes.
 *
 * @param v  any unit, ecliptic and equinox of J2000 (3)
 * @returns  the same vector, ICRF axes (3)
 * Accuracy: rounding. The bias between the equinox of J2000 and ICRF (0.02″) is neglected, as is
 * the custom for published small-body orbits.
 * Source: obliquity 84381.448″, IAU 1976 (Lieske et al. 1977).
 */
export function eclipticToIcrf(v: Vec3): Vec3 {
  return [
    v[0],
    COS_OBLIQUITY * v[1] - SIN_OBLIQUITY * v[2],
    SIN_OBLIQUITY * v[1] + COS_OBLIQUITY * v[2],
  ];
}

/**
 * Turns a vector from ICRF axes to ecliptic axes of J2000: the inverse of `eclipticToIcrf`.
 *
 * @param v  any unit, ICRF axes (3)
 * @returns  the same vector, ecliptic and equinox of J2000 (3)
 */
export function icrfToEcliptic(v: Vec3): Vec3 {
  return [
    v[0],
    COS_OBLIQUITY * v[1] + SIN_OBLIQUITY * v[2],
    -SIN_OBLIQUITY * v[1] + COS_OBLIQUITY * v[2],
  ];
}

import { DAYS_PER_JULIAN_CENTURY, DEG_TO_RAD, SECONDS_PER_DAY } from '../constants';
import { add, cross, type Mat3, norm, scale, type Vec3 } from '../math/vector';

/** How the Moon stands among the stars, and places on it. */

/** E1 to E13: degrees at J2000 and degrees per day. Archinal et al. (2011), table 2. */
const ARGUMENTS: readonly (readonly [number, number])[] = [
  [125.045, -0.0529921],
  [250.089, -0.1059842],
  [260.008, 13.0120009],
  [176.625, 13.3407154],
  [357.529, 0.9856003],
  [311.589, 26.4057084],
  [134.963, 13.064993],
  [276.617, 0.3287146],
  [34.226, 1.7484877],
  [15.134, -0.1589763],
  [119.743, 0.0036096],
  [239.961, 0.1643573],
  [25.053, 12.9590088],
];

/** Amplitudes for E1 to E13, degrees: sine of right ascension, cosine of declination, sine of W. */
const RIGHT_ASCENSION = [
  -3.8787, -0.1204, 0.07, -0.0172, 0, 0.0072, 0, 0, 0, -0.0052, 0, 0, 0.0043,
];
const DECLINATION = [
  1.5419, 0.0239, -0.0278, 0.0068, 0, -0.0029, 0.0009, 0, 0, 0.0008, 0, 0, -0.0009,
];
const MERIDIAN = [
  3.561, 0.1208, -0.0642, 0.0158, 0.0252, -0.0066, -0.0047, -0.0046, 0.0028, 0.0052, 0.004, 0.0019,
  -0.0044,
];

/**
 * Rotation matrix from ICRF axes to the Moon's mean-Earth/polar-axis body-fixed axes.
 *
 * @param tdbSeconds  s, TDB, past J2000
 * @returns           3 × 3 row-major: body-fixed = matrix × selenocentric position in ICRF axes
 * Accuracy: about 0.005° (150 m on the surface) against the numerically integrated librations, as
 * its authors state; orthogonal within 1e-15.
 * Source: IAU/IAG WGCCRE 2009, Archinal et al. (2011), Celest. Mech. Dyn. Astron. 109, 101, table 2.
 */
export function moonBodyFixed(tdbSeconds: number): Mat3 {
  const days = tdbSeconds / SECONDS_PER_DAY;
  const centuries = days / DAYS_PER_JULIAN_CENTURY;
  let rightAscension = 269.9949 + 0.0031 * centuries;
  let declination = 66.5392 + 0.013 * centuries;
  let meridian = 38.3213 + 13.17635815 * days - 1.4e-12 * days * days;
  for (let i = 0; i < ARGUMENTS.length; i++) {
    const argument = (ARGUMENTS[i][0] + ARGUMENTS[i][1] * days) * DEG_TO_RAD;
    rightAscension += RIGHT_ASCENSION[i] * Math.sin(argument);
    declination += DECLINATION[i] * Math.cos(argument);
    meridian += MERIDIAN[i] * Math.sin(argument);
  }
  const alpha = rightAscension * DEG_TO_RAD;
  const delta = declination * DEG_TO_RAD;
  const w = (meridian % 360) * DEG_TO_RAD;
  const pole: Vec3 = [
    Math.cos(delta) * Math.cos(alpha),
    Math.cos(delta) * Math.sin(alpha),
    Math.sin(delta),
  ];
  // W is counted along the Moon's equator from its ascending node on the ICRF equator.
  const node: Vec3 = [-Math.sin(alpha), Math.cos(alpha), 0];
  const beyondNode = cross(pole, node);
  const x = add(scale(node, Math.cos(w)), scale(beyondNode, Math.sin(w)));
  const y = add(scale(node, -Math.sin(w)), scale(beyondNode, Math.cos(w)));
  return [...x, ...y, ...pole];
}

export interface Selenographic {
  /** [−π/2, π/2]. */
  readonly latitudeRad: number;
  /** (−π, π], east positive, 0 towards the mean Earth. */
  readonly longitudeRad: number;
  readonly radiusKm: number;
}

/**
 * Selenographic latitude, longitude and radius of a point.
 *
 * @param r  position, km, Moon's body-fixed axes (3)
 * @returns  place over a sphere; the centre gives zero for all three
 */
export function selenographic(r: Vec3): Selenographic {
  return {
    latitudeRad: Math.atan2(r[2], Math.hypot(r[0], r[1])),
    longitudeRad: Math.atan2(r[1], r[0]),
    radiusKm: norm(r),
  };
}

/**
 * One row of the spread along the trajectory, as consecutive doubles: the covariance of the
 * object's place (km², ICRF axes; the Earth's own place is taken as known) and what it does to the
 * distance from the Earth's centre.
 */
export const SPREAD = {
  tdbSeconds: 0,
  /** xx, xy, xz, yy, yz, zz. */
  covariance: 1,
  /** First-order standard deviation of the distance, km. */
  sigmaDistance: 7,
  /** Least and greatest distance of the 3-σ ellipsoid, km. */
  low: 8,
  high: 9,
  stride: 10,
} as const;

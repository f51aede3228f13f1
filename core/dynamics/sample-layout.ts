/**
 * One sample of the streamed trajectory, as consecutive doubles:
 * time, then position and velocity pairs (km, km/s, ICRF axes), then the Earth's orientation.
 */
export const SAMPLE = {
  tdbSeconds: 0,
  /** Object, geocentric. */
  object: 1,
  /** Earth, heliocentric. */
  earth: 7,
  /** Moon, geocentric. */
  moon: 13,
  /** Heliocentric planets. */
  mercury: 19,
  venus: 25,
  mars: 31,
  jupiter: 37,
  /** Unperturbed object: two-body motion about the Sun from the epoch, heliocentric. */
  unperturbed: 43,
  /** X, Y and s of the celestial intermediate pole (rad) and the unwrapped Earth rotation angle (rad). */
  orientation: 49,
  stride: 53,
} as const;

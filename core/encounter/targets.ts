import {
  AU_KM,
  BODY_INDEX,
  BODY_RADIUS_KM,
  EARTH_RADIUS_KM,
  ENTRY_INTERFACE_ALTITUDE_KM,
  GEOSYNCHRONOUS_RADIUS_KM,
  LOW_ORBIT_SHELL_ALTITUDE_KM,
  MOON_MEAN_DISTANCE_KM,
  SPHERE_OF_INFLUENCE_KM,
} from '../constants';

/** The bodies whose approaches are looked for, how far out, and the boundaries about each. */

export type TargetBody = 'Earth' | 'Moon' | 'Venus' | 'Mars' | 'Mercury' | 'Jupiter';

export type BoundaryName =
  | 'sphere-of-influence'
  | 'moon-distance'
  | 'geosynchronous'
  | 'low-orbit-shell'
  | 'entry-sphere'
  | 'entry-interface'
  | 'ground';

export interface Target {
  body: TargetBody;
  /** Index in the ephemeris reader's output. */
  index: number;
  /** Minima farther than this are not approaches, km. */
  limitKm: number;
  /** Spheres about the body's centre, km, from the outside in. */
  spheres: { name: BoundaryName; radiusKm: number }[];
  /** Altitudes over the WGS 84 ellipsoid, km (the Earth only). */
  altitudes: { name: BoundaryName; altitudeKm: number }[];
}

const planet = (body: TargetBody, limitAu: number): Target => ({
  body,
  index: BODY_INDEX[body],
  limitKm: limitAu * AU_KM,
  spheres: [{ name: 'ground', radiusKm: BODY_RADIUS_KM[body] }],
  altitudes: [],
});

/** Limits are our choice: wide enough to show every pass that shapes the orbit. */
export const TARGETS: readonly Target[] = [
  {
    body: 'Earth',
    index: BODY_INDEX.Earth,
    limitKm: 0.5 * AU_KM,
    spheres: [
      { name: 'sphere-of-influence', radiusKm: SPHERE_OF_INFLUENCE_KM },
      { name: 'moon-distance', radiusKm: MOON_MEAN_DISTANCE_KM },
      { name: 'geosynchronous', radiusKm: GEOSYNCHRONOUS_RADIUS_KM },
      { name: 'low-orbit-shell', radiusKm: EARTH_RADIUS_KM + LOW_ORBIT_SHELL_ALTITUDE_KM },
      { name: 'entry-sphere', radiusKm: EARTH_RADIUS_KM + ENTRY_INTERFACE_ALTITUDE_KM },
    ],
    altitudes: [
      { name: 'entry-interface', altitudeKm: ENTRY_INTERFACE_ALTITUDE_KM },
      { name: 'ground', altitudeKm: 0 },
    ],
  },
  planet('Moon', 0.02),
  planet('Venus', 0.2),
  planet('Mars', 0.2),
  planet('Mercury', 0.1),
  planet('Jupiter', 1),
];

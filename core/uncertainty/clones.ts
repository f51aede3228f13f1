import type { GmSet } from '../constants';

/** What a clone ensemble is made of: plain data that crosses threads. */

/** Everything that is needed to carry clones of one case through its span. */
export interface ClonePlan {
  gm: GmSet;
  /** Of the case, TDB seconds past J2000. */
  epochTdbSeconds: number;
  /** Where the clones are carried to, TDB seconds past J2000. */
  toTdbSeconds: number;
  /** Nominal barycentric state at the epoch, ICRF, km and km/s (6). */
  state: Float64Array;
  /** Nominal A1, A2, A3 at 1 au, km/s² (3); null when the case has none and none is uncertain. */
  forces: Float64Array | null;
  /**
   * L of P = L Lᵀ, 9 × dimension by rows: a clone's deviation (state, then A1 to A3) is L z with z
   * standard normal.
   */
  factor: Float64Array;
  dimension: number;
}

/**
 * A close approach of one clone to the Earth or the Moon, one row of `size` numbers: km, s, rad, TDB.
 *
 * NaN where it does not apply. Angles at entry are relative to the air that turns with the Earth.
 */
export const CLONE_ROW = {
  /** Number of the clone within its batch. */
  clone: 0,
  /** Index of the body, as BODY_INDEX. */
  body: 1,
  /** Of the closest approach; where the clone ends on the surface, of the periapsis it aims at. */
  tdbSeconds: 2,
  distanceKm: 3,
  speedKmS: 4,
  /** On the clone's own target plane; NaN where it is bound. */
  bDotTKm: 5,
  bDotRKm: 6,
  excessSpeedKmS: 7,
  impactRadiusKm: 8,
  /** One of CLONE_OUTCOME. */
  outcome: 9,
  /** At the geodetic altitude of 100 km, inbound. */
  entryTdbSeconds: 10,
  entryLatitudeRad: 11,
  entryLongitudeRad: 12,
  entrySpeedKmS: 13,
  entryAirSpeedKmS: 14,
  entryAirFlightPathAngleRad: 15,
  entryAirAzimuthRad: 16,
  /** Where the flight without air meets the ground (the Moon: its surface). */
  groundTdbSeconds: 17,
  groundLatitudeRad: 18,
  groundLongitudeRad: 19,
  size: 20,
} as const;

/** Impact means that the flight without air reaches the ground. */
export const CLONE_OUTCOME = { pass: 0, atmosphere: 1, impact: 2 } as const;

/** What became of a batch of clones. */
export interface CloneOutcomes {
  /** Clones carried. */
  count: number;
  /** Their approaches, CLONE_ROW.size numbers each, by clone and time. */
  rows: Float64Array;
}

/**
 * Carries a batch of clones: `dimension` standard normal numbers for each, one clone after another.
 *
 * The same batch gives the same outcomes wherever it is carried.
 */
export type CarryClones = (z: Float64Array) => Promise<CloneOutcomes>;

/**
 * What the page draws of a clone at the principal approach, one point of `size` single-precision numbers.
 */
export const CLONE_POINT = {
  clone: 0,
  bDotTKm: 1,
  bDotRKm: 2,
  /** After the nominal approach, s. */
  laterS: 3,
  distanceKm: 4,
  speedKmS: 5,
  /** One of CLONE_OUTCOME. */
  outcome: 6,
  size: 7,
} as const;

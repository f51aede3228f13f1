import type * as clones from '../../core/uncertainty/clones';

/** The layout of the clones' points; the types hold it to the core's. */

export const CLONE_POINT: typeof clones.CLONE_POINT = {
  clone: 0,
  bDotTKm: 1,
  bDotRKm: 2,
  laterS: 3,
  distanceKm: 4,
  speedKmS: 5,
  outcome: 6,
  size: 7,
};

export const CLONE_OUTCOME: typeof clones.CLONE_OUTCOME = { pass: 0, atmosphere: 1, impact: 2 };

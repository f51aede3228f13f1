import { grouped, withUnit } from '../desk/figures';
import { distanceWords, spanWords } from '../ribbon/words';
import type { CloneCloud } from '../worker/clone-cloud';
import { CLONE_OUTCOME, CLONE_POINT } from '../worker/core-values';
import { type PlaneAxes, turned } from './plane-axes';
import type { Projection } from './plane-geometry';

/** A clone of the cloud by its place in it. */
export interface PickedClone {
  drawn: 'plain' | 'rare';
  /** Where its numbers begin in the points of that set. */
  at: number;
}

const SETS = ['plain', 'rare'] as const;
const { size, bDotTKm, bDotRKm } = CLONE_POINT;

/** The clone nearest to a point of the sheet, if one is within `reachPx`. */
export function nearestClone(
  cloud: CloneCloud,
  project: Projection,
  xPx: number,
  yPx: number,
  reachPx: number,
): PickedClone | null {
  const { x0, xT, xR, y0, yT, yR } = project;
  let best: PickedClone | null = null;
  let least = reachPx * reachPx;
  for (const drawn of SETS) {
    const points = cloud.points(drawn);
    for (let i = 0; i < points.length; i += size) {
      const t = points[i + bDotTKm];
      const r = points[i + bDotRKm];
      const dx = x0 + xT * t + xR * r - xPx;
      const dy = y0 + yT * t + yR * r - yPx;
      const square = dx * dx + dy * dy;
      if (square > least || Number.isNaN(square)) continue;
      least = square;
      best = { drawn, at: i };
    }
  }
  return best;
}

/** Of a distance in the sorting key, km; what is nearer to one another keeps its order in the cloud. */
const KEY_KM = 1 / 8;
/** Above the number of points in both sets. */
const KEY_PLACES = 2 ** 17;

/** All clones that have a place on the plane, the nearest to the body's centre first. */
export function clonesByDistance(cloud: CloneCloud): PickedClone[] {
  const sets = SETS.map((drawn) => cloud.points(drawn));
  const plainEnd = sets[0].length / size;
  const keys = new Float64Array(plainEnd + sets[1].length / size);
  let count = 0;
  // Numbers alone sort ten times faster than clones by a comparison.
  sets.forEach((points, set) => {
    for (let at = 0; at < points.length; at += size) {
      const km = Math.hypot(points[at + bDotTKm], points[at + bDotRKm]);
      if (Number.isNaN(km)) continue;
      keys[count++] = Math.round(km / KEY_KM) * KEY_PLACES + set * plainEnd + at / size;
    }
  });
  return Array.from(keys.subarray(0, count).sort(), (key) => {
    const place = key % KEY_PLACES;
    return place < plainEnd
      ? { drawn: 'plain', at: place * size }
      : { drawn: 'rare', at: (place - plainEnd) * size };
  });
}

const OUTCOME_WORDS: Record<number, string> = {
  [CLONE_OUTCOME.pass]: 'passes',
  [CLONE_OUTCOME.atmosphere]: 'meets the atmosphere, not the ground',
  [CLONE_OUTCOME.impact]: 'hits',
};

/** What a clone does, as it is told beside it. */
export interface CloneFigures {
  title: string;
  outcome: string;
  rows: [label: string, figure: string][];
}

/**
 * A clone's figures, on the axes shown.
 *
 * @param turnRad from T and R to those axes, clockwise on the sheet
 */
export function cloneFigures(
  cloud: CloneCloud,
  { drawn, at }: PickedClone,
  axes: PlaneAxes,
  turnRad: number,
): CloneFigures {
  const point = cloud.points(drawn).subarray(at, at + size);
  const place = turned({ across: point[bDotTKm], down: point[bDotRKm] }, turnRad);
  const km = (value: number) => withUnit(grouped(value), 'km');
  const laterS = point[CLONE_POINT.laterS];
  const number = grouped(point[CLONE_POINT.clone]);
  return {
    title: drawn === 'plain' ? `Clone ${number}` : `Clone ${number} of the rare-event sample`,
    outcome: OUTCOME_WORDS[point[CLONE_POINT.outcome]] ?? '',
    rows: [
      [axes === 'tr' ? 'B·T' : 'ξ', km(place.across)],
      [axes === 'tr' ? 'B·R' : 'ζ', km(axes === 'tr' ? place.down : -place.down)],
      ['distance', distanceWords(point[CLONE_POINT.distanceKm])],
      ['time', `${spanWords(laterS)} ${laterS < 0 ? 'earlier' : 'later'}`],
      ['speed', withUnit(grouped(point[CLONE_POINT.speedKmS], 3), 'km/s')],
    ],
  };
}

import { withUnit } from '../desk/figures';
import {
  AU_KM,
  EARTH_RADIUS_KM,
  GEOSYNCHRONOUS_RADIUS_KM,
  MOON_MEAN_DISTANCE_KM,
  SPHERE_OF_INFLUENCE_KM,
} from '../worker/core-values';
import type { DistanceScale } from './distance-scale';
import { distanceWords } from './words';

interface DistanceTick {
  km: number;
  words: string;
}

/** Distances with a name of their own: the left-hand axis. */
const NAMED_DISTANCES: readonly DistanceTick[] = [
  { km: EARTH_RADIUS_KM, words: 'surface' },
  { km: GEOSYNCHRONOUS_RADIUS_KM, words: 'geosynchronous' },
  { km: MOON_MEAN_DISTANCE_KM, words: 'Moon' },
  { km: SPHERE_OF_INFLUENCE_KM, words: 'sphere of influence' },
  { km: 0.1 * AU_KM, words: withUnit('0.1', 'au') },
  { km: AU_KM, words: withUnit('1', 'au') },
];

/** The named distances that a ribbon reaches. */
export function namedTicks(scale: DistanceScale): DistanceTick[] {
  return NAMED_DISTANCES.filter(({ km }) => km < scale.highestKm);
}

/** Powers of ten in km: the right-hand axis. */
export function decadeTicks(scale: DistanceScale): DistanceTick[] {
  const ticks: DistanceTick[] = [];
  for (let km = 1e4; km < scale.highestKm; km *= 10) {
    const words = km < 1e6 ? distanceWords(km) : withUnit(String(km / 1e6), 'million km');
    ticks.push({ km, words });
  }
  return ticks;
}

/**
 * Moves labels apart along one axis until none is nearer to its neighbour than `gap`, as little as
 * that takes, and keeps them within the bounds.
 *
 * @param wanted places in ascending order
 * @returns      places in the same order
 */
export function spreadLabels(
  wanted: readonly number[],
  gap: number,
  lowest: number,
  highest: number,
): number[] {
  // Labels that would touch form a cluster about their common middle.
  const clusters: { sum: number; count: number }[] = [];
  const start = ({ sum, count }: { sum: number; count: number }): number => {
    const half = ((count - 1) * gap) / 2;
    return Math.min(Math.max(sum / count, lowest + half), highest - half) - half;
  };
  for (const place of wanted) {
    let cluster = { sum: place, count: 1 };
    for (let last = clusters.at(-1); last !== undefined; last = clusters.at(-1)) {
      if (start(last) + last.count * gap <= start(cluster)) break;
      cluster = { sum: last.sum + cluster.sum, count: last.count + cluster.count };
      clusters.pop();
    }
    clusters.push(cluster);
  }
  return clusters.flatMap((cluster) =>
    Array.from({ length: cluster.count }, (_, i) => start(cluster) + i * gap),
  );
}

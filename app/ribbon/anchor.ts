import type { Approach, Report } from '../../core/report/report';
import { EARTH_RADIUS_KM, SAMPLE } from '../worker/core-values';
import type { Trajectory } from '../worker/trajectory';
import type { Stretch } from './time-scale';

/** The moment that the ribbon counts from. */
export interface Anchor extends Stretch {
  /** What happens then: "closest approach", "impact". */
  words: string;
}

const SHORTEST_SCALE_S = 60;

/**
 * The principal approach as the ribbon's zero; without a report, or without an approach, the nearest
 * sample so far.
 *
 * @returns null while there is no trajectory
 */
export function anchorOf(report: Report | null, trajectory: Trajectory): Anchor | null {
  const principal =
    report === null || report.principal === null ? null : report.approaches[report.principal];
  return principal === null ? nearestSample(trajectory) : anchorOfApproach(principal);
}

/**
 * An approach's time, and its distance over its speed as the scale of the stretch. Where the path
 * ends on a surface, that moment is the zero and the body's radius the distance.
 */
export function anchorOfApproach(approach: Approach): Anchor {
  const { tdbSeconds, distanceKm, distanceRadii, speedKmS, surfaceImpact } = approach;
  const reachKm = Math.max(distanceKm, distanceKm / distanceRadii);
  return {
    centreTdbSeconds: surfaceImpact?.tdbSeconds ?? tdbSeconds,
    scaleSeconds: Math.max(reachKm / speedKmS, SHORTEST_SCALE_S),
    words: surfaceImpact === undefined ? 'closest approach' : 'impact',
  };
}

function nearestSample(trajectory: Trajectory): Anchor | null {
  if (trajectory.count < 2) return null;
  const at = SAMPLE.object;
  const norm = (index: number, offset: number): number =>
    Math.hypot(
      trajectory.valueOf(index, offset),
      trajectory.valueOf(index, offset + 1),
      trajectory.valueOf(index, offset + 2),
    );
  let best = 0;
  let nearest = Number.POSITIVE_INFINITY;
  for (let index = 0; index < trajectory.count; index++) {
    const distance = norm(index, at);
    if (distance < nearest) {
      nearest = distance;
      best = index;
    }
  }
  const reachKm = Math.max(nearest, EARTH_RADIUS_KM);
  return {
    centreTdbSeconds: trajectory.timeOf(best),
    scaleSeconds: Math.max(reachKm / norm(best, at + 3), SHORTEST_SCALE_S),
    words: 'nearest so far',
  };
}

import { SAMPLE } from '../worker/core-values';
import type { Trajectory } from '../worker/trajectory';
import type { TimeScale } from './time-scale';

/** Geocentric distances that the ribbon draws. */
export type CurveKind = 'object' | 'unperturbed' | 'moon';

/** Distance from the Earth's centre in a sample, km. */
export function distanceIn(sample: Float64Array, kind: CurveKind): number {
  if (kind !== 'unperturbed') {
    const at = kind === 'object' ? SAMPLE.object : SAMPLE.moon;
    return Math.hypot(sample[at], sample[at + 1], sample[at + 2]);
  }
  const path = SAMPLE.unperturbed;
  const earth = SAMPLE.earth;
  return Math.hypot(
    sample[path] - sample[earth],
    sample[path + 1] - sample[earth + 1],
    sample[path + 2] - sample[earth + 2],
  );
}

/**
 * A distance over the whole trajectory with at most two points for each of `slots` equal parts of
 * the ribbon. A part that holds samples gives its least and its greatest (in order of time), so no
 * minimum is lost however narrow; a part that holds none gives the interpolated value of its middle.
 *
 * @returns pairs of TDB seconds and km in order of time; empty below two samples
 */
export function distanceCurve(
  trajectory: Trajectory,
  kind: CurveKind,
  scale: TimeScale,
  slots: number,
): Float64Array {
  const { count } = trajectory;
  if (count < 2) return new Float64Array(0);
  const stride = SAMPLE.stride;
  const samples = trajectory.samples();
  const scratch = new Float64Array(stride);
  const points: number[] = [];
  let index = 0;
  for (let slot = 0; slot < slots; slot++) {
    const end = slot === slots - 1 ? Number.POSITIVE_INFINITY : (slot + 1) / slots;
    let least = -1;
    let greatest = -1;
    let leastKm = Number.POSITIVE_INFINITY;
    let greatestKm = Number.NEGATIVE_INFINITY;
    for (; index < count && scale.unitAt(samples[index * stride]) < end; index++) {
      const km = distanceIn(samples.subarray(index * stride, (index + 1) * stride), kind);
      if (km < leastKm) {
        leastKm = km;
        least = index;
      }
      if (km > greatestKm) {
        greatestKm = km;
        greatest = index;
      }
    }
    if (least < 0) {
      trajectory.at(scale.timeAt((slot + 0.5) / slots), scratch);
      points.push(scratch[SAMPLE.tdbSeconds], distanceIn(scratch, kind));
      continue;
    }
    const pair: [number, number][] = [[least, leastKm]];
    if (greatest > least) pair.push([greatest, greatestKm]);
    if (greatest < least) pair.unshift([greatest, greatestKm]);
    for (const [at, km] of pair) points.push(samples[at * stride], km);
  }
  return Float64Array.from(points);
}

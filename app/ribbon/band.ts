import { SAMPLE } from '../worker/core-values';
import { SPREAD, type Spread } from '../worker/spread';
import type { Trajectory } from '../worker/trajectory';
import { distanceIn } from './curve';

/** The range of distance that the 3-σ ellipsoid takes in, along the points of a curve. */
export interface Band {
  /** Pairs of TDB seconds and km, at the curve's own instants. */
  low: Float64Array;
  high: Float64Array;
}

/**
 * The range is interpolated as a share of the distance, so that a narrow band stays on its curve
 * however far apart the rows of the spread are.
 *
 * @param points pairs of TDB seconds and km of the object's curve
 * @returns      null with fewer than two rows
 */
export function bandAlong(
  points: Float64Array,
  spread: Spread,
  trajectory: Trajectory,
): Band | null {
  const { count, rows } = spread;
  if (count < 2) return null;
  const scratch = new Float64Array(SAMPLE.stride);
  const lows = new Float64Array(count);
  const highs = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    if (!trajectory.at(spread.timeOf(i), scratch)) return null;
    const km = distanceIn(scratch, 'object');
    lows[i] = Math.min(1, rows[i * SPREAD.stride + SPREAD.low] / km);
    highs[i] = Math.max(1, rows[i * SPREAD.stride + SPREAD.high] / km);
  }
  const low = Float64Array.from(points);
  const high = Float64Array.from(points);
  for (let k = 0; k < points.length; k += 2) {
    const i = spread.indexAt(points[k]);
    const step = spread.timeOf(i + 1) - spread.timeOf(i);
    const share = step > 0 ? Math.min(1, Math.max(0, (points[k] - spread.timeOf(i)) / step)) : 0;
    low[k + 1] *= lows[i] + share * (lows[i + 1] - lows[i]);
    high[k + 1] *= highs[i] + share * (highs[i + 1] - highs[i]);
  }
  return { low, high };
}

import { grouped, withUnit } from '../desk/figures';
import { SAMPLE } from '../worker/core-values';
import type { Trajectory } from '../worker/trajectory';
import type { Anchor } from './anchor';
import { distanceWords, momentWords, spanWords } from './words';

/** What the ribbon says about the moment on the clock. */
interface ClockReading {
  /** UTC; to the millisecond within one time scale of the passage, else to the second. */
  moment: string;
  distance: string;
  /** Rate of change of the distance. */
  rate: string;
  /** The whole in words to be spoken. */
  spoken: string;
}

const scratch = new Float64Array(SAMPLE.stride);

/**
 * The object at the clock's moment, from the streamed states.
 *
 * @returns null while there is no trajectory
 */
export function clockReading(
  trajectory: Trajectory,
  anchor: Anchor,
  tdbSeconds: number,
): ClockReading | null {
  if (!trajectory.at(tdbSeconds, scratch)) return null;
  const at = SAMPLE.object;
  const [x, y, z, vx, vy, vz] = scratch.subarray(at, at + 6);
  const km = Math.hypot(x, y, z);
  const rateKmS = (x * vx + y * vy + z * vz) / km;
  const now = scratch[SAMPLE.tdbSeconds];
  const away = now - anchor.centreTdbSeconds;
  const decimals = Math.abs(away) <= anchor.scaleSeconds && anchor.scaleSeconds < 86400 ? 3 : 0;
  const rate = grouped(rateKmS, 2);
  return {
    moment: momentWords(now, decimals),
    distance: distanceWords(km),
    rate: withUnit(rateKmS > 0 && /[1-9]/.test(rate) ? `+${rate}` : rate, 'km/s'),
    spoken: `${momentWords(now)} UTC, ${distanceWords(km)} from Earth’s centre, ${relation(away, anchor)}`,
  };
}

function relation(away: number, anchor: Anchor): string {
  if (Math.abs(away) < 0.5) return anchor.words;
  return `${spanWords(away)} ${away < 0 ? 'before' : 'after'} ${anchor.words}`;
}

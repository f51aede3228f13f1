import type { Approach } from '../../core/report/report';
import { anchorOfApproach } from '../ribbon/anchor';
import { stretchedTimeScale } from '../ribbon/time-scale';
import { timeTicks } from '../ribbon/time-ticks';
import { SAMPLE } from '../worker/core-values';
import { groundPoint, type Trajectory } from '../worker/trajectory';

/** East longitude and latitude, degrees, as GeoJSON has them. */
export type LonLat = [number, number];

export interface GroundTrack {
  fromTdbSeconds: number;
  toTdbSeconds: number;
  /** The moment the ticks count from. */
  zeroTdbSeconds: number;
  points: LonLat[];
  /** `onward` is where the track goes on to from there. */
  ticks: { at: LonLat; onward: LonLat; words: string }[];
}

/** The track ends this far from the pass where the object is inside the Moon's distance for longer. */
const LONGEST_S = 24 * 3600;
/** Where it does not come inside the Moon's distance. */
const DISTANT_S = 12 * 3600;
const POINTS = 480;
/** Least room between ticks, as a part of the track's stretched time. */
const TICK_GAP = 0.045;
/** How far along the track its direction at a tick is taken. */
const ONWARD = 0.002;

/**
 * The point of the Earth beneath the object while it is inside the Moon's distance, at most a day
 * from the pass; dense about the pass, where the point runs fastest.
 *
 * @returns null before there is a trajectory
 */
export function groundTrack(approach: Approach, trajectory: Trajectory): GroundTrack | null {
  if (trajectory.count < 2) return null;
  const anchor = anchorOfApproach(approach);
  const zero = anchor.centreTdbSeconds;
  const moon = approach.crossings.filter(({ boundary }) => boundary === 'moon-distance');
  const inward = moon.findLast((each) => each.direction === 'in' && each.tdbSeconds <= zero);
  const outward = moon.find((each) => each.direction === 'out' && each.tdbSeconds >= zero);
  const reach = moon.length > 0 ? LONGEST_S : DISTANT_S;
  const from = Math.max(
    trajectory.fromTdbSeconds,
    zero - reach,
    inward?.tdbSeconds ?? Number.NEGATIVE_INFINITY,
  );
  const to = Math.min(
    trajectory.toTdbSeconds,
    zero + reach,
    outward?.tdbSeconds ?? Number.POSITIVE_INFINITY,
  );
  const scale = stretchedTimeScale(from, to, anchor);
  const sample = new Float64Array(SAMPLE.stride);
  const at = (tdbSeconds: number): LonLat => {
    trajectory.at(tdbSeconds, sample);
    return lonLat(sample);
  };
  return {
    fromTdbSeconds: from,
    toTdbSeconds: to,
    zeroTdbSeconds: zero,
    points: Array.from({ length: POINTS + 1 }, (_, i) => at(scale.timeAt(i / POINTS))),
    ticks: timeTicks(scale, zero, true, TICK_GAP)
      .filter(({ words }) => words !== '0')
      .map(({ tdbSeconds, words }) => {
        const unit = scale.unitAt(tdbSeconds) + ONWARD;
        return { at: at(tdbSeconds), onward: at(scale.timeAt(unit)), words };
      }),
  };
}

function lonLat(sample: Float64Array): LonLat {
  const point = groundPoint(sample, SAMPLE.object);
  return [point.longitudeDeg, point.latitudeDeg];
}

/** The points beneath the object and beneath the Sun at a moment within the trajectory's span. */
interface PointsBeneath {
  tdbSeconds: number;
  object: LonLat;
  altitudeKm: number;
  sun: LonLat;
}

/** @returns null before there is a trajectory */
export function pointsBeneath(trajectory: Trajectory, tdbSeconds: number): PointsBeneath | null {
  const sample = new Float64Array(SAMPLE.stride);
  if (!trajectory.at(tdbSeconds, sample)) return null;
  const object = groundPoint(sample, SAMPLE.object);
  // The Sun from the Earth is the Earth from the Sun turned about.
  for (let k = 0; k < 3; k++) sample[SAMPLE.earth + k] *= -1;
  const sun = groundPoint(sample, SAMPLE.earth);
  return {
    tdbSeconds: sample[SAMPLE.tdbSeconds],
    object: [object.longitudeDeg, object.latitudeDeg],
    altitudeKm: object.altitudeKm,
    sun: [sun.longitudeDeg, sun.latitudeDeg],
  };
}

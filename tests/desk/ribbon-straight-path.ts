import { Trajectory } from '../../app/worker/trajectory';
import { SAMPLE } from '../../core/events';

/** An object on a straight line past the Earth's centre, so that every distance is known by hand. */
export interface StraightPath {
  missKm: number;
  speedKmS: number;
  times: readonly number[];
}

export const straightDistance = ({ missKm, speedKmS }: StraightPath, t: number): number =>
  Math.hypot(missKm, speedKmS * t);

/** Closest at time 0; the Moon stands at 384 400 km, the unperturbed path 1 000 km farther out. */
export function straightTrajectory(path: StraightPath): Trajectory {
  const samples = new Float64Array(path.times.length * SAMPLE.stride);
  path.times.forEach((t, index) => {
    const at = index * SAMPLE.stride;
    samples[at] = t;
    samples.set([path.missKm, path.speedKmS * t, 0, 0, path.speedKmS, 0], at + SAMPLE.object);
    samples.set([1.5e8, 0, 0, 0, 0, 0], at + SAMPLE.earth);
    samples.set([0, 0, 384400, 0, 0, 0], at + SAMPLE.moon);
    samples.set(
      [1.5e8 + path.missKm + 1000, path.speedKmS * t, 0, 0, path.speedKmS, 0],
      at + SAMPLE.unperturbed,
    );
  });
  const trajectory = new Trajectory();
  trajectory.append(1, samples);
  return trajectory;
}

export function evenTimes(from: number, to: number, count: number): number[] {
  return Array.from({ length: count }, (_, i) => from + ((to - from) * i) / (count - 1));
}

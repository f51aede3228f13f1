import type { Report } from '../../core/report/report';
import { norm, unit, type Vec3, vec3 } from '../worker/core-geometry';
import { SAMPLE, SPHERE_OF_INFLUENCE_KM } from '../worker/core-values';
import type { Trajectory } from '../worker/trajectory';

/** The pass that the scenes are framed for. */

export interface Encounter {
  readonly tdbSeconds: number;
  /** Distance that the Earth scene is framed for, km: that of the pass, where one is known. */
  readonly frameKm: number;
  /** Direction of motion on the way in (the incoming asymptote where there is one), ICRF axes. */
  readonly direction: Vec3;
  /** Heliocentric place of the Earth at that time, km, ICRF axes. */
  readonly earthKm: Vec3;
  /** Farthest from the Sun that the object's path comes in the span, km. */
  readonly farthestFromSunKm: number;
}

/**
 * The principal approach of the report; without one, the nearest sample so far, framed by the
 * sphere of influence so that the picture stays put while states stream in.
 *
 * @param report      of this trajectory
 * @param trajectory  with two samples at least
 */
export function encounterOf(report: Report | null, trajectory: Trajectory): Encounter {
  const principal =
    report === null || report.principal === null ? null : report.approaches[report.principal];
  const tdbSeconds = principal?.tdbSeconds ?? nearestSample(trajectory);
  const sample = new Float64Array(SAMPLE.stride);
  trajectory.at(tdbSeconds, sample);
  const passKm = principal === null ? null : norm(vec3(sample, SAMPLE.object));
  const plane = principal?.body === 'Earth' ? principal.targetPlane : null;
  return {
    tdbSeconds,
    frameKm: passKm ?? SPHERE_OF_INFLUENCE_KM / 2,
    direction: plane?.s ?? unit(vec3(sample, SAMPLE.object + 3)),
    earthKm: vec3(sample, SAMPLE.earth),
    farthestFromSunKm: farthestFromSun(trajectory),
  };
}

function nearestSample(trajectory: Trajectory): number {
  let nearest = Number.POSITIVE_INFINITY;
  let tdbSeconds = trajectory.fromTdbSeconds;
  for (let i = 0; i < trajectory.count; i++) {
    const distance = Math.hypot(
      trajectory.valueOf(i, SAMPLE.object),
      trajectory.valueOf(i, SAMPLE.object + 1),
      trajectory.valueOf(i, SAMPLE.object + 2),
    );
    if (distance >= nearest) continue;
    nearest = distance;
    tdbSeconds = trajectory.timeOf(i);
  }
  return tdbSeconds;
}

function farthestFromSun(trajectory: Trajectory): number {
  let farthest = 0;
  for (let i = 0; i < trajectory.count; i++) {
    const along = (k: number) =>
      trajectory.valueOf(i, SAMPLE.earth + k) + trajectory.valueOf(i, SAMPLE.object + k);
    farthest = Math.max(farthest, Math.hypot(along(0), along(1), along(2)));
  }
  return farthest;
}

import { formatKm, formatMoment } from './figures';
import {
  CENTRES,
  type FindingsDraft,
  finding,
  fromCentre,
  km,
  kmS,
  N_BODY,
  radii,
} from './finding';
import type { Approach, Finding } from './report';

/** A pass of the Moon this near belongs to the answer, lunar radii. */
const NEAR_MOON_RADII = 10;
/** Approaches of the Moon this close in time belong to a pass of the Earth, s. */
const SAME_PASS_S = 5 * 86400;

/** Whether an approach of the Moon is part of a pass of the Earth. */
export const isOfPass = (item: Approach, main: Approach): boolean =>
  main.body === 'Earth' &&
  item.body === 'Moon' &&
  Math.abs(item.tdbSeconds - main.tdbSeconds) < SAME_PASS_S;

/** The nearest pass of the Moon that goes with a pass of the Earth. */
export function nearMoon(draft: FindingsDraft, main: Approach): Approach | null {
  const passes = draft.approaches.filter((item) => isOfPass(item, main));
  return passes.sort((a, b) => a.distanceKm - b.distanceKm)[0] ?? null;
}

/** The pass of the Moon as a sentence of the answer; empty where it is not near. */
export const moonInAnswer = (moon: Approach | null): string =>
  moon === null || moon.distanceRadii > NEAR_MOON_RADII
    ? ''
    : ` It comes within ${formatKm(moon.distanceKm)} of ${CENTRES.Moon}, ${radii(moon)}, on ${formatMoment(moon.tdbSeconds)}.`;

export function moonFinding(moon: Approach): Finding {
  return finding(
    'moon',
    `It passes ${fromCentre(moon)}, ${radii(moon)}, on ${formatMoment(moon.tdbSeconds)}.`,
    [km('distance from the Moon’s centre', moon.distanceKm), kmS('speed', moon.speedKmS)],
    N_BODY,
    moon.tdbSeconds,
  );
}

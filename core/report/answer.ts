import {
  EARTH_RADIUS_KM,
  GEOSYNCHRONOUS_RADIUS_KM,
  LOW_ORBIT_SHELL_ALTITUDE_KM,
  MOON_MEAN_DISTANCE_KM,
} from '../constants';
import { formatDuration, formatKm, formatMoment, formatPlace, formatUtcDay } from './figures';
import { type FindingsDraft, finding, fromCentre, km, kmS, N_BODY, NAMES, radii } from './finding';
import { moonInAnswer } from './moon-pass';
import type { Approach, Finding } from './report';

/** The first finding: does it hit, how close, when, where. */

/** Nearer than this the height above the ground is what a person asks for, km. */
const HEIGHT_SAID_WITHIN_KM = 50000;

/**
 * The answer about the approach that the briefing is about.
 *
 * @param approach the principal approach
 * @param moon     the pass of the Moon that goes with it, if there is one
 */
export function answerOf(approach: Approach, moon: Approach | null): Finding {
  if (approach.outcome === 'impact') return impactAnswer(approach);
  const { distanceKm, tdbSeconds, speedKmS } = approach;
  const moment = `${formatMoment(tdbSeconds)}${giveOrTake(approach)}`;
  const figures = [km('distance from the centre', distanceKm), kmS('speed', speedKmS)];
  if (approach.outcome === 'atmosphere') {
    return finding(
      'answer',
      `Reaches the atmosphere: its lowest point is ${fromCentre(approach)}, ${height(distanceKm)}, on ${moment}. Without drag it leaves again; the air may slow it, break it up or bring it down.${moonInAnswer(moon)}`,
      figures,
      N_BODY,
      tdbSeconds,
    );
  }
  return finding(
    'answer',
    `Passes ${fromCentre(approach)}, ${radii(approach)}, on ${moment}.${howNear(approach)}${moonInAnswer(moon)}`,
    figures,
    N_BODY,
    tdbSeconds,
  );
}

function impactAnswer(approach: Approach): Finding {
  const { body, entry, surfaceImpact, crossings } = approach;
  const strikes = `On this orbit it strikes ${NAMES[body]}`;
  const touches = crossings.find((item) => item.boundary === 'ground' && item.direction === 'in');
  const at = entry ?? surfaceImpact ?? touches ?? approach;
  const point = entry ?? surfaceImpact;
  const place =
    point === undefined
      ? ''
      : `, ${body === 'Earth' ? 'over' : 'at'} ${formatPlace(point.latitudeDeg, point.longitudeDeg)}`;
  const enters = entry === undefined ? '' : ': it enters the atmosphere, 100\u2009km up,';
  return finding(
    'answer',
    `${strikes}${enters} on ${formatMoment(at.tdbSeconds)}${giveOrTake(approach)}${place}.`,
    [kmS('speed', at.speedKmS)],
    N_BODY,
    at.tdbSeconds,
  );
}

const giveOrTake = ({ uncertainty }: Approach): string =>
  uncertainty === undefined ? '' : ` ±\u2009${formatDuration(uncertainty.sigmaTimeS)} (1\u2009σ)`;

function height(distanceKm: number): string {
  const heightKm = distanceKm - EARTH_RADIUS_KM;
  return `${formatKm(Math.abs(heightKm))} ${heightKm < 0 ? 'below' : 'above'} the Earth’s equatorial radius`;
}

/** The named distances from the inside out, km. */
const DISTANCES = [
  [EARTH_RADIUS_KM + LOW_ORBIT_SHELL_ALTITUDE_KM, 'the shell of low orbits'],
  [GEOSYNCHRONOUS_RADIUS_KM, 'the geosynchronous distance'],
  [MOON_MEAN_DISTANCE_KM, 'the Moon’s mean distance'],
] as const;

/** A pass of the Earth against the distances a person knows. */
function howNear({ body, distanceKm }: Approach): string {
  const inside = DISTANCES.find(([radiusKm]) => distanceKm < radiusKm);
  if (body !== 'Earth' || inside === undefined) return '';
  const also = distanceKm < HEIGHT_SAID_WITHIN_KM ? `, ${height(distanceKm)}` : '';
  return ` That is inside ${inside[1]}${also}.`;
}

/** The answer where no approach was found: what was looked for, how far out, and when. */
export function nothingFound(draft: FindingsDraft): Finding {
  const { span, searchLimitsKm } = draft.model;
  const names: Record<string, string> = NAMES;
  const limits = Object.entries(searchLimitsKm).map(
    ([body, limitKm]) => `${names[body] ?? body} within ${formatKm(limitKm)}`,
  );
  const looked = limits.length === 0 ? '' : ` Looked for: ${limits.join(', ')}.`;
  return finding(
    'answer',
    `No approach was found from ${formatUtcDay(span.fromUtc)} to ${formatUtcDay(span.toUtc)}.${looked}`,
    [],
    N_BODY,
  );
}

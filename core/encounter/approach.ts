import { BODY_INDEX, BODY_RADIUS_KM, GM_KM3_S2, type GmSet } from '../constants';
import { ECLIPTIC_POLE_ICRF } from '../frames/ecliptic';
import { norm, subtract, type Vec3, vec3 } from '../math/vector';
import { elementsFromState } from '../orbit/elements';
import { type Hyperbola, hyperbolaFromState } from '../orbit/hyperbola';
import type { EncounterEvent } from './scan';
import { type EntryPoint, entryPoint, lunarSurfacePoint, type SurfacePoint } from './surface';
import { type TargetPlane, targetPlane } from './target-plane';
import type { TargetBody } from './targets';

/** One close approach with everything that belongs to it. */
export interface ApproachRecord {
  body: TargetBody;
  tdbSeconds: number;
  distanceKm: number;
  speedKmS: number;
  outcome: 'pass' | 'atmosphere' | 'impact';
  osculatingAt: 'closest-approach' | 'entry-sphere' | 'surface';
  /** Null when the object is bound to the body where it osculates. */
  hyperbola: Hyperbola | null;
  plane: TargetPlane | null;
  crossings: EncounterEvent[];
  /** Where its uncertainty is taken: closest approach, or for an impact where the conic osculates. */
  reference: EncounterEvent;
  /** At the entry interface (geodetic 100 km), inbound. */
  entry: { tdbSeconds: number; point: EntryPoint } | null;
  /** Where the trajectory ends on the body's surface. */
  surface: { tdbSeconds: number; point: SurfacePoint } | null;
}

/**
 * Groups the events of a trajectory into approaches.
 *
 * @param events in order of time, from `EncounterScanner`; nothing after a surface impact
 * @param gmSet  the set of gravitational parameters the trajectory was integrated with
 * @returns      approaches in order of time. A crossing inwards belongs to the next minimum of that
 *               body, one outwards to the one before. Where the trajectory ends on the surface the
 *               approach is that of the conic osculating at the entry sphere (Earth) or the surface:
 *               its time and distance are of a periapsis that is never reached.
 */
export function assembleApproaches(
  events: readonly EncounterEvent[],
  gmSet: GmSet,
): ApproachRecord[] {
  const groups: { at: EncounterEvent; impact: boolean; crossings: EncounterEvent[] }[] = [];
  for (const event of events) {
    if (event.kind === 'minimum') groups.push({ at: event, impact: false, crossings: [] });
    else if (event.boundary === 'ground' && event.direction === 'in') {
      groups.push({ at: event, impact: true, crossings: [] });
    }
  }
  for (const event of events) {
    if (event.kind !== 'crossing') continue;
    const same = groups.filter((group) => group.at.body === event.body);
    const owner =
      event.direction === 'in'
        ? (same.find((group) => group.at.tdbSeconds >= event.tdbSeconds) ?? same.at(-1))
        : (same.findLast((group) => group.at.tdbSeconds <= event.tdbSeconds) ?? same[0]);
    owner?.crossings.push(event);
  }
  return groups
    .map((group) => record(group.at, group.impact, group.crossings, gmSet))
    .sort((a, b) => a.tdbSeconds - b.tdbSeconds);
}

function record(
  at: EncounterEvent,
  impact: boolean,
  crossings: EncounterEvent[],
  gmSet: GmSet,
): ApproachRecord {
  const inbound = (name: string): EncounterEvent | undefined =>
    crossings.find((event) => event.boundary === name && event.direction === 'in');
  const sphere = inbound('entry-sphere');
  const interfaceEvent = inbound('entry-interface');
  const anchor = sphere ?? at;
  const gm = GM_KM3_S2[gmSet][at.body];
  const r = vec3(anchor.relative);
  const v = vec3(anchor.relative, 3);
  const hyperbola = hyperbolaFromState(r, v, gm);
  const closest = impact ? unreachedPeriapsis(anchor, gm) : at;
  return {
    body: at.body,
    tdbSeconds: closest.tdbSeconds,
    distanceKm: closest.distanceKm,
    speedKmS: 'speedKmS' in closest ? closest.speedKmS : norm(vec3(at.relative, 3)),
    outcome: impact ? 'impact' : interfaceEvent === undefined ? 'pass' : 'atmosphere',
    osculatingAt: sphere !== undefined ? 'entry-sphere' : impact ? 'surface' : 'closest-approach',
    hyperbola,
    plane:
      hyperbola === null
        ? null
        : targetPlane(
            r,
            v,
            hyperbola.incomingAsymptote,
            hyperbola.excessSpeedKmS,
            ECLIPTIC_POLE_ICRF,
            heliocentricVelocity(anchor, at.body),
            gm,
            BODY_RADIUS_KM[at.body],
          ),
    crossings,
    reference: impact ? anchor : at,
    entry:
      interfaceEvent === undefined
        ? null
        : {
            tdbSeconds: interfaceEvent.tdbSeconds,
            point: entryPoint(
              vec3(interfaceEvent.relative),
              vec3(interfaceEvent.relative, 3),
              interfaceEvent.tdbSeconds,
            ),
          },
    surface: impact ? surfaceOf(at) : null,
  };
}

function heliocentricVelocity(event: EncounterEvent, body: TargetBody): Vec3 {
  const of = (index: number): Vec3 => vec3(event.bodies, index * 6 + 3);
  return subtract(of(BODY_INDEX[body]), of(BODY_INDEX.Sun));
}

/** Periapsis of the conic osculating at an event: time, distance and speed there. */
function unreachedPeriapsis(
  event: EncounterEvent,
  gm: number,
): { tdbSeconds: number; distanceKm: number; speedKmS: number } {
  const r = vec3(event.relative);
  const v = vec3(event.relative, 3);
  const elements = elementsFromState(r, v, gm);
  return {
    tdbSeconds: event.tdbSeconds - elements.timeFromPeriapsisS,
    distanceKm: elements.periapsisKm,
    speedKmS: Math.sqrt((gm * (1 + elements.eccentricity)) / elements.periapsisKm),
  };
}

function surfaceOf(event: EncounterEvent): ApproachRecord['surface'] {
  const r = vec3(event.relative);
  const v = vec3(event.relative, 3);
  const tdbSeconds = event.tdbSeconds;
  if (event.body === 'Earth') {
    const point = entryPoint(r, v, tdbSeconds);
    return { tdbSeconds, point };
  }
  if (event.body === 'Moon') return { tdbSeconds, point: lunarSurfacePoint(r, v, tdbSeconds) };
  return null;
}

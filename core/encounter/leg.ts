import { GM_KM3_S2 } from '../constants';
import type { ForceModel } from '../dynamics/force-model';
import { createPropagator, type Segment } from '../dynamics/propagate';
import type { Sampler } from '../dynamics/samples';
import type { Ephemeris } from '../ephemeris';
import { type EncounterEvent, EncounterScanner } from './scan';

/** One direction of the n-body answer, from the epoch to the end of the span or a surface. */
export interface Leg {
  segments: Segment[];
  /** In order of time, within the span. */
  events: EncounterEvent[];
  /** Where it stopped, TDB seconds past J2000. */
  reachedTdbSeconds: number;
  /** The event when it ends on a surface. */
  surface: EncounterEvent | null;
  /** The body it circles, when it was stopped for circling it too often. */
  circled: EncounterEvent['body'] | null;
}

export interface LegPlan {
  model: ForceModel;
  ephemeris: Ephemeris;
  sampler: Sampler;
  direction: 1 | -1;
  /** State at the start, barycentric ICRF, km and km/s (6). */
  start: { tdbSeconds: number; state: Float64Array };
  /** The span within which events are kept and samples sent, TDB seconds past J2000. */
  keepFrom: number;
  /** Where to stop, from the events found so far. */
  goal(events: readonly EncounterEvent[]): number;
}

export interface LegHost {
  /** Awaited before each step: makes the ephemeris cover the step to come. */
  prepare(tdbSeconds: number, direction: 1 | -1): Promise<void>;
  /** A chunk of samples in the order of integration, and where the leg has come. */
  chunk(samples: Float64Array, reachedTdbSeconds: number): Promise<void>;
}

/** No step is longer, so that the ephemeris needed ahead is known. */
export const LONGEST_STEP_S = 40 * 86400;
/** Steps between two chunks; few at first so that something shows at once. */
const FIRST_CHUNK_STEPS = 6;
const CHUNK_STEPS = 40;
/** A leg with more approaches to a body that holds it is that of a satellite: it is stopped, and says so. */
const MOST_APPROACHES = 100;

/**
 * Integrates one way, scanning and sampling every step as it is accepted.
 *
 * @throws StepCollapse when the integration cannot go on; what the host throws
 */
export async function integrateLeg(plan: LegPlan, host: LegHost): Promise<Leg> {
  const { direction, sampler, start, keepFrom, goal } = plan;
  const leg: Leg = {
    segments: [],
    events: [],
    reachedTdbSeconds: start.tdbSeconds,
    surface: null,
    circled: null,
  };
  const approaches = new Map<EncounterEvent['body'], number>();
  const before = (a: number, b: number): boolean => (a - b) * direction < 0;
  if (!before(start.tdbSeconds, goal([]))) return leg;
  await host.prepare(start.tdbSeconds, direction);
  const propagator = createPropagator(plan.model, start, direction, {
    longestStepS: LONGEST_STEP_S,
  });
  const scanner = new EncounterScanner(plan.ephemeris);
  let samples: number[] = [];
  let inChunk = 0;
  let chunkSteps = FIRST_CHUNK_STEPS;
  while (
    leg.surface === null &&
    leg.circled === null &&
    before(leg.reachedTdbSeconds, goal(leg.events))
  ) {
    await host.prepare(leg.reachedTdbSeconds, direction);
    const segment = propagator.step(goal(leg.events));
    const found = scanner.scan(segment);
    leg.surface = firstSurface(found, direction);
    const reached = leg.surface?.tdbSeconds ?? segment.baseSeconds + segment.endOffset;
    for (const event of found) {
      if (!before(event.tdbSeconds, keepFrom) && !before(reached, event.tdbSeconds)) {
        leg.events.push(event);
        if (event.kind === 'minimum' && isBound(event)) {
          const count = (approaches.get(event.body) ?? 0) + 1;
          approaches.set(event.body, count);
          if (count === MOST_APPROACHES) leg.circled = event.body;
        }
      }
    }
    leg.segments.push(segment);
    leg.reachedTdbSeconds = reached;
    if (before(keepFrom, reached)) {
      const from = before(segment.baseSeconds + segment.startOffset, keepFrom)
        ? keepFrom - segment.baseSeconds
        : segment.startOffset;
      const to = reached - segment.baseSeconds;
      if (inChunk === 0 && chunkSteps === FIRST_CHUNK_STEPS) sampler.one(segment, from, samples);
      sampler.append(segment, from, to, samples);
    }
    inChunk += 1;
    if (inChunk === chunkSteps) {
      await host.chunk(Float64Array.from(samples), reached);
      samples = [];
      inChunk = 0;
      chunkSteps = CHUNK_STEPS;
    }
  }
  await host.chunk(Float64Array.from(samples), leg.reachedTdbSeconds);
  leg.events.sort((a, b) => a.tdbSeconds - b.tdbSeconds);
  return leg;
}

/** Whether the object is slower than escape from the body of an event. */
function isBound({ body, relative, distanceKm }: EncounterEvent): boolean {
  const speed = Math.hypot(relative[3], relative[4], relative[5]);
  return speed * speed < (2 * GM_KM3_S2.DE431[body]) / distanceKm;
}

/** The first meeting with a surface on the way, or null. */
function firstSurface(found: EncounterEvent[], direction: 1 | -1): EncounterEvent | null {
  const meets = (event: EncounterEvent): boolean =>
    event.boundary === 'ground' && event.direction === (direction === 1 ? 'in' : 'out');
  return (direction === 1 ? found.find(meets) : found.findLast(meets)) ?? null;
}

/**
 * Barycentric state of the object at an instant of a leg, from the dense output.
 *
 * @returns false, with `out` untouched, when the leg does not reach the instant
 */
export function stateInLeg(leg: Leg, tdbSeconds: number, out: Float64Array): boolean {
  const segment = leg.segments.find((s) => {
    const offset = tdbSeconds - s.baseSeconds;
    return (
      offset >= Math.min(s.startOffset, s.endOffset) &&
      offset <= Math.max(s.startOffset, s.endOffset)
    );
  });
  if (segment === undefined) return false;
  segment.evaluate(tdbSeconds - segment.baseSeconds, out);
  return true;
}

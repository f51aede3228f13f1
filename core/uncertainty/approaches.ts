import { BODY_INDEX, GM_KM3_S2, type GmSet } from '../constants';
import { createForceModel } from '../dynamics/force-model';
import { ForcePartials } from '../dynamics/partials';
import { PARAMETERS, TransitionMatrix } from '../dynamics/transition';
import type { ApproachRecord } from '../encounter/approach';
import type { Leg } from '../encounter/leg';
import type { EncounterEvent } from '../encounter/scan';
import { EPHEMERIS_COVERAGE, type Ephemeris } from '../ephemeris';
import { carried } from '../math/symmetric';
import { scale, subtract, type Vec3, vec3 } from '../math/vector';
import type { EpochCovariance } from './covariance';
import { discProbability } from './disc-probability';
import { SpreadRecorder } from './spread';
import { type FirstOrder, firstOrderOf } from './target-ellipse';

/** An approach's first-order uncertainty and probability of impact. */
export interface RecordUncertainty {
  firstOrder: FirstOrder;
  /** Null where there is no target plane. */
  impactProbability: number | null;
}

/** What the covariance says, at first order, along the whole trajectory. */
export interface FirstOrderAnswer {
  approaches: Map<ApproachRecord, RecordUncertainty>;
  /** Rows of SPREAD.stride doubles in order of time; null without a covariance. */
  spread: Float64Array | null;
}

/**
 * First-order uncertainty of every approach, and of the place on the way: the variational equations
 * along both legs, once, and the covariance carried to each.
 *
 * @param records    approaches, each with the event its uncertainty is taken at
 * @param legs       both directions of the integration, from the epoch
 * @param covariance of the state at the epoch and of A1 to A3 (9 × 9); null gives nothing
 */
export function uncertaintiesOf(
  records: readonly ApproachRecord[],
  legs: readonly Leg[],
  covariance: EpochCovariance | null,
  set: GmSet,
  ephemeris: Ephemeris,
): FirstOrderAnswer {
  const found = new Map<ApproachRecord, RecordUncertainty>();
  if (covariance === null) return { approaches: found, spread: null };
  const recorder = new SpreadRecorder(ephemeris, covariance.matrix);
  const before = new Float64Array(6 * PARAMETERS);
  const transition = new Float64Array(6 * PARAMETERS);
  for (const leg of legs) {
    const matrix = new TransitionMatrix(new ForcePartials(ephemeris, set));
    for (const segment of leg.segments) {
      for (const record of records) {
        const offset = record.reference.tdbSeconds - segment.baseSeconds;
        const [from, to] = [segment.startOffset, segment.endOffset];
        if (found.has(record) || (offset - from) * (offset - to) > 0) continue;
        matrix.at(segment, offset, transition);
        const own = carried(transition, covariance.matrix, PARAMETERS);
        found.set(record, uncertaintyOf(record, own, set, ephemeris));
      }
      before.set(matrix.values);
      matrix.advance(segment);
      const isLast = segment === leg.segments.at(-1);
      const end = isLast ? leg.reachedTdbSeconds - segment.baseSeconds : segment.endOffset;
      recorder.append(segment, before, matrix.values, end);
    }
  }
  return { approaches: found, spread: recorder.finish() };
}

function uncertaintyOf(
  record: ApproachRecord,
  covariance: Float64Array,
  set: GmSet,
  ephemeris: Ephemeris,
): RecordUncertainty {
  const { plane, reference } = record;
  const gm = GM_KM3_S2[set][record.body];
  const firstOrder = firstOrderOf(
    {
      kind: record.outcome === 'impact' ? 'sphere' : 'closest',
      r: vec3(reference.relative),
      v: vec3(reference.relative, 3),
      a: relativeAcceleration(reference, set, ephemeris),
      gm,
      axes: plane === null ? null : { t: plane.t, r: plane.r },
      bDotTKm: plane?.bDotTKm ?? 0,
      bDotRKm: plane?.bDotRKm ?? 0,
      distanceKm: record.distanceKm,
    },
    covariance,
  );
  return {
    firstOrder,
    impactProbability:
      plane === null || firstOrder.ellipse === null
        ? null
        : discProbability(
            [plane.bDotTKm, plane.bDotRKm],
            firstOrder.ellipse.covariance,
            plane.impactRadiusKm,
          ),
  };
}

/** Acceleration of the object relative to the body of an event, km/s², ICRF. */
function relativeAcceleration(event: EncounterEvent, set: GmSet, ephemeris: Ephemeris): Vec3 {
  const model = createForceModel(ephemeris, { gm: set, nonGravitational: null });
  const rate = new Float64Array(6);
  const bodies = new Float64Array(66);
  const base = Math.floor(event.tdbSeconds);
  model.derivative(base, event.tdbSeconds - base, event.object, rate, 0);
  const at = BODY_INDEX[event.body] * 6 + 3;
  // An event lies inside a step; a minute to either side is covered but at the very ends.
  const { fromTdbSeconds, toTdbSeconds } = EPHEMERIS_COVERAGE;
  const velocityAt = (offset: number): Vec3 => {
    const inside = Math.min(Math.max(base + offset, fromTdbSeconds), toTdbSeconds);
    ephemeris.states(base, inside - base, bodies);
    return vec3(bodies, at);
  };
  const own = scale(subtract(velocityAt(60), velocityAt(-60)), 1 / 120);
  return subtract(vec3(rate, 3), own);
}

import { epochOf, normaliseCase } from '../../core/case/normalise';
import { readCase } from '../../core/case/read';
import { BODY_INDEX } from '../../core/constants';
import { createForceModel } from '../../core/dynamics/force-model';
import { createPropagator } from '../../core/dynamics/propagate';
import { type EncounterEvent, EncounterScanner } from '../../core/encounter/scan';
import { createEphemeris, type Ephemeris, loadEphemeris } from '../../core/ephemeris';
import type { ClonePlan } from '../../core/uncertainty/clones';
import { factorOf } from '../../core/uncertainty/factor';
import { fetchPacked } from './assess';

/** A plan of clones for the text of a case, and clones integrated one by one to compare with. */

export interface PlannedClones {
  plan: ClonePlan;
  ephemeris: Ephemeris;
}

/**
 * @param text    of a case
 * @param days    length of the span from its epoch
 * @param options scale of the covariance; σ of place (km) and velocity (km/s) where the case has none
 */
export async function planClones(
  text: string,
  days: number,
  { scale = 1, sigmaKm = 100, sigmaKmS = 1e-5 } = {},
): Promise<PlannedClones> {
  const orbit = readCase(text, {}).case;
  if (orbit === null) throw new Error('the case does not read');
  const ephemeris = createEphemeris();
  const epoch = epochOf(orbit);
  const to = epoch + days * 86400;
  await loadEphemeris(ephemeris, epoch, to, fetchPacked);
  const normalised = normaliseCase(orbit, ephemeris);
  const covariance = new Float64Array(81);
  if (normalised.covariance === null) {
    for (let i = 0; i < 3; i++) covariance[i * 10] = sigmaKm ** 2;
    for (let i = 3; i < 6; i++) covariance[i * 10] = sigmaKmS ** 2;
  } else covariance.set(normalised.covariance.matrix);
  const bodies = new Float64Array(66);
  ephemeris.states(Math.floor(epoch), epoch - Math.floor(epoch), bodies);
  const state = Float64Array.from(
    [...normalised.positionKm, ...normalised.velocityKmS],
    (value, i) => value + bodies[BODY_INDEX.Sun * 6 + i],
  );
  const { factor, dimension } = factorOf(
    covariance.map((value) => value * scale * scale),
    9,
  );
  return {
    ephemeris,
    plan: {
      gm: orbit.model.gm,
      epochTdbSeconds: epoch,
      toTdbSeconds: to,
      state,
      forces: null,
      factor,
      dimension,
    },
  };
}

/** Events of one clone by the single integrator at its tight tolerance, up to the ground. */
export function integrateOne(
  { plan, ephemeris }: PlannedClones,
  z: Float64Array,
): EncounterEvent[] {
  const state = Float64Array.from(plan.state, (value, i) => {
    let sum = value;
    for (let k = 0; k < plan.dimension; k++) sum += plan.factor[i * plan.dimension + k] * z[k];
    return sum;
  });
  const propagator = createPropagator(
    createForceModel(ephemeris, { gm: plan.gm, nonGravitational: null }),
    { tdbSeconds: plan.epochTdbSeconds, state },
    1,
    { longestStepS: 40 * 86400 },
  );
  const scanner = new EncounterScanner(ephemeris);
  const events: EncounterEvent[] = [];
  let reached = plan.epochTdbSeconds;
  while (reached < plan.toTdbSeconds) {
    const segment = propagator.step(plan.toTdbSeconds);
    reached = segment.baseSeconds + segment.endOffset;
    for (const event of scanner.scan(segment)) {
      events.push(event);
      if (event.boundary === 'ground' && event.direction === 'in') return events;
    }
  }
  return events;
}

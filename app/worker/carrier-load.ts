import { createEphemeris, loadEphemeris } from '../../core/ephemeris';
import { type Carrier, createCarrier } from '../../core/uncertainty/carry';
import type { ClonePlan } from '../../core/uncertainty/clones';
import { fetchFile } from './fetch-file';

const ephemeris = createEphemeris();

/** The carrier of a plan, with the ephemeris that its span needs. */
export async function loadCarrier(plan: ClonePlan): Promise<Carrier> {
  await loadEphemeris(ephemeris, plan.epochTdbSeconds, plan.toTdbSeconds, fetchFile);
  return createCarrier(plan, ephemeris);
}

import { CLOSE_LOOK, CUSTOMARY_BREAKUP, EntrySimulator } from './entry/breakup';
import { type AirEntry, earthFixedFromEntry } from './entry/earth-fixed';
import {
  ENSEMBLE_FLIGHT,
  ENSEMBLE_WIDTH,
  flyEnsemble,
  summariseEnsemble,
} from './entry/entry-ensemble';
import { DEFAULT_FLIGHT, type FlightSample } from './entry/flight';
import { type KnownPhysical, knownBody } from './entry/known-body';
import { rounded } from './report/canonical';
import { type EntryFlight, entryFlightSection } from './report/entry-flight';

/** Half of the flights by each; one alone misses some of the recorded bursts (tests/checks). */
const MODELS = ['pancake', 'fragment cloud'] as const;
const SEED = 1;
/** More the models do not deserve, and engines could differ in. */
const DIGITS = 6;

/**
 * Flies what enters the air to its end.
 *
 * @param entries at the entry interface, likeliest or nominal first
 * @param members flights of the ensemble, half of them by each model of break-up
 * @returns       null where the size is not known or nothing enters
 */
export function fly(
  physical: KnownPhysical,
  entries: readonly AirEntry[],
  from: EntryFlight['from'],
  members: number,
): EntryFlight | null {
  const known = knownBody(physical);
  if (known === null || entries.length === 0) return null;
  const states = entries.map(earthFixedFromEntry);
  const half = Math.ceil(members / 2);
  const rows = new Float64Array(MODELS.length * half * ENSEMBLE_WIDTH);
  let skips = 0;
  for (const [i, model] of MODELS.entries()) {
    const input = {
      entries: states,
      size: known.size,
      materials: known.materials,
      model,
      seed: SEED,
      settings: ENSEMBLE_FLIGHT,
    };
    const from = i * half * ENSEMBLE_WIDTH;
    skips += flyEnsemble(input, i * half, half, rows.subarray(from, from + half * ENSEMBLE_WIDTH));
  }
  const track: FlightSample[] = [];
  const { body, strengthPa, weibullExponent } = known.customary;
  const outcome = new EntrySimulator(DEFAULT_FLIGHT, CLOSE_LOOK).run(
    states[0],
    body,
    { ...CUSTOMARY_BREAKUP, model: MODELS[0], strengthPa, strengthMassKg: null, weibullExponent },
    track,
  );
  const section = entryFlightSection({
    from,
    entries: states.length,
    known,
    summary: summariseEnsemble(rows, MODELS.length * half, skips),
    outcome,
    track,
  });
  return rounded(section, DIGITS);
}

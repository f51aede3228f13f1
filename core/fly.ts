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

const MODEL = 'fragment cloud';
const SEED = 1;
/** More the models do not deserve, and engines could differ in. */
const DIGITS = 6;

/**
 * Flies what enters the air to its end.
 *
 * @param entries at the entry interface, likeliest or nominal first
 * @param members flights of the ensemble
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
  const rows = new Float64Array(members * ENSEMBLE_WIDTH);
  const input = {
    entries: states,
    size: known.size,
    materials: known.materials,
    model: MODEL,
    seed: SEED,
    settings: ENSEMBLE_FLIGHT,
  } as const;
  const skips = flyEnsemble(input, 0, members, rows);
  const track: FlightSample[] = [];
  const { body, strengthPa, weibullExponent } = known.customary;
  const outcome = new EntrySimulator(DEFAULT_FLIGHT, CLOSE_LOOK).run(
    states[0],
    body,
    { ...CUSTOMARY_BREAKUP, model: MODEL, strengthPa, strengthMassKg: null, weibullExponent },
    track,
  );
  const section = entryFlightSection({
    from,
    entries: states.length,
    known,
    summary: summariseEnsemble(rows, members, skips),
    outcome,
    track,
  });
  return rounded(section, DIGITS);
}

import { DEG_TO_RAD } from '../constants';
import { norm, subtract, type Vec3 } from '../math/vector';
import { stateFromElements } from '../orbit/elements';
import { trueAnomalyFromMean } from '../orbit/kepler';
import { gmOfCentre } from './centre-gm';
import { type Entry, KEPLERIAN } from './opm-keywords';
import { plainNumber, problem, type RawCase, remark } from './raw';
import { CENTRES, lookUp } from './vocabulary';

/** The Keplerian block of an OPM: used when there is no state, compared with it when there is one. */

/** Relative difference of state and elements beyond which they are said to disagree. */
const AGREE = 1e-6;

export function takeKeplerian(by: ReadonlyMap<string, Entry>, raw: RawCase): void {
  const block = Object.keys(KEPLERIAN).flatMap((key) => by.get(key) ?? []);
  if (block.length === 0) return;
  if (raw.fields.has('x')) {
    compare(by, block[0], raw);
    return;
  }
  for (const { key, value, unit, line } of block) {
    raw.fields.set(KEPLERIAN[key], { text: value, unit, line, note: null });
  }
  raw.fields.set('lengthUnit', {
    text: 'km',
    unit: null,
    line: block[0].line,
    note: 'CCSDS 502.0-B fixes the unit',
  });
  tellGm(by.get('GM'), raw);
}

function ownGm(raw: RawCase): number {
  const centre = lookUp(CENTRES, raw.fields.get('centre')?.text ?? '')?.value ?? 'Sun';
  return gmOfCentre(centre, 'DE431');
}

/** Elements become a state with our own GM of the centre: another one in the block is told. */
function tellGm(entry: Entry | undefined, raw: RawCase): void {
  if (entry === undefined) return;
  const given = plainNumber(entry.value);
  if (given === null || given <= 0) {
    raw.problems.push(problem('error', entry.line, 'GM', entry.value, 'a positive number'));
    return;
  }
  const own = ownGm(raw);
  if (Math.abs(given / own - 1) <= AGREE) return;
  raw.problems.push(
    remark(
      'warning',
      entry.line,
      'GM',
      entry.value,
      `GM: the block gives ${entry.value}, the centre has ${own} km³/s² here, with which the elements are used: the speed differs by ${(50 * Math.abs(given / own - 1)).toPrecision(2)} %.`,
    ),
  );
}

function compare(by: ReadonlyMap<string, Entry>, first: Entry, raw: RawCase): void {
  const difference = differenceOf(by, raw);
  if (difference !== null && difference > AGREE) {
    raw.problems.push(
      remark(
        'warning',
        first.line,
        first.key,
        first.value,
        `State and Keplerian elements disagree by ${difference.toPrecision(2)} of distance or speed: the state is used, the elements are not.`,
      ),
    );
    return;
  }
  raw.problems.push(
    remark(
      'note',
      first.line,
      first.key,
      first.value,
      difference === null
        ? 'State and Keplerian elements are both given: the state is used. The elements could not be compared with it.'
        : 'State and Keplerian elements are both given, and agree: the state is used.',
    ),
  );
}

/** Largest relative difference of position and velocity; null when one of the two is incomplete. */
function differenceOf(by: ReadonlyMap<string, Entry>, raw: RawCase): number | null {
  const number = (key: string): number => plainNumber(by.get(key)?.value ?? '') ?? Number.NaN;
  const gm = by.has('GM') ? number('GM') : ownGm(raw);
  const a = number('SEMI_MAJOR_AXIS');
  const e = number('ECCENTRICITY');
  const semiLatusRectumKm = Math.abs(a) * Math.abs(1 - e * e);
  const r: Vec3 = [number('X'), number('Y'), number('Z')];
  const v: Vec3 = [number('X_DOT'), number('Y_DOT'), number('Z_DOT')];
  const anomalyDeg = by.has('TRUE_ANOMALY') ? number('TRUE_ANOMALY') : number('MEAN_ANOMALY');
  const all = [gm, a, e, anomalyDeg, ...r, ...v];
  if (all.some((x) => Number.isNaN(x)) || !(gm > 0 && e >= 0 && e < 1e4 && e !== 1 && a !== 0)) {
    return null;
  }
  const anomaly = anomalyDeg * DEG_TO_RAD;
  const place = {
    semiLatusRectumKm,
    eccentricity: e,
    inclinationRad: number('INCLINATION') * DEG_TO_RAD,
    nodeRad: number('RA_OF_ASC_NODE') * DEG_TO_RAD,
    argumentOfPeriapsisRad: number('ARG_OF_PERICENTER') * DEG_TO_RAD,
    trueAnomalyRad: by.has('TRUE_ANOMALY') ? anomaly : trueAnomalyFromMean(anomaly, e),
  };
  const other = stateFromElements(place, gm);
  const difference = Math.max(
    norm(subtract(other.r, r)) / norm(r),
    norm(subtract(other.v, v)) / norm(v),
  );
  return Number.isFinite(difference) ? difference : null;
}

import { tdbSecondsFromEpoch } from '../time/convert';
import type { Epoch } from '../time/epoch';
import { formatIso } from '../time/format';
import { symmetric } from '../uncertainty/covariance';
import { definite, IndefiniteCovariance } from '../uncertainty/definite';
import type { Fielding } from './fielding';
import { remark } from './raw';
import type { OrbitCase, Problem } from './types';

/** What a covariance must be before it is used: symmetric, positive semi-definite, at the state's epoch. */

type Covariance = NonNullable<OrbitCase['covariance']>;

/** Difference of two mirrored entries, in unit variances, that rounding of printed digits explains. */
const ROUNDING = 1e-6;
/** Two epochs within this are one, seconds. */
const SAME_EPOCH_S = 1e-3;

/**
 * The covariance with mirrored entries made equal; problems say what was done or why it is none.
 *
 * @returns the covariance as it is used; the problems hold an error where it may not be used
 */
export function checkCovariance(f: Fielding, given: Covariance): Covariance {
  const line = f.raw('covariance')?.line ?? null;
  const covariance = given.kind === 'elements' ? mirrored(f, given, line) : given;
  if (covariance === null) return given;
  const matrix =
    covariance.kind === 'cartesian'
      ? symmetric(covariance.lowerTriangle)
      : Float64Array.from(covariance.matrix.flat());
  try {
    const { lifted } = definite(matrix, Math.sqrt(matrix.length));
    if (lifted !== null) {
      f.note(
        line,
        'covariance',
        '',
        `The covariance was off by rounding (least eigenvalue ${lifted.toPrecision(2)} of unit variances) and was repaired.`,
      );
    }
  } catch (error) {
    if (!(error instanceof IndefiniteCovariance)) throw error;
    f.problems.push(remark('error', line, 'covariance', String(error.eigenvalue), error.message));
  }
  return covariance;
}

function mirrored(
  f: Fielding,
  covariance: Extract<Covariance, { kind: 'elements' }>,
  line: number | null,
): Covariance | null {
  const { labels, matrix } = covariance;
  let differ = 0;
  for (const [i, row] of matrix.entries()) {
    for (let j = 0; j < i; j++) {
      const difference = Math.abs(row[j] - matrix[j][i]);
      if (difference === 0) continue;
      differ += 1;
      const unit = Math.sqrt(Math.max(0, row[i] * matrix[j][j]));
      if (difference <= ROUNDING * unit) continue;
      const names = `${labels[i]} ${labels[j]}`;
      const message = `The covariance is not symmetric: its entry of ${names} is ${row[j]}, that of ${labels[j]} ${labels[i]} is ${matrix[j][i]}. Check the two.`;
      f.problems.push(remark('error', line, 'covariance', names, message));
      return null;
    }
  }
  if (differ === 0) return covariance;
  const message = `The covariance was symmetric only to rounding: ${differ} mirrored ${differ === 1 ? 'pair of entries was' : 'pairs of entries were'} replaced by the mean.`;
  f.note(line, 'covariance', '', message);
  return {
    ...covariance,
    matrix: matrix.map((row, i) => row.map((value, j) => (value + matrix[j][i]) / 2)),
  };
}

/** Why a covariance at another epoch than the state's is not used; null when it is the same. */
export function otherEpoch(state: Epoch, covariance: Epoch): Problem | null {
  const [at, own] = [state, covariance].map(tdbSecondsFromEpoch);
  if (Math.abs(at - own) <= SAME_EPOCH_S) return null;
  const [first, second] = [at, own].map((t) => `${formatIso(t, 'TDB', 3)} TDB`);
  return remark(
    'error',
    null,
    'covariance',
    second,
    `The state is at ${first}, its covariance at ${second}: a covariance is not carried to another epoch. Give both at one epoch.`,
  );
}

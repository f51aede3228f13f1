import { COVARIANCE_KEYS, type Entry } from './opm-keywords';
import { plainNumber, problem, type RawCase, remark } from './raw';
import type { CartesianCovariance } from './types';
import { AXES, lookUp } from './vocabulary';

/** The covariance block of an OPM: 21 entries of the lower triangle, in a frame of its own. */

type Frame = CartesianCovariance['frame'];

/** Turning axes (RSW_ROTATING and the like) add terms to the velocities and are not carried. */
const FRAMES: Readonly<Record<string, Frame>> = {
  RTN: 'RTN',
  RTN_INERTIAL: 'RTN',
  RSW: 'RTN',
  RSW_INERTIAL: 'RTN',
  TNW: 'TNW',
  TNW_INERTIAL: 'TNW',
  ICRF: 'ICRF',
  GCRF: 'ICRF',
  EME2000: 'ICRF',
  ECLIPJ2000: 'EclipticJ2000',
};
const DIAGONAL: readonly number[] = [0, 2, 5, 9, 14, 20];

export function takeCovariance(by: ReadonlyMap<string, Entry>, raw: RawCase): void {
  const given = COVARIANCE_KEYS.flatMap((key) => by.get(key) ?? []);
  const frameEntry = by.get('COV_REF_FRAME');
  const line = given[0]?.line ?? null;
  if (given.length === 0) {
    if (frameEntry !== undefined) {
      raw.problems.push(
        remark(
          'note',
          frameEntry.line,
          'COV_REF_FRAME',
          frameEntry.value,
          'COV_REF_FRAME stands without a covariance: there is none.',
        ),
      );
    }
    return;
  }
  if (given.length < COVARIANCE_KEYS.length) {
    const missing = COVARIANCE_KEYS.filter((key) => !by.has(key));
    raw.problems.push(
      problem(
        'error',
        line,
        'covariance',
        `${given.length} of 21 entries`,
        `all 21; missing: ${missing.slice(0, 4).join(', ')}${missing.length > 4 ? '…' : ''}`,
      ),
    );
    return;
  }
  const frame = frameOf(frameEntry, raw);
  const lowerTriangle = given.map((entry, i) => entryOf(entry, DIAGONAL.includes(i), raw));
  if (frame === null || lowerTriangle.some((value) => value === null)) return;
  raw.covariance = {
    kind: 'cartesian',
    frame,
    lowerTriangle: lowerTriangle.filter((value) => value !== null),
  };
  raw.fields.set('covariance', {
    text: frame,
    unit: null,
    line,
    note:
      frameEntry === undefined
        ? 'COV_REF_FRAME is not given: the frame of the state, as the standard has it'
        : null,
  });
}

/** The frame said, else that of the state. */
function frameOf(entry: Entry | undefined, raw: RawCase): Frame | null {
  if (entry === undefined) {
    return lookUp(AXES, raw.fields.get('axes')?.text ?? '')?.value ?? 'ICRF';
  }
  const name = entry.value.toUpperCase();
  if (Object.hasOwn(FRAMES, name)) return FRAMES[name];
  raw.problems.push(
    problem(
      'error',
      entry.line,
      'COV_REF_FRAME',
      entry.value,
      `one of ${Object.keys(FRAMES).join(', ')}`,
    ),
  );
  return null;
}

function entryOf({ key, value, line }: Entry, isVariance: boolean, raw: RawCase): number | null {
  const number = plainNumber(value);
  if (number !== null && (number >= 0 || !isVariance)) return number;
  const expected = number === null ? 'a number' : 'a variance of zero or more';
  raw.problems.push(problem('error', line, key, value, expected));
  return null;
}

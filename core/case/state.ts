import type { Fielding } from './fielding';
import { plainNumber, problem } from './raw';
import { isPlausible } from './sanity';
import type { CartesianState, Centre, FieldName, Question, Triple } from './types';
import { saidUnit, sizeOf } from './units';
import { LENGTH_UNITS, SPEED_UNITS } from './vocabulary';

/** The state of a case: six numbers with their units, or elements. */

const POSITION: FieldName[] = ['x', 'y', 'z'];
const VELOCITY: FieldName[] = ['vx', 'vy', 'vz'];
/** Units that go together when nothing is said. */
const PAIRS: [string, string][] = [
  ['km', 'km/s'],
  ['au', 'au/d'],
  ['m', 'm/s'],
  ['km', 'm/s'],
  ['au', 'km/s'],
];

/** Position and velocity in km and km/s; null with problems or a question. */
export function readState(f: Fielding, centre: Centre | null): CartesianState | null {
  const missing = [...POSITION, ...VELOCITY].filter((field) => !f.has(field));
  if (missing.length > 0) {
    const read = 6 - missing.length;
    f.problems.push(
      problem(
        'error',
        null,
        'state',
        read === 0 ? '' : `${read} of six numbers`,
        `six numbers (x, y, z, vx, vy, vz) or a set of orbital elements; missing: ${missing.join(', ')}`,
      ),
    );
    showGiven(f, [...POSITION, ...VELOCITY]);
    return null;
  }
  const r = POSITION.map((field) => plainNumber(f.textOf(field) ?? ''));
  const v = VELOCITY.map((field) => plainNumber(f.textOf(field) ?? ''));
  const finite = (list: (number | null)[]): number[] => list.map((item) => item ?? 0);
  const units = readUnits(f, centre, Math.hypot(...finite(r)), Math.hypot(...finite(v)));
  const axisNames = ['x', 'y', 'z'];
  const numbers = [
    ...POSITION.map((field, i) => f.number(field, axisNames[i], units?.length ?? null)),
    ...VELOCITY.map((field, i) => f.number(field, `v${axisNames[i]}`, units?.speed ?? null)),
  ];
  if (units === null) return null;
  const length = sizeOf(LENGTH_UNITS, units.length);
  const speed = sizeOf(SPEED_UNITS, units.speed);
  const all = numbers.filter((value) => value !== null);
  if (all.length < 6) return null;
  return {
    kind: 'cartesian',
    positionKm: all.slice(0, 3).map((value) => value * length) as Triple,
    velocityKmS: all.slice(3).map((value) => value * speed) as Triple,
  };
}

function showGiven(f: Fielding, fields: FieldName[]): void {
  for (const field of fields) {
    if (f.has(field)) f.show(field, field, f.textOf(field) ?? '', null);
  }
}

/** Units as said, else the only pair that makes a sane state; two sane pairs are asked about. */
function readUnits(
  f: Fielding,
  centre: Centre | null,
  distance: number,
  speed: number,
): { length: string; speed: string } | null {
  const said = {
    length: saidUnit(f, 'lengthUnit', 'unit of length', LENGTH_UNITS),
    speed: saidUnit(f, 'speedUnit', 'unit of speed', SPEED_UNITS),
  };
  if (said.length === undefined || said.speed === undefined) return null;
  const candidates = PAIRS.filter(
    ([length, rate]) =>
      (said.length === null || said.length === length) &&
      (said.speed === null || said.speed === rate),
  );
  if (said.length !== null && said.speed !== null) {
    candidates.splice(0, candidates.length, [said.length, said.speed]);
  } else if (candidates.length === 0) {
    candidates.push([said.length ?? 'km', said.speed ?? 'km/s']);
  }
  const sane = candidates.filter(([length, rate]) =>
    isPlausible(
      centre ?? 'Sun',
      distance * sizeOf(LENGTH_UNITS, length),
      speed * sizeOf(SPEED_UNITS, rate),
    ),
  );
  const chosen = sane[0] ?? candidates[0];
  const why =
    sane.length === 0
      ? 'the text does not say, and no usual unit makes a sane state'
      : 'the text does not say; the only usual unit that makes a sane state';
  const show = (
    field: 'lengthUnit' | 'speedUnit',
    label: string,
    value: string,
    words: typeof LENGTH_UNITS,
  ) =>
    f.show(
      field,
      label,
      value,
      null,
      f.has(field) ? null : why,
      words.map((word) => ({ value: word.value, label: word.label })),
    );
  show('lengthUnit', 'unit of length', chosen[0], LENGTH_UNITS);
  show('speedUnit', 'unit of speed', chosen[1], SPEED_UNITS);
  const asked = question(sane, said);
  if (asked !== null) {
    f.questions.push({ ...asked, line: f.raw('x')?.line ?? null });
    return null;
  }
  return { length: chosen[0], speed: chosen[1] };
}

function question(
  sane: [string, string][],
  said: { length: string | null | undefined; speed: string | null | undefined },
): Question | null {
  const field = said.length === null ? 'lengthUnit' : 'speedUnit';
  const at = field === 'lengthUnit' ? 0 : 1;
  const values = [...new Set(sane.map((pair) => pair[at]))];
  if (sane.length < 2 || (field === 'lengthUnit' && values.length < 2)) {
    return sane.length < 2 ? null : speedQuestion(sane);
  }
  return {
    field,
    line: null,
    message: `The unit of ${at === 0 ? 'length' : 'speed'} is not said, and the state makes sense in more than one. Which is meant?`,
    readings: values.map((value) => ({ value, label: value })),
  };
}

function speedQuestion(sane: [string, string][]): Question {
  return {
    field: 'speedUnit',
    line: null,
    message:
      'The unit of speed is not said, and the state makes sense in more than one. Which is meant?',
    readings: sane.map(([, value]) => ({ value, label: value })),
  };
}

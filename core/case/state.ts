import { AU_KM, SECONDS_PER_DAY } from '../constants';
import { tdbSecondsFromEpoch } from '../time/convert';
import type { Epoch } from '../time/epoch';
import type { Fielding } from './fielding';
import { plainNumber, problem } from './raw';
import { absurdity, plausibleAboutSun } from './sanity';
import type {
  CartesianState,
  Centre,
  ElementsState,
  FieldName,
  OrbitPhase,
  Question,
  Triple,
} from './types';
import { LENGTH_UNITS, lookUp, SPEED_UNITS } from './vocabulary';

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

const sizeOf = (words: typeof LENGTH_UNITS, value: string): number =>
  words.find((word) => word.value === value)?.size ?? Number.NaN;

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
    isSane(
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

/** A unit as said: null when nothing is, undefined with a problem when it is none we know. */
function saidUnit(
  f: Fielding,
  field: 'lengthUnit' | 'speedUnit',
  label: string,
  words: typeof LENGTH_UNITS,
): string | null | undefined {
  const raw = f.raw(field);
  if (raw === null || raw.text.trim() === '') return null;
  const word = lookUp(words, raw.text);
  if (word !== null) return word.value;
  f.show(
    field,
    label,
    raw.text,
    null,
    null,
    words.map(({ value, label: shown }) => ({ value, label: shown })),
  );
  f.problems.push(
    problem(
      'error',
      raw.line,
      label,
      raw.text,
      `one of ${words.map(({ value }) => value).join(', ')}`,
    ),
  );
  return undefined;
}

function isSane(centre: Centre, distanceKm: number, speedKmS: number): boolean {
  if (absurdity(centre, distanceKm, speedKmS) !== null) return false;
  if (centre === 'Sun' || centre === 'SSB') return plausibleAboutSun(distanceKm, speedKmS);
  return speedKmS > 0.005;
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

/** Elements about the centre; null with problems. */
export function readElements(
  f: Fielding,
  centre: Centre | null,
  epoch: Epoch | null,
): ElementsState | null {
  const unit = saidUnit(f, 'lengthUnit', 'unit of length', LENGTH_UNITS);
  if (unit === undefined) return null;
  const assumedUnit = centre === 'Sun' || centre === 'SSB' || centre === null ? 'au' : 'km';
  const length = unit ?? assumedUnit;
  f.show(
    'lengthUnit',
    'unit of length',
    length,
    null,
    unit === null ? 'the text does not say; usual for elements' : null,
    LENGTH_UNITS.map(({ value, label }) => ({ value, label })),
  );
  const km = sizeOf(LENGTH_UNITS, length);
  const e = f.number('eccentricity', 'eccentricity', null, { from: 0, to: 1e4 });
  const a = f.number('semiMajorAxis', 'semi-major axis', length, { optional: true });
  const q = f.number('periapsisDistance', 'periapsis distance', length, {
    optional: true,
    from: 1e-12,
  });
  const inclinationDeg = f.number('inclination', 'inclination', '°', { from: -180, to: 180 });
  const nodeDeg = f.number('node', 'longitude of the ascending node', '°');
  const argumentOfPeriapsisDeg = f.number('argumentOfPeriapsis', 'argument of periapsis', '°');
  const phase = readPhase(f, e, epoch);
  if (e === null) return null;
  const periapsis = periapsisOf(f, a, q, e);
  if (
    periapsis === null ||
    inclinationDeg === null ||
    nodeDeg === null ||
    argumentOfPeriapsisDeg === null ||
    phase === null
  ) {
    return null;
  }
  const periapsisKm = periapsis * km;
  if (centre === 'Sun' && (periapsisKm < 695700 || periapsisKm > 100 * AU_KM)) {
    const raw = f.raw('periapsisDistance') ?? f.raw('semiMajorAxis');
    f.problems.push(
      problem(
        'error',
        raw?.line ?? null,
        'periapsis distance',
        `${periapsis} ${length}`,
        'an orbit that passes outside the Sun and within 100 au of it',
        'Is the unit another one?',
      ),
    );
    return null;
  }
  return {
    kind: 'elements',
    periapsisKm,
    eccentricity: e,
    inclinationDeg,
    nodeDeg,
    argumentOfPeriapsisDeg,
    phase,
  };
}

/** Periapsis distance from a or q, in the unit given. */
function periapsisOf(f: Fielding, a: number | null, q: number | null, e: number): number | null {
  const raw = f.raw('semiMajorAxis');
  if (a === null && q === null) {
    f.problems.push(
      problem(
        'error',
        null,
        'size of the orbit',
        '',
        'a semi-major axis a or a periapsis distance q',
      ),
    );
    return null;
  }
  if (a === null || raw === null) return q;
  if (e === 1 || a === 0) {
    if (q !== null) return q;
    f.problems.push(
      problem(
        'error',
        raw.line,
        'semi-major axis',
        raw.text,
        'a periapsis distance q: a parabola has no semi-major axis',
      ),
    );
    return null;
  }
  if (e < 1 && a < 0) {
    f.problems.push(
      problem(
        'error',
        raw.line,
        'semi-major axis',
        raw.text,
        `a positive length for an eccentricity of ${e}`,
      ),
    );
    return null;
  }
  if (e > 1 && a > 0) {
    f.note(
      raw.line,
      'semi-major axis',
      raw.text,
      `semi-major axis: ${raw.text} is taken as −${raw.text}, since the orbit is a hyperbola.`,
    );
  }
  const fromA = Math.abs(a) * Math.abs(1 - e);
  if (q !== null && Math.abs(fromA - q) > 1e-6 * q) {
    f.problems.push(
      problem(
        'error',
        f.raw('periapsisDistance')?.line ?? raw.line,
        'periapsis distance',
        `q = ${q} beside a (1 − e) = ${fromA}`,
        'the same from both; leave one of a and q out',
      ),
    );
    return null;
  }
  return q ?? fromA;
}

function readPhase(f: Fielding, e: number | null, epoch: Epoch | null): OrbitPhase | null {
  const time = f.raw('periapsisTime');
  if (time !== null && time.text.trim() !== '') {
    f.show('periapsisTime', 'time of periapsis', time.text, null);
    const reading = f.epochReading('periapsisTime', time);
    if (reading === null) return null;
    const scale = reading.scale ?? epoch?.scale ?? 'TDB';
    const periapsisEpoch: Epoch = { scale, mjd: reading.mjd, secondOfDay: reading.secondOfDay };
    if (epoch !== null) {
      const years =
        Math.abs(tdbSecondsFromEpoch(epoch) - tdbSecondsFromEpoch(periapsisEpoch)) /
        (365.25 * SECONDS_PER_DAY);
      if (years > 500) {
        f.problems.push(
          problem(
            'error',
            time.line,
            'time of periapsis',
            time.text,
            'an instant within 500 years of the epoch',
          ),
        );
        return null;
      }
    }
    return { kind: 'periapsis-time', periapsisEpoch };
  }
  if (f.has('meanAnomaly')) {
    const meanAnomalyDeg = f.number('meanAnomaly', 'mean anomaly', '°', { from: -1e6, to: 1e6 });
    return meanAnomalyDeg === null ? null : { kind: 'mean-anomaly', meanAnomalyDeg };
  }
  if (f.has('trueAnomaly')) {
    const trueAnomalyDeg = f.number('trueAnomaly', 'true anomaly', '°', { from: -360, to: 360 });
    if (trueAnomalyDeg === null) return null;
    if (e !== null && 1 + e * Math.cos((trueAnomalyDeg * Math.PI) / 180) <= 0) {
      const raw = f.raw('trueAnomaly');
      f.problems.push(
        problem(
          'error',
          raw?.line ?? null,
          'true anomaly',
          raw?.text ?? '',
          `an angle inside the asymptotes for an eccentricity of ${e}`,
        ),
      );
      return null;
    }
    return { kind: 'true-anomaly', trueAnomalyDeg };
  }
  f.problems.push(
    problem(
      'error',
      null,
      'place on the orbit',
      '',
      'a mean anomaly M, a true anomaly, or a time of periapsis',
    ),
  );
  return null;
}

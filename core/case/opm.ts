import { emptyRaw, plainNumber, problem, type RawCase, remark } from './raw';
import type { CartesianCovariance, CaseFormat, FieldName } from './types';
import { AXES, CENTRES, lookUp, SCALES } from './vocabulary';

/** CCSDS Orbit Parameter Message (502.0-B-3), from its keywords, however they were written. */

export interface Entry {
  key: string;
  value: string;
  unit: string | null;
  line: number;
}

const TO_FIELD: Record<string, FieldName> = {
  OBJECT_NAME: 'name',
  OBJECT_ID: 'objectId',
  CENTER_NAME: 'centre',
  REF_FRAME: 'axes',
  TIME_SYSTEM: 'timeScale',
  EPOCH: 'epoch',
  X: 'x',
  Y: 'y',
  Z: 'z',
  X_DOT: 'vx',
  Y_DOT: 'vy',
  Z_DOT: 'vz',
};
const KEPLERIAN: Record<string, FieldName> = {
  SEMI_MAJOR_AXIS: 'semiMajorAxis',
  ECCENTRICITY: 'eccentricity',
  INCLINATION: 'inclination',
  RA_OF_ASC_NODE: 'node',
  ARG_OF_PERICENTER: 'argumentOfPeriapsis',
  TRUE_ANOMALY: 'trueAnomaly',
  MEAN_ANOMALY: 'meanAnomaly',
};
const USER_DEFINED: Record<string, FieldName> = {
  A1: 'a1',
  A2: 'a2',
  A3: 'a3',
  H: 'absoluteMagnitude',
  G: 'slopeParameter',
  DIAMETER_M: 'diameter',
  ALBEDO: 'albedo',
  DENSITY_KG_M3: 'density',
  STRENGTH_PA: 'strength',
};
const MANDATORY = [
  'CCSDS_OPM_VERS',
  'CREATION_DATE',
  'ORIGINATOR',
  'OBJECT_NAME',
  'OBJECT_ID',
  'CENTER_NAME',
  'REF_FRAME',
  'TIME_SYSTEM',
  'EPOCH',
  'X',
  'Y',
  'Z',
  'X_DOT',
  'Y_DOT',
  'Z_DOT',
];
/** What a case cannot do without; the rest of the mandatory keywords is only noted when missing. */
const ASSUMABLE = ['CENTER_NAME', 'REF_FRAME', 'TIME_SYSTEM'];
const HEADER = ['CCSDS_OPM_VERS', 'CREATION_DATE', 'ORIGINATOR', 'MESSAGE_ID', 'CLASSIFICATION'];
const SPACECRAFT = ['MASS', 'SOLAR_RAD_AREA', 'SOLAR_RAD_COEFF', 'DRAG_AREA', 'DRAG_COEFF'];
const MANEUVER = [
  'MAN_EPOCH_IGNITION',
  'MAN_DURATION',
  'MAN_DELTA_MASS',
  'MAN_REF_FRAME',
  'MAN_DV_1',
  'MAN_DV_2',
  'MAN_DV_3',
];

const AXIS = ['X', 'Y', 'Z', 'X_DOT', 'Y_DOT', 'Z_DOT'];
/** The 21 keywords of the covariance's lower triangle, by rows. */
export const COVARIANCE_KEYS = AXIS.flatMap((row, i) =>
  AXIS.slice(0, i + 1).map((column) => `C${row}_${column}`),
);
const FRAMES: Record<string, CartesianCovariance['frame']> = {
  RTN: 'RTN',
  RSW: 'RTN',
  RSW_INERTIAL: 'RTN',
  RSW_ROTATING: 'RTN',
  TNW: 'TNW',
  TNW_INERTIAL: 'TNW',
  ICRF: 'ICRF',
  GCRF: 'ICRF',
  EME2000: 'ICRF',
  ECLIPJ2000: 'EclipticJ2000',
};

const LENGTHS = ['km'];
const SPEEDS = ['km/s'];
const UNITS: Record<string, string[]> = {
  X: LENGTHS,
  Y: LENGTHS,
  Z: LENGTHS,
  X_DOT: SPEEDS,
  Y_DOT: SPEEDS,
  Z_DOT: SPEEDS,
  SEMI_MAJOR_AXIS: LENGTHS,
  INCLINATION: ['deg'],
  RA_OF_ASC_NODE: ['deg'],
  ARG_OF_PERICENTER: ['deg'],
  TRUE_ANOMALY: ['deg'],
  MEAN_ANOMALY: ['deg'],
  GM: ['km**3/s**2', 'km3/s2'],
};

/** An OPM's entries, field by field. */
export function readOpm(entries: readonly Entry[], format: CaseFormat): RawCase {
  const raw = emptyRaw(format);
  const by = new Map<string, Entry>();
  for (const entry of entries) {
    const first = by.get(entry.key);
    if (entry.key === 'COMMENT') {
      if (/\binvented\b/i.test(entry.value)) raw.invented = true;
    } else if (first !== undefined && !MANEUVER.includes(entry.key)) {
      raw.problems.push(
        problem(
          'error',
          entry.line,
          entry.key,
          entry.value,
          `the keyword once; line ${first.line} has it already`,
        ),
      );
    } else by.set(entry.key, entry);
  }
  tellMissing(by, raw);
  for (const entry of by.values()) take(entry, raw);
  // The standard fixes the units of a state.
  if (by.has('X')) {
    const line = by.get('X')?.line ?? null;
    raw.fields.set('lengthUnit', {
      text: 'km',
      unit: null,
      line,
      note: 'CCSDS 502.0-B fixes the unit',
    });
    raw.fields.set('speedUnit', {
      text: 'km/s',
      unit: null,
      line,
      note: 'CCSDS 502.0-B fixes the unit',
    });
  }
  raw.originator = by.get('ORIGINATOR')?.value ?? null;
  tellSpoken(raw);
  takeKeplerian(by, raw);
  takeCovariance(by, raw);
  const ignored = (keys: string[]): Entry | undefined =>
    keys.map((key) => by.get(key)).find((entry) => entry !== undefined);
  const craft = ignored(SPACECRAFT);
  if (craft !== undefined) {
    raw.problems.push(
      remark(
        'note',
        craft.line,
        craft.key,
        craft.value,
        'The spacecraft block was read and is not used: the object is taken as a free body.',
      ),
    );
  }
  const maneuver = ignored(MANEUVER);
  if (maneuver !== undefined) {
    raw.problems.push(
      remark(
        'warning',
        maneuver.line,
        maneuver.key,
        maneuver.value,
        'Manoeuvres were read and are not flown: the trajectory is that of a free body.',
      ),
    );
  }
  return raw;
}

function tellMissing(by: Map<string, Entry>, raw: RawCase): void {
  const hasState = ['X', 'Y', 'Z', 'X_DOT', 'Y_DOT', 'Z_DOT'].some((key) => by.has(key));
  const hasElements = by.has('SEMI_MAJOR_AXIS') && by.has('ECCENTRICITY');
  for (const key of MANDATORY) {
    if (by.has(key)) continue;
    const isState = AXIS.includes(key);
    if (isState && !hasState && hasElements) continue;
    if (isState || key === 'EPOCH') {
      raw.problems.push(problem('error', null, key, '', 'this mandatory keyword of an OPM'));
    } else if (!ASSUMABLE.includes(key)) {
      raw.problems.push(
        remark(
          'note',
          null,
          key,
          '',
          `${key} is missing; the standard asks for it, the case can do without.`,
        ),
      );
    }
  }
  const frameEpoch = by.get('REF_FRAME_EPOCH');
  if (frameEpoch !== undefined) {
    raw.problems.push(
      problem(
        'error',
        frameEpoch.line,
        'REF_FRAME_EPOCH',
        frameEpoch.value,
        'a frame without an epoch of its own',
        'Axes of date are not read; turn the state to ICRF first.',
      ),
    );
  }
}

function take(entry: Entry, raw: RawCase): void {
  const { key, value, unit, line } = entry;
  const expected = UNITS[key];
  if (unit !== null && expected !== undefined && !expected.includes(unit.toLowerCase())) {
    raw.problems.push(
      problem(
        'error',
        line,
        key,
        `${value} [${unit}]`,
        `the unit that the standard fixes, [${expected[0]}]`,
      ),
    );
  }
  const field = TO_FIELD[key];
  if (field !== undefined) {
    raw.fields.set(field, { text: value, unit, line, note: null });
    return;
  }
  if (key.startsWith('USER_DEFINED_')) {
    const own = USER_DEFINED[key.slice('USER_DEFINED_'.length)];
    if (own !== undefined) raw.fields.set(own, { text: value, unit, line, note: null });
    else {
      raw.problems.push(
        remark('note', line, key, value, `${key} is not a key of ours; it is not used.`),
      );
    }
    return;
  }
  const others = [
    ...HEADER,
    ...SPACECRAFT,
    ...MANEUVER,
    ...COVARIANCE_KEYS,
    'COV_REF_FRAME',
    'GM',
    'REF_FRAME_EPOCH',
  ];
  if (!others.includes(key) && KEPLERIAN[key] === undefined) {
    raw.problems.push(
      remark(
        'warning',
        line,
        key,
        value,
        `${key} is no keyword of an OPM (CCSDS 502.0-B-3); it is not used.`,
      ),
    );
  }
}

/** Says what names were taken for, and refuses in words those that are not carried. */
function tellSpoken(raw: RawCase): void {
  const axes = raw.fields.get('axes');
  if (axes !== undefined) {
    const word = lookUp(AXES, axes.text);
    if (word !== null && word.value === 'ICRF' && !/^ICRF$/i.test(axes.text)) {
      axes.note = `${axes.text} taken as ICRF: they differ by 0.02″ at most`;
    }
    if (word === null) {
      raw.problems.push(
        problem(
          'error',
          axes.line,
          'REF_FRAME',
          axes.text,
          'ICRF, GCRF, EME2000 or ECLIPJ2000',
          'Earth-fixed axes and axes of date are not read.',
        ),
      );
      raw.fields.delete('axes');
    }
  }
  const check = (
    field: FieldName,
    key: string,
    words: typeof CENTRES | typeof SCALES,
    expected: string,
  ): void => {
    const given = raw.fields.get(field);
    if (
      given === undefined ||
      lookUp<{ value: string; label: string; spoken: string[] }>(words, given.text) !== null
    )
      return;
    raw.problems.push(problem('error', given.line, key, given.text, expected));
    raw.fields.delete(field);
  };
  check(
    'centre',
    'CENTER_NAME',
    CENTRES,
    'SUN, SOLAR SYSTEM BARYCENTER, EARTH, EARTH BARYCENTER or MOON',
  );
  check('timeScale', 'TIME_SYSTEM', SCALES, 'TDB, TT, TAI, UTC or GPS');
}

/** The Keplerian block is used when there is no state; beside one it is only noted. */
function takeKeplerian(by: Map<string, Entry>, raw: RawCase): void {
  const block = Object.keys(KEPLERIAN).flatMap((key) => by.get(key) ?? []);
  if (block.length === 0) return;
  if (raw.fields.has('x')) {
    raw.problems.push(
      remark(
        'note',
        block[0].line,
        block[0].key,
        block[0].value,
        'State and Keplerian elements are both given: the state is used.',
      ),
    );
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
}

function takeCovariance(by: Map<string, Entry>, raw: RawCase): void {
  const given = COVARIANCE_KEYS.filter((key) => by.has(key));
  const frameEntry = by.get('COV_REF_FRAME');
  if (given.length === 0) return;
  const line = by.get(given[0])?.line ?? null;
  if (given.length < 21) {
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
  const own: Record<string, CartesianCovariance['frame']> = {
    ICRF: 'ICRF',
    EclipticJ2000: 'EclipticJ2000',
  };
  const stateAxes = lookUp(AXES, raw.fields.get('axes')?.text ?? 'ICRF')?.value ?? 'ICRF';
  const frame = frameEntry === undefined ? own[stateAxes] : FRAMES[frameEntry.value.toUpperCase()];
  if (frame === undefined) {
    raw.problems.push(
      problem(
        'error',
        frameEntry?.line ?? null,
        'COV_REF_FRAME',
        frameEntry?.value ?? '',
        `one of ${Object.keys(FRAMES).join(', ')}`,
      ),
    );
    return;
  }
  const lowerTriangle: number[] = [];
  for (const key of COVARIANCE_KEYS) {
    const entry = by.get(key);
    const value = plainNumber(entry?.value ?? '');
    if (value === null) {
      raw.problems.push(problem('error', entry?.line ?? null, key, entry?.value ?? '', 'a number'));
      return;
    }
    lowerTriangle.push(value);
  }
  for (const [i, key] of COVARIANCE_KEYS.entries()) {
    const isDiagonal = [0, 2, 5, 9, 14, 20].includes(i);
    if (isDiagonal && lowerTriangle[i] < 0) {
      raw.problems.push(
        problem(
          'error',
          by.get(key)?.line ?? null,
          key,
          String(lowerTriangle[i]),
          'a variance of zero or more',
        ),
      );
      return;
    }
  }
  raw.covariance = { kind: 'cartesian', frame, lowerTriangle };
  raw.fields.set('covariance', { text: frame, unit: null, line, note: null });
}

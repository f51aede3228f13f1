import { takeCovariance } from './opm-covariance';
import { takeKeplerian } from './opm-keplerian';
import {
  ASSUMABLE,
  AXIS,
  type Entry,
  isKeyword,
  isSameUnit,
  MANDATORY,
  MANEUVER,
  SPACECRAFT,
  TO_FIELD,
  USER_DEFINED,
  unitOf,
} from './opm-keywords';
import { emptyRaw, problem, type RawCase, remark } from './raw';
import type { CaseFormat, FieldName, Problem } from './types';
import { AXES, CENTRES, lookUp, SCALES, type Word } from './vocabulary';

/** CCSDS Orbit Parameter Message (502.0-B-3), from its keywords, however they were written. */

/** An OPM's entries, field by field. */
export function readOpm(entries: readonly Entry[], format: CaseFormat): RawCase {
  const raw = emptyRaw(format);
  const by = byKeyword(entries, raw);
  const say = (severity: Problem['severity'], keys: readonly string[], message: string): void => {
    const entry = keys.flatMap((key) => by.get(key) ?? [])[0];
    if (entry === undefined) return;
    raw.problems.push(remark(severity, entry.line, entry.key, entry.value, message));
  };
  tellMissing(by, raw);
  tellVersion(by.get('CCSDS_OPM_VERS'), raw);
  tellOrder(by, raw);
  for (const entry of by.values()) take(entry, raw);
  // The standard fixes the units of a state.
  const first = by.get('X');
  if (first !== undefined) {
    const fixed = { unit: null, line: first.line, note: 'CCSDS 502.0-B fixes the unit' };
    raw.fields.set('lengthUnit', { text: 'km', ...fixed });
    raw.fields.set('speedUnit', { text: 'km/s', ...fixed });
  }
  raw.originator = by.get('ORIGINATOR')?.value ?? null;
  tellSpoken(raw);
  takeKeplerian(by, raw);
  takeCovariance(by, raw);
  say(
    'note',
    SPACECRAFT,
    'The spacecraft block was read and is not used: the object is taken as a free body.',
  );
  say(
    'warning',
    MANEUVER,
    'Manoeuvres were read and are not flown: the trajectory is that of a free body.',
  );
  return raw;
}

function byKeyword(entries: readonly Entry[], raw: RawCase): Map<string, Entry> {
  const by = new Map<string, Entry>();
  for (const entry of entries) {
    const first = by.get(entry.key);
    if (entry.key === 'COMMENT') {
      if (/\binvented\b/i.test(entry.value)) raw.invented = true;
    } else if (first === undefined) {
      by.set(entry.key, entry);
    } else if (!MANEUVER.includes(entry.key)) {
      raw.problems.push(
        problem(
          'error',
          entry.line,
          entry.key,
          entry.value,
          `the keyword once; line ${first.line} has it already`,
        ),
      );
    }
  }
  return by;
}

function tellMissing(by: ReadonlyMap<string, Entry>, raw: RawCase): void {
  const axes: readonly string[] = AXIS;
  const hasState = axes.some((key) => by.has(key));
  const hasElements = by.has('SEMI_MAJOR_AXIS') && by.has('ECCENTRICITY');
  for (const key of MANDATORY) {
    if (by.has(key) || (axes.includes(key) && !hasState && hasElements)) continue;
    if (axes.includes(key) || key === 'EPOCH') {
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

function tellVersion(entry: Entry | undefined, raw: RawCase): void {
  if (entry === undefined || /^[123]\.0$/.test(entry.value)) return;
  raw.problems.push(
    remark(
      'warning',
      entry.line,
      entry.key,
      entry.value,
      `Version ${entry.value} of the message is not known here; it was read as version 3.0 (CCSDS 502.0-B-3).`,
    ),
  );
}

/** The standard fixes the order of keywords; another one is read all the same. */
function tellOrder(by: ReadonlyMap<string, Entry>, raw: RawCase): void {
  const present = MANDATORY.flatMap((key) => by.get(key) ?? []);
  const late = present.find((entry, i) => i > 0 && entry.line < present[i - 1].line);
  if (late === undefined) return;
  raw.problems.push(
    remark(
      'note',
      late.line,
      late.key,
      late.value,
      `${late.key} stands earlier than the standard has it; it was read all the same.`,
    ),
  );
}

function take(entry: Entry, raw: RawCase): void {
  const { key, value, unit, line } = entry;
  const expected = unitOf(key);
  if (unit !== null && expected !== null && !isSameUnit(unit, expected)) {
    raw.problems.push(
      problem(
        'error',
        line,
        key,
        `${value} [${unit}]`,
        `the unit that the standard fixes, [${expected}]`,
      ),
    );
  }
  const given = { text: value, unit, line, note: null };
  const field = Object.hasOwn(TO_FIELD, key) ? TO_FIELD[key] : undefined;
  if (field !== undefined) raw.fields.set(field, given);
  else if (key.startsWith('USER_DEFINED_')) {
    const name = key.slice('USER_DEFINED_'.length);
    if (Object.hasOwn(USER_DEFINED, name)) raw.fields.set(USER_DEFINED[name], given);
    else {
      const message = `${key} is not a key of ours; it is not used.`;
      raw.problems.push(remark('note', line, key, value, message));
    }
  } else if (!isKeyword(key)) {
    const message = `${key} is no keyword of an OPM (CCSDS 502.0-B-3); it is not used.`;
    raw.problems.push(remark('warning', line, key, value, message));
  }
}

/** Says what names were taken for, and refuses in words those that are not carried. */
function tellSpoken(raw: RawCase): void {
  const check = (
    field: FieldName,
    key: string,
    words: readonly Word<string>[],
    expected: string,
    advice = '',
  ): void => {
    const given = raw.fields.get(field);
    if (given === undefined || lookUp(words, given.text) !== null) return;
    raw.problems.push(problem('error', given.line, key, given.text, expected, advice));
    raw.fields.delete(field);
  };
  const axes = raw.fields.get('axes');
  if (axes !== undefined && lookUp(AXES, axes.text)?.value === 'ICRF') {
    if (!/^ICRF$/i.test(axes.text)) {
      axes.note = `${axes.text} taken as ICRF: they differ by 0.02″ at most`;
    }
  }
  check(
    'axes',
    'REF_FRAME',
    AXES,
    'ICRF, GCRF, EME2000 or ECLIPJ2000',
    'Earth-fixed axes and axes of date are not read.',
  );
  check(
    'centre',
    'CENTER_NAME',
    CENTRES,
    'SUN, SOLAR SYSTEM BARYCENTER, EARTH, EARTH BARYCENTER or MOON',
  );
  check('timeScale', 'TIME_SYSTEM', SCALES, 'TDB, TT, TAI, UTC or GPS');
}

import { SECONDS_PER_DAY } from '../constants';
import { formatIso } from '../time/format';
import { looksLikeCaseFile, parseCaseFile } from './case-file';
import { otherEpoch } from './covariance-checks';
import { readFreeText } from './free-text';
import { interpret } from './interpret';
import type { NumberFormat } from './number-format';
import { readOpm } from './opm';
import { readKvn } from './opm-kvn';
import { readXml } from './opm-xml';
import { emptyRaw, problem, type RawCase, remark } from './raw';
import type { Choices, FieldName, OrbitCase, Problem, ReadResult } from './types';

/**
 * Reads what was pasted or dropped: an OPM (KVN or XML), a case file, or free text.
 *
 * @param text    anything; nothing it holds makes this throw
 * @param choices fields set by hand, over what the text says
 * @returns       the case as understood with what is wrong, beside its line, and what is asked
 */
export function readCase(text: string, choices: Choices): ReadResult {
  if (text.trim() === '') {
    return { format: null, fields: [], problems: [], questions: [], case: null };
  }
  if (looksLikeCaseFile(text)) return readFile(text, choices);
  const result = interpret(rawOf(text, choices), choices);
  return { ...result, problems: firstOf(result.problems) };
}

/** More than this no one reads; a page of something else would give thousands. */
const MOST_PROBLEMS = 60;

function firstOf(problems: Problem[]): Problem[] {
  if (problems.length <= MOST_PROBLEMS) return problems;
  const rest = problems.length - MOST_PROBLEMS;
  const message = `${rest} more problems are not shown.`;
  return [...problems.slice(0, MOST_PROBLEMS), remark('error', null, 'text', '', message)];
}

function rawOf(text: string, choices: Choices): RawCase {
  if (/^\s*(?:<\?xml|<!--|<\w+:?(?:ndm|opm)\b|<(?:ndm|opm)\b)/.test(text)) {
    const { entries, problems } = readXml(text);
    return withProblems(readOpm(entries, 'opm-xml'), problems, entries.length > 0);
  }
  if (
    /^[ \t\uFEFF]*CCSDS_O[A-Z]M_VERS[ \t]*=/im.test(text) ||
    /^[ \t\uFEFF]*(?:CENTER_NAME|REF_FRAME|X_DOT)[ \t]*=/m.test(text)
  ) {
    const other = /^[ \t\uFEFF]*CCSDS_(OEM|OMM|OCM)_VERS/im.exec(text);
    if (other !== null) {
      const raw = emptyRaw('opm-kvn');
      raw.problems.push(
        problem(
          'error',
          1,
          'message',
          `CCSDS_${other[1]}_VERS`,
          'an Orbit Parameter Message (CCSDS_OPM_VERS): one state at one epoch',
        ),
      );
      return raw;
    }
    const { entries, problems } = readKvn(text);
    return withProblems(readOpm(entries, 'opm-kvn'), problems, true);
  }
  const format = choices.numberFormat;
  return readFreeText(
    text,
    format === 'point' || format === 'comma' ? (format as NumberFormat) : null,
  );
}

/** Puts problems of the form before those of the content; a text that is not one has only the first. */
function withProblems(raw: RawCase, first: RawCase['problems'], readable: boolean): RawCase {
  const broken = first.some((item) => item.severity === 'error');
  raw.problems = broken && !readable ? first : [...first, ...raw.problems];
  return raw;
}

/** A case file: its text is read again with what was set by hand; without one its case stands. */
function readFile(text: string, choices: Choices): ReadResult {
  const { file, issue } = parseCaseFile(text);
  if (file === null) {
    return {
      format: 'case-file',
      fields: [],
      problems: [
        problem(
          'error',
          issue.line,
          `case file, ${issue.path}`,
          issue.message,
          'a case file as its schema describes (schema/case.schema.json)',
        ),
      ],
      questions: [],
      case: null,
    };
  }
  if (file.text.trim() !== '' && !looksLikeCaseFile(file.text)) {
    const result = readCase(file.text, { ...file.choices, ...choices });
    return { ...result, format: 'case-file' };
  }
  const raw = rawOfCase(file.case);
  const { epoch, covariance, covarianceEpoch } = file.case;
  const other =
    covariance === null || covarianceEpoch === undefined
      ? null
      : otherEpoch(epoch, covarianceEpoch);
  if (other !== null) raw.problems.push(other);
  const result = interpret(raw, choices);
  return { ...result, format: 'case-file' };
}

/** A case back into raw fields, so that it is shown, edited and checked as any other. */
function rawOfCase(orbit: OrbitCase): RawCase {
  const raw = emptyRaw('case-file');
  raw.covariance = orbit.covariance;
  raw.originator = orbit.originator;
  raw.invented = orbit.invented;
  const set = (field: FieldName, value: number | string | null | undefined): void => {
    if (value === null || value === undefined) return;
    raw.fields.set(field, { text: String(value), unit: null, line: null, note: null });
  };
  const { epoch, state, physical } = orbit;
  set('name', orbit.name);
  set('objectId', orbit.objectId);
  set('epoch', `MJD ${epochText(epoch.mjd, epoch.secondOfDay)}`);
  set('timeScale', epoch.scale);
  set('centre', orbit.centre);
  set('axes', orbit.axes);
  set('lengthUnit', 'km');
  if (state.kind === 'cartesian') {
    set('speedUnit', 'km/s');
    for (const [i, field] of (['x', 'y', 'z'] as const).entries()) set(field, state.positionKm[i]);
    for (const [i, field] of (['vx', 'vy', 'vz'] as const).entries()) {
      set(field, state.velocityKmS[i]);
    }
  } else {
    set('periapsisDistance', state.periapsisKm);
    set('eccentricity', state.eccentricity);
    set('inclination', state.inclinationDeg);
    set('node', state.nodeDeg);
    set('argumentOfPeriapsis', state.argumentOfPeriapsisDeg);
    if (state.phase.kind === 'mean-anomaly') set('meanAnomaly', state.phase.meanAnomalyDeg);
    if (state.phase.kind === 'true-anomaly') set('trueAnomaly', state.phase.trueAnomalyDeg);
    if (state.phase.kind === 'periapsis-time') {
      const { mjd, secondOfDay, scale } = state.phase.periapsisEpoch;
      set('periapsisTime', `MJD ${epochText(mjd, secondOfDay)} ${scale}`);
    }
  }
  set('a1', orbit.nonGravitational?.a1AuD2);
  set('a2', orbit.nonGravitational?.a2AuD2);
  set('a3', orbit.nonGravitational?.a3AuD2);
  set('absoluteMagnitude', physical.absoluteMagnitude);
  set('slopeParameter', physical.slopeParameter);
  set('diameter', physical.diameterM);
  set('albedo', physical.albedo);
  set('density', physical.densityKgM3);
  set('strength', physical.strengthPa);
  set('gm', orbit.model.gm);
  if (orbit.span !== null) {
    set('spanFrom', `${formatIso(orbit.span.fromTdbSeconds, 'TDB', 6)} TDB`);
    set('spanTo', `${formatIso(orbit.span.toTdbSeconds, 'TDB', 6)} TDB`);
  }
  return raw;
}

/** A modified Julian date with all its digits: the reader takes the fraction as a decimal. */
function epochText(mjd: number, secondOfDay: number): string {
  return `${mjd}${(secondOfDay / SECONDS_PER_DAY).toFixed(16).slice(1)}`;
}

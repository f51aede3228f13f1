import type { CaseFormat, FieldName, OrbitCase, Problem, Question } from './types';

/** What a text says, field by field, before anything is made of it. */

export interface Raw {
  /** A number in plain form (decimal point, no grouping), or words. */
  text: string;
  /** The unit as written beside it, or null. */
  unit: string | null;
  line: number | null;
  /** What was made of what was read. */
  note: string | null;
}

/** A standard deviation as written. */
export interface RawDeviation {
  text: string;
  /** By its name in deviation-units; null when none is said. */
  unit: string | null;
  /** How many σ it is: 3 behind "3-sigma". */
  times: number;
  line: number;
}

export interface RawCase {
  format: CaseFormat;
  fields: Map<FieldName, Raw>;
  covariance: OrbitCase['covariance'];
  /** Standard deviations beside the values. */
  deviations: Map<FieldName, RawDeviation>;
  /** Those behind values without a label, in their order. */
  deviationRow: (RawDeviation & { velocity: boolean })[];
  originator: string | null;
  invented: boolean;
  problems: Problem[];
  questions: Question[];
}

export const emptyRaw = (format: CaseFormat): RawCase => ({
  format,
  fields: new Map(),
  covariance: null,
  deviations: new Map(),
  deviationRow: [],
  originator: null,
  invented: false,
  problems: [],
  questions: [],
});

/** A problem with its sentence: "X: read “…”, expected …". */
export function problem(
  severity: Problem['severity'],
  line: number | null,
  field: string,
  read: string,
  expected: string,
  advice = '',
): Problem {
  const message = `${field}: read ${read === '' ? 'nothing' : `“${shorten(read)}”`}; expected ${expected}.${advice === '' ? '' : ` ${advice}`}`;
  return { severity, line, field, read, expected, message };
}

/** Something worth knowing, in words of its own. */
export function remark(
  severity: Problem['severity'],
  line: number | null,
  field: string,
  read: string,
  message: string,
): Problem {
  return { severity, line, field, read, expected: '', message };
}

const shorten = (text: string): string => (text.length > 80 ? `${text.slice(0, 77)}…` : text);

/** A number in plain form, or null. */
export function plainNumber(text: string): number | null {
  const clean = tidyNumber(text);
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(clean)) return null;
  const value = Number(clean);
  return Number.isFinite(value) ? value : null;
}

/** Typographic signs, digit grouping by blanks and apostrophes, and Fortran exponents made plain. */
export function tidyNumber(text: string): string {
  return text
    .trim()
    .replace(/[\u2212\u2013]/g, '-')
    .replace(/(?<=\d)[\u2009\u202f\u00a0'’_](?=\d)/g, '')
    .replace(/(?<=[\d.])[dD](?=[+-]?\d)/, 'e');
}

import { AU_KM, SECONDS_PER_DAY } from '../constants';
import { findEpochs } from './epoch-finder';
import { LABELS, type Label } from './labels';
import { blank, type Line } from './line';
import { NUMBER_TOKEN, type NumberFormat, readToken } from './number-format';
import { problem, type RawCase } from './raw';
import type { FieldName } from './types';

/** Labelled values: "X = 1.5", "e 0.2", "Tp: 2031 May 3.2". */

export const ANGLES: readonly FieldName[] = [
  'inclination',
  'node',
  'argumentOfPeriapsis',
  'meanAnomaly',
  'trueAnomaly',
];

interface Found {
  text: string;
  unit: string | null;
  /** Characters taken. */
  length: number;
  note: string | null;
}

/** Takes the values of the labels of one kind; a second value that differs is an error. */
export function takeLabels(
  lines: Line[],
  raw: RawCase,
  format: NumberFormat,
  kind: Label['kind'],
): void {
  for (const line of lines) {
    for (const label of LABELS) {
      if (label.kind !== kind) continue;
      for (const match of line.text.matchAll(label.pattern)) {
        const head = match[0];
        const at = match.index;
        const rest = line.text.slice(at + head.length);
        const found = kind === 'epoch' ? epochAt(rest) : numberAt(rest, format, label.field, head);
        if (found === null) continue;
        blank(line, at, head.length + found.length);
        if (label.field !== null) keep(raw, label.field, found, line.number, head);
      }
    }
  }
}

function keep(raw: RawCase, field: FieldName, found: Found, line: number, head: string): void {
  const before = raw.fields.get(field);
  const { text, unit, note } = found;
  if (before === undefined) raw.fields.set(field, { text, unit, line, note });
  else if (before.text !== text) {
    raw.problems.push(
      problem(
        'error',
        line,
        field,
        `${head.trim()} ${text}`,
        `one value; line ${before.line} gives another`,
      ),
    );
  }
}

const UNIT_BEHIND =
  /^\s*[[(]?\s*(deg(?:rees?)?|°|rad(?:ians?)?|km|m|au|AU|Pa|kPa|MPa|kg\/m\^?[3³]|g\/cm\^?[3³]|mag|au\/d(?:ay)?(?:\^|\*\*)?[2²]|(?:km|m)\/s(?:\^|\*\*)?[2²])(?![\p{L}/])\s*[\])]?/u;
const UNIT_BEFORE = /[[(]\s*(km|m|deg|rad|au|AU|kPa|MPa)\s*[\])]/;

/** The number that a label's rest begins with, with a unit behind it. */
function numberAt(
  rest: string,
  format: NumberFormat,
  field: FieldName | null,
  head: string,
): Found | null {
  const lead = /^\s*/.exec(rest)?.[0].length ?? 0;
  const match = rest.slice(lead).match(NUMBER_TOKEN);
  if (match === null || !rest.slice(lead).startsWith(match[0])) return null;
  // A comma at the end parts; what follows it is not this label's.
  const token = match[0].replace(/[.,]+$/, '');
  const numbers = readToken(token, format);
  if (numbers === null || numbers.length !== 1) return null;
  const unit = UNIT_BEHIND.exec(rest.slice(lead + token.length));
  const name = unit?.[1] ?? UNIT_BEFORE.exec(head)?.[1] ?? null;
  const { text, note } = carried(numbers[0], name, field);
  return { text, unit: name, length: lead + token.length + (unit?.[0].length ?? 0), note };
}

const AU_D2_OF_KM_S2 = SECONDS_PER_DAY ** 2 / AU_KM;

/** What a unit is in the one that its field has; null when nothing is to be done. */
function factorOf(unit: string, field: FieldName): { by: number; to: string } | null {
  if (ANGLES.includes(field) && unit.startsWith('rad')) return { by: 180 / Math.PI, to: 'degrees' };
  if (field === 'diameter' && unit === 'km') return { by: 1000, to: 'm' };
  if (field === 'density' && unit.startsWith('g/')) return { by: 1000, to: 'kg/m³' };
  if (field === 'strength' && unit === 'kPa') return { by: 1e3, to: 'Pa' };
  if (field === 'strength' && unit === 'MPa') return { by: 1e6, to: 'Pa' };
  if ((field === 'a1' || field === 'a2' || field === 'a3') && /^k?m\//.test(unit)) {
    return { by: (unit.startsWith('k') ? 1 : 1e-3) * AU_D2_OF_KM_S2, to: 'au/d²' };
  }
  return null;
}

/** Values whose field has one unit are carried to it; what was done is noted. */
export function carried(
  text: string,
  unit: string | null,
  field: FieldName | null,
): { text: string; note: string | null } {
  const factor = unit === null || field === null ? null : factorOf(unit, field);
  if (factor === null) return { text, note: null };
  return {
    text: String(Number(text) * factor.by),
    note: `read as ${text} ${unit}, carried to ${factor.to}`,
  };
}

function epochAt(rest: string): Found | null {
  const first = findEpochs(rest)[0];
  if (first === undefined || rest.slice(0, first.at).trim() !== '') return null;
  return { text: first.text, unit: null, length: first.at + first.length, note: null };
}

/** Angles without a unit of their own, where the text says that angles are in radians. */
export function carryRadians(lines: readonly Line[], raw: RawCase): void {
  const said = lines.some(({ original }) =>
    /\b(?:angles?|angular|units?)\b.{0,60}\brad(?:ians?)?\b|[[(]\s*rad(?:ians?)?\s*[\])]|^\W*radians?\W*$/i.test(
      original,
    ),
  );
  if (!said) return;
  for (const field of ANGLES) {
    const given = raw.fields.get(field);
    if (given === undefined || given.unit !== null) continue;
    raw.fields.set(field, { ...given, unit: 'rad', ...carried(given.text, 'rad', field) });
  }
}

import { readEpochText } from '../time/read';
import { findEpochs } from './epoch-finder';
import { LABELS } from './labels';
import { blank, type Line } from './line';
import { hasInnerComma, NUMBER_TOKEN, type NumberFormat, readToken } from './number-format';
import { emptyRaw, problem, type RawCase } from './raw';
import { takeWords } from './spoken-words';
import type { FieldName } from './types';

/** Reads what a person pastes: six numbers or a set of elements, in any usual layout. */

const POSITION: FieldName[] = ['x', 'y', 'z', 'vx', 'vy', 'vz'];
const ELEMENTS: FieldName[] = [
  'semiMajorAxis',
  'periapsisDistance',
  'eccentricity',
  'inclination',
  'node',
  'argumentOfPeriapsis',
  'meanAnomaly',
  'trueAnomaly',
  'periapsisTime',
];

/** Longer texts are not cases; the limit keeps reading quick. */
const MOST_LINES = 2000;

/**
 * Free text, field by field.
 *
 * @param text   what was pasted
 * @param format how its numbers are written, when that was answered by hand; null to find out
 */
export function readFreeText(text: string, format: NumberFormat | null): RawCase {
  if (format !== null) return attempt(text, format);
  const point = attempt(text, 'point');
  if (!hasInnerComma(text)) return point;
  const comma = attempt(text, 'comma');
  const [a, b] = [numbersOf(point), numbersOf(comma)];
  if (a === null && b === null) return point;
  if (b === null) return point;
  if (a === null) return comma;
  if (a.join(' ') === b.join(' ')) return point;
  point.questions.push({
    field: 'numberFormat',
    line: point.fields.get('x')?.line ?? point.fields.get('eccentricity')?.line ?? null,
    message: 'The commas can be decimal signs or can group or part the numbers. Which is meant?',
    readings: [
      { value: 'point', label: `decimal point: ${a[0]}` },
      { value: 'comma', label: `decimal comma: ${b[0]}` },
    ],
  });
  return point;
}

/** The numbers a reading found for a complete state or orbit, or null when it is not complete. */
function numbersOf(raw: RawCase): string[] | null {
  const of = (names: FieldName[]): string[] =>
    names.flatMap((name) => raw.fields.get(name)?.text ?? []);
  const state = of(POSITION);
  if (state.length === 6 && !raw.problems.some((item) => item.severity === 'error')) return state;
  const elements = of(ELEMENTS);
  return elements.length >= 6 ? elements : null;
}

function attempt(text: string, format: NumberFormat): RawCase {
  const raw = emptyRaw('free-text');
  const lines: Line[] = text
    .split(/\r\n|\r|\n/)
    .slice(0, MOST_LINES)
    .map((original, i) => ({ number: i + 1, text: original, original }));
  raw.invented = /\binvented\b/i.test(text);
  takeLabelledName(lines, raw);
  takeLabels(lines, raw, format, 'before-epoch');
  takeEpoch(lines, raw);
  takeWords(lines, raw);
  takeLabels(lines, raw, format, 'after-epoch');
  const elements = ELEMENTS.filter((name) => raw.fields.has(name)).length;
  if (elements >= 3 && !raw.fields.has('x')) raw.format = 'elements-text';
  else if (!POSITION.some((name) => raw.fields.has(name))) takeNumbers(lines, raw, format);
  takeName(lines, raw);
  return raw;
}

/** Labelled values: "X = 1.5", "e 0.2", "Tp: 2031 May 3.2". */
function takeLabels(
  lines: Line[],
  raw: RawCase,
  format: NumberFormat,
  when: 'before-epoch' | 'after-epoch',
): void {
  for (const line of lines) {
    for (const label of LABELS) {
      if ((label.kind === 'epoch') !== (when === 'before-epoch')) continue;
      for (const match of line.text.matchAll(label.pattern)) {
        const head = match[0];
        const at = match.index;
        const rest = line.text.slice(at + head.length);
        const found =
          label.kind === 'epoch' ? epochAt(rest) : numberAt(rest, format, label.field, head);
        if (found === null) continue;
        blank(line, at, head.length + found.length);
        if (label.field === null) continue;
        if (raw.fields.has(label.field)) {
          if (raw.fields.get(label.field)?.text !== found.text) {
            raw.problems.push(
              problem(
                'error',
                line.number,
                label.field,
                `${head.trim()} ${found.text}`,
                `one value; line ${raw.fields.get(label.field)?.line} gives another`,
              ),
            );
          }
          continue;
        }
        raw.fields.set(label.field, {
          text: found.text,
          unit: found.unit,
          line: line.number,
          note: found.note,
        });
      }
    }
  }
}

interface Found {
  text: string;
  unit: string | null;
  /** Characters taken. */
  length: number;
  note: string | null;
}

/** The number that a label's rest begins with, with a unit behind it. */
function numberAt(
  rest: string,
  format: NumberFormat,
  field: FieldName | null,
  head: string,
): Found | null {
  const lead = /^\s*/.exec(rest)?.[0].length ?? 0;
  NUMBER_TOKEN.lastIndex = 0;
  const match = rest.slice(lead).match(NUMBER_TOKEN);
  if (match === null || !rest.slice(lead).startsWith(match[0])) return null;
  // A comma at the end parts; what follows it is not this label's.
  const token = match[0].replace(/[.,]+$/, '');
  const numbers = readToken(token, format);
  if (numbers === null || numbers.length !== 1) return null;
  const after = rest.slice(lead + token.length);
  const unit =
    /^\s*[[(]?\s*(deg(?:rees?)?|°|rad(?:ians?)?|km|m|au|AU|Pa|kPa|MPa|kg\/m\^?[3³]|g\/cm\^?[3³]|mag|au\/d(?:ay)?\^?[2²]?)(?![\p{L}/])\s*[\])]?/u.exec(
      after,
    );
  const inHead = /[[(]\s*(km|m|deg|rad|au|AU)\s*[\])]/.exec(head);
  const name = unit?.[1] ?? inHead?.[1] ?? null;
  const { text, note } = convert(numbers[0], name, field);
  return { text, unit: name, length: lead + token.length + (unit?.[0].length ?? 0), note };
}

const ANGLES: FieldName[] = [
  'inclination',
  'node',
  'argumentOfPeriapsis',
  'meanAnomaly',
  'trueAnomaly',
];

/** Values whose field has one unit are carried to it; what was done is noted. */
function convert(
  text: string,
  unit: string | null,
  field: FieldName | null,
): { text: string; note: string | null } {
  const factor =
    unit === null || field === null
      ? null
      : ANGLES.includes(field) && /^rad/.test(unit)
        ? { by: 180 / Math.PI, to: 'degrees' }
        : field === 'diameter' && unit === 'km'
          ? { by: 1000, to: 'm' }
          : field === 'density' && unit.startsWith('g/')
            ? { by: 1000, to: 'kg/m³' }
            : field === 'strength' && unit === 'kPa'
              ? { by: 1e3, to: 'Pa' }
              : field === 'strength' && unit === 'MPa'
                ? { by: 1e6, to: 'Pa' }
                : null;
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

/** The epoch: the first instant in the text; another one that differs is asked about. */
function takeEpoch(lines: Line[], raw: RawCase): void {
  const found: { text: string; line: number; mjd: number | null }[] = [];
  const labelled = (line: Line): boolean => /\bepoch\b|\bt0\b/i.test(line.original);
  for (const line of [...lines.filter(labelled), ...lines.filter((item) => !labelled(item))]) {
    for (const epoch of findEpochs(line.text)) {
      let mjd: number | null = null;
      try {
        const reading = readEpochText(epoch.text);
        mjd = reading === null ? null : reading.mjd + reading.secondOfDay / 86400;
      } catch {
        // It is an epoch all the same, only an ill-formed one: told when the field is read.
      }
      found.push({ text: epoch.text, line: line.number, mjd });
      blank(line, epoch.at, epoch.length);
    }
    line.text = line.text.replace(/\b(?:epoch|t0|date|time)\b\s*(?:\([^)]*\))?\s*[:=]?/gi, (word) =>
      ' '.repeat(word.length),
    );
  }
  const first = found[0];
  if (first === undefined) return;
  raw.fields.set('epoch', { text: first.text, unit: null, line: first.line, note: null });
  const other = found.find(
    (item) => item.mjd !== null && first.mjd !== null && Math.abs(item.mjd - first.mjd) > 2e-5,
  );
  if (other !== undefined) {
    raw.questions.push({
      field: 'epoch',
      line: other.line,
      message: 'The text names two instants. Which is the epoch of the state?',
      readings: [first, other].map(({ text }) => ({ value: text, label: text })),
    });
  }
}

/** Six numbers without labels. */
function takeNumbers(lines: Line[], raw: RawCase, format: NumberFormat): void {
  const found: { text: string; line: number; velocity: boolean }[] = [];
  const rows = lines.map((line) => {
    const tokens = [...line.text.matchAll(NUMBER_TOKEN)].map((match) => match[0]);
    const words = line.text.replace(NUMBER_TOKEN, ' ').replace(/[^\p{L}]+/gu, '');
    return { line, tokens, words };
  });
  // Lines of numbers; a word or two such as "r" or "velocity" may stand with them.
  const numeric = rows.filter(
    ({ tokens, words }) => tokens.length > 0 && (words.length <= 10 || tokens.length >= 3),
  );
  for (const { line, tokens, words } of numeric) {
    for (const token of tokens) {
      const numbers = readToken(token, format);
      if (numbers === null) {
        raw.problems.push(
          problem(
            'error',
            line.number,
            'state',
            token,
            format === 'point' ? 'a number with a decimal point' : 'a number with a decimal comma',
          ),
        );
        return;
      }
      const velocity = /^v/i.test(words);
      for (const text of numbers) found.push({ text, line: line.number, velocity });
    }
  }
  if (found.length !== 6) {
    if (found.length > 0) {
      raw.problems.push(
        problem(
          'error',
          found[0].line,
          'state',
          `${found.length} ${found.length === 1 ? 'number' : 'numbers'}: ${found.map((item) => item.text).join(', ')}`,
          'six: three of position and three of velocity',
          'Take other numbers out, or label them (X = …).',
        ),
      );
    }
    return;
  }
  const velocityFirst = found.slice(0, 3).every((item) => item.velocity) && !found[3].velocity;
  const ordered = velocityFirst ? [...found.slice(3), ...found.slice(0, 3)] : found;
  for (const [i, field] of POSITION.entries()) {
    const { text, line } = ordered[i];
    raw.fields.set(field, { text, unit: null, line, note: null });
  }
}

/** A labelled name; its line says nothing else. */
function takeLabelledName(lines: Line[], raw: RawCase): void {
  for (const line of lines) {
    const match =
      /^\s*[#*!%;]*\s*(?:object|name|target|designation|body)\s*(?:name)?\s*[:=]\s*(.+?)\s*$/i.exec(
        line.original,
      );
    if (match === null) continue;
    raw.fields.set('name', { text: match[1], unit: null, line: line.number, note: null });
    blank(line, 0, line.text.length);
    return;
  }
}

/** Without a label: the first line, when it is words. */
function takeName(lines: Line[], raw: RawCase): void {
  if (raw.fields.has('name')) return;
  const first = lines.find((line) => line.original.trim() !== '');
  if (first === undefined || /[=:]/.test(first.original)) return;
  const left = first.text.replace(/\s+/g, ' ').trim();
  if (
    /^[#*!%;\s]*\p{L}/u.test(left) &&
    left.length >= 3 &&
    !/^(?:elements|state|position|epoch)\b/i.test(left)
  ) {
    const name = first.original
      .split(/[,;]/)[0]
      .replace(/^[#*!%;\s]+/, '')
      .trim();
    raw.fields.set('name', { text: name, unit: null, line: first.number, note: null });
  }
}

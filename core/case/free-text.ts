import { readEpochText } from '../time/read';
import { takeBareNumbers } from './bare-numbers';
import { takeColumns } from './columns';
import { takeDeviations } from './deviations';
import { findEpochs } from './epoch-finder';
import { carryRadians, takeLabels } from './labelled-values';
import { blank, type Line, linesOf, takeAll } from './line';
import { mayBeDecimalComma, NUMBER_TOKEN, type NumberFormat } from './number-format';
import { takeLabelledName, takeName } from './object-name';
import { emptyRaw, type RawCase, remark } from './raw';
import { takeWords } from './spoken-words';
import type { FieldName, TimeScale } from './types';

/** Reads what a person pastes: six numbers or a set of elements, in any usual layout. */

const STATE: readonly FieldName[] = ['x', 'y', 'z', 'vx', 'vy', 'vz'];
const ELEMENTS: readonly FieldName[] = [
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

/**
 * Free text, field by field.
 *
 * @param text   what was pasted
 * @param format how its numbers are written, when that was answered by hand; null to find out
 */
export function readFreeText(text: string, format: NumberFormat | null): RawCase {
  if (format !== null) return attempt(text, format);
  const point = attempt(text, 'point');
  if (!mayBeDecimalComma(text)) return point;
  const comma = attempt(text, 'comma');
  const [a, b] = [numbersOf(point), numbersOf(comma)];
  if (b === null) return point;
  if (a === null) {
    comma.fields.set('numberFormat', {
      text: 'comma',
      unit: null,
      line: null,
      note: 'only with a decimal comma do the numbers make a state or an orbit',
    });
    return comma;
  }
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
  const of = (names: readonly FieldName[]): string[] =>
    names.flatMap((name) => raw.fields.get(name)?.text ?? []);
  const state = of(STATE);
  if (state.length === 6 && !raw.problems.some((item) => item.severity === 'error')) return state;
  const elements = of(ELEMENTS);
  return elements.length >= 6 ? elements : null;
}

function attempt(text: string, format: NumberFormat): RawCase {
  const raw = emptyRaw('free-text');
  const { lines, cutAt } = linesOf(text);
  if (cutAt !== null) {
    raw.problems.push(
      remark(
        'warning',
        cutAt,
        'text',
        '',
        `The text is longer than a case: from line ${cutAt} on it was not read in full.`,
      ),
    );
  }
  raw.invented = lines.some(({ original }) => /\binvented\b/i.test(original));
  takeLabelledName(lines, raw);
  takeDeviations(lines, raw, format);
  takeColumns(lines, raw, format);
  takeLabels(lines, raw, format, 'epoch');
  takeEpoch(lines, raw);
  takeLabels(lines, raw, format, 'body');
  takeWords(lines, raw);
  takeLabels(lines, raw, format, 'state');
  const elements = ELEMENTS.filter((name) => raw.fields.has(name)).length;
  const isElements = elements >= 3 && !raw.fields.has('x');
  if (isElements) raw.format = 'elements-text';
  if (isElements || STATE.some((name) => raw.fields.has(name))) tellUnused(lines, raw);
  else takeBareNumbers(lines, raw, format);
  carryRadians(lines, raw);
  takeName(lines, raw);
  return raw;
}

/** Numbers beside labelled ones are not used; where there are any, that is said. */
function tellUnused(lines: readonly Line[], raw: RawCase): void {
  for (const line of lines) {
    const numbers = line.text.match(NUMBER_TOKEN);
    if (numbers === null || !/±|\+\/-|\bsigma\b|σ/i.test(line.original)) continue;
    raw.problems.push(
      remark(
        'warning',
        line.number,
        'uncertainty',
        numbers.join(', '),
        `Numbers beside the values were not understood as uncertainties; not used: ${numbers.join(', ')}.`,
      ),
    );
    return;
  }
}

interface FoundEpoch {
  text: string;
  line: number;
  /** Null for one that is ill-formed: told when the field is read. */
  mjd: number | null;
  scale: TimeScale | null;
}

function readFound(text: string, line: number): FoundEpoch {
  try {
    const reading = readEpochText(text);
    if (reading !== null) {
      const mjd = reading.mjd + reading.secondOfDay / 86400;
      return { text, line, mjd, scale: reading.scale };
    }
  } catch {
    // It is an epoch all the same, only an ill-formed one.
  }
  return { text, line, mjd: null, scale: null };
}

/** The epoch: the first instant in the text; another one that differs is asked about. */
function takeEpoch(lines: Line[], raw: RawCase): void {
  const found: FoundEpoch[] = [];
  const labelled = (line: Line): boolean => /\bepoch\b|\bt0\b/i.test(line.original);
  for (const line of [...lines.filter(labelled), ...lines.filter((item) => !labelled(item))]) {
    for (const { text, at, length } of findEpochs(line.text)) {
      found.push(readFound(text, line.number));
      blank(line, at, length);
    }
    // What stands in brackets behind it ("Epoch (UTC)") is left for the words.
    takeAll(line, /\b(?:epoch|t0|(?<!of )date|time(?! (?:scale|system)))\b\s*[:=]?/gi);
  }
  const first = found[0];
  if (first === undefined) return;
  raw.fields.set('epoch', { text: first.text, unit: null, line: first.line, note: null });
  const isOther = ({ mjd }: FoundEpoch): boolean =>
    mjd !== null && first.mjd !== null && Math.abs(mjd - first.mjd) > 2e-5;
  const other = found.find(isOther);
  if (other !== undefined) {
    raw.questions.push({
      field: 'epoch',
      line: other.line,
      message: 'The text names two instants. Which is the epoch of the state?',
      readings: [first, other].map(({ text }) => ({ value: text, label: text })),
    });
  }
  // The same instant in another form may say the scale that the first does not.
  const telling = found.find((item) => item.scale !== null && !isOther(item));
  if (first.scale === null && telling !== undefined && telling.scale !== null) {
    raw.fields.set('timeScale', {
      text: telling.scale,
      unit: null,
      line: telling.line,
      note: null,
    });
  }
}

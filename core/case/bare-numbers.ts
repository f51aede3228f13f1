import { readEpochText } from '../time/read';
import type { Line } from './line';
import { NUMBER_TOKEN, type NumberFormat, readToken } from './number-format';
import { problem, type RawCase } from './raw';
import type { FieldName } from './types';

/** Six numbers without labels. */

const STATE: readonly FieldName[] = ['x', 'y', 'z', 'vx', 'vy', 'vz'];

interface Bare {
  text: string;
  line: number;
  velocity: boolean;
}

export function takeBareNumbers(lines: readonly Line[], raw: RawCase, format: NumberFormat): void {
  const found = bareNumbers(lines, raw, format);
  if (found === null) return;
  // A row that begins with a bare modified Julian date.
  const first = found.length === 7 && !raw.fields.has('epoch') ? found[0] : undefined;
  if (first !== undefined && /^\d{5}(\.\d*)?$/.test(first.text) && isMjd(first.text)) {
    raw.fields.set('epoch', {
      text: `MJD ${first.text}`,
      unit: null,
      line: first.line,
      note: 'the first of seven numbers, taken as a modified Julian date',
    });
    found.shift();
  }
  if (found.length !== 6) {
    if (found.length > 0) {
      raw.problems.push(
        problem(
          'error',
          found[0].line,
          'state',
          `${found.length} ${found.length === 1 ? 'number' : 'numbers'}: ${found
            .slice(0, 12)
            .map((item) => item.text)
            .join(', ')}`,
          'six: three of position and three of velocity',
          'Take other numbers out, or label them (X = …).',
        ),
      );
    }
    return;
  }
  const velocityFirst = found.slice(0, 3).every((item) => item.velocity) && !found[3].velocity;
  const ordered = velocityFirst ? [...found.slice(3), ...found.slice(0, 3)] : found;
  for (const [i, field] of STATE.entries()) {
    const { text, line } = ordered[i];
    raw.fields.set(field, { text, unit: null, line, note: null });
  }
}

function isMjd(text: string): boolean {
  const reading = readEpochText(text);
  return reading !== null && reading.form === 'mjd';
}

/** The numbers of lines of numbers; a word or two such as "r" or "velocity" may stand with them. */
function bareNumbers(lines: readonly Line[], raw: RawCase, format: NumberFormat): Bare[] | null {
  const found: Bare[] = [];
  for (const line of lines) {
    const tokens = [...line.text.matchAll(NUMBER_TOKEN)].map((match) => match[0]);
    const words = line.text.replace(NUMBER_TOKEN, ' ').replace(/[^\p{L}]+/gu, '');
    if (tokens.length === 0 || (words.length > 10 && tokens.length < 3)) continue;
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
        return null;
      }
      const velocity = /^v/i.test(words);
      for (const text of numbers) found.push({ text, line: line.number, velocity });
    }
  }
  return found;
}

import type { Fielding } from './fielding';
import { problem } from './raw';
import { type LENGTH_UNITS, lookUp } from './vocabulary';

/** Units of length and speed as a text says them. */

/** km, or km/s, of one. */
export const sizeOf = (words: typeof LENGTH_UNITS, value: string): number =>
  words.find((word) => word.value === value)?.size ?? Number.NaN;

/** A unit as said: null when nothing is, undefined with a problem when it is none we know. */
export function saidUnit(
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

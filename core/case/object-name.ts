import { blank, type Line } from './line';
import type { RawCase } from './raw';

/** The name of the object in a free text. */

/** A labelled name; its line says nothing else. */
export function takeLabelledName(lines: Line[], raw: RawCase): void {
  for (const line of lines) {
    const match =
      /^\s{0,9}[#*!%;]{0,9}\s{0,9}(?:(?:object|target)(?:\s(?:body|name|body name))?|name|designation|body(?:\sname)?)\s*[:=]\s*(\S.*)$/i.exec(
        line.original,
      );
    if (match === null) continue;
    raw.fields.set('name', { text: match[1].trim(), unit: null, line: line.number, note: null });
    blank(line, 0, line.text.length);
    return;
  }
}

/**
 * Without a label: the first line, when it is words that said nothing else.
 *
 * @param original what the lines said before anything was taken
 */
export function takeName(lines: readonly Line[], raw: RawCase): void {
  if (raw.fields.has('name')) return;
  const first = lines.find((line) => line.original.trim() !== '');
  if (first === undefined || /[=:]/.test(first.original)) return;
  const named = first.original
    .split(/[,;]/)[0]
    .replace(/^[#*!%\s]+/, '')
    .trim();
  // What was taken as centre, axes, unit or epoch is no name: the words must still stand there.
  const left = first.text.replace(/[;\s]+/g, ' ').trim();
  const letters = (text: string): number => text.replace(/[^\p{L}]/gu, '').length;
  if (
    letters(named) < 3 ||
    letters(left) < 0.5 * letters(named) ||
    !/^[#*!%;\s]*\p{L}/u.test(first.text)
  )
    return;
  if (/^(?:elements|state|position|epoch|jd|mjd|copied|from|see)\b/i.test(named)) return;
  raw.fields.set('name', { text: named, unit: null, line: first.number, note: null });
}

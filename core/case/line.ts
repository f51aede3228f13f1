/** A line on its way: what has been taken is blanked, so that it is not read twice. */
export interface Line {
  number: number;
  text: string;
  original: string;
}

/**
 * Stands where something was taken: it parts what is left as a column does. It is not a blank,
 * since patterns that run over blanks would try every stretch of a long row of them.
 */
const TAKEN = ';';

/** A case is short; the limits keep a page of something else from being searched for one. */
const MOST_LINES = 2000;
const LONGEST_LINE = 4000;
const MOST_CHARACTERS = 200_000;

/**
 * The lines of a text, with quotes left out and long rows of blanks shortened.
 *
 * @returns the lines, and the number of the first that was not read in full (null when all were)
 */
export function linesOf(text: string): { lines: Line[]; cutAt: number | null } {
  const lines: Line[] = [];
  let cutAt: number | null = null;
  let characters = 0;
  for (const [i, whole] of text.split(/\r\n|\r|\n/).entries()) {
    const original = whole.slice(0, LONGEST_LINE);
    characters += original.length;
    const full = i >= MOST_LINES || characters > MOST_CHARACTERS;
    if (cutAt === null && (full || whole.length > LONGEST_LINE)) cutAt = i + 1;
    if (full) break;
    const plain = original.replace(/["“”]/g, ' ').replace(/\s{4,}/g, '   ');
    lines.push({ number: i + 1, text: plain, original });
  }
  return { lines, cutAt };
}

/** Blanks part of a line. */
export function blank(line: Line, at: number, length: number): void {
  line.text = line.text.slice(0, at) + TAKEN.repeat(length) + line.text.slice(at + length);
}

/** Blanks every match of a global pattern, handing each out. */
export function takeAll(
  line: Line,
  pattern: RegExp,
  use: (match: RegExpMatchArray) => void = () => {},
): void {
  const matches = [...line.text.matchAll(pattern)];
  for (const match of matches) {
    use(match);
    blank(line, match.index, match[0].length);
  }
}

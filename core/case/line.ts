/** A line on its way: what has been taken is blanked, so that places stay. */
export interface Line {
  number: number;
  text: string;
  original: string;
}

/** Blanks part of a line. */
export function blank(line: Line, at: number, length: number): void {
  line.text = line.text.slice(0, at) + ' '.repeat(length) + line.text.slice(at + length);
}

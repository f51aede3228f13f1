/** Fits text to widths that are measured, not guessed. */

export type Measure = (text: string) => number;

const ELLIPSIS = '…';

/** The text, or as much of its start as fits with an ellipsis. */
export function shortened(text: string, widthPx: number, measure: Measure): string {
  if (measure(text) <= widthPx) return text;
  const letters = Array.from(text);
  let low = 0;
  let high = letters.length;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    const candidate = letters.slice(0, middle).join('').trimEnd() + ELLIPSIS;
    if (measure(candidate) <= widthPx) low = middle;
    else high = middle - 1;
  }
  return letters.slice(0, low).join('').trimEnd() + ELLIPSIS;
}

/**
 * The text in lines that fit, broken at spaces (thin spaces inside figures are kept); a word that is
 * itself too long is broken where it must be.
 */
export function wrapped(text: string, widthPx: number, measure: Measure): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ').filter((each) => each !== '')) {
    const longer = line === '' ? word : `${line} ${word}`;
    if (measure(longer) <= widthPx) {
      line = longer;
      continue;
    }
    if (line !== '') lines.push(line);
    line = word;
    while (measure(line) > widthPx) {
      const head = fittingHead(line, widthPx, measure);
      lines.push(head);
      line = line.slice(head.length);
    }
  }
  if (line !== '') lines.push(line);
  return lines;
}

/** At least one letter, so that breaking always comes to an end. */
function fittingHead(word: string, widthPx: number, measure: Measure): string {
  const letters = Array.from(word);
  let count = 1;
  while (count < letters.length && measure(letters.slice(0, count + 1).join('')) <= widthPx) {
    count += 1;
  }
  return letters.slice(0, count).join('');
}

import type { Finding } from '../../core/report/report';
import { type Area, linesOf, type Pen, rule, write, writeCaps } from './pen';

const FACE = { px: 22 };
const CAUTION_FACE = { px: 19, italic: true };
const LINE_PX = 29;
const CAUTION_LINE_PX = 25;
const GAP_PX = 20;

/**
 * The chosen findings as sentences, each with its caution, as many as there is room for; of the rest
 * it is said that they stand in the report.
 *
 * @param said cautions that stand on the plate already
 */
export function drawFindings(
  pen: Pen,
  area: Area,
  findings: readonly Finding[],
  said: readonly string[],
): void {
  const { palette } = pen;
  writeCaps(pen, 'Findings', area.x, area.y, 17, palette.inkSoft);
  let y = area.y + 42;
  const bottom = area.y + area.height;
  for (const [i, { text, caution }] of findings.entries()) {
    const lines = linesOf(pen, text, FACE, area.width);
    const warns =
      caution === null || said.includes(caution)
        ? []
        : linesOf(pen, caution, CAUTION_FACE, area.width - 18);
    const height = lines.length * LINE_PX + warns.length * CAUTION_LINE_PX;
    const isLast = i === findings.length - 1;
    // The last line that fits is kept for saying that there is more.
    if (y + height - LINE_PX > bottom - (isLast ? 0 : LINE_PX + GAP_PX)) {
      const left = findings.length - i;
      const words = `${left === 1 ? 'One more finding' : `${left} more findings`} in the report.`;
      write(pen, words, area.x, y, { px: 20, italic: true }, palette.inkSoft);
      return;
    }
    for (const line of lines) {
      write(pen, line, area.x, y, FACE, palette.ink);
      y += LINE_PX;
    }
    if (warns.length > 0) {
      const top = y - LINE_PX + 12;
      rule(pen, [area.x, top, area.x, top + warns.length * CAUTION_LINE_PX], palette.ink, 2);
    }
    for (const line of warns) {
      write(pen, line, area.x + 18, y, CAUTION_FACE, palette.inkSoft);
      y += CAUTION_LINE_PX;
    }
    if (isLast) return;
    const between = y - LINE_PX + 17;
    rule(pen, [area.x, between, area.x + 60, between], palette.hairline);
    y += GAP_PX;
  }
}

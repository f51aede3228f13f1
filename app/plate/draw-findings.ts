import type { Finding } from '../../core/report/report';
import { type Area, linesOf, type Pen, rule, write, writeCaps } from './pen';

const FACE = { px: 23 };
const LINE_PX = 31;
const GAP_PX = 15;

/** The chosen findings as sentences, as many as there is room for; the rest is said to be in the report. */
export function drawFindings(pen: Pen, area: Area, findings: readonly Finding[]): void {
  const { palette } = pen;
  writeCaps(pen, 'Findings', area.x, area.y, 17, palette.inkSoft);
  let y = area.y + 42;
  const bottom = area.y + area.height;
  for (const [i, finding] of findings.entries()) {
    const lines = linesOf(pen, finding.text, FACE, area.width);
    const last = i === findings.length - 1;
    if (y + lines.length * LINE_PX > bottom - (last ? 0 : LINE_PX)) {
      const left = findings.length - i;
      const words = left === 1 ? 'One more finding' : `${left} more findings`;
      write(pen, `${words} in the report.`, area.x, y + 4, { px: 20 }, palette.inkSoft);
      return;
    }
    for (const line of lines) {
      write(pen, line, area.x, y, FACE, palette.ink);
      y += LINE_PX;
    }
    if (!last) {
      rule(
        pen,
        [
          [area.x, y - LINE_PX + GAP_PX + 4],
          [area.x + 60, y - LINE_PX + GAP_PX + 4],
        ],
        palette.hairline,
      );
      y += GAP_PX;
    }
  }
}

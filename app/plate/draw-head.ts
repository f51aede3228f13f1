import type { Report } from '../../core/report/report';
import { type Face, linesOf, measureIn, type Pen, rule, shortened, write, writeCaps } from './pen';

const LARGEST_PX = 42;
const SMALLEST_PX = 24;
/** The answer is set smaller rather than in more lines than this. */
const MOST_LINES = 3;

/**
 * Title, and the answer in large type.
 *
 * @returns the baseline of the answer's last line
 */
export function drawHead(pen: Pen, report: Report, left: number, right: number): number {
  const { palette } = pen;
  const { name, objectId, invented } = report.case;
  writeCaps(pen, 'Skimline · encounter plate', left, 86, 20, palette.inkSoft);
  const side: Face = { px: 24, italic: true };
  const words = invented ? 'An invented case: no such object exists.' : '';
  write(pen, words, right, 86, side, palette.inkSoft, 'right');
  const id = objectId === null || objectId === name ? '' : shortened(pen, objectId, side, 500);
  write(pen, id, right, 144, side, palette.inkSoft, 'right');
  const face: Face = { px: 50, weight: 600 };
  const room = right - left - measureIn(pen, side)(id) - 40;
  write(pen, shortened(pen, name, face, room), left, 144, face, palette.ink);
  rule(pen, [left, 168, right, 168], palette.ink, 2);
  const answer = report.findings.find((finding) => finding.kind === 'answer')?.text ?? '';
  let px = LARGEST_PX;
  let lines = linesOf(pen, answer, { px }, right - left);
  while (lines.length > (px > 34 ? 2 : MOST_LINES) && px > SMALLEST_PX) {
    px -= 2;
    lines = linesOf(pen, answer, { px }, right - left);
  }
  const first = 168 + px * 1.36;
  lines.forEach((line, i) => {
    write(pen, line, left, first + i * px * 1.26, { px }, palette.ink);
  });
  return first + (lines.length - 1) * px * 1.26;
}

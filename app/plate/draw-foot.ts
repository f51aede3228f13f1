import type { Report } from '../../core/report/report';
import { utcWords } from '../desk/figures';
import { linesOf, measureIn, type Pen, rule, shortened, write, writeCaps } from './pen';

const CAUTION_FACE = { px: 22, weight: 600 } as const;
const CAUTION_LINE_PX = 29;
const MODEL_FACE = { px: 16 };
const MODEL_LINE_PX = 23;
const MOST_MODEL_LINES = 3;

/**
 * Cautions in full, then model, ephemeris, time of making and fingerprint, built up from the bottom.
 *
 * @returns the top of the foot
 */
export function drawFoot(
  pen: Pen,
  report: Report,
  left: number,
  right: number,
  bottom: number,
): number {
  const { palette } = pen;
  const width = right - left;
  const mono = { px: 18, figures: true };
  const words = `Fingerprint of the report (SHA-256) ${report.fingerprint}`;
  write(pen, words, left, bottom, mono, palette.ink);
  const same = `Searched ${dayOf(report.model.span.fromUtc)} to ${dayOf(report.model.span.toUtc)}. Made ${utcWords(report.madeAt)} UTC. The JSON report carries the same fingerprint.`;
  const room = width - measureIn(pen, mono)(words) - 30;
  write(
    pen,
    shortened(pen, same, MODEL_FACE, room),
    right,
    bottom,
    MODEL_FACE,
    palette.inkSoft,
    'right',
  );
  const model = linesOf(pen, modelWords(report), MODEL_FACE, width);
  const kept = model.slice(0, MOST_MODEL_LINES);
  if (model.length > MOST_MODEL_LINES) {
    const rest = model.slice(MOST_MODEL_LINES - 1).join(' ');
    kept[MOST_MODEL_LINES - 1] = shortened(pen, rest, MODEL_FACE, width);
  }
  let y = bottom - 29 - (kept.length - 1) * MODEL_LINE_PX;
  kept.forEach((line, i) => {
    write(pen, line, left, y + i * MODEL_LINE_PX, MODEL_FACE, palette.inkSoft);
  });
  y -= 32;
  rule(pen, [left, y, right, y], palette.ink, 2);
  if (report.cautions.length === 0) return y;
  const indent = 130;
  const cautions = linesOf(pen, report.cautions.join(' '), CAUTION_FACE, width - indent);
  y -= 18 + (cautions.length - 1) * CAUTION_LINE_PX;
  writeCaps(pen, 'Caution', left, y, 17, palette.ink);
  cautions.forEach((line, i) => {
    write(pen, line, left + indent, y + i * CAUTION_LINE_PX, CAUTION_FACE, palette.ink);
  });
  return y - CAUTION_FACE.px;
}

const dayOf = (utc: string): string => utc.slice(0, 10);

function modelWords({ model }: Report): string {
  const { terms, integrator, tolerance, ephemeris, gmSet } = model;
  return [
    `Model: ${terms.join('; ')}.`,
    `${integrator}, tolerance ${tolerance}.`,
    `Ephemeris: ${ephemeris}; gravitational parameters of ${gmSet}.`,
  ].join(' ');
}

import type { Report } from '../../core/report/report';
import {
  bandOutline,
  type RibbonBand,
  type RibbonGeometry,
  ribbonGeometry,
} from '../ribbon/geometry';
import { initialOf } from '../ribbon/mark-words';
import type { PlacedFlag } from '../ribbon/place-flags';
import type { Spread } from '../worker/spread';
import type { Trajectory } from '../worker/trajectory';
import { type Area, frame, measureIn, type Pen, rule, write, writeCaps, writeClear } from './pen';

const FACE = { px: 19 };
const DATE_FACE = { px: 17 };
/** From the middle of a line of text to its baseline. */
const MIDDLE_PX = FACE.px * 0.34;
const CAPS_PX = 16;

/** The ribbon on the plate: the geometry is the page's own, the hand is the canvas's. */
export function drawRibbon(
  pen: Pen,
  area: Area,
  report: Report,
  trajectory: Trajectory,
  spread: Spread | null,
  clockTdbSeconds: number,
): void {
  const { context, palette } = pen;
  const end = writeCaps(
    pen,
    'Distance from the Earth’s centre',
    area.x,
    area.y,
    17,
    palette.inkSoft,
  );
  const geometry = ribbonGeometry(report, trajectory, spread, 'stretched', {
    widthPx: area.width,
    heightPx: area.height - CAPS_PX,
    leftPx: 204,
    rightPx: 150,
    topPx: 6,
    bottomPx: 62,
    rowPx: FACE.px + 3,
    measure: measureIn(pen, FACE),
  });
  if (geometry === null) return;
  const { plot, time, curves, band, flags } = geometry;
  const key = `dashed: two-body path, no pull of the Earth; thin: the Moon${band === null ? '' : `; tinted: ${band.words}`}`;
  write(pen, key, end + 18, area.y, { px: 18, italic: true }, palette.inkSoft);
  context.save();
  context.translate(area.x, area.y + CAPS_PX);
  drawAxes(pen, geometry);
  if (band !== null) drawBand(pen, band);
  rule(pen, curves.moon, palette.moon, 1.5);
  rule(pen, curves.unperturbed, palette.object, 2, [9, 7]);
  rule(pen, curves.object, palette.object, 3.2);
  const sheet = { x: plot.x0, y: plot.y0, width: plot.x1 - plot.x0, height: plot.y1 - plot.y0 };
  frame(pen, sheet, palette.ink);
  const x = plot.x0 + Math.min(1, Math.max(0, time.unitAt(clockTdbSeconds))) * sheet.width;
  rule(pen, [x, plot.y0, x, plot.y1 + 8], palette.ink, 2);
  for (const flag of flags) drawFlag(pen, flag);
  context.restore();
}

function drawBand(pen: Pen, band: RibbonBand): void {
  const { context, palette } = pen;
  const outline = bandOutline(band);
  context.save();
  context.beginPath();
  for (let i = 0; i < outline.length; i += 2) context.lineTo(outline[i], outline[i + 1]);
  context.closePath();
  context.fillStyle = palette.object;
  context.globalAlpha = 0.13;
  context.fill();
  context.globalAlpha = 0.75;
  rule(pen, band.low, palette.object, 1.2);
  rule(pen, band.high, palette.object, 1.2);
  context.restore();
}

function drawAxes(pen: Pen, { plot, named, decades, timeTicks }: RibbonGeometry): void {
  const { palette } = pen;
  const { x0, x1, y1 } = plot;
  for (const { y, textY, words } of named) {
    rule(pen, [x0, y, x1, y], palette.hairline, 1.2);
    rule(pen, [x0 - 18, textY, x0 - 8, y, x0, y], palette.inkSoft, 1.2);
    write(pen, words, x0 - 23, textY + MIDDLE_PX, FACE, palette.inkSoft, 'right');
  }
  for (const { y, textY, words } of decades) {
    rule(pen, [x1, y, x1 + 8, y, x1 + 14, textY], palette.inkSoft, 1.2);
    write(pen, words, x1 + 19, textY + MIDDLE_PX, FACE, palette.inkSoft);
  }
  for (const { x, words, date } of timeTicks) {
    rule(pen, [x, y1, x, y1 + 8], palette.inkSoft, 1.2);
    if (words !== null) write(pen, words, x, y1 + 29, FACE, palette.ink, 'center');
    if (date !== null) write(pen, date, x, y1 + 52, DATE_FACE, palette.inkSoft, 'center');
  }
}

function drawFlag(pen: Pen, { event, x, y, label }: PlacedFlag): void {
  const { context, palette } = pen;
  if (label !== null) {
    rule(pen, [x, y, x, label.y], palette.inkSoft, 1.4);
    const align = label.anchor === 'start' ? 'left' : 'right';
    writeClear(pen, label.text, label.x, label.y + MIDDLE_PX, FACE, align);
  }
  if (event.kind === 'surface') {
    rule(pen, [x - 8, y - 8, x + 8, y + 8], palette.ink, 3);
    rule(pen, [x + 8, y - 8, x - 8, y + 8], palette.ink, 3);
    return;
  }
  context.beginPath();
  if (event.kind === 'approach') context.arc(x, y, 12, 0, 2 * Math.PI);
  else {
    const down = event.direction === 'in' ? 1 : -1;
    context.moveTo(x - 8, y - 6 * down);
    context.lineTo(x + 8, y - 6 * down);
    context.lineTo(x, y + 8 * down);
    context.closePath();
  }
  context.fillStyle = palette.ground;
  context.fill();
  context.strokeStyle = edgeOf(pen, event);
  context.lineWidth = 2.2;
  context.stroke();
  if (event.kind === 'approach') {
    write(pen, initialOf(event.body), x, y + 6, { px: 16, weight: 600 }, palette.ink, 'center');
  }
}

function edgeOf({ palette }: Pen, { kind, body }: PlacedFlag['event']): string {
  if (kind === 'crossing') return palette.object;
  if (body === 'Earth') return palette.earth;
  return body === 'Moon' ? palette.moon : palette.planet;
}

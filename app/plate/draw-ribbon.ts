import type { Report } from '../../core/report/report';
import { type RibbonGeometry, ribbonGeometry } from '../ribbon/geometry';
import { initialOf } from '../ribbon/mark-words';
import type { PlacedFlag } from '../ribbon/place-flags';
import type { Trajectory } from '../worker/trajectory';
import { type Area, fontOf, type Pen, write, writeCaps } from './pen';

const TEXT_PX = 19;

/** The ribbon on the plate: the geometry is the page's own, the hand is the canvas's. */
export function drawRibbon(
  pen: Pen,
  area: Area,
  report: Report,
  trajectory: Trajectory,
  clockTdbSeconds: number,
): void {
  const { context, palette } = pen;
  writeCaps(pen, 'Distance from the Earth’s centre', area.x, area.y, 17, palette.inkSoft);
  const top = area.y + 16;
  const geometry = ribbonGeometry(report, trajectory, 'stretched', {
    widthPx: area.width,
    heightPx: area.height - 16,
    leftPx: 190,
    rightPx: 150,
    topPx: 6,
    bottomPx: 62,
    rowPx: TEXT_PX + 3,
    measure: (text) => {
      context.font = fontOf({ px: TEXT_PX });
      return context.measureText(text).width;
    },
  });
  if (geometry === null) return;
  context.save();
  context.translate(area.x, top);
  drawAxes(pen, geometry);
  polyline(pen, geometry.curves.moon, palette.moon, 1.5, []);
  polyline(pen, geometry.curves.unperturbed, palette.object, 2, [9, 7]);
  polyline(pen, geometry.curves.object, palette.object, 3.2, []);
  const { plot, time } = geometry;
  context.strokeStyle = palette.ink;
  context.lineWidth = 1.5;
  context.strokeRect(plot.x0, plot.y0, plot.x1 - plot.x0, plot.y1 - plot.y0);
  const x = plot.x0 + time.unitAt(clockTdbSeconds) * (plot.x1 - plot.x0);
  if (x >= plot.x0 && x <= plot.x1) {
    context.lineWidth = 2;
    context.beginPath();
    context.moveTo(x, plot.y0);
    context.lineTo(x, plot.y1);
    context.stroke();
  }
  for (const flag of geometry.flags) drawFlag(pen, flag);
  context.restore();
}

function polyline(
  { context }: Pen,
  points: Float64Array,
  colour: string,
  width: number,
  dash: number[],
): void {
  context.strokeStyle = colour;
  context.lineWidth = width;
  context.lineJoin = 'round';
  context.setLineDash(dash);
  context.beginPath();
  for (let i = 0; i < points.length; i += 2) {
    if (i === 0) context.moveTo(points[i], points[i + 1]);
    else context.lineTo(points[i], points[i + 1]);
  }
  context.stroke();
  context.setLineDash([]);
}

function drawAxes(pen: Pen, { plot, named, decades, timeTicks }: RibbonGeometry): void {
  const { context, palette } = pen;
  const face = { px: TEXT_PX };
  const line = (path: [number, number][], colour: string): void => {
    context.strokeStyle = colour;
    context.lineWidth = 1.2;
    context.beginPath();
    for (const [i, [x, y]] of path.entries()) {
      if (i === 0) context.moveTo(x, y);
      else context.lineTo(x, y);
    }
    context.stroke();
  };
  const middle = TEXT_PX * 0.34;
  for (const { y, textY, words } of named) {
    line(
      [
        [plot.x0, y],
        [plot.x1, y],
      ],
      palette.hairline,
    );
    line(
      [
        [plot.x0 - 18, textY],
        [plot.x0 - 8, y],
        [plot.x0, y],
      ],
      palette.inkSoft,
    );
    write(pen, words, plot.x0 - 23, textY + middle, face, palette.inkSoft, 'right');
  }
  for (const { y, textY, words } of decades) {
    line(
      [
        [plot.x1, y],
        [plot.x1 + 8, y],
        [plot.x1 + 14, textY],
      ],
      palette.inkSoft,
    );
    write(pen, words, plot.x1 + 19, textY + middle, face, palette.inkSoft);
  }
  for (const { x, words, date } of timeTicks) {
    line(
      [
        [x, plot.y1],
        [x, plot.y1 + 8],
      ],
      palette.inkSoft,
    );
    if (words !== null) write(pen, words, x, plot.y1 + 29, face, palette.ink, 'center');
    if (date !== null) write(pen, date, x, plot.y1 + 52, { px: 16 }, palette.inkSoft, 'center');
  }
}

function drawFlag(pen: Pen, { event, x, y, label }: PlacedFlag): void {
  const { context, palette } = pen;
  context.strokeStyle = palette.ink;
  context.fillStyle = palette.ink;
  context.lineWidth = 1.4;
  if (label !== null) {
    context.beginPath();
    context.moveTo(x, y);
    context.lineTo(x, label.y);
    context.stroke();
    const align = label.anchor === 'start' ? 'left' : 'right';
    write(pen, label.text, label.x, label.y + TEXT_PX * 0.34, { px: TEXT_PX }, palette.ink, align);
  }
  context.beginPath();
  if (event.kind === 'approach') {
    context.fillStyle = palette.ground;
    context.strokeStyle =
      event.body === 'Earth'
        ? palette.earth
        : event.body === 'Moon'
          ? palette.moon
          : palette.planet;
    context.lineWidth = 2;
    context.arc(x, y, 12, 0, 2 * Math.PI);
    context.fill();
    context.stroke();
    write(pen, initialOf(event.body), x, y + 6, { px: 16, weight: 600 }, palette.ink, 'center');
    return;
  }
  if (event.kind === 'surface') {
    context.moveTo(x - 8, y - 8);
    context.lineTo(x + 8, y + 8);
    context.moveTo(x + 8, y - 8);
    context.lineTo(x - 8, y + 8);
    context.stroke();
    return;
  }
  const down = event.direction === 'in' ? 1 : -1;
  context.moveTo(x - 7, y - 5 * down);
  context.lineTo(x + 7, y - 5 * down);
  context.lineTo(x, y + 7 * down);
  context.closePath();
  context.fill();
}

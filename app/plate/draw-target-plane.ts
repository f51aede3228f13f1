import type { Approach, LineOfVariations } from '../../core/report/report';
import { type PlaneGeometry, type Projection, planeGeometry } from '../charts/plane-geometry';
import { planeLine } from '../charts/plane-line';
import { cloneStamps, printClones, wiped } from '../charts/plane-stamp';
import { fittingView } from '../charts/plane-view';
import { grouped, withUnit } from '../desk/figures';
import type { CloneCloud } from '../worker/clone-cloud';
import { type Area, measureIn, type Pen, rule, write, writeCaps, writeClear } from './pen';

const CAPS_PX = 16;
/** A table of figures stands beside the plane where this much room is left, px. */
const TABLE_PX = 180;
/** Pixels of the plate to a pixel of the page, for the marks of clones. */
const MARK_SCALE = 1.1;
/** What the marks mean: the longest that has room. */
const KEYS = [
  'ellipses: 1, 2, 3 σ; dots: clones; × +: clones that hit',
  'dots: clones; × +: those that hit',
  '× +: clones that hit',
  '× +: hits',
];
const KEY_FACE = { px: 17, italic: true };

/**
 * Where an approach aims, against what it would hit; nothing where it has no target plane.
 *
 * @param clones of this approach; null when there are none
 */
export function drawTargetPlane(
  pen: Pen,
  area: Area,
  approach: Approach,
  clones: CloneCloud | null,
): void {
  const { context, palette } = pen;
  const side = Math.min(area.width, area.height - CAPS_PX);
  const geometry = planeGeometry(approach, 'tr', fittingView(approach), side, side);
  if (geometry === null) return;
  const end = writeCaps(pen, 'Target plane', area.x, area.y, 17, palette.inkSoft);
  if (clones !== null && clones.version > 0) {
    const room = area.x + area.width - end - 14;
    const key = KEYS.find((words) => measureIn(pen, KEY_FACE)(words) <= room);
    if (key !== undefined) write(pen, key, end + 14, area.y, KEY_FACE, palette.inkSoft);
  }
  context.save();
  context.translate(area.x, area.y + CAPS_PX);
  context.beginPath();
  context.rect(0, 0, side, side);
  context.clip();
  if (clones !== null) drawClones(pen, clones, geometry, side);
  drawPlane(pen, approach, geometry, side);
  context.restore();
  const left = area.x + side + 24;
  const width = area.x + area.width - left;
  if (width >= TABLE_PX) drawFigures(pen, { ...area, x: left, width }, approach);
}

/** Printed into a picture of their own and laid on the sheet. */
function drawClones(pen: Pen, clones: CloneCloud, geometry: PlaneGeometry, side: number): void {
  const canvas = document.createElement('canvas');
  canvas.width = canvas.height = Math.ceil(side);
  const context = canvas.getContext('2d');
  if (context === null) return;
  const image = context.createImageData(canvas.width, canvas.height);
  const picture = { widthPx: canvas.width, heightPx: canvas.height, data: image.data };
  wiped(picture, pen.palette.object);
  const stamps = cloneStamps(MARK_SCALE);
  for (const drawn of ['plain', 'rare'] as const) {
    printClones(picture, clones.points(drawn), stamps[drawn], geometry.project);
  }
  context.putImageData(image, 0, 0);
  pen.context.drawImage(canvas, 0, 0);
}

function drawPlane(pen: Pen, approach: Approach, geometry: PlaneGeometry, side: number): void {
  const { context, palette } = pen;
  const { x, y, discPx, capturePx, aim, ellipse } = geometry;
  const body = approach.body === 'Moon' ? palette.moon : palette.earth;
  rule(pen, [0, y, side, y], palette.hairline);
  rule(pen, [x, 0, x, side], palette.hairline);
  circle(pen, x, y, discPx, body, []);
  shade(pen, body, 0.22);
  circle(pen, x, y, capturePx, palette.ink, [8, 6]);
  if (ellipse !== null) {
    for (const sigmas of [3, 2, 1]) {
      context.beginPath();
      const turn = (ellipse.turnDeg * Math.PI) / 180;
      const [major, minor] = [ellipse.majorPx, ellipse.minorPx].map((px) =>
        Math.max(0.5, sigmas * px),
      );
      context.ellipse(aim.x, aim.y, major, minor, turn, 0, 2 * Math.PI);
      shade(pen, palette.object, 0.16);
      context.strokeStyle = palette.object;
      context.lineWidth = 1;
      context.stroke();
    }
  }
  if (approach.lineOfVariations !== undefined) {
    drawLine(pen, approach.lineOfVariations, geometry.project);
  }
  rule(pen, [x, y, aim.x, aim.y], palette.object, 2);
  rule(pen, [aim.x - 10, aim.y, aim.x + 10, aim.y], palette.object, 3);
  rule(pen, [aim.x, aim.y - 10, aim.x, aim.y + 10], palette.object, 3);
  const face = { px: 18 };
  const axis = { px: 19, italic: true };
  writeClear(pen, 'T', side - 6, Math.min(Math.max(y - 9, 20), side - 34), axis, 'right');
  writeClear(pen, 'R', Math.min(Math.max(x + 10, 8), side - 24), side - 8, axis);
  const away = aim.y > y ? -1 : 1;
  const isWide = discPx > 30;
  if (isWide)
    write(pen, approach.body, x, y + away * discPx * 0.5 + 6, face, palette.ink, 'center');
  const words = Math.min(Math.max(y + away * (capturePx + 16) + 6, 18), side - 6);
  const name = isWide ? 'capture disc' : `${approach.body}, capture disc`;
  const half = measureIn(pen, face)(name) / 2;
  // Below, the words keep clear of the axis's name.
  const middle = away === 1 ? x - 12 - half : x;
  const within = Math.min(Math.max(middle, half + 4), side - half - 4);
  writeClear(pen, name, within, words, face, 'center');
}

/** The line of variations, with a tick at every whole σ that has room. */
function drawLine(pen: Pen, line: LineOfVariations, project: Projection): void {
  const { context, palette } = pen;
  const { path, ticks } = planeLine(line, project);
  context.strokeStyle = palette.object;
  context.lineWidth = 1.5;
  context.stroke(new Path2D(path));
  for (const { x, y, nx, ny } of ticks) {
    rule(pen, [x - 6 * nx, y - 6 * ny, x + 6 * nx, y + 6 * ny], palette.object, 1.5);
  }
}

function circle(
  { context }: Pen,
  x: number,
  y: number,
  radiusPx: number,
  colour: string,
  dash: number[],
): void {
  context.beginPath();
  context.arc(x, y, Math.max(1.5, radiusPx), 0, 2 * Math.PI);
  context.strokeStyle = colour;
  context.lineWidth = 2;
  context.setLineDash(dash);
  context.stroke();
  context.setLineDash([]);
}

/** Fills the path that has been begun. */
function shade({ context }: Pen, colour: string, opacity: number): void {
  context.globalAlpha = opacity;
  context.fillStyle = colour;
  context.fill();
  context.globalAlpha = 1;
}

function drawFigures(pen: Pen, area: Area, approach: Approach): void {
  const { palette } = pen;
  const { targetPlane: plane, hyperbola, uncertainty } = approach;
  if (plane === null) return;
  const ellipse = uncertainty?.ellipse ?? null;
  const rows: [string, string][] = [
    ['B·T', km(plane.bDotTKm)],
    ['B·R', km(plane.bDotRKm)],
    ['ξ', km(plane.xiKm)],
    ['ζ', km(plane.zetaKm)],
    ...(hyperbola === null ? [] : [row('|B|, impact parameter', km(hyperbola.impactParameterKm))]),
    ['capture radius', km(plane.impactRadiusKm)],
    ...(ellipse === null
      ? []
      : [row('1 σ half axes', `${grouped(ellipse.semiMajorKm)} × ${km(ellipse.semiMinorKm)}`)]),
  ];
  const lead = (area.height - CAPS_PX) / 7;
  rows.forEach(([name, value], i) => {
    const base = area.y + CAPS_PX + (i + 0.62) * lead;
    write(pen, name, area.x, base, { px: 19 }, palette.inkSoft);
    const face = { px: 20, figures: true };
    write(pen, value, area.x + area.width, base, face, palette.ink, 'right');
    const under = base + lead * 0.36;
    rule(pen, [area.x, under, area.x + area.width, under], palette.hairline, 1);
  });
}

const row = (name: string, value: string): [string, string] => [name, value];

const km = (value: number): string => withUnit(grouped(value), 'km');

import { dot, type Vec3 } from '../worker/core-geometry';
import type { Label } from './labels';
import type { Stroke } from './line-buffer';
import type { PicturePoint } from './projection';
import type { Sheet } from './sheet';

/** Marks of a fixed size on the picture: bodies, the object, arrows, ticks, the scale. */

const FULL_TURN = 2 * Math.PI;

/** Keeps the lettering off a mark. */
export function keepClear(sheet: Sheet, point: PicturePoint, radiusPx: number): void {
  sheet.taken.push({
    left: point.x - radiusPx,
    right: point.x + radiusPx,
    top: point.y - radiusPx,
    bottom: point.y + radiusPx,
  });
}

export function label(
  sheet: Sheet,
  point: { x: number; y: number },
  entry: Omit<Label, 'x' | 'y'>,
): void {
  if (sheet.projector.shows(point)) sheet.labels.push({ ...entry, x: point.x, y: point.y });
}

/** A body: a disc to scale, or of the least size that can be seen. */
export function disc(
  sheet: Sheet,
  point: PicturePoint,
  radiusPx: number,
  fill: string,
  edge = fill,
): void {
  const { context, projector } = sheet;
  if (!projector.shows(point, radiusPx)) return;
  context.beginPath();
  context.arc(point.x, point.y, radiusPx, 0, FULL_TURN);
  context.fillStyle = fill;
  context.fill();
  context.strokeStyle = edge;
  context.lineWidth = 1;
  context.stroke();
  if (radiusPx < 40) keepClear(sheet, point, radiusPx);
}

/** The Sun: a disc with short rays. */
export function sunMark(sheet: Sheet, point: PicturePoint, radiusPx: number): void {
  const { context, inks } = sheet;
  disc(sheet, point, radiusPx, inks.palette.sun);
  if (radiusPx > 12) return;
  context.beginPath();
  for (let i = 0; i < 16; i++) {
    const angle = (i * FULL_TURN) / 16;
    const reach = i % 2 === 0 ? 6.5 : 4;
    const [c, s] = [Math.cos(angle), Math.sin(angle)];
    context.moveTo(point.x + c * (radiusPx + 2.5), point.y + s * (radiusPx + 2.5));
    context.lineTo(point.x + c * (radiusPx + reach), point.y + s * (radiusPx + reach));
  }
  context.strokeStyle = inks.palette.sun;
  context.lineWidth = 1.1;
  context.stroke();
  keepClear(sheet, point, radiusPx + 7);
}

const LOZENGE_PX = 6.5;

/** The object: a lozenge; hollow when a globe stands before it. */
export function objectMark(sheet: Sheet, point: PicturePoint, hidden: boolean): void {
  const { context, inks, projector } = sheet;
  if (!projector.shows(point, LOZENGE_PX)) return;
  const { x, y } = point;
  context.beginPath();
  context.moveTo(x, y - LOZENGE_PX);
  context.lineTo(x + LOZENGE_PX * 0.78, y);
  context.lineTo(x, y + LOZENGE_PX);
  context.lineTo(x - LOZENGE_PX * 0.78, y);
  context.closePath();
  context.lineJoin = 'miter';
  context.lineWidth = 3;
  context.strokeStyle = inks.palette.ground;
  context.stroke();
  context.lineWidth = 1.4;
  context.strokeStyle = inks.palette.object;
  context.fillStyle = hidden ? inks.palette.ground : inks.palette.object;
  context.fill();
  context.stroke();
  keepClear(sheet, point, LOZENGE_PX);
}

/** A small ring: a place on a path or on the ground. */
export function ring(sheet: Sheet, point: PicturePoint, radiusPx: number, colour: string): void {
  const { context, inks, projector } = sheet;
  if (!projector.shows(point, radiusPx)) return;
  context.beginPath();
  context.arc(point.x, point.y, radiusPx, 0, FULL_TURN);
  context.fillStyle = inks.palette.ground;
  context.fill();
  context.lineWidth = 1.3;
  context.strokeStyle = colour;
  context.stroke();
  keepClear(sheet, point, radiusPx + 1);
}

/** A short stroke across a path at a point, given the path's direction in the scene. */
export function tick(
  sheet: Sheet,
  point: PicturePoint,
  along: Vec3,
  halfPx: number,
  stroke: Stroke,
): void {
  const { right, up } = sheet.projector;
  const dx = dot(along, right);
  const dy = -dot(along, up);
  const length = Math.hypot(dx, dy);
  if (!(length > 0)) return;
  const nx = (-dy / length) * halfPx;
  const ny = (dx / length) * halfPx;
  sheet.pen.flat(
    [
      { x: point.x - nx, y: point.y - ny },
      { x: point.x + nx, y: point.y + ny },
    ],
    stroke,
  );
}

const ARROW_PX = 26;
const HEAD_PX = 6;
const ARROW_INSET_PX = 16;
/** A direction that points this nearly at the eye or away from it has no arrow. */
const LEAST_ACROSS = 0.12;

/** An arrow at the picture's edge towards something far away, with its name. */
export function farArrow(sheet: Sheet, direction: Vec3, name: string, stroke: Stroke): void {
  const { projector, pen, inks } = sheet;
  const across = dot(direction, projector.right);
  const down = -dot(direction, projector.up);
  const length = Math.hypot(across, down);
  if (length < LEAST_ACROSS) return;
  const [ux, uy] = [across / length, down / length];
  const { widthPx, heightPx } = projector;
  const reach = Math.min(
    (widthPx / 2 - ARROW_INSET_PX) / Math.max(1e-9, Math.abs(ux)),
    (heightPx / 2 - ARROW_INSET_PX) / Math.max(1e-9, Math.abs(uy)),
    Math.max(widthPx, heightPx),
  );
  const at = (along: number, aside: number) => ({
    x: widthPx / 2 + ux * along - uy * aside,
    y: heightPx / 2 + uy * along + ux * aside,
  });
  pen.flat([at(reach - ARROW_PX, 0), at(reach, 0)], stroke);
  pen.flat(
    [at(reach - HEAD_PX, HEAD_PX / 2.4), at(reach, 0), at(reach - HEAD_PX, -HEAD_PX / 2.4)],
    stroke,
  );
  const middle = at(reach - ARROW_PX / 2, 0);
  keepClear(sheet, { ...middle, depthKm: 0 }, 5);
  label(sheet, at(reach - ARROW_PX / 2, 0), {
    id: `far ${name}`,
    text: name,
    gap: 8,
    style: 'note',
    colour: inks.palette.inkSoft,
    priority: 40,
  });
}

import { dot, type Vec3 } from '../worker/core-geometry';
import type { Rgb } from './inks';
import { type Label, overlaps } from './labels';
import type { Stroke } from './line-buffer';
import type { PicturePoint } from './projection';
import type { Sheet } from './sheet';

/** Marks of a fixed size on the picture: bodies, the object, arrows, ticks, the scale. */

/** A larger disc may be written on, px. */
const LARGE_PX = 40;
const MOST_RAYED_PX = 12;
const RAYS = 16;
const LOZENGE_PX = 6.5;

/** Keeps the lettering off a mark. */
function keepClear(sheet: Sheet, point: PicturePoint, radiusPx: number): void {
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
export function disc(sheet: Sheet, point: PicturePoint, radiusPx: number, colour: Rgb): void {
  if (!sheet.projector.shows(point, radiusPx)) return;
  sheet.stamps.disc({
    ...point,
    halfWidthPx: radiusPx,
    halfHeightPx: radiusPx,
    fill: colour,
    edge: colour,
    edgePx: 0,
    haloPx: 1,
  });
  if (radiusPx < LARGE_PX) keepClear(sheet, point, radiusPx);
}

/** The Sun: a disc with short rays. */
export function sunMark(sheet: Sheet, point: PicturePoint, radiusPx: number): void {
  const { inks, pen } = sheet;
  disc(sheet, point, radiusPx, inks.rgb.sun);
  if (radiusPx > MOST_RAYED_PX) return;
  for (let i = 0; i < RAYS; i++) {
    const angle = (i * 2 * Math.PI) / RAYS;
    const [c, s] = [Math.cos(angle), Math.sin(angle)];
    const ends = [radiusPx + 2.5, radiusPx + (i % 2 === 0 ? 6.5 : 4.2)];
    pen.flat(
      ends.map((reach) => ({ x: point.x + c * reach, y: point.y + s * reach })),
      inks.sunRay,
    );
  }
  keepClear(sheet, point, radiusPx + 7);
}

/** The object: a lozenge; hollow when a globe stands before it. */
export function objectMark(sheet: Sheet, point: PicturePoint, hidden: boolean): void {
  const { inks, projector, stamps } = sheet;
  if (!projector.shows(point, LOZENGE_PX)) return;
  stamps.lozenge({
    ...point,
    halfWidthPx: LOZENGE_PX * 0.78,
    halfHeightPx: LOZENGE_PX,
    fill: hidden ? inks.rgb.ground : inks.rgb.object,
    edge: inks.rgb.object,
    edgePx: 1.3,
    haloPx: 1.2,
  });
  keepClear(sheet, point, LOZENGE_PX);
}

/** A small ring: a place on a path or on the ground. */
export function ring(sheet: Sheet, point: PicturePoint, radiusPx: number, colour: Rgb): void {
  const { inks, projector, stamps } = sheet;
  if (!projector.shows(point, radiusPx)) return;
  stamps.disc({
    ...point,
    halfWidthPx: radiusPx,
    halfHeightPx: radiusPx,
    fill: inks.rgb.ground,
    edge: colour,
    edgePx: 1.3,
    haloPx: 0,
  });
  keepClear(sheet, point, radiusPx + 1);
}

/** A short stroke across a path at a point, given the path's direction in the scene; gives the
 * direction of the stroke on the picture. */
export function tick(
  sheet: Sheet,
  point: PicturePoint,
  along: Vec3,
  halfPx: number,
  stroke: Stroke,
): readonly [number, number] {
  const { right, up } = sheet.projector;
  const dx = dot(along, right);
  const dy = -dot(along, up);
  const length = Math.hypot(dx, dy);
  if (!(length > 0)) return [1, 0];
  const nx = (-dy / length) * halfPx;
  const ny = (dx / length) * halfPx;
  sheet.pen.flat(
    [
      { x: point.x - nx, y: point.y - ny },
      { x: point.x + nx, y: point.y + ny },
    ],
    stroke,
  );
  return [nx, ny];
}

const ARROW_PX = 26;
const HEAD_PX = 6;
const ARROW_INSET_PX = 16;
/** No farther from the middle than this share of the shorter side. */
const FARTHEST_SHARE = 0.66;
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
    FARTHEST_SHARE * Math.min(widthPx, heightPx),
  );
  const at = (along: number, aside: number) => ({
    x: widthPx / 2 + ux * along - uy * aside,
    y: heightPx / 2 + uy * along + ux * aside,
  });
  const middle = at(reach - ARROW_PX / 2, 0);
  const spot = { left: middle.x, right: middle.x, top: middle.y, bottom: middle.y };
  if (sheet.taken.some((box) => overlaps(box, spot))) return;
  pen.flat([at(reach - ARROW_PX, 0), at(reach, 0)], stroke);
  pen.flat(
    [at(reach - HEAD_PX, HEAD_PX / 2.4), at(reach, 0), at(reach - HEAD_PX, -HEAD_PX / 2.4)],
    stroke,
  );
  keepClear(sheet, { ...middle, depthKm: 0 }, 5);
  label(sheet, middle, {
    id: `far ${name}`,
    prefer: Math.abs(ux) > Math.abs(uy) ? [0, -1] : [ux >= 0 ? -1 : 1, 0],
    text: name,
    gap: 8,
    style: 'note',
    colour: inks.rgb.inkSoft,
    priority: 40,
  });
}

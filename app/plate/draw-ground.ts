import {
  type GeoPermissibleObjects,
  type GeoProjection,
  geoDistance,
  geoEquirectangular,
  geoGraticule,
  geoPath,
} from 'd3-geo';
import type { ReportCorridor } from '../../core/report/corridor';
import type { Approach } from '../../core/report/report';
import { groundTrack, type LonLat } from '../charts/ground-track';
import { LAND } from '../charts/land';
import { type CorridorShapes, corridorShapes } from '../charts/map-corridor';
import {
  closeProjection,
  graticuleStep,
  placeWords,
  WIDEST_CLOSE_DEG,
} from '../charts/map-geometry';
import type { Trajectory } from '../worker/trajectory';
import { type Area, frame, type Pen, rule, shortened, write, writeCaps, writeClear } from './pen';

const CAPS_PX = 16;
/** Width of the map, degrees of longitude. */
const ACROSS_DEG = 100;
const FOOT_PX = 30;
/** Track left out beyond this from the entry, radians: it belongs to another side of the Earth. */
const TRACK_RAD = 1.2;

const GRATICULE_DEG = 10;
/** Of the bands of density, densest first, as on the page's map. */
const BAND_OPACITY = [0.62, 0.46, 0.32, 0.2, 0.1];
const TICK_FACE = { px: 16 };

/**
 * The place of entry, and of the ground where there is one, on a map about it; the corridor of the
 * clones that hit where there is one, and then the map is about that.
 */
export function drawGround(
  pen: Pen,
  area: Area,
  approach: Approach,
  trajectory: Trajectory,
  corridor: ReportCorridor | null = null,
): void {
  const { context, palette } = pen;
  const { entry } = approach;
  const shapes = corridor === null ? null : corridorShapes(corridor);
  const at: LonLat | null =
    entry === undefined ? (shapes?.centre ?? null) : [entry.longitudeDeg, entry.latitudeDeg];
  if (at === null) return;
  writeCaps(pen, 'Over the ground', area.x, area.y, 17, palette.inkSoft);
  const box = { ...area, y: area.y + CAPS_PX, height: area.height - CAPS_PX };
  const map = { ...box, height: box.height - FOOT_PX };
  const close = shapes !== null && shapes.radiusDeg <= WIDEST_CLOSE_DEG ? shapes : null;
  const projection = close === null ? aboutEntry(map, at, shapes) : aboutCorridor(map, close);
  const path = geoPath(projection, context);
  const stroke = (shape: GeoPermissibleObjects, colour: string, width: number): void => {
    context.beginPath();
    path(shape);
    context.strokeStyle = colour;
    context.lineWidth = width;
    context.stroke();
  };
  const step = close === null ? GRATICULE_DEG : graticuleStep(close.radiusDeg);
  stroke(geoGraticule().step([step, step])(), palette.hairline, 1);
  fill(pen, () => path(LAND), palette.earth, 0.14);
  stroke(LAND, palette.earth, 1.4);
  if (shapes !== null) {
    for (const [i, { shape }] of shapes.bands.entries()) {
      fill(pen, () => path(shape), palette.object, BAND_OPACITY[i]);
    }
    stroke(shapes.most, palette.object, 1);
    stroke(shapes.half, palette.object, 2);
    stroke(shapes.axes, palette.ink, 2);
    writeTimes(pen, map, shapes, projection);
  }
  if (entry !== undefined) {
    stroke(
      { type: 'LineString', coordinates: nearTrack(approach, trajectory, at) },
      palette.object,
      2.6,
    );
    drawMarks(pen, approach, at, projection);
  }
  frame(pen, box, palette.ink);
  const foot = map.y + map.height;
  rule(pen, [box.x, foot, box.x + box.width, foot], palette.ink);
  const words = footWords(approach, corridor);
  const face = { px: 17 };
  write(pen, shortened(pen, words, face, box.width - 16), box.x + 8, foot + 21, face, palette.ink);
}

function aboutEntry(map: Area, at: LonLat, shapes: CorridorShapes | null): GeoProjection {
  // A corridor too long for a close map is shown on the whole width of the Earth.
  const across = shapes === null ? ACROSS_DEG : 360;
  const middle = shapes?.centre ?? at;
  return geoEquirectangular()
    .rotate([-middle[0], 0])
    .center([0, shapes === null ? Math.max(-60, Math.min(60, at[1])) : 0])
    .translate([map.x + map.width / 2, map.y + map.height / 2])
    .scale(map.width / ((across * Math.PI) / 180))
    .clipExtent([
      [map.x, map.y],
      [map.x + map.width, map.y + map.height],
    ]);
}

function aboutCorridor(map: Area, { centre, radiusDeg }: CorridorShapes): GeoProjection {
  return closeProjection(map.width, map.height, centre, radiusDeg)
    .translate([map.x + map.width / 2, map.y + map.height / 2])
    .clipExtent([
      [map.x, map.y],
      [map.x + map.width, map.y + map.height],
    ]);
}

function fill({ context }: Pen, trace: () => void, colour: string, opacity: number): void {
  context.beginPath();
  trace();
  context.globalAlpha = opacity;
  context.fillStyle = colour;
  context.fill();
  context.globalAlpha = 1;
}

/** Moments of entry along the axis, beside it. */
function writeTimes(
  pen: Pen,
  map: Area,
  { ticks }: CorridorShapes,
  projection: GeoProjection,
): void {
  const written: [number, number][] = [];
  for (const { at, onward, words } of ticks) {
    const [x, y] = projection(at) ?? [0, 0];
    const [nextX, nextY] = projection(onward) ?? [0, 0];
    const length = Math.max(Math.hypot(nextX - x, nextY - y), 1e-9);
    const acrossX = (nextY - y) / length;
    const acrossY = -(nextX - x) / length;
    const isClear = written.every(([a, b]) => Math.hypot(a - x, b - y) > 3 * TICK_FACE.px);
    const isShown = x >= map.x && x <= map.x + map.width && y >= map.y && y <= map.y + map.height;
    if (!isShown) continue;
    rule(
      pen,
      [x - 7 * acrossX, y - 7 * acrossY, x + 7 * acrossX, y + 7 * acrossY],
      pen.palette.ink,
      2,
    );
    if (!isClear) continue;
    written.push([x, y]);
    // On the side with more room.
    const side = acrossX === 0 || x + 70 < map.x + map.width ? 1 : -1;
    writeClear(pen, words, x + side * 12, y + 22, TICK_FACE, side === 1 ? 'left' : 'right');
  }
}

function drawMarks(
  pen: Pen,
  { surfaceImpact }: Approach,
  at: LonLat,
  projection: GeoProjection,
): void {
  const { context, palette } = pen;
  const [x, y] = projection(at) ?? [0, 0];
  context.beginPath();
  context.moveTo(x - 10, y - 8);
  context.lineTo(x + 10, y - 8);
  context.lineTo(x, y + 9);
  context.closePath();
  context.fillStyle = palette.ground;
  context.fill();
  context.strokeStyle = palette.object;
  context.lineWidth = 2.6;
  context.stroke();
  const ground =
    surfaceImpact === undefined
      ? null
      : projection([surfaceImpact.longitudeDeg, surfaceImpact.latitudeDeg]);
  if (ground !== null) {
    const [gx, gy] = ground;
    rule(pen, [gx - 8, gy - 8, gx + 8, gy + 8], palette.ink, 3);
    rule(pen, [gx + 8, gy - 8, gx - 8, gy + 8], palette.ink, 3);
  }
  writeClear(pen, placeWords(at), x + 18, y - 14, { px: 18 });
}

function footWords({ entry, surfaceImpact }: Approach, corridor: ReportCorridor | null): string {
  if (corridor !== null) {
    const strip = 'if it hits: 50 and 95\u2009% lines; axis, UTC';
    return entry === undefined ? strip : `${strip}; triangle: nominal entry`;
  }
  return surfaceImpact === undefined
    ? 'triangle: entry interface, 100\u2009km up'
    : 'triangle: entry; cross: ground, no air';
}

/** The part of the ground track about the entry, in one piece. */
function nearTrack(approach: Approach, trajectory: Trajectory, at: LonLat): LonLat[] {
  const points = groundTrack(approach, trajectory)?.points ?? [];
  const isNear = (point: LonLat): boolean => geoDistance(point, at) < TRACK_RAD;
  let nearest = 0;
  for (const [i, point] of points.entries()) {
    if (geoDistance(point, at) < geoDistance(points[nearest], at)) nearest = i;
  }
  let first = nearest;
  while (first > 0 && isNear(points[first - 1])) first -= 1;
  let last = nearest;
  while (last < points.length - 1 && isNear(points[last + 1])) last += 1;
  return points.slice(first, last + 1);
}

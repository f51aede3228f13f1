import { geoDistance, geoEquirectangular, geoGraticule10, geoPath } from 'd3-geo';
import type { Approach } from '../../core/report/report';
import { groundTrack, type LonLat } from '../charts/ground-track';
import { LAND } from '../charts/land';
import { placeWords } from '../charts/map-geometry';
import type { Trajectory } from '../worker/trajectory';
import { type Area, frame, type Pen, rule, shortened, write, writeCaps, writeClear } from './pen';

const CAPS_PX = 16;
/** Width of the map, degrees of longitude. */
const ACROSS_DEG = 100;
const FOOT_PX = 30;
/** Track left out beyond this from the entry, radians: it belongs to another side of the Earth. */
const TRACK_RAD = 1.2;

/** The place of entry, and of the ground where there is one, on a map about it. */
export function drawGround(pen: Pen, area: Area, approach: Approach, trajectory: Trajectory): void {
  const { context, palette } = pen;
  const { entry, surfaceImpact } = approach;
  if (entry === undefined) return;
  writeCaps(pen, 'Over the ground', area.x, area.y, 17, palette.inkSoft);
  const box = { ...area, y: area.y + CAPS_PX, height: area.height - CAPS_PX };
  const at: LonLat = [entry.longitudeDeg, entry.latitudeDeg];
  const projection = geoEquirectangular()
    .rotate([-at[0], 0])
    .center([0, Math.max(-60, Math.min(60, at[1]))])
    .translate([box.x + box.width / 2, box.y + (box.height - FOOT_PX) / 2])
    .scale(box.width / ((ACROSS_DEG * Math.PI) / 180))
    .clipExtent([
      [box.x, box.y],
      [box.x + box.width, box.y + box.height - FOOT_PX],
    ]);
  const path = geoPath(projection, context);
  const stroke = (colour: string, width: number): void => {
    context.strokeStyle = colour;
    context.lineWidth = width;
    context.stroke();
  };
  context.beginPath();
  path(geoGraticule10());
  stroke(palette.hairline, 1);
  context.beginPath();
  path(LAND);
  context.globalAlpha = 0.14;
  context.fillStyle = palette.earth;
  context.fill();
  context.globalAlpha = 1;
  stroke(palette.earth, 1.4);
  context.beginPath();
  path({ type: 'LineString', coordinates: nearTrack(approach, trajectory, at) });
  stroke(palette.object, 2.6);
  const [x, y] = projection(at) ?? [0, 0];
  context.beginPath();
  context.moveTo(x - 10, y - 8);
  context.lineTo(x + 10, y - 8);
  context.lineTo(x, y + 9);
  context.closePath();
  context.fillStyle = palette.ground;
  context.fill();
  stroke(palette.object, 2.6);
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
  frame(pen, box, palette.ink);
  const foot = box.y + box.height - FOOT_PX;
  rule(pen, [box.x, foot, box.x + box.width, foot], palette.ink);
  const words =
    surfaceImpact === undefined
      ? 'triangle: entry interface, 100\u2009km up'
      : 'triangle: entry; cross: ground, no air';
  const face = { px: 17 };
  write(pen, shortened(pen, words, face, box.width - 16), box.x + 8, foot + 21, face, palette.ink);
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

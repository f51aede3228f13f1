import { add, cross, dot, scale, subtract, unit, type Vec3, vec3 } from '../worker/core-geometry';
import { SPREAD, type Spread } from '../worker/spread';
import type { CurvePoints } from './curve';
import { label } from './marks';
import type { Sheet } from './sheet';
import type { TrajectoryCurve } from './trajectory-curve';

/** Where the object may be: the 3-σ ellipsoid at the clock, and the tube it sweeps along the path. */

const SIGMAS = 3;
/** A tube thinner than this to either side is not seen beside its path, px. */
const LEAST_TUBE_PX = 1.5;
/** An ellipsoid shorter than this to either side is hidden by the object's mark, px. */
const LEAST_ELLIPSOID_PX = 7;
/** From ring to ring along the picture, px. */
const RING_ROOM_PX = 13;
const MOST_RINGS = 70;
const RING_POINTS = 24;
const ELLIPSOID_POINTS = 72;
/** Stops of the tube between two points of the path: its width changes where the path is straight. */
const STOPS = 3;

const row = new Float64Array(SPREAD.stride);
const ring = new Float64Array(3 * (RING_POINTS + 1));
const outline = new Float64Array(3 * (ELLIPSOID_POINTS + 1));

/** C x, with C the covariance of a row of the spread. */
export function covarianceTimes(from: Float64Array, x: Vec3): Vec3 {
  const [xx, xy, xz, yy, yz, zz] = from.subarray(SPREAD.covariance, SPREAD.covariance + 6);
  return [
    xx * x[0] + xy * x[1] + xz * x[2],
    xy * x[0] + yy * x[1] + yz * x[2],
    xz * x[0] + yz * x[1] + zz * x[2],
  ];
}

/**
 * The 3-σ ellipse of a covariance's shadow on the plane of two perpendicular unit vectors: its
 * points are cos θ · first + sin θ · second, in the coordinates of the plane.
 * Singular shadows give a stroke or a point.
 */
export function shadow(
  from: Float64Array,
  e: Vec3,
  f: Vec3,
): { first: [number, number]; second: [number, number] } {
  const ce = covarianceTimes(from, e);
  const cf = covarianceTimes(from, f);
  const a = Math.sqrt(Math.max(0, dot(e, ce)));
  const b = a === 0 ? 0 : dot(f, ce) / a;
  const c = Math.sqrt(Math.max(0, dot(f, cf) - b * b));
  return { first: [SIGMAS * a, SIGMAS * b], second: [0, SIGMAS * c] };
}

/** Two unit vectors perpendicular to a unit vector and to each other. */
export function across(direction: Vec3): [Vec3, Vec3] {
  const least = direction.map(Math.abs).indexOf(Math.min(...direction.map(Math.abs)));
  const axis: Vec3 = [least === 0 ? 1 : 0, least === 1 ? 1 : 0, least === 2 ? 1 : 0];
  const e = unit(cross(direction, axis));
  return [e, cross(direction, e)];
}

/** The tube: both of its edges as they are seen, and rings across it. */
export function drawTube(
  sheet: Sheet,
  spread: Spread,
  curve: TrajectoryCurve,
  path: CurvePoints,
): void {
  const { pen, projector, inks } = sheet;
  const edges: [number[], number[]] = [[], []];
  const flush = (): void => {
    for (const edge of edges) {
      pen.line(Float64Array.from(edge), edge.length / 3, inks.tubeEdge);
      edge.length = 0;
    }
  };
  const here = new Float64Array(6);
  let rings = 0;
  let last: { x: number; y: number } | null = null;
  for (let i = 0; i < path.count; i++) {
    const start = path.parameters[i];
    const end = i + 1 < path.count ? path.parameters[i + 1] : start;
    for (let k = 0; k < (end > start ? STOPS : 1); k++) {
      const parameter = start + ((end - start) * k) / STOPS;
      curve.at(parameter, here, 0);
      const p = vec3(here);
      const point = projector.project(p);
      const direction = directionAt(curve, parameter, here);
      if (point === null || direction === null || !spread.at(curve.timeAt(parameter), row)) {
        flush();
        continue;
      }
      const sideways = cross(direction, subtract(p, projector.eye));
      if (dot(sideways, sideways) === 0) continue;
      const n = unit(sideways);
      const width = SIGMAS * Math.sqrt(Math.max(0, dot(n, covarianceTimes(row, n))));
      if (!((width * projector.focalPx) / point.depthKm >= LEAST_TUBE_PX)) {
        flush();
        continue;
      }
      edges[0].push(...add(p, scale(n, width)));
      edges[1].push(...add(p, scale(n, -width)));
      const isClear =
        last === null || Math.hypot(point.x - last.x, point.y - last.y) > RING_ROOM_PX;
      if (rings < MOST_RINGS && isClear && projector.shows(point)) {
        drawRing(sheet, p, direction);
        last = point;
        rings += 1;
      }
    }
  }
  flush();
}

/** Direction of flight, null where the curve stands still. */
function directionAt(curve: TrajectoryCurve, parameter: number, at: Float64Array): Vec3 | null {
  const step = Math.min(1e-3, (curve.to - curve.from) / 2);
  const from = Math.max(curve.from, parameter - step);
  curve.at(from, at, 3);
  const a = vec3(at, 3);
  curve.at(Math.min(curve.to, from + 2 * step), at, 3);
  const way = subtract(vec3(at, 3), a);
  return dot(way, way) > 0 ? unit(way) : null;
}

function drawRing(sheet: Sheet, p: Vec3, direction: Vec3): void {
  const [e, f] = across(direction);
  const { first, second } = shadow(row, e, f);
  for (let j = 0; j <= RING_POINTS; j++) {
    const angle = (2 * Math.PI * j) / RING_POINTS;
    const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
    const x = add(
      scale(e, first[0] * cos + second[0] * sin),
      scale(f, first[1] * cos + second[1] * sin),
    );
    ring.set(add(p, x), 3 * j);
  }
  sheet.pen.line(ring, RING_POINTS + 1, sheet.inks.tubeRing);
}

/** The outline of the 3-σ ellipsoid about the object, as it is seen from afar. */
export function drawEllipsoid(sheet: Sheet, spread: Spread, p: Vec3): void {
  const { pen, projector, inks } = sheet;
  const centre = projector.project(p);
  if (centre === null || !spread.at(sheet.tdbSeconds, row)) return;
  const [e, f] = across(unit(subtract(p, projector.eye)));
  const { first, second } = shadow(row, e, f);
  const [a, b, c] = [first[0] / SIGMAS, first[1] / SIGMAS, second[1] / SIGMAS];
  const reachPx = (Math.hypot(first[0], first[1], c * SIGMAS) * projector.focalPx) / centre.depthKm;
  if (!(reachPx >= LEAST_ELLIPSOID_PX)) return;
  // Points of the ellipsoid itself that the shadow's edge comes from: C N A⁻ᵀ, with A Aᵀ the shadow.
  const ce = covarianceTimes(row, e);
  const cf = covarianceTimes(row, f);
  const one = a > 0 ? scale(ce, SIGMAS / a) : scale(e, 0);
  const two =
    c > 1e-6 * Math.hypot(a, b)
      ? scale(subtract(cf, a > 0 ? scale(ce, b / a) : scale(e, 0)), SIGMAS / c)
      : scale(e, 0);
  let tip: { x: number; y: number; depthKm: number } = centre;
  for (let j = 0; j <= ELLIPSOID_POINTS; j++) {
    const angle = (2 * Math.PI * j) / ELLIPSOID_POINTS;
    const x = add(p, add(scale(one, Math.cos(angle)), scale(two, Math.sin(angle))));
    outline.set(x, 3 * j);
    const point = projector.project(x);
    if (point !== null && projector.shows(point, -20) && farther(point, tip, centre)) tip = point;
  }
  pen.line(outline, ELLIPSOID_POINTS + 1, inks.ellipsoid);
  if (tip === centre) return;
  label(sheet, tip, {
    id: 'spread',
    text: '3\u2009σ',
    gap: 5,
    style: 'note',
    colour: inks.rgb.object,
    priority: 35,
  });
}

type Place = { x: number; y: number };

function farther(a: Place, b: Place, centre: Place): boolean {
  const from = (p: Place): number => Math.hypot(p.x - centre.x, p.y - centre.y);
  return from(a) > from(b);
}

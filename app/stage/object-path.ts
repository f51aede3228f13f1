import type { Approach } from '../../core/report/report';
import type { SceneName } from '../plate/scene-source';
import { dot, ECLIPTIC_POLE_ICRF, scale, subtract, type Vec3, vec3 } from '../worker/core-geometry';
import { CurvePoints, decimate } from './curve';
import { distance, offset } from './figures';
import { label, objectMark, ring, tick } from './marks';
import { tickOffsets, tickStep } from './path-ticks';
import type { PicturePoint } from './projection';
import type { Moment, Sheet } from './sheet';
import {
  OBJECT_GEOCENTRIC,
  OBJECT_HELIOCENTRIC,
  type TrajectoryCurve,
  trajectoryCurve,
  UNPERTURBED_GEOCENTRIC,
  UNPERTURBED_HELIOCENTRIC,
} from './trajectory-curve';
import { drawTube } from './tube';

/** The object's path in a scene: where it has been, where it will be, and without the Earth's pull. */

const MOST_TICKS = 8;
const LEAST_PASS_PX = 14;
/** A wider pass of the Moon is not marked: one and a half times its sphere of influence. */
const NEAR_MOON_KM = 100_000;
/** Halvings that find where the path leaves the picture. */
const EDGE_STEPS = 10;
/** Marks nearer than this to the pass or the object are left out, px. */
const TICK_ROOM_PX = 16;
/** The unperturbed path is named where it stands this clear of the n-body path, px. */
const APART_PX = 26;

const points = new CurvePoints();
const unperturbedPoints = new CurvePoints();

export function drawPath(sheet: Sheet, moment: Moment, scene: SceneName): void {
  const { trajectory, sample } = moment;
  const { pen, inks, projector } = sheet;
  const own = trajectoryCurve(
    trajectory,
    scene === 'earth' ? OBJECT_GEOCENTRIC : OBJECT_HELIOCENTRIC,
  );
  if (moment.showUnperturbed) drawUnperturbed(sheet, moment, scene, own);
  decimate(own, projector, points);
  if (moment.spread !== null) drawTube(sheet, moment.spread, own, points);
  const now = own.parameterAt(sample[0]);
  const split = splitAt(own, points, now);
  pen.line(split.before, split.before.length / 3, inks.behind);
  pen.line(split.after, split.after.length / 3, inks.ahead);
  drawTicks(sheet, moment, scene, own);
  if (scene === 'earth') markApproaches(sheet, moment, own);
}

/** Where the path comes nearest to the Earth and the Moon, once that stands clear of the body. */
function markApproaches(sheet: Sheet, moment: Moment, own: TrajectoryCurve): void {
  const { inks, projector } = sheet;
  for (const approach of moment.report?.approaches ?? []) {
    const { body, distanceKm, outcome, tdbSeconds } = approach;
    if (body !== 'Earth' && !(body === 'Moon' && distanceKm < NEAR_MOON_KM)) continue;
    const point = pointOf(sheet, own, tdbSeconds);
    if (point === null || distanceKm * (projector.focalPx / point.depthKm) < LEAST_PASS_PX)
      continue;
    ring(sheet, point, 3.2, inks.rgb.object);
    label(sheet, point, {
      id: `approach ${tdbSeconds}`,
      text: approachWords(body, outcome, distanceKm),
      gap: 8,
      style: 'note',
      colour: inks.rgb.object,
      priority: tdbSeconds === moment.encounter.tdbSeconds ? 60 : 55,
    });
  }
}

function approachWords(
  body: 'Earth' | 'Moon',
  outcome: Approach['outcome'],
  distanceKm: number,
): string {
  if (outcome === 'impact') return body === 'Earth' ? 'meets the ground' : 'meets the Moon';
  return `${body === 'Earth' ? 'closest' : 'closest to the Moon'}, ${distance(distanceKm)}`;
}

/** The points before and after a parameter, both with the curve's own point there. */
function splitAt(
  curve: TrajectoryCurve,
  all: CurvePoints,
  parameter: number,
): { before: Float64Array; after: Float64Array } {
  let k = 0;
  while (k < all.count && all.parameters[k] < parameter) k += 1;
  const here = new Float64Array(3);
  curve.at(parameter, here, 0);
  const before = new Float64Array(3 * (k + 1));
  before.set(all.xyz.subarray(0, 3 * k));
  before.set(here, 3 * k);
  const after = new Float64Array(3 * (all.count - k + 1));
  after.set(here);
  after.set(all.xyz.subarray(3 * k, 3 * all.count), 3);
  return { before, after };
}

function pointOf(sheet: Sheet, curve: TrajectoryCurve, tdbSeconds: number): PicturePoint | null {
  const here = new Float64Array(3);
  curve.at(curve.parameterAt(tdbSeconds), here, 0);
  return visiblePoint(sheet, vec3(here));
}

/** The picture of a point, null when it is off it or behind a globe. */
export function visiblePoint(sheet: Sheet, p: Vec3): PicturePoint | null {
  const { projector, pen } = sheet;
  const point = projector.project(p);
  if (point === null || !projector.shows(point)) return null;
  const fromEye = subtract(p, projector.eye);
  return pen.globes.some((globe) => globe.hides(fromEye)) ? null : point;
}

function drawUnperturbed(
  sheet: Sheet,
  moment: Moment,
  scene: SceneName,
  own: TrajectoryCurve,
): void {
  const { pen, inks, projector } = sheet;
  const terms = scene === 'earth' ? UNPERTURBED_GEOCENTRIC : UNPERTURBED_HELIOCENTRIC;
  const curve = trajectoryCurve(moment.trajectory, terms);
  const flown = unperturbedPoints;
  decimate(curve, projector, flown);
  pen.line(flown.xyz, flown.count, inks.unperturbed);
  // Named in the middle of the stretch that is seen apart from the n-body path.
  const apart: PicturePoint[] = [];
  const here = new Float64Array(3);
  for (let i = 0; i < flown.count; i++) {
    const point = visiblePoint(sheet, vec3(flown.xyz, 3 * i));
    if (point === null) continue;
    own.at(flown.parameters[i], here, 0);
    const twin = projector.project(vec3(here));
    if (twin === null || Math.hypot(twin.x - point.x, twin.y - point.y) > APART_PX) {
      apart.push(point);
    }
  }
  if (apart.length === 0) return;
  label(sheet, apart[apart.length >> 1], {
    id: 'unperturbed',
    text: 'unperturbed',
    gap: 6,
    style: 'note',
    colour: inks.rgb.object,
    priority: 30,
  });
}

function drawTicks(sheet: Sheet, moment: Moment, scene: SceneName, own: TrajectoryCurve): void {
  const { inks } = sheet;
  const at = moment.encounter.tdbSeconds;
  const seen = seenOffsets(sheet, own, at);
  if (seen === null) return;
  const here = new Float64Array(3);
  const beside = new Float64Array(3);
  let last: PicturePoint | null = pointOf(sheet, own, at);
  const step = tickStep(seen[1] - seen[0], MOST_TICKS);
  for (const seconds of tickOffsets(seen[0], seen[1], step)) {
    const parameter = own.parameterAt(at + seconds);
    own.at(parameter, here, 0);
    const p = vec3(here);
    const point = visiblePoint(sheet, p);
    if (scene === 'sun' && point !== null) dropLine(sheet, p);
    if (point === null) continue;
    own.at(Math.min(own.to, parameter + 1e-3), beside, 0);
    const prefer = tick(sheet, point, subtract(vec3(beside), p), 3.5, inks.objectHair);
    if (last !== null && Math.hypot(point.x - last.x, point.y - last.y) < TICK_ROOM_PX) continue;
    last = point;
    label(sheet, point, {
      id: `tick ${seconds}`,
      text: offset(seconds, step),
      gap: 6,
      prefer,
      style: 'figure',
      colour: inks.rgb.inkSoft,
      priority: 20,
    });
  }
}

/**
 * Offsets from the pass between which the path is on the picture: the stretch around the pass, or
 * around the object where the pass is off the picture; null when neither is on it.
 */
function seenOffsets(sheet: Sheet, own: TrajectoryCurve, at: number): [number, number] | null {
  const { parameters, xyz, count } = points;
  const here = new Float64Array(3);
  const isOn = (p: Vec3): boolean => {
    const point = sheet.projector.project(p);
    return point !== null && sheet.projector.shows(point);
  };
  const isSeen = (parameter: number): boolean => {
    own.at(parameter, here, 0);
    return isOn(vec3(here));
  };
  const middle = [own.parameterAt(at), own.parameterAt(sheet.tdbSeconds)].find(isSeen);
  if (middle === undefined) return null;
  let next = 0;
  while (next < count && parameters[next] <= middle) next += 1;
  let last = next;
  while (last < count && isOn(vec3(xyz, 3 * last))) last += 1;
  let first = next - 1;
  while (first >= 0 && isOn(vec3(xyz, 3 * first))) first -= 1;
  const edge = (inside: number, outside: number): number => {
    let [on, off] = [inside, outside];
    for (let i = 0; i < EDGE_STEPS && !isSeen(off); i++) {
      const half = (on + off) / 2;
      if (isSeen(half)) on = half;
      else off = half;
    }
    return own.timeAt(isSeen(off) ? off : on) - at;
  };
  return [
    edge(first + 1 < next ? parameters[first + 1] : middle, parameters[Math.max(0, first)]),
    edge(last > next ? parameters[last - 1] : middle, parameters[Math.min(count - 1, last)]),
  ];
}

/** A plumb line to the plane of the ecliptic. */
export function dropLine(sheet: Sheet, p: Vec3, stroke = sheet.inks.grid): void {
  const height = dot(p, ECLIPTIC_POLE_ICRF);
  sheet.pen.segmentLine(p, subtract(p, scale(ECLIPTIC_POLE_ICRF, height)), stroke);
}

/** The object's marker and name at a place of the scene. */
export function drawObject(sheet: Sheet, p: Vec3, name: string): void {
  const { projector, pen, inks } = sheet;
  const point = projector.project(p);
  if (point === null) return;
  const fromEye = subtract(p, projector.eye);
  const hidden = pen.globes.some((globe) => globe.hides(fromEye));
  objectMark(sheet, point, hidden);
  label(sheet, point, {
    id: 'object',
    text: name,
    gap: 11,
    style: 'name',
    colour: inks.rgb.object,
    priority: 100,
    must: true,
  });
}

import type { Approach } from '../../core/report/report';
import { grouped } from '../desk/figures';
import { aimOf, bodyRadiusKm, type Place, type PlaneAxes, turnBetween } from './plane-axes';
import { centreOn, type PlaneView } from './plane-view';

export interface PlaneGeometry {
  /** The body's centre, px from the sheet's left and top. */
  x: number;
  y: number;
  pxPerKm: number;
  /** Radii of the body and of its capture disc, px. */
  discPx: number;
  capturePx: number;
  /** Where the incoming line of motion pierces the plane, px. */
  aim: { x: number; y: number };
  /** Whether the aim lies inside the sheet. */
  aimIsShown: boolean;
  /** The 1, 2 and 3 σ ellipses about the aim; null without a covariance. */
  ellipse: { majorPx: number; minorPx: number; turnDeg: number } | null;
  ticks: { across: PlaneTick[]; upright: PlaneTick[] };
  project: Projection;
}

/** From B·T and B·R in km to px: x = x0 + xT T + xR R, y = y0 + yT T + yR R. */
export interface Projection {
  x0: number;
  xT: number;
  xR: number;
  y0: number;
  yT: number;
  yR: number;
}

interface PlaneTick {
  /** Along its axis, px from the left or from the top. */
  px: number;
  words: string;
}

const LEAST_TICK_PX = 64;

/** A round step (1, 2 or 5 times a power of ten) of at least `least`. */
export function roundStep(least: number): number {
  const power = 10 ** Math.floor(Math.log10(least));
  return [1, 2, 5, 10].map((n) => n * power).find((step) => step >= least * (1 - 1e-9)) ?? power;
}

/** Pixels of a view for each kilometre: the shorter side of the sheet is twice the half width. */
export function pxPerKmOf(view: PlaneView, widthPx: number, heightPx: number): number {
  return Math.min(widthPx, heightPx) / 2 / view.halfKm;
}

/**
 * The target plane in pixels.
 *
 * @returns null when the approach has no target plane
 */
export function planeGeometry(
  approach: Approach,
  axes: PlaneAxes,
  view: PlaneView,
  widthPx: number,
  heightPx: number,
): PlaneGeometry | null {
  const plane = approach.targetPlane;
  const aim = aimOf(approach, axes);
  if (plane === null || aim === null) return null;
  const pxPerKm = pxPerKmOf(view, widthPx, heightPx);
  const centre = centreOn(view, approach, axes);
  const x = widthPx / 2 - centre.across * pxPerKm;
  const y = heightPx / 2 - centre.down * pxPerKm;
  const at = { x: x + aim.across * pxPerKm, y: y + aim.down * pxPerKm };
  const step = roundStep(LEAST_TICK_PX / pxPerKm);
  return {
    x,
    y,
    pxPerKm,
    discPx: bodyRadiusKm(approach) * pxPerKm,
    capturePx: plane.impactRadiusKm * pxPerKm,
    aim: at,
    aimIsShown: at.x >= 0 && at.x <= widthPx && at.y >= 0 && at.y <= heightPx,
    ellipse: ellipseOf(approach, axes, pxPerKm),
    ticks: {
      across: ticksAlong(widthPx, x, pxPerKm, step, 1),
      upright: ticksAlong(heightPx, y, pxPerKm, step, axes === 'tr' ? 1 : -1),
    },
    project: projectionOf(turnBetween(approach, axes), x, y, pxPerKm),
  };
}

function projectionOf(turnRad: number, x: number, y: number, pxPerKm: number): Projection {
  const cos = Math.cos(turnRad) * pxPerKm;
  const sin = Math.sin(turnRad) * pxPerKm;
  return { x0: x, xT: cos, xR: -sin, y0: y, yT: sin, yR: cos };
}

/** B·T and B·R of a point on the sheet, km. */
export function unprojected(project: Projection, xPx: number, yPx: number): Place {
  const { x0, xT, xR, y0, yT, yR } = project;
  const scale = xT * yR - xR * yT;
  const x = xPx - x0;
  const y = yPx - y0;
  return { across: (x * yR - y * xR) / scale, down: (y * xT - x * yT) / scale };
}

/** Half axes of the 1 σ ellipse, and its turn on the sheet (clockwise, as SVG turns). */
function ellipseOf(approach: Approach, axes: PlaneAxes, pxPerKm: number): PlaneGeometry['ellipse'] {
  const ellipse = approach.uncertainty?.ellipse ?? null;
  if (ellipse === null) return null;
  return {
    majorPx: ellipse.semiMajorKm * pxPerKm,
    minorPx: ellipse.semiMinorKm * pxPerKm,
    turnDeg: axes === 'tr' ? ellipse.angleTrDeg : -ellipse.angleXiZetaDeg,
  };
}

/** Ticks at whole steps from the body's centre, which may lie beyond the sheet. */
function ticksAlong(
  lengthPx: number,
  originPx: number,
  pxPerKm: number,
  step: number,
  sign: number,
): PlaneTick[] {
  const first = Math.ceil(-originPx / pxPerKm / step - 1e-9);
  const last = Math.floor((lengthPx - originPx) / pxPerKm / step + 1e-9);
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  return Array.from({ length: last - first + 1 }, (_, i) => {
    const km = (first + i) * step;
    return { px: originPx + km * pxPerKm, words: grouped(sign * km, decimals) };
  });
}

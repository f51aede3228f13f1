import type { Approach } from '../../core/report/report';
import { grouped } from '../desk/figures';

/** Which pair of axes the target plane is drawn on. */
export type PlaneAxes = 'tr' | 'xi-zeta';

export const AXES_WORDS: Record<
  PlaneAxes,
  { across: string; upright: string; uprightPointsDown: boolean }
> = {
  tr: { across: 'T', upright: 'R', uprightPointsDown: true },
  'xi-zeta': { across: 'ξ', upright: 'ζ', uprightPointsDown: false },
};

export interface PlaneGeometry {
  /** The body's centre, px. */
  x: number;
  y: number;
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
}

interface PlaneTick {
  /** Along its axis, px from the left or from the top. */
  px: number;
  words: string;
}

/** Both axes run the same way on the sheet, seen along the incoming motion. */
function aimOf(approach: Approach, axes: PlaneAxes): { across: number; down: number } | null {
  const plane = approach.targetPlane;
  if (plane === null) return null;
  return axes === 'tr'
    ? { across: plane.bDotTKm, down: plane.bDotRKm }
    : { across: plane.xiKm, down: -plane.zetaKm };
}

/** The body's radius as the report has it, km. */
export function bodyRadiusKm({ distanceKm, distanceRadii }: Approach): number {
  return distanceKm / distanceRadii;
}

/** Widest half width, km. */
const WIDEST_KM = 1e6;

/** Half the sheet's shorter side, km: wide enough for the aim and the capture disc. */
export function fittingHalfKm(approach: Approach): number {
  const aim = aimOf(approach, 'tr');
  const capture = approach.targetPlane?.impactRadiusKm ?? 0;
  return 1.3 * Math.max(capture, aim === null ? 0 : Math.hypot(aim.across, aim.down));
}

/** Keeps a half width between the body's radius and a million kilometres, or what fits if wider. */
export function limitedHalfKm(approach: Approach, halfKm: number): number {
  const widest = Math.max(WIDEST_KM, fittingHalfKm(approach));
  return Math.min(Math.max(halfKm, bodyRadiusKm(approach)), widest);
}

const LEAST_TICK_PX = 64;

/** A round step (1, 2 or 5 times a power of ten) of at least `least`. */
export function roundStep(least: number): number {
  const power = 10 ** Math.floor(Math.log10(least));
  return [1, 2, 5, 10].map((n) => n * power).find((step) => step >= least * (1 - 1e-9)) ?? power;
}

/**
 * The target plane in pixels.
 *
 * @param halfKm half the sheet's shorter side, km
 * @returns      null when the approach has no target plane
 */
export function planeGeometry(
  approach: Approach,
  axes: PlaneAxes,
  halfKm: number,
  widthPx: number,
  heightPx: number,
): PlaneGeometry | null {
  const plane = approach.targetPlane;
  const aim = aimOf(approach, axes);
  if (plane === null || aim === null) return null;
  const pxPerKm = Math.min(widthPx, heightPx) / 2 / halfKm;
  const x = widthPx / 2;
  const y = heightPx / 2;
  const at = { x: x + aim.across * pxPerKm, y: y + aim.down * pxPerKm };
  const step = roundStep(LEAST_TICK_PX / pxPerKm);
  const down = AXES_WORDS[axes].uprightPointsDown ? 1 : -1;
  return {
    x,
    y,
    discPx: bodyRadiusKm(approach) * pxPerKm,
    capturePx: plane.impactRadiusKm * pxPerKm,
    aim: at,
    aimIsShown: at.x >= 0 && at.x <= widthPx && at.y >= 0 && at.y <= heightPx,
    ellipse: ellipseOf(approach, axes, pxPerKm),
    ticks: {
      across: ticksAlong(widthPx, pxPerKm, step, 1),
      upright: ticksAlong(heightPx, pxPerKm, step, down),
    },
  };
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

function ticksAlong(lengthPx: number, pxPerKm: number, step: number, sign: number): PlaneTick[] {
  const count = Math.floor(lengthPx / 2 / pxPerKm / step);
  return Array.from({ length: 2 * count + 1 }, (_, i) => {
    const km = (i - count) * step;
    return { px: lengthPx / 2 + km * pxPerKm, words: grouped(sign * km) };
  });
}

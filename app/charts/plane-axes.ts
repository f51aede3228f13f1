import type { Approach } from '../../core/report/report';

/** Which pair of axes the target plane is drawn on. */
export type PlaneAxes = 'tr' | 'xi-zeta';

/** A place on the plane, km from the body's centre: to the sheet's right and downwards. */
export interface Place {
  across: number;
  down: number;
}

export const AXES_WORDS: Record<
  PlaneAxes,
  { across: string; upright: string; uprightPointsDown: boolean }
> = {
  tr: { across: 'T', upright: 'R', uprightPointsDown: true },
  'xi-zeta': { across: 'ξ', upright: 'ζ', uprightPointsDown: false },
};

/**
 * Where the approach aims. Both pairs of axes are seen along the incoming motion: T and ξ run to the
 * right, R (= S × T) downwards, ζ (with ξ = S × ζ) upwards; one sheet is the other turned.
 */
export function aimOf(approach: Approach, axes: PlaneAxes): Place | null {
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

/**
 * How far the sheet of T and R is turned to give that of the axes, rad, clockwise on the sheet; it
 * follows from B, which the report has on both.
 */
export function turnBetween(approach: Approach, axes: PlaneAxes): number {
  const from = aimOf(approach, 'tr');
  const to = aimOf(approach, axes);
  if (from === null || to === null) return 0;
  return Math.atan2(to.down, to.across) - Math.atan2(from.down, from.across);
}

/** A place turned clockwise on the sheet. */
export function turned({ across, down }: Place, turnRad: number): Place {
  const cos = Math.cos(turnRad);
  const sin = Math.sin(turnRad);
  return { across: across * cos - down * sin, down: across * sin + down * cos };
}

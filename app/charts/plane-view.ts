import type { Approach } from '../../core/report/report';
import { aimOf, bodyRadiusKm, type Place, type PlaneAxes, turnBetween, turned } from './plane-axes';

/** What of the target plane is on the sheet. */
export interface PlaneView {
  /** The sheet's middle on T and R, km, whatever the axes shown. */
  centre: Place;
  /** Half the sheet's shorter side, km. */
  halfKm: number;
}

/** Widest half width, km. */
const WIDEST_KM = 1e6;
/** No ellipse is looked at more closely than this, km. */
const CLOSEST_KM = 1;
/** The 3 σ ellipse is taken into the first view as far from the aim as this multiple of what must be on it. */
const MOST_SPREAD = 2.5;
const MARGIN = 1.15;

/** Half the length of the 3 σ ellipse, km; zero without a covariance. */
function threeSigmaKm(approach: Approach): number {
  return 3 * (approach.uncertainty?.ellipse?.semiMajorKm ?? 0);
}

/** Wide enough for the capture disc, the aim and, if it can be, the 3 σ ellipse, whichever the axes. */
export function fittingView(approach: Approach): PlaneView {
  const aim = aimOf(approach, 'tr') ?? { across: 0, down: 0 };
  const captureKm = approach.targetPlane?.impactRadiusKm ?? 0;
  const awayKm = Math.hypot(aim.across, aim.down);
  const reachKm = Math.min(threeSigmaKm(approach), MOST_SPREAD * Math.max(captureKm, awayKm));
  const turn = ((approach.uncertainty?.ellipse?.angleTrDeg ?? 0) * Math.PI) / 180;
  const ends = [-reachKm, reachKm].map((km) => ({
    across: aim.across + km * Math.cos(turn),
    down: aim.down + km * Math.sin(turn),
  }));
  const middle = (side: keyof Place) => {
    const places = [-captureKm, captureKm, ...ends.map((end) => end[side])];
    return (Math.min(...places) + Math.max(...places)) / 2;
  };
  const centre = { across: middle('across'), down: middle('down') };
  const farthestKm = Math.max(
    captureKm + Math.hypot(centre.across, centre.down),
    ...ends.map((end) => Math.hypot(end.across - centre.across, end.down - centre.down)),
  );
  return { centre, halfKm: MARGIN * farthestKm };
}

/** The capture disc alone. */
export function discView(approach: Approach): PlaneView {
  const captureKm = approach.targetPlane?.impactRadiusKm ?? bodyRadiusKm(approach);
  return { centre: { across: 0, down: 0 }, halfKm: MARGIN * captureKm };
}

/** The 3 σ ellipse about the aim; null without a covariance. */
export function threeSigmaView(approach: Approach): PlaneView | null {
  const centre = aimOf(approach, 'tr');
  const reachKm = threeSigmaKm(approach);
  if (centre === null || reachKm === 0) return null;
  return { centre, halfKm: limitedHalfKm(approach, MARGIN * reachKm) };
}

/**
 * Keeps a half width between the body's radius and a million kilometres; what the presets show is
 * within the limits, even if it is wider or, for a small ellipse, closer.
 */
export function limitedHalfKm(approach: Approach, halfKm: number): number {
  const reachKm = MARGIN * threeSigmaKm(approach);
  const widest = Math.max(WIDEST_KM, fittingView(approach).halfKm, reachKm);
  const radiusKm = bodyRadiusKm(approach);
  const closest = reachKm > 0 ? Math.max(CLOSEST_KM, Math.min(radiusKm, reachKm)) : radiusKm;
  return Math.min(Math.max(halfKm, closest), widest);
}

/**
 * Zooms about a place that stays where it is on the sheet.
 *
 * @param factor of the half width: above 1 shows more
 * @param about  on T and R, km
 */
export function zoomed(
  approach: Approach,
  view: PlaneView,
  factor: number,
  about: Place,
): PlaneView {
  const halfKm = limitedHalfKm(approach, view.halfKm * factor);
  const share = halfKm / view.halfKm;
  return panned(
    approach,
    { ...view, halfKm },
    {
      across: (about.across - view.centre.across) * (1 - share),
      down: (about.down - view.centre.down) * (1 - share),
    },
  );
}

/** Moves the sheet over the plane, by km on T and R; its middle stays within the widest view. */
export function panned(approach: Approach, view: PlaneView, by: Place): PlaneView {
  const reach = limitedHalfKm(approach, Number.POSITIVE_INFINITY);
  const within = (km: number) => Math.min(Math.max(km, -reach), reach);
  const { across, down } = view.centre;
  return { ...view, centre: { across: within(across + by.across), down: within(down + by.down) } };
}

/** The sheet's middle on the axes shown. */
export function centreOn(view: PlaneView, approach: Approach, axes: PlaneAxes): Place {
  return turned(view.centre, turnBetween(approach, axes));
}

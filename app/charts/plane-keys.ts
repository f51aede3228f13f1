import type { Approach } from '../../core/report/report';
import type { Place } from './plane-axes';
import {
  discView,
  fittingView,
  type PlaneView,
  panned,
  threeSigmaView,
  zoomed,
} from './plane-view';

/** What the keys do to the view of the target plane. */

export const ZOOM_STEP = 1.5;
/** Of the half width. */
const PAN_STEP = 0.25;

const PANS: Record<string, Place> = {
  ArrowLeft: { across: -1, down: 0 },
  ArrowRight: { across: 1, down: 0 },
  ArrowUp: { across: 0, down: -1 },
  ArrowDown: { across: 0, down: 1 },
};

/**
 * The view after a key.
 *
 * @param toTr turns a place on the axes shown to T and R
 * @returns    null for a key that is not the plane's
 */
export function viewAfterKey(
  approach: Approach,
  view: PlaneView,
  key: string,
  toTr: (place: Place) => Place,
): PlaneView | null {
  if (key in PANS) {
    const { across, down } = toTr(PANS[key]);
    const step = PAN_STEP * view.halfKm;
    return panned(approach, view, { across: across * step, down: down * step });
  }
  switch (key) {
    case '+':
    case '=':
      return zoomed(approach, view, 1 / ZOOM_STEP, view.centre);
    case '-':
    case '\u2212':
      return zoomed(approach, view, ZOOM_STEP, view.centre);
    case '0':
    case 'Home':
      return fittingView(approach);
    case 'd':
      return discView(approach);
    case '3':
      return threeSigmaView(approach);
    default:
      return null;
  }
}

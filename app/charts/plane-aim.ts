import type { Approach } from '../../core/report/report';
import { distanceWords } from '../ribbon/words';
import type { PlaneGeometry } from './plane-geometry';
import { planeLine } from './plane-line';

/** The aim's words stand clear of an ellipse that is no wider than this at 3 σ, half of it, px. */
const MOST_CLEAR_PX = 130;

export const aimWords = ({ hyperbola }: Approach): string =>
  `B ${distanceWords(hyperbola?.impactParameterKm ?? 0)}`;

/** The middle of the aim's words, which are 2 × `half` px long: clear of the ellipse and of its words. */
export function aimLabel(
  approach: Approach,
  { x, y, aim, ellipse, project }: PlaneGeometry,
  half: number,
  widthPx: number,
  heightPx: number,
): { x: number; y: number } {
  const clampX = (at: number) => Math.min(Math.max(at, half + 4), widthPx - half - 4);
  const clampY = (at: number) => Math.min(Math.max(at, 12), heightPx - 12);
  const across = 3 * (ellipse?.minorPx ?? 0);
  if (ellipse !== null && across < MOST_CLEAR_PX) {
    // On the side where the line of variations has no words.
    const turn = (ellipse.turnDeg * Math.PI) / 180;
    const normal = { x: -Math.sin(turn), y: Math.cos(turn) };
    const tick = planeLine(approach.lineOfVariations ?? [], project).ticks.find(
      ({ sigma }) => sigma === 0,
    );
    const facing = tick === undefined ? -1 : -Math.sign(normal.x * tick.nx + normal.y * tick.ny);
    const away = facing * (across + 14);
    return {
      x: clampX(aim.x + normal.x * away + facing * normal.x * half),
      y: clampY(aim.y + normal.y * away),
    };
  }
  const outward = aim.x > x ? 1 : -1;
  const hasRoomBeside = outward > 0 ? aim.x + 2 * half + 12 < widthPx : aim.x - 2 * half - 12 > 0;
  if (hasRoomBeside) return { x: aim.x + outward * (half + 11), y: aim.y };
  // Clear of the upright axis and its name.
  const clear = x + outward * (half + 22);
  return {
    x: clampX(outward > 0 ? Math.max(aim.x, clear) : Math.min(aim.x, clear)),
    y: clampY(aim.y + (aim.y > y ? 16 : -16)),
  };
}

/** Where the way from the body to an aim beyond the sheet leaves it; null where it does not cross it. */
export function leavingPlace(
  { x, y, aim }: PlaneGeometry,
  widthPx: number,
  heightPx: number,
): { x: number; y: number } | null {
  let [from, to] = [0, 1];
  for (const [start, way, end] of [
    [x, aim.x - x, widthPx],
    [y, aim.y - y, heightPx],
  ]) {
    const [a, b] = [-start / way, (end - start) / way].sort((one, other) => one - other);
    from = Math.max(from, a);
    to = Math.min(to, b);
  }
  return from < to ? { x: x + to * (aim.x - x), y: y + to * (aim.y - y) } : null;
}

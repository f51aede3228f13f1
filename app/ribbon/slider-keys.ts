const SMALL = 1 / 400;
const LARGE = 1 / 40;
const PAGE = 1 / 10;

/** One step of the step buttons, in parts of the ribbon. */
export const BUTTON_STEP = 1 / 100;

/**
 * Where a key takes the slider.
 *
 * @param unit place along the ribbon, 0 to 1
 * @returns    the new place, 0 to 1; null for a key that is not the slider's
 */
export function keyMove(key: string, shift: boolean, unit: number): number | null {
  const step = shift ? LARGE : SMALL;
  const moves: Record<string, number> = {
    ArrowLeft: unit - step,
    ArrowDown: unit - step,
    ArrowRight: unit + step,
    ArrowUp: unit + step,
    PageDown: unit - PAGE,
    PageUp: unit + PAGE,
    Home: 0,
    End: 1,
  };
  const next = moves[key];
  return next === undefined ? null : Math.min(1, Math.max(0, next));
}

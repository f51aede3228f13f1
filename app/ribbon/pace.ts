import { spanWords } from './words';

/** How fast play moves along the ribbon. */
export type Pace = 'slow' | 'normal' | 'fast';

/** Parts of the whole ribbon in a second. */
export const PACES: Record<Pace, number> = { slow: 1 / 100, normal: 1 / 36, fast: 1 / 12 };

/** With reduced motion, play stands still and moves on in steps of this part of the ribbon. */
export const REDUCED_STEP = 1 / 48;

/**
 * Where play stands after a frame.
 *
 * @param carried part of the ribbon not yet shown because of stepping
 * @param step    smallest move to show, in parts of the ribbon; 0 for smooth motion
 */
export function advance(
  unit: number,
  elapsedSeconds: number,
  pace: Pace,
  carried: number,
  step: number,
): { unit: number; carried: number } {
  const due = carried + elapsedSeconds * PACES[pace];
  if (due < step) return { unit, carried: due };
  return { unit: Math.min(1, unit + due), carried: 0 };
}

/** "1 s = 3.2 h". */
export function paceWords(secondsPerUnit: number, pace: Pace): string {
  return `1\u2009s = ${spanWords(secondsPerUnit * PACES[pace])}`;
}

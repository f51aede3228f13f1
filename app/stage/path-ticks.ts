/** Marks of round times along a path. */

const MINUTE = 60;
const HOUR = 3600;
const DAY = 86400;

/** Steps that a reader can count in, s. */
const STEPS = [
  MINUTE,
  2 * MINUTE,
  5 * MINUTE,
  10 * MINUTE,
  30 * MINUTE,
  HOUR,
  2 * HOUR,
  6 * HOUR,
  12 * HOUR,
  DAY,
  2 * DAY,
  5 * DAY,
  10 * DAY,
  30 * DAY,
  60 * DAY,
  120 * DAY,
  360 * DAY,
];

/** Smallest step that puts no more than `most` marks into a stretch of time, s. */
export function tickStep(lengthS: number, most: number): number {
  return STEPS.find((step) => lengthS / step <= most) ?? STEPS[STEPS.length - 1];
}

/**
 * Offsets of the marks from the pass, s, within an interval of offsets; the pass itself (0) has its
 * own mark and is left out.
 */
export function tickOffsets(fromS: number, toS: number, step: number): number[] {
  const offsets: number[] = [];
  for (let k = Math.ceil(fromS / step); k * step <= toS; k++) {
    if (k !== 0) offsets.push(k * step);
  }
  return offsets;
}

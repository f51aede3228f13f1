import { SECONDS_PER_DAY } from '../worker/core-values';
import type { TimeScale } from './time-scale';
import { tickDateWords, tickWords, YEAR } from './words';

export interface TimeTick {
  tdbSeconds: number;
  /** Time from the ribbon's zero: "−10 d". */
  words: string;
  /** Calendar date or time of day, UTC. */
  date: string;
}

const MINUTE = 60;
const HOUR = 3600;
const DAY = SECONDS_PER_DAY;

/** Distances from the zero that a stretched ribbon marks, those that come first if room is short. */
const FIRST = [MINUTE, 10 * MINUTE, HOUR, 6 * HOUR, DAY, 10 * DAY, 60 * DAY, YEAR, 10 * YEAR];
const THEN = [30 * MINUTE, 3 * DAY, 30 * DAY, 180 * DAY, 3 * YEAR];

/** Steps of a linear ribbon. */
const STEPS = [
  ...[1, 2, 5, 10, 30].map((n) => n * MINUTE),
  ...[1, 2, 6, 12].map((n) => n * HOUR),
  ...[1, 2, 5, 10, 30, 60, 90, 180].map((n) => n * DAY),
  ...[1, 2, 5].map((n) => n * YEAR),
];

/**
 * Ticks of a ribbon, in order of time, none nearer to another than `leastGap` (in ribbon units).
 *
 * @param zero      the instant the ticks count from; always one of them when it is in the ribbon
 * @param stretched true to spread ticks by kind of distance (minutes, hours, days), false for a
 *                  constant step
 */
export function timeTicks(
  scale: TimeScale,
  zero: number,
  stretched: boolean,
  leastGap: number,
): TimeTick[] {
  const kept: { unit: number; away: number }[] = [];
  for (const away of stretched ? spread() : steps(scale, zero, leastGap)) {
    const unit = scale.unitAt(zero + away);
    if (unit < 0 || unit > 1) continue;
    // Rounding of an even step must not drop every second tick.
    if (kept.some((tick) => Math.abs(tick.unit - unit) < leastGap * (1 - 1e-6))) continue;
    kept.push({ unit, away });
  }
  return kept
    .sort((a, b) => a.away - b.away)
    .map(({ away }) => ({
      tdbSeconds: zero + away,
      words: tickWords(away),
      date: tickDateWords(zero + away, away),
    }));
}

function spread(): number[] {
  return [0, ...[...FIRST, ...THEN].flatMap((away) => [-away, away])];
}

function steps(scale: TimeScale, zero: number, leastGap: number): number[] {
  const span = scale.toTdbSeconds - scale.fromTdbSeconds;
  const step = STEPS.find((each) => each >= leastGap * span) ?? YEAR * 10;
  const first = Math.ceil((scale.fromTdbSeconds - zero) / step);
  const last = Math.floor((scale.toTdbSeconds - zero) / step);
  return Array.from({ length: last - first + 1 }, (_, i) => (first + i) * step);
}

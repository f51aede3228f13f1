/** Between time and the place along the ribbon, 0 at its start and 1 at its end. */
export interface TimeScale {
  readonly fromTdbSeconds: number;
  readonly toTdbSeconds: number;
  /** Place along the ribbon of an instant; not clamped. */
  unitAt(tdbSeconds: number): number;
  /** Instant at a place along the ribbon: the inverse of `unitAt`. */
  timeAt(unit: number): number;
  /** Seconds of time for one whole ribbon at a place: what a constant pace is multiplied by. */
  secondsPerUnit(unit: number): number;
}

/** Where time is stretched around, and how wide the middle is in which it is nearly linear. */
export interface Stretch {
  centreTdbSeconds: number;
  /** Time scale of the passage, s: its periapsis distance over its speed there. */
  scaleSeconds: number;
}

/** Every second takes the same room. */
export function linearTimeScale(fromTdbSeconds: number, toTdbSeconds: number): TimeScale {
  const span = Math.max(toTdbSeconds - fromTdbSeconds, 1);
  return {
    fromTdbSeconds,
    toTdbSeconds,
    unitAt: (tdbSeconds) => (tdbSeconds - fromTdbSeconds) / span,
    timeAt: (unit) => fromTdbSeconds + unit * span,
    secondsPerUnit: () => span,
  };
}

/**
 * Time stretched around an instant: the place goes with asinh((t − centre)/scale), so it is linear
 * within about one scale of the centre and logarithmic in the time from it beyond.
 */
export function stretchedTimeScale(
  fromTdbSeconds: number,
  toTdbSeconds: number,
  stretch: Stretch,
): TimeScale {
  const { centreTdbSeconds, scaleSeconds } = stretch;
  const stretched = (tdbSeconds: number): number =>
    Math.asinh((tdbSeconds - centreTdbSeconds) / scaleSeconds);
  const start = stretched(fromTdbSeconds);
  const span = Math.max(stretched(toTdbSeconds) - start, 1e-9);
  return {
    fromTdbSeconds,
    toTdbSeconds,
    unitAt: (tdbSeconds) => (stretched(tdbSeconds) - start) / span,
    timeAt: (unit) => centreTdbSeconds + scaleSeconds * Math.sinh(start + unit * span),
    secondsPerUnit: (unit) => scaleSeconds * Math.cosh(start + unit * span) * span,
  };
}

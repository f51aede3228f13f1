import { DENSE_DOUBLES, Dop853, evaluateDense } from './dop853';
import type { ForceModel } from './force-model';

/** Relative tolerance of a step: on the distance from the barycentre and on the speed. */
export const INTEGRATION_TOLERANCE = 1e-14;

/** No step may be shorter, s: some thousand roundings of the offset. */
const SHORTEST_STEP_S = 1e-6;
const FIRST_STEP_S = 600;
/** The base is moved when the offset grows beyond this, s: its rounding stays below 2.4e-10 s. */
const LARGEST_OFFSET_S = 2 ** 20;

/** The error control asks for steps below what time can resolve. */
export class StepCollapse extends Error {
  readonly code = 'step-collapse';
  override name = 'StepCollapse';
}

/** The goal of a step does not lie ahead in the direction of the integration. */
export class GoalBehind extends Error {
  readonly code = 'goal-behind';
  override name = 'GoalBehind';
}

/**
 * An accepted integration step.
 *
 * Times are seconds past `baseSeconds`, a whole number of TDB seconds past J2000; states are
 * barycentric ICRF, km and km/s. `startOffset` is where the integration came from: the later end for
 * a step backward.
 */
export class Segment {
  constructor(
    readonly baseSeconds: number,
    readonly startOffset: number,
    readonly endOffset: number,
    readonly start: Float64Array,
    private readonly denseOutput: Float64Array,
    private readonly fresh: Dop853,
  ) {}

  /** State from the dense output, written to `out` (6). */
  evaluate(offset: number, out: Float64Array): void {
    const u = (offset - this.startOffset) / (this.endOffset - this.startOffset);
    evaluateDense(this.denseOutput, this.start, u, out);
  }

  /** State by a fresh step from the segment's start, written to `out` (6): full accuracy. */
  exactState(offset: number, out: Float64Array): void {
    const { fresh, start, baseSeconds, startOffset } = this;
    fresh.begin(baseSeconds, startOffset, start);
    fresh.attempt(baseSeconds, startOffset, offset - startOffset, start);
    out.set(fresh.end);
  }
}

export interface PropagatorOptions {
  longestStepS: number;
  /** Default `INTEGRATION_TOLERANCE`. */
  tolerance?: number;
}

export interface Propagator {
  /**
   * Advances one accepted step, at most up to a goal, TDB seconds past J2000.
   *
   * @throws StepCollapse instead of a hang; GoalBehind; EphemerisRangeError outside the ephemeris
   */
  step(goalTdbSeconds: number): Segment;
}

/**
 * An integration that is advanced step by step, so that its caller can stream, scan and stop.
 *
 * @param model     the forces
 * @param initial   instant (TDB seconds past J2000) and barycentric ICRF state, km and km/s (6)
 * @param direction 1 forward, −1 backward
 * Accuracy: see the checks against independent integrations (tests/checks).
 */
export function createPropagator(
  model: ForceModel,
  initial: { tdbSeconds: number; state: Float64Array },
  direction: 1 | -1,
  options: PropagatorOptions,
): Propagator {
  const tolerance = options.tolerance ?? INTEGRATION_TOLERANCE;
  const method = new Dop853(model);
  const fresh = new Dop853(model);
  let base = Math.floor(initial.tdbSeconds);
  let offset = initial.tdbSeconds - base;
  let state = Float64Array.from(initial.state);
  let length = Math.min(FIRST_STEP_S, options.longestStepS);
  method.begin(base, offset, state);

  return {
    step(goalTdbSeconds) {
      if (Math.abs(offset) > LARGEST_OFFSET_S) {
        const whole = Math.round(offset);
        base += whole;
        offset -= whole;
      }
      const left = (goalTdbSeconds - base - offset) * direction;
      if (!(left > 0)) {
        throw new GoalBehind(
          `The integration stands at ${base + offset} s past J2000 (TDB); it was asked to go on to ${goalTdbSeconds} s, which is not ahead of it.`,
        );
      }
      let rejected = false;
      for (;;) {
        const size = Math.min(length, left, options.longestStepS);
        const last = size === left;
        const h = size * direction;
        method.attempt(base, offset, h, state);
        const error = method.error(h, state, tolerance);
        if (error <= 1) {
          const denseOutput = new Float64Array(DENSE_DOUBLES);
          method.dense(base, offset, h, state, denseOutput);
          method.advance();
          const end = last ? goalTdbSeconds - base : offset + h;
          const segment = new Segment(base, offset, end, state, denseOutput, fresh);
          const growth = error === 0 ? 6 : Math.min(6, Math.max(0.33, 0.9 * error ** -0.125));
          const proposed = size * (rejected ? Math.min(1, growth) : growth);
          // A step cut short by the goal says nothing against the length of the next.
          length = size < length ? Math.max(length, proposed) : proposed;
          offset = end;
          state = Float64Array.from(method.end);
          return segment;
        }
        rejected = true;
        // NaN, too, ends here: the comparison above is false for it.
        const shrink = Number.isFinite(error) ? Math.max(0.2, 0.9 * error ** -0.125) : 0.2;
        length = size * shrink;
        if (!(length >= SHORTEST_STEP_S)) {
          throw new StepCollapse(
            `The integration cannot go on at ${base + offset} s past J2000 (TDB): its step fell below ${SHORTEST_STEP_S} s. The state leads into a body's centre or is not a number.`,
          );
        }
      }
    },
  };
}

import { BODIES, BODY_RADIUS_KM } from '../constants';
import type { ForceModel } from './force-model';
import { createPropagator, type Segment } from './propagate';

/** No step of the reference is longer, s. */
const LONGEST_STEP_S = 20 * 86400;
const RADII = Float64Array.from(BODIES, (body) => BODY_RADIUS_KM[body]);

/**
 * One trajectory that clones are measured from: integrated once, evaluated anywhere.
 *
 * It ends where the span does, or where it comes to a body's surface.
 */
export class ReferencePath {
  private readonly segments: Segment[] = [];
  private readonly ends: number[] = [];
  private last = 0;
  /** Where it ends, TDB seconds past J2000. */
  readonly endTdbSeconds: number;

  /**
   * @param model         the forces
   * @param fromTdbSeconds, toTdbSeconds the span
   * @param state         barycentric ICRF state at its start, km and km/s (6)
   */
  constructor(
    model: ForceModel,
    private readonly fromTdbSeconds: number,
    toTdbSeconds: number,
    state: Float64Array,
  ) {
    const propagator = createPropagator(model, { tdbSeconds: fromTdbSeconds, state }, 1, {
      longestStepS: LONGEST_STEP_S,
    });
    const end = new Float64Array(6);
    let reached = fromTdbSeconds;
    while (reached < toTdbSeconds) {
      const segment = propagator.step(toTdbSeconds);
      segment.evaluate(segment.endOffset, end);
      model.ephemeris.positionsAndSunVelocity(segment.baseSeconds, segment.endOffset, model.bodies);
      if (insideBody(model.bodies, end)) break;
      this.segments.push(segment);
      reached = segment.baseSeconds + segment.endOffset;
      this.ends.push(reached);
    }
    this.endTdbSeconds = reached;
  }

  /** State at an instant between its ends, written to `out` (6). */
  state(base: number, offset: number, out: Float64Array): void {
    const { segments, ends } = this;
    const at = base + offset;
    let i = this.last;
    while (i > 0 && at < ends[i - 1]) i -= 1;
    while (i < segments.length - 1 && at > ends[i]) i += 1;
    this.last = i;
    const segment = segments[i];
    segment.evaluate(base - segment.baseSeconds + offset, out);
  }

  /** Whether it covers two instants, TDB seconds past J2000. */
  covers(from: number, to: number): boolean {
    return this.segments.length > 0 && from >= this.fromTdbSeconds && to <= this.endTdbSeconds;
  }
}

function insideBody(bodies: Float64Array, state: Float64Array): boolean {
  for (let body = 0; body < RADII.length; body++) {
    const x = bodies[body * 3] - state[0];
    const y = bodies[body * 3 + 1] - state[1];
    const z = bodies[body * 3 + 2] - state[2];
    if (x * x + y * y + z * z < RADII[body] * RADII[body]) return true;
  }
  return false;
}

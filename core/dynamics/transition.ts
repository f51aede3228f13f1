import { NODES, ROW_STAGES, ROW_WEIGHTS, STAGES, WEIGHTS } from './dop853-coefficients';
import type { ForcePartials } from './partials';
import type { Segment } from './propagate';

/** Columns of the matrix: place and velocity at the epoch, then A1, A2, A3. */
export const PARAMETERS = 9;
const SIZE = 6 * PARAMETERS;

/**
 * How a trajectory answers to small changes of its state at the epoch and of A1, A2, A3: the
 * variational equations, integrated along the steps of the trajectory itself.
 *
 * The matrix (6 × 9, by rows) starts as the identity on the state. Each step of the trajectory is one
 * step of the same Runge–Kutta method for the matrix, with the partials taken on the dense output.
 * Source: Montenbruck & Gill, Satellite Orbits (2000), 7.2.
 */
export class TransitionMatrix {
  readonly values = new Float64Array(SIZE);
  private readonly k = new Float64Array(STAGES * SIZE);
  private readonly stage = new Float64Array(SIZE);
  private readonly state = new Float64Array(6);

  constructor(private readonly partials: ForcePartials) {
    for (let i = 0; i < 6; i++) this.values[i * PARAMETERS + i] = 1;
  }

  /** Carries the matrix over a whole step of the trajectory. */
  advance(segment: Segment): void {
    this.stepTo(segment, segment.endOffset, this.values);
  }

  /** The matrix at an instant inside the step that comes next, written to `out` (54). */
  at(segment: Segment, offset: number, out: Float64Array): void {
    this.stepTo(segment, offset, out);
  }

  private stepTo(segment: Segment, offset: number, out: Float64Array): void {
    const { k, stage, values, state } = this;
    const h = offset - segment.startOffset;
    for (let s = 0; s < STAGES; s++) {
      stage.set(values);
      const stages = ROW_STAGES[s];
      const weights = ROW_WEIGHTS[s];
      for (let j = 0; j < stages.length; j++) {
        const weight = h * weights[j];
        const from = stages[j] * SIZE;
        for (let i = 0; i < SIZE; i++) stage[i] += weight * k[from + i];
      }
      const at = segment.startOffset + NODES[s] * h;
      segment.evaluate(at, state);
      this.partials.evaluate(segment.baseSeconds, at, state);
      this.derivative(k, s * SIZE);
    }
    stage.set(values);
    for (let s = 0; s < STAGES; s++) {
      const weight = h * WEIGHTS[s];
      if (weight === 0) continue;
      for (let i = 0; i < SIZE; i++) stage[i] += weight * k[s * SIZE + i];
    }
    out.set(stage);
  }

  /** d/dt of the matrix in `stage`: velocity rows move up, accelerations come from the partials. */
  private derivative(out: Float64Array, to: number): void {
    const { stage } = this;
    const { place, velocity, forces } = this.partials;
    for (let i = 0; i < 3; i++) {
      for (let c = 0; c < PARAMETERS; c++) {
        out[to + i * PARAMETERS + c] = stage[(i + 3) * PARAMETERS + c];
        let sum = c >= 6 ? forces[i * 3 + c - 6] : 0;
        for (let j = 0; j < 3; j++) {
          sum +=
            place[i * 3 + j] * stage[j * PARAMETERS + c] +
            velocity[i * 3 + j] * stage[(j + 3) * PARAMETERS + c];
        }
        out[to + (i + 3) * PARAMETERS + c] = sum;
      }
    }
  }
}

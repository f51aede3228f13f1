import {
  ALL_STAGES,
  DENSE,
  ERROR_3,
  ERROR_5,
  NODES,
  ROW_STAGES,
  ROW_WEIGHTS,
  STAGES,
  WEIGHTS,
} from './dop853-coefficients';
import type { ForceModel } from './force-model';

/** Rounding of a barycentric place about 1 au from the Sun, km: one unit in the last place. */
const ROUNDING_KM = 3e-8;

/** Numbers of the dense output of a step: 7 polynomials of 6 components. */
export const DENSE_DOUBLES = 42;

/**
 * One step of Dormand–Prince 8(5,3) for a six-component state, with its dense output.
 *
 * Keeps buffers: one instance serves one trajectory at a time. Allocates nothing.
 * Source: Hairer, Nørsett & Wanner, Solving Ordinary Differential Equations I (1993), II.5, II.6.
 */
export class Dop853 {
  private readonly k = new Float64Array(ALL_STAGES * 6);
  private readonly stage = new Float64Array(6);
  /** The state at the end of the last step tried. */
  readonly end = new Float64Array(6);

  constructor(private readonly model: ForceModel) {}

  /**
   * Sets the derivative at a step's start: needed before the first step and after a jump.
   */
  begin(base: number, offset: number, y: Float64Array): void {
    this.model.derivative(base, offset, y, this.k, 0);
  }

  /**
   * Tries a step; the result is in `end`, the derivative at its end among the stages.
   *
   * @param base, offset where the step starts (whole TDB seconds past J2000, seconds past it)
   * @param h            length of the step, s; negative goes back
   * @param y            state at its start (6); `begin` or `advance` has set its derivative
   */
  attempt(base: number, offset: number, h: number, y: Float64Array): void {
    const { k, stage, end, model } = this;
    for (let s = 1; s < STAGES; s++) {
      this.combine(s, h, y);
      model.derivative(base, offset + NODES[s] * h, stage, k, s * 6);
    }
    for (let i = 0; i < 6; i++) {
      let sum = 0;
      for (let s = 0; s < STAGES; s++) sum += WEIGHTS[s] * k[s * 6 + i];
      end[i] = y[i] + h * sum;
    }
  }

  /**
   * Error of the last attempt in units of the tolerance: at most 1 is accepted.
   *
   * @param tolerance relative to the distance and the speed, each as a whole. What the rounding of
   *                  the place alone makes of the speed in a step is let through on top: near a body
   *                  no shorter step would make it smaller, and the step would collapse.
   */
  error(h: number, y: Float64Array, tolerance: number): number {
    const { k, end, model } = this;
    let fifth = 0;
    let third = 0;
    for (let part = 0; part < 6; part += 3) {
      const size = Math.max(
        Math.hypot(y[part], y[part + 1], y[part + 2]),
        Math.hypot(end[part], end[part + 1], end[part + 2]),
      );
      const rounding = part === 0 ? 0 : Math.abs(h) * 2 * model.tide * ROUNDING_KM;
      const scale = 1 / (tolerance * size + rounding);
      for (let i = part; i < part + 3; i++) {
        let e5 = 0;
        let e3 = 0;
        for (let s = 0; s < STAGES; s++) {
          e5 += ERROR_5[s] * k[s * 6 + i];
          e3 += ERROR_3[s] * k[s * 6 + i];
        }
        fifth += (e5 * scale) ** 2;
        third += (e3 * scale) ** 2;
      }
    }
    if (fifth === 0 && third === 0) return 0;
    return (Math.abs(h) * fifth) / Math.sqrt((fifth + 0.01 * third) * 6);
  }

  /** Finishes an accepted step: evaluates the extra stages and writes the dense output. */
  dense(base: number, offset: number, h: number, y: Float64Array, out: Float64Array): void {
    const { k, stage, end, model } = this;
    model.derivative(base, offset + h, end, k, STAGES * 6);
    for (let s = STAGES + 1; s < ALL_STAGES; s++) {
      this.combine(s, h, y);
      model.derivative(base, offset + NODES[s] * h, stage, k, s * 6);
    }
    for (let i = 0; i < 6; i++) {
      const change = end[i] - y[i];
      const first = h * k[i];
      out[i] = change;
      out[6 + i] = first - change;
      out[12 + i] = 2 * change - (first + h * k[STAGES * 6 + i]);
      for (let row = 0; row < 4; row++) {
        const weights = DENSE[row];
        let sum = 0;
        for (let s = 0; s < ALL_STAGES; s++) sum += weights[s] * k[s * 6 + i];
        out[18 + row * 6 + i] = h * sum;
      }
    }
  }

  /** After `dense`: the derivative at the end becomes that of the next step's start. */
  advance(): void {
    this.k.copyWithin(0, STAGES * 6, STAGES * 6 + 6);
  }

  private combine(s: number, h: number, y: Float64Array): void {
    const { k, stage } = this;
    const stages = ROW_STAGES[s];
    const weights = ROW_WEIGHTS[s];
    for (let i = 0; i < 6; i++) {
      let sum = 0;
      for (let j = 0; j < stages.length; j++) sum += weights[j] * k[stages[j] * 6 + i];
      stage[i] = y[i] + h * sum;
    }
  }
}

/**
 * Dense output of a step.
 *
 * @param dense the step's 42 numbers
 * @param y     state at its start (6)
 * @param u     place in the step, 0 to 1
 * @param out   receives the state (6)
 * Accuracy: 7th order; measured against fresh steps at tolerance 1e-13 in the tests.
 */
export function evaluateDense(
  dense: Float64Array,
  y: Float64Array,
  u: number,
  out: Float64Array,
): void {
  const w = 1 - u;
  for (let i = 0; i < 6; i++) {
    let sum = dense[36 + i] * u;
    sum = (sum + dense[30 + i]) * w;
    sum = (sum + dense[24 + i]) * u;
    sum = (sum + dense[18 + i]) * w;
    sum = (sum + dense[12 + i]) * u;
    sum = (sum + dense[6 + i]) * w;
    out[i] = y[i] + (sum + dense[i]) * u;
  }
}

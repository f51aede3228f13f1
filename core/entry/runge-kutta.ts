/** The Dormand–Prince method of order 5(4), for flights: short, often, and with few components. */

/** What is integrated: a derivative that depends on the state alone. */
export interface Field {
  readonly size: number;
  /** Writes the derivative of a state, per second. */
  derivative(y: Float64Array, out: Float64Array): void;
}

/**
 * One step of Dormand–Prince 5(4). Keeps buffers and allocates nothing: one instance, one flight.
 *
 * Source: Dormand & Prince (1980), J. Comput. Appl. Math. 6, 19 (RK5(4)7M).
 */
export class RungeKutta54 {
  /** The state at the end of the last attempt. */
  readonly end: Float64Array;
  /** Derivatives at the start and at the end of the last attempt. */
  readonly first: Float64Array;
  readonly last: Float64Array;
  private readonly k2: Float64Array;
  private readonly k3: Float64Array;
  private readonly k4: Float64Array;
  private readonly k5: Float64Array;
  private readonly k6: Float64Array;
  private readonly stage: Float64Array;

  constructor(private readonly field: Field) {
    const buffer = () => new Float64Array(field.size);
    this.end = buffer();
    this.first = buffer();
    this.last = buffer();
    this.k2 = buffer();
    this.k3 = buffer();
    this.k4 = buffer();
    this.k5 = buffer();
    this.k6 = buffer();
    this.stage = buffer();
  }

  /** Sets the derivative at the start: before the first step and after every jump. */
  begin(y: Float64Array): void {
    this.field.derivative(y, this.first);
  }

  /** After an accepted step: its end is the next one's start. */
  advance(): void {
    this.first.set(this.last);
  }

  /** Tries a step of h seconds from y; the result is in `end`. */
  attempt(y: Float64Array, h: number): void {
    const { field, stage, end, first, k2, k3, k4, k5, k6, last } = this;
    const n = y.length;
    for (let i = 0; i < n; i++) stage[i] = y[i] + h * 0.2 * first[i];
    field.derivative(stage, k2);
    for (let i = 0; i < n; i++) stage[i] = y[i] + h * ((3 / 40) * first[i] + (9 / 40) * k2[i]);
    field.derivative(stage, k3);
    for (let i = 0; i < n; i++) {
      stage[i] = y[i] + h * ((44 / 45) * first[i] - (56 / 15) * k2[i] + (32 / 9) * k3[i]);
    }
    field.derivative(stage, k4);
    for (let i = 0; i < n; i++) {
      stage[i] =
        y[i] +
        h *
          ((19372 / 6561) * first[i] -
            (25360 / 2187) * k2[i] +
            (64448 / 6561) * k3[i] -
            (212 / 729) * k4[i]);
    }
    field.derivative(stage, k5);
    for (let i = 0; i < n; i++) {
      stage[i] =
        y[i] +
        h *
          ((9017 / 3168) * first[i] -
            (355 / 33) * k2[i] +
            (46732 / 5247) * k3[i] +
            (49 / 176) * k4[i] -
            (5103 / 18656) * k5[i]);
    }
    field.derivative(stage, k6);
    for (let i = 0; i < n; i++) {
      end[i] =
        y[i] +
        h *
          ((35 / 384) * first[i] +
            (500 / 1113) * k3[i] +
            (125 / 192) * k4[i] -
            (2187 / 6784) * k5[i] +
            (11 / 84) * k6[i]);
    }
    field.derivative(end, last);
  }

  /**
   * Error of the last attempt: at most 1 is accepted.
   *
   * @param scale what each component may be off by (as many as the state)
   */
  error(h: number, scale: Float64Array): number {
    const { first, k3, k4, k5, k6, last } = this;
    let sum = 0;
    for (let i = 0; i < scale.length; i++) {
      const e =
        (71 / 57600) * first[i] -
        (71 / 16695) * k3[i] +
        (71 / 1920) * k4[i] -
        (17253 / 339200) * k5[i] +
        (22 / 525) * k6[i] -
        (1 / 40) * last[i];
      const part = (h * e) / scale[i];
      sum += part * part;
    }
    return Math.sqrt(sum / scale.length);
  }
}

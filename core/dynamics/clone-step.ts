import { type CloneField, oblateAcceleration } from './clone-field';
import { ALL_STAGES, DENSE, NODES, STAGES, WEIGHTS } from './dop853-coefficients';
import { PLACE_ROWS, VELOCITY_ROWS } from './nystrom';

/** Clones that go side by side through the stages: enough for the processor to overlap their roots. */
export const LANES = 8;
const END = STAGES;
/** Numbers of one lane's accelerations. */
const LANE = ALL_STAGES * 3;
const ROW_STARTS = Int32Array.from(PLACE_ROWS.starts);
/** Stages that the dense output uses, and its four rows of weights without the others. */
const DENSE_STAGES = Int32Array.from(
  Array.from({ length: ALL_STAGES }, (_, stage) => stage).filter((stage) =>
    DENSE.some((row) => row[stage] !== 0),
  ),
);
const DENSE_WEIGHTS = Float64Array.from(
  DENSE.flatMap((row) => Array.from(DENSE_STAGES, (stage) => row[stage])),
);
/** Where the acceleration of each entry's stage begins in a lane. */
const ROW_PLACES = Int32Array.from(PLACE_ROWS.stages, (stage) => stage * 3);

/**
 * One step of a few clones side by side in a shared field: Dormand–Prince 8(5,3) in Nyström form.
 *
 * Keeps buffers and allocates nothing; one instance serves one batch at a time.
 */
export class CloneStep {
  private readonly f = new Float64Array(LANES * LANE);
  private readonly velocities = new Float64Array(LANE);
  private readonly placeWeights = new Float64Array(PLACE_ROWS.weights.length);
  private readonly weights = new Float64Array(STAGES);
  private readonly nodes = new Float64Array(ALL_STAGES);
  /** The same from the field's origin. */
  private readonly start = new Float64Array(LANES * 6);
  private readonly end = new Float64Array(LANES * 6);
  /** Barycentric states at the start and the end of the step last made, 6 for each lane. */
  readonly from = new Float64Array(LANES * 6);
  readonly to = new Float64Array(LANES * 6);
  /** Deviations of A1 to A3, km/s², 3 for each lane; used when `hasDeviations`. */
  readonly deviations = new Float64Array(LANES * 3);
  hasDeviations = false;

  constructor(readonly field: CloneField) {}

  /** Takes over a new field: needed after each `prepare`. */
  begin(): void {
    const h = this.field.length;
    for (let i = 0; i < this.placeWeights.length; i++) {
      this.placeWeights[i] = h * h * PLACE_ROWS.weights[i];
    }
    for (let i = 0; i < STAGES; i++) this.weights[i] = h * WEIGHTS[i];
    for (let i = 0; i < ALL_STAGES; i++) this.nodes[i] = NODES[i] * h;
  }

  /** Makes the step of the first lanes, from `from` to `to`. Hot loop. */
  make(lanes: number): void {
    const { from, to: reached, start, end, f, weights } = this;
    const { originAtStart, originAtEnd } = this.field;
    for (let lane = 0; lane < lanes; lane++) {
      for (let k = 0; k < 6; k++) start[lane * 6 + k] = from[lane * 6 + k] - originAtStart[k];
    }
    this.evaluate(0, STAGES, 0, lanes);
    for (let lane = 0; lane < lanes; lane++) {
      const to = lane * 6;
      this.place(END, lane);
      for (let k = 0; k < 3; k++) {
        let v = start[to + 3 + k];
        for (let j = 0; j < STAGES; j++) v += weights[j] * f[lane * LANE + j * 3 + k];
        end[to + 3 + k] = v;
      }
      for (let k = 0; k < 6; k++) reached[to + k] = end[to + k] + originAtEnd[k];
    }
  }

  /** Place of a lane at a stage whose forerunners are evaluated, written to `end`. */
  private place(stage: number, lane: number): void {
    const { start, end, f, placeWeights } = this;
    const after = this.nodes[stage];
    const at = lane * 6;
    const from = lane * LANE;
    let x = start[at] + after * start[at + 3];
    let y = start[at + 1] + after * start[at + 4];
    let z = start[at + 2] + after * start[at + 5];
    const last = ROW_STARTS[stage + 1];
    for (let i = ROW_STARTS[stage]; i < last; i++) {
      const w = placeWeights[i];
      const j = from + ROW_PLACES[i];
      x += w * f[j];
      y += w * f[j + 1];
      z += w * f[j + 2];
    }
    end[at] = x;
    end[at + 1] = y;
    end[at + 2] = z;
  }

  /**
   * Accelerations at stages from one to before another, of lanes from one to before another.
   *
   * Lanes are the inner loop: they do not wait for one another's square roots.
   */
  private evaluate(from: number, to: number, firstLane: number, lanes: number): void {
    const { field, start, f, placeWeights, nodes, hasDeviations } = this;
    const { place, pull, gradient, nearPlaces } = field;
    const { nearGm, nearCount, oblate } = field.group;
    for (let stage = from; stage < to; stage++) {
      const s3 = stage * 3;
      const s9 = stage * 9;
      const after = nodes[stage];
      const rx = place[s3];
      const ry = place[s3 + 1];
      const rz = place[s3 + 2];
      const px = pull[s3];
      const py = pull[s3 + 1];
      const pz = pull[s3 + 2];
      const gxx = gradient[s9];
      const gxy = gradient[s9 + 1];
      const gxz = gradient[s9 + 2];
      const gyx = gradient[s9 + 3];
      const gyy = gradient[s9 + 4];
      const gyz = gradient[s9 + 5];
      const gzx = gradient[s9 + 6];
      const gzy = gradient[s9 + 7];
      const gzz = gradient[s9 + 8];
      const first = ROW_STARTS[stage];
      const last = ROW_STARTS[stage + 1];
      for (let lane = firstLane; lane < lanes; lane++) {
        const at = lane * 6;
        const own = lane * LANE;
        let x = start[at] + after * start[at + 3];
        let y = start[at + 1] + after * start[at + 4];
        let z = start[at + 2] + after * start[at + 5];
        for (let i = first; i < last; i++) {
          const w = placeWeights[i];
          const j = own + ROW_PLACES[i];
          x += w * f[j];
          y += w * f[j + 1];
          z += w * f[j + 2];
        }
        const dx = x - rx;
        const dy = y - ry;
        const dz = z - rz;
        let ax = px + gxx * dx + gxy * dy + gxz * dz;
        let ay = py + gyx * dx + gyy * dy + gyz * dz;
        let az = pz + gzx * dx + gzy * dy + gzz * dz;
        for (let b = 0; b < nearCount; b++) {
          const body = (b * ALL_STAGES + stage) * 3;
          const bx = nearPlaces[body] - x;
          const by = nearPlaces[body + 1] - y;
          const bz = nearPlaces[body + 2] - z;
          const d2 = bx * bx + by * by + bz * bz;
          const k = nearGm[b] / (d2 * Math.sqrt(d2));
          ax += k * bx;
          ay += k * by;
          az += k * bz;
        }
        const out = own + s3;
        f[out] = ax;
        f[out + 1] = ay;
        f[out + 2] = az;
        if (oblate) this.addOblateness(stage, out, x, y, z);
        if (hasDeviations) this.addForces(stage, lane);
      }
    }
  }

  private addOblateness(stage: number, out: number, x: number, y: number, z: number): void {
    const { pole, nearPlaces, oblateness, group } = this.field;
    const at = (group.earthAt * ALL_STAGES + stage) * 3;
    oblateAcceleration(
      oblateness,
      pole,
      x - nearPlaces[at],
      y - nearPlaces[at + 1],
      z - nearPlaces[at + 2],
      this.f,
      out,
    );
  }

  private addForces(stage: number, lane: number): void {
    const { field, f, deviations } = this;
    const at = stage * 9;
    const from = lane * 3;
    for (let k = 0; k < 3; k++) {
      f[lane * LANE + stage * 3 + k] +=
        field.forces[at + k * 3] * deviations[from] +
        field.forces[at + k * 3 + 1] * deviations[from + 1] +
        field.forces[at + k * 3 + 2] * deviations[from + 2];
    }
  }

  /**
   * Dense output of a lane's step, measured from the field's origin.
   *
   * @param out     receives the polynomials that `evaluateDense` takes
   * @param startAt receives the state they start from (6)
   */
  dense(lane: number, out: Float64Array, startAt: Float64Array): void {
    const { field, f, start, velocities } = this;
    field.prepareDense();
    this.evaluate(END, ALL_STAGES, lane, lane + 1);
    const h = field.length;
    const at = lane * 6;
    const own = lane * LANE;
    for (let k = 0; k < 6; k++) startAt[k] = start[at + k];
    for (let i = 0; i < DENSE_STAGES.length; i++) {
      const stage = DENSE_STAGES[i];
      let x = 0;
      let y = 0;
      let z = 0;
      for (let j = VELOCITY_ROWS.starts[stage]; j < VELOCITY_ROWS.starts[stage + 1]; j++) {
        const w = VELOCITY_ROWS.weights[j];
        const from = own + VELOCITY_ROWS.stages[j] * 3;
        x += w * f[from];
        y += w * f[from + 1];
        z += w * f[from + 2];
      }
      velocities[stage * 3] = start[at + 3] + h * x;
      velocities[stage * 3 + 1] = start[at + 4] + h * y;
      velocities[stage * 3 + 2] = start[at + 5] + h * z;
    }
    this.polynomials(velocities, 0, at, out, 0);
    this.polynomials(f, own, at + 3, out, 3);
  }

  /**
   * The polynomials of place (k: velocities of the stages) or velocity (k: accelerations).
   *
   * @param k, from    rates at the stages, 3 each
   * @param at         of the components in the states
   * @param out, first receives them from the component `first` on
   */
  private polynomials(
    k: Float64Array,
    from: number,
    at: number,
    out: Float64Array,
    first: number,
  ): void {
    const { start, end } = this;
    const h = this.field.length;
    for (let i = 0; i < 3; i++) {
      const change = end[at + i] - start[at + i];
      const early = h * k[from + i];
      const to = first + i;
      out[to] = change;
      out[6 + to] = early - change;
      out[12 + to] = 2 * change - (early + h * k[from + END * 3 + i]);
    }
    for (let row = 0; row < 4; row++) {
      let x = 0;
      let y = 0;
      let z = 0;
      for (let j = 0; j < DENSE_STAGES.length; j++) {
        const w = DENSE_WEIGHTS[row * DENSE_STAGES.length + j];
        const rate = from + DENSE_STAGES[j] * 3;
        x += w * k[rate];
        y += w * k[rate + 1];
        z += w * k[rate + 2];
      }
      const to = 18 + row * 6 + first;
      out[to] = h * x;
      out[to + 1] = h * y;
      out[to + 2] = h * z;
    }
  }
}

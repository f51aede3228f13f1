import {
  BODIES,
  BODY_INDEX,
  BODY_RADIUS_KM,
  EARTH_J2,
  EARTH_RADIUS_KM,
  GM_KM3_S2,
  type GmSet,
} from '../constants';
import type { Ephemeris } from '../ephemeris';
import { ALL_STAGES, NODES, STAGES } from './dop853-coefficients';
import {
  createForceModel,
  earthPole,
  type ForceModel,
  type NonGravitationalForce,
  OBLATENESS_REGION_KM,
} from './force-model';
import { PLACE_ROWS, VELOCITY_ROWS } from './nystrom';
import { ForcePartials } from './partials';

/**
 * Steps are this much of d/√(v² + GM/d) for a body whose GM/v² is one kilometre; see `reach`. Measured:
 * 0.01 km at an encounter 75 days ahead. Longer spans let errors grow and get shorter steps.
 */
const STEP_SCALE = 1.1;
const STEP_SPAN_S = 75 * 86400;
/** Local error that sets the steps grows as their ninth power. */
const STEP_POWER = 1 / 9;
/** What leaving out the second order of a distant body's pull may move a clone by, km. */
const LINEAR_ERROR_KM = 1e-3;
const LEAST_LINEAR_SPAN_S = 30 * 86400;
const MOST_LINEAR_SPAN_S = 365.25 * 86400;
const BODY_COUNT = BODIES.length;
const RADII = Float64Array.from(BODIES, (body) => BODY_RADIUS_KM[body]);
const EARTH = BODY_INDEX.Earth;
/** Stages through which the path of a body in a step is laid. */
const PATH_STAGES = [0, 2, 3, 6, 5, 9, 10, 11];
const PATH_NODES = Float64Array.from(PATH_STAGES, (stage) => NODES[stage]);

/**
 * The field in which a group of clones makes one step: what all of them share.
 *
 * At each stage of the step the bodies' places are evaluated once. Bodies that bend the group's
 * clones differently (the near ones) are left to each clone; the pull of all others, relativity, the
 * Sun's oblateness and the non-gravitational terms are linearised about the group's mean place,
 * which is carried along. Whether a body is near enough to be taken at each place is decided for
 * every step from the group's spread: what the linear form leaves out stays below a metre in the time
 * that is left (a year at most).
 */
export class CloneField {
  private readonly model: ForceModel;
  private readonly partials: ForcePartials;
  private readonly gm: Float64Array;
  /** Mean of the group at the start of the step (6), and at each stage. */
  private readonly mean = new Float64Array(6);
  private readonly stageState = new Float64Array(6);
  private readonly rate = new Float64Array(6);
  private readonly meanPull = new Float64Array(ALL_STAGES * 3);
  private readonly bodyPlaces = new Float64Array(ALL_STAGES * BODY_COUNT * 3);
  private readonly starts = new Float64Array(66);
  private readonly ends = new Float64Array(66);
  private readonly paths = new Map<number, Float64Array>();
  private extraStages = false;
  private linearTolerance = 0;
  private readonly stepScale: number;
  private base = 0;
  private offset = 0;

  /** Length of the step, s. */
  length = 0;
  /** Of each stage: reference place (3), pull there (3), its gradient (9), by A1 to A3 (9). */
  readonly place = new Float64Array(ALL_STAGES * 3);
  readonly pull = new Float64Array(ALL_STAGES * 3);
  readonly gradient = new Float64Array(ALL_STAGES * 9);
  readonly forces = new Float64Array(ALL_STAGES * 9);
  /** Bodies that each clone feels at its own place: how many, which, their GM, their places by stage. */
  nearCount = 0;
  readonly near = new Int32Array(BODY_COUNT);
  readonly nearGm = new Float64Array(BODY_COUNT);
  readonly nearPlaces = new Float64Array(BODY_COUNT * ALL_STAGES * 3);
  /** Whether the Earth's oblateness is among it, and the Earth's pole (3). */
  oblate = false;
  /** Where the Earth stands among the near bodies, and 1.5 J2 GM R² of it. */
  earthAt = 0;
  readonly oblateness: number;
  readonly pole = new Float64Array(3);
  /** Largest distance of a clone from the mean, km. */
  spread = 0;

  constructor(
    private readonly ephemeris: Ephemeris,
    set: GmSet,
    forces: NonGravitationalForce | null,
    spanS: number,
  ) {
    this.stepScale = STEP_SCALE * Math.min(1, STEP_SPAN_S / spanS) ** STEP_POWER;
    this.model = createForceModel(ephemeris, { gm: set, nonGravitational: forces });
    this.partials = new ForcePartials(ephemeris, set);
    this.gm = Float64Array.from(BODIES, (body) => GM_KM3_S2[set][body]);
    this.oblateness = 1.5 * EARTH_J2 * this.gm[EARTH] * EARTH_RADIUS_KM * EARTH_RADIUS_KM;
  }

  /**
   * Looks at a group before a step: its mean, its spread, which bodies are near.
   *
   * @param states barycentric states of all clones, km and km/s (6 each)
   * @param group, count which of them
   * @param base, offset the instant, whole TDB seconds past J2000 and seconds past it
   * @param left         how far the clones still have to go, s
   */
  survey(
    states: Float64Array,
    group: Int32Array,
    count: number,
    base: number,
    offset: number,
    left: number,
  ): void {
    const { mean, ephemeris, starts } = this;
    this.base = base;
    this.offset = offset;
    mean.fill(0);
    for (let g = 0; g < count; g++) {
      const at = group[g] * 6;
      for (let k = 0; k < 6; k++) mean[k] += states[at + k];
    }
    for (let k = 0; k < 6; k++) mean[k] /= count;
    let most = 0;
    for (let g = 0; g < count; g++) {
      const at = group[g] * 6;
      const x = states[at] - mean[0];
      const y = states[at + 1] - mean[1];
      const z = states[at + 2] - mean[2];
      const d2 = x * x + y * y + z * z;
      if (d2 > most) most = d2;
    }
    this.spread = Math.sqrt(most);
    ephemeris.states(base, offset, starts);
    const span = Math.min(Math.max(left, LEAST_LINEAR_SPAN_S), MOST_LINEAR_SPAN_S);
    this.linearTolerance = (2 * LINEAR_ERROR_KM) / (span * span);
    this.nearCount = 0;
    this.oblate = false;
    for (let body = 0; body < BODY_COUNT; body++) {
      const distance = this.meanDistance(body);
      const inner = distance - this.spread;
      const second = 3 * this.gm[body] * most;
      if (inner > 2 * this.spread && second < this.linearTolerance * inner ** 4) continue;
      if (body === EARTH) {
        this.earthAt = this.nearCount;
        this.oblate = inner < OBLATENESS_REGION_KM;
      }
      this.near[this.nearCount] = body;
      this.nearGm[this.nearCount] = this.gm[body];
      this.nearCount += 1;
    }
  }

  /** Distance and relative speed of the group's mean from a body at the start of the step. */
  private meanDistance(body: number): number {
    const { mean, starts } = this;
    return Math.hypot(
      mean[0] - starts[body * 6],
      mean[1] - starts[body * 6 + 1],
      mean[2] - starts[body * 6 + 2],
    );
  }

  private meanSpeed(body: number): number {
    const { mean, starts } = this;
    return Math.hypot(
      mean[3] - starts[body * 6 + 3],
      mean[4] - starts[body * 6 + 4],
      mean[5] - starts[body * 6 + 5],
    );
  }

  /** States of all bodies at the start of the step (11 × 6), barycentric. */
  get bodiesAtStart(): Float64Array {
    return this.starts;
  }

  /** The same at its end. */
  get bodiesAtEnd(): Float64Array {
    return this.ends;
  }

  /** Whether any clone of the group can come within a distance of a body in this step. */
  mayComeWithin(body: number, distanceKm: number): boolean {
    const way = this.meanSpeed(body) * this.length;
    return this.meanDistance(body) - this.spread - 2 * way <= distanceKm;
  }

  /** The longest step that the bodies which are not near allow, s. */
  farStep(): number {
    let least = Number.POSITIVE_INFINITY;
    let next = 0;
    for (let body = 0; body < BODY_COUNT; body++) {
      if (next < this.nearCount && this.near[next] === body) {
        next += 1;
        continue;
      }
      if (this.gm[body] === 0) continue;
      const distance = Math.max(RADII[body], this.meanDistance(body) - this.spread);
      least = Math.min(
        least,
        this.stepScale * reach(this.gm[body], distance, this.meanSpeed(body)),
      );
    }
    return least;
  }

  /**
   * The longest step for each clone of the group, s, as the near bodies allow.
   *
   * @param out receives a number for each place in the group
   */
  nearSteps(
    states: Float64Array,
    group: Int32Array,
    count: number,
    atMost: number,
    out: Float64Array,
  ): void {
    const { starts, near, nearGm, nearCount } = this;
    out.fill(atMost, 0, count);
    for (let b = 0; b < nearCount; b++) {
      const body = near[b];
      const gm = nearGm[b];
      const from = body * 6;
      const speed = this.meanSpeed(body);
      const factor =
        this.stepScale * ((speed * speed) / gm + 1 / this.meanDistance(body)) ** STEP_POWER;
      const radius = RADII[body];
      for (let g = 0; g < count; g++) {
        const at = group[g] * 6;
        const x = states[at] - starts[from];
        const y = states[at + 1] - starts[from + 1];
        const z = states[at + 2] - starts[from + 2];
        const u = states[at + 3] - starts[from + 3];
        const v = states[at + 4] - starts[from + 4];
        const w = states[at + 5] - starts[from + 5];
        const d = Math.max(radius, Math.sqrt(x * x + y * y + z * z));
        const step = (factor * d) / Math.sqrt(u * u + v * v + w * w + gm / d);
        if (step < out[g]) out[g] = step;
      }
    }
  }

  /** Evaluates the field at the stages of a step of `length` seconds from where the survey was made. */
  prepare(length: number): void {
    this.length = length;
    this.extraStages = false;
    this.paths.clear();
    this.model.pull.set(this.gm);
    this.partials.pull.set(this.gm);
    for (let b = 0; b < this.nearCount; b++) {
      this.model.pull[this.near[b]] = 0;
      this.partials.pull[this.near[b]] = 0;
    }
    earthPole(this.base + this.offset, this.pole);
    for (let stage = 0; stage < STAGES; stage++) this.evaluateStage(stage);
    this.ephemeris.states(this.base, this.offset + length, this.ends);
  }

  /** Evaluates the stages that only the dense output needs; does nothing the second time. */
  prepareDense(): void {
    if (this.extraStages) return;
    this.extraStages = true;
    for (let stage = STAGES; stage < ALL_STAGES; stage++) this.evaluateStage(stage);
  }

  private evaluateStage(stage: number): void {
    const { mean, stageState, meanPull, length, rate, model, partials } = this;
    const after = NODES[stage] * length;
    for (let k = 0; k < 3; k++) {
      let place = 0;
      for (let i = PLACE_ROWS.starts[stage]; i < PLACE_ROWS.starts[stage + 1]; i++) {
        place += PLACE_ROWS.weights[i] * meanPull[PLACE_ROWS.stages[i] * 3 + k];
      }
      let velocity = 0;
      for (let i = VELOCITY_ROWS.starts[stage]; i < VELOCITY_ROWS.starts[stage + 1]; i++) {
        velocity += VELOCITY_ROWS.weights[i] * meanPull[VELOCITY_ROWS.stages[i] * 3 + k];
      }
      stageState[k] = mean[k] + after * mean[k + 3] + length * length * place;
      stageState[k + 3] = mean[k + 3] + length * velocity;
    }
    model.derivative(this.base, this.offset + after, stageState, rate, 0);
    partials.differentiate(model.bodies, this.base + this.offset + after, stageState);
    for (let k = 0; k < 3; k++) {
      this.place[stage * 3 + k] = stageState[k];
      this.pull[stage * 3 + k] = rate[3 + k];
      meanPull[stage * 3 + k] = rate[3 + k];
    }
    this.gradient.set(partials.place, stage * 9);
    this.forces.set(partials.forces, stage * 9);
    this.bodyPlaces.set(model.bodies.subarray(0, BODY_COUNT * 3), stage * BODY_COUNT * 3);
    for (let b = 0; b < this.nearCount; b++) {
      const to = (b * ALL_STAGES + stage) * 3;
      const from = this.near[b] * 3;
      let d2 = 0;
      for (let k = 0; k < 3; k++) {
        this.nearPlaces[to + k] = model.bodies[from + k];
        d2 += (model.bodies[from + k] - stageState[k]) ** 2;
      }
      // Inside a body the mean of a group that passes on all sides is held: it is only a reference.
      const held = Math.max(Math.sqrt(d2), RADII[this.near[b]]);
      const k3 = this.nearGm[b] / (held * held * held);
      for (let k = 0; k < 3; k++) {
        meanPull[stage * 3 + k] += k3 * (model.bodies[from + k] - stageState[k]);
      }
    }
  }

  /**
   * Place and velocity of a body inside the step, by the polynomial through its places at the stages.
   *
   * @param u   place in the step, 0 to 1
   * @param out receives km and km/s (6)
   * Accuracy: 1e-3 km in steps up to two days (the Moon's turn about the Earth sets it).
   */
  bodyState(body: number, u: number, out: Float64Array): void {
    let path = this.paths.get(body);
    if (path === undefined) {
      path = this.layPath(body);
      this.paths.set(body, path);
    }
    const last = PATH_STAGES.length - 1;
    for (let k = 0; k < 3; k++) {
      let value = path[last * 3 + k];
      let slope = 0;
      for (let i = last - 1; i >= 0; i--) {
        slope = slope * (u - PATH_NODES[i]) + value;
        value = value * (u - PATH_NODES[i]) + path[i * 3 + k];
      }
      out[k] = value;
      out[k + 3] = slope / this.length;
    }
  }

  /** Newton's divided differences of a body's place over the path's nodes. */
  private layPath(body: number): Float64Array {
    const size = PATH_STAGES.length;
    const path = new Float64Array(size * 3);
    for (let k = 0; k < 3; k++) {
      for (let i = 0; i < size; i++) {
        path[i * 3 + k] = this.bodyPlaces[(PATH_STAGES[i] * BODY_COUNT + body) * 3 + k];
      }
      for (let order = 1; order < size; order++) {
        for (let i = size - 1; i >= order; i--) {
          path[i * 3 + k] =
            (path[i * 3 + k] - path[(i - 1) * 3 + k]) / (PATH_NODES[i] - PATH_NODES[i - order]);
        }
      }
    }
    return path;
  }
}

/**
 * The longest step past a body, s: a share of d/√(v² + GM/d) that grows with the ninth root of
 * v²/GM, so that the error of a step is about the same by every body.
 */
function reach(gm: number, distance: number, speed: number): number {
  const pace = speed * speed + gm / distance;
  return ((pace / gm) ** STEP_POWER * distance) / Math.sqrt(pace);
}

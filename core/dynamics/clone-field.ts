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
  LOWEST_OBLATE_KM,
  type NonGravitationalForce,
  OBLATENESS_REGION_KM,
} from './force-model';
import { PLACE_ROWS, VELOCITY_ROWS } from './nystrom';
import { ForcePartials } from './partials';
import { ReferencePath } from './reference-path';

/**
 * Steps are this much of d/√(v² + GM/d) for a body whose GM/v² is one kilometre; see `reach`. Measured:
 * 0.01 km at an encounter 75 days ahead. Longer spans let errors grow and get shorter steps.
 */
const STEP_SCALE = 1.0;
const STEP_SPAN_S = 75 * 86400;
/** No step is longer than this share of d/√(v² + GM/d), however near the clones are to the reference. */
const MOST_REACH = 0.65;
/** Clones this near to the reference trajectory, in distances of the nearest body, are measured from it. */
const NEAR_REFERENCE = 0.2;
/** Local error that sets the steps grows as their ninth power. */
const STEP_POWER = 1 / 9;
/** What leaving out the second order of a distant body's pull may move a clone by, km. */
const LINEAR_ERROR_KM = 1e-3;
const LEAST_LINEAR_SPAN_S = 30 * 86400;
const MOST_LINEAR_SPAN_S = 365.25 * 86400;
const BODY_COUNT = BODIES.length;
const RADII = Float64Array.from(BODIES, (body) => BODY_RADIUS_KM[body]);
const EARTH = BODY_INDEX.Earth;
const LEAST2 = LOWEST_OBLATE_KM * LOWEST_OBLATE_KM;
const SHORTEST_REFERENCE_S = 1;
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
  private readonly oblatePull = new Float64Array(3);
  private readonly bodyPlaces = new Float64Array(ALL_STAGES * BODY_COUNT * 3);
  private readonly starts = new Float64Array(66);
  private readonly ends = new Float64Array(66);
  private readonly paths = new Map<number, Float64Array>();
  private extraStages = false;
  private linearTolerance = 0;
  private readonly reference: ReferencePath;
  /** Whether this step's deviations are taken from the reference trajectory (else from nothing). */
  private fromReference = false;
  private readonly stepScale: number;
  private base = 0;
  private offset = 0;

  /** Length of the step, s. */
  length = 0;
  /** What the kernel's states are measured from at both ends of the step, km and km/s (6). */
  readonly originAtStart = new Float64Array(6);
  readonly originAtEnd = new Float64Array(6);
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
  /** Largest distance and relative speed of a clone from the middle, km and km/s. */
  private spread = 0;
  private speedSpread = 0;

  constructor(
    private readonly ephemeris: Ephemeris,
    set: GmSet,
    forces: NonGravitationalForce | null,
    nominal: { fromTdbSeconds: number; toTdbSeconds: number; state: Float64Array },
  ) {
    const { fromTdbSeconds, toTdbSeconds, state } = nominal;
    this.stepScale =
      STEP_SCALE * Math.min(1, STEP_SPAN_S / (toTdbSeconds - fromTdbSeconds)) ** STEP_POWER;
    this.model = createForceModel(ephemeris, { gm: set, nonGravitational: forces });
    this.partials = new ForcePartials(ephemeris, set);
    this.gm = Float64Array.from(BODIES, (body) => GM_KM3_S2[set][body]);
    this.reference = new ReferencePath(this.model, fromTdbSeconds, toTdbSeconds, state);
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
    const { ephemeris, starts } = this;
    this.base = base;
    this.offset = offset;
    ephemeris.states(base, offset, starts);
    this.fromReference = this.measureFromReference(states, group, count);
    if (!this.fromReference) this.measureFromMean(states, group, count);
    const most = this.spread * this.spread;
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

  /** Takes the reference trajectory as the group's middle, if it goes on and all are near it. */
  private measureFromReference(states: Float64Array, group: Int32Array, count: number): boolean {
    const { mean, base, offset, reference } = this;
    if (!reference.covers(base + offset, base + offset + SHORTEST_REFERENCE_S)) return false;
    reference.state(base, offset, mean);
    this.measureSpread(states, group, count);
    for (let body = 0; body < BODY_COUNT; body++) {
      if (this.spread > NEAR_REFERENCE * this.meanDistance(body)) return false;
    }
    return true;
  }

  private measureFromMean(states: Float64Array, group: Int32Array, count: number): void {
    const { mean } = this;
    mean.fill(0);
    for (let g = 0; g < count; g++) {
      const at = group[g] * 6;
      for (let k = 0; k < 6; k++) mean[k] += states[at + k];
    }
    for (let k = 0; k < 6; k++) mean[k] /= count;
    this.measureSpread(states, group, count);
  }

  /** Largest distance and relative speed of the group from its middle. */
  private measureSpread(states: Float64Array, group: Int32Array, count: number): void {
    const { mean } = this;
    let place = 0;
    let speed = 0;
    for (let g = 0; g < count; g++) {
      const at = group[g] * 6;
      const x = states[at] - mean[0];
      const y = states[at + 1] - mean[1];
      const z = states[at + 2] - mean[2];
      const u = states[at + 3] - mean[3];
      const v = states[at + 4] - mean[4];
      const w = states[at + 5] - mean[5];
      place = Math.max(place, x * x + y * y + z * z);
      speed = Math.max(speed, u * u + v * v + w * w);
    }
    this.spread = Math.sqrt(place);
    this.speedSpread = Math.sqrt(speed);
  }

  /**
   * The longest step past a body at a distance and speed, s.
   *
   * A share of τ = d/√(v² + GM/d) that grows with the ninth root of v²/GM, so that the error of a step
   * is about the same by every body; and of d over the clones' deviation, where only that is carried.
   */
  private reach(body: number, distance: number, speed: number): number {
    const gm = this.gm[body];
    const pace = speed * speed + gm / distance;
    const tau = distance / Math.sqrt(pace);
    if (!this.fromReference)
      return Math.min(MOST_REACH, this.stepScale * (pace / gm) ** STEP_POWER) * tau;
    const deviation = Math.min(1, (this.spread + 0.3 * tau * this.speedSpread) / distance);
    return Math.min(MOST_REACH, this.stepScale * (pace / (gm * deviation)) ** STEP_POWER) * tau;
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
    let least = this.fromReference
      ? this.reference.endTdbSeconds - this.base - this.offset
      : Number.POSITIVE_INFINITY;
    let next = 0;
    for (let body = 0; body < BODY_COUNT; body++) {
      if (next < this.nearCount && this.near[next] === body) {
        next += 1;
        continue;
      }
      if (this.gm[body] === 0) continue;
      const distance = Math.max(RADII[body], this.meanDistance(body) - this.spread);
      least = Math.min(least, this.reach(body, distance, this.meanSpeed(body)));
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
      // The share of τ is taken at the middle of the group, τ itself at each clone.
      const middle = this.meanDistance(body);
      const speed = this.meanSpeed(body);
      const factor =
        this.reach(body, middle, speed) / (middle / Math.sqrt(speed * speed + gm / middle));
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
    if (this.fromReference) {
      this.originAtStart.set(this.mean);
      this.reference.state(this.base, this.offset + length, this.originAtEnd);
    } else {
      this.originAtStart.fill(0);
      this.originAtEnd.fill(0);
    }
  }

  /** What the kernel's states are measured from inside the step, written to `out` (6). */
  origin(u: number, out: Float64Array): void {
    if (this.fromReference) this.reference.state(this.base, this.offset + u * this.length, out);
    else out.fill(0);
  }

  /** Evaluates the stages that only the dense output needs; does nothing the second time. */
  prepareDense(): void {
    if (this.extraStages) return;
    this.extraStages = true;
    for (let stage = STAGES; stage < ALL_STAGES; stage++) this.evaluateStage(stage);
  }

  private evaluateStage(stage: number): void {
    const { stageState, rate, model, partials, near, nearPlaces, fromReference } = this;
    const after = NODES[stage] * this.length;
    if (fromReference) this.reference.state(this.base, this.offset + after, stageState);
    else this.carryMean(stage, after);
    model.derivative(this.base, this.offset + after, stageState, rate, 0);
    partials.differentiate(model.bodies, this.base + this.offset + after, stageState);
    this.gradient.set(partials.place, stage * 9);
    this.forces.set(partials.forces, stage * 9);
    this.bodyPlaces.set(model.bodies.subarray(0, BODY_COUNT * 3), stage * BODY_COUNT * 3);
    const to = stage * 3;
    for (let k = 0; k < 3; k++) {
      this.place[to + k] = fromReference ? 0 : stageState[k];
      this.pull[to + k] = fromReference ? 0 : rate[3 + k];
      this.meanPull[to + k] = rate[3 + k];
    }
    for (let b = 0; b < this.nearCount; b++) {
      const at = (b * ALL_STAGES + stage) * 3;
      const from = near[b] * 3;
      let d2 = 0;
      for (let k = 0; k < 3; k++) {
        const away = model.bodies[from + k] - stageState[k];
        nearPlaces[at + k] = fromReference ? away : model.bodies[from + k];
        d2 += away * away;
      }
      // Inside a body the mean of a group that passes on all sides is held: it is only a middle.
      const held = fromReference ? Math.sqrt(d2) : Math.max(Math.sqrt(d2), RADII[near[b]]);
      const strength = this.nearGm[b] / (held * held * held);
      for (let k = 0; k < 3; k++) {
        const pull = strength * (model.bodies[from + k] - stageState[k]);
        if (fromReference) this.pull[to + k] -= pull;
        else this.meanPull[to + k] += pull;
      }
    }
    if (fromReference && this.oblate) this.takeOffOblateness(stage);
  }

  /** State of the group's mean at a stage, from its accelerations at those before. */
  private carryMean(stage: number, after: number): void {
    const { mean, stageState, meanPull, length } = this;
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
  }

  /** The reference's own oblate pull, off that of every clone. */
  private takeOffOblateness(stage: number): void {
    const at = (this.earthAt * ALL_STAGES + stage) * 3;
    const { nearPlaces, pull, oblatePull } = this;
    oblatePull.fill(0);
    oblateAcceleration(
      this.oblateness,
      this.pole,
      -nearPlaces[at],
      -nearPlaces[at + 1],
      -nearPlaces[at + 2],
      oblatePull,
      0,
    );
    for (let k = 0; k < 3; k++) pull[stage * 3 + k] -= oblatePull[k];
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
 * Adds the pull of the Earth's oblateness at a geocentric place (km), km/s², to `out` from `at`.
 *
 * Below the surface, where only trial steps go, the term is held: it would outgrow all else.
 */
export function oblateAcceleration(
  oblateness: number,
  pole: Float64Array,
  x: number,
  y: number,
  z: number,
  out: Float64Array,
  at: number,
): void {
  const q2 = x * x + y * y + z * z;
  const along = x * pole[0] + y * pole[1] + z * pole[2];
  const inverse2 = 1 / Math.max(q2, LEAST2);
  const k = (oblateness * inverse2 * inverse2) / Math.sqrt(q2);
  const radial = k * (5 * along * along * inverse2 - 1);
  const polar = 2 * k * along;
  out[at] += radial * x - polar * pole[0];
  out[at + 1] += radial * y - polar * pole[1];
  out[at + 2] += radial * z - polar * pole[2];
}

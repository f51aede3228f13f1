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
import { CloneGroup } from './clone-group';
import { ALL_STAGES, NODES, STAGES } from './dop853-coefficients';
import {
  createForceModel,
  earthPole,
  type ForceModel,
  LOWEST_OBLATE_KM,
  type NonGravitationalForce,
} from './force-model';
import { PLACE_ROWS, VELOCITY_ROWS } from './nystrom';
import { ForcePartials } from './partials';
import { ReferencePath } from './reference-path';

const BODY_COUNT = BODIES.length;
const RADII = Float64Array.from(BODIES, (body) => BODY_RADIUS_KM[body]);
const EARTH = BODY_INDEX.Earth;
const LEAST2 = LOWEST_OBLATE_KM * LOWEST_OBLATE_KM;
/** Stages through which the path of a body in a step is laid. */
const PATH_STAGES = [0, 2, 3, 6, 5, 9, 10, 11];
const PATH_NODES = Float64Array.from(PATH_STAGES, (stage) => NODES[stage]);

/**
 * The field in which a group of clones makes one step: what all of them share.
 *
 * At each stage of the step the bodies' places are evaluated once. The group's near bodies are left to
 * each clone; the pull of all others, relativity, the Sun's oblateness and the non-gravitational terms
 * are linearised about the group's middle, which is carried along: what that leaves out stays below
 * 20 m in the time that is left (a year at most).
 */
export class CloneField {
  private readonly model: ForceModel;
  private readonly partials: ForcePartials;
  private readonly gm: Float64Array;
  /** State of the group's middle at a stage. */
  private readonly stageState = new Float64Array(6);
  private readonly rate = new Float64Array(6);
  private readonly meanPull = new Float64Array(ALL_STAGES * 3);
  private readonly oblatePull = new Float64Array(3);
  private readonly bodyPlaces = new Float64Array(ALL_STAGES * BODY_COUNT * 3);
  private readonly paths = new Map<number, Float64Array>();
  private extraStages = false;
  private readonly reference: ReferencePath;
  readonly group: CloneGroup;

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
  /** States of all bodies at the end of the step (11 × 6), barycentric. */
  readonly bodiesAtEnd = new Float64Array(66);
  /** Places of the group's near bodies by stage, from the same origin as the clones. */
  readonly nearPlaces = new Float64Array(BODY_COUNT * ALL_STAGES * 3);
  /** 1.5 J2 GM R² of the Earth, and its pole (3). */
  readonly oblateness: number;
  readonly pole = new Float64Array(3);

  constructor(
    private readonly ephemeris: Ephemeris,
    set: GmSet,
    forces: NonGravitationalForce | null,
    nominal: { fromTdbSeconds: number; toTdbSeconds: number; state: Float64Array },
  ) {
    const { fromTdbSeconds, toTdbSeconds, state } = nominal;
    this.model = createForceModel(ephemeris, { gm: set, nonGravitational: forces });
    this.partials = new ForcePartials(ephemeris, set);
    this.gm = Float64Array.from(BODIES, (body) => GM_KM3_S2[set][body]);
    this.reference = new ReferencePath(this.model, fromTdbSeconds, toTdbSeconds, state);
    this.group = new CloneGroup(ephemeris, set, this.reference, toTdbSeconds - fromTdbSeconds);
    this.oblateness = 1.5 * EARTH_J2 * this.gm[EARTH] * EARTH_RADIUS_KM * EARTH_RADIUS_KM;
  }

  /** Evaluates the field at the stages of a step of `length` seconds from where the group was surveyed. */
  prepare(length: number): void {
    this.length = length;
    this.extraStages = false;
    this.paths.clear();
    this.model.pull.set(this.gm);
    this.partials.pull.set(this.gm);
    const { base, offset, near, nearCount, middle, fromReference } = this.group;
    for (let b = 0; b < nearCount; b++) {
      this.model.pull[near[b]] = 0;
      this.partials.pull[near[b]] = 0;
    }
    earthPole(base + offset, this.pole);
    for (let stage = 0; stage < STAGES; stage++) this.evaluateStage(stage);
    this.ephemeris.states(base, offset + length, this.bodiesAtEnd);
    if (fromReference) {
      this.originAtStart.set(middle);
      this.reference.state(base, offset + length, this.originAtEnd);
    } else {
      this.originAtStart.fill(0);
      this.originAtEnd.fill(0);
    }
  }

  /** What the kernel's states are measured from inside the step, written to `out` (6). */
  origin(u: number, out: Float64Array): void {
    const { base, offset, fromReference } = this.group;
    if (fromReference) this.reference.state(base, offset + u * this.length, out);
    else out.fill(0);
  }

  /** Evaluates the stages that only the dense output needs; does nothing the second time. */
  prepareDense(): void {
    if (this.extraStages) return;
    this.extraStages = true;
    for (let stage = STAGES; stage < ALL_STAGES; stage++) this.evaluateStage(stage);
  }

  private evaluateStage(stage: number): void {
    const { stageState, rate, model, partials, nearPlaces } = this;
    const { base, offset, near, nearGm, nearCount, fromReference } = this.group;
    const after = NODES[stage] * this.length;
    if (fromReference) this.reference.state(base, offset + after, stageState);
    else this.carryMean(stage, after);
    model.derivative(base, offset + after, stageState, rate, 0);
    partials.differentiate(model.bodies, base + offset + after, stageState);
    this.gradient.set(partials.place, stage * 9);
    this.forces.set(partials.forces, stage * 9);
    this.bodyPlaces.set(model.bodies.subarray(0, BODY_COUNT * 3), stage * BODY_COUNT * 3);
    const to = stage * 3;
    for (let k = 0; k < 3; k++) {
      this.place[to + k] = fromReference ? 0 : stageState[k];
      this.pull[to + k] = fromReference ? 0 : rate[3 + k];
      this.meanPull[to + k] = rate[3 + k];
    }
    for (let b = 0; b < nearCount; b++) {
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
      const strength = nearGm[b] / (held * held * held);
      for (let k = 0; k < 3; k++) {
        const pull = strength * (model.bodies[from + k] - stageState[k]);
        if (fromReference) this.pull[to + k] -= pull;
        else this.meanPull[to + k] += pull;
      }
    }
    if (fromReference && this.group.oblate) this.takeOffOblateness(stage);
  }

  /** State of the group's mean at a stage, from its accelerations at those before. */
  private carryMean(stage: number, after: number): void {
    const { stageState, meanPull, length } = this;
    const { middle } = this.group;
    for (let k = 0; k < 3; k++) {
      let place = 0;
      for (let i = PLACE_ROWS.starts[stage]; i < PLACE_ROWS.starts[stage + 1]; i++) {
        place += PLACE_ROWS.weights[i] * meanPull[PLACE_ROWS.stages[i] * 3 + k];
      }
      let velocity = 0;
      for (let i = VELOCITY_ROWS.starts[stage]; i < VELOCITY_ROWS.starts[stage + 1]; i++) {
        velocity += VELOCITY_ROWS.weights[i] * meanPull[VELOCITY_ROWS.stages[i] * 3 + k];
      }
      stageState[k] = middle[k] + after * middle[k + 3] + length * length * place;
      stageState[k + 3] = middle[k + 3] + length * velocity;
    }
  }

  /** The reference's own oblate pull, off that of every clone. */
  private takeOffOblateness(stage: number): void {
    const at = (this.group.earthAt * ALL_STAGES + stage) * 3;
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

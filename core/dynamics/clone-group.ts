import { BODIES, BODY_INDEX, BODY_RADIUS_KM, GM_KM3_S2, type GmSet } from '../constants';
import type { Ephemeris } from '../ephemeris';
import { OBLATENESS_REGION_KM } from './force-model';
import type { ReferencePath } from './reference-path';

/**
 * Steps are this much of d/√(v² + GM/d) for a body whose GM/v² is one kilometre; see `reach`. Measured:
 * 0.003 km at an encounter 75 days ahead. Longer spans let errors grow and get shorter steps.
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
const LINEAR_ERROR_KM = 0.02;
const LEAST_LINEAR_SPAN_S = 30 * 86400;
const MOST_LINEAR_SPAN_S = 365.25 * 86400;
const SHORTEST_REFERENCE_S = 1;
const BODY_COUNT = BODIES.length;
const RADII = Float64Array.from(BODIES, (body) => BODY_RADIUS_KM[body]);
const EARTH = BODY_INDEX.Earth;

/**
 * A group of clones before a step: its middle, its spread, which bodies are near it, how long a step
 * each clone can make.
 *
 * The middle is the reference trajectory while all are near it: then only deviations are carried, and
 * steps can be longer. Else it is the mean of the group.
 */
export class CloneGroup {
  private readonly gm: Float64Array;
  private readonly stepScale: number;
  /** State of the middle, barycentric, km and km/s (6). */
  readonly middle = new Float64Array(6);
  /** Whether the middle is on the reference trajectory. */
  fromReference = false;
  base = 0;
  offset = 0;
  /** States of all bodies (11 × 6), barycentric. */
  readonly bodies = new Float64Array(66);
  /** Bodies that bend the clones' paths differently: how many, which, their GM. */
  nearCount = 0;
  readonly near = new Int32Array(BODY_COUNT);
  readonly nearGm = new Float64Array(BODY_COUNT);
  /** Where the Earth stands among them, and whether its oblateness counts. */
  earthAt = 0;
  oblate = false;
  /** Largest distance and relative speed of a clone from the middle, km and km/s. */
  private spread = 0;
  private speedSpread = 0;

  /** @param spanS how long the clones are carried in all, s */
  constructor(
    private readonly ephemeris: Ephemeris,
    set: GmSet,
    private readonly reference: ReferencePath,
    spanS: number,
  ) {
    this.gm = Float64Array.from(BODIES, (body) => GM_KM3_S2[set][body]);
    this.stepScale = STEP_SCALE * Math.min(1, STEP_SPAN_S / spanS) ** STEP_POWER;
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
    const { ephemeris, bodies } = this;
    this.base = base;
    this.offset = offset;
    ephemeris.states(base, offset, bodies);
    this.fromReference = this.measureFromReference(states, group, count);
    if (!this.fromReference) this.measureFromMean(states, group, count);
    const most = this.spread * this.spread;
    const span = Math.min(Math.max(left, LEAST_LINEAR_SPAN_S), MOST_LINEAR_SPAN_S);
    const tolerance = (2 * LINEAR_ERROR_KM) / (span * span);
    this.nearCount = 0;
    this.oblate = false;
    for (let body = 0; body < BODY_COUNT; body++) {
      const distance = this.distanceOf(body);
      const inner = distance - this.spread;
      const second = 3 * this.gm[body] * most;
      if (inner > 2 * this.spread && second < tolerance * inner ** 4) continue;
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
    const { middle, base, offset, reference } = this;
    if (!reference.covers(base + offset, base + offset + SHORTEST_REFERENCE_S)) return false;
    reference.state(base, offset, middle);
    this.measureSpread(states, group, count);
    for (let body = 0; body < BODY_COUNT; body++) {
      if (this.spread > NEAR_REFERENCE * this.distanceOf(body)) return false;
    }
    return true;
  }

  private measureFromMean(states: Float64Array, group: Int32Array, count: number): void {
    const { middle } = this;
    middle.fill(0);
    for (let g = 0; g < count; g++) {
      const at = group[g] * 6;
      for (let k = 0; k < 6; k++) middle[k] += states[at + k];
    }
    for (let k = 0; k < 6; k++) middle[k] /= count;
    this.measureSpread(states, group, count);
  }

  /** Largest distance and relative speed of the group from its middle. */
  private measureSpread(states: Float64Array, group: Int32Array, count: number): void {
    const { middle } = this;
    let place = 0;
    let speed = 0;
    for (let g = 0; g < count; g++) {
      const at = group[g] * 6;
      const x = states[at] - middle[0];
      const y = states[at + 1] - middle[1];
      const z = states[at + 2] - middle[2];
      const u = states[at + 3] - middle[3];
      const v = states[at + 4] - middle[4];
      const w = states[at + 5] - middle[5];
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
    const deviation = this.fromReference
      ? Math.min(1, (this.spread + 0.3 * tau * this.speedSpread) / distance)
      : 1;
    return Math.min(MOST_REACH, this.stepScale * (pace / (gm * deviation)) ** STEP_POWER) * tau;
  }

  /** Distance and relative speed of the middle from a body. */
  private distanceOf(body: number): number {
    const { middle, bodies } = this;
    return Math.hypot(
      middle[0] - bodies[body * 6],
      middle[1] - bodies[body * 6 + 1],
      middle[2] - bodies[body * 6 + 2],
    );
  }

  private speedOf(body: number): number {
    const { middle, bodies } = this;
    return Math.hypot(
      middle[3] - bodies[body * 6 + 3],
      middle[4] - bodies[body * 6 + 4],
      middle[5] - bodies[body * 6 + 5],
    );
  }

  /** Whether any clone of the group can come within a distance of a body in a step. */
  mayComeWithin(body: number, distanceKm: number, lengthS: number): boolean {
    const way = this.speedOf(body) * lengthS;
    return this.distanceOf(body) - this.spread - 2 * way <= distanceKm;
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
      const distance = Math.max(RADII[body], this.distanceOf(body) - this.spread);
      least = Math.min(least, this.reach(body, distance, this.speedOf(body)));
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
    const { bodies, near, nearGm, nearCount } = this;
    out.fill(atMost, 0, count);
    for (let b = 0; b < nearCount; b++) {
      const body = near[b];
      const gm = nearGm[b];
      const from = body * 6;
      // The share of τ is taken at the middle of the group, τ itself at each clone.
      const distance = this.distanceOf(body);
      const speed = this.speedOf(body);
      const factor =
        this.reach(body, distance, speed) / (distance / Math.sqrt(speed * speed + gm / distance));
      const radius = RADII[body];
      for (let g = 0; g < count; g++) {
        const at = group[g] * 6;
        const x = states[at] - bodies[from];
        const y = states[at + 1] - bodies[from + 1];
        const z = states[at + 2] - bodies[from + 2];
        const u = states[at + 3] - bodies[from + 3];
        const v = states[at + 4] - bodies[from + 4];
        const w = states[at + 5] - bodies[from + 5];
        const d = Math.max(radius, Math.sqrt(x * x + y * y + z * z));
        const step = (factor * d) / Math.sqrt(u * u + v * v + w * w + gm / d);
        if (step < out[g]) out[g] = step;
      }
    }
  }
}

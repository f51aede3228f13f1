import { BODY_INDEX, type Body } from '../constants';
import type { Ephemeris } from '../ephemeris';
import { earthOrientation } from '../frames/earth-orientation';
import { type Vec3, vec3 } from '../math/vector';
import { propagateTwoBody } from '../orbit/propagate';
import type { Segment } from './propagate';
import { SAMPLE } from './sample-layout';

const HELIOCENTRIC: readonly [number, Body][] = [
  [SAMPLE.earth, 'Earth'],
  [SAMPLE.mercury, 'Mercury'],
  [SAMPLE.venus, 'Venus'],
  [SAMPLE.mars, 'Mars'],
  [SAMPLE.jupiter, 'Jupiter'],
];

/** Writes samples of integration steps for drawing, interpolation and the files. */
export class Sampler {
  private readonly object = new Float64Array(6);
  private readonly bodies = new Float64Array(66);

  /**
   * @param ephemeris   covering every step that will be sampled
   * @param epoch       TDB seconds past J2000 of the heliocentric state that starts the unperturbed path
   * @param r           heliocentric position at the epoch, km, ICRF (3)
   * @param v           heliocentric velocity at the epoch, km/s, ICRF (3)
   * @param gmSun       gravitational parameter of the Sun, km^3/s^2
   */
  constructor(
    private readonly ephemeris: Ephemeris,
    private readonly epoch: number,
    private readonly r: Vec3,
    private readonly v: Vec3,
    private readonly gmSun: number,
  ) {}

  /**
   * Appends samples of a step, or a part of it, in the order of integration.
   *
   * @param segment the step
   * @param from    offset where the part starts; it is left out (it is the end of the step before)
   * @param to      last offset to sample (the step's end, or where the trajectory ends in it)
   * @param out     receives SAMPLE.stride numbers a sample
   */
  append(segment: Segment, from: number, to: number, out: number[]): void {
    const count = this.countFor(segment, from, to);
    for (let i = 1; i <= count; i++) {
      this.one(segment, i === count ? to : from + ((to - from) * i) / count, out);
    }
  }

  /** Appends the sample of one moment of a step. */
  one(segment: Segment, offset: number, out: number[]): void {
    const { object, bodies } = this;
    const at = out.length;
    segment.evaluate(offset, object);
    this.ephemeris.states(segment.baseSeconds, offset, bodies);
    const tdbSeconds = segment.baseSeconds + offset;
    for (let k = 0; k < SAMPLE.stride; k++) out.push(0);
    out[at] = tdbSeconds;
    const earth = BODY_INDEX.Earth * 6;
    const moon = BODY_INDEX.Moon * 6;
    const sun = BODY_INDEX.Sun * 6;
    for (let k = 0; k < 6; k++) {
      out[at + SAMPLE.object + k] = object[k] - bodies[earth + k];
      out[at + SAMPLE.moon + k] = bodies[moon + k] - bodies[earth + k];
    }
    for (const [place, body] of HELIOCENTRIC) {
      const from = BODY_INDEX[body] * 6;
      for (let k = 0; k < 6; k++) out[at + place + k] = bodies[from + k] - bodies[sun + k];
    }
    const path = propagateTwoBody(this.r, this.v, this.gmSun, tdbSeconds - this.epoch);
    for (let k = 0; k < 3; k++) {
      out[at + SAMPLE.unperturbed + k] = path.r[k];
      out[at + SAMPLE.unperturbed + 3 + k] = path.v[k];
    }
    const orientation = earthOrientation(tdbSeconds);
    out[at + SAMPLE.orientation] = orientation.xRad;
    out[at + SAMPLE.orientation + 1] = orientation.yRad;
    out[at + SAMPLE.orientation + 2] = orientation.sRad;
    out[at + SAMPLE.orientation + 3] = orientation.eraRad;
  }

  /** How many samples a step deserves: more where the object is near the Earth. */
  private countFor(segment: Segment, from: number, to: number): number {
    const earth = BODY_INDEX.Earth * 6;
    let nearest = Number.POSITIVE_INFINITY;
    for (const offset of [from, to]) {
      segment.evaluate(offset, this.object);
      this.ephemeris.states(segment.baseSeconds, offset, this.bodies);
      const g = vec3(this.object).map((x, k) => x - this.bodies[earth + k]);
      nearest = Math.min(nearest, Math.hypot(g[0], g[1], g[2]));
    }
    return nearest < NEAR_KM ? 8 : Math.max(2, Math.ceil(Math.abs(to - from) / FAR_SPACING_S));
  }
}

/** Within this the path is sampled finely, km. */
const NEAR_KM = 1e7;
/** Widest spacing of samples, s: keeps the Moon's interpolated place within 50 km. */
const FAR_SPACING_S = 2 * 86400;

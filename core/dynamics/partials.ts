import {
  AU_KM,
  BODIES,
  BODY_INDEX,
  EARTH_J2,
  EARTH_RADIUS_KM,
  GM_KM3_S2,
  type GmSet,
  SPEED_OF_LIGHT_KM_S,
} from '../constants';
import type { Ephemeris } from '../ephemeris';
import { earthPole, LOWEST_OBLATE_KM, OBLATENESS_REGION_KM } from './force-model';

/**
 * Partial derivatives of the acceleration by place, velocity and A1, A2, A3.
 *
 * Point masses, relativity of the Sun and J2 of the Earth are differentiated; J2 of the Sun and what
 * A1 to A3 change with place and velocity are left out (1e-10 and less of the Sun's gradient).
 * Checked against central differences of the force model.
 */
export class ForcePartials {
  private readonly gm: Float64Array;
  /** GM of each body as a point mass, the Earth's with its oblateness: 0 leaves the body's pull out. */
  readonly pull: Float64Array;
  private readonly own = new Float64Array(36);
  private bodies: Float64Array = this.own;
  private readonly pole = new Float64Array(3);
  /** Derivatives by place and by velocity (3 × 3, by rows), and by A1, A2, A3 (3 × 3, a column each). */
  readonly place = new Float64Array(9);
  readonly velocity = new Float64Array(9);
  readonly forces = new Float64Array(9);

  constructor(
    private readonly ephemeris: Ephemeris,
    set: GmSet,
  ) {
    this.gm = Float64Array.from(BODIES, (body) => GM_KM3_S2[set][body]);
    this.pull = Float64Array.from(this.gm);
  }

  /**
   * Evaluates all three at a state; hot loop, allocates nothing.
   *
   * @param base, offset the instant, whole TDB seconds past J2000 and seconds past it
   * @param y            barycentric ICRF state, km and km/s (6)
   */
  evaluate(base: number, offset: number, y: Float64Array): void {
    this.ephemeris.positionsAndSunVelocity(base, offset, this.own);
    this.differentiate(this.own, base + offset, y);
  }

  /**
   * The same where the bodies' places are known.
   *
   * @param bodies     positions (11 × 3), km, then the Sun's velocity (3), km/s
   * @param tdbSeconds TDB seconds past J2000
   */
  differentiate(bodies: Float64Array, tdbSeconds: number, y: Float64Array): void {
    const { pull, place } = this;
    this.bodies = bodies;
    place.fill(0);
    for (let i = 0; i < 11; i++) {
      const x = bodies[i * 3] - y[0];
      const yy = bodies[i * 3 + 1] - y[1];
      const z = bodies[i * 3 + 2] - y[2];
      const d2 = x * x + yy * yy + z * z;
      const k = pull[i] / (d2 * Math.sqrt(d2));
      const t = (3 * k) / d2;
      place[0] += t * x * x - k;
      place[1] += t * x * yy;
      place[2] += t * x * z;
      place[4] += t * yy * yy - k;
      place[5] += t * yy * z;
      place[8] += t * z * z - k;
    }
    place[3] = place[1];
    place[6] = place[2];
    place[7] = place[5];
    this.addSun(y);
    this.addEarth(tdbSeconds, y);
  }

  private addSun(y: Float64Array): void {
    const { bodies, place, velocity, forces } = this;
    const at = BODY_INDEX.Sun * 3;
    const s = [y[0] - bodies[at], y[1] - bodies[at + 1], y[2] - bodies[at + 2]];
    const w = [y[3] - bodies[33], y[4] - bodies[34], y[5] - bodies[35]];
    const s2 = s[0] * s[0] + s[1] * s[1] + s[2] * s[2];
    const r = Math.sqrt(s2);
    const w2 = w[0] * w[0] + w[1] * w[1] + w[2] * w[2];
    const sw = s[0] * w[0] + s[1] * w[1] + s[2] * w[2];
    const gm = this.gm[BODY_INDEX.Sun];
    const k = gm / (SPEED_OF_LIGHT_KM_S * SPEED_OF_LIGHT_KM_S * s2 * r);
    const along = (4 * gm) / r - w2;
    for (let i = 0; i < 3; i++) {
      const a = k * (along * s[i] + 4 * sw * w[i]);
      for (let j = 0; j < 3; j++) {
        const unit = i === j ? 1 : 0;
        place[i * 3 + j] +=
          k * (along * unit - (4 * gm * s[i] * s[j]) / (s2 * r) + 4 * w[i] * w[j]) -
          (3 * a * s[j]) / s2;
        velocity[i * 3 + j] = k * (-2 * s[i] * w[j] + 4 * w[i] * s[j] + 4 * sw * unit);
      }
    }
    const g = (AU_KM * AU_KM) / s2;
    const h = [s[1] * w[2] - s[2] * w[1], s[2] * w[0] - s[0] * w[2], s[0] * w[1] - s[1] * w[0]];
    const size = Math.sqrt(h[0] * h[0] + h[1] * h[1] + h[2] * h[2]);
    const t = [h[1] * s[2] - h[2] * s[1], h[2] * s[0] - h[0] * s[2], h[0] * s[1] - h[1] * s[0]];
    for (let i = 0; i < 3; i++) {
      forces[i * 3] = (g * s[i]) / r;
      forces[i * 3 + 1] = (g * t[i]) / (size * r);
      forces[i * 3 + 2] = (g * h[i]) / size;
    }
  }

  private addEarth(tdbSeconds: number, y: Float64Array): void {
    const { bodies, place, pole } = this;
    const at = BODY_INDEX.Earth * 3;
    const g = [y[0] - bodies[at], y[1] - bodies[at + 1], y[2] - bodies[at + 2]];
    const q2 = g[0] * g[0] + g[1] * g[1] + g[2] * g[2];
    if (q2 > OBLATENESS_REGION_KM ** 2 || q2 < LOWEST_OBLATE_KM ** 2) return;
    earthPole(tdbSeconds, pole);
    const u = g[0] * pole[0] + g[1] * pole[1] + g[2] * pole[2];
    const q5 = q2 * q2 * Math.sqrt(q2);
    const q7 = q5 * q2;
    const k = 1.5 * EARTH_J2 * this.pull[BODY_INDEX.Earth] * EARTH_RADIUS_KM * EARTH_RADIUS_KM;
    const radial = (5 * u * u) / q7 - 1 / q5;
    for (let i = 0; i < 3; i++) {
      for (let j = 0; j < 3; j++) {
        place[i * 3 + j] +=
          k *
          ((i === j ? radial : 0) +
            g[i] * ((10 * u * pole[j] + 5 * g[j]) / q7 - (35 * u * u * g[j]) / (q7 * q2)) -
            (2 * pole[i] * pole[j]) / q5 +
            (10 * u * pole[i] * g[j]) / q7);
      }
    }
  }
}

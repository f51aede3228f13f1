import {
  ARCSEC_TO_RAD,
  AU_KM,
  BODIES,
  BODY_INDEX,
  BODY_RADIUS_KM,
  DEG_TO_RAD,
  EARTH_J2,
  EARTH_RADIUS_KM,
  GM_KM3_S2,
  type GmSet,
  SPEED_OF_LIGHT_KM_S,
  SUN_J2,
  SUN_POLE_DEC_DEG,
  SUN_POLE_RA_DEG,
} from '../constants';
import type { Ephemeris } from '../ephemeris';

/** Non-gravitational acceleration at 1 au, km/s^2: radial, transverse, normal; g(r) = (1 au/r)^2. */
export interface NonGravitationalForce {
  a1: number;
  a2: number;
  a3: number;
}

export interface ForceModelOptions {
  gm: GmSet;
  nonGravitational: NonGravitationalForce | null;
}

/** Geocentric distance within which the oblateness of the Earth is applied, km. */
export const OBLATENESS_REGION_KM = 1e7;
/** Below the lowest ground, km. */
export const LOWEST_OBLATE_KM = 6350;
const CENTURY_S = 36525 * 86400;

/**
 * Acceleration of a massless object in the field of Sun, planets and Moon.
 *
 * Newtonian point masses; the Sun's relativity to first post-Newtonian order (Schwarzschild,
 * harmonic coordinates); J2 of the Sun, and of the Earth about the pole of date; optional A1, A2, A3.
 * Barycentric ICRF, km, s, TDB. One instance serves one trajectory at a time (it keeps buffers).
 * Source: Newhall, Standish & Williams (1983), A&A 125, 150 (point masses and the post-Newtonian
 * term for one mass); Marsden, Sekanina & Yeomans (1973), AJ 78, 211 (A1, A2, A3); pole of date from
 * the precession of Capitaine, Wallace & Chapront (2003), A&A 412, 567, to second order.
 */
export class ForceModel {
  private readonly gm: Float64Array;
  /** GM of each body as a point mass, the Earth's with its oblateness: 0 leaves the body's pull out. */
  readonly pull: Float64Array;
  /** Of the last evaluation: positions of all bodies (11 × 3), km, and the Sun's velocity (3), km/s. */
  readonly bodies = new Float64Array(36);
  private readonly pole = new Float64Array(3);
  private readonly forces: Float64Array | null;
  /** 1.5 J2 R² of the Sun, km². */
  private readonly solarOblateness: number;
  /** Evaluations so far. */
  evaluations = 0;
  /** Largest GM/d³ of the last evaluation, 1/s²: how fast the pull changes with place. */
  tide = 0;

  constructor(
    readonly ephemeris: Ephemeris,
    options: ForceModelOptions,
  ) {
    this.gm = Float64Array.from(BODIES, (body) => GM_KM3_S2[options.gm][body]);
    this.pull = Float64Array.from(this.gm);
    this.solarOblateness = 1.5 * SUN_J2[options.gm] * BODY_RADIUS_KM.Sun ** 2;
    const forces = options.nonGravitational;
    this.forces = forces === null ? null : Float64Array.of(forces.a1, forces.a2, forces.a3);
  }

  /**
   * Derivative of a state: hot loop, allocates nothing.
   *
   * @param base   whole TDB seconds past J2000
   * @param offset seconds past the base
   * @param y      barycentric state, km and km/s (6)
   * @param out    receives velocity (3) and acceleration (3) from `at`
   * @throws       EphemerisRangeError outside the ephemeris
   */
  derivative(base: number, offset: number, y: Float64Array, out: Float64Array, at: number): void {
    const { bodies, pull } = this;
    this.ephemeris.positionsAndSunVelocity(base, offset, bodies);
    this.evaluations += 1;
    const x = y[0];
    const yy = y[1];
    const z = y[2];
    let ax = 0;
    let ay = 0;
    let az = 0;
    let tide = 0;
    for (let i = 0; i < 11; i++) {
      const dx = bodies[i * 3] - x;
      const dy = bodies[i * 3 + 1] - yy;
      const dz = bodies[i * 3 + 2] - z;
      const d2 = dx * dx + dy * dy + dz * dz;
      const k = pull[i] / (d2 * Math.sqrt(d2));
      ax += k * dx;
      ay += k * dy;
      az += k * dz;
      if (k > tide) tide = k;
    }
    this.tide = tide;
    out[at] = y[3];
    out[at + 1] = y[4];
    out[at + 2] = y[5];
    out[at + 3] = ax;
    out[at + 4] = ay;
    out[at + 5] = az;
    this.addSolarTerms(y, out, at);
    this.addOblateness(base + offset, y, out, at);
  }

  /** Relativity of the Sun and the non-gravitational terms. */
  private addSolarTerms(y: Float64Array, out: Float64Array, at: number): void {
    const { bodies, forces } = this;
    const sx = y[0] - bodies[SUN];
    const sy = y[1] - bodies[SUN + 1];
    const sz = y[2] - bodies[SUN + 2];
    const wx = y[3] - bodies[33];
    const wy = y[4] - bodies[34];
    const wz = y[5] - bodies[35];
    const s2 = sx * sx + sy * sy + sz * sz;
    const s = Math.sqrt(s2);
    const w2 = wx * wx + wy * wy + wz * wz;
    const sw = sx * wx + sy * wy + sz * wz;
    const gm = this.gm[10];
    const k = gm / (SPEED_OF_LIGHT_KM_S * SPEED_OF_LIGHT_KM_S * s2 * s);
    const along = k * ((4 * gm) / s - w2);
    const drag = 4 * k * sw;
    out[at + 3] += along * sx + drag * wx;
    out[at + 4] += along * sy + drag * wy;
    out[at + 5] += along * sz + drag * wz;
    // Oblateness of the Sun about its fixed pole.
    const sine = (sx * SUN_POLE_X + sy * SUN_POLE_Y + sz * SUN_POLE_Z) / s;
    const kj = (this.solarOblateness * gm) / (s2 * s2);
    const radialJ = (kj * (5 * sine * sine - 1)) / s;
    const polarJ = 2 * kj * sine;
    out[at + 3] += radialJ * sx - polarJ * SUN_POLE_X;
    out[at + 4] += radialJ * sy - polarJ * SUN_POLE_Y;
    out[at + 5] += radialJ * sz - polarJ * SUN_POLE_Z;
    if (forces === null) return;
    const g = (AU_KM * AU_KM) / s2;
    const hx = sy * wz - sz * wy;
    const hy = sz * wx - sx * wz;
    const hz = sx * wy - sy * wx;
    const h = Math.sqrt(hx * hx + hy * hy + hz * hz);
    const radial = (g * forces[0]) / s;
    const transverse = (g * forces[1]) / (h * s);
    const normal = (g * forces[2]) / h;
    out[at + 3] += radial * sx + transverse * (hy * sz - hz * sy) + normal * hx;
    out[at + 4] += radial * sy + transverse * (hz * sx - hx * sz) + normal * hy;
    out[at + 5] += radial * sz + transverse * (hx * sy - hy * sx) + normal * hz;
  }

  private addOblateness(tdbSeconds: number, y: Float64Array, out: Float64Array, at: number): void {
    const { bodies } = this;
    const gx = y[0] - bodies[EARTH];
    const gy = y[1] - bodies[EARTH + 1];
    const gz = y[2] - bodies[EARTH + 2];
    const q2 = gx * gx + gy * gy + gz * gz;
    if (q2 > OBLATENESS_REGION_KM * OBLATENESS_REGION_KM) return;
    const { pole } = this;
    earthPole(tdbSeconds, pole);
    const px = pole[0];
    const py = pole[1];
    const pz = pole[2];
    const q = Math.sqrt(q2);
    const sine = (gx * px + gy * py + gz * pz) / q;
    // Below the surface, where only trial steps go, the term is held: it would outgrow all else.
    const held = Math.max(q2, LOWEST_OBLATE_KM * LOWEST_OBLATE_KM);
    const k = (1.5 * EARTH_J2 * this.pull[2] * EARTH_RADIUS_KM * EARTH_RADIUS_KM) / (held * held);
    const radial = (k * (5 * sine * sine - 1)) / q;
    const polar = 2 * k * sine;
    out[at + 3] += radial * gx - polar * px;
    out[at + 4] += radial * gy - polar * py;
    out[at + 5] += radial * gz - polar * pz;
  }
}

const SUN_POLE_X = Math.cos(SUN_POLE_DEC_DEG * DEG_TO_RAD) * Math.cos(SUN_POLE_RA_DEG * DEG_TO_RAD);
const SUN_POLE_Y = Math.cos(SUN_POLE_DEC_DEG * DEG_TO_RAD) * Math.sin(SUN_POLE_RA_DEG * DEG_TO_RAD);
const SUN_POLE_Z = Math.sin(SUN_POLE_DEC_DEG * DEG_TO_RAD);
const SUN = BODY_INDEX.Sun * 3;
const EARTH = BODY_INDEX.Earth * 3;

/**
 * Pole of the Earth of date, a unit vector in ICRF: precession without nutation.
 *
 * @param tdbSeconds TDB seconds past J2000
 * @param out        receives three numbers
 * Source: Capitaine, Wallace & Chapront (2003), A&A 412, 567, to second order in time.
 */
export function earthPole(tdbSeconds: number, out: Float64Array): void {
  const century = tdbSeconds / CENTURY_S;
  const x = (2004.191898 - 0.4297829 * century) * century * ARCSEC_TO_RAD;
  const y = (-0.025896 - 22.4072747 * century) * century * ARCSEC_TO_RAD;
  out[0] = x;
  out[1] = y;
  out[2] = Math.sqrt(1 - x * x - y * y);
}

export const createForceModel = (ephemeris: Ephemeris, options: ForceModelOptions): ForceModel =>
  new ForceModel(ephemeris, options);

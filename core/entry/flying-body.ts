import { EARTH_J2, EARTH_RADIUS_KM, EARTH_ROTATION_RAD_S, GM_KM3_S2 } from '../constants';
import { airDensityKgM3, meanFreePathM, soundSpeedKmS } from './atmosphere';
import { ablationShare, bridgedDrag, HYPERSONIC_MACH, machFactor } from './drag';
import { radialAltitudeKm } from './earth-fixed';
import type { Field } from './runge-kutta';
import { type WindProfile, windAt } from './wind';

/** The equations of a body in the air over the turning Earth. */

/** The air: by default the standard atmosphere. */
export interface AirModel {
  densityKgM3(altitudeKm: number): number;
  soundSpeedKmS(altitudeKm: number): number;
  meanFreePathM(altitudeKm: number, densityKgM3: number): number;
}

export const STANDARD_AIR: AirModel = {
  densityKgM3: airDensityKgM3,
  soundSpeedKmS,
  meanFreePathM,
};

/** The Earth: by default WGS 84's turn, point mass and J2. */
export interface EarthField {
  readonly gmKm3S2: number;
  readonly j2: number;
  readonly rotationRadS: number;
}

export const TURNING_EARTH: EarthField = {
  gmKm3S2: GM_KM3_S2.DE431.Earth,
  j2: EARTH_J2,
  rotationRadS: EARTH_ROTATION_RAD_S,
};

/** A body as the air sees it. */
export interface Body {
  readonly massKg: number;
  readonly densityKgM3: number;
  /** σ = C_H / (Q C_D), which is Λ / (2 Q Γ) with Γ = C_D / 2; s²/km². */
  readonly ablationS2Km2: number;
  /** In hypersonic continuum flow: force = ½ ρ v² C_D A. */
  readonly dragCoefficient: number;
  /** Of a lift upward and at right angles to the motion, times the path angle's cosine; 0 for none. */
  readonly liftCoefficient: number;
}

/** Cross-section of a sphere = this × (mass / density)^(2/3). */
const SPHERE_AREA = Math.PI * (3 / (4 * Math.PI)) ** (2 / 3);

/** Places in the state: position and velocity (ITRF, km, km/s) are the first six. */
export const LOG_MASS = 6;
/** Energy given to the air, and work of gravity, per kilogram at the start: km²/s². */
export const DEPOSITED = 7;
export const GRAVITY_WORK = 8;
/** Radius of a spreading body, m, and its rate, m/s. */
export const RADIUS = 9;
export const SPREAD_RATE = 10;
export const STATE_SIZE = 11;

/** How the cross-section goes: that of a sphere of the mass, or a radius of its own. */
export const SOLID = 0;
/** Inertial spreading under the difference of pressure: Chyba, Thomas & Zahnle (1993). */
export const PANCAKE = 1;
/** Spreading at a speed set by the ratio of densities: Hills & Goda (1993). */
export const CLOUD = 2;
/** A spread body that spreads no more. */
export const SPREAD = 3;

/** Dispersion of a cloud: v √(3.5 ρ_air/ρ). Hills & Goda (1993), as used by Wheeler et al. (2017). */
const DISPERSION = 3.5;

/**
 * Derivatives of the flight in Earth-fixed axes. Fields are set between flights; the hot path
 * allocates nothing.
 *
 * Forces: point mass and J2, centrifugal and Coriolis, drag along and lift across the motion through
 * the air. Mass: dm/dt = −σ m a v with a the deceleration by drag, so dm/dt = −½ C_H ρ v³ A / Q.
 * Source: Ceplecha et al. (1998), Space Sci. Rev. 84, 327 (drag and ablation equations); spreading as
 * named above (both from memory).
 */
export class FlyingBody implements Field {
  readonly size = STATE_SIZE;
  shape = SOLID;
  startMassKg = 1;
  densityKgM3 = 1;
  ablationS2Km2 = 0;
  dragCoefficient = 1;
  liftCoefficient = 0;
  /** Of the last state looked at by `derivative` or `observe`. */
  altitudeKm = 0;
  climbKmS = 0;
  airSpeedKmS = 0;
  ramPressurePa = 0;
  private readonly wind = new Float64Array(3);

  constructor(
    private readonly air: AirModel,
    private readonly earth: EarthField,
    private readonly windProfile: WindProfile | null,
  ) {}

  /** Sets altitude, climb, speed through the air and ram pressure of a state. */
  observe(y: Float64Array): void {
    this.altitudeKm = radialAltitudeKm(y[0], y[1], y[2]);
    this.climbKmS = climbKmS(y);
    let ux = y[3];
    let uy = y[4];
    let uz = y[5];
    if (this.windProfile !== null) {
      windAt(this.windProfile, y, this.altitudeKm, this.wind);
      ux -= this.wind[0];
      uy -= this.wind[1];
      uz -= this.wind[2];
    }
    const u2 = ux * ux + uy * uy + uz * uz;
    this.airSpeedKmS = Math.sqrt(u2);
    this.ramPressurePa = this.air.densityKgM3(this.altitudeKm) * u2 * 1e6;
  }

  derivative(y: Float64Array, out: Float64Array): void {
    const { earth, air } = this;
    const x = y[0];
    const yy = y[1];
    const z = y[2];
    const vx = y[3];
    const vy = y[4];
    const vz = y[5];
    const altitude = radialAltitudeKm(x, yy, z);
    const r2 = x * x + yy * yy + z * z;
    const r = Math.sqrt(r2);

    // Gravity and centrifugal force, which work, then Coriolis, which does not.
    const oblate = 1.5 * earth.j2 * ((EARTH_RADIUS_KM * EARTH_RADIUS_KM) / r2);
    const z2 = (5 * z * z) / r2;
    const pull = -earth.gmKm3S2 / (r2 * r);
    const w = earth.rotationRadS;
    const level = pull * (1 + oblate * (1 - z2)) + w * w;
    const gx = level * x;
    const gy = level * yy;
    const gz = pull * (1 + oblate * (3 - z2)) * z;

    let ux = vx;
    let uy = vy;
    let uz = vz;
    if (this.windProfile !== null) {
      windAt(this.windProfile, y, altitude, this.wind);
      ux -= this.wind[0];
      uy -= this.wind[1];
      uz -= this.wind[2];
    }
    const u2 = ux * ux + uy * uy + uz * uz;
    const u = Math.sqrt(u2);
    const density = air.densityKgM3(altitude);
    const massShare = Math.exp(y[LOG_MASS]);
    const mass = massShare * this.startMassKg;
    const radius = y[RADIUS];
    const area =
      this.shape === SOLID
        ? SPHERE_AREA * Math.cbrt(mass / this.densityKgM3) ** 2
        : Math.PI * radius * radius;
    let drag = bridgedDrag(
      this.dragCoefficient,
      air.meanFreePathM(altitude, density) / (2 * Math.sqrt(area / Math.PI)),
    );
    // Sound is never faster than 0.35 km/s in the layers: no need to ask for it at speed.
    if (u < HYPERSONIC_MACH * 0.35) drag *= machFactor(u / air.soundSpeedKmS(altitude));
    // ½ ρ u² A in newtons is 1e6 of kg km²/s²/m; per kilogram and in km/s²: 1e3.
    const push = (500 * density * area * u) / mass;
    let fx = -push * drag * ux;
    let fy = -push * drag * uy;
    let fz = -push * drag * uz;
    if (this.liftCoefficient !== 0 && u > 0) {
      const along = (x * ux + yy * uy + z * uz) / u2;
      const lx = x - along * ux;
      const ly = yy - along * uy;
      const lz = z - along * uz;
      // Times the cosine of the path angle: a body that falls straight has no side to be lifted to.
      const lift = (push * u * this.liftCoefficient) / r;
      fx += lift * lx;
      fy += lift * ly;
      fz += lift * lz;
    }
    const massRate = -this.ablationS2Km2 * ablationShare(u) * push * drag * u2;
    out[0] = vx;
    out[1] = vy;
    out[2] = vz;
    out[3] = fx + gx + 2 * w * vy;
    out[4] = fy + gy - 2 * w * vx;
    out[5] = fz + gz;
    out[LOG_MASS] = massRate;
    out[DEPOSITED] =
      -massShare * (fx * vx + fy * vy + fz * vz + 0.5 * massRate * (vx * vx + vy * vy + vz * vz));
    out[GRAVITY_WORK] = massShare * (gx * vx + gy * vy + gz * vz);
    out[RADIUS] = 0;
    out[SPREAD_RATE] = 0;
    if (this.shape === PANCAKE) {
      out[RADIUS] = y[SPREAD_RATE];
      out[SPREAD_RATE] = (0.5 * drag * density * u2 * 1e6) / (this.densityKgM3 * radius);
    } else if (this.shape === CLOUD) {
      out[RADIUS] = 1000 * u * Math.sqrt((DISPERSION * density) / this.densityKgM3);
    }
  }
}

/** Radius of the sphere of a mass, m. */
export const sphereRadiusM = (massKg: number, densityKgM3: number): number =>
  Math.cbrt((3 * massKg) / (4 * Math.PI * densityKgM3));

/** Rate of altitude of a state, km/s: the motion along the ellipsoid's normal. */
function climbKmS(y: Float64Array): number {
  // (A/B)² of WGS 84 turns the radius into the normal at the surface.
  const nz = 1.00673949674227643 * y[2];
  const length = Math.sqrt(y[0] * y[0] + y[1] * y[1] + nz * nz);
  return (y[0] * y[3] + y[1] * y[4] + nz * y[5]) / length;
}

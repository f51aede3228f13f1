import { AU_KM, BODIES, BODY_INDEX, BODY_RADIUS_KM, GM_KM3_S2, type GmSet } from '../constants';
import { carryBatch } from '../dynamics/clone-batch';
import { CloneField } from '../dynamics/clone-field';
import { ApproachWatch, type CloneApproach } from '../encounter/clone-watch';
import { entryPoint, lunarSurfacePoint } from '../encounter/surface';
import type { Ephemeris } from '../ephemeris';
import { ECLIPTIC_POLE_ICRF } from '../frames/ecliptic';
import { vec3 } from '../math/vector';
import { elementsFromState } from '../orbit/elements';
import { CLONE_OUTCOME, CLONE_ROW, type CloneOutcomes, type ClonePlan } from './clones';

/** Minima farther than these are not approaches of a clone, km. */
const LIMITS_KM = { earth: 0.2 * AU_KM, moon: 2e5 };

export interface Carrier {
  /** Carries the clones of `dimension` standard normal numbers each to the end of the plan's span. */
  carry(z: Float64Array): CloneOutcomes;
}

/**
 * Carries clones of one case through its span by the n-body model.
 *
 * @param plan      what the clones are drawn from
 * @param ephemeris covers the plan's span
 */
export function createCarrier(plan: ClonePlan, ephemeris: Ephemeris): Carrier {
  const { forces, dimension } = plan;
  const field = new CloneField(
    ephemeris,
    plan.gm,
    forces === null ? null : { a1: forces[0], a2: forces[1], a3: forces[2] },
    {
      fromTdbSeconds: plan.epochTdbSeconds,
      toTdbSeconds: plan.toTdbSeconds,
      state: plan.state,
    },
  );
  const forcesUncertain = plan.factor.subarray(6 * dimension).some((value) => value !== 0);
  return {
    carry(z) {
      const count = z.length / dimension;
      const states = new Float64Array(count * 6);
      const deviations = forcesUncertain ? new Float64Array(count * 3) : null;
      for (let i = 0; i < count; i++) deviate(plan, z, i, states, deviations);
      const rows: CloneApproach[] = [];
      const watch = new ApproachWatch(field, LIMITS_KM, (approach) => rows.push(approach));
      carryBatch(field, states, deviations, plan.epochTdbSeconds, plan.toTdbSeconds, watch);
      rows.sort((a, b) => a.clone - b.clone || timeOf(a) - timeOf(b));
      const out = new Float64Array(rows.length * CLONE_ROW.size).fill(Number.NaN);
      for (const [i, row] of rows.entries()) writeRow(row, plan.gm, out, i * CLONE_ROW.size);
      return { count, rows: out };
    },
  };
}

/** State and forces of one clone: nominal + L z. */
function deviate(
  plan: ClonePlan,
  z: Float64Array,
  clone: number,
  states: Float64Array,
  deviations: Float64Array | null,
): void {
  const { factor, dimension, state } = plan;
  for (let row = 0; row < 9; row++) {
    let sum = 0;
    for (let k = 0; k < dimension; k++)
      sum += factor[row * dimension + k] * z[clone * dimension + k];
    if (row < 6) states[clone * 6 + row] = state[row] + sum;
    else if (deviations !== null) deviations[clone * 3 + row - 6] = sum;
  }
}

const timeOf = ({ closest, surface }: CloneApproach): number =>
  (surface ?? closest)?.tdbSeconds ?? 0;

function writeRow(approach: CloneApproach, set: GmSet, out: Float64Array, at: number): void {
  const { body, closest, entry, surface } = approach;
  const moment = surface === null ? closest : (entry ?? surface);
  if (moment === null) return;
  const gm = GM_KM3_S2[set][BODIES[body]];
  const put = (key: keyof typeof CLONE_ROW, value: number): void => {
    out[at + CLONE_ROW[key]] = value;
  };
  put('clone', approach.clone);
  put('body', body);
  put(
    'outcome',
    surface !== null
      ? CLONE_OUTCOME.impact
      : entry !== null
        ? CLONE_OUTCOME.atmosphere
        : CLONE_OUTCOME.pass,
  );
  const { state } = moment;
  if (surface === null) {
    put('tdbSeconds', moment.tdbSeconds);
    put('distanceKm', Math.hypot(state[0], state[1], state[2]));
    put('speedKmS', Math.hypot(state[3], state[4], state[5]));
  } else {
    const elements = elementsFromState(vec3(state), vec3(state, 3), gm);
    const { periapsisKm, eccentricity } = elements;
    put('tdbSeconds', moment.tdbSeconds - elements.timeFromPeriapsisS);
    put('distanceKm', periapsisKm);
    put('speedKmS', Math.sqrt((gm * (1 + eccentricity)) / periapsisKm));
  }
  writePlane(state, gm, BODY_RADIUS_KM[BODIES[body]], out, at);
  if (body === BODY_INDEX.Earth) writeEarth(approach, out, at);
  else if (surface !== null) {
    const point = lunarSurfacePoint(
      vec3(surface.state),
      vec3(surface.state, 3),
      surface.tdbSeconds,
    );
    put('groundTdbSeconds', surface.tdbSeconds);
    put('groundLatitudeRad', point.latitudeRad);
    put('groundLongitudeRad', point.longitudeRad);
    put('entrySpeedKmS', point.speedKmS);
  }
}

function writeEarth({ entry, surface }: CloneApproach, out: Float64Array, at: number): void {
  const point = (moment: { tdbSeconds: number; state: Float64Array }) =>
    entryPoint(vec3(moment.state), vec3(moment.state, 3), moment.tdbSeconds);
  if (entry !== null) {
    const p = point(entry);
    out[at + CLONE_ROW.entryTdbSeconds] = entry.tdbSeconds;
    out[at + CLONE_ROW.entryLatitudeRad] = p.latitudeRad;
    out[at + CLONE_ROW.entryLongitudeRad] = p.longitudeRad;
    out[at + CLONE_ROW.entrySpeedKmS] = p.speedKmS;
    out[at + CLONE_ROW.entryAirSpeedKmS] = p.airSpeedKmS;
    out[at + CLONE_ROW.entryAirFlightPathAngleRad] = p.airFlightPathAngleRad;
    out[at + CLONE_ROW.entryAirAzimuthRad] = p.airAzimuthRad;
  }
  if (surface !== null) {
    const p = point(surface);
    out[at + CLONE_ROW.groundTdbSeconds] = surface.tdbSeconds;
    out[at + CLONE_ROW.groundLatitudeRad] = p.latitudeRad;
    out[at + CLONE_ROW.groundLongitudeRad] = p.longitudeRad;
  }
}

/**
 * Where the incoming asymptote of the osculating hyperbola pierces the target plane; allocates nothing.
 *
 * Leaves NaN where the clone is bound. Source: Kizner (1961), Planet. Space Sci. 7, 125.
 */
function writePlane(
  state: Float64Array,
  gm: number,
  radiusKm: number,
  out: Float64Array,
  at: number,
): void {
  const [x, y, z, u, v, w] = state;
  const r = Math.sqrt(x * x + y * y + z * z);
  const excess2 = u * u + v * v + w * w - (2 * gm) / r;
  if (!(excess2 > 0)) return;
  const hx = y * w - z * v;
  const hy = z * u - x * w;
  const hz = x * v - y * u;
  const h2 = hx * hx + hy * hy + hz * hz;
  // Eccentricity vector, and the direction h × e: S = (e + √(e² − 1) h × e / |h|) / e².
  const ex = (v * hz - w * hy) / gm - x / r;
  const ey = (w * hx - u * hz) / gm - y / r;
  const ez = (u * hy - v * hx) / gm - z / r;
  const e2 = 1 + (excess2 * h2) / (gm * gm);
  const lean = Math.sqrt(excess2) / gm;
  const sx = (ex + lean * (hy * ez - hz * ey)) / e2;
  const sy = (ey + lean * (hz * ex - hx * ez)) / e2;
  const sz = (ez + lean * (hx * ey - hy * ex)) / e2;
  const excess = Math.sqrt(excess2);
  const bx = (sy * hz - sz * hy) / excess;
  const by = (sz * hx - sx * hz) / excess;
  const bz = (sx * hy - sy * hx) / excess;
  const [kx, ky, kz] = ECLIPTIC_POLE_ICRF;
  const tx = sy * kz - sz * ky;
  const ty = sz * kx - sx * kz;
  const tz = sx * ky - sy * kx;
  const t = Math.sqrt(tx * tx + ty * ty + tz * tz);
  const bT = (bx * tx + by * ty + bz * tz) / t;
  const bR = (bx * (sy * tz - sz * ty) + by * (sz * tx - sx * tz) + bz * (sx * ty - sy * tx)) / t;
  out[at + CLONE_ROW.excessSpeedKmS] = excess;
  out[at + CLONE_ROW.impactRadiusKm] = radiusKm * Math.sqrt(1 + (2 * gm) / (radiusKm * excess2));
  if (t < 1e-12) return;
  out[at + CLONE_ROW.bDotTKm] = bT;
  out[at + CLONE_ROW.bDotRKm] = bR;
}

import { eigenSymmetric } from '../math/symmetric';
import { captureMoments } from './capture-moments';
import { type CarriedClone, type Carrier, type ClonePass, passAt } from './clone-passes';
import { distance2, type Gaussian, gaussian, identity } from './gaussian-mixture';

/** Where in standard normal space the clones of one pass hit. */
export interface ImpactRegion {
  /** Of the pass, TDB seconds past J2000. */
  tdbSeconds: number;
  /** Mean and covariance of the clones that hit, from the map linearised in their midst. */
  hits: Gaussian;
  /** Probability by the same linear map. */
  probability: number;
}

/** Where the search begins: a clone's coordinates, the pass it is about, and a direction to begin with. */
export interface RegionStart {
  z: Float64Array;
  tdbSeconds: number;
  /** Unit vector along which the pass moves fastest, and how fast, km/σ. */
  direction: Float64Array;
  slopeKm: number;
}

/** A region this far out holds less than about 1e-11, σ. */
const FAR_SIGMAS = 6.8;
/** A search that sees its goal farther out than this after two steps is given up, σ. */
const GIVE_UP_SIGMAS = 12;
const MOST_STEPS = 12;
/** A difference moves the pass by this share of the disc's radius. */
const PROBE = 0.25;
const LONGEST_PROBE = 0.25;
const SHORTEST_PROBE = 1e-10;
/** How much farther the unprobed directions are looked at from one step to the next. */
const PROBE_GROWTH = 20;
/** Where nothing is known yet, σ. */
const FIRST_PROBE = 1e-3;
/** Directions in which the pass moves by less than this share of the disc's radius a σ do not steer it. */
const STEERS = 1e-5;
const DAMPING = [1, 0.5, 0.2, 0.05];

/**
 * Finds the impacting clones of one pass, from a clone that passes near.
 *
 * The design-point iteration of structural reliability (Hasofer & Lind 1974; Rackwitz & Fiessler 1978),
 * damped, with the mean of the part of the linearised Gaussian that the disc cuts out in place of its
 * likeliest point. The map is differenced about the present point along its own singular directions.
 *
 * @returns null where no impact is found within 6.8 σ
 */
export async function findRegion(
  carrier: Carrier,
  start: RegionStart,
): Promise<ImpactRegion | null> {
  const d = start.z.length;
  let z = start.z;
  let { tdbSeconds } = start;
  let basis = completed([start.direction], d);
  const first = Math.min(LONGEST_PROBE, Math.max(SHORTEST_PROBE, 1500 / start.slopeKm));
  let probes = new Float64Array(d).fill(first);
  for (let step = 0; step < MOST_STEPS; step++) {
    const map = await linearised(carrier, z, tdbSeconds, basis, probes);
    if (map === null) return null;
    tdbSeconds = map.pass.tdbSeconds;
    const next = conditioned(map, d);
    if (step >= 2 && next.sigmas > GIVE_UP_SIGMAS) return null;
    const chosen = await damped(carrier, map, next.region.mean);
    const isSettled = chosen.damping === 1 && distance2(next.region, z) < 0.1;
    if (step >= 2 && isSettled) {
      if (next.sigmas > FAR_SIGMAS) return null;
      return { tdbSeconds, hits: next.region, probability: next.probability };
    }
    z = chosen.z;
    ({ basis, probes } = nextProbes(map, next, probes, d));
    if (step === MOST_STEPS - 1 && next.sigmas <= FAR_SIGMAS && chosen.missKm < map.pass.radiusKm) {
      const hits = { ...next.region, mean: z };
      return { tdbSeconds, hits, probability: next.probability };
    }
  }
  return null;
}

interface LinearMap {
  z: Float64Array;
  pass: ClonePass;
  /** 2 × d: change of the aim per σ along each coordinate. */
  jacobian: Float64Array;
  /** Largest move of the aim among the probes beyond the first two, km. */
  othersKm: number;
}

/** Central differences about a point along the rows of a basis; one-sided where the pass is lost. */
async function linearised(
  carrier: Carrier,
  z: Float64Array,
  tdbSeconds: number,
  basis: Float64Array,
  probes: Float64Array,
): Promise<LinearMap | null> {
  const d = z.length;
  const starts = [z];
  for (let i = 0; i < d; i++) {
    const row = basis.subarray(i * d, i * d + d);
    starts.push(moved(z, row, probes[i]), moved(z, row, -probes[i]));
  }
  const [centre, ...others] = await carrier.passes(starts);
  const pass = passAt(centre, tdbSeconds);
  if (pass === null) return null;
  const aimOf = (clone: CarriedClone): ClonePass['aim'] | null =>
    passAt(clone, pass.tdbSeconds)?.aim ?? null;
  const jacobian = new Float64Array(2 * d);
  let othersKm = 0;
  for (let i = 0; i < d; i++) {
    const up = aimOf(others[2 * i]);
    const down = aimOf(others[2 * i + 1]);
    const from = down ?? pass.aim;
    const to = up ?? pass.aim;
    const length = probes[i] * ((up === null ? 0 : 1) + (down === null ? 0 : 1));
    if (length === 0) continue;
    const along = [(to[0] - from[0]) / length, (to[1] - from[1]) / length];
    if (i >= 2) othersKm = Math.max(othersKm, Math.hypot(along[0], along[1]) * probes[i]);
    for (let k = 0; k < d; k++) {
      jacobian[k] += along[0] * basis[i * d + k];
      jacobian[d + k] += along[1] * basis[i * d + k];
    }
  }
  return { z, pass, jacobian, othersKm };
}

interface Conditioned {
  region: Gaussian;
  probability: number;
  sigmas: number;
  /** σ of the aim on its principal axes, km, and the unit vectors that move it along them. */
  sigmaKm: [number, number];
  rows: [Float64Array, Float64Array];
}

/** The standard normal distribution given that the linear map lands in the disc. */
function conditioned({ z, pass, jacobian }: LinearMap, d: number): Conditioned {
  const at = [pass.aim[0], pass.aim[1]];
  let [xx, xy, yy] = [0, 0, 0];
  for (let k = 0; k < d; k++) {
    const [x, y] = [jacobian[k], jacobian[d + k]];
    at[0] -= x * z[k];
    at[1] -= y * z[k];
    xx += x * x;
    xy += x * y;
    yy += y * y;
  }
  const { values, vectors } = eigenSymmetric(Float64Array.of(xx, xy, xy, yy), 2);
  const axis = (i: number): { sigma: number; centre: number; row: Float64Array } => {
    const [ex, ey] = [vectors[2 * i], vectors[2 * i + 1]];
    const sigma = Math.max(pass.radiusKm * STEERS, Math.sqrt(Math.max(0, values[i])));
    const row = new Float64Array(d);
    for (let k = 0; k < d; k++) row[k] = (ex * jacobian[k] + ey * jacobian[d + k]) / sigma;
    return { sigma, centre: ex * at[0] + ey * at[1], row };
  };
  const [a, b] = [axis(0), axis(1)];
  const cut = captureMoments([a.centre, b.centre], [a.sigma, b.sigma], pass.radiusKm);
  const mean = new Float64Array(d);
  const covariance = identity(d);
  const [cxx, cxy, cyy] = cut.covariance;
  for (let j = 0; j < d; j++) {
    mean[j] = cut.mean[0] * a.row[j] + cut.mean[1] * b.row[j];
    for (let k = 0; k < d; k++) {
      covariance[j * d + k] +=
        (cxx - 1) * a.row[j] * a.row[k] +
        cxy * (a.row[j] * b.row[k] + b.row[j] * a.row[k]) +
        (cyy - 1) * b.row[j] * b.row[k];
    }
  }
  return {
    region: gaussian(mean, covariance),
    probability: cut.probability,
    sigmas: cut.sigmas,
    sigmaKm: [a.sigma, b.sigma],
    rows: [a.row, b.row],
  };
}

/** The farthest of some shares of the way at which the linear map still holds. */
async function damped(
  carrier: Carrier,
  map: LinearMap,
  goal: Float64Array,
): Promise<{ z: Float64Array; damping: number; missKm: number }> {
  const { z, pass, jacobian } = map;
  const d = z.length;
  const way = goal.map((value, k) => value - z[k]);
  const move = [0, 0];
  for (let k = 0; k < d; k++) {
    move[0] += jacobian[k] * way[k];
    move[1] += jacobian[d + k] * way[k];
  }
  const trials = await carrier.passes(DAMPING.map((share) => moved(z, way, share)));
  let nearest = { z, damping: 0, missKm: Math.hypot(pass.aim[0], pass.aim[1]) };
  for (const [i, trial] of trials.entries()) {
    const aim = passAt(trial, pass.tdbSeconds)?.aim;
    if (aim === undefined) continue;
    const share = DAMPING[i];
    const off = Math.hypot(
      aim[0] - pass.aim[0] - share * move[0],
      aim[1] - pass.aim[1] - share * move[1],
    );
    const found = { z: trial.z, damping: share, missKm: Math.hypot(aim[0], aim[1]) };
    const moveKm = share * Math.hypot(move[0], move[1]);
    if (off <= 0.5 * Math.max(pass.radiusKm, moveKm)) return found;
    if (found.missKm < nearest.missKm) nearest = found;
  }
  return nearest;
}

/** Directions and lengths of the next differences: the aim's own, and the rest ever farther out. */
function nextProbes(
  { pass, othersKm }: LinearMap,
  { sigmaKm, rows }: Conditioned,
  probes: Float64Array,
  d: number,
): { basis: Float64Array; probes: Float64Array<ArrayBuffer> } {
  const wanted = PROBE * pass.radiusKm;
  const clamp = (length: number): number =>
    Math.min(LONGEST_PROBE, Math.max(SHORTEST_PROBE, length));
  const growth = othersKm === 0 ? PROBE_GROWTH : Math.min(PROBE_GROWTH, wanted / othersKm);
  const next = new Float64Array(d).fill(clamp(probes[d - 1] * growth));
  next[0] = clamp(wanted / sigmaKm[0]);
  if (d > 1) next[1] = clamp(Math.min(wanted / sigmaKm[1], PROBE_GROWTH * probes[1]));
  return { basis: completed(rows, d), probes: next };
}

const moved = (z: Float64Array, along: Float64Array, length: number): Float64Array =>
  z.map((value, k) => value + length * along[k]);

/** An orthonormal basis, by rows, that begins with the given vectors as far as they are independent. */
function completed(first: readonly Float64Array[], d: number): Float64Array {
  const basis = new Float64Array(d * d);
  let rows = 0;
  const take = (vector: Float64Array, least: number): void => {
    if (rows === d) return;
    const rest = Float64Array.from(vector);
    // Twice, against rounding.
    for (let pass = 0; pass < 2; pass++) {
      for (let i = 0; i < rows; i++) {
        let along = 0;
        for (let k = 0; k < d; k++) along += rest[k] * basis[i * d + k];
        for (let k = 0; k < d; k++) rest[k] -= along * basis[i * d + k];
      }
    }
    const length = Math.hypot(...rest);
    if (length <= least) return;
    for (let k = 0; k < d; k++) basis[rows * d + k] = rest[k] / length;
    rows += 1;
  };
  for (const vector of first) take(vector, 0.1);
  // Unit vectors, those least covered so far first: one of the d always leaves more than 1/√d.
  while (rows < d) {
    const covered = (k: number): number => {
      let sum = 0;
      for (let i = 0; i < rows; i++) sum += basis[i * d + k] ** 2;
      return sum;
    };
    let best = 0;
    for (let k = 1; k < d; k++) if (covered(k) < covered(best)) best = k;
    take(
      Float64Array.from({ length: d }, (_, k) => (k === best ? 1 : 0)),
      0,
    );
  }
  return basis;
}

/**
 * How a pass moves about a clone, by small differences.
 *
 * @returns the unit vector along which it moves fastest, and how fast, km/σ; null where it is lost
 */
export async function stretchingAt(
  carrier: Carrier,
  z: Float64Array,
  tdbSeconds: number,
): Promise<RegionStart | null> {
  const d = z.length;
  const probes = new Float64Array(d).fill(FIRST_PROBE);
  const map = await linearised(carrier, z, tdbSeconds, identity(d), probes);
  if (map === null) return null;
  const { rows, sigmaKm } = conditioned(map, d);
  const length = Math.hypot(...rows[0]);
  if (length === 0) return null;
  const direction = rows[0].map((value) => value / length);
  return { z, tdbSeconds: map.pass.tdbSeconds, direction, slopeKm: sigmaKm[0] };
}

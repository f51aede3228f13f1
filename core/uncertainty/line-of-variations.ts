import { BODY_RADIUS_KM } from '../constants';
import { type CarriedClone, type Carrier, type ClonePass, passAt } from './clone-passes';
import type { RegionStart } from './impact-region';

/** Clones along a line through the nominal orbit, and the passes that they string together. */

/** A clone of the line: `sigma` times the direction. */
export interface LinePoint {
  sigma: number;
  tdbSeconds: number;
  distanceKm: number;
  /** On the clone's own target plane; NaN where it is bound. */
  bDotTKm: number;
  bDotRKm: number;
}

export interface LineScan {
  direction: Float64Array;
  /** In order of sigma. */
  clones: { sigma: number; clone: CarriedClone }[];
}

const REACH_SIGMAS = 6.5;
/** How far the line is handed out to be drawn, σ. */
const DRAWN_SIGMAS = 5;
const FIRST_POINTS = 201;
/** Intervals halved at a time. */
const ROUND = 96;
/**
 * Where the ends of an interval differ by more than this share of their distance (and 3 radii) it is
 * halved. The first pass fine enough that between two clones few returns to later passes are missed:
 * a return shows only on the clones that come back within the watched distance.
 */
const FIRST_COARSE = 0.01;
const LATER_COARSE = 0.1;
/** A pass that only one end has counts when it is nearer than about half the farthest that are told of. */
const LONE = 1;
/** The same, for clones of which it is said that they part: a quarter. */
const PARTED = 3;
/** Nearer than this two clones are not told apart, σ. */
const FINEST_SIGMA = 1e-8;
const RADIUS_KM = BODY_RADIUS_KM.Earth;

/**
 * Scans a line through the nominal orbit, densely where neighbours differ.
 *
 * @param most      clones to carry at most, above 201
 * Source: Milani, Chesley, Sansaturio, Tommei & Valsecchi (2005), Icarus 173, 362 (line of variations,
 * sampled, its points strung by date).
 */
export async function scanLine(
  carrier: Carrier,
  direction: Float64Array,
  most: number,
  stopped: () => boolean,
): Promise<LineScan> {
  const at = async (sigmas: readonly number[]): Promise<LineScan['clones']> => {
    const clones = await carrier.passes(sigmas.map((s) => direction.map((u) => s * u)));
    return clones.map((clone, i) => ({ sigma: sigmas[i], clone }));
  };
  const step = (2 * REACH_SIGMAS) / (FIRST_POINTS - 1);
  let clones = await at(Array.from({ length: FIRST_POINTS }, (_, i) => i * step - REACH_SIGMAS));
  while (clones.length < most && !stopped()) {
    const scored = intervalsOf(clones)
      .filter((one) => one.score > 1 && one.to - one.from > FINEST_SIGMA)
      .sort((a, b) => b.score - a.score)
      .slice(0, Math.min(ROUND, most - clones.length));
    if (scored.length === 0) break;
    const added = await at(scored.map(({ from, to }) => (from + to) / 2));
    clones = [...clones, ...added].sort((a, b) => a.sigma - b.sigma);
  }
  return { direction, clones };
}

interface Interval {
  from: number;
  to: number;
  /** How much the passes at its ends differ, in units of what is tolerated. */
  score: number;
  /** Earliest pass that one end has and the other has not, where that is not for want of distance; else null. */
  partsAtTdbSeconds: number | null;
}

function intervalsOf(clones: LineScan['clones']): Interval[] {
  let limitKm = 0;
  for (const { clone } of clones) {
    for (const pass of clone.passes) limitKm = Math.max(limitKm, pass.distanceKm);
  }
  return clones.slice(1).map((b, i) => {
    const a = clones[i];
    const interval: Interval = { from: a.sigma, to: b.sigma, score: 0, partsAtTdbSeconds: null };
    compare(a.clone, b.clone, limitKm, interval);
    compare(b.clone, a.clone, limitKm, interval);
    return interval;
  });
}

/** Passes of one clone against another's: their differences go into the interval. */
function compare(one: CarriedClone, other: CarriedClone, limitKm: number, to: Interval): void {
  for (const pass of one.passes) {
    const match = passAt(other, pass.tdbSeconds);
    if (match !== null) {
      const coarse = pass === one.passes[0] ? FIRST_COARSE : LATER_COARSE;
      const apart = Math.hypot(match.aim[0] - pass.aim[0], match.aim[1] - pass.aim[1]);
      const nearest = segmentMinimum(pass.aim, match.aim).distanceKm;
      to.score = Math.max(to.score, apart / (nearest + 3 * RADIUS_KM) / coarse);
      continue;
    }
    // A clone that hit has no later passes.
    if (other.passes.some((its) => its.isImpact && its.tdbSeconds < pass.tdbSeconds)) continue;
    const score = (limitKm - pass.distanceKm) / (pass.distanceKm + 3 * RADIUS_KM);
    to.score = Math.max(to.score, score / LONE);
    if (score > PARTED) {
      to.partsAtTdbSeconds = Math.min(
        to.partsAtTdbSeconds ?? Number.POSITIVE_INFINITY,
        pass.tdbSeconds,
      );
    }
  }
}

/** From when on neighbours of the line, as near as they were carried, part for unrelated passes; null where none do. */
export function partingTime({ clones }: LineScan): number | null {
  let earliest: number | null = null;
  for (const { partsAtTdbSeconds } of intervalsOf(clones)) {
    if (partsAtTdbSeconds === null) continue;
    earliest = Math.min(earliest ?? Number.POSITIVE_INFINITY, partsAtTdbSeconds);
  }
  return earliest;
}

interface Strung {
  sigma: number;
  pass: ClonePass;
}

/** Strings the passes of neighbouring clones together where they are the same pass. */
function strandsOf({ clones }: LineScan): Strung[][] {
  const strands: Strung[][] = [];
  let open: Strung[][] = [];
  for (const { sigma, clone } of clones) {
    const free = new Set(clone.passes);
    const still: Strung[][] = [];
    for (const strand of open) {
      const next = passAt(clone, strand[strand.length - 1].pass.tdbSeconds);
      if (next === null || !free.delete(next)) continue;
      strand.push({ sigma, pass: next });
      still.push(strand);
    }
    for (const pass of free) {
      const strand = [{ sigma, pass }];
      strands.push(strand);
      still.push(strand);
    }
    open = still;
  }
  return strands;
}

/** A place on the line where a pass comes near. */
export interface LineStart extends RegionStart {
  distanceKm: number;
  /** How much of the probability may lie there, to put places in order: density over slope and distance. */
  promise: number;
}

/** Where the passes along the line come nearest, every strand's every minimum, the most promising first. */
export function nearestOnLine(scan: LineScan): LineStart[] {
  const found: LineStart[] = [];
  const add = (sigma: number, tdbSeconds: number, distanceKm: number, slopeKm: number): void => {
    const z = scan.direction.map((u) => u * sigma);
    const steep = Math.max(slopeKm, RADIUS_KM);
    const promise = Math.exp(-0.5 * sigma * sigma) / steep / (1 + (distanceKm / RADIUS_KM) ** 2);
    found.push({ z, tdbSeconds, direction: scan.direction, slopeKm, distanceKm, promise });
  };
  for (const strand of strandsOf(scan)) {
    if (strand.length === 1) {
      const [{ sigma, pass }] = strand;
      add(sigma, pass.tdbSeconds, pass.distanceKm, pass.distanceKm / FINEST_SIGMA);
      continue;
    }
    const segments = strand.slice(1).map((b, i) => ({
      a: strand[i],
      b,
      ...segmentMinimum(strand[i].pass.aim, b.pass.aim),
    }));
    for (const [i, { a, b, distanceKm, share }] of segments.entries()) {
      const before = i === 0 ? Number.POSITIVE_INFINITY : segments[i - 1].distanceKm;
      const after =
        i === segments.length - 1 ? Number.POSITIVE_INFINITY : segments[i + 1].distanceKm;
      if (distanceKm > before || distanceKm >= after) continue;
      const apart = Math.hypot(b.pass.aim[0] - a.pass.aim[0], b.pass.aim[1] - a.pass.aim[1]);
      const sigma = a.sigma + share * (b.sigma - a.sigma);
      const tdbSeconds = a.pass.tdbSeconds + share * (b.pass.tdbSeconds - a.pass.tdbSeconds);
      add(sigma, tdbSeconds, distanceKm, apart / (b.sigma - a.sigma));
    }
  }
  return found.sort((a, b) => b.promise - a.promise);
}

/** The strand of a nominal approach, within 5 σ. */
export function lineThrough(scan: LineScan, tdbSeconds: number): LinePoint[] {
  const strand = strandsOf(scan).find(
    (one) =>
      one[0].sigma <= 0 &&
      one[one.length - 1].sigma >= 0 &&
      passAt({ z: scan.direction, passes: [nearestToZero(one).pass] }, tdbSeconds) !== null,
  );
  return (strand ?? [])
    .filter(({ sigma }) => Math.abs(sigma) <= DRAWN_SIGMAS)
    .map(({ sigma, pass: { tdbSeconds: time, distanceKm, bDotTKm, bDotRKm } }) => ({
      sigma,
      tdbSeconds: time,
      distanceKm,
      bDotTKm,
      bDotRKm,
    }));
}

const nearestToZero = (strand: readonly Strung[]): Strung =>
  strand.reduce((best, one) => (Math.abs(one.sigma) < Math.abs(best.sigma) ? one : best));

/** Where the straight way between two aims comes nearest to the origin: how near, and at what share of it. */
function segmentMinimum(
  a: ClonePass['aim'],
  b: ClonePass['aim'],
): { distanceKm: number; share: number } {
  const way = [b[0] - a[0], b[1] - a[1]];
  const length2 = way[0] * way[0] + way[1] * way[1];
  const free = length2 === 0 ? 0 : -(a[0] * way[0] + a[1] * way[1]) / length2;
  const share = Math.max(0, Math.min(1, free));
  return { distanceKm: Math.hypot(a[0] + share * way[0], a[1] + share * way[1]), share };
}

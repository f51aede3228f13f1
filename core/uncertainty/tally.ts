import { BODY_INDEX, SECONDS_PER_DAY } from '../constants';
import { CLONE_OUTCOME, CLONE_ROW } from './clones';

/** Impacts of clones, gathered by body and date. */

export interface ImpactGroup {
  /** Index of the body, as BODY_INDEX. */
  body: number;
  /** Impacts in it: their number, first, mean and last time. */
  count: number;
  firstTdbSeconds: number;
  meanTdbSeconds: number;
  lastTdbSeconds: number;
  /** Sum of the impacts' weights, and of their squares. */
  weight: number;
  weight2: number;
  /** Weighted means, km/s; NaN where no impact has one. */
  speedKmS: number;
  excessSpeedKmS: number;
  /** The impacts themselves: CLONE_ROW.size numbers each, and their weights. */
  rows: Float64Array;
  weights: Float64Array;
}

/** Impacts farther apart than this are of different dates. */
const GAP_S = 30 * SECONDS_PER_DAY;

const SIZE = CLONE_ROW.size;

/** Time of a row's impact: entry, or the surface. */
export const impactTime = (rows: Float64Array, at: number): number => {
  const entry = rows[at + CLONE_ROW.entryTdbSeconds];
  return Number.isNaN(entry) ? rows[at + CLONE_ROW.groundTdbSeconds] : entry;
};

/** The rows of a batch that are impacts. */
export function impactsOf(rows: Float64Array): Float64Array {
  const kept: number[] = [];
  for (let at = 0; at < rows.length; at += SIZE) {
    if (rows[at + CLONE_ROW.outcome] !== CLONE_OUTCOME.impact) continue;
    for (let k = 0; k < SIZE; k++) kept.push(rows[at + k]);
  }
  return Float64Array.from(kept);
}

/**
 * Groups impacts by body and date, in order of time.
 *
 * @param rows    impacts, CLONE_ROW.size numbers each
 * @param weights of each; null for one each
 */
export function groupImpacts(rows: Float64Array, weights: Float64Array | null): ImpactGroup[] {
  const order = Array.from({ length: rows.length / SIZE }, (_, i) => i).sort(
    (a, b) =>
      rows[a * SIZE + CLONE_ROW.body] - rows[b * SIZE + CLONE_ROW.body] ||
      impactTime(rows, a * SIZE) - impactTime(rows, b * SIZE) ||
      a - b,
  );
  const groups: number[][] = [];
  let last: { body: number; time: number } | null = null;
  for (const i of order) {
    const body = rows[i * SIZE + CLONE_ROW.body];
    const time = impactTime(rows, i * SIZE);
    if (last === null || last.body !== body || time - last.time > GAP_S) groups.push([]);
    groups[groups.length - 1].push(i);
    last = { body, time };
  }
  return groups
    .map((members) => groupOf(rows, weights, members))
    .sort((a, b) => a.firstTdbSeconds - b.firstTdbSeconds);
}

function groupOf(rows: Float64Array, weights: Float64Array | null, members: number[]): ImpactGroup {
  const own = new Float64Array(members.length * SIZE);
  const ownWeights = new Float64Array(members.length);
  let weight = 0;
  let weight2 = 0;
  let later = 0;
  const first = impactTime(rows, members[0] * SIZE);
  const speed = { sum: 0, weight: 0 };
  const excess = { sum: 0, weight: 0 };
  const add = (mean: { sum: number; weight: number }, value: number, w: number): void => {
    if (Number.isNaN(value)) return;
    mean.sum += w * value;
    mean.weight += w;
  };
  for (const [n, i] of members.entries()) {
    const at = i * SIZE;
    own.set(rows.subarray(at, at + SIZE), n * SIZE);
    const w = weights === null ? 1 : weights[i];
    ownWeights[n] = w;
    weight += w;
    weight2 += w * w;
    later += w * (impactTime(rows, at) - first);
    add(speed, rows[at + CLONE_ROW.entrySpeedKmS], w);
    add(excess, rows[at + CLONE_ROW.excessSpeedKmS], w);
  }
  return {
    body: rows[members[0] * SIZE + CLONE_ROW.body],
    count: members.length,
    firstTdbSeconds: first,
    meanTdbSeconds: first + later / weight,
    lastTdbSeconds: impactTime(rows, members[members.length - 1] * SIZE),
    weight,
    weight2,
    speedKmS: speed.sum / speed.weight,
    excessSpeedKmS: excess.sum / excess.weight,
    rows: own,
    weights: ownWeights,
  };
}

/** Whether a row is of an impact of the Earth. */
export const hitsEarth = (rows: Float64Array, at: number): boolean =>
  rows[at + CLONE_ROW.body] === BODY_INDEX.Earth &&
  rows[at + CLONE_ROW.outcome] === CLONE_OUTCOME.impact;

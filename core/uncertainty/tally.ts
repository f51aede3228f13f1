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

/** Impacts whose rows are kept: enough for any map of them, and little memory. */
const MOST_ROWS = 50_000;

/** Impacts of plain clones, batch after batch: all are counted, the first are kept. */
export class ImpactTally {
  private readonly kept: Float64Array[] = [];
  private keptRows = 0;
  /** Impacts by body and whole day since J2000. */
  private readonly days = new Map<number, number>();
  /** Of the Earth. */
  earth = 0;

  /** Takes the rows of a batch that are impacts. */
  add(rows: Float64Array): void {
    for (let at = 0; at < rows.length; at += SIZE) {
      if (rows[at + CLONE_ROW.outcome] !== CLONE_OUTCOME.impact) continue;
      const body = rows[at + CLONE_ROW.body];
      if (body === BODY_INDEX.Earth) this.earth += 1;
      const day = dayKey(body, impactTime(rows, at));
      this.days.set(day, (this.days.get(day) ?? 0) + 1);
      if (this.keptRows < MOST_ROWS) {
        this.kept.push(rows.slice(at, at + SIZE));
        this.keptRows += 1;
      }
    }
  }

  /** Groups of the kept rows, each with the number of all impacts on its days. */
  groups(): ImpactGroup[] {
    const rows = new Float64Array(this.keptRows * SIZE);
    for (const [i, row] of this.kept.entries()) rows.set(row, i * SIZE);
    return groupImpacts(rows, null).map((group) => {
      let count = 0;
      const from = dayKey(group.body, group.firstTdbSeconds - GAP_S);
      const to = dayKey(group.body, group.lastTdbSeconds + GAP_S);
      for (const [day, impacts] of this.days) if (day >= from && day <= to) count += impacts;
      return { ...group, count };
    });
  }
}

const DAYS = 1e6;
const dayKey = (body: number, tdbSeconds: number): number =>
  body * DAYS + DAYS / 2 + Math.floor(tdbSeconds / SECONDS_PER_DAY);

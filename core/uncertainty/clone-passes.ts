import { BODY_INDEX, BODY_RADIUS_KM, SECONDS_PER_DAY } from '../constants';
import { type CarryClones, CLONE_OUTCOME, CLONE_ROW } from './clones';

/** Passes of the Earth by clones that were carried where one wants them. */

export interface ClonePass {
  tdbSeconds: number;
  distanceKm: number;
  /** On the clone's own target plane, km; NaN where it is bound. */
  bDotTKm: number;
  bDotRKm: number;
  /** The same, or the distance and 0 where there is no target plane: what is solved for. */
  aim: readonly [number, number];
  /** Of the capture disc, km; of the Earth where there is no target plane. */
  radiusKm: number;
  isImpact: boolean;
  /** CLONE_ROW.size numbers. */
  row: Float64Array;
}

/** A clone's passes of the Earth in order of time, and where it started. */
export interface CarriedClone {
  z: Float64Array;
  passes: ClonePass[];
}

/** Passes farther apart than this are not the same one, s. */
export const SAME_PASS_S = 30 * SECONDS_PER_DAY;

/** Clones in a batch: a fixed number, so that the outcome depends on no machine. */
const BATCH = 128;
const SIZE = CLONE_ROW.size;

/** Carries clones in batches, several in flight, and counts them. */
export class Carrier {
  /** Clones carried so far. */
  count = 0;

  constructor(
    private readonly carry: CarryClones,
    private readonly parallel: number,
  ) {}

  /**
   * Carries clones and reads their passes of the Earth.
   *
   * @param starts standard normal coordinates, one array a clone
   * @returns      the clones in the order of their starts
   */
  async passes(starts: readonly Float64Array[]): Promise<CarriedClone[]> {
    const clones = starts.map((z): CarriedClone => ({ z, passes: [] }));
    const batches: CarriedClone[][] = [];
    for (let at = 0; at < clones.length; at += BATCH) batches.push(clones.slice(at, at + BATCH));
    let next = 0;
    const lane = async (): Promise<void> => {
      while (next < batches.length) await this.carryBatch(batches[next++]);
    };
    const lanes = Math.max(1, Math.min(this.parallel, batches.length));
    await Promise.all(Array.from({ length: lanes }, lane));
    this.count += clones.length;
    return clones;
  }

  private async carryBatch(clones: readonly CarriedClone[]): Promise<void> {
    const dimension = clones[0].z.length;
    const z = new Float64Array(clones.length * dimension);
    for (const [i, clone] of clones.entries()) z.set(clone.z, i * dimension);
    const { rows } = await this.carry(z);
    for (let at = 0; at < rows.length; at += SIZE) {
      if (rows[at + CLONE_ROW.body] !== BODY_INDEX.Earth) continue;
      clones[rows[at + CLONE_ROW.clone]].passes.push(passOf(rows.slice(at, at + SIZE)));
    }
  }
}

function passOf(row: Float64Array): ClonePass {
  const bDotTKm = row[CLONE_ROW.bDotTKm];
  const bDotRKm = row[CLONE_ROW.bDotRKm];
  const distanceKm = row[CLONE_ROW.distanceKm];
  const radius = row[CLONE_ROW.impactRadiusKm];
  const isBound = Number.isNaN(bDotTKm) || Number.isNaN(bDotRKm) || Number.isNaN(radius);
  return {
    tdbSeconds: row[CLONE_ROW.tdbSeconds],
    distanceKm,
    bDotTKm,
    bDotRKm,
    aim: isBound ? [distanceKm, 0] : [bDotTKm, bDotRKm],
    radiusKm: isBound ? BODY_RADIUS_KM.Earth : radius,
    isImpact: row[CLONE_ROW.outcome] === CLONE_OUTCOME.impact,
    row,
  };
}

/** The pass nearest to a time; null where none is within a month of it. */
export function passAt(clone: CarriedClone, tdbSeconds: number): ClonePass | null {
  let best: ClonePass | null = null;
  let least = SAME_PASS_S;
  for (const pass of clone.passes) {
    const away = Math.abs(pass.tdbSeconds - tdbSeconds);
    if (away <= least) {
      least = away;
      best = pass;
    }
  }
  return best;
}

/** The pass at which a clone hits the Earth, if it does. */
export const impactOf = (clone: CarriedClone): ClonePass | null =>
  clone.passes.find((pass) => pass.isImpact) ?? null;

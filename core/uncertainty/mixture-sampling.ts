import { normalsOf } from '../math/random';
import { type CarriedClone, type Carrier, impactOf } from './clone-passes';
import { type Gaussian, type Mixture, mixtureWeight, pointOf } from './gaussian-mixture';

/** Clones drawn from a mixture, carried, and what their hits say of the probability. */

export interface WeightedHit {
  clone: CarriedClone;
  /** Standard normal density over the mixture's. */
  weight: number;
}

/** Clones drawn at a time; part of what the result depends on. */
const BATCH = 400;
/** Clones of a batch that each part gets at least. */
const LEAST = 4;
const Z95 = 1.96;

/** Draws clones from a mixture, the same number from each part in every batch, and keeps the sums. */
export class MixtureSampling {
  readonly hits: WeightedHit[] = [];
  private readonly counts: number[];
  private readonly mixture: Mixture;
  private readonly sums: { hits: number; hits2: number }[];
  private batches = 0;

  /**
   * @param parts  the Gaussians
   * @param shares wanted of each, any scale
   * @param stream of the random numbers: one of its own for each mixture
   */
  constructor(
    private readonly carrier: Carrier,
    parts: readonly Gaussian[],
    shares: readonly number[],
    private readonly seed: number,
    private readonly stream: number,
  ) {
    const total = shares.reduce((sum, share) => sum + share, 0);
    this.counts = shares.map((share) => Math.max(LEAST, Math.round((BATCH * share) / total)));
    const size = this.counts.reduce((sum, count) => sum + count, 0);
    this.mixture = { parts, shares: this.counts.map((count) => count / size) };
    this.sums = parts.map(() => ({ hits: 0, hits2: 0 }));
  }

  /** Clones drawn so far. */
  get samples(): number {
    return this.batches * this.counts.reduce((sum, count) => sum + count, 0);
  }

  /** @returns the clones drawn */
  async draw(batches: number): Promise<CarriedClone[]> {
    const { parts } = this.mixture;
    const d = parts[0].mean.length;
    const normals = new Float64Array(d);
    const points: Float64Array[] = [];
    const from: number[] = [];
    let item = this.samples;
    for (let batch = 0; batch < batches; batch++) {
      for (const [k, count] of this.counts.entries()) {
        for (let i = 0; i < count; i++) {
          normalsOf(this.seed, this.stream, item, 1, d, normals);
          item += 1;
          points.push(pointOf(parts[k], normals));
          from.push(k);
        }
      }
    }
    const clones = await this.carrier.passes(points);
    for (const [i, clone] of clones.entries()) {
      if (impactOf(clone) === null) continue;
      const weight = mixtureWeight(this.mixture, clone.z);
      this.hits.push({ clone, weight });
      this.sums[from[i]].hits += weight;
      this.sums[from[i]].hits2 += weight * weight;
    }
    this.batches += batches;
    return clones;
  }

  get value(): number {
    return this.hits.reduce((sum, hit) => sum + hit.weight, 0) / this.samples;
  }

  /**
   * Standard error over the value, each part a stratum; null without hits.
   *
   * Source: Owen & Zhou (2000), JASA 95, 135, section 4 (deterministic mixture).
   */
  get relativeError(): number | null {
    if (this.hits.length === 0) return null;
    let variance = 0;
    for (const [k, { hits, hits2 }] of this.sums.entries()) {
      const count = this.counts[k] * this.batches;
      const spread = Math.max(0, hits2 / count - (hits / count) ** 2) * (count / (count - 1));
      variance += this.mixture.shares[k] ** 2 * (spread / count);
    }
    return Math.sqrt(variance) / this.value;
  }
}

/** Standard error of a plain count over its value; with the count itself kept off 0 and 1 (Agresti & Coull 1998). */
export function plainRelativeError(hits: number, count: number): number {
  const n = count + Z95 * Z95;
  const p = (hits + (Z95 * Z95) / 2) / n;
  return Math.sqrt((p * (1 - p)) / n) / (hits / count);
}

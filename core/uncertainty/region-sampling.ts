import type { Carrier } from './clone-passes';
import { distance2, type Gaussian, movedTowards } from './gaussian-mixture';
import type { ImpactRegion } from './impact-region';
import { cover, isOf } from './impact-search';
import { MixtureSampling, type WeightedHit } from './mixture-sampling';
import type { RareEventOptions } from './rare-event';

/** Weighted sampling about the impacting regions, which move to their hits on the way. */

/** Streams of the random numbers of its rounds, one after another. */
const FIRST_STREAM = 0x7261_0001;
const ROUNDS = 4;
/** Share of the value that one hit may have before it counts as a region of its own. */
const HEAVY = 0.1;
const LEAST_HITS = 60;
const MOST_SAMPLES = 7200;

/** Samples about the regions; the first rounds only to place the Gaussians, the last for the value. */
export async function sampleRegions(
  carrier: Carrier,
  origin: Gaussian,
  regions: ImpactRegion[],
  { seed, relativeError, progress, stopped }: RareEventOptions,
): Promise<MixtureSampling> {
  let stream = FIRST_STREAM;
  const begin = (): MixtureSampling => {
    const { parts, shares } = mixtureOf(origin, regions);
    return new MixtureSampling(carrier, parts, shares, seed, stream++);
  };
  for (let round = 0; round < ROUNDS && !stopped(); round++) {
    progress('placing the sample', 0.3 + 0.1 * round);
    const trial = begin();
    await trial.draw(2);
    const added = await learn(carrier, regions, trial);
    if (round > 0 && !added && (trial.relativeError ?? 1) < 0.15) break;
  }
  const final = begin();
  do {
    await final.draw(2);
    const error = final.relativeError ?? 1;
    progress('sampling the impacts', Math.min(1, (relativeError / Math.max(error, 1e-9)) ** 2));
  } while (
    !stopped() &&
    final.samples < MOST_SAMPLES &&
    ((final.relativeError ?? 1) > relativeError || final.hits.length < LEAST_HITS)
  );
  return final;
}

/** Moves the regions to their hits and adds those that heavy hits ask for; true where any was added. */
async function learn(
  carrier: Carrier,
  regions: ImpactRegion[],
  trial: MixtureSampling,
): Promise<boolean> {
  const total = trial.hits.reduce((sum, { weight }) => sum + weight, 0);
  const known = regions.length;
  const stray: WeightedHit[] = [];
  const mine: WeightedHit[][] = regions.map(() => []);
  for (const hit of trial.hits) {
    const away = regions.map((region) => distance2(region.hits, hit.clone.z));
    const nearest = away.indexOf(Math.min(...away));
    if (isOf(regions[nearest], hit.clone.z)) mine[nearest].push(hit);
    else if (hit.weight > HEAVY * total) stray.push(hit);
    else mine[nearest].push(hit);
  }
  for (const [i, region] of regions.entries()) {
    const points = mine[i].map(({ clone }) => clone.z);
    const weights = mine[i].map(({ weight }) => weight);
    if (weights.length === 0) continue;
    region.hits = movedTowards(region.hits, points, weights, 2 * points[0].length);
    region.probability = weights.reduce((sum, w) => sum + w, 0) / trial.samples;
  }
  for (const { clone } of stray) await cover(carrier, regions, clone);
  return regions.length > known;
}

/** How much wider than the hits the Gaussians are drawn, and the share of the wider and of the plain one. */
const CORE_INFLATION = 1.2;
const WIDE_INFLATION = 2.2;
const WIDE_SHARE = 0.2;
const PLAIN_SHARE = 0.05;
/** A region's least share, of an even one. */
const LEAST_SHARE = 0.2;

function mixtureOf(
  origin: Gaussian,
  regions: readonly ImpactRegion[],
): { parts: Gaussian[]; shares: number[] } {
  const total = regions.reduce((sum, { probability }) => sum + probability, 0);
  const parts = [origin];
  const shares = [PLAIN_SHARE];
  for (const { hits, probability } of regions) {
    const own =
      LEAST_SHARE / regions.length + (total === 0 ? 0 : ((1 - LEAST_SHARE) * probability) / total);
    parts.push(widened(hits, CORE_INFLATION), widened(hits, WIDE_INFLATION));
    shares.push((1 - PLAIN_SHARE) * own * (1 - WIDE_SHARE), (1 - PLAIN_SHARE) * own * WIDE_SHARE);
  }
  return { parts, shares };
}

/** Wider along the axes that the impact narrows; the others are the standard normal's, which needs little. */
function widened(hits: Gaussian, factor: number): Gaussian {
  const little = 1 + (factor - 1) / 8;
  const sigmas = hits.sigmas.map((sigma) =>
    sigma > 0.8 ? Math.max(sigma, Math.min(1, sigma * factor)) * little : sigma * factor,
  );
  return { ...hits, sigmas };
}

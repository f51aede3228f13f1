import { formatIso } from '../time/format';
import { type CarriedClone, Carrier, impactOf, SAME_PASS_S } from './clone-passes';
import { type CarryClones, CLONE_ROW } from './clones';
import { distance2, type Gaussian, gaussian, identity, movedTowards } from './gaussian-mixture';
import { findRegion, type ImpactRegion, type RegionStart, stretchingAt } from './impact-region';
import {
  type LinePoint,
  type LineScan,
  type LineStart,
  lineThrough,
  nearestOnLine,
  partingTime,
  scanLine,
} from './line-of-variations';
import {
  boundWithoutHits,
  MixtureSampling,
  plainRelativeError,
  type WeightedHit,
} from './mixture-sampling';

export interface RareEventOptions {
  /** Standard normal numbers to a clone. */
  dimension: number;
  seed: number;
  /** Batches in flight; the result does not depend on it. */
  parallel: number;
  carry: CarryClones;
  /** The nominal orbit's approaches of the Earth. */
  nominal: readonly {
    tdbSeconds: number;
    /** Unit vector of greatest stretching there, from the first order; null where it is not known. */
    direction: Float64Array | null;
  }[];
  /** Wanted, 1 σ. */
  relativeError: number;
  progress(note: string, fraction: number): void;
  stopped(): boolean;
}

export interface RareEvent {
  method: string;
  /** Probability that the Earth is hit in the span. */
  value: number;
  /** 1 σ, of the sampling; null where no impact was found. */
  relativeError: number | null;
  /** What plain clones alone leave open where no impact was found, 95 %; null otherwise. */
  upperBound: number | null;
  /** Clones carried in all. */
  samples: number;
  /** Separate impacting regions that were sampled. */
  regions: number;
  impacts: {
    /** The impact of every clone that hit, CLONE_ROW.size numbers each. */
    rows: Float64Array;
    /** Their shares of the value. */
    weights: Float64Array;
  };
  /** By nominal approach: its line of variations. */
  lines: { nominal: number; points: LinePoint[] }[];
  /** Where the estimate stops being reliable, in words; null where nothing speaks against it. */
  reliability: string | null;
}

const PLAIN = 'plain sampling';
const METHOD =
  'importance sampling about the impacting regions found along the line of variations (Milani et al. 2005; design points after Hasofer & Lind 1974; mixture with the balance heuristic, Owen & Zhou 2000; cross-entropy, Rubinstein 1999)';

const PILOT_STREAM = 0x7261_0000;
const FIRST_STREAM = PILOT_STREAM + 1;
/** From this share of hits on, plain clones do. */
const OFTEN = 0.05;
const MOST_PLAIN = 8192;
/** Lines of this cosine are one line. */
const SAME_DIRECTION = 0.99;
const MOST_LINES = 3;
const LINE_CLONES = [2000, 600, 600];
/** Places followed in any case, and at most. */
const SOME_STARTS = 24;
const MOST_STARTS = 120;
/** Places that promise together less than this share of all may be left out. */
const LEFT_OUT = 0.05;
/** Dates at which plain clones are followed where the lines led to no impact, and clones of each. */
const MOST_DATES = 8;
const CLONES_OF_DATE = 6;
/** The regions' linear maps give the sampled value within this factor unless they are strongly curved. */
const CURVED = 3;
/** Starts looked at together: a fixed number, so that the result depends on no machine. */
const TOGETHER = 4;
/** Regions of one date whose centres lie this near are one, in squared Mahalanobis distance. */
const SAME_REGION = 2;
const ROUNDS = 4;
/** Share of the value that one hit may have before it counts as a region of its own. */
const HEAVY = 0.1;
const LEAST_HITS = 60;
const MOST_SAMPLES = 7200;

/**
 * Probability that the Earth is hit, down to 1e-8, from few clones.
 *
 * The line of variations is scanned for passes that come near; from each the impacting region is
 * sought; clones are drawn about the regions and weighted back to the standard normal distribution.
 * Each clone counts for its first impact, so that regions and dates are never counted twice.
 *
 * @throws what `carry` throws
 * Accuracy: as `relativeError` states, of the sampling; a region that neither the line nor the plain
 * clones lead to is missed.
 */
export async function estimateRareEvent(options: RareEventOptions): Promise<RareEvent> {
  const carrier = new Carrier(options.carry, options.parallel);
  const origin = gaussian(new Float64Array(options.dimension), identity(options.dimension));
  options.progress('looking where clones pass', 0);
  const pilot = new MixtureSampling(carrier, [origin], [1], options.seed, PILOT_STREAM);
  const plain = await pilot.draw(1);
  const scans = await scanLines(carrier, options);
  const lines = linesThrough(scans.of, options.nominal);
  const parting = partingOf(scans.all);
  if (pilot.hits.length > OFTEN * pilot.samples) {
    while (
      plainRelativeError(pilot.hits.length, pilot.samples) > options.relativeError &&
      pilot.samples < MOST_PLAIN &&
      !options.stopped()
    ) {
      await pilot.draw(1);
    }
    const relativeError = plainRelativeError(pilot.hits.length, pilot.samples);
    return { ...sampled(PLAIN, pilot, relativeError, 1, carrier), lines, reliability: null };
  }
  options.progress('looking for impacting regions', 0.2);
  const { regions, isComplete } = await findRegions(carrier, scans.all, plain, options.stopped);
  for (const { clone } of pilot.hits) await cover(carrier, regions, clone);
  if (regions.length === 0) {
    return {
      ...sampled(METHOD, pilot, null, 0, carrier),
      lines,
      reliability: wordsOf(parting, isComplete, false),
      upperBound: boundWithoutHits(pilot.samples),
    };
  }
  const linear = regions.reduce((sum, { probability }) => sum + probability, 0);
  const sampling = await sampleRegions(carrier, origin, regions, options);
  return {
    ...sampled(METHOD, sampling, sampling.relativeError, regions.length, carrier),
    lines,
    reliability: wordsOf(parting, isComplete, sampling.value * CURVED < linear),
    upperBound: sampling.hits.length === 0 ? boundWithoutHits(pilot.samples) : null,
  };
}

/** The lines of variations of the nominal approaches alone. */
export async function linesOfVariations(
  options: Pick<RareEventOptions, 'dimension' | 'parallel' | 'carry' | 'nominal' | 'stopped'>,
): Promise<RareEvent['lines']> {
  const carrier = new Carrier(options.carry, options.parallel);
  return linesThrough((await scanLines(carrier, options)).of, options.nominal);
}

function linesThrough(
  scans: readonly (LineScan | null)[],
  nominal: RareEventOptions['nominal'],
): RareEvent['lines'] {
  return nominal.map(({ tdbSeconds }, i) => ({
    nominal: i,
    points: lineThrough(scans[i] ?? NO_SCAN, tdbSeconds),
  }));
}

const NO_SCAN: LineScan = { direction: new Float64Array(0), clones: [] };

/** Scans the lines of the nominal approaches, those of one direction once. */
async function scanLines(
  carrier: Carrier,
  { nominal, dimension, stopped }: Pick<RareEventOptions, 'nominal' | 'dimension' | 'stopped'>,
): Promise<{ all: LineScan[]; of: (LineScan | null)[] }> {
  const all: LineScan[] = [];
  const of: (LineScan | null)[] = [];
  for (const { tdbSeconds, direction } of nominal) {
    const own =
      direction ??
      (await stretchingAt(carrier, new Float64Array(dimension), tdbSeconds))?.direction ??
      null;
    if (own === null) {
      of.push(null);
      continue;
    }
    const cosine = (scan: LineScan): number =>
      Math.abs(scan.direction.reduce((sum, u, k) => sum + u * own[k], 0));
    let scan = all.find((one) => cosine(one) > SAME_DIRECTION) ?? null;
    if (scan === null && all.length < MOST_LINES) {
      scan = await scanLine(carrier, own, LINE_CLONES[all.length], stopped);
      all.push(scan);
    }
    of.push(scan);
  }
  return { all, of };
}

/** From when on neighbours on the lines part; null where they never do. */
function partingOf(scans: readonly LineScan[]): number | null {
  const times = scans.flatMap((scan) => partingTime(scan) ?? []);
  return times.length === 0 ? null : Math.min(...times);
}

function wordsOf(parting: number | null, isComplete: boolean, isCurved: boolean): string | null {
  const words: string[] = [];
  if (parting !== null) {
    const date = formatIso(parting, 'TDB', 0).slice(0, 10);
    words.push(
      `From ${date} on, neighbours on the line of variations part for unrelated passes, however near they are: impacts after that date may be missed, and the estimate is a lower bound for them.`,
    );
  }
  if (!isComplete) {
    words.push(
      'More places of the line of variations come near the Earth than could be followed: the estimate is a lower bound.',
    );
  }
  if (isCurved) {
    words.push(
      'The impacting regions are so thin and curved that the sample may not cover them: the estimate may be too low, and its stated error too small.',
    );
  }
  return words.length === 0 ? null : words.join(' ');
}

/** Impacting regions, from the nearest passes along the lines; each once. */
async function findRegions(
  carrier: Carrier,
  scans: readonly LineScan[],
  plain: readonly CarriedClone[],
  stopped: () => boolean,
): Promise<{ regions: ImpactRegion[]; isComplete: boolean }> {
  const regions: ImpactRegion[] = [];
  const follow = async (starts: readonly RegionStart[]): Promise<void> => {
    const found = await Promise.all(starts.map((start) => findRegion(carrier, start)));
    for (const region of found) if (region !== null) addRegion(regions, region);
  };
  const starts = scans.flatMap(nearestOnLine).sort((a, b) => b.promise - a.promise);
  const all = promised(starts);
  let at = 0;
  const isLeft = (): boolean => promised(starts.slice(at)) > LEFT_OUT * all;
  while (at < starts.length && (at < SOME_STARTS || (at < MOST_STARTS && isLeft())) && !stopped()) {
    await follow(starts.slice(at, at + TOGETHER));
    at += TOGETHER;
  }
  const led = [...regions];
  for (const { z, tdbSeconds } of nearestOfDates(plain)) {
    if (stopped()) break;
    if (led.some((region) => isSameDate(region.tdbSeconds, tdbSeconds))) continue;
    const start = await stretchingAt(carrier, z, tdbSeconds);
    if (start !== null) await follow([start]);
  }
  return { regions, isComplete: !isLeft() };
}

const promised = (starts: readonly LineStart[]): number =>
  starts.reduce((sum, { promise }) => sum + promise, 0);

/** The clones that pass nearest, some of each date, nearest dates first. */
function nearestOfDates(
  clones: readonly CarriedClone[],
): { z: Float64Array; tdbSeconds: number }[] {
  const passes = clones
    .flatMap(({ z, passes: own }) =>
      own.map(({ tdbSeconds, distanceKm }) => ({ z, tdbSeconds, distanceKm })),
    )
    .sort((a, b) => a.distanceKm - b.distanceKm);
  const dates: { tdbSeconds: number; clones: { z: Float64Array; tdbSeconds: number }[] }[] = [];
  for (const pass of passes) {
    const date = dates.find(({ tdbSeconds }) => isSameDate(tdbSeconds, pass.tdbSeconds));
    if (date === undefined) dates.push({ tdbSeconds: pass.tdbSeconds, clones: [pass] });
    else if (date.clones.length < CLONES_OF_DATE) date.clones.push(pass);
  }
  return dates.slice(0, MOST_DATES).flatMap((date) => date.clones);
}

function addRegion(regions: ImpactRegion[], region: ImpactRegion): void {
  const isKnown = regions.some(
    (known) =>
      isSameDate(known.tdbSeconds, region.tdbSeconds) &&
      Math.min(distance2(known.hits, region.hits.mean), distance2(region.hits, known.hits.mean)) <
        SAME_REGION,
  );
  if (!isKnown) regions.push(region);
}

const isSameDate = (a: number, b: number): boolean => Math.abs(a - b) < SAME_PASS_S;

/** Whether a hit lies where a region expects its own: within about 5 σ of the squared distance. */
const isOf = ({ hits }: ImpactRegion, z: Float64Array): boolean =>
  distance2(hits, z) < z.length + 5 * Math.sqrt(2 * z.length);

/** Sees to it that a clone that hit lies in a region. */
async function cover(
  carrier: Carrier,
  regions: ImpactRegion[],
  clone: CarriedClone,
): Promise<void> {
  const { z } = clone;
  const tdbSeconds = impactOf(clone)?.tdbSeconds ?? 0;
  if (regions.some((region) => isOf(region, z))) return;
  const start: RegionStart | null = await stretchingAt(carrier, z, tdbSeconds);
  const found = start === null ? null : await findRegion(carrier, start);
  if (found !== null) addRegion(regions, found);
  if (found !== null && isOf(found, z)) return;
  // Curved: the map about the region's middle does not reach here.
  const d = z.length;
  const near = regions.reduce<ImpactRegion | null>(
    (best, one) => (best === null || distance2(one.hits, z) < distance2(best.hits, z) ? one : best),
    null,
  );
  const covariance = near?.hits.covariance ?? identity(d).map((value) => value * 0.25);
  const probability = near === null ? 0 : near.probability / 4;
  regions.push({ tdbSeconds, hits: gaussian(z, covariance), probability });
}

/** Samples about the regions; the first rounds only to place the Gaussians, the last for the value. */
async function sampleRegions(
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

function sampled(
  method: string,
  sampling: MixtureSampling,
  relativeError: number | null,
  regions: number,
  carrier: Carrier,
): Omit<RareEvent, 'lines' | 'reliability'> {
  const { hits, samples } = sampling;
  const rows = new Float64Array(hits.length * CLONE_ROW.size);
  const weights = new Float64Array(hits.length);
  for (const [i, { clone, weight }] of hits.entries()) {
    const impact = impactOf(clone);
    if (impact !== null) rows.set(impact.row, i * CLONE_ROW.size);
    weights[i] = weight / samples;
  }
  return {
    method,
    value: samples === 0 ? 0 : sampling.value,
    relativeError,
    upperBound: null,
    samples: carrier.count,
    regions,
    impacts: { rows, weights },
  };
}

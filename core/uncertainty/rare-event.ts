import { formatIso } from '../time/format';
import { Carrier, impactOf } from './clone-passes';
import { type CarryClones, CLONE_ROW } from './clones';
import { gaussian, identity } from './gaussian-mixture';
import { stretchingAt } from './impact-region';
import { cover, findRegions } from './impact-search';
import {
  type LinePoint,
  type LineScan,
  lineThrough,
  partingTime,
  scanLine,
} from './line-of-variations';
import { MixtureSampling, plainRelativeError } from './mixture-sampling';
import { sampleRegions } from './region-sampling';

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
  /** Hits were so frequent that plain clones were counted, and nothing else done. */
  isPlain: boolean;
  /** Probability that the Earth is hit in the span. */
  value: number;
  /** 1 σ, of the sampling; null where no impact was found. */
  relativeError: number | null;
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
/** From this share of hits on, plain clones do. */
const OFTEN = 0.05;
const MOST_PLAIN = 8192;
/** Lines of this cosine are one line. */
const SAME_DIRECTION = 0.99;
const MOST_LINES = 3;
const LINE_CLONES = [2000, 600, 600];
/** The regions' linear maps give the sampled value within this factor unless they are strongly curved. */
const CURVED = 3;

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
    };
  }
  const linear = regions.reduce((sum, { probability }) => sum + probability, 0);
  const sampling = await sampleRegions(carrier, origin, regions, options);
  return {
    ...sampled(METHOD, sampling, sampling.relativeError, regions.length, carrier),
    lines,
    reliability: wordsOf(parting, isComplete, sampling.value * CURVED < linear),
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
    isPlain: method === PLAIN,
    value: samples === 0 ? 0 : sampling.value,
    relativeError,
    samples: carrier.count,
    regions,
    impacts: { rows, weights },
  };
}

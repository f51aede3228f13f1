import { uniformsOf } from '../math/random';
import { type Breakup, type BreakupModel, CUSTOMARY_BREAKUP, EntrySimulator } from './breakup';
import { KILOTON_MJ } from './constants';
import type { EarthFixedState } from './earth-fixed';
import { DEFAULT_FLIGHT, type FlightSettings } from './flight';
import { luminousEfficiency, peakIntensityWSr } from './light';
import type { Material, Span } from './materials';
import { TABLED_AIR } from './tabled-air';

/** Many entries, where size, stuff or way are not known: percentiles instead of single numbers. */

/** How the size is known: by brightness, or by a range of diameters. */
export type EnsembleSize =
  | { readonly absoluteMagnitude: number; readonly albedo: Span | null }
  | { readonly diameterM: Span };

/** A class of bodies and its share of the ensemble. */
export interface WeightedMaterial {
  readonly material: Material;
  readonly weight: number;
}

export interface EnsembleInput {
  /** Entries to choose from, each as likely: one, or those of clones; ITRF axes. */
  readonly entries: readonly EarthFixedState[];
  readonly size: EnsembleSize;
  /** One or more; weights need not sum to one. */
  readonly materials: readonly WeightedMaterial[];
  readonly model: Exclude<BreakupModel, 'none'>;
  readonly seed: number;
  readonly settings: FlightSettings;
}

/** One number of the outcome by its percentiles; null where no member of the ensemble has it. */
export interface Percentiles {
  readonly p5: number;
  readonly p25: number;
  readonly p50: number;
  readonly p75: number;
  readonly p95: number;
}

/** Columns of the rows, each an ensemble member's number; NaN where it has none. */
export const ENSEMBLE_COLUMNS = [
  'diameterM',
  'massKg',
  'densityKgM3',
  'strengthPa',
  'entryEnergyKt',
  'breakAltitudeKm',
  'burstAltitudeKm',
  'burstEnergyKt',
  'peakDepositionKtPerKm',
  'peakDynamicPressurePa',
  'peakIntensityWSr',
  'groundEnergyShare',
  /** Of what arrives faster than 1 km/s: slower pieces are not followed in an ensemble. */
  'fastGroundMassKg',
] as const;
export type EnsembleColumn = (typeof ENSEMBLE_COLUMNS)[number];
export const ENSEMBLE_WIDTH = ENSEMBLE_COLUMNS.length;

export interface EnsembleSummary {
  readonly members: number;
  readonly percentiles: Readonly<Record<EnsembleColumn, Percentiles | null>>;
  /** Members with at least half of their energy at the ground, with a burst, and leaving again. */
  readonly impacts: number;
  readonly bursts: number;
  readonly skips: number;
}

/**
 * For many flights. Measured against tolerance 1e-9 on 300 mixed members each of four ensembles, median
 * and 95th percentile of the miss: burst altitude 0.03 % and 0.4 %, energy 0.004 % and 0.04 %, peak
 * deposition 0.4 % and 1.3 %, peak dynamic pressure 0.5 % and 6 % (it is read at the steps).
 */
const ENSEMBLE_TOLERANCE = 1e-4;
const ENSEMBLE_SLAB_KM = 0.5;
/** Random numbers of a member. */
const DIMENSION = 8;
const STREAM = 0x656e7472;
/** D = 1329 km 10^(−H/5) / √p. Fowler & Chillemi (1992); Pravec & Harris (2007). */
const DIAMETER_ZERO_M = 1_329_000;

/** For an ensemble: the flight's settings at a tolerance that is fast enough for many. */
export const ENSEMBLE_FLIGHT: FlightSettings = {
  ...DEFAULT_FLIGHT,
  air: TABLED_AIR,
  tolerance: ENSEMBLE_TOLERANCE,
};

/** An ensemble that has nothing to draw from. */
export class EnsembleError extends Error {
  readonly code = 'ENTRY_ENSEMBLE';
}

/**
 * Flies members of an ensemble. A member is the same whoever flies it, in whatever order.
 *
 * Within a material's range each quantity is spread as a triangle about its customary value: albedo,
 * strength and ablation in the logarithm, density and Weibull exponent evenly.
 *
 * @param input what is known
 * @param first, count members to fly
 * @param rows  receives `ENSEMBLE_WIDTH` numbers for each, in the order of `ENSEMBLE_COLUMNS`
 * @returns     how many leave the air again
 * @throws      EnsembleError for no entry, no material, or weights that are not positive
 * Accuracy: of the models; of the integration, see `ENSEMBLE_TOLERANCE`.
 */
export function flyEnsemble(
  input: EnsembleInput,
  first: number,
  count: number,
  rows: Float64Array,
): number {
  if (input.entries.length === 0) throw new EnsembleError('ensemble with no entry state; give one');
  const total = input.materials.reduce((sum, item) => sum + item.weight, 0);
  if (!(total > 0) || input.materials.some((item) => item.weight < 0)) {
    throw new EnsembleError(
      `ensemble with materials of total weight ${total}; give one material with a weight above 0`,
    );
  }
  const simulator = new EntrySimulator(input.settings, {
    slabKm: ENSEMBLE_SLAB_KM,
    toGround: false,
  });
  const draws = new Float64Array(DIMENSION);
  let skips = 0;
  for (let i = 0; i < count; i++) {
    uniformsOf(input.seed, STREAM, first + i, 1, DIMENSION, draws);
    const entry = input.entries[Math.floor(draws[0] * input.entries.length)];
    const material = pick(input.materials, draws[1] * total);
    const densityKgM3 = triangular(material.densityKgM3, draws[2]);
    const diameterM = diameterOf(input.size, material, draws[3]);
    const massKg = (Math.PI / 6) * densityKgM3 * diameterM ** 3;
    const breakup: Breakup = {
      ...CUSTOMARY_BREAKUP,
      model: input.model,
      strengthPa: logTriangular(material.strengthPa, draws[4]),
      strengthMassKg: null,
      weibullExponent: triangular(material.weibullExponent, draws[6]),
    };
    const outcome = simulator.run(
      entry,
      {
        massKg,
        densityKgM3,
        ablationS2Km2: logTriangular(material.ablationS2Km2, draws[5]),
        dragCoefficient: 1,
        liftCoefficient: 0,
      },
      breakup,
      null,
    );
    if (outcome.skip !== null) skips++;
    const at = i * ENSEMBLE_WIDTH;
    rows[at] = diameterM;
    rows[at + 1] = massKg;
    rows[at + 2] = densityKgM3;
    rows[at + 3] = breakup.strengthPa;
    rows[at + 4] = outcome.entryEnergyKt;
    rows[at + 5] = outcome.breakAltitudeKm ?? Number.NaN;
    rows[at + 6] = outcome.burstAltitudeKm ?? Number.NaN;
    rows[at + 7] = outcome.burstAltitudeKm === null ? Number.NaN : outcome.depositedKt;
    rows[at + 8] = outcome.peakDepositionKtPerKm;
    rows[at + 9] = outcome.peakDynamicPressurePa;
    rows[at + 10] = peakIntensityWSr(
      simulator.deposition,
      luminousEfficiency(simulator.deposition.totalMJ() / KILOTON_MJ),
    );
    rows[at + 11] = outcome.groundKt / outcome.entryEnergyKt;
    rows[at + 12] = outcome.arrivals.reduce((sum, item) => sum + item.count * item.massKg, 0);
  }
  return skips;
}

/**
 * Percentiles of each column over all members.
 *
 * @param rows    of `flyEnsemble`, members × `ENSEMBLE_WIDTH`
 * @param members how many rows count
 * @param skips   how many of them left the air again
 * @returns       percentiles by linear interpolation between order statistics (type 7 of Hyndman & Fan
 *                1996), over the members that have the number
 */
export function summariseEnsemble(
  rows: Float64Array,
  members: number,
  skips: number,
): EnsembleSummary {
  const column = (index: number): Float64Array => {
    const values = new Float64Array(members);
    let kept = 0;
    for (let i = 0; i < members; i++) {
      const value = rows[i * ENSEMBLE_WIDTH + index];
      if (!Number.isNaN(value)) values[kept++] = value;
    }
    return values.subarray(0, kept).sort();
  };
  const sorted = ENSEMBLE_COLUMNS.map((_, index) => column(index));
  const percentiles = Object.fromEntries(
    ENSEMBLE_COLUMNS.map((name, index) => [name, percentilesOf(sorted[index])]),
  ) as Record<EnsembleColumn, Percentiles | null>;
  const ground = sorted[ENSEMBLE_COLUMNS.indexOf('groundEnergyShare')];
  return {
    members,
    percentiles,
    impacts: ground.filter((share) => share >= 0.5).length,
    bursts: sorted[ENSEMBLE_COLUMNS.indexOf('burstAltitudeKm')].length,
    skips,
  };
}

function percentilesOf(sorted: Float64Array): Percentiles | null {
  if (sorted.length === 0) return null;
  const at = (p: number): number => {
    const place = (p / 100) * (sorted.length - 1);
    const low = Math.floor(place);
    const high = Math.min(low + 1, sorted.length - 1);
    return sorted[low] + (place - low) * (sorted[high] - sorted[low]);
  };
  return { p5: at(5), p25: at(25), p50: at(50), p75: at(75), p95: at(95) };
}

function pick(materials: readonly WeightedMaterial[], place: number): Material {
  let passed = 0;
  for (const { material, weight } of materials) {
    passed += weight;
    if (place < passed) return material;
  }
  return materials[materials.length - 1].material;
}

function diameterOf(size: EnsembleSize, material: Material, u: number): number {
  if ('diameterM' in size) return logTriangular(size.diameterM, u);
  const albedo = logTriangular(size.albedo ?? material.albedo, u);
  return (DIAMETER_ZERO_M * 10 ** (-size.absoluteMagnitude / 5)) / Math.sqrt(albedo);
}

/** Quantile of the triangular distribution. */
function triangular([low, middle, high]: Span, u: number): number {
  const width = high - low;
  if (!(width > 0)) return middle;
  const turn = (middle - low) / width;
  return u < turn
    ? low + Math.sqrt(u * width * (middle - low))
    : high - Math.sqrt((1 - u) * width * (high - middle));
}

function logTriangular([low, middle, high]: Span, u: number): number {
  return Math.exp(triangular([Math.log(low), Math.log(middle), Math.log(high)], u));
}

import { SECONDS_PER_DAY } from '../constants';
import { CLONE_ROW } from './clones';
import { axisOf, type Entries } from './corridor-axis';
import { stripsOf } from './corridor-pieces';
import { densityOf, type Places } from './sphere-cells';
import { effectiveSize, quantilesOf, spreadOf } from './weighted';

/** The strip of ground that impacting clones would meet: plain data, angles in radians. */

/** Least, middle and largest: 5, 50 and 95 % of the probability. */
export type Spread = readonly [number, number, number];

/** A piece of the ground between two parallels and two meridians; none lies across ±180°. */
export interface CorridorCell {
  southRad: number;
  northRad: number;
  westRad: number;
  eastRad: number;
  /** That it strikes here: its share of the probability of impact. */
  probability: number;
  areaKm2: number;
  /** Share of the whole probability in the cells that are at least as dense, (0, 1]. */
  within: number;
}

/** A place on the ridge of the corridor, with what the clones about it have in common. */
export interface AxisPoint {
  latitudeRad: number;
  longitudeRad: number;
  /** Mean time at the entry interface, TDB seconds past J2000. */
  entryTdbSeconds: number;
  /** Across the axis, 1 σ; zero from a single clone. */
  halfWidthKm: number;
  entryAirSpeedKmS: Spread;
  /** Against the air; negative below the horizontal. */
  entryAngleRad: Spread;
}

/** One connected strip, its axis in the order of entry time from one end to the other. */
export interface CorridorPiece {
  probability: number;
  /** Along the axis. */
  lengthKm: number;
  axis: AxisPoint[];
}

export interface Corridor {
  /** That it enters the air here: the sum of the weights. */
  probability: number;
  /** Part of it that grazes the air and does not reach the ground in flight without air. */
  grazingProbability: number;
  rows: number;
  /** Kish's effective sample size. */
  effectiveRows: number;
  /** Height of the cells, and standard deviation of the kernel that spreads the clones over them. */
  cellKm: number;
  kernelKm: number;
  /** Densest first. */
  cells: CorridorCell[];
  /** Likeliest first. */
  pieces: CorridorPiece[];
  firstEntryTdbSeconds: number;
  medianEntryTdbSeconds: number;
  lastEntryTdbSeconds: number;
  entryAirSpeedKmS: Spread;
  entryAngleRad: Spread;
}

/** Entries farther apart in time are strips of their own: another approach, or another day's side. */
const SAME_DAY_S = SECONDS_PER_DAY / 2;
/** Strips with less than this share of the probability of their day have no axis; cells they have. */
const LEAST_SHARE = 0.005;
/** Standard deviation of the kernel for one row; for more, over the root of their effective number. */
const LONE_KERNEL_KM = 50;
const LEAST_CELL_KM = 1;

/**
 * Where the impacting clones come down: density on the ground, and the axes of its strips.
 *
 * Each row counts where its flight without air would meet the ground; one that only grazes the air
 * counts where it enters it. The density is that of the rows spread by a round Gaussian kernel whose
 * width is stated: what is usual for a scatter as wide as the strip (Scott 1992: σ n^(−1/6), n the
 * effective rows on a stretch as long as the strip is wide), or the spacing of the rows along the
 * strip where that is more, or 50 km over √n where both are less.
 * Strips are parted where the rows leave a gap in time (half a day) or on the ground (1 500 km and
 * 20 usual distances); for their axes see `axisOf`. Stray strips with less than 0.5 % have no axis.
 *
 * @param rows    CLONE_ROW.size numbers each, of the Earth, outcome atmosphere or impact
 * @param weights probabilities of the rows, summing to the probability of impact; null for equal ones
 *                that sum to 1. Rows whose weight is not above zero are left out
 * @returns       null when no row has a place and an entry
 * Source: effective sample size after Kish (1965); lengths on a sphere of the mean radius, 0.3 %.
 */
export function corridorOf(rows: Float64Array, weights: Float64Array | null): Corridor | null {
  const found = read(rows, weights);
  const { places, entries } = found;
  const all = Int32Array.from(places.weights, (_, i) => i);
  if (all.length === 0) return null;
  const probability = places.weights.reduce((sum, weight) => sum + weight, 0);
  const effectiveRows = effectiveSize(places.weights);
  const pieces = daysOf(entries.tdbSeconds).flatMap((day) => piecesOf(places, entries, day));
  pieces.sort((a, b) => b.probability - a.probability);
  const widthKm = usualHalfWidth(pieces);
  const lengthKm = pieces.reduce((sum, piece) => sum + piece.lengthKm, 0);
  // Rows on a stretch of the strip as long as it is wide.
  const nearby = Math.max(1, effectiveRows * Math.min(1, (2 * widthKm) / Math.max(lengthKm, 1e-9)));
  const kernelKm = Math.max(
    widthKm * nearby ** (-1 / 6),
    lengthKm / effectiveRows,
    LONE_KERNEL_KM / Math.sqrt(effectiveRows),
  );
  const density = densityOf(places, kernelKm, Math.max(kernelKm, widthKm / 2, LEAST_CELL_KM));
  const [median] = quantilesOf(entries.tdbSeconds, places.weights, [0.5]);
  return {
    probability,
    grazingProbability: found.grazing,
    rows: all.length,
    effectiveRows,
    kernelKm,
    ...density,
    pieces,
    firstEntryTdbSeconds: entries.tdbSeconds.reduce((a, b) => Math.min(a, b)),
    medianEntryTdbSeconds: median,
    lastEntryTdbSeconds: entries.tdbSeconds.reduce((a, b) => Math.max(a, b)),
    entryAirSpeedKmS: spreadOf(entries.airSpeedKmS, places.weights),
    entryAngleRad: spreadOf(entries.angleRad, places.weights),
  };
}

/** Rows that have a weight, a place and an entry, column by column. */
function read(
  rows: Float64Array,
  given: Float64Array | null,
): { places: Places; entries: Entries; grazing: number } {
  const count = rows.length / CLONE_ROW.size;
  const used: { at: number; weight: number }[] = [];
  for (let i = 0; i < count; i++) {
    const at = i * CLONE_ROW.size;
    const weight = given === null ? 1 / count : given[i];
    if (weight > 0 && isWhole(rows, at)) used.push({ at, weight });
  }
  const column = (key: number): Float64Array => Float64Array.from(used, ({ at }) => rows[at + key]);
  const units = new Float64Array(3 * used.length);
  let grazing = 0;
  for (const [k, { at, weight }] of used.entries()) {
    const meetsGround = hasGround(rows, at);
    if (!meetsGround) grazing += weight;
    const latitude =
      rows[at + (meetsGround ? CLONE_ROW.groundLatitudeRad : CLONE_ROW.entryLatitudeRad)];
    const longitude =
      rows[at + (meetsGround ? CLONE_ROW.groundLongitudeRad : CLONE_ROW.entryLongitudeRad)];
    units[3 * k] = Math.cos(latitude) * Math.cos(longitude);
    units[3 * k + 1] = Math.cos(latitude) * Math.sin(longitude);
    units[3 * k + 2] = Math.sin(latitude);
  }
  return {
    places: { units, weights: Float64Array.from(used, ({ weight }) => weight) },
    entries: {
      tdbSeconds: column(CLONE_ROW.entryTdbSeconds),
      airSpeedKmS: column(CLONE_ROW.entryAirSpeedKmS),
      angleRad: column(CLONE_ROW.entryAirFlightPathAngleRad),
    },
    grazing,
  };
}

const hasGround = (rows: Float64Array, at: number): boolean =>
  Number.isFinite(rows[at + CLONE_ROW.groundLatitudeRad]) &&
  Number.isFinite(rows[at + CLONE_ROW.groundLongitudeRad]);

const isWhole = (rows: Float64Array, at: number): boolean =>
  [
    CLONE_ROW.entryTdbSeconds,
    CLONE_ROW.entryLatitudeRad,
    CLONE_ROW.entryLongitudeRad,
    CLONE_ROW.entryAirSpeedKmS,
    CLONE_ROW.entryAirFlightPathAngleRad,
  ].every((key) => Number.isFinite(rows[at + key]));

/** Indices in the order of time, parted where there is a gap. */
function daysOf(tdbSeconds: Float64Array): Int32Array[] {
  const order = Int32Array.from(tdbSeconds, (_, i) => i).sort(
    (a, b) => tdbSeconds[a] - tdbSeconds[b],
  );
  const days: Int32Array[] = [];
  let from = 0;
  for (let k = 1; k <= order.length; k++) {
    const isEnd =
      k === order.length || tdbSeconds[order[k]] - tdbSeconds[order[k - 1]] > SAME_DAY_S;
    if (!isEnd) continue;
    days.push(order.slice(from, k));
    from = k;
  }
  return days;
}

function piecesOf(places: Places, entries: Entries, day: Int32Array): CorridorPiece[] {
  const weightOf = (rows: Int32Array): number =>
    rows.reduce((sum, row) => sum + places.weights[row], 0);
  const whole = weightOf(day);
  return stripsOf(places, day)
    .map((strip) => ({ strip, probability: weightOf(strip.rows) }))
    .filter(({ probability }) => probability >= LEAST_SHARE * whole)
    .map(({ strip, probability }) => ({ probability, ...axisOf(places, entries, strip) }));
}

/** Of the axes, the middle half-width. */
function usualHalfWidth(pieces: readonly CorridorPiece[]): number {
  const widths = pieces
    .flatMap(({ axis }) => axis.map(({ halfWidthKm }) => halfWidthKm))
    .sort((a, b) => a - b);
  return widths.length === 0 ? 0 : widths[widths.length >> 1];
}

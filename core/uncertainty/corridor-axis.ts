import { eigenSymmetric } from '../math/symmetric';
import { cross, dot, norm, scale, subtract, unit, type Vec3 } from '../math/vector';
import type { AxisPoint } from './corridor';
import { placeOf, type Strip } from './corridor-pieces';
import { acrossOf, angleFromChord, MEAN_RADIUS_KM, meanUnit, type Places } from './sphere-cells';
import { effectiveSize, quantilesOf, spreadOf } from './weighted';

/** The ridge of one strip of the corridor. */

/** What each row brings besides its place. */
export interface Entries {
  tdbSeconds: Float64Array;
  airSpeedKmS: Float64Array;
  angleRad: Float64Array;
}

/** Shorter strips are nearly flat: the way along them is their first principal direction. */
const FLAT_RAD = 3000 / MEAN_RADIUS_KM;
/** Shares of the probability between which the axis runs: a stray row does not make it longer. */
const ENDS = [0.005, 0.995];
const MOST_POINTS = 25;
/** A strip shorter than this is a spot. */
const SPOT_RAD = 1 / MEAN_RADIUS_KM;
/** Sections are at least as long as so many grains of the measure along a long strip. */
const GRAINS = 3;

/**
 * Axis of one strip, in the order of entry time.
 *
 * The strip is cut into sections of equal length across the way along it (the first principal
 * direction below 3 000 km, the distance through neighbours above), as many as the square root of
 * the effective sample size, at most 25, none shorter than the strip is wide (2 σ). The mean place
 * of each, weighted, is a point of the axis; the half-width is the deviation across the great circle
 * through its neighbours, pooled over three sections. A strip no longer than wide is one point.
 *
 * Source: the mean of points along a curve as its ridge is Hastie & Stuetzle (1989), one step.
 */
export function axisOf(
  places: Places,
  entries: Entries,
  strip: Strip,
): { axis: AxisPoint[]; lengthKm: number } {
  const { rows } = strip;
  const weights = Float64Array.from(rows, (row) => places.weights[row]);
  const flat = flatShape(places, rows, weights);
  const isFlat = flat !== null && strip.lengthRad < FLAT_RAD;
  const along = isFlat ? flat.along : strip.along;
  const [from, to] = quantilesOf(along, weights, ENDS);
  const size = effectiveSize(weights);
  const least = isFlat ? 0 : GRAINS * strip.grainRad;
  let many = Math.min(MOST_POINTS, Math.max(2, Math.round(Math.sqrt(size))));
  if (least > 0) many = Math.min(many, Math.floor((to - from) / least) + 1);
  let sections = sectionsOf(places, { rows, along, from, to, many });
  // Once more with sections no shorter than the strip is wide.
  const usual = isFlat ? flat.acrossRad : usualWidth(places, sections);
  const most = Math.floor((to - from) / Math.max(2 * usual, SPOT_RAD)) + 1;
  if (most < sections.length) sections = sectionsOf(places, { rows, along, from, to, many: most });
  if (sections.length < 2 || to - from < SPOT_RAD) {
    const mean = meanUnit(places, rows) ?? placeOf(places, rows[0]);
    const halfWidthRad = flat === null ? 0 : flat.acrossRad;
    return { axis: [pointOf(places, entries, { rows, mean }, halfWidthRad)], lengthKm: 0 };
  }
  const widths = widthsOf(places, sections);
  const axis = sections.map((section, i) => pointOf(places, entries, section, widths[i]));
  const lengthKm =
    MEAN_RADIUS_KM *
    sections
      .slice(1)
      .reduce(
        (sum, { mean }, i) => sum + angleFromChord(norm(subtract(mean, sections[i].mean))),
        0,
      );
  if (axis[0].entryTdbSeconds > axis[axis.length - 1].entryTdbSeconds) axis.reverse();
  return { axis, lengthKm };
}

/** Shape of the rows on the plane that touches the sphere at their mean (azimuthal equidistant). */
function flatShape(
  places: Places,
  rows: Int32Array,
  weights: Float64Array,
): { along: Float64Array; acrossRad: number } | null {
  const middle = meanUnit(places, rows);
  if (middle === null) return null;
  const [east, north] = acrossOf(middle);
  const x = new Float64Array(rows.length);
  const y = new Float64Array(rows.length);
  const moments = new Float64Array(5);
  let total = 0;
  for (let k = 0; k < rows.length; k++) {
    const place = placeOf(places, rows[k]);
    const sine = Math.hypot(dot(place, east), dot(place, north));
    const stretch = sine === 0 ? 1 : Math.atan2(sine, dot(place, middle)) / sine;
    x[k] = stretch * dot(place, east);
    y[k] = stretch * dot(place, north);
    total += weights[k];
    moments[0] += weights[k] * x[k];
    moments[1] += weights[k] * y[k];
    moments[2] += weights[k] * x[k] * x[k];
    moments[3] += weights[k] * x[k] * y[k];
    moments[4] += weights[k] * y[k] * y[k];
  }
  const [mx, my, xx, xy, yy] = moments.map((sum) => sum / total);
  const { values, vectors } = eigenSymmetric(
    Float64Array.of(xx - mx * mx, xy - mx * my, xy - mx * my, yy - my * my),
    2,
  );
  return {
    along: x.map((value, k) => value * vectors[0] + y[k] * vectors[1]),
    acrossRad: Math.sqrt(Math.max(0, values[1]) * unbiased(effectiveSize(weights))),
  };
}

/** What makes a variance about the mean of a sample that of what it was drawn from. */
const unbiased = (size: number): number => (size > 1.5 ? size / (size - 1) : 0);

interface Section {
  rows: Int32Array;
  mean: Vec3;
}

/** Sections about evenly spaced places along; the two at the ends are half as long. */
function sectionsOf(
  places: Places,
  strip: {
    rows: Int32Array;
    along: Float64Array;
    from: number;
    to: number;
    many: number;
  },
): Section[] {
  const { rows, along, from, to, many } = strip;
  if (many < 2) return [];
  const step = (to - from) / (many - 1);
  const into: number[][] = Array.from({ length: many }, () => []);
  for (let k = 0; k < rows.length; k++) {
    if (along[k] < from || along[k] > to) continue;
    into[Math.min(many - 1, Math.round(step === 0 ? 0 : (along[k] - from) / step))].push(rows[k]);
  }
  return into.flatMap((list) => {
    const mine = Int32Array.from(list);
    const mean = mine.length === 0 ? null : meanUnit(places, mine);
    return mean === null ? [] : [{ rows: mine, mean }];
  });
}

/** Deviation across the axis at each section, radians. */
function widthsOf(places: Places, sections: readonly Section[]): number[] {
  const sums = sections.map(({ rows, mean }, i) => {
    const before = sections[Math.max(0, i - 1)].mean;
    const after = sections[Math.min(sections.length - 1, i + 1)].mean;
    const normal = cross(before, after);
    const length = norm(normal);
    const pole = length > 1e-12 ? scale(normal, 1 / length) : acrossOf(mean)[0];
    const weights = Float64Array.from(rows, (row) => places.weights[row]);
    let squares = 0;
    let total = 0;
    for (let k = 0; k < rows.length; k++) {
      squares += weights[k] * dot(subtract(placeOf(places, rows[k]), mean), pole) ** 2;
      total += weights[k];
    }
    // One of the rows, as it were, was used up by the mean.
    return [squares, total * Math.max(0, 1 - 1 / effectiveSize(weights))];
  });
  return sums.map((_, i) => {
    const near = sums.slice(Math.max(0, i - 1), i + 2);
    const free = near.reduce((sum, [, part]) => sum + part, 0);
    const squares = near.reduce((sum, [part]) => sum + part, 0);
    return free > 0 ? Math.sqrt(squares / free) : 0;
  });
}

function usualWidth(places: Places, sections: readonly Section[]): number {
  const widths = widthsOf(places, sections).sort((a, b) => a - b);
  return widths.length === 0 ? 0 : widths[widths.length >> 1];
}

function pointOf(
  places: Places,
  entries: Entries,
  { rows, mean }: Section,
  halfWidthRad: number,
): AxisPoint {
  const weights = Float64Array.from(rows, (row) => places.weights[row]);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const origin = entries.tdbSeconds[rows[0]];
  const later = rows.reduce(
    (sum, row, k) => sum + weights[k] * (entries.tdbSeconds[row] - origin),
    0,
  );
  const [x, y, z] = unit(mean);
  return {
    latitudeRad: Math.atan2(z, Math.hypot(x, y)),
    longitudeRad: Math.atan2(y, x),
    entryTdbSeconds: origin + later / total,
    halfWidthKm: halfWidthRad * MEAN_RADIUS_KM,
    entryAirSpeedKmS: spreadOf(
      Float64Array.from(rows, (row) => entries.airSpeedKmS[row]),
      weights,
    ),
    entryAngleRad: spreadOf(
      Float64Array.from(rows, (row) => entries.angleRad[row]),
      weights,
    ),
  };
}

import type { Report } from '../../core/report/report';
import type { RibbonTime } from '../store/store';
import { SAMPLE } from '../worker/core-values';
import type { Spread } from '../worker/spread';
import type { Trajectory } from '../worker/trajectory';
import { type Anchor, anchorOf } from './anchor';
import { bandAlong } from './band';
import { type CurveKind, distanceCurve, distanceIn } from './curve';
import { type DistanceScale, ribbonDistanceScale } from './distance-scale';
import { decadeTicks, namedTicks, spreadLabels } from './distance-ticks';
import { eventsOf, type RibbonEvent } from './events';
import { type Box, type Mark, type PlacedFlag, placeFlags } from './place-flags';
import { linearTimeScale, stretchedTimeScale, type TimeScale } from './time-scale';
import { type TimeTick, timeTicks } from './time-ticks';

/** Everything a ribbon draws, in pixels: the same for the page's SVG and the plate's canvas. */
export interface RibbonGeometry {
  plot: Box;
  time: TimeScale;
  distance: DistanceScale;
  anchor: Anchor;
  /** Pairs of x and y, px. */
  curves: Record<CurveKind, Float64Array>;
  /** Where the object's curve may run, cut to the plot; null without a covariance. */
  band: RibbonBand | null;
  /** In order of time; words or a date that would touch their neighbours are null. */
  timeTicks: { x: number; words: string | null; date: string | null }[];
  /** Lines at named distances, with the height of their words. */
  named: { y: number; textY: number; words: string }[];
  /** Powers of ten, the same way. */
  decades: { y: number; textY: number; words: string }[];
  flags: PlacedFlag[];
}

export interface RibbonBand {
  /** Pairs of x and y, px: the lower edge of the distance and the upper. */
  low: Float64Array;
  high: Float64Array;
  words: string;
}

/** Sizes of a ribbon's sheet, px. */
interface RibbonSheet {
  widthPx: number;
  heightPx: number;
  /** Margins that hold the axes' words. */
  leftPx: number;
  rightPx: number;
  topPx: number;
  bottomPx: number;
  /** Height of a line of small text. */
  rowPx: number;
  measure(text: string): number;
}

const SLOTS = 300;
/** A band nowhere wider than this is hidden by its curve, px. */
const LEAST_BAND_PX = 2.5;

/** Least room for a time tick, in rows of text. */
const TICK_ROWS = 4.2;

/**
 * @param report the report of this trajectory; null while it is still being computed
 * @param spread of this report; null without a covariance
 * @returns      null while there is no trajectory
 */
export function ribbonGeometry(
  report: Report | null,
  trajectory: Trajectory,
  spread: Spread | null,
  kind: RibbonTime,
  sheet: RibbonSheet,
): RibbonGeometry | null {
  const anchor = anchorOf(report, trajectory);
  if (anchor === null || trajectory.count < 2) return null;
  const { fromTdbSeconds, toTdbSeconds } = trajectory;
  const time =
    kind === 'stretched'
      ? stretchedTimeScale(fromTdbSeconds, toTdbSeconds, anchor)
      : linearTimeScale(fromTdbSeconds, toTdbSeconds);
  const raw = {
    object: distanceCurve(trajectory, 'object', time, SLOTS),
    unperturbed: distanceCurve(trajectory, 'unperturbed', time, SLOTS),
    moon: distanceCurve(trajectory, 'moon', time, SLOTS),
  };
  const distance = ribbonDistanceScale(Math.max(largestOf(raw.object), largestOf(raw.unperturbed)));
  const plot = {
    x0: sheet.leftPx,
    x1: sheet.widthPx - sheet.rightPx,
    y0: sheet.topPx,
    y1: sheet.heightPx - sheet.bottomPx,
  };
  const xAt = (tdbSeconds: number): number =>
    plot.x0 + time.unitAt(tdbSeconds) * (plot.x1 - plot.x0);
  const yAt = (km: number): number => plot.y1 - distance.unitAt(km) * (plot.y1 - plot.y0);
  const toPixels = (points: Float64Array): Float64Array =>
    points.map((value, i) => (i % 2 === 0 ? xAt(value) : Math.min(yAt(value), plot.y1)));
  const curves = {
    object: toPixels(raw.object),
    unperturbed: toPixels(raw.unperturbed),
    moon: toPixels(raw.moon),
  };
  const range = spread === null ? null : bandAlong(raw.object, spread, trajectory);
  const cut = (points: Float64Array): Float64Array =>
    toPixels(points).map((value, i) => (i % 2 === 0 ? value : Math.max(value, plot.y0)));
  const band = range === null ? null : wordedBand(cut(range.low), cut(range.high));
  const scratch = new Float64Array(SAMPLE.stride);
  const marks = inOrderOfImportance(report === null ? [] : eventsOf(report)).map(
    (event): Mark => ({
      event,
      x: xAt(event.tdbSeconds),
      y: yAt(trajectory.at(event.tdbSeconds, scratch) ? distanceIn(scratch, 'object') : 0),
    }),
  );
  return {
    plot,
    time,
    distance,
    anchor,
    curves,
    band,
    timeTicks: datedTicks(time, anchor, kind, plot, xAt, sheet),
    named: spreadTicks(namedTicks(distance), yAt, plot, sheet.rowPx),
    decades: spreadTicks(decadeTicks(distance), yAt, plot, sheet.rowPx),
    flags: placeFlags(marks, {
      bounds: plot,
      curves: [curves.object, curves.unperturbed, curves.moon],
      rowPx: sheet.rowPx,
      markPx: sheet.rowPx * 0.5,
      measure: sheet.measure,
    }),
  };
}

function wordedBand(low: Float64Array, high: Float64Array): RibbonBand {
  let widest = 0;
  for (let i = 1; i < low.length; i += 2) widest = Math.max(widest, low[i] - high[i]);
  const words = widest < LEAST_BAND_PX ? '3 σ band, thinner than the line' : '3 σ band';
  return { low, high, words };
}

/** The band as a closed line: along its lower edge and back along the upper. */
export function bandOutline({ low, high }: RibbonBand): Float64Array {
  const count = high.length / 2;
  const outline = new Float64Array(4 * count);
  outline.set(low);
  for (let i = 0; i < count; i++) {
    outline[2 * (count + i)] = high[2 * (count - 1 - i)];
    outline[2 * (count + i) + 1] = high[2 * (count - 1 - i) + 1];
  }
  return outline;
}

function largestOf(points: Float64Array): number {
  let largest = 0;
  for (let i = 1; i < points.length; i += 2) largest = Math.max(largest, points[i]);
  return largest;
}

function inOrderOfImportance(events: readonly RibbonEvent[]): RibbonEvent[] {
  const rank = (event: RibbonEvent): number => {
    if (event.kind !== 'crossing') return event.isPrincipal ? 0 : event.body === 'Earth' ? 2 : 3;
    return 1;
  };
  // Outer crossings first: they have the room that inner ones must do without.
  return [...events].sort(
    (a, b) =>
      rank(a) - rank(b) ||
      (a.kind === 'crossing' ? b.distanceKm - a.distanceKm : a.distanceKm - b.distanceKm),
  );
}

function spreadTicks(
  ticks: readonly { km: number; words: string }[],
  yAt: (km: number) => number,
  plot: Box,
  rowPx: number,
): RibbonGeometry['named'] {
  const upwards = [...ticks].reverse();
  const places = upwards.map(({ km }) => yAt(km));
  const spread = spreadLabels(places, rowPx * 0.92, plot.y0, plot.y1);
  return upwards.map(({ words }, i) => ({ y: places[i], textY: spread[i], words }));
}

function datedTicks(
  time: TimeScale,
  anchor: Anchor,
  kind: RibbonTime,
  plot: Box,
  xAt: (tdbSeconds: number) => number,
  sheet: RibbonSheet,
): RibbonGeometry['timeTicks'] {
  const zero = anchor.centreTdbSeconds;
  const leastGap = (TICK_ROWS * sheet.rowPx) / (plot.x1 - plot.x0);
  const ticks = timeTicks(time, zero, kind === 'stretched', leastGap);
  // The zero's own first, then outwards.
  const outwards = [...ticks].sort(
    (a, b) => Math.abs(a.tdbSeconds - zero) - Math.abs(b.tdbSeconds - zero),
  );
  const fitting = (textOf: (tick: TimeTick) => string): Set<TimeTick> => {
    const taken: [number, number][] = [];
    const fit = outwards.filter((tick) => {
      const half = sheet.measure(textOf(tick)) / 2 + sheet.rowPx * 0.4;
      const x = xAt(tick.tdbSeconds);
      if (x - half < 0 || x + half > sheet.widthPx) return false;
      if (taken.some(([from, to]) => x - half < to && x + half > from)) return false;
      taken.push([x - half, x + half]);
      return true;
    });
    return new Set(fit);
  };
  const wordsOf = (tick: TimeTick): string =>
    tick.tdbSeconds === zero ? anchor.words : tick.words;
  const withWords = fitting(wordsOf);
  const withDate = fitting((tick) => tick.date);
  return ticks.map((tick) => ({
    x: xAt(tick.tdbSeconds),
    words: withWords.has(tick) ? wordsOf(tick) : null,
    date: withWords.has(tick) && withDate.has(tick) ? tick.date : null,
  }));
}

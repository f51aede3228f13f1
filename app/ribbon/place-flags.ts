import type { RibbonEvent } from './events';

/** Places labels beside marks on a curve so that no label lies on another, on a pole or on a curve. */

export interface Mark {
  event: RibbonEvent;
  /** The event's place on the curve, px. */
  x: number;
  y: number;
}

export interface FlagLabel {
  text: string;
  /** Where the text starts (`start`) or ends (`end`), and its middle line, px. */
  x: number;
  y: number;
  anchor: 'start' | 'end';
}

export interface PlacedFlag extends Mark {
  /** Null where there was no room: the mark stands alone. */
  label: FlagLabel | null;
}

export interface Box {
  x0: number;
  y0: number;
  x1: number;
  y1: number;
}

export interface FlagRoom {
  /** Labels stay inside. */
  bounds: Box;
  /** Polylines to keep clear of: pairs of x (ascending) and y, px. */
  curves: readonly Float64Array[];
  /** Height of a label and distance of its row from the next, px. */
  rowPx: number;
  /** Radius of a mark, px. */
  markPx: number;
  measure(text: string): number;
}

/** Between a pole and its label, px, as a share of the row. */
const GAP = 0.35;
/** A mark this near to one with the same words, in rows, hides behind it and has no label. */
const COVERED = 0.25;

/**
 * @param marks in order of importance: the first get their place first
 * @returns     the same marks in the same order
 */
export function placeFlags(marks: readonly Mark[], room: FlagRoom): PlacedFlag[] {
  const { rowPx, markPx } = room;
  const dots = marks.map(({ x, y }) => around(x, y, markPx));
  const labels: Box[] = [];
  const poles: Box[] = [];
  return marks.map((mark, index) => {
    const isRepeated = marks
      .slice(0, index)
      .some(
        (each) => each.event.flag === mark.event.flag && nearness(each, mark) < COVERED * rowPx,
      );
    if (isRepeated) return { ...mark, label: null };
    const others = dots.filter((_, each) => each !== index);
    for (const candidate of candidates(mark, room)) {
      const { box, pole, label } = candidate;
      if (!contains(room.bounds, box)) continue;
      if ([...labels, ...poles, ...others].some((each) => overlap(each, box))) continue;
      if (labels.some((each) => overlap(each, pole))) continue;
      if (room.curves.some((curve) => curveMeets(curve, box, rowPx * 0.15))) continue;
      labels.push(box);
      poles.push(pole);
      return { ...mark, label };
    }
    return { ...mark, label: null };
  });
}

const nearness = (a: Mark, b: Mark): number => Math.hypot(a.x - b.x, a.y - b.y);

interface Candidate {
  label: FlagLabel;
  box: Box;
  pole: Box;
}

/** Full text before short text; near rows before far ones; above before below; outwards first. */
function* candidates({ event, x, y }: Mark, room: FlagRoom): Generator<Candidate> {
  const { rowPx, markPx, bounds, measure } = room;
  const rows = Math.ceil((bounds.y1 - bounds.y0) / rowPx);
  const anchors =
    event.direction === 'in' ? (['end', 'start'] as const) : (['start', 'end'] as const);
  for (const text of [event.flag, event.shortFlag]) {
    const width = measure(text);
    for (let row = 0; row < rows; row++) {
      for (const side of [-1, 1]) {
        const middle = y + side * (markPx + rowPx * (0.6 + row));
        for (const anchor of anchors) {
          const outward = anchor === 'start' ? 1 : -1;
          const textX = x + outward * rowPx * GAP;
          yield {
            label: { text, x: textX, y: middle, anchor },
            box: {
              x0: Math.min(textX, textX + outward * width),
              x1: Math.max(textX, textX + outward * width),
              y0: middle - rowPx / 2,
              y1: middle + rowPx / 2,
            },
            pole: {
              x0: x - 1.5,
              x1: x + 1.5,
              y0: Math.min(y, middle),
              y1: Math.max(y, middle),
            },
          };
        }
      }
    }
  }
}

const around = (x: number, y: number, radius: number): Box => ({
  x0: x - radius,
  x1: x + radius,
  y0: y - radius,
  y1: y + radius,
});

const overlap = (a: Box, b: Box): boolean =>
  a.x0 < b.x1 && b.x0 < a.x1 && a.y0 < b.y1 && b.y0 < a.y1;

const contains = (outer: Box, inner: Box): boolean =>
  inner.x0 >= outer.x0 && inner.x1 <= outer.x1 && inner.y0 >= outer.y0 && inner.y1 <= outer.y1;

/** Whether the polyline's heights over the box's width reach into its height. */
function curveMeets(curve: Float64Array, box: Box, clearance: number): boolean {
  let least = Number.POSITIVE_INFINITY;
  let greatest = Number.NEGATIVE_INFINITY;
  for (let i = 0; i + 3 < curve.length; i += 2) {
    const x0 = curve[i];
    const x1 = curve[i + 2];
    if (x1 < box.x0 || x0 > box.x1) continue;
    for (const x of [Math.max(x0, box.x0), Math.min(x1, box.x1)]) {
      const share = x1 > x0 ? (x - x0) / (x1 - x0) : 0;
      const y = curve[i + 1] + share * (curve[i + 3] - curve[i + 1]);
      least = Math.min(least, y);
      greatest = Math.max(greatest, y);
    }
    if (x1 === x0) {
      least = Math.min(least, curve[i + 3]);
      greatest = Math.max(greatest, curve[i + 3]);
    }
  }
  return least < box.y1 + clearance && greatest > box.y0 - clearance;
}

import { FONT_FIGURES, FONT_TEXT } from '../theme/tokens';
import type { Rgb } from './inks';

/** The lettering of a scene: placed so that no two labels cross, with a memory against flicker. */

export type LabelStyle = 'name' | 'note' | 'figure';

export interface Label {
  /** Same from frame to frame. */
  readonly id: string;
  readonly text: string;
  /** What it belongs to, px. */
  readonly x: number;
  readonly y: number;
  /** Clear distance from there, px. */
  readonly gap: number;
  readonly style: LabelStyle;
  readonly colour: Rgb;
  /** The higher is placed first; one that finds no room is left out. */
  readonly priority: number;
  /** Of the labels of a group only the first that finds room is written. */
  readonly group?: string;
  /** Where it had best stand from its point, any length; to the right when left out. */
  readonly prefer?: readonly [number, number];
  /** Keep it even where it crosses another. */
  readonly must?: boolean;
}

export interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

interface PlacedLabel extends Label {
  readonly box: Box;
}

interface LabelFont {
  readonly weight: string;
  readonly sizePx: number;
  readonly family: string;
}

export const LABEL_FONTS: Readonly<Record<LabelStyle, LabelFont>> = {
  name: { weight: '600', sizePx: 10, family: FONT_TEXT },
  note: { weight: 'italic 400', sizePx: 11.5, family: FONT_TEXT },
  figure: { weight: '400', sizePx: 10.5, family: FONT_FIGURES },
};
/** Names are set in spaced capitals. */
export const NAME_SPACING_PX = 1;
const HEIGHT_PX: Readonly<Record<LabelStyle, number>> = { name: 11, note: 13, figure: 12 };
const PAD_PX = 2;
/** Labels keep this clear of the picture's edge, px. */
const EDGE_PX = 4;

/** Directions in which a label may stand from its point, the most liked first. */
const SIDES: readonly (readonly [number, number])[] = [
  [1, 0],
  [-1, 0],
  [0, -1],
  [0, 1],
  [0.8, -1.2],
  [-0.8, -1.2],
  [0.8, 1.2],
  [-0.8, 1.2],
];

export function overlaps(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}

/** Numbers of the sides in the order in which they are tried. */
function sidesOf(label: Label, last: number | undefined): number[] {
  const order = [...SIDES.keys()];
  const { prefer } = label;
  if (prefer !== undefined) {
    const liking = (side: number) => SIDES[side][0] * prefer[0] + SIDES[side][1] * prefer[1];
    order.sort((a, b) => liking(b) - liking(a));
    // Across the line it belongs to, on one hand or the other, before anything along it.
    order.splice(1, 0, ...order.splice(order.length - 1, 1));
  }
  return last === undefined ? order : [last, ...order];
}

/** The place of a label on one of its sides. */
function labelBox(label: Label, widthPx: number, side: readonly [number, number]): Box {
  const height = HEIGHT_PX[label.style];
  const x = label.x + side[0] * (label.gap + widthPx / 2);
  const y = label.y + side[1] * (label.gap + height / 2);
  return {
    left: x - widthPx / 2 - PAD_PX,
    right: x + widthPx / 2 + PAD_PX,
    top: y - height / 2 - PAD_PX,
    bottom: y + height / 2 + PAD_PX,
  };
}

/**
 * Places labels, the most important first.
 *
 * @param labels   what is to be written
 * @param taken    boxes that must stay free
 * @param picture  the picture, px
 * @param measure  width of a label's text, px
 * @param memory   side each label had in the frame before; kept while it is still free, and
 *                 written anew
 */
export function placeLabels(
  labels: readonly Label[],
  taken: readonly Box[],
  picture: { widthPx: number; heightPx: number },
  measure: (label: Label) => number,
  memory: Map<string, number>,
): PlacedLabel[] {
  const before = new Map(memory);
  memory.clear();
  const boxes = [...taken];
  const placed: PlacedLabel[] = [];
  const written = new Set<string>();
  for (const label of [...labels].sort((a, b) => b.priority - a.priority)) {
    if (label.group !== undefined && written.has(label.group)) continue;
    const width = measure(label);
    const inside = (box: Box) =>
      box.left >= EDGE_PX &&
      box.top >= EDGE_PX &&
      box.right <= picture.widthPx - EDGE_PX &&
      box.bottom <= picture.heightPx - EDGE_PX;
    const last = before.get(label.id);
    const order = sidesOf(label, last);
    const fits = (side: number) => {
      const box = labelBox(label, width, SIDES[side]);
      return inside(box) && !boxes.some((other) => overlaps(box, other));
    };
    const side =
      order.find(fits) ??
      (label.must === true
        ? order.find((i) => inside(labelBox(label, width, SIDES[i])))
        : undefined);
    if (side === undefined) continue;
    memory.set(label.id, side);
    const box = labelBox(label, width, SIDES[side]);
    boxes.push(box);
    if (label.group !== undefined) written.add(label.group);
    placed.push({ ...label, box });
  }
  return placed;
}

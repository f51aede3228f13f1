import { LABEL_FONTS, type Label, NAME_SPACING_PX, type PlacedLabel } from './labels';

/** Writes placed labels on the overlay, each on a narrow clearing in the ground's colour. */

const widths = new Map<string, number>();
const MOST_WIDTHS = 2000;

function dress(context: CanvasRenderingContext2D, label: Label): string {
  context.font = LABEL_FONTS[label.style];
  context.letterSpacing = label.style === 'name' ? `${NAME_SPACING_PX}px` : '0px';
  return label.style === 'name' ? label.text.toUpperCase() : label.text;
}

export function labelWidth(context: CanvasRenderingContext2D, label: Label): number {
  const key = `${label.style} ${label.text}`;
  const known = widths.get(key);
  if (known !== undefined) return known;
  if (widths.size > MOST_WIDTHS) widths.clear();
  const width = context.measureText(dress(context, label)).width;
  widths.set(key, width);
  return width;
}

/** Forgets all widths: the type has arrived. */
export function forgetWidths(): void {
  widths.clear();
}

export function writeLabels(
  context: CanvasRenderingContext2D,
  labels: readonly PlacedLabel[],
  ground: string,
): void {
  context.textAlign = 'center';
  context.textBaseline = 'middle';
  context.lineJoin = 'round';
  context.lineWidth = 3.5;
  context.strokeStyle = ground;
  for (const label of labels) {
    const text = dress(context, label);
    const x = (label.box.left + label.box.right) / 2;
    const y = (label.box.top + label.box.bottom) / 2 + 0.5;
    context.strokeText(text, x, y);
    context.fillStyle = label.colour;
    context.fillText(text, x, y);
  }
}

import { FONT_FIGURES, FONT_TEXT, type Palette } from '../theme/tokens';
import * as fit from './text-fit';

/** A hand for the sheet: text that fits, fine lines, in one palette. */

export interface Pen {
  context: CanvasRenderingContext2D;
  palette: Palette;
}

export interface Face {
  px: number;
  weight?: 400 | 600;
  figures?: boolean;
  italic?: boolean;
}

const fontOf = ({ px, weight = 400, figures = false, italic = false }: Face): string =>
  `${italic ? 'italic ' : ''}${weight} ${px}px ${figures ? FONT_FIGURES : FONT_TEXT}`;

/** Every font that the plate is set in, to be loaded before drawing. */
export const PLATE_FONTS: readonly string[] = [
  fontOf({ px: 23 }),
  fontOf({ px: 23, weight: 600 }),
  fontOf({ px: 23, italic: true }),
  fontOf({ px: 23, figures: true }),
];

export function measureIn({ context }: Pen, face: Face): fit.Measure {
  return (text) => {
    context.font = fontOf(face);
    return context.measureText(text).width;
  };
}

export function write(
  { context }: Pen,
  text: string,
  x: number,
  y: number,
  face: Face,
  colour: string,
  align: CanvasTextAlign = 'left',
): void {
  context.font = fontOf(face);
  context.fillStyle = colour;
  context.textAlign = align;
  context.textBaseline = 'alphabetic';
  context.fillText(text, x, y);
}

/** Text over lines: a rim in the sheet's colour keeps it clear of them. */
export function writeClear(
  pen: Pen,
  text: string,
  x: number,
  y: number,
  face: Face,
  align: CanvasTextAlign = 'left',
): void {
  const { context, palette } = pen;
  context.font = fontOf(face);
  context.textAlign = align;
  context.textBaseline = 'alphabetic';
  context.lineJoin = 'round';
  context.lineWidth = face.px * 0.4;
  context.strokeStyle = palette.ground;
  context.strokeText(text, x, y);
  write(pen, text, x, y, face, palette.ink, align);
}

/** Letter-spaced small capitals of the labels; gives the place where they end. */
export function writeCaps(
  pen: Pen,
  text: string,
  x: number,
  y: number,
  px: number,
  colour: string,
): number {
  const { context } = pen;
  const face = { px, weight: 600 } as const;
  context.letterSpacing = `${(px * 0.14).toFixed(1)}px`;
  write(pen, text.toUpperCase(), x, y, face, colour);
  const end = x + measureIn(pen, face)(text.toUpperCase());
  context.letterSpacing = '0px';
  return end;
}

/** The text shortened to a width, with an ellipsis where it had to be. */
export function shortened(pen: Pen, text: string, face: Face, width: number): string {
  return fit.shortened(text, width, measureIn(pen, face));
}

/** A text broken into lines of a width; breaks at ordinary blanks only, if it can. */
export function linesOf(pen: Pen, text: string, face: Face, width: number): string[] {
  return fit.wrapped(text, width, measureIn(pen, face));
}

/** A line through points: pairs of x and y. */
export function rule(
  { context }: Pen,
  points: ArrayLike<number>,
  colour: string,
  width = 1.5,
  dash: number[] = [],
): void {
  context.strokeStyle = colour;
  context.lineWidth = width;
  context.lineJoin = 'round';
  context.setLineDash(dash);
  context.beginPath();
  for (let i = 0; i + 1 < points.length; i += 2) {
    if (i === 0) context.moveTo(points[0], points[1]);
    else context.lineTo(points[i], points[i + 1]);
  }
  context.stroke();
  context.setLineDash([]);
}

export function frame({ context }: Pen, box: Area, colour: string, width = 1.5): void {
  context.strokeStyle = colour;
  context.lineWidth = width;
  context.strokeRect(box.x, box.y, box.width, box.height);
}

export interface Area {
  x: number;
  y: number;
  width: number;
  height: number;
}

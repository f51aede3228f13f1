import { FONT_FIGURES, FONT_TEXT, type Palette } from '../theme/tokens';

/** A hand for the sheet: text that fits, fine lines, in one palette. */

export interface Pen {
  context: CanvasRenderingContext2D;
  palette: Palette;
}

export interface Face {
  px: number;
  weight?: 400 | 600;
  figures?: boolean;
}

export const fontOf = ({ px, weight = 400, figures = false }: Face): string =>
  `${weight} ${px}px ${figures ? FONT_FIGURES : FONT_TEXT}`;

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

/** Letter-spaced small capitals of the labels. */
export function writeCaps(
  pen: Pen,
  text: string,
  x: number,
  y: number,
  px: number,
  colour: string,
): void {
  pen.context.letterSpacing = `${(px * 0.14).toFixed(1)}px`;
  write(pen, text.toUpperCase(), x, y, { px, weight: 600 }, colour);
  pen.context.letterSpacing = '0px';
}

/** The text shortened to a width, with an ellipsis where it had to be. */
export function shortened({ context }: Pen, text: string, face: Face, width: number): string {
  context.font = fontOf(face);
  if (context.measureText(text).width <= width) return text;
  let short = text;
  while (short.length > 1 && context.measureText(`${short}…`).width > width) {
    short = short.slice(0, -1);
  }
  return `${short.trimEnd()}…`;
}

/** A text broken into lines of a width; breaks at ordinary blanks only. */
export function linesOf({ context }: Pen, text: string, face: Face, width: number): string[] {
  context.font = fontOf(face);
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    const longer = line === '' ? word : `${line} ${word}`;
    if (line !== '' && context.measureText(longer).width > width) {
      lines.push(line);
      line = word;
    } else line = longer;
  }
  lines.push(line);
  return lines;
}

export function rule(
  { context }: Pen,
  path: [number, number][],
  colour: string,
  width = 1.5,
): void {
  context.strokeStyle = colour;
  context.lineWidth = width;
  context.beginPath();
  for (const [i, [x, y]] of path.entries()) {
    if (i === 0) context.moveTo(x, y);
    else context.lineTo(x, y);
  }
  context.stroke();
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

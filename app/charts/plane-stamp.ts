import { CLONE_OUTCOME, CLONE_POINT } from '../worker/core-values';
import type { Projection } from './plane-geometry';

/**
 * Marks of clones printed into the pixels of a picture of one colour: some 40 000 of them well within
 * a frame, which strokes of a canvas are not. Where marks lie over one another they darken.
 */

/** Pixels of a mark about its middle, and how much each covers, 0 to 255. */
interface Stamp {
  /** No pixel lies farther out than this along either side. */
  reach: number;
  dx: Int16Array;
  dy: Int16Array;
  cover: Uint8Array;
}

export interface CloneStamps {
  /** Of a clone that does not hit, and of one that does, for each set. */
  plain: { pass: Stamp; impact: Stamp };
  rare: { pass: Stamp; impact: Stamp };
}

type Shape = (x: number, y: number) => number;

/** How much of a pixel lies within half a line's width of something `away` from its middle. */
const line = (away: number, halfWidth: number): number =>
  Math.min(Math.max(halfWidth + 0.5 - away, 0), 1);

function stampOf(reach: number, opacity: number, shape: Shape): Stamp {
  const dx: number[] = [];
  const dy: number[] = [];
  const cover: number[] = [];
  const end = Math.ceil(reach + 1);
  for (let y = -end; y <= end; y++) {
    for (let x = -end; x <= end; x++) {
      const value = Math.round(255 * opacity * shape(x, y));
      if (value === 0) continue;
      dx.push(x);
      dy.push(y);
      cover.push(value);
    }
  }
  return {
    reach: end,
    dx: Int16Array.from(dx),
    dy: Int16Array.from(dy),
    cover: Uint8Array.from(cover),
  };
}

/** Marks for a picture with so many pixels to the CSS pixel. */
export function cloneStamps(scale: number): CloneStamps {
  const dot: Shape = (x, y) => line(Math.hypot(x, y), 0.9 * scale);
  const ring: Shape = (x, y) => line(Math.abs(Math.hypot(x, y) - 2 * scale), 0.4 * scale);
  const saltire: Shape = (x, y) => {
    const reach = 3 * scale;
    if (Math.max(Math.abs(x), Math.abs(y)) > reach) return 0;
    return line(Math.abs(Math.abs(x) - Math.abs(y)) / Math.SQRT2, 0.5 * scale);
  };
  const upright: Shape = (x, y) => {
    const reach = 3 * scale;
    if (Math.max(Math.abs(x), Math.abs(y)) > reach) return 0;
    return line(Math.min(Math.abs(x), Math.abs(y)), 0.4 * scale);
  };
  return {
    plain: { pass: stampOf(scale, 0.3, dot), impact: stampOf(3 * scale, 1, saltire) },
    rare: { pass: stampOf(2 * scale, 0.24, ring), impact: stampOf(3 * scale, 0.55, upright) },
  };
}

/** A picture of one colour: its red, green and blue are set, the marks go into its alpha. */
export interface Picture {
  widthPx: number;
  heightPx: number;
  /** Red, green, blue, alpha, as ImageData has them. */
  data: Uint8ClampedArray;
}

/**
 * Prints points into a picture.
 *
 * @param points  CLONE_POINT.size numbers each; one without a place on the plane is left out
 * @param project onto the picture's pixels
 */
export function printClones(
  picture: Picture,
  points: Float32Array,
  stamps: { pass: Stamp; impact: Stamp },
  project: Projection,
): void {
  const { x0, xT, xR, y0, yT, yR } = project;
  const { widthPx, heightPx } = picture;
  const { size, bDotTKm, bDotRKm, outcome } = CLONE_POINT;
  for (let i = 0; i < points.length; i += size) {
    const t = points[i + bDotTKm];
    const r = points[i + bDotRKm];
    const x = Math.round(x0 + xT * t + xR * r - 0.5);
    const y = Math.round(y0 + yT * t + yR * r - 0.5);
    // Not a number where the clone is bound: no comparison with it holds.
    if (!(x > -16 && x < widthPx + 16 && y > -16 && y < heightPx + 16)) continue;
    print(
      picture,
      points[i + outcome] === CLONE_OUTCOME.impact ? stamps.impact : stamps.pass,
      x,
      y,
    );
  }
}

function print({ widthPx, heightPx, data }: Picture, stamp: Stamp, x: number, y: number): void {
  const { dx, dy, cover, reach } = stamp;
  const isInside = x >= reach && y >= reach && x < widthPx - reach && y < heightPx - reach;
  const middle = 4 * (y * widthPx + x) + 3;
  for (let k = 0; k < cover.length; k++) {
    if (!isInside) {
      const px = x + dx[k];
      const py = y + dy[k];
      if (px < 0 || py < 0 || px >= widthPx || py >= heightPx) continue;
    }
    const at = middle + 4 * (dy[k] * widthPx + dx[k]);
    const alpha = data[at];
    // 257 / 65 536 is 1 / 255 as nearly as whole numbers of 16 bits tell.
    data[at] = alpha + (((255 - alpha) * cover[k] * 257 + 32768) >> 16);
  }
}

/** The same projection onto a picture with so many pixels to the CSS pixel. */
export function scaledProjection(project: Projection, scale: number): Projection {
  const { x0, xT, xR, y0, yT, yR } = project;
  return {
    x0: x0 * scale,
    xT: xT * scale,
    xR: xR * scale,
    y0: y0 * scale,
    yT: yT * scale,
    yR: yR * scale,
  };
}

/** Wipes a picture and gives it a colour: "#rrggbb". */
export function wiped(picture: Picture, colour: string): void {
  const { data } = picture;
  const rgb = [1, 3, 5].map((at) => Number.parseInt(colour.slice(at, at + 2), 16));
  new Uint32Array(data.buffer).fill(new Uint32Array(Uint8Array.from([...rgb, 0]).buffer)[0]);
}

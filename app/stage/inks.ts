import type { Palette } from '../theme/tokens';
import type { Stroke } from './line-buffer';

/** The strokes that the scenes are drawn with, in one palette. */

export type Rgb = readonly [number, number, number];

function rgbOf(hex: string): Rgb {
  const value = Number.parseInt(hex.slice(1), 16);
  return [(value >> 16) & 255, (value >> 8) & 255, value & 255];
}

/** A colour a share of the way from one to another. */
export function mixed(from: Rgb, to: Rgb, share: number): Rgb {
  const at = (i: 0 | 1 | 2) => Math.round(from[i] + (to[i] - from[i]) * share);
  return [at(0), at(1), at(2)];
}

export interface Inks {
  readonly palette: Palette;
  readonly rgb: { readonly [K in keyof Palette]: Rgb };
  /** Lines that measure: the grid, the graticule, the ticks. */
  readonly grid: Stroke;
  readonly gridStrong: Stroke;
  readonly planetOrbit: Stroke;
  readonly earthOrbit: Stroke;
  readonly moonTrack: Stroke;
  readonly coast: Stroke;
  readonly graticule: Stroke;
  readonly limb: Stroke;
  /** The object's path: where it has been, and where it will be. */
  readonly behind: Stroke;
  readonly ahead: Stroke;
  readonly unperturbed: Stroke;
  readonly objectHair: Stroke;
  /** Where the object may be. */
  readonly tubeEdge: Stroke;
  readonly tubeRing: Stroke;
  readonly ellipsoid: Stroke;
  readonly sphereOfInfluence: Stroke;
  readonly moonDistance: Stroke;
  readonly geosynchronous: Stroke;
  readonly interface: Stroke;
  readonly arrow: Stroke;
  readonly sunRay: Stroke;
  readonly scale: Stroke;
}

const made = new WeakMap<Palette, Inks>();

export function inksOf(palette: Palette): Inks {
  const known = made.get(palette);
  if (known !== undefined) return known;
  const inks = makeInks(palette);
  made.set(palette, inks);
  return inks;
}

function makeInks(palette: Palette): Inks {
  const entries = Object.entries(palette).map(([name, hex]) => [name, rgbOf(hex)]);
  const rgb = Object.fromEntries(entries) as Inks['rgb'];
  const solid = (colour: Rgb, widthPx: number, alpha = 1): Stroke => ({
    colour,
    alpha,
    widthPx,
    dash: null,
  });
  const dashed = (colour: Rgb, widthPx: number, on: number, off: number, alpha = 1): Stroke => ({
    colour,
    alpha,
    widthPx,
    dash: [on, off],
  });
  return {
    palette,
    rgb,
    grid: solid(rgb.hairline, 0.9),
    gridStrong: solid(rgb.inkSoft, 0.9, 0.75),
    planetOrbit: solid(rgb.planet, 0.9),
    earthOrbit: solid(rgb.earth, 1.2),
    moonTrack: solid(rgb.moon, 0.9),
    coast: solid(rgb.earth, 1, 0.95),
    graticule: solid(rgb.earth, 0.7, 0.3),
    limb: solid(rgb.earth, 1.4),
    behind: solid(rgb.object, 2.4),
    ahead: solid(rgb.object, 1.2),
    unperturbed: dashed(rgb.object, 1.1, 5, 4, 0.85),
    objectHair: solid(rgb.object, 0.9, 0.8),
    tubeEdge: solid(rgb.object, 0.8, 0.7),
    tubeRing: solid(rgb.object, 0.6, 0.35),
    ellipsoid: solid(rgb.object, 1, 0.9),
    sphereOfInfluence: dashed(rgb.inkSoft, 1, 9, 4, 0.9),
    moonDistance: dashed(rgb.inkSoft, 1, 2, 3, 0.9),
    geosynchronous: solid(rgb.inkSoft, 0.9, 0.9),
    interface: dashed(rgb.earth, 0.9, 3, 2.5, 0.9),
    arrow: solid(rgb.inkSoft, 1),
    sunRay: solid(rgb.sun, 1.1),
    scale: solid(rgb.ink, 1),
  };
}

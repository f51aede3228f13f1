import { feature } from 'topojson-client';
import type { GeometryCollection, Topology } from 'topojson-specification';
import land from 'world-atlas/land-110m.json';

/** Land in plate carrée for tinting the globe. */

const LAND = land as unknown as Topology<{ land: GeometryCollection }>;

/** Share of land, 0 to 255, by rows from the south pole up, each from 180° W to 180° E. */
interface LandLevel {
  readonly data: Uint8Array;
  readonly width: number;
  readonly height: number;
}

/**
 * The land at a size and halved again and again.
 *
 * @param width  columns of the finest level, a power of two; half as many rows
 * @param least  columns of the coarsest level
 */
export function landLevels(width: number, least: number): LandLevel[] {
  const levels = [paintLand(width)];
  for (let level = levels[0]; level.width > least; level = levels[levels.length - 1]) {
    levels.push(halved(level));
  }
  return levels;
}

function paintLand(width: number): LandLevel {
  const height = width / 2;
  const canvas = document.createElement('canvas');
  canvas.width = width;
  canvas.height = height;
  const context = canvas.getContext('2d', { willReadFrequently: true });
  const data = new Uint8Array(width * height);
  if (context === null) return { data, width, height };
  context.scale(width / 360, height / 180);
  context.translate(180, 90);
  context.beginPath();
  for (const { geometry } of feature(LAND, LAND.objects.land).features) {
    if (geometry.type !== 'MultiPolygon') continue;
    for (const ring of geometry.coordinates.flat()) {
      const flat = unrolled(ring);
      // A ring over the antimeridian shows on both sides of the picture.
      for (const shift of [-360, 0, 360]) {
        for (const [i, [longitude, latitude]] of flat.entries()) {
          if (i === 0) context.moveTo(longitude + shift, latitude);
          else context.lineTo(longitude + shift, latitude);
        }
        context.closePath();
      }
    }
  }
  context.fill('evenodd');
  const pixels = context.getImageData(0, 0, width, height).data;
  for (let i = 0; i < data.length; i++) data[i] = pixels[4 * i + 3];
  return { data, width, height };
}

/** Half the size: each place takes the mean of four. */
export function halved({ data, width, height }: LandLevel): LandLevel {
  const half = { data: new Uint8Array(data.length / 4), width: width / 2, height: height / 2 };
  for (let y = 0; y < half.height; y++) {
    for (let x = 0; x < half.width; x++) {
      const at = 2 * y * width + 2 * x;
      const sum = data[at] + data[at + 1] + data[at + width] + data[at + width + 1];
      half.data[y * half.width + x] = Math.round(sum / 4);
    }
  }
  return half;
}

/** A ring with its longitudes counted on; one that goes round the south pole is closed there. */
export function unrolled(ring: readonly number[][]): [number, number][] {
  const flat: [number, number][] = [];
  let turn = 0;
  for (const [i, [longitude, latitude]] of ring.entries()) {
    if (i > 0) turn -= 360 * Math.round((longitude - ring[i - 1][0]) / 360);
    flat.push([longitude + turn, latitude]);
  }
  if (turn !== 0) flat.push([flat[flat.length - 1][0], -90], [flat[0][0], -90]);
  return flat;
}

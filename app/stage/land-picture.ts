import { feature } from 'topojson-client';
import type { GeometryCollection, Topology } from 'topojson-specification';
import land from 'world-atlas/land-110m.json';

/** Land as a picture in plate carrée for tinting the globe. */

const LAND = land as unknown as Topology<{ land: GeometryCollection }>;

/**
 * @param widthPx  width of the picture; its height is half of that
 * @returns        land white on black, north up, from 180° W to 180° E
 */
export function paintLand(widthPx: number): HTMLCanvasElement {
  const canvas = document.createElement('canvas');
  canvas.width = widthPx;
  canvas.height = widthPx / 2;
  // Kept in plain memory: it is uploaded again when the graphics come back.
  const context = canvas.getContext('2d', { willReadFrequently: true });
  if (context === null) return canvas;
  context.fillStyle = '#000';
  context.fillRect(0, 0, canvas.width, canvas.height);
  context.scale(canvas.width / 360, -canvas.height / 180);
  context.translate(180, -90);
  context.fillStyle = '#fff';
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
  return canvas;
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

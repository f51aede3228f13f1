import { mesh } from 'topojson-client';
import type { GeometryObject, Topology } from 'topojson-specification';
import land from 'world-atlas/land-110m.json';
import { itrfFromGeodetic, type Vec3 } from '../worker/core-geometry';

/** Coastlines (Natural Earth, 1:110 million, public domain) on the ellipsoid, ready to be thinned. */

export interface Coastline {
  /** Points on the WGS 84 ellipsoid, km, Earth-fixed axes. */
  readonly itrf: Float64Array;
  /** How far each point lies off the line without it, km; infinite at the ends. */
  readonly weightKm: Float64Array;
}

/** The file as its own format's type: the JSON import only knows numbers and strings. */
const LAND = land as unknown as Topology<{ land: GeometryObject }>;
const RAD = Math.PI / 180;
/** An island of the source is cut along the antimeridian: no coast there. */
const CUT_LONGITUDE = 179.999;

export function readCoastlines(): Coastline[] {
  const lines = mesh(LAND, LAND.objects.land).coordinates;
  return lines.flatMap(withoutCuts).map(toCoastline);
}

function withoutCuts(line: number[][]): number[][][] {
  const parts: number[][][] = [];
  let part: number[][] = [];
  for (const [i, point] of line.entries()) {
    if (i > 0 && isCut(line[i - 1], point)) {
      if (part.length > 1) parts.push(part);
      part = [];
    }
    part.push(point);
  }
  if (part.length > 1) parts.push(part);
  return parts;
}

function isCut(a: number[], b: number[]): boolean {
  return Math.abs(a[0]) > CUT_LONGITUDE && Math.abs(b[0]) > CUT_LONGITUDE;
}

function toCoastline(line: number[][]): Coastline {
  const itrf = new Float64Array(3 * line.length);
  for (const [i, [longitude, latitude]] of line.entries()) {
    itrf.set(
      itrfFromGeodetic({
        longitudeRad: longitude * RAD,
        latitudeRad: latitude * RAD,
        altitudeKm: 0,
      }),
      3 * i,
    );
  }
  return { itrf, weightKm: weights(itrf) };
}

/**
 * How much each point of a chain matters: the distance at which Douglas and Peucker (1973) would
 * split there, never more than that of the split above, so that a threshold gives a proper subset.
 *
 * @param xyz  points, km
 * @returns    km; infinite for both ends
 */
export function weights(xyz: Float64Array): Float64Array {
  const count = xyz.length / 3;
  const weight = new Float64Array(count);
  weight[0] = Number.POSITIVE_INFINITY;
  weight[count - 1] = Number.POSITIVE_INFINITY;
  const open: [number, number, number][] = [[0, count - 1, Number.POSITIVE_INFINITY]];
  for (let job = open.pop(); job !== undefined; job = open.pop()) {
    const [first, last, limit] = job;
    let farthest = -1;
    let distance = -1;
    for (let i = first + 1; i < last; i++) {
      const off = offChord(xyz, first, last, i);
      if (off > distance) {
        distance = off;
        farthest = i;
      }
    }
    if (farthest < 0) continue;
    weight[farthest] = Math.min(limit, distance);
    open.push([first, farthest, weight[farthest]], [farthest, last, weight[farthest]]);
  }
  return weight;
}

function offChord(xyz: Float64Array, first: number, last: number, i: number): number {
  const at = (k: number): Vec3 => [xyz[3 * k], xyz[3 * k + 1], xyz[3 * k + 2]];
  const [a, b, p] = [at(first), at(last), at(i)];
  const chord = [b[0] - a[0], b[1] - a[1], b[2] - a[2]];
  const from = [p[0] - a[0], p[1] - a[1], p[2] - a[2]];
  const length2 = chord[0] ** 2 + chord[1] ** 2 + chord[2] ** 2;
  const along = from[0] * chord[0] + from[1] * chord[1] + from[2] * chord[2];
  const share = length2 > 0 ? Math.min(1, Math.max(0, along / length2)) : 0;
  return Math.hypot(
    from[0] - share * chord[0],
    from[1] - share * chord[1],
    from[2] - share * chord[2],
  );
}

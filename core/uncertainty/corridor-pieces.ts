import { type Vec3, vec3 } from '../math/vector';
import { angleFromChord, MEAN_RADIUS_KM, type Places, SphereCells } from './sphere-cells';

/** Parts the places of a corridor into connected strips, and measures how far along each lies. */

/** One strip: its rows, how far along each is, and how coarse that measure is. */
export interface Strip {
  rows: Int32Array;
  /** From one end, radians on the ground, one for each row. */
  along: Float64Array;
  /** Of the nodes it was measured with, radians; 0 where every row was its own. */
  grainRad: number;
  /** Distance between the ends. */
  lengthRad: number;
}

const MOST_NODES = 500;
const FIRST_GRAIN_KM = 1;
/** Strips farther apart than this, and than so many usual distances of neighbours, are two. */
const GAP_RAD = 1500 / MEAN_RADIUS_KM;
const GAP_NEIGHBOURS = 20;

/**
 * Strips among some rows.
 *
 * Rows are gathered into at most 500 nodes; their minimum spanning tree is cut where it must leap,
 * and the distance along a part is the shortest way through neighbouring nodes from the far end
 * (Isomap, Tenenbaum et al. 2000): it does not mind poles, the date line, or more than half a turn.
 *
 * @param rows indices into places; at least one
 * Source: spanning tree after Prim (1957), shortest ways after Dijkstra (1959).
 */
export function stripsOf(places: Places, rows: Int32Array): Strip[] {
  const nodeOf = new Int32Array(rows.length);
  let grainKm = FIRST_GRAIN_KM;
  let nodes = new SphereCells(grainKm).gather(places, rows, nodeOf);
  while (nodes.length > MOST_NODES) {
    grainKm *= 2;
    nodes = new SphereCells(grainKm).gather(places, rows, nodeOf);
  }
  const grainRad = grainKm / MEAN_RADIUS_KM;
  const means = nodes.map(({ mean }) => mean);
  const parts = partsOf(means, spanningTree(means));
  return parts.map((part) => {
    const place = new Int32Array(means.length).fill(-1);
    for (const [k, node] of part.nodes.entries()) place[node] = k;
    const along = alongOf(
      part.nodes.map((node) => means[node]),
      Math.max(2 * grainRad, part.longestRad) * (1 + 1e-9),
    );
    const mine = rows.filter((_, k) => place[nodeOf[k]] >= 0);
    const own = nodeOf.filter((node) => place[node] >= 0);
    return {
      rows: mine,
      along: Float64Array.from(own, (node) => along[place[node]]),
      grainRad: mine.length === part.nodes.length ? 0 : grainRad,
      lengthRad: Math.max(...along),
    };
  });
}

const apart = (a: Vec3, b: Vec3): number =>
  angleFromChord(Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]));

interface Edge {
  from: number;
  to: number;
  lengthRad: number;
}

/** Edges in the order in which the tree grows from the first node. */
function spanningTree(points: readonly Vec3[]): Edge[] {
  const nearest = points.map((point) => ({ from: 0, lengthRad: apart(points[0], point) }));
  const isIn = new Uint8Array(points.length);
  isIn[0] = 1;
  const edges: Edge[] = [];
  while (edges.length < points.length - 1) {
    let next = -1;
    for (let i = 0; i < points.length; i++) {
      if (isIn[i] === 0 && (next < 0 || nearest[i].lengthRad < nearest[next].lengthRad)) next = i;
    }
    isIn[next] = 1;
    edges.push({ ...nearest[next], to: next });
    for (let i = 0; i < points.length; i++) {
      if (isIn[i] === 1) continue;
      const lengthRad = apart(points[next], points[i]);
      if (lengthRad < nearest[i].lengthRad) nearest[i] = { from: next, lengthRad };
    }
  }
  return edges;
}

interface Part {
  nodes: number[];
  longestRad: number;
}

/** The parts of the tree when its leaps are cut. */
function partsOf(points: readonly Vec3[], edges: readonly Edge[]): Part[] {
  const lengths = edges.map(({ lengthRad }) => lengthRad).sort((a, b) => a - b);
  const usual = lengths.length === 0 ? 0 : lengths[lengths.length >> 1];
  const gap = Math.max(GAP_RAD, GAP_NEIGHBOURS * usual);
  const partOf = new Array<Part>(points.length);
  const parts: Part[] = [{ nodes: [0], longestRad: 0 }];
  partOf[0] = parts[0];
  for (const { from, to, lengthRad } of edges) {
    if (lengthRad > gap) {
      partOf[to] = { nodes: [to], longestRad: 0 };
      parts.push(partOf[to]);
    } else {
      partOf[to] = partOf[from];
      partOf[to].nodes.push(to);
      partOf[to].longestRad = Math.max(partOf[to].longestRad, lengthRad);
    }
  }
  return parts;
}

/** Distance of each point from one of the two that are farthest apart, by steps of a length at most. */
function alongOf(points: readonly Vec3[], stepRad: number): Float64Array {
  const end = farthest(waysFrom(points, 0, stepRad));
  return waysFrom(points, end, stepRad);
}

function farthest(ways: Float64Array): number {
  let best = 0;
  for (let i = 1; i < ways.length; i++) if (ways[i] > ways[best]) best = i;
  return best;
}

function waysFrom(points: readonly Vec3[], start: number, stepRad: number): Float64Array {
  const ways = new Float64Array(points.length).fill(Number.POSITIVE_INFINITY);
  const isDone = new Uint8Array(points.length);
  ways[start] = 0;
  for (let round = 0; round < points.length; round++) {
    let next = -1;
    for (let i = 0; i < points.length; i++) {
      if (isDone[i] === 0 && (next < 0 || ways[i] < ways[next])) next = i;
    }
    isDone[next] = 1;
    for (let i = 0; i < points.length; i++) {
      if (isDone[i] === 1) continue;
      const step = apart(points[next], points[i]);
      if (step <= stepRad) ways[i] = Math.min(ways[i], ways[next] + step);
    }
  }
  return ways;
}

/** The place of a row. */
export const placeOf = (places: Places, row: number): Vec3 => vec3(places.units, 3 * row);

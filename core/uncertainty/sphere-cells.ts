import { EARTH_FLATTENING, EARTH_RADIUS_KM } from '../constants';
import { cross, norm, scale, unit, type Vec3, vec3 } from '../math/vector';
import type { CorridorCell } from './corridor';

/** Probability on the turning Earth, in rings of cells of nearly equal area. */

/** Places with weights: unit vectors of geodetic latitude and longitude (3 each), and a weight each. */
export interface Places {
  units: Float64Array;
  weights: Float64Array;
}

/** Mean radius of the Earth, km (IUGG: (2a + b)/3): lengths on the ground are off by 0.3 % at most. */
export const MEAN_RADIUS_KM = EARTH_RADIUS_KM * (1 - EARTH_FLATTENING / 3);

const ECCENTRICITY = Math.sqrt(EARTH_FLATTENING * (2 - EARTH_FLATTENING));
const LEAST_IN_RING = 6;

/** A place and what lies there. */
interface Gathered {
  weight: number;
  /** Mean of the places gathered, a unit vector. */
  mean: Vec3;
}

/** Rings of cells, each ring cut evenly from −180° eastward: no cell lies across ±180° or a pole. */
export class SphereCells {
  private readonly rings: number;
  private readonly first: Float64Array;

  /** @param heightKm of a cell; its width at its middle is nearly the same */
  constructor(heightKm: number) {
    this.rings = Math.max(4, Math.round((Math.PI * MEAN_RADIUS_KM) / heightKm));
    this.first = new Float64Array(this.rings + 1);
    for (let ring = 0; ring < this.rings; ring++) {
      this.first[ring + 1] = this.first[ring] + this.inRing(ring);
    }
  }

  private inRing(ring: number): number {
    const middle = ((ring + 0.5) / this.rings - 0.5) * Math.PI;
    return Math.max(LEAST_IN_RING, Math.round(2 * this.rings * Math.cos(middle)));
  }

  /** Number of the cell that holds a unit vector. */
  indexOf(x: number, y: number, z: number): number {
    const latitude = Math.atan2(z, Math.hypot(x, y));
    const ring = Math.min(this.rings - 1, Math.floor((latitude / Math.PI + 0.5) * this.rings));
    const many = this.inRing(Math.max(0, ring));
    const turn = Math.atan2(y, x) / (2 * Math.PI) + 0.5;
    return this.first[Math.max(0, ring)] + Math.min(many - 1, Math.floor(turn * many));
  }

  bounds(index: number): Pick<CorridorCell, 'southRad' | 'northRad' | 'westRad' | 'eastRad'> {
    let low = 0;
    let high = this.rings;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (this.first[middle] <= index) low = middle;
      else high = middle;
    }
    const many = this.inRing(low);
    const column = index - this.first[low];
    return {
      southRad: (low / this.rings - 0.5) * Math.PI,
      northRad: ((low + 1) / this.rings - 0.5) * Math.PI,
      westRad: (column / many - 0.5) * 2 * Math.PI,
      eastRad: ((column + 1) / many - 0.5) * 2 * Math.PI,
    };
  }

  /** The weights by cell, with the mean place in each; `cellOf[i]` becomes the place among them. */
  gather(places: Places, rows: ArrayLike<number>, cellOf: Int32Array | null = null): Gathered[] {
    const at = new Map<number, number>();
    const sums: number[][] = [];
    for (let k = 0; k < rows.length; k++) {
      const row = rows[k];
      const [x, y, z] = vec3(places.units, 3 * row);
      const index = this.indexOf(x, y, z);
      const known = at.get(index);
      const cell = known ?? sums.length;
      if (known === undefined) {
        at.set(index, cell);
        sums.push([0, 0, 0, 0]);
      }
      const weight = places.weights[row];
      const sum = sums[cell];
      sum[0] += weight;
      sum[1] += weight * x;
      sum[2] += weight * y;
      sum[3] += weight * z;
      if (cellOf !== null) cellOf[k] = cell;
    }
    return sums.map(([weight, x, y, z]) => ({ weight, mean: unit([x, y, z]) }));
  }
}

/** Two unit vectors across a unit vector and across one another. */
export function acrossOf(p: Vec3): [Vec3, Vec3] {
  const axis: Vec3 = Math.abs(p[2]) < 0.7 ? [0, 0, 1] : [1, 0, 0];
  const east = unit(cross(axis, p));
  return [east, cross(p, east)];
}

/** Area between two parallels and two meridians of WGS 84, km². Source: Snyder (1987), eq. 3-12. */
function areaKm2({ southRad, northRad, westRad, eastRad }: ReturnType<SphereCells['bounds']>) {
  const half = (latitude: number): number => {
    const s = Math.sin(latitude);
    const es = ECCENTRICITY * s;
    return s / (1 - es * es) + Math.atanh(es) / ECCENTRICITY;
  };
  const polar = EARTH_RADIUS_KM * (1 - EARTH_FLATTENING);
  return ((eastRad - westRad) * polar * polar * (half(northRad) - half(southRad))) / 2;
}

const KERNEL_RINGS = 6;
const KERNEL_SPOKES = 16;
/** Cells are made larger until there are no more of them than this. */
const MOST_CELLS = 2500;
/** Least step by which cells grow. */
const CELL_STEP = 1.15;
/** The thinnest cells that together hold this share are left out, and the rest scaled up. */
const LEFT_OUT = 0.001;

/** Nodes of equal weight that stand for a round Gaussian of variance one per axis. */
function kernelNodes(): [number, number][] {
  const radii = Array.from({ length: KERNEL_RINGS }, (_, i) =>
    Math.sqrt(-2 * Math.log(1 - (i + 0.5) / KERNEL_RINGS)),
  );
  const variance = radii.reduce((sum, r) => sum + r * r, 0) / KERNEL_RINGS / 2;
  return radii.flatMap((r, ring) =>
    Array.from({ length: KERNEL_SPOKES }, (_, spoke): [number, number] => {
      const angle = (2 * Math.PI * (spoke + (ring % 2) / 2)) / KERNEL_SPOKES;
      const length = r / Math.sqrt(variance);
      return [length * Math.cos(angle), length * Math.sin(angle)];
    }),
  );
}

/**
 * Probability by cell: the places spread by a round Gaussian kernel.
 *
 * @param places    unit vectors and weights
 * @param kernelKm  standard deviation of the kernel
 * @param leastKm   height of the cells, enlarged until at most 2500 of them are not empty
 * @returns         cells that hold all but a thousandth, the densest first, their probabilities
 *                  scaled to the sum of the weights; the height they came to have
 * Accuracy: places are first gathered by cell, which moves each by less than a cell; the kernel is
 * 96 nodes of equal weight whose variance is exact.
 */
export function densityOf(
  places: Places,
  kernelKm: number,
  leastKm: number,
): { cellKm: number; cells: CorridorCell[] } {
  const nodes = kernelNodes();
  const rows = places.weights.map((_, i) => i);
  let cellKm = leastKm;
  for (;;) {
    const grid = new SphereCells(cellKm);
    const gathered = grid.gather(places, rows);
    const isCoarsest = cellKm > 1000;
    if (gathered.length > MOST_CELLS && !isCoarsest) {
      cellKm *= stepFor(gathered.length);
      continue;
    }
    const spread = new Map<number, number>();
    for (const { weight, mean } of gathered) {
      const [east, north] = acrossOf(mean);
      for (const [u, w] of nodes) {
        const x = (u * kernelKm) / MEAN_RADIUS_KM;
        const y = (w * kernelKm) / MEAN_RADIUS_KM;
        const angle = Math.hypot(x, y);
        const along = angle < 1e-12 ? 1 : Math.sin(angle) / angle;
        const point = (k: 0 | 1 | 2): number =>
          mean[k] * Math.cos(angle) + along * (x * east[k] + y * north[k]);
        const index = grid.indexOf(point(0), point(1), point(2));
        spread.set(index, (spread.get(index) ?? 0) + weight / nodes.length);
      }
    }
    const cells = dense(grid, spread);
    if (cells.length <= MOST_CELLS || isCoarsest) return { cellKm, cells };
    cellKm *= stepFor(cells.length);
  }
}

/** How much larger cells must be for fewer of them: towards what an area would need, never past it. */
const stepFor = (count: number): number =>
  Math.max(CELL_STEP, Math.min(2, Math.sqrt(count / MOST_CELLS)));

/** Cells by falling density without the thinnest. */
function dense(grid: SphereCells, spread: ReadonlyMap<number, number>): CorridorCell[] {
  const all = [...spread].map(([index, probability]) => {
    const bounds = grid.bounds(index);
    return { ...bounds, probability, areaKm2: areaKm2(bounds), within: 0 };
  });
  all.sort((a, b) => b.probability / b.areaKm2 - a.probability / a.areaKm2);
  const total = all.reduce((sum, cell) => sum + cell.probability, 0);
  let held = 0;
  let many = 0;
  while (many < all.length && held < (1 - LEFT_OUT) * total) {
    held += all[many].probability;
    many += 1;
  }
  const kept = all.slice(0, many);
  let within = 0;
  for (const cell of kept) {
    within += cell.probability;
    cell.within = Math.min(1, within / held);
    cell.probability *= total / held;
  }
  return kept;
}

/** Angle between unit vectors from their chord: as good for near ones as for far ones. */
export function angleFromChord(chord: number): number {
  return 2 * Math.asin(Math.min(1, chord / 2));
}

/** Mean direction; null where the weights cancel. */
export function meanUnit(places: Places, rows: ArrayLike<number>): Vec3 | null {
  let sum: Vec3 = [0, 0, 0];
  let total = 0;
  for (let k = 0; k < rows.length; k++) {
    const weight = places.weights[rows[k]];
    const [x, y, z] = vec3(places.units, 3 * rows[k]);
    sum = [sum[0] + weight * x, sum[1] + weight * y, sum[2] + weight * z];
    total += weight;
  }
  const length = norm(sum);
  return length > 1e-9 * total ? scale(sum, 1 / length) : null;
}

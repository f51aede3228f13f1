import { findMinimum } from '../math/roots';
import { type Elements, planeAxes } from './elements';

/** Smallest distance between two orbits, and where on each. */
export interface Moid {
  distanceKm: number;
  trueAnomalyARad: number;
  trueAnomalyBRad: number;
}

/** Places on each orbit in the first search: half a degree on the first, two on the second. */
const PLACES_A = 720;
const PLACES_B = 180;

/** An orbit as a curve by true anomaly. */
interface Curve {
  at(anomaly: number, out: Float64Array): void;
  /** The true anomalies −limit to limit are looked at. */
  limit: number;
}

function curveOf(orbit: Elements, reachKm: number): Curve {
  const { p, q } = planeAxes(orbit);
  const { semiLatusRectumKm: width, eccentricity: e } = orbit;
  // Where r = reach; an ellipse that stays within it is looked at all round.
  const cosine = e === 0 ? -1 : (width / reachKm - 1) / e;
  return {
    at(anomaly, out) {
      const cos = Math.cos(anomaly);
      const sin = Math.sin(anomaly);
      const distance = width / (1 + e * cos);
      for (let k = 0; k < 3; k++) out[k] = distance * (cos * p[k] + sin * q[k]);
    },
    limit: cosine <= -1 ? Math.PI : Math.acos(Math.min(1, cosine)),
  };
}

/**
 * Minimum orbit intersection distance of two orbits about one centre.
 *
 * @param a elements of the first orbit, any conic
 * @param b elements of the second, an ellipse
 * @returns distance, km, and the true anomalies on both, radians
 * The first orbit is looked at out to three times the aphelion of the second (beyond, no point can
 * be nearer than its periapsis is). A grid over both anomalies gives every local minimum of the
 * distance; each is refined by minimising over one anomaly inside the other.
 * Accuracy: 1e-9 au against dense searches (check).
 * Source: the definition; nested one-dimensional minimisation (Brent 1973).
 */
export function moid(a: Elements, b: Elements): Moid {
  const aphelion = b.semiLatusRectumKm / (1 - b.eccentricity);
  const first = curveOf(a, 3 * aphelion + 2 * a.periapsisKm);
  const second = curveOf(b, Number.POSITIVE_INFINITY);
  const one = new Float64Array(3);
  const two = new Float64Array(3);
  const stepA = (2 * first.limit) / PLACES_A;
  const stepB = (2 * Math.PI) / PLACES_B;
  const distance = (x: number, y: number): number => {
    first.at(x, one);
    second.at(y, two);
    return Math.hypot(one[0] - two[0], one[1] - two[1], one[2] - two[2]);
  };
  const grid = gridOf(first, second, stepA, stepB);
  let best: Moid = { distanceKm: Number.POSITIVE_INFINITY, trueAnomalyARad: 0, trueAnomalyBRad: 0 };
  for (const { i, j } of localMinima(grid)) {
    let y = j * stepB;
    const along = (x: number): number => {
      const inner = findMinimum((at) => distance(x, at), y - 2 * stepB, y + 2 * stepB, 1e-10);
      return inner.value;
    };
    const x0 = -first.limit + i * stepA;
    const low = Math.max(-first.limit, x0 - 1.5 * stepA);
    const high = Math.min(first.limit, x0 + 1.5 * stepA);
    const outer = findMinimum(along, low, high, 1e-10);
    y = findMinimum((at) => distance(outer.x, at), y - 2 * stepB, y + 2 * stepB, 1e-10).x;
    if (outer.value < best.distanceKm) {
      best = { distanceKm: outer.value, trueAnomalyARad: outer.x, trueAnomalyBRad: y };
    }
  }
  return best;
}

/** Squared distances over both anomalies, by rows of the first orbit. */
function gridOf(first: Curve, second: Curve, stepA: number, stepB: number): Float64Array {
  const points = new Float64Array(PLACES_B * 3);
  const place = new Float64Array(3);
  for (let j = 0; j < PLACES_B; j++) {
    second.at(j * stepB, place);
    points.set(place, j * 3);
  }
  const grid = new Float64Array((PLACES_A + 1) * PLACES_B);
  for (let i = 0; i <= PLACES_A; i++) {
    first.at(-first.limit + i * stepA, place);
    for (let j = 0; j < PLACES_B; j++) {
      const dx = place[0] - points[j * 3];
      const dy = place[1] - points[j * 3 + 1];
      const dz = place[2] - points[j * 3 + 2];
      grid[i * PLACES_B + j] = dx * dx + dy * dy + dz * dz;
    }
  }
  return grid;
}

/** Places of the grid not farther than their neighbours; the second anomaly wraps around. */
function* localMinima(grid: Float64Array): Generator<{ i: number; j: number }> {
  for (let i = 0; i <= PLACES_A; i++) {
    for (let j = 0; j < PLACES_B; j++) {
      const here = grid[i * PLACES_B + j];
      let least = true;
      for (let di = -1; di <= 1 && least; di++) {
        const row = i + di;
        if (row < 0 || row > PLACES_A) continue;
        for (let dj = -1; dj <= 1; dj++) {
          const column = (j + dj + PLACES_B) % PLACES_B;
          if (grid[row * PLACES_B + column] < here) {
            least = false;
            break;
          }
        }
      }
      if (least) yield { i, j };
    }
  }
}

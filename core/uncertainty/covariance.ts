import { AU_KM, DEG_TO_RAD, SECONDS_PER_DAY } from '../constants';
import { eclipticToIcrf } from '../frames/ecliptic';
import { carried } from '../math/symmetric';
import { cross, unit, type Vec3 } from '../math/vector';
import { type Elements, elementsFromState, stateFromElements } from '../orbit/elements';
import { meanMotion, trueAnomalyFromMean } from '../orbit/kepler';
import { definite } from './definite';

/** What a covariance is given in. */
export type CovarianceFrame = 'ICRF' | 'EclipticJ2000' | 'RTN' | 'TNW';

/** Labels of a covariance of orbital elements; units au, days, degrees, au/d². */
export const ELEMENT_LABELS = [
  'e',
  'q',
  'a',
  'tp',
  'M',
  'node',
  'peri',
  'i',
  'A1',
  'A2',
  'A3',
] as const;
export type ElementLabel = (typeof ELEMENT_LABELS)[number];

/** The state a covariance belongs to, about the case's centre. */
export interface CovarianceState {
  /** In the case's axes, km and km/s. */
  r: Vec3;
  v: Vec3;
  /** Whether those axes are the ecliptic's. */
  ecliptic: boolean;
  /** Gravitational parameter of the centre, km^3/s^2. */
  gm: number;
}

/** Covariance of the state at the epoch and of A1, A2, A3 (9 × 9): ICRF, km, km/s, km/s². */
export interface EpochCovariance {
  matrix: Float64Array;
  /** Eigenvalue that was lifted to zero, of the matrix scaled to unit variances; null when none was. */
  lifted: number | null;
}

const SIZE = 9;

/**
 * A covariance of place and velocity, carried to ICRF axes.
 *
 * @param lowerTriangle 21 entries by rows, km², km²/s, km²/s²
 * @param frame         axes it is given in; RTN and TNW about the case's centre
 * @param state         the state at the epoch, about the case's centre
 * @throws              IndefiniteCovariance
 * Source: CCSDS 502.0-B-3, annex on frames: R along the radius, N along the angular momentum, T = N × R;
 * T along the velocity, N along the angular momentum, W = T × N for TNW.
 */
export function cartesianCovariance(
  lowerTriangle: readonly number[],
  frame: CovarianceFrame,
  state: CovarianceState,
): EpochCovariance {
  const own = symmetric(lowerTriangle);
  const axes = axesOf(frame, state);
  const turn = new Float64Array(SIZE * 6);
  for (let i = 0; i < 3; i++) {
    for (let j = 0; j < 3; j++) {
      turn[i * 6 + j] = axes[j][i];
      turn[(i + 3) * 6 + j + 3] = axes[j][i];
    }
  }
  const { matrix, lifted } = definite(own, 6);
  return { matrix: carried(turn, matrix, 6), lifted };
}

/** The 6 × 6 matrix of 21 lower-triangle entries by rows. */
export function symmetric(lowerTriangle: readonly number[]): Float64Array {
  const out = new Float64Array(36);
  let at = 0;
  for (let i = 0; i < 6; i++) {
    for (let j = 0; j <= i; j++) {
      out[i * 6 + j] = lowerTriangle[at];
      out[j * 6 + i] = lowerTriangle[at];
      at += 1;
    }
  }
  return out;
}

/** Unit vectors of a frame, ICRF: what its first, second and third component count along. */
function axesOf(frame: CovarianceFrame, state: CovarianceState): [Vec3, Vec3, Vec3] {
  const toIcrf = (x: Vec3): Vec3 => (state.ecliptic ? eclipticToIcrf(x) : x);
  const r = toIcrf(state.r);
  const v = toIcrf(state.v);
  const normal = unit(cross(r, v));
  if (frame === 'RTN') return [unit(r), unit(cross(normal, r)), normal];
  if (frame === 'TNW') return [unit(v), normal, cross(unit(v), normal)];
  const basis: [Vec3, Vec3, Vec3] = [
    [1, 0, 0],
    [0, 1, 0],
    [0, 0, 1],
  ];
  if (frame === 'ICRF') return basis;
  return [eclipticToIcrf(basis[0]), eclipticToIcrf(basis[1]), eclipticToIcrf(basis[2])];
}

/**
 * A covariance of orbital elements, carried to the state, ICRF axes.
 *
 * @param labels what its rows stand for; a size (q or a), a phase (tp or M), e, i, node, peri, and any
 *               of A1, A2, A3
 * @param matrix rows × rows; au, days, degrees, au/d²
 * @param state  the state at the epoch, about the case's centre
 * @throws       IndefiniteCovariance; DegenerateOrbit
 * Central differences of the closed-form state: smooth, so that steps of 1e-5 leave 1e-9 relative.
 */
export function elementCovariance(
  labels: readonly ElementLabel[],
  matrix: readonly (readonly number[])[],
  state: CovarianceState,
): EpochCovariance {
  const n = labels.length;
  const nominal = elementsFromState(state.r, state.v, state.gm);
  const jacobian = new Float64Array(SIZE * n);
  for (const [column, label] of labels.entries()) {
    if (label === 'A1' || label === 'A2' || label === 'A3') {
      jacobian[(5 + Number(label[1])) * n + column] = AU_KM / SECONDS_PER_DAY ** 2;
      continue;
    }
    const step = STEPS[label];
    const up = shifted(nominal, labels, label, step, state);
    const down = shifted(nominal, labels, label, -step, state);
    for (let i = 0; i < 6; i++) jacobian[i * n + column] = (up[i] - down[i]) / (2 * step);
  }
  const flat = Float64Array.from(matrix.flat());
  const { matrix: own, lifted } = definite(flat, n);
  return { matrix: carried(jacobian, own, n), lifted };
}

/** Steps of the differences, in the labels' own units. */
const STEPS: Record<Exclude<ElementLabel, 'A1' | 'A2' | 'A3'>, number> = {
  e: 1e-6,
  q: 1e-6,
  a: 1e-6,
  tp: 1e-4,
  M: 1e-4,
  node: 1e-4,
  peri: 1e-4,
  i: 1e-4,
};

/** The state, ICRF, with one of the elements shifted and the others of its set held. */
function shifted(
  nominal: Elements,
  labels: readonly ElementLabel[],
  label: ElementLabel,
  step: number,
  state: CovarianceState,
): number[] {
  const by = (name: ElementLabel): number => (name === label ? step : 0);
  const e = nominal.eccentricity + by('e');
  // The size that the set names is held; q where it names none.
  const q =
    labels.includes('a') && nominal.semiMajorAxisKm !== null
      ? (nominal.semiMajorAxisKm + by('a') * AU_KM) * (1 - e)
      : nominal.periapsisKm + by('q') * AU_KM;
  const motion = meanMotion(q, e, state.gm);
  const mean = labels.includes('M')
    ? nominal.meanAnomalyRad + by('M') * DEG_TO_RAD
    : motion * (nominal.timeFromPeriapsisS - by('tp') * SECONDS_PER_DAY);
  const { r, v } = stateFromElements(
    {
      semiLatusRectumKm: q * (1 + e),
      eccentricity: e,
      inclinationRad: nominal.inclinationRad + by('i') * DEG_TO_RAD,
      nodeRad: nominal.nodeRad + by('node') * DEG_TO_RAD,
      argumentOfPeriapsisRad: nominal.argumentOfPeriapsisRad + by('peri') * DEG_TO_RAD,
      trueAnomalyRad: trueAnomalyFromMean(mean, e),
    },
    state.gm,
  );
  return [...(state.ecliptic ? eclipticToIcrf(r) : r), ...(state.ecliptic ? eclipticToIcrf(v) : v)];
}

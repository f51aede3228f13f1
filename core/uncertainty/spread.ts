import { BODY_INDEX } from '../constants';
import type { Segment } from '../dynamics/propagate';
import { PARAMETERS } from '../dynamics/transition';
import type { Ephemeris } from '../ephemeris';
import { hermiteState } from '../math/hermite';
import { carried, eigenSymmetric } from '../math/symmetric';
import { dot, norm, subtract, type Vec3, vec3 } from '../math/vector';
import { SPREAD } from './spread-layout';

/** Rows within a step of the integration: enough that a straight line between them draws well. */
const ROWS_A_STEP = 4;
/** Standard deviations to either side that the range of distance takes in. */
const RANGE_SIGMAS = 3;
const HALVINGS = 80;

/**
 * First-order spread of the object's place along the trajectory, step by step, for drawing.
 *
 * Between the ends of a step the transition matrix is interpolated (cubic Hermite: its lower rows
 * are the rates of its upper rows), which costs nothing beside integrating it.
 * Accuracy: standard deviations within 0.1 % of the integrated matrix (tests/core/uncertainty).
 */
export class SpreadRecorder {
  /** One array of rows a direction, each in the order of integration. */
  private readonly rows: Record<1 | -1, number[]> = { 1: [], [-1]: [] };
  private readonly object = new Float64Array(6);
  private readonly bodies = new Float64Array(66);
  private readonly ends = [new Float64Array(6), new Float64Array(6), new Float64Array(6)] as const;
  private readonly places = new Float64Array(3 * PARAMETERS);

  /** @param covariance of the state at the epoch and of A1 to A3 (9 × 9) */
  constructor(
    private readonly ephemeris: Ephemeris,
    private readonly covariance: Float64Array,
  ) {}

  /**
   * Appends the rows of a step.
   *
   * @param before    transition matrix at the step's start (54)
   * @param after     and at its end
   * @param endOffset where the trajectory ends in the step; the step's own end when it goes on
   */
  append(segment: Segment, before: Float64Array, after: Float64Array, endOffset: number): void {
    const { startOffset } = segment;
    const rows = this.rows[segment.endOffset > startOffset ? 1 : -1];
    const first = rows.length === 0 ? 0 : 1;
    for (let i = first; i <= ROWS_A_STEP; i++) {
      const offset =
        i === ROWS_A_STEP ? endOffset : startOffset + ((endOffset - startOffset) * i) / ROWS_A_STEP;
      this.interpolate(segment, before, after, offset);
      this.one(segment, offset, rows);
    }
  }

  /** Rows in order of time, SPREAD.stride numbers each; the epoch's once. */
  finish(): Float64Array {
    const { stride } = SPREAD;
    const back = this.rows[-1];
    const count = back.length / stride;
    const from = this.rows[1].length === 0 || count === 0 ? 0 : 1;
    const out = new Float64Array((count - from) * stride + this.rows[1].length);
    for (let i = from; i < count; i++) {
      out.set(back.slice(i * stride, (i + 1) * stride), (count - 1 - i) * stride);
    }
    out.set(this.rows[1], (count - from) * stride);
    return out;
  }

  private interpolate(
    segment: Segment,
    before: Float64Array,
    after: Float64Array,
    offset: number,
  ): void {
    const h = segment.endOffset - segment.startOffset;
    const u = (offset - segment.startOffset) / h;
    const [a, b, out] = this.ends;
    for (let c = 0; c < PARAMETERS; c++) {
      for (let i = 0; i < 6; i++) {
        a[i] = before[i * PARAMETERS + c];
        b[i] = after[i * PARAMETERS + c];
      }
      hermiteState(a, 0, b, 0, h, u, out, 0);
      for (let i = 0; i < 3; i++) this.places[i * PARAMETERS + c] = out[i];
    }
  }

  private one(segment: Segment, offset: number, rows: number[]): void {
    const { object, bodies, ephemeris } = this;
    segment.evaluate(offset, object);
    ephemeris.states(segment.baseSeconds, offset, bodies);
    const place = subtract(vec3(object), vec3(bodies, BODY_INDEX.Earth * 6));
    const own = carried(this.places, this.covariance, PARAMETERS);
    const [lowKm, highKm] = distanceRange(place, own, RANGE_SIGMAS);
    rows.push(segment.baseSeconds + offset);
    rows.push(own[0], own[1], own[2], own[4], own[5], own[8]);
    rows.push(sigmaAlong(place, own), lowKm, highKm);
  }
}

/** First-order standard deviation of the length of `place`, km. */
function sigmaAlong(place: Vec3, covariance: Float64Array): number {
  const length = norm(place);
  if (length === 0) return 0;
  const mapped = carried(
    Float64Array.from(place, (x) => x / length),
    covariance,
    3,
  );
  return Math.sqrt(Math.max(0, mapped[0]));
}

/** An ellipsoid smaller than this is a point: far above where squares lose their digits. */
const NOTHING_KM = 1e-12;

/**
 * Least and greatest distance of an error ellipsoid from the origin.
 *
 * Exact for the ellipsoid, so that the range stays sensible where distance is not linear: the least
 * is zero only when the origin lies inside.
 *
 * @param place      centre, km
 * @param covariance 3 × 3, km²; may be singular
 * @param sigmas     size of the ellipsoid
 * Source: Lagrange's conditions in the principal axes, their one unknown found by halving.
 */
export function distanceRange(
  place: Vec3,
  covariance: Float64Array,
  sigmas: number,
): [number, number] {
  const { values, vectors } = eigenSymmetric(covariance, 3);
  const squares = Array.from(values, (value) => sigmas * sigmas * Math.max(0, value));
  const reach = Math.sqrt(squares[0]);
  const distance = norm(place);
  if (reach < NOTHING_KM) return [distance, distance];
  const parts = [0, 1, 2].map((i) => Math.abs(dot(place, vec3(vectors, 3 * i))));
  return [
    leastDistance(parts, squares, distance),
    greatestDistance(parts, squares, distance, reach),
  ];
}

/** Nearest point: each part shrinks by μ / (q + μ), with the μ that puts it on the ellipsoid. */
function leastDistance(parts: number[], squares: number[], distance: number): number {
  const excess = (mu: number): number => {
    let sum = 0;
    for (let i = 0; i < 3; i++) {
      if (squares[i] > 0) sum += (squares[i] * parts[i] ** 2) / (squares[i] + mu) ** 2;
    }
    return sum - 1;
  };
  const at = (mu: number): number =>
    Math.hypot(
      ...parts.map((part, i) => (squares[i] === 0 ? part : (part * mu) / (squares[i] + mu))),
    );
  if (excess(0) <= 0) return at(0);
  let low = 0;
  let high = distance * Math.sqrt(squares[0]);
  for (let i = 0; i < HALVINGS; i++) {
    const half = (low + high) / 2;
    if (excess(half) > 0) low = half;
    else high = half;
  }
  return at(high);
}

/** Farthest point: each part grows by ν / (ν − q), with ν above the greatest q. */
function greatestDistance(
  parts: number[],
  squares: number[],
  distance: number,
  reach: number,
): number {
  // A place exactly across the long axis has its farthest points on both sides of it: lean to one.
  const own = [Math.max(parts[0], 1e-9 * (distance + reach)), parts[1], parts[2]];
  const top = squares[0];
  const excess = (past: number): number => {
    let sum = 0;
    for (let i = 0; i < 3; i++) {
      if (squares[i] > 0) sum += (squares[i] * own[i] ** 2) / (top - squares[i] + past) ** 2;
    }
    return sum - 1;
  };
  let low = reach * own[0];
  let high = reach * Math.hypot(...own);
  for (let i = 0; i < HALVINGS; i++) {
    const half = (low + high) / 2;
    if (excess(half) > 0) low = half;
    else high = half;
  }
  return Math.hypot(...own.map((part, i) => (part * (top + high)) / (top - squares[i] + high)));
}

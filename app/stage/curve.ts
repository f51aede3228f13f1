import type { Projector } from './projection';

/** Curves of the scene, and the few points that are enough to draw them. */

export interface Curve {
  readonly from: number;
  readonly to: number;
  /** Parts to begin with: fine enough that four chords of a part show its shape. */
  readonly parts: number;
  /** Writes the point of a parameter, km, ICRF axes from the scene's centre, into out[at…at+2]. */
  at(parameter: number, out: Float64Array, at: number): void;
}

/** Points of a curve with their parameters, in order; grows as needed. */
export class CurvePoints {
  count = 0;
  parameters = new Float64Array(256);
  xyz = new Float64Array(768);

  clear(): void {
    this.count = 0;
  }

  push(parameter: number, x: number, y: number, z: number): void {
    if (this.count === this.parameters.length) this.grow();
    this.parameters[this.count] = parameter;
    this.xyz[3 * this.count] = x;
    this.xyz[3 * this.count + 1] = y;
    this.xyz[3 * this.count + 2] = z;
    this.count += 1;
  }

  private grow(): void {
    const parameters = new Float64Array(2 * this.parameters.length);
    parameters.set(this.parameters);
    this.parameters = parameters;
    const xyz = new Float64Array(2 * this.xyz.length);
    xyz.set(this.xyz);
    this.xyz = xyz;
  }
}

/** A chord may stray this far from its curve on the picture, px. */
export const TOLERANCE_PX = 0.35;
/** A curve twice as far off its chord as the probes say is still within the bound. */
const DEVIATION_MARGIN = 2;
/** 1 au split this often is below a metre. */
const DEEPEST = 40;
const MOST_POINTS = 3000;

const probe = new Float64Array(9);
const ends = new Float64Array(6);

/**
 * The points of a curve whose chords stay within TOLERANCE_PX of it on the picture; what lies off
 * the picture gets as few as possible.
 *
 * @param curve      any curve; sampled at a quarter, a half and three quarters of each part
 * @param projector  the picture; a margin of its shorter side around it counts as off
 * @param out        receives the points, first and last included
 */
export function decimate(curve: Curve, projector: Projector, out: CurvePoints): void {
  out.clear();
  const { from, to, parts } = curve;
  curve.at(from, ends, 0);
  out.push(from, ends[0], ends[1], ends[2]);
  let x = ends[0];
  let y = ends[1];
  let z = ends[2];
  let start = from;
  for (let i = 1; i <= parts; i++) {
    const end = i === parts ? to : from + ((to - from) * i) / parts;
    curve.at(end, ends, 0);
    const [ex, ey, ez] = ends;
    split(curve, projector, out, start, x, y, z, end, ex, ey, ez, 0);
    start = end;
    x = ex;
    y = ey;
    z = ez;
  }
}

function split(
  curve: Curve,
  projector: Projector,
  out: CurvePoints,
  u0: number,
  x0: number,
  y0: number,
  z0: number,
  u1: number,
  x1: number,
  y1: number,
  z1: number,
  depth: number,
): void {
  const middle = (u0 + u1) / 2;
  curve.at((u0 + middle) / 2, probe, 0);
  curve.at(middle, probe, 3);
  curve.at((middle + u1) / 2, probe, 6);
  const dx = x1 - x0;
  const dy = y1 - y0;
  const dz = z1 - z0;
  const chord2 = dx * dx + dy * dy + dz * dz;
  let deviation = 0;
  for (let i = 0; i < 9; i += 3) {
    const px = probe[i] - x0;
    const py = probe[i + 1] - y0;
    const pz = probe[i + 2] - z0;
    const share = chord2 > 0 ? Math.min(1, Math.max(0, (px * dx + py * dy + pz * dz) / chord2)) : 0;
    const off = Math.hypot(px - share * dx, py - share * dy, pz - share * dz);
    if (off > deviation) deviation = off;
  }
  const radius = Math.sqrt(chord2) / 2 + DEVIATION_MARGIN * deviation;
  const mx = probe[3];
  const my = probe[4];
  const mz = probe[5];
  const enough =
    depth >= DEEPEST ||
    out.count >= MOST_POINTS ||
    isFineEnough(projector, (x0 + x1) / 2, (y0 + y1) / 2, (z0 + z1) / 2, radius, deviation);
  if (enough) {
    out.push(u1, x1, y1, z1);
    return;
  }
  split(curve, projector, out, u0, x0, y0, z0, middle, mx, my, mz, depth + 1);
  split(curve, projector, out, middle, mx, my, mz, u1, x1, y1, z1, depth + 1);
}

/** Whether a piece within a ball is off the picture, or strays too little from its chord to be seen. */
function isFineEnough(
  projector: Projector,
  x: number,
  y: number,
  z: number,
  radius: number,
  deviation: number,
): boolean {
  const { eye, right, up, forward, focalPx } = projector;
  const vx = x - eye[0];
  const vy = y - eye[1];
  const vz = z - eye[2];
  const depth = vx * forward[0] + vy * forward[1] + vz * forward[2];
  if (depth < -radius) return true;
  const across = Math.abs(vx * right[0] + vy * right[1] + vz * right[2]);
  const upward = Math.abs(vx * up[0] + vy * up[1] + vz * up[2]);
  const halfWidth = projector.widthPx / 2;
  const halfHeight = projector.heightPx / 2;
  if (focalPx * across - halfWidth * depth > radius * Math.hypot(focalPx, halfWidth)) return true;
  if (focalPx * upward - halfHeight * depth > radius * Math.hypot(focalPx, halfHeight)) return true;
  const nearest = Math.hypot(vx, vy, vz) - radius;
  return nearest > 0 && deviation * focalPx <= TOLERANCE_PX * nearest * cosineOfCorner(projector);
}

/** A length is seen longer at the picture's corner than in its middle, by one over this. */
function cosineOfCorner({ widthPx, heightPx, focalPx }: Projector): number {
  return focalPx / Math.hypot(focalPx, widthPx / 2, heightPx / 2);
}

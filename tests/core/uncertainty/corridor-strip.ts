import { normalsOf, uniformsOf } from '../../../core/math/random';
import { cross, unit, type Vec3 } from '../../../core/math/vector';
import { CLONE_OUTCOME, CLONE_ROW } from '../../../core/uncertainty/clones';

/** Invented impacting clones on a strip of known shape. */

export interface StripShape {
  /** Pole of the great circle that the strip follows. */
  poleLatitudeRad: number;
  poleLongitudeRad: number;
  /** Angle along the circle at which it starts, counted from an arbitrary place, and its extent. */
  fromRad: number;
  extentRad: number;
  /** Across, 1 σ. */
  sigmaRad: number;
  count: number;
  seed: number;
  /** Entry at the start of the strip, and how much later at its end. */
  tdbSeconds: number;
  durationS: number;
}

/** Unit vectors: two in the plane of the circle, and its pole. */
export function circleOf(shape: StripShape): [Vec3, Vec3, Vec3] {
  const { poleLatitudeRad: lat, poleLongitudeRad: lon } = shape;
  const pole: Vec3 = [Math.cos(lat) * Math.cos(lon), Math.cos(lat) * Math.sin(lon), Math.sin(lat)];
  const a = unit(cross(Math.abs(pole[2]) < 0.7 ? [0, 0, 1] : [1, 0, 0], pole));
  return [a, cross(pole, a), pole];
}

/** Speed rises by 2 km/s along the strip, from 12; the angle falls from −20° to −60°. */
export function stripRows(shape: StripShape): Float64Array {
  const { count, seed } = shape;
  const uniforms = new Float64Array(count);
  const normals = new Float64Array(count);
  uniformsOf(seed, 1, 0, count, 1, uniforms);
  normalsOf(seed, 2, 0, count, 1, normals);
  const [a, b, pole] = circleOf(shape);
  const rows = new Float64Array(count * CLONE_ROW.size).fill(Number.NaN);
  for (let i = 0; i < count; i++) {
    const at = i * CLONE_ROW.size;
    const angle = shape.fromRad + uniforms[i] * shape.extentRad;
    const off = normals[i] * shape.sigmaRad;
    const part = (k: 0 | 1 | 2): number =>
      Math.cos(off) * (Math.cos(angle) * a[k] + Math.sin(angle) * b[k]) + Math.sin(off) * pole[k];
    const [x, y, z] = [part(0), part(1), part(2)];
    rows[at + CLONE_ROW.clone] = i;
    rows[at + CLONE_ROW.outcome] = CLONE_OUTCOME.impact;
    rows[at + CLONE_ROW.entryTdbSeconds] = shape.tdbSeconds + uniforms[i] * shape.durationS;
    rows[at + CLONE_ROW.groundTdbSeconds] = rows[at + CLONE_ROW.entryTdbSeconds] + 10;
    rows[at + CLONE_ROW.entryAirSpeedKmS] = 12 + 2 * uniforms[i];
    rows[at + CLONE_ROW.entryAirFlightPathAngleRad] = ((-20 - 40 * uniforms[i]) * Math.PI) / 180;
    for (const key of [CLONE_ROW.entryLatitudeRad, CLONE_ROW.groundLatitudeRad]) {
      rows[at + key] = Math.atan2(z, Math.hypot(x, y));
      rows[at + key + 1] = Math.atan2(y, x);
    }
  }
  return rows;
}

export function joined(...parts: Float64Array[]): Float64Array {
  const out = new Float64Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    out.set(part, at);
    at += part.length;
  }
  return out;
}

import { dot, subtract, type Vec3 } from '../worker/core-geometry';

/**
 * What a globe hides, worked out exactly on the segment instead of with a depth buffer.
 *
 * A spheroid becomes a sphere when space is stretched along its axis; lines of sight stay straight
 * lines. Behind a sphere lies the part of the tangent cone from the eye that is beyond the plane of
 * the touching circle.
 */

export interface Globe {
  /** km from the scene's centre, ICRF axes. */
  readonly centre: Vec3;
  readonly radiusKm: number;
  /** Unit vector of the short axis, and how much space is stretched along it (0 for a sphere). */
  readonly axis: Vec3;
  readonly stretch: number;
}

/** Part of a segment, shares of its length. */
export interface Share {
  from: number;
  to: number;
}

/** A globe as seen from an eye. */
export class Occluder {
  private readonly axis: Vec3;
  private readonly stretch: number;
  /** From the eye to the centre, stretched. */
  private readonly c: Vec3;
  /** Squared length of the tangent from the eye. */
  private readonly tangent2: number;

  constructor(globe: Globe, eye: Vec3) {
    this.axis = globe.axis;
    this.stretch = globe.stretch;
    this.c = stretched(subtract(globe.centre, eye), this.axis, this.stretch);
    this.tangent2 = dot(this.c, this.c) - globe.radiusKm * globe.radiusKm;
  }

  /** Whether the globe hides a point (from the eye, km). */
  hides(v: Vec3): boolean {
    const s = stretched(v, this.axis, this.stretch);
    const along = dot(s, this.c);
    return this.tangent2 > 0 && along > this.tangent2 && along * along > dot(s, s) * this.tangent2;
  }

  /**
   * The hidden part of a segment: a single one, because the shadow is convex.
   *
   * @param a    its start from the eye, km
   * @param b    its end from the eye, km
   * @param out  receives the part as shares of the segment
   * @returns    false when nothing of it is hidden
   */
  hiddenPart(a: Vec3, b: Vec3, out: Share): boolean {
    const m = this.tangent2;
    if (m <= 0) return false;
    const s = stretched(a, this.axis, this.stretch);
    const w = subtract(stretched(b, this.axis, this.stretch), s);
    const along = dot(s, this.c);
    const alongW = dot(w, this.c);
    out.from = 0;
    out.to = 1;
    if (!keepAbove(along - m, alongW, out)) return false;
    const q0 = along * along - dot(s, s) * m;
    const q1 = 2 * (along * alongW - dot(s, w) * m);
    const q2 = alongW * alongW - dot(w, w) * m;
    const discriminant = q1 * q1 - 4 * q2 * q0;
    if (discriminant <= 0) return q2 > 0 || (q2 === 0 && q0 > 0);
    // The stable pair of roots: no difference of nearly equal numbers.
    const k = -0.5 * (q1 + (q1 >= 0 ? 1 : -1) * Math.sqrt(discriminant));
    const r0 = k / q2;
    const r1 = q0 / k;
    const low = Math.min(r0, r1);
    const high = Math.max(r0, r1);
    if (q2 < 0) {
      out.from = Math.max(out.from, low);
      out.to = Math.min(out.to, high);
    } else if (alongW > 0) {
      out.from = Math.max(out.from, high);
    } else {
      out.to = Math.min(out.to, low);
    }
    return out.from < out.to;
  }

  /** The part of a chord of the globe's own surface that faces the eye; false when none does. */
  facingPart(a: Vec3, b: Vec3, out: Share): boolean {
    const m = this.tangent2;
    const along = dot(stretched(a, this.axis, this.stretch), this.c);
    const alongEnd = dot(stretched(b, this.axis, this.stretch), this.c);
    out.from = 0;
    out.to = 1;
    return keepAbove(m - along, along - alongEnd, out);
  }
}

/** Space stretched along an axis (unit vector). */
export function stretched(v: Vec3, axis: Vec3, stretch: number): Vec3 {
  if (stretch === 0) return v;
  const k = stretch * dot(v, axis);
  return [v[0] + k * axis[0], v[1] + k * axis[1], v[2] + k * axis[2]];
}

/** Cuts a part down to where value + slope t > 0; false when nothing is left. */
export function keepAbove(value: number, slope: number, part: Share): boolean {
  const zero = -value / slope;
  if (slope > 0) part.from = Math.max(part.from, zero);
  else if (slope < 0) part.to = Math.min(part.to, zero);
  else if (!(value > 0)) return false;
  return part.from < part.to;
}

/** The Earth's figure as a globe: equatorial radius, flattened along a pole. */
export function spheroid(centre: Vec3, radiusKm: number, flattening: number, pole: Vec3): Globe {
  return { centre, radiusKm, axis: pole, stretch: 1 / (1 - flattening) - 1 };
}

/** A sphere as a globe. */
export function sphere(centre: Vec3, radiusKm: number): Globe {
  return { centre, radiusKm, axis: [0, 0, 1], stretch: 0 };
}

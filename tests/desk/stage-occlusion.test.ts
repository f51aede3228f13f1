import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Occluder, type Share, spheroid } from '../../app/stage/occlusion';
import { add, scale, subtract, type Vec3 } from '../../core/math/vector';

const A = 6378.137;
const FLATTENING = 1 / 298.257;
const B = A * (1 - FLATTENING);
const GLOBE = spheroid([0, 0, 0], A, FLATTENING, [0, 0, 1]);

/**
 * Whether the line of sight from the eye meets the ellipsoid before the point: the quadratic of
 * x²/a² + y²/a² + z²/b² = 1 along the ray, solved as in any textbook on ray tracing.
 */
function isHidden(eye: Vec3, p: Vec3): boolean {
  const d = subtract(p, eye);
  const form = (u: Vec3, v: Vec3) =>
    (u[0] * v[0] + u[1] * v[1]) / (A * A) + (u[2] * v[2]) / (B * B);
  const [qa, qb, qc] = [form(d, d), 2 * form(eye, d), form(eye, eye) - 1];
  const root = qb * qb - 4 * qa * qc;
  if (root <= 0) return false;
  const first = (-qb - Math.sqrt(root)) / (2 * qa);
  return first > 0 && first < 1;
}

const spread = (from: number, to: number) => fc.double({ min: from, max: to, noNaN: true });
const direction = fc.tuple(spread(-Math.PI, Math.PI), spread(-1, 1)).map(([turn, z]): Vec3 => {
  const across = Math.sqrt(1 - z * z);
  return [across * Math.cos(turn), across * Math.sin(turn), z];
});
/** A point outside the globe. */
const point = fc.tuple(direction, spread(A + 10, 30000)).map(([u, r]) => scale(u, r));
const outside = (p: readonly number[], radius: number) => Math.hypot(...p) > radius;

describe('what a globe hides', () => {
  it('is, on any segment, what a ray from the eye cannot reach', () => {
    fc.assert(
      fc.property(point, point, point, (eye, from, to) => {
        const globe = new Occluder(GLOBE, eye);
        const [a, b] = [subtract(from, eye), subtract(to, eye)];
        const part: Share = { from: 0, to: 1 };
        const some = globe.hiddenPart(a, b, part);
        for (let k = 1; k < 40; k++) {
          const t = k / 40;
          const p = add(from, scale(subtract(to, from), t));
          // Inside the globe both may answer as they like: nothing is drawn there.
          if (!outside(p, A + 1)) continue;
          const near = some && Math.min(Math.abs(t - part.from), Math.abs(t - part.to)) < 1e-9;
          if (near) continue;
          expect(some && t > part.from && t < part.to).toBe(isHidden(eye, p));
          expect(globe.hides(subtract(p, eye))).toBe(isHidden(eye, p));
        }
      }),
      { numRuns: 400 },
    );
  });

  it('is nothing when the eye is inside', () => {
    const globe = new Occluder(GLOBE, [100, 0, 0]);
    expect(globe.hiddenPart([1e4, 0, 0], [2e4, 0, 0], { from: 0, to: 1 })).toBe(false);
    expect(globe.hides([1e4, 0, 0])).toBe(false);
  });

  it('cuts a line through the middle of the disc exactly at the limb', () => {
    // Seen from far away on x, the shadow of the globe is a cylinder of radius a about x.
    const eye: Vec3 = [1e9, 0, 0];
    const part: Share = { from: 0, to: 1 };
    const globe = new Occluder(GLOBE, eye);
    const behind: [Vec3, Vec3] = [
      [-20000, -10000, 0],
      [-20000, 10000, 0],
    ];
    expect(globe.hiddenPart(subtract(behind[0], eye), subtract(behind[1], eye), part)).toBe(true);
    // The cone is 1e-5 wider there than a cylinder; a km of 20 000 is a seventh of a pixel.
    expect(-10000 + 20000 * part.from).toBeCloseTo(-A, 0);
    expect(-10000 + 20000 * part.to).toBeCloseTo(A, 0);
  });
});

describe('the face of a globe', () => {
  it('is the half whose outward normal leans towards the eye', () => {
    fc.assert(
      fc.property(direction, direction, point, (p, q, eye) => {
        const onSurface = (u: readonly number[]): Vec3 => {
          const k = 1 / Math.hypot(u[0] / A, u[1] / A, u[2] / B);
          return [u[0] * k, u[1] * k, u[2] * k];
        };
        const [from, to] = [onSurface(p), onSurface(q)];
        const faces = (u: Vec3) =>
          (u[0] * eye[0] + u[1] * eye[1]) / (A * A) + (u[2] * eye[2]) / (B * B) > 1;
        const part: Share = { from: 0, to: 1 };
        const globe = new Occluder(GLOBE, eye);
        const some = globe.facingPart(subtract(from, eye), subtract(to, eye), part);
        expect(some && part.from === 0).toBe(faces(from));
        expect(some && part.to === 1).toBe(faces(to));
      }),
    );
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { targetPlane } from '../../../core/encounter/target-plane';
import { add, cross, dot, norm, scale, unit, type Vec3 } from '../../../core/math/vector';

const POLE: Vec3 = [0, -0.3977771559319137, 0.9174820620691818];

/** A state far out on an incoming asymptote, built from B and S themselves. */
function incoming(s: Vec3, b: Vec3, speed: number, distance: number): { r: Vec3; v: Vec3 } {
  return { r: add(b, scale(s, -distance)), v: scale(s, speed) };
}

const direction = fc
  .tuple(
    fc.double({ min: -1, max: 1, noNaN: true }),
    fc.double({ min: 0, max: 2 * Math.PI, noNaN: true }),
  )
  .map(
    ([z, a]): Vec3 => [Math.sqrt(1 - z * z) * Math.cos(a), Math.sqrt(1 - z * z) * Math.sin(a), z],
  );

describe('the target plane', () => {
  it('gives back the B vector that the asymptote was built from, on both pairs of axes', () => {
    fc.assert(
      fc.property(
        direction,
        direction,
        direction,
        fc.double({ min: 1, max: 1e6, noNaN: true }),
        (s, across, planet, size) => {
          fc.pre(norm(cross(s, across)) > 1e-3 && norm(cross(s, POLE)) > 1e-3);
          fc.pre(norm(cross(s, planet)) > 1e-3);
          const b = scale(unit(cross(s, across)), size);
          const { r, v } = incoming(s, b, 12, 1e6);
          const plane = targetPlane(r, v, s, 12, POLE, scale(planet, 30), 398600.4, 6378.137);
          // Rounding of r × v at 1e6 km: 1e6 * 2.2e-16 * a few.
          expect(plane.bDotTKm).toBeCloseTo(dot(b, plane.t), 8);
          expect(plane.bDotRKm).toBeCloseTo(dot(b, plane.r), 8);
          expect(Math.hypot(plane.bDotTKm, plane.bDotRKm)).toBeCloseTo(size, 7);
          expect(Math.hypot(plane.xiKm, plane.zetaKm)).toBeCloseTo(size, 7);
        },
      ),
    );
  });

  it('has T in the ecliptic, R = S × T, and ζ against the motion of the planet', () => {
    fc.assert(
      fc.property(direction, direction, (s, planet) => {
        fc.pre(norm(cross(s, POLE)) > 1e-3 && norm(cross(s, planet)) > 1e-3);
        const { r, v } = incoming(s, scale(unit(cross(s, POLE)), 5e4), 7, 1e6);
        const plane = targetPlane(r, v, s, 7, POLE, planet, 398600.4, 6378.137);
        expect(dot(plane.t, POLE)).toBeCloseTo(0, 12);
        expect(norm(plane.t)).toBeCloseTo(1, 12);
        expect(dot(cross(s, plane.t), plane.r)).toBeCloseTo(1, 12);
        expect(dot(plane.zeta, planet)).toBeLessThan(0);
        expect(dot(plane.zeta, s)).toBeCloseTo(0, 12);
        // ξ, S (η), ζ are right-handed.
        expect(dot(cross(plane.xi, s), plane.zeta)).toBeCloseTo(1, 12);
      }),
    );
  });

  it('has the impact radius whose hyperbola grazes the surface', () => {
    // Energy and angular momentum between infinity and a periapsis at the radius R:
    // b v∞ = R v_p, v_p² = v∞² + 2GM/R.
    const gm = 398600.4;
    const radius = 6378.137;
    for (const speed of [0.5, 5, 11.2, 30]) {
      const plane = targetPlane(
        [0, 1e5, -1e6],
        [0, 0, speed],
        [0, 0, 1],
        speed,
        POLE,
        [1, 0, 0],
        gm,
        radius,
      );
      const periapsisSpeed = Math.sqrt(speed ** 2 + (2 * gm) / radius);
      expect(plane.impactRadiusKm * speed).toBeCloseTo(radius * periapsisSpeed, 6);
    }
  });
});

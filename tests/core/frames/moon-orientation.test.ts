import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { moonBodyFixed, selenographic } from '../../../core/frames/moon-orientation';
import { cross, dot, norm, subtract, vec3 } from '../../../core/math/vector';

const seconds = fc.double({ min: -1.26e9, max: 1.9e9, noNaN: true });

describe('moonBodyFixed', () => {
  it('gives a proper rotation at every moment', () => {
    fc.assert(
      fc.property(seconds, (t) => {
        const m = moonBodyFixed(t);
        const [x, y, z] = [vec3(m), vec3(m, 3), vec3(m, 6)];
        for (const row of [x, y, z]) expect(Math.abs(norm(row) - 1)).toBeLessThan(1e-15);
        expect(Math.abs(dot(x, y))).toBeLessThan(1e-15);
        expect(norm(subtract(cross(x, y), z))).toBeLessThan(1e-15);
      }),
    );
  });

  it('keeps its equator 1.543° from the ecliptic', () => {
    // Cassini's second law: 1°32′32.7″ (IAU, as in Meeus 1998, ch. 53), from memory; 0.06° for the
    // physical librations and the forced nutation of the formulae.
    fc.assert(
      fc.property(seconds, (t) => {
        const obliquity = (84381.448 * Math.PI) / 648000;
        const pole = vec3(moonBodyFixed(t), 6);
        const tilt = Math.acos(dot(pole, [0, -Math.sin(obliquity), Math.cos(obliquity)]));
        expect(Math.abs((tilt * 180) / Math.PI - 1.543)).toBeLessThan(0.06);
      }),
    );
  });
});

describe('selenographic', () => {
  it('has longitude 0 on x, 90° east on y and latitude 90° on z', () => {
    expect(selenographic([1737.4, 0, 0])).toEqual({
      latitudeRad: 0,
      longitudeRad: 0,
      radiusKm: 1737.4,
    });
    expect(selenographic([0, 1737.4, 0]).longitudeRad).toBe(Math.PI / 2);
    expect(selenographic([0, 0, -2]).latitudeRad).toBe(-Math.PI / 2);
    expect(selenographic([0, 0, 0])).toEqual({ latitudeRad: 0, longitudeRad: 0, radiusKm: 0 });
  });
});

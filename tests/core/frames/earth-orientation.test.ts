import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { celestialToTerrestrial, earthOrientation } from '../../../core/frames/earth-orientation';
import { cross, dot, norm, subtract, vec3 } from '../../../core/math/vector';

/** 1960 to 2060. */
const seconds = fc.double({ min: -1.26e9, max: 1.9e9, noNaN: true });

describe('earthOrientation', () => {
  it('gives a proper rotation at every moment', () => {
    fc.assert(
      fc.property(seconds, (t) => {
        const m = celestialToTerrestrial(earthOrientation(t));
        const [a, b, c] = [vec3(m), vec3(m, 3), vec3(m, 6)];
        // Some units in the last place of 1.
        for (const row of [a, b, c]) expect(Math.abs(norm(row) - 1)).toBeLessThan(1e-15);
        expect(Math.abs(dot(a, b))).toBeLessThan(1e-15);
        expect(norm(subtract(cross(a, b), c))).toBeLessThan(1e-15);
      }),
    );
  });

  it('counts the rotation angle on without reducing it to a turn', () => {
    fc.assert(
      fc.property(fc.double({ min: 6e8, max: 1.9e9, noNaN: true }), (t) => {
        // After the last leap second (2017): one sidereal day of UT1 (IERS Conventions 2010, eq. 5.15)
        // adds one turn. TDB − UTC changes by up to 29 µs in that time, which is 2.1e-9 rad.
        const turn = earthOrientation(t + 86400 / 1.00273781191135448).eraRad;
        expect(Math.abs(turn - earthOrientation(t).eraRad - 2 * Math.PI)).toBeLessThan(3e-9);
      }),
    );
  });

  it('steps back by one second of rotation at a leap second, as UT1 = UTC implies', () => {
    // End of 2016-12-31: TDB − UTC = 36 + 32.184 s before, 37 + 32.184 s after.
    const after = (57754 - 51544.5) * 86400 + 69.184;
    const [a, b] = [earthOrientation(after - 0.001), earthOrientation(after + 0.001)];
    const second = (2 * Math.PI * 1.00273781191135448) / 86400;
    expect(b.eraRad - a.eraRad).toBeCloseTo(-0.998 * second, 9);
  });
});

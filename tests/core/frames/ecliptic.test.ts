import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ECLIPTIC_POLE_ICRF, eclipticToIcrf, icrfToEcliptic } from '../../../core/frames/ecliptic';
import { dot, norm, subtract, type Vec3 } from '../../../core/math/vector';

/** km, to the millimetre: products of denormal numbers lose their relative accuracy. */
const component = fc.integer({ min: -1e15, max: 1e15 }).map((millimetres) => millimetres / 1e6);
const vector = fc.tuple(component, component, component);

describe('ecliptic axes', () => {
  it('have their pole 23.4392911° from that of ICRF, towards −y', () => {
    // Obliquity of J2000 in degrees: Lieske et al. (1977) as given in the Explanatory Supplement
    // (1992), 23°26′21.448″.
    const obliquity = ((23 * 60 + 26) * 60 + 21.448) * (Math.PI / 648000);
    const expected: Vec3 = [0, -Math.sin(obliquity), Math.cos(obliquity)];
    expect(norm(subtract(ECLIPTIC_POLE_ICRF, expected))).toBeLessThan(1e-15);
    expect(norm(subtract(eclipticToIcrf([0, 0, 1]), expected))).toBeLessThan(1e-15);
  });

  it('keep the equinox where it is', () => {
    expect(eclipticToIcrf([1, 0, 0])).toEqual([1, 0, 0]);
  });

  it('turn there and back to the same vector and keep lengths and angles', () => {
    fc.assert(
      fc.property(vector, vector, (a, b) => {
        const size = norm(a) * norm(b);
        // Some units in the last place.
        expect(norm(subtract(icrfToEcliptic(eclipticToIcrf(a)), a))).toBeLessThanOrEqual(
          1e-15 * norm(a),
        );
        expect(Math.abs(dot(eclipticToIcrf(a), eclipticToIcrf(b)) - dot(a, b))).toBeLessThanOrEqual(
          2e-15 * size,
        );
      }),
    );
  });
});

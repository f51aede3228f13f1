import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { across, covarianceTimes, shadow } from '../../app/stage/tube';
import { dot, unit, type Vec3 } from '../../app/worker/core-geometry';
import { SPREAD } from '../../app/worker/spread';

const number = fc.double({ min: -1e4, max: 1e4, noNaN: true });
const vectors = fc.tuple(number, number, number);
const directions = vectors.filter((x) => Math.hypot(...x) > 1).map((x) => unit(x));

/** Row whose covariance is F Fᵀ of three columns; zero columns make it singular. */
const rowOf = (columns: readonly Vec3[]): Float64Array => {
  const row = new Float64Array(SPREAD.stride);
  const at = (i: 0 | 1 | 2, j: 0 | 1 | 2): number =>
    columns.reduce((sum, column) => sum + column[i] * column[j], 0);
  row.set([at(0, 0), at(0, 1), at(0, 2), at(1, 1), at(1, 2), at(2, 2)], SPREAD.covariance);
  return row;
};

describe('the cross-section of the tube', () => {
  it('lies in a plane across the flight, whose axes are unit and perpendicular', () => {
    fc.assert(
      fc.property(directions, (direction) => {
        const [e, f] = across(direction);
        // Rounding of unit vectors.
        for (const x of [dot(e, f), dot(e, direction), dot(f, direction)]) {
          expect(Math.abs(x)).toBeLessThan(1e-12);
        }
        expect(dot(e, e)).toBeCloseTo(1, 12);
        expect(dot(f, f)).toBeCloseTo(1, 12);
      }),
    );
  });

  it('reaches three standard deviations in every direction of the plane, of any rank', () => {
    fc.assert(
      fc.property(
        fc.array(vectors, { minLength: 0, maxLength: 3 }),
        directions,
        fc.double({ min: 0, max: 6.283, noNaN: true }),
        (columns, direction, angle) => {
          const row = rowOf(columns);
          const [e, f] = across(direction);
          const { first, second } = shadow(row, e, f);
          const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
          const n: Vec3 = [
            cos * e[0] + sin * f[0],
            cos * e[1] + sin * f[1],
            cos * e[2] + sin * f[2],
          ];
          const sigma = Math.sqrt(Math.max(0, dot(n, covarianceTimes(row, n))));
          const reach = Math.hypot(
            first[0] * cos + first[1] * sin,
            second[0] * cos + second[1] * sin,
          );
          const size = columns.reduce((sum, x) => sum + Math.hypot(...x), 0);
          // A root of the rounding of squares as large as the greatest.
          expect(Math.abs(reach - 3 * sigma)).toBeLessThan(1e-6 * size + 1e-12);
        },
      ),
    );
  });
});

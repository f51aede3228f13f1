import { describe, expect, it } from 'vitest';
import type { Vec3 } from '../../core/math/vector';
import { elementsFromState } from '../../core/orbit/elements';
import { hyperbolaFromState } from '../../core/orbit/hyperbola';
import { propagateTwoBody } from '../../core/orbit/propagate';
import reference from './data/orbit-integration.json';

/**
 * Two-body motion against numerical integration (scipy DOP853, rtol 1e-13), which knows no formula
 * of Kepler motion; the generating script is in the data file.
 */

const apart = (a: Vec3, b: Vec3): number => Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
const rows = reference.rows.map((row) => ({
  ...row,
  r: row.r as unknown as Vec3,
  v: row.v as unknown as Vec3,
  rAfter: row.rAfter as unknown as Vec3,
  vAfter: row.vAfter as unknown as Vec3,
}));

describe('two-body motion lands where numerical integration does', () => {
  // Tolerance: how far the integration itself still moves between rtol 1e-12 and 1e-13, a bound of
  // its own error (1e-14 to 1e-11 of the distance, most of it along the track).
  it.each(rows)('on $name', ({ r, v, gm, dtS, rAfter, vAfter, ownErrorKm, ownErrorKmS }) => {
    const ours = propagateTwoBody(r, v, gm, dtS);
    expect(apart(ours.r, rAfter)).toBeLessThan(ownErrorKm);
    expect(apart(ours.v, vAfter)).toBeLessThan(ownErrorKmS);
  });

  it.each(rows)('and back again on $name', ({ r, v, gm, dtS, rAfter, vAfter, ownErrorKm }) => {
    // From the integrated end backwards: its error grows by the same factor that it grew by.
    const ours = propagateTwoBody(rAfter, vAfter, gm, -dtS);
    const speed = Math.hypot(...v);
    const scale = 1 + (speed * Math.abs(dtS)) / Math.hypot(...r);
    expect(apart(ours.r, r)).toBeLessThan(10 * scale * ownErrorKm);
  });
});

describe('the integrated end has the elements of the start', () => {
  it.each(rows)('on $name', ({ r, v, gm, rAfter, vAfter, dtS }) => {
    const before = elementsFromState(r, v, gm);
    const after = elementsFromState(rAfter, vAfter, gm);
    // 1e-9: the integration's 1e-11 in place and speed, times distance over semi-latus rectum.
    expect(Math.abs(after.eccentricity - before.eccentricity)).toBeLessThan(1e-9);
    expect(Math.abs(after.periapsisKm / before.periapsisKm - 1)).toBeLessThan(1e-9);
    expect(Math.abs(after.inclinationRad - before.inclinationRad)).toBeLessThan(1e-9);
    const elapsed = after.timeFromPeriapsisS - before.timeFromPeriapsisS - dtS;
    const period = after.periodS ?? Number.POSITIVE_INFINITY;
    const turns = Number.isFinite(period) ? period * Math.round(elapsed / period) : 0;
    // 1e-9 of the time run: that error of the elements, over the time.
    expect(Math.abs(elapsed - turns)).toBeLessThan(1e-9 * (Math.abs(dtS) + Math.abs(turns)));
  });

  it.each(rows.filter(({ name }) => name.includes('pass of the Earth')))(
    'and the hyperbola, on $name',
    ({ r, v, gm, rAfter, vAfter, dtS }) => {
      const before = hyperbolaFromState(r, v, gm);
      const after = hyperbolaFromState(rAfter, vAfter, gm);
      if (before === null || after === null) throw new Error('expected a hyperbola');
      expect(apart(before.incomingAsymptote, after.incomingAsymptote)).toBeLessThan(1e-9);
      expect(apart(before.periapsisDirection, after.periapsisDirection)).toBeLessThan(1e-9);
      expect(Math.abs(before.impactParameterKm - after.impactParameterKm)).toBeLessThan(1e-3);
      // 1e-3 s of a day and more: 1e-9 of it, as above.
      expect(before.timeToPeriapsisS - after.timeToPeriapsisS - dtS).toBeCloseTo(0, 3);
    },
  );
});

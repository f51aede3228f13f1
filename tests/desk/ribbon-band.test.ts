import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bandAlong } from '../../app/ribbon/band';
import { distanceCurve } from '../../app/ribbon/curve';
import { bandOutline, ribbonGeometry } from '../../app/ribbon/geometry';
import { linearTimeScale } from '../../app/ribbon/time-scale';
import { SPREAD, Spread } from '../../app/worker/spread';
import { evenTimes, straightDistance, straightTrajectory } from './ribbon-straight-path';

const DAY = 86400;
const SHEET = {
  widthPx: 1000,
  heightPx: 158,
  leftPx: 100,
  rightPx: 80,
  topPx: 4,
  bottomPx: 34,
  rowPx: 12,
  measure: (text: string) => 6 * text.length,
};

/** A range of so many km to either side of the straight path's distance, never below zero. */
const cases = fc
  .record({
    missKm: fc.double({ min: 1000, max: 1e6, noNaN: true }),
    speedKmS: fc.double({ min: 1, max: 30, noNaN: true }),
    rangeKm: fc.double({ min: 0, max: 1e7, noNaN: true }),
    rows: fc.integer({ min: 2, max: 300 }),
  })
  .map(({ missKm, speedKmS, rangeKm, rows }) => {
    const path = { missKm, speedKmS, times: evenTimes(-30 * DAY, 30 * DAY, 600) };
    const values = new Float64Array(rows * SPREAD.stride);
    for (const [i, t] of evenTimes(-30 * DAY, 30 * DAY, rows).entries()) {
      const km = straightDistance(path, t);
      values[i * SPREAD.stride] = t;
      values[i * SPREAD.stride + SPREAD.low] = Math.max(0, km - rangeKm);
      values[i * SPREAD.stride + SPREAD.high] = km + rangeKm;
    }
    return { trajectory: straightTrajectory(path), spread: new Spread(values), rangeKm };
  });

describe('the band of the ribbon', () => {
  it('is finite, holds its curve and never goes below zero', () => {
    fc.assert(
      fc.property(cases, ({ trajectory, spread }) => {
        const points = distanceCurve(
          trajectory,
          'object',
          linearTimeScale(-30 * DAY, 30 * DAY),
          300,
        );
        const band = bandAlong(points, spread, trajectory);
        if (band === null) throw new Error('no band');
        for (let i = 1; i < points.length; i += 2) {
          expect(band.low[i]).toBeGreaterThanOrEqual(0);
          expect(band.low[i]).toBeLessThanOrEqual(points[i]);
          expect(band.high[i]).toBeGreaterThanOrEqual(points[i]);
          expect(Number.isFinite(band.high[i])).toBe(true);
        }
      }),
      { numRuns: 40 },
    );
  });

  it('stays inside the plot, closed along both edges, and says when it is too thin to see', () => {
    fc.assert(
      fc.property(cases, ({ trajectory, spread, rangeKm }) => {
        const geometry = ribbonGeometry(null, trajectory, spread, 'linear', SHEET);
        if (geometry === null || geometry.band === null) throw new Error('no band');
        const { band, plot } = geometry;
        const outline = bandOutline(band);
        expect(outline.length).toBe(band.low.length + band.high.length);
        for (let i = 0; i < outline.length; i += 2) {
          expect(outline[i]).toBeGreaterThanOrEqual(plot.x0 - 1e-6);
          expect(outline[i]).toBeLessThanOrEqual(plot.x1 + 1e-6);
          expect(outline[i + 1]).toBeGreaterThanOrEqual(plot.y0);
          expect(outline[i + 1]).toBeLessThanOrEqual(plot.y1);
        }
        if (rangeKm < 1) expect(band.words).toContain('thinner');
        if (rangeKm > 5e6) expect(band.words).toBe('3 σ band');
      }),
      { numRuns: 40 },
    );
  });

  it('is not there without a spread', () => {
    const path = { missKm: 1e5, speedKmS: 10, times: evenTimes(-DAY, DAY, 50) };
    const geometry = ribbonGeometry(null, straightTrajectory(path), null, 'linear', SHEET);
    expect(geometry?.band).toBeNull();
  });
});

describe('the spread at a moment', () => {
  it('is that of its rows at the rows, linear between them, and held at the ends', () => {
    const rows = new Float64Array(2 * SPREAD.stride);
    rows[SPREAD.covariance] = 4;
    rows[SPREAD.stride] = 10;
    rows[SPREAD.stride + SPREAD.covariance] = 8;
    const spread = new Spread(rows);
    const out = new Float64Array(SPREAD.stride);
    const at = (t: number): number => (spread.at(t, out) ? out[SPREAD.covariance] : Number.NaN);
    expect([at(-5), at(0), at(5), at(10), at(99)]).toEqual([4, 4, 6, 8, 8]);
    expect(new Spread(new Float64Array(SPREAD.stride)).at(0, out)).toBe(false);
  });
});

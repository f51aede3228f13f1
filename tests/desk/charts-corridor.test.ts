import { geoArea, geoDistance } from 'd3-geo';
import { describe, expect, it } from 'vitest';
import { outlineOf } from '../../app/charts/corridor-outline';
import { corridorShapes } from '../../app/charts/map-corridor';
import { closeProjection, graticuleStep, isOnSheet } from '../../app/charts/map-geometry';
import type { ReportCorridor } from '../../core/report/corridor';
import { sampleCorridor } from '../core/report/corridor-sample';

type Cell = ReportCorridor['cells'][number];

const cell = (boundsDeg: Cell['boundsDeg'], within: number): Cell => ({
  boundsDeg,
  within,
  longitudeDeg: (boundsDeg[0] + boundsDeg[2]) / 2,
  latitudeDeg: (boundsDeg[1] + boundsDeg[3]) / 2,
  probability: 0.5,
  densityPerKm2: 1,
});

/** Total length of the sides, degrees: all of them lie along meridians and parallels. */
const lengthDeg = (cells: Cell[], level: number): number =>
  outlineOf(cells, level).coordinates.reduce(
    (sum, [[x0, y0], [x1, y1]]) => sum + Math.abs(x1 - x0) + Math.abs(y1 - y0),
    0,
  );

describe('the line about the densest cells', () => {
  it('goes about one cell, and about two neighbours without the side between them', () => {
    const one = cell([10, 0, 12, 1], 0.5);
    // By hand: 2 + 1 + 2 + 1; two side by side 4 + 1 + 4 + 1.
    expect(lengthDeg([one], 1)).toBeCloseTo(6, 9);
    expect(lengthDeg([one, cell([12, 0, 14, 1], 1)], 1)).toBeCloseTo(10, 9);
  });

  it('follows cells that overlap by a part of their sides', () => {
    // By hand: bases 2 and 2, of which 1 is shared: 6 + 6 − 2.
    const cells = [cell([10, 0, 12, 1], 0.5), cell([11, 1, 13, 2], 1)];
    expect(lengthDeg(cells, 1)).toBeCloseTo(10, 9);
  });

  it('leaves out the cells beyond the share', () => {
    const cells = [cell([10, 0, 12, 1], 0.6), cell([12, 0, 14, 1], 1)];
    expect(lengthDeg(cells, 0.5)).toBeCloseTo(6, 9);
    expect(lengthDeg(cells, 0.95)).toBeCloseTo(10, 9);
  });

  it('has no side at the date line between neighbours there, nor at a pole', () => {
    // By hand: 2 + 1 + 2 + 1 less the two sides at ±180°, twice.
    const across = [cell([178, 0, 180, 1], 0.5), cell([-180, 0, -178, 1], 1)];
    expect(lengthDeg(across, 1)).toBeCloseTo(10, 9);
    expect(lengthDeg([cell([0, 89, 60, 90], 1)], 1)).toBeCloseTo(62, 9);
  });
});

describe('what the map draws of the corridor', () => {
  it('has every cell in one band', () => {
    const corridor = sampleCorridor();
    const { bands } = corridorShapes(corridor);
    const drawn = bands.reduce((sum, { shape }) => sum + shape.coordinates.length, 0);
    expect(drawn).toBe(corridor.cells.length);
  });

  it('has ticks at whole minutes of UTC, each on the axis', () => {
    const corridor = sampleCorridor({ count: 4000, durationS: 900 });
    const { ticks } = corridorShapes(corridor);
    // From 13:45:31 to 14:00:31 by the sample's own times; five minutes is the step for 15.
    expect(ticks.map(({ words }) => words)).toEqual(['13:50', '13:55', '14:00']);
    const { axis } = corridor.pieces[0];
    for (const { at } of ticks) {
      const away = axis.map((point) => geoDistance(at, [point.longitudeDeg, point.latitudeDeg]));
      // Half of the spacing of the axis' 25 points on one radian.
      expect(Math.min(...away)).toBeLessThan(0.022);
    }
  });

  it.each([
    [-84, -78],
    [-90, -84],
    [78, 84],
  ])('has cells that reach the parallels %d° and %d° all along', (south, north) => {
    const corridor = { ...sampleCorridor(), cells: [cell([0, south, 60, north], 1)] };
    const { bands, most } = corridorShapes(corridor);
    const drawn = bands.reduce((sum, { shape }) => sum + geoArea(shape), 0);
    const sine = (degrees: number) => Math.sin((degrees * Math.PI) / 180);
    // Archimedes: the area between two parallels is that of the cylinder about them. Chords of 2°
    // take 1e-3 of it; one great circle over the 60° would take a tenth and more.
    const exact = (Math.PI / 3) * (sine(north) - sine(south));
    expect(Math.abs(drawn / exact - 1)).toBeLessThan(1e-3);
    const parallels = most.coordinates.filter(([[, start], [, next]]) => start === next);
    expect(parallels).toHaveLength(south === -90 ? 1 : 2);
    for (const line of parallels) expect(line.length).toBeGreaterThan(20);
  });

  it('has one end and no ticks for a single clone', () => {
    const { ends, ticks, axes, radiusDeg } = corridorShapes(sampleCorridor({ count: 1 }));
    expect(ends).toHaveLength(1);
    expect(ticks).toHaveLength(0);
    expect(axes.coordinates).toHaveLength(0);
    // 95 % of a round Gaussian of 50 km lies within 2.45 σ = 122 km = 1.1°.
    expect(radiusDeg).toBeGreaterThan(0.8);
    expect(radiusDeg).toBeLessThan(1.4);
  });
});

describe('the close map', () => {
  it('shows the whole circle about its middle and not the other side of the Earth', () => {
    const projection = closeProjection(600, 400, [179, 60], 20);
    expect(projection([179, 60])?.map(Math.round)).toEqual([300, 200]);
    for (const at of [
      [179, 40],
      [179, 80],
      [-161, 58],
    ] as [number, number][]) {
      expect(isOnSheet(projection, at, 600, 400)).toBe(true);
    }
    expect(isOnSheet(projection, [0, -40], 600, 400)).toBe(false);
  });

  it('has a few lines of graticule at any size', () => {
    for (const radius of [0, 1, 3, 10, 40]) {
      const lines = Math.max(radius, 0.8) / graticuleStep(radius);
      expect(lines).toBeGreaterThan(1);
      expect(lines).toBeLessThanOrEqual(5);
    }
  });
});

import { geoArea } from 'd3-geo';
import fc from 'fast-check';
import type { Feature, FeatureCollection, Polygon, Position } from 'geojson';
import { describe, expect, it } from 'vitest';
import type { ReportCorridor } from '../../../core/report/corridor';
import { corridorGeoJson } from '../../../core/report/geojson';
import { inventedReport } from '../../desk/fixtures/report';
import { sampleCorridor } from './corridor-sample';

/** The rules of RFC 7946 (Butler et al. 2016), written out by section. */

const written = (corridor: ReportCorridor): FeatureCollection =>
  JSON.parse(corridorGeoJson({ ...inventedReport(), corridor }));

const positionsOf = ({ geometry }: Feature): Position[] => {
  switch (geometry.type) {
    case 'Point':
      return [geometry.coordinates];
    case 'LineString':
      return geometry.coordinates;
    case 'MultiLineString':
      return geometry.coordinates.flat();
    case 'Polygon':
      return geometry.coordinates.flat();
    default:
      throw new Error(`unexpected ${geometry.type}`);
  }
};

const linesOf = ({ geometry }: Feature): Position[][] =>
  geometry.type === 'MultiLineString'
    ? geometry.coordinates
    : geometry.type === 'LineString'
      ? [geometry.coordinates]
      : [];

const polygonsOf = (collection: FeatureCollection): Polygon[] =>
  collection.features.flatMap(({ geometry }) => (geometry.type === 'Polygon' ? [geometry] : []));

/** Twice the signed area on the plane of longitude and latitude: positive counterclockwise. */
const signedArea = (ring: Position[]): number =>
  ring.slice(1).reduce((sum, [x, y], i) => sum + ring[i][0] * y - x * ring[i][1], 0);

/** Product of the radii of curvature, meridian and prime vertical, of WGS 84 (Torge 2001, 4.1). */
function curvatureKm2(latitudeDeg: number): number {
  const e2 = 0.00669437999014;
  const w2 = 1 - e2 * Math.sin((latitudeDeg * Math.PI) / 180) ** 2;
  return (6378.137 ** 2 * (1 - e2)) / w2 ** 2;
}

const anyCorridor = fc
  .record({
    poleLatitudeRad: fc.constantFrom(-1.2, 0, 0.0001, 0.7, 1.5),
    poleLongitudeRad: fc.double({ min: -Math.PI, max: Math.PI, noNaN: true }),
    fromRad: fc.double({ min: 0, max: 6.28, noNaN: true }),
    extentRad: fc.constantFrom(0, 0.0005, 0.3, 2, 4.5),
    count: fc.integer({ min: 1, max: 250 }),
    seed: fc.integer({ min: 0, max: 1000 }),
  })
  .map((shape) => sampleCorridor(shape));

describe('the corridor as GeoJSON', () => {
  it('keeps the rules of RFC 7946 wherever it lies', () => {
    fc.assert(
      fc.property(anyCorridor, (corridor) => {
        const collection = written(corridor);
        // 3.3: a FeatureCollection has "features", each with "type", "geometry" and "properties".
        expect(collection.type).toBe('FeatureCollection');
        for (const feature of collection.features) {
          expect(feature.type).toBe('Feature');
          expect(feature.properties).not.toBeNull();
          // 4: longitude, latitude, decimal degrees; 3.1.1 positions are numbers.
          for (const [longitude, latitude] of positionsOf(feature)) {
            expect(Math.abs(longitude)).toBeLessThanOrEqual(180);
            expect(Math.abs(latitude)).toBeLessThanOrEqual(90);
          }
          // 3.1.4: a line has two or more positions. 3.1.9: nothing crosses the antimeridian.
          for (const line of linesOf(feature)) {
            expect(line.length).toBeGreaterThanOrEqual(2);
            for (const [i, [longitude]] of line.slice(1).entries()) {
              expect(Math.abs(longitude - line[i][0])).toBeLessThanOrEqual(180);
            }
          }
        }
        for (const { coordinates } of polygonsOf(collection)) {
          expect(coordinates).toHaveLength(1);
          const [ring] = coordinates;
          // 3.1.6: closed, four or more positions, exterior rings counterclockwise.
          expect(ring.length).toBeGreaterThanOrEqual(4);
          expect(ring[ring.length - 1]).toEqual(ring[0]);
          expect(signedArea(ring)).toBeGreaterThan(0);
        }
      }),
      { numRuns: 20, seed: 8 },
    );
  });

  it('has polygons whose areas on the sphere are those of the cells', () => {
    for (const poleLatitudeRad of [0, 0.6, 1.5]) {
      const corridor = sampleCorridor({ poleLatitudeRad, extentRad: 3 });
      const collection = written(corridor);
      const polygons = polygonsOf(collection);
      expect(polygons).toHaveLength(corridor.cells.length);
      let sum = 0;
      for (const [i, polygon] of polygons.entries()) {
        // d3 takes rings clockwise seen from outside: RFC 7946's the other way about.
        const turned = {
          ...polygon,
          coordinates: polygon.coordinates.map((ring) => [...ring].reverse()),
        };
        const area = geoArea(turned);
        expect(area).toBeGreaterThan(0);
        expect(area).toBeLessThan(2 * Math.PI);
        const { probability, densityPerKm2, latitudeDeg } = corridor.cells[i];
        const areaKm2 = probability / densityPerKm2;
        // The cell is small: its area is that on the unit sphere times the two radii of curvature.
        // Chords of parallels of up to 5° beside a pole take sin 5°/5° off, 0.13 %.
        const expected = area * curvatureKm2(latitudeDeg);
        expect(Math.abs(expected / areaKm2 - 1)).toBeLessThan(0.002);
        sum += densityPerKm2 * expected;
      }
      expect(Math.abs(sum / 1e-4 - 1)).toBeLessThan(0.002);
    }
  });

  it('cuts an axis over the date line into lines that end and begin there', () => {
    // A strip along the equator about longitude 180°: the pole of its circle is the Earth's.
    const corridor = sampleCorridor({ poleLatitudeRad: Math.PI / 2, extentRad: 6, count: 250 });
    const axis = written(corridor).features.find(({ properties }) => properties?.kind === 'axis');
    if (axis === undefined) throw new Error('no axis');
    const lines = linesOf(axis);
    expect(lines.length).toBeGreaterThan(1);
    const last = lines[0][lines[0].length - 1];
    expect(Math.abs(last[0])).toBe(180);
    expect(lines[1][0]).toEqual([-last[0], last[1]]);
  });

  it('takes an axis over a pole up one meridian and down another', () => {
    const corridor = sampleCorridor({
      poleLatitudeRad: 0,
      poleLongitudeRad: 0.3,
      extentRad: 5,
      sigmaRad: 0,
    });
    const axis = written(corridor).features.find(({ properties }) => properties?.kind === 'axis');
    if (axis === undefined) throw new Error('no axis');
    for (const line of linesOf(axis)) {
      for (const [i, [longitude]] of line.slice(1).entries()) {
        expect(Math.abs(longitude - line[i][0])).toBeLessThan(60);
      }
    }
    expect(
      Math.max(
        ...linesOf(axis)
          .flat()
          .map(([, latitude]) => Math.abs(latitude)),
      ),
    ).toBe(90);
  });

  it('says with every feature what it is of, that it is invented, and the caution', () => {
    const corridor = sampleCorridor();
    const { features } = written(corridor);
    for (const { properties } of features) {
      expect(properties).toMatchObject({
        object: 'Sample Öne (invented)',
        invented: true,
        fingerprint: inventedReport().fingerprint,
      });
      expect(properties?.caution).toContain('not a warning');
    }
    const axis = features.find(({ properties }) => properties?.kind === 'axis');
    const points = corridor.pieces[0].axis.length;
    expect(axis?.properties?.entryUtc).toHaveLength(points);
    expect(axis?.properties?.halfWidthKm).toHaveLength(points);
    const total = features.reduce(
      (sum, { properties }) =>
        properties?.kind === 'density' ? sum + Number(properties.probability) : sum,
      0,
    );
    expect(Math.abs(total / 1e-4 - 1)).toBeLessThan(1e-12);
  });

  it('marks the entry of a nominal orbit that hits', () => {
    const report = inventedReport();
    const entry = {
      jdTdb: 2451545,
      tdbSeconds: -100,
      utc: '2000-01-01T11:57:00Z',
      latitudeDeg: -41.86,
      longitudeDeg: 137.56,
      altitudeKm: 100,
      speedKmS: 15,
      airSpeedKmS: 15,
      flightPathAngleDeg: -40,
      azimuthDeg: 160,
      airFlightPathAngleDeg: -40,
      airAzimuthDeg: 160,
    };
    const text = corridorGeoJson({ ...report, approaches: [{ ...report.approaches[0], entry }] });
    const { features }: FeatureCollection = JSON.parse(text);
    expect(features).toMatchObject([
      {
        geometry: { type: 'Point', coordinates: [137.56, -41.86] },
        properties: { kind: 'nominal-entry', speedKmS: 15 },
      },
    ]);
  });
});

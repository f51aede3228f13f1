import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dot, type Vec3 } from '../../../core/math/vector';
import { CLONE_ROW } from '../../../core/uncertainty/clones';
import { type Corridor, corridorOf } from '../../../core/uncertainty/corridor';
import { circleOf, joined, type StripShape, stripRows } from './corridor-strip';

/** Mean radius of the Earth, km: IUGG (Moritz 2000, Geodetic Reference System 1980). */
const RADIUS_KM = 6371.0088;
const DAY = 86400;

const strip = (changes: Partial<StripShape> = {}): StripShape => ({
  poleLatitudeRad: 0.6,
  poleLongitudeRad: 1,
  fromRad: 0,
  extentRad: 1,
  sigmaRad: 30 / RADIUS_KM,
  count: 2000,
  seed: 7,
  tdbSeconds: 1e9,
  durationS: 900,
  ...changes,
});

function made(rows: Float64Array, weights: Float64Array | null = null): Corridor {
  const corridor = corridorOf(rows, weights);
  if (corridor === null) throw new Error('no corridor');
  return corridor;
}

function isFiniteThroughout(value: unknown): boolean {
  if (typeof value === 'number') return Number.isFinite(value);
  return typeof value === 'object' && value !== null
    ? Object.values(value).every(isFiniteThroughout)
    : true;
}

const vectorOf = (latitude: number, longitude: number): Vec3 => [
  Math.cos(latitude) * Math.cos(longitude),
  Math.cos(latitude) * Math.sin(longitude),
  Math.sin(latitude),
];

const anyStrip = fc.record({
  poleLatitudeRad: fc.double({ min: -Math.PI / 2, max: Math.PI / 2, noNaN: true }),
  poleLongitudeRad: fc.double({ min: -Math.PI, max: Math.PI, noNaN: true }),
  fromRad: fc.double({ min: 0, max: 6.28, noNaN: true }),
  // Up to five sixths of the way about the Earth, more than a grazing corridor can have.
  extentRad: fc.double({ min: 0.05, max: 5.2, noNaN: true }),
  sigmaRad: fc.double({ min: 0.0005, max: 0.01, noNaN: true }),
  count: fc.integer({ min: 300, max: 1200 }),
  seed: fc.integer({ min: 0, max: 1e6 }),
  tdbSeconds: fc.constant(1e9),
  durationS: fc.double({ min: 60, max: 3000, noNaN: true }),
});

describe('the corridor of a strip of known shape', () => {
  it('follows it wherever it lies: over poles, the date line, more than half the Earth', () => {
    fc.assert(
      fc.property(anyStrip, (shape) => {
        const corridor = made(stripRows(shape));
        expect(isFiniteThroughout(corridor)).toBe(true);
        expect(corridor.pieces).toHaveLength(1);
        const { axis, lengthKm } = corridor.pieces[0];
        const [, , pole] = circleOf(shape);
        const sigmaKm = shape.sigmaRad * RADIUS_KM;
        // Sections hold 4 rows at the least, most of them 12 or more: six deviations of the mean
        // of 4, and the deviation of pooled sections within three of its own (1 ± 0.7/√n).
        for (const point of axis) {
          const off = dot(vectorOf(point.latitudeRad, point.longitudeRad), pole);
          expect(Math.abs(off) * RADIUS_KM).toBeLessThan(3 * sigmaKm);
          expect(point.halfWidthKm).toBeGreaterThan(0.5 * sigmaKm);
          expect(point.halfWidthKm).toBeLessThan(1.7 * sigmaKm);
        }
        // Short of the whole by the half sections at both ends, longer by the jitter of the means.
        const whole = shape.extentRad * RADIUS_KM;
        expect(lengthKm).toBeGreaterThan(0.75 * whole - 4 * sigmaKm);
        expect(lengthKm).toBeLessThan(1.05 * whole + 4 * sigmaKm);
        const times = axis.map((point) => point.entryTdbSeconds);
        expect(times).toEqual([...times].sort((a, b) => a - b));
      }),
      { numRuns: 25, seed: 3 },
    );
  });

  it('has cells whose probabilities sum to that of impact, none across the date line', () => {
    fc.assert(
      fc.property(anyStrip, fc.double({ min: 1e-9, max: 1, noNaN: true }), (shape, probability) => {
        const weights = new Float64Array(shape.count).fill(probability / shape.count);
        const { cells } = made(stripRows(shape), weights);
        const sum = cells.reduce((total, cell) => total + cell.probability, 0);
        // Rounding of some thousand sums.
        expect(Math.abs(sum / probability - 1)).toBeLessThan(1e-12);
        expect(cells.length).toBeLessThanOrEqual(2500);
        for (const cell of cells) {
          expect(cell.westRad).toBeGreaterThanOrEqual(-Math.PI);
          expect(cell.eastRad).toBeLessThanOrEqual(Math.PI);
          expect(cell.eastRad).toBeGreaterThan(cell.westRad);
          expect(cell.northRad).toBeGreaterThan(cell.southRad);
          expect(Math.abs(cell.southRad)).toBeLessThanOrEqual(Math.PI / 2);
          expect(Math.abs(cell.northRad)).toBeLessThanOrEqual(Math.PI / 2);
          expect(cell.probability).toBeGreaterThan(0);
        }
        expect(cells[cells.length - 1].within).toBeCloseTo(1, 12);
      }),
      { numRuns: 12, seed: 4 },
    );
  });

  it('says the speeds, angles and times that were put in along it', () => {
    const { pieces, entryAirSpeedKmS, firstEntryTdbSeconds, lastEntryTdbSeconds } = made(
      stripRows(strip({ extentRad: 3.8 })),
    );
    // Linear along the strip: 12 to 14 km/s, so 5 and 95 % are 12.1 and 13.9; 2 000 rows know
    // such a quantile to 0.01 km/s (1 σ, √(p(1−p)/n)/density).
    expect(entryAirSpeedKmS[0]).toBeCloseTo(12.1, 1);
    expect(entryAirSpeedKmS[2]).toBeCloseTo(13.9, 1);
    expect(firstEntryTdbSeconds).toBeGreaterThanOrEqual(1e9);
    expect(lastEntryTdbSeconds).toBeLessThanOrEqual(1e9 + 900);
    const { axis } = pieces[0];
    const last = axis[axis.length - 1];
    // The last section is a forty-eighth of the strip.
    expect(last.entryAirSpeedKmS[1]).toBeGreaterThan(13.9);
    expect((last.entryAngleRad[1] * 180) / Math.PI).toBeLessThan(-58);
    expect(last.entryTdbSeconds - axis[0].entryTdbSeconds).toBeGreaterThan(0.95 * 900);
  });

  it('knows the width of a thin strip to a tenth, and its length to 4 %', () => {
    const { pieces } = made(stripRows(strip({ extentRad: 1, count: 4000 })));
    const widths = pieces[0].axis.map((point) => point.halfWidthKm);
    const mean = widths.reduce((a, b) => a + b, 0) / widths.length;
    expect(Math.abs(mean / 30 - 1)).toBeLessThan(0.1);
    expect(Math.abs(pieces[0].lengthKm / RADIUS_KM - 1)).toBeLessThan(0.04);
  });

  it('has a density that is the Gaussian’s own at the middle of a spot', () => {
    // A round scatter of σ = 400 km, drawn as two crossed sums: the peak of a Gaussian is
    // 1/(2π(σ² + kernel²)), by definition of the convolution.
    const count = 20000;
    const rows = stripRows(strip({ count, extentRad: 0, sigmaRad: 0 }));
    const z = stripRows(strip({ count, extentRad: 1, seed: 11, sigmaRad: 1 }));
    const normal = (u: number, v: number): [number, number] => {
      const r = Math.sqrt(-2 * Math.log(u));
      return [r * Math.cos(2 * Math.PI * v), r * Math.sin(2 * Math.PI * v)];
    };
    for (let i = 0; i < count; i++) {
      const at = i * CLONE_ROW.size;
      const u = (z[at + CLONE_ROW.entryAirSpeedKmS] - 12) / 2;
      const v = (i * 0.6180339887498949) % 1;
      const [x, y] = normal(u, v);
      rows[at + CLONE_ROW.groundLatitudeRad] = (400 * y) / RADIUS_KM;
      rows[at + CLONE_ROW.groundLongitudeRad] = (400 * x) / RADIUS_KM;
    }
    const { cells, kernelKm, pieces } = made(rows);
    const peak = 1 / (2 * Math.PI * (400 ** 2 + kernelKm ** 2));
    const densest = cells[0].probability / cells[0].areaKm2;
    // The densest of many noisy cells; the cells average over their own width.
    expect(Math.abs(densest / peak - 1)).toBeLessThan(0.15);
    // Half of a round Gaussian lies inside the circle r = σ √(2 ln 2).
    const half = cells.filter(({ within }) => within <= 0.5);
    const area = half.reduce((sum, cell) => sum + cell.areaKm2, 0);
    const expected = Math.PI * 2 * Math.LN2 * (400 ** 2 + kernelKm ** 2);
    expect(Math.abs(area / expected - 1)).toBeLessThan(0.1);
    expect(pieces[0].axis.length).toBeGreaterThanOrEqual(1);
  });
});

describe('the corridor of few or odd rows', () => {
  it('exists from a single row, as a spot of the lone kernel’s width', () => {
    const corridor = made(stripRows(strip({ count: 1 })), Float64Array.of(2e-7));
    expect(isFiniteThroughout(corridor)).toBe(true);
    expect(corridor).toMatchObject({ probability: 2e-7, rows: 1, effectiveRows: 1, kernelKm: 50 });
    expect(corridor.pieces).toHaveLength(1);
    expect(corridor.pieces[0].axis).toHaveLength(1);
    expect(corridor.pieces[0].lengthKm).toBe(0);
  });

  it('is nothing without rows', () => {
    expect(corridorOf(new Float64Array(0), null)).toBeNull();
    expect(corridorOf(stripRows(strip({ count: 3 })), new Float64Array(3))).toBeNull();
  });

  it('stays finite for spots of any size anywhere, from two rows up', () => {
    fc.assert(
      fc.property(
        anyStrip,
        fc.double({ min: 0, max: 5, noNaN: true }),
        fc.integer({ min: 2, max: 40 }),
        (shape, sizeKm, count) => {
          const corridor = made(
            stripRows({
              ...shape,
              count,
              extentRad: sizeKm / RADIUS_KM,
              sigmaRad: sizeKm / 4 / RADIUS_KM,
            }),
          );
          expect(isFiniteThroughout(corridor)).toBe(true);
          expect(corridor.pieces).toHaveLength(1);
          expect(corridor.pieces[0].lengthKm).toBeLessThan(3 * sizeKm + 1e-6);
        },
      ),
      { numRuns: 60, seed: 5 },
    );
  });

  it('stays finite with weights that vary by orders of magnitude', () => {
    fc.assert(
      fc.property(anyStrip, fc.integer({ min: 1, max: 60 }), (shape, count) => {
        const weights = Float64Array.from({ length: count }, (_, i) => 10 ** (-9 + ((i * 7) % 7)));
        const corridor = made(stripRows({ ...shape, count }), weights);
        expect(isFiniteThroughout(corridor)).toBe(true);
        expect(corridor.effectiveRows).toBeGreaterThanOrEqual(1);
        expect(corridor.effectiveRows).toBeLessThanOrEqual(count + 1e-9);
      }),
      { numRuns: 40, seed: 6 },
    );
  });

  it('counts as many rows as Kish does', () => {
    // (1 + 1 + 2)² / (1 + 1 + 4) = 16/6, by hand.
    const corridor = made(stripRows(strip({ count: 3 })), Float64Array.of(0.1, 0.1, 0.2));
    expect(corridor.effectiveRows).toBeCloseTo(16 / 6, 12);
  });

  it('has two strips where two sides are grazed, each with its share', () => {
    const one = stripRows(strip({ extentRad: 0.3, count: 300 }));
    const other = stripRows(strip({ extentRad: 0.3, fromRad: 2.5, count: 100, seed: 9 }));
    const { pieces } = made(joined(one, other));
    expect(pieces.map(({ probability }) => Math.round(400 * probability))).toEqual([300, 100]);
    for (const { lengthKm } of pieces)
      expect(Math.abs(lengthKm - 0.3 * RADIUS_KM)).toBeLessThan(250);
  });

  it('has two strips where two approaches hit the same ground', () => {
    const one = stripRows(strip({ count: 200 }));
    const later = stripRows(strip({ count: 100, tdbSeconds: 1e9 + 400 * DAY }));
    const { pieces, firstEntryTdbSeconds, lastEntryTdbSeconds } = made(joined(one, later));
    expect(pieces).toHaveLength(2);
    expect(lastEntryTdbSeconds - firstEntryTdbSeconds).toBeGreaterThan(399 * DAY);
    for (const { axis } of pieces) {
      expect(axis[axis.length - 1].entryTdbSeconds - axis[0].entryTdbSeconds).toBeLessThan(900);
    }
  });

  it('is not drawn out by a stray row on the other side of the Earth', () => {
    const many = stripRows(strip({ count: 1000 }));
    const stray = stripRows(strip({ count: 1, fromRad: 4, extentRad: 0 }));
    const { pieces, rows } = made(joined(many, stray));
    expect(rows).toBe(1001);
    expect(pieces).toHaveLength(1);
    expect(pieces[0].lengthKm).toBeLessThan(1.05 * RADIUS_KM);
  });

  it('puts clones that only graze the air where they enter it, and says how likely that is', () => {
    const rows = stripRows(strip({ count: 4, extentRad: 0.01 }));
    rows[CLONE_ROW.groundTdbSeconds] = Number.NaN;
    rows[CLONE_ROW.groundLatitudeRad] = Number.NaN;
    rows[CLONE_ROW.groundLongitudeRad] = Number.NaN;
    const corridor = made(rows);
    expect(corridor.grazingProbability).toBe(0.25);
    expect(corridor.rows).toBe(4);
  });
});

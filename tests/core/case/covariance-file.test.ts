import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readCase } from '../../../core/case/read';
import type { ReadResult } from '../../../core/case/types';

/** Case files whose covariance is at another epoch, or is not quite symmetric. */

const EPOCH = { scale: 'TDB', mjd: 63000, secondOfDay: 0 };
const STATE = {
  kind: 'cartesian',
  positionKm: [-120000000.5, 88000000.25, 1234567.125],
  velocityKmS: [-15.5, -22.25, 1.125],
};
const ELEMENTS = {
  kind: 'elements',
  periapsisKm: 1.1e8,
  eccentricity: 0.25,
  inclinationDeg: 5.5,
  nodeDeg: 120.5,
  argumentOfPeriapsisDeg: 33.25,
  phase: { kind: 'mean-anomaly', meanAnomalyDeg: 12.5 },
};
const CARTESIAN_COVARIANCE = {
  kind: 'cartesian',
  frame: 'ICRF',
  lowerTriangle: [0, 1, 2, 3, 4, 5].flatMap((i) => [
    ...Array<number>(i).fill(0),
    i < 3 ? 14400 : 1e-12,
  ]),
};
const LABELS = ['e', 'q', 'M', 'node', 'peri', 'i'];

const fileOf = (more: object): string =>
  JSON.stringify({
    format: 'skimline-case',
    version: 1,
    case: {
      name: 'X',
      objectId: null,
      invented: true,
      originator: null,
      epoch: EPOCH,
      centre: 'Sun',
      axes: 'ICRF',
      state: STATE,
      covariance: CARTESIAN_COVARIANCE,
      nonGravitational: null,
      physical: {},
      model: { gm: 'DE431' },
      span: null,
      ...more,
    },
  });
const withMatrix = (matrix: number[][]): ReadResult =>
  readCase(
    fileOf({ state: ELEMENTS, covariance: { kind: 'elements', labels: LABELS, matrix } }),
    {},
  );
const unitMatrix = (): number[][] =>
  LABELS.map((_, i) => LABELS.map((_label, j) => (i === j ? 1e-12 : 0)));
const messages = (result: ReadResult): string => result.problems.map((p) => p.message).join('\n');

describe('a covariance with an epoch of its own', () => {
  it('is taken when that is the epoch of the state to a millisecond', () => {
    for (const covarianceEpoch of [EPOCH, { ...EPOCH, secondOfDay: 0.0009 }]) {
      const result = readCase(fileOf({ covarianceEpoch }), {});
      expect(result.case?.covariance).toEqual(CARTESIAN_COVARIANCE);
    }
  });

  it('is refused with both epochs and what to do when it is another', () => {
    for (const covarianceEpoch of [
      { ...EPOCH, secondOfDay: 0.0021 },
      { ...EPOCH, mjd: 62999 },
      // The same reading of the clock in UTC is more than a minute later.
      { ...EPOCH, scale: 'UTC' },
    ]) {
      const result = readCase(fileOf({ covarianceEpoch }), {});
      expect(result.case).toBeNull();
      // MJD 63000 is 2031 May 14 (ERFA, jd2cal).
      expect(messages(result)).toMatch(/state is at 2031-05-14.* covariance at 2031-05-1[34]/);
      expect(messages(result)).toMatch(/Give both at one epoch/);
    }
  });
});

describe('a full matrix of elements', () => {
  it('that is symmetric is taken as it is, without a word', () => {
    const result = withMatrix(unitMatrix());
    expect(result.case?.covariance).toMatchObject({ matrix: unitMatrix() });
    expect(messages(result)).not.toMatch(/symmetric/);
  });

  it('that is symmetric to rounding is made so, and that is said', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 5 }),
        fc.double({ min: -0.3, max: 0.3, noNaN: true }),
        fc.double({ min: 1e-9, max: 9e-7, noNaN: true }),
        (row, correlation, off) => {
          const matrix = unitMatrix();
          matrix[row][0] = correlation * 1e-12;
          matrix[0][row] = (correlation + off) * 1e-12;
          const result = withMatrix(matrix);
          const { covariance } = result.case ?? {};
          if (covariance?.kind !== 'elements') throw new Error(messages(result));
          expect(covariance.matrix[0][row]).toBe(covariance.matrix[row][0]);
          expect(covariance.matrix[0][row]).toBe((matrix[0][row] + matrix[row][0]) / 2);
          expect(messages(result)).toMatch(/symmetric only to rounding: 1 mirrored pair/);
        },
      ),
      { numRuns: 50, seed: 63000 },
    );
  });

  it('that is not symmetric is refused with the entry', () => {
    const matrix = unitMatrix();
    matrix[3][1] = 1e-13;
    const result = withMatrix(matrix);
    expect(result.case).toBeNull();
    expect(messages(result)).toMatch(
      /not symmetric: its entry of node q is 1e-13, that of q node is 0/,
    );
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readCase } from '../../../core/case/read';
import type { OrbitCase, ReadResult } from '../../../core/case/types';

/** The astronomical unit, km (IAU 2012 resolution B2). */
const AU = 149597870.7;
const STATE = `heliocentric ICRF, km and km/s
2031-05-12T00:00:00 TDB
-120000000.5 88000000.25 1234567.125
-15.5 -22.25 1.125`;
const LABELLED = (tail: readonly string[]): string =>
  `heliocentric ICRF, 2031-05-12T00:00:00 TDB
x = -120000000.5 ${tail[0]}
y = 88000000.25 ${tail[1]}
z = 1234567.125 ${tail[2]}
vx = -15.5 ${tail[3]}
vy = -22.25 ${tail[4]}
vz = 1.125 ${tail[5]}`;
const ELEMENTS = (tail: readonly string[]): string =>
  `ecliptic J2000, epoch 2031-05-12T00:00:00 TDB
e = 0.25 ${tail[0]}
q = 0.75 ${tail[1]}
i = 5.5 ${tail[2]}
node = 120.5 ${tail[3]}
peri = 33.25 ${tail[4]}
M = 12.5 ${tail[5]}
au`;

const stateOf = (result: ReadResult): OrbitCase['state'] | undefined => result.case?.state;
const sigmas = (result: ReadResult): number[] => {
  const covariance = result.case?.covariance;
  if (covariance?.kind !== 'cartesian') {
    throw new Error(`no covariance: ${JSON.stringify(result.problems)}`);
  }
  const diagonal = [0, 2, 5, 9, 14, 20];
  expect(covariance.lowerTriangle.filter((x, i) => !diagonal.includes(i) && x !== 0)).toEqual([]);
  return diagonal.map((at) => Math.sqrt(covariance.lowerTriangle[at]));
};
/** A square and its root round once each: a few parts in 1e16. */
const expectSigmas = (result: ReadResult, expected: readonly number[]): void => {
  for (const [i, sigma] of sigmas(result).entries()) {
    expect(Math.abs(sigma / expected[i] - 1)).toBeLessThan(1e-14);
  }
};
const messages = (result: ReadResult): string => result.problems.map((p) => p.message).join('\n');

describe('standard deviations beside a pasted state', () => {
  const six = [120, 80, 45, 1e-6, 2e-6, 1e-6];
  const forms: [string, string, number[]][] = [
    ['six with units', 'sigma: 120 80 45 km  1e-6 2e-6 1e-6 km/s', six],
    ['six in a row without units', 'σ 120 80 45 1e-6 2e-6 1e-6', six],
    ['six in capitals', 'SIGMA 120 80 45 km 1 2 1 mm/s', six],
    ['six behind sd', 'sd = 120, 80, 45, 1e-6, 2e-6, 1e-6', six],
    ['six behind std', 'std: 120 80 45 km, 1e-6 2e-6 1e-6 km/s', six],
    ['six below a head', 'Uncertainty (1-sigma):\n120 80 45 km\n1e-6 2e-6 1e-6 km/s', six],
    ['in metres', '1-sigma 0.5 0.4 0.3 km, 1 1 2 mm/s', [0.5, 0.4, 0.3, 1e-6, 1e-6, 2e-6]],
    [
      'named',
      'σx 120 km σy 80 km σz 45 km\nσvx 1 mm/s σvy 2 mm/s σvz 1 mm/s',
      [120, 80, 45, 1e-6, 2e-6, 1e-6],
    ],
    ['one of each', 'σ 500 km, 5 cm/s', [500, 500, 500, 5e-5, 5e-5, 5e-5]],
    ['one of each by ±', '± 500 km ± 5 cm/s', [500, 500, 500, 5e-5, 5e-5, 5e-5]],
    ['one of each without a blank', '±500 km ±5 cm/s', [500, 500, 500, 5e-5, 5e-5, 5e-5]],
    ['one of each in words', 'uncertainty 500 km and 5 cm/s', [500, 500, 500, 5e-5, 5e-5, 5e-5]],
    ['velocity first', 'sigma 5 cm/s, 500 km', [500, 500, 500, 5e-5, 5e-5, 5e-5]],
    ['on two lines', 'σ r 1 2 3 km\nσ v 4 5 6 m/s', [1, 2, 3, 4e-3, 5e-3, 6e-3]],
    [
      'in au',
      'σ 1e-6 au, 1e-7 au/d',
      [1, 1, 1, 0.1, 0.1, 0.1].map((x, i) => (x * AU * 1e-6) / (i < 3 ? 1 : 86400)),
    ],
    ['three σ', '3-sigma 300 km, 6 m/s', [100, 100, 100, 2e-3, 2e-3, 2e-3]],
  ];
  const plain = stateOf(readCase(STATE, {}));
  for (const [name, text, expected] of forms) {
    it(`are read and leave the state as it was: ${name}`, () => {
      const result = readCase(`${STATE}\n${text}`, {});
      expectSigmas(result, expected);
      expect(plain).toBeDefined();
      expect(stateOf(result)).toEqual(plain);
    });
  }

  it('are an assumption on the case sheet, in the axes of the state', () => {
    for (const [axes, frame] of [
      ['ICRF', 'ICRF'],
      ['ecliptic J2000', 'EclipticJ2000'],
    ]) {
      const result = readCase(`${STATE.replace('ICRF', axes)}\nσ 500 km, 5 cm/s`, {});
      const field = result.fields.find((item) => item.field === 'covariance');
      expect(field?.origin).toBe('assumed');
      expect(field?.note).toContain('uncorrelated');
      expect(result.case?.covariance).toMatchObject({ kind: 'cartesian', frame });
    }
  });

  it('given as three σ say that they were divided', () => {
    const result = readCase(`${STATE}\n3-sigma 300 km, 6 m/s`, {});
    const field = result.fields.find((item) => item.field === 'covariance');
    expect(field?.note).toContain('given as 3 σ, divided by it');
  });

  it('without a unit say that they were taken in those of the state', () => {
    const bare = readCase(`${STATE}\nσ 120 80 45 1e-6 2e-6 1e-6`, {});
    expect(bare.fields.find((item) => item.field === 'covariance')?.note).toContain(
      'without a unit',
    );
    const said = readCase(`${STATE}\nσ 120 80 45 km 1e-6 2e-6 1e-6 km/s`, {});
    expect(said.fields.find((item) => item.field === 'covariance')?.note).not.toContain(
      'without a unit',
    );
  });

  it('stand behind each value with ±, labelled or in rows', () => {
    const tails = ['± 40 km', '± 50 km', '+/- 60 km', '± 1e-6 km/s', '± 2e-6 km/s', '± 3e-6 km/s'];
    const expected = [40, 50, 60, 1e-6, 2e-6, 3e-6];
    const labelled = readCase(LABELLED(tails), {});
    expectSigmas(labelled, expected);
    expect(stateOf(labelled)).toEqual(plain);
    const rows = STATE.split('\n').slice(0, 2).join('\n');
    const row = readCase(
      `${rows}\n-120000000.5 ± 40 88000000.25 ± 50 1234567.125 ± 60\n-15.5 ± 1e-6 -22.25 ± 2e-6 1.125 ± 3e-6`,
      {},
    );
    expectSigmas(row, expected);
    expect(stateOf(row)).toEqual(plain);
  });

  it('come back as they were written, whatever they are', () => {
    const metre = fc.double({ min: 1e-3, max: 1e5, noNaN: true });
    const rate = fc.double({ min: 1e-6, max: 1e3, noNaN: true });
    fc.assert(
      fc.property(fc.tuple(metre, metre, metre, rate, rate, rate), (list) => {
        const text = `${STATE}\nσ ${list.slice(0, 3).join(' ')} km ${list.slice(3).join(' ')} m/s`;
        const result = readCase(text, {});
        expectSigmas(
          result,
          list.map((x, i) => (i < 3 ? x : x / 1000)),
        );
        expect(stateOf(result)).toEqual(plain);
      }),
      { numRuns: 200, seed: 1801 },
    );
  });
});

describe('standard deviations that cannot be used', () => {
  it('are refused when they are not above zero', () => {
    for (const text of ['σ 0 km, 5 cm/s', 'σ -3 km, 5 cm/s']) {
      const result = readCase(`${STATE}\n${text}`, {});
      expect(result.case).toBeNull();
      expect(messages(result)).toMatch(/standard deviation above zero/);
    }
  });

  it('are doubted when their size is none of an orbit solution', () => {
    for (const [text, what] of [
      ['σ 2 au, 5 cm/s', /over 1 au/],
      ['σ 500 km, 11 km/s', /over 10 km\/s/],
      ['σ 0.5 mm, 5 cm/s', /under 1 mm/],
    ] as const) {
      const result = readCase(`${STATE}\n${text}`, {});
      expect(result.case).not.toBeNull();
      expect(messages(result)).toMatch(what);
    }
    expect(messages(readCase(`${STATE}\nσ 0.9 au, 9 km/s`, {}))).not.toMatch(/are its units/);
  });

  it('are said to be unused, and change nothing of the state', () => {
    for (const text of ['σ 1 2 3 4 km', 'sigma: 7', 'σx 5 km']) {
      const result = readCase(`${STATE}\n${text}`, {});
      expect(stateOf(result)).toEqual(stateOf(readCase(STATE, {})));
      expect(result.case?.covariance).toBeNull();
      expect(messages(result)).toMatch(/Uncertainties are not used/);
    }
  });
});

describe('standard deviations of elements', () => {
  const none = ['', '', '', '', '', ''];
  const tails = ['± 1e-7', '± 2e-8', '± 1e-5', '± 3e-5', '± 4e-5', '± 5e-6'];

  it('make a covariance in the labels of the set, au and degrees', () => {
    const result = readCase(ELEMENTS(tails), {});
    const { covariance } = result.case ?? {};
    if (covariance?.kind !== 'elements') throw new Error(messages(result));
    expect(covariance.labels).toEqual(['e', 'q', 'M', 'node', 'peri', 'i']);
    const given = [1e-7, 2e-8, 5e-6, 3e-5, 4e-5, 1e-5];
    for (const [i, sigma] of given.entries()) {
      expect(Math.abs(Math.sqrt(covariance.matrix[i][i]) / sigma - 1)).toBeLessThan(1e-14);
    }
    expect(stateOf(result)).toEqual(stateOf(readCase(ELEMENTS(none), {})));
  });

  it('that are not a whole set are said to be unused', () => {
    const result = readCase(ELEMENTS([...tails.slice(0, 5), '']), {});
    expect(result.case).not.toBeNull();
    expect(result.case?.covariance).toBeNull();
    expect(messages(result)).toMatch(/a covariance needs σ of e, q or a/);
  });
});

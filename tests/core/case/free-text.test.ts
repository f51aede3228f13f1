import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readCase } from '../../../core/case/read';
import type { Choices, OrbitCase, ReadResult } from '../../../core/case/types';
import { AU_KM } from '../../../core/constants';

/** All states here are invented. */
const X = [-10919757.4638, -103043558.9999, -70662679.3512];
const V = [29.4661585877, -11.8193145026, -2.464415455];

function caseOf(text: string, choices: Choices = {}): OrbitCase {
  const result = readCase(text, choices);
  expect(result.problems.filter((item) => item.severity === 'error')).toEqual([]);
  expect(result.questions).toEqual([]);
  if (result.case === null) throw new Error('no case');
  return result.case;
}

function stateOf(text: string, choices: Choices = {}): number[] {
  const { state } = caseOf(text, choices);
  if (state.kind !== 'cartesian') throw new Error('not a state');
  return [...state.positionKm, ...state.velocityKmS];
}

/** Digits as written are read without loss; only the unit's factor rounds. */
const close = (a: number[], b: number[]): void => {
  for (const [i, value] of a.entries()) expect(Math.abs(value / b[i] - 1)).toBeLessThan(1e-15 * 4);
};

const EPOCH = 'Epoch 2032-05-12T12:43:12 TDB';
const origin = (result: ReadResult, field: string): string | undefined =>
  result.fields.find((item) => item.field === field)?.origin;

describe('six numbers', () => {
  const layouts: Record<string, string> = {
    'on one line': `${EPOCH}\n${[...X, ...V].join(' ')}`,
    'three and three': `${EPOCH}\n${X.join('  ')}\n${V.join('  ')}`,
    'one a line': [EPOCH, ...X, ...V].join('\n'),
    'with commas between': `${EPOCH}\n${X.join(', ')}\n${V.join(', ')}`,
    'as a CSV row without blanks': `2032-05-12T12:43:12,${[...X, ...V].join(',')}`,
    'with semicolons': `${EPOCH}\n${[...X, ...V].join('; ')}`,
    'in brackets': `${EPOCH}\nr = [${X.join(', ')}] km\nv = [${V.join(', ')}] km/s`,
    'velocity first, labelled': `${EPOCH}\nvelocity ${V.join(' ')}\nposition ${X.join(' ')}`,
    'labelled with signs': `${EPOCH}\nX =${X[0]} Y =${X[1]} Z =${X[2]}\nVX=${V[0]} VY=${V[1]} VZ=${V[2]}`,
    'labelled with colons and units': `${EPOCH}\nx: ${X[0]} km\ny: ${X[1]} km\nz: ${X[2]} km\nvx: ${V[0]} km/s\nvy: ${V[1]} km/s\nvz: ${V[2]} km/s`,
    'labelled without signs': `${EPOCH}\nx ${X[0]}\ny ${X[1]}\nz ${X[2]}\nvx ${V[0]}\nvy ${V[1]}\nvz ${V[2]}`,
    'labelled with units in brackets': `${EPOCH}\nX [km] = ${X[0]}\nY [km] = ${X[1]}\nZ [km] = ${X[2]}\nVX [km/s] = ${V[0]}\nVY [km/s] = ${V[1]}\nVZ [km/s] = ${V[2]}`,
    'labelled with dots': `${EPOCH}\nx=${X[0]}\ny=${X[1]}\nz=${X[2]}\nxdot=${V[0]}\nydot=${V[1]}\nzdot=${V[2]}`,
    'with Fortran exponents': `${EPOCH}\n${[...X, ...V].map((n) => n.toExponential(14).replace('e', 'D')).join(' ')}`,
    'with typographic minus signs': `${EPOCH}\n${[...X, ...V].join(' ').replaceAll('-', '\u2212')}`,
    'with a Julian date in the row': `2463365.03 ${[...X, ...V].join(' ')}`,
    'with a Julian date and a calendar date': `2463365.030000000 = A.D. 2032-May-12 12:43:12.0000 TDB\n X =${X[0]} Y =${X[1]} Z =${X[2]}\n VX=${V[0]} VY=${V[1]} VZ=${V[2]}`,
    'with the epoch last': `${[...X, ...V].join(' ')}\nMJD 63364.53 TDB`,
    'with a decimal comma': `${EPOCH}\n${[...X, ...V].map((n) => String(n).replace('.', ',')).join('  ')}`,
    'with a decimal comma and points that group': `${EPOCH}\n-10.919.757,4638 -103.043.558,9999 -70.662.679,3512\n29,4661585877 -11,8193145026 -2,464415455`,
    'with commas that group': `${EPOCH}\n-10,919,757.4638 -103,043,558.9999 -70,662,679.3512\n29.4661585877 -11.8193145026 -2.464415455`,
    'with thin spaces that group': `${EPOCH}\n-10\u2009919\u2009757.4638 -103\u2009043\u2009558.9999 -70\u2009662\u2009679.3512\n29.4661585877 -11.8193145026 -2.464415455`,
    'with apostrophes that group': `${EPOCH}\n-10'919'757.4638 -103'043'558.9999 -70'662'679.3512\n29.4661585877 -11.8193145026 -2.464415455`,
    'as a table with bars': `| Epoch | 2032 May 12.53 TDB |\n| X | ${X[0]} km |\n| Y | ${X[1]} km |\n| Z | ${X[2]} km |\n| VX | ${V[0]} km/s |\n| VY | ${V[1]} km/s |\n| VZ | ${V[2]} km/s |`,
    'with a name that holds a number': `Object: Invented 7\nPosition (km): ${X.join(' ')}\nVelocity (km/s): ${V.join(' ')}\nEpoch (TDB): 2032-05-12T12:43:12`,
    'with tabs': `${EPOCH}\n${[...X, ...V].join('\t')}`,
    'with comments and a header': `# a state\n${EPOCH}\nheliocentric, ICRF, km, km/s\n${[...X, ...V].join(' ')}`,
  };
  for (const [name, text] of Object.entries(layouts)) {
    it(`are read ${name}`, () => {
      close(stateOf(text), [...X, ...V]);
      const { epoch } = caseOf(text);
      expect(epoch.mjd).toBe(63364);
      expect(Math.abs(epoch.secondOfDay - 45792)).toBeLessThan(1e-6);
    });
  }

  it('are read in au and au/d when the text says so', () => {
    const r = [0.7033692276654, 0.3596607149747, 0.0434436218715];
    const v = [-0.015174155740128, 0.007615773201275, 0.000674354148304];
    const expected = [...r.map((n) => n * AU_KM), ...v.map((n) => (n * AU_KM) / 86400)];
    close(stateOf(`2029 Apr 25.0 TDB au au/d\n${[...r, ...v].join(' ')}`), expected);
  });

  it('are taken in the only units that make a sane state, marked as assumed', () => {
    const text = `2029 Apr 25.0 TDB\n0.7033692276654 0.3596607149747 0.0434436218715 -0.015174155740128 0.007615773201275 0.000674354148304`;
    const result = readCase(text, {});
    expect(result.case).not.toBeNull();
    const unit = result.fields.find((item) => item.field === 'lengthUnit');
    expect([unit?.value, unit?.origin]).toEqual(['au', 'assumed']);
  });

  it('have axes, centre and scale assumed in the open, each editable', () => {
    const text = `2032-05-12T12:43:12\n${[...X, ...V].join(' ')}`;
    const result = readCase(text, {});
    for (const field of ['axes', 'centre', 'timeScale', 'lengthUnit', 'speedUnit']) {
      expect([field, origin(result, field)]).toEqual([field, 'assumed']);
    }
    const edited = readCase(text, { axes: 'EclipticJ2000', timeScale: 'UTC', centre: 'SSB' });
    expect(edited.case?.axes).toBe('EclipticJ2000');
    expect(edited.case?.epoch.scale).toBe('UTC');
    expect(edited.case?.centre).toBe('SSB');
    expect(origin(edited, 'axes')).toBe('edited');
  });

  it('ask which is meant where a comma can be either', () => {
    const text = `${EPOCH} m, m/s\n-109,197 -103,043 -706,626 294,661 -118,193 -246,441`;
    const result = readCase(text, {});
    expect(result.case).toBeNull();
    const question = result.questions.find((item) => item.field === 'numberFormat');
    expect(question?.readings.map((item) => item.value)).toEqual(['point', 'comma']);
    expect(readCase(text, { numberFormat: 'comma' }).questions).toEqual([]);
  });

  it('ask which date is meant where day and month can be either', () => {
    const result = readCase(`05/06/2032\n${[...X, ...V].join(' ')}`, {});
    expect(result.case).toBeNull();
    expect(result.questions).toHaveLength(1);
    const first = result.questions[0];
    expect(first.readings).toHaveLength(2);
    const answered = readCase(`05/06/2032\n${[...X, ...V].join(' ')}`, {
      [first.field]: first.readings[0].value,
    });
    expect(answered.case).not.toBeNull();
  });

  it('are told from five or seven, with the line', () => {
    for (const count of [5, 7]) {
      const numbers = [...X, ...V, 1].slice(0, count);
      const result = readCase(`${EPOCH}\n${numbers.join(' ')}`, {});
      expect(result.case).toBeNull();
      const error = result.problems.find((item) => item.severity === 'error' && item.line === 2);
      expect(error?.message).toContain(`${count} numbers`);
    }
  });

  it('without an epoch give an error that names it', () => {
    const result = readCase([...X, ...V].join(' '), {});
    expect(result.problems.some((item) => item.field === 'epoch')).toBe(true);
    expect(readCase([...X, ...V].join(' '), { epoch: '2032-05-12' }).case).not.toBeNull();
  });
});

describe('absurd states are said in words', () => {
  const error = (text: string): string =>
    readCase(text, {})
      .problems.filter((item) => item.severity === 'error')
      .map((item) => item.message)
      .join(' ');
  it('inside the Sun', () => {
    expect(error(`${EPOCH} km km/s\n100000 200000 300000 10 20 30`)).toMatch(/inside the Sun/);
  });
  it('faster than 300 km/s', () => {
    expect(error(`${EPOCH} km km/s\n${X.join(' ')} 29466 -11819 -2464`)).toMatch(
      /faster than 300 km\/s/,
    );
  });
  it('beyond 100 au', () => {
    expect(error(`${EPOCH} au km/s\n${X.join(' ')} ${V.join(' ')}`)).toMatch(/100 au/);
  });
  it('before and after the ephemeris', () => {
    expect(error(`1950-01-01 TDB\n${[...X, ...V].join(' ')}`)).toMatch(/1959-12-10 to 2060-01-30/);
    expect(error(`2070-01-01 TDB\n${[...X, ...V].join(' ')}`)).toMatch(/1959-12-10 to 2060-01-30/);
  });
});

describe('elements', () => {
  const usual = `heliocentric ecliptic J2000
Epoch 2461946.5 TDB
a = 0.92243 au, e = 0.19119, i = 3.3314 deg
node = 204.446 argp = 126.402 M = 180.43`;

  it('are read with a or q, with M, true anomaly or time of periapsis', () => {
    const { state } = caseOf(usual);
    expect(state).toMatchObject({
      kind: 'elements',
      eccentricity: 0.19119,
      inclinationDeg: 3.3314,
      nodeDeg: 204.446,
      argumentOfPeriapsisDeg: 126.402,
      phase: { kind: 'mean-anomaly', meanAnomalyDeg: 180.43 },
    });
    if (state.kind !== 'elements') return;
    expect(state.periapsisKm / AU_KM).toBeCloseTo(0.92243 * (1 - 0.19119), 12);
    const withTrue = caseOf(usual.replace('M = 180.43', 'true anomaly = 170.5')).state;
    expect(withTrue).toMatchObject({ phase: { kind: 'true-anomaly', trueAnomalyDeg: 170.5 } });
    const withTime = caseOf(usual.replace('M = 180.43', '\nTp = 2461900.25')).state;
    expect(withTime).toMatchObject({
      phase: { kind: 'periapsis-time', periapsisEpoch: { mjd: 61899, secondOfDay: 64800 } },
    });
  });

  it('are read as a column with symbols', () => {
    const text = 'JD 2461946.5 TDB\nq 0.7460 au\ne 0.1912\ni 3.33°\nΩ 204.4°\nω 126.4°\nM 180.4°';
    expect(caseOf(text).state).toMatchObject({ eccentricity: 0.1912, nodeDeg: 204.4 });
  });

  it('are read in the layout with EC, QR, IN, OM, W, Tp', () => {
    const text = `2461946.500000000 = A.D. 2028-Jun-24 00:00:00.0000 TDB
 EC= 1.911953048308701E-01 QR= 7.460724295867941E-01 IN= 3.331369520013644E+00
 OM= 2.044460289189818E+02 W = 1.264018795248490E+02 Tp=  2461900.912519503203`;
    const { state } = caseOf(text);
    expect(state).toMatchObject({
      eccentricity: 0.1911953048308701,
      phase: { kind: 'periapsis-time' },
    });
    if (state.kind === 'elements')
      expect(state.periapsisKm / AU_KM).toBeCloseTo(0.7460724295867941, 14);
  });

  it('are read in two columns with short labels', () => {
    const text =
      'Epoch 2460000.5\nM 138.82534\nn 1.5   Peri. 357.0\na 1.2   Node 117.3\ne 0.617 Incl. 3.61';
    expect(caseOf(text).state).toMatchObject({
      inclinationDeg: 3.61,
      argumentOfPeriapsisDeg: 357,
    });
  });

  it('are assumed on the ecliptic when the text does not say', () => {
    const result = readCase(usual.replace('heliocentric ecliptic J2000\n', ''), {});
    expect(result.case?.axes).toBe('EclipticJ2000');
    expect(origin(result, 'axes')).toBe('assumed');
  });

  it('with an a and a q that disagree are refused', () => {
    const result = readCase(usual.replace('a = 0.92243 au,', 'a = 0.92243 au, q = 0.9 au,'), {});
    expect(result.case).toBeNull();
    expect(result.problems.some((item) => item.field === 'periapsis distance')).toBe(true);
  });

  it('of a hyperbola take a of either sign', () => {
    const base = usual.replace('e = 0.19119', 'e = 1.5');
    for (const a of ['-0.92243', '0.92243']) {
      const { state } = caseOf(base.replace('a = 0.92243', `a = ${a}`));
      if (state.kind === 'elements') expect(state.periapsisKm / AU_KM).toBeCloseTo(0.461215, 10);
    }
  });
});

describe('the reader', () => {
  it('throws for no text and never gives a number that is none', () => {
    const bits = fc.constantFrom(
      'X = ',
      'e',
      '1.5',
      '-2,5',
      '2031-05-12',
      'TDB',
      '\n',
      ' ',
      'km',
      'au/d',
      '=',
      'nan',
      '1e999',
      'CCSDS_OPM_VERS = 3.0',
      'EPOCH = ',
      '<opm>',
      '{',
      '"format"',
      'JD 24',
      '6.7.8',
      'M',
      'Ω',
      '—',
    );
    const texts = fc.oneof(
      fc.string({ maxLength: 200 }),
      fc.array(bits, { maxLength: 40 }).map((a) => a.join('')),
    );
    fc.assert(
      fc.property(texts, (text) => {
        const result = readCase(text, {});
        const { case: orbit } = result;
        if (orbit?.state.kind === 'cartesian') {
          for (const n of [...orbit.state.positionKm, ...orbit.state.velocityKmS]) {
            expect(Number.isFinite(n)).toBe(true);
          }
        }
        for (const item of result.problems) expect(item.message).not.toMatch(/NaN|undefined/);
      }),
      { numRuns: 2000, seed: 20260101 },
    );
  });

  it('reads a megabyte of digits and words without hanging', () => {
    const text = `${EPOCH}\n${'12.5 abc '.repeat(1e5)}`;
    expect(readCase(text, {}).case).toBeNull();
  });
});

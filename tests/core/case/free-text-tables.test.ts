import { describe, expect, it } from 'vitest';
import { readCase } from '../../../core/case/read';

/** Invented. */
const R = [-10919757.4638, -103043558.9999, -70662679.3512];
const V = [29.4661585877, -11.8193145026, -2.464415455];
const ROW = [...R, ...V];

const stateOf = (text: string): number[] => {
  const { case: orbit, problems, questions } = readCase(text, {});
  expect(problems.filter(({ severity }) => severity === 'error')).toEqual([]);
  expect(questions).toEqual([]);
  if (orbit?.state.kind !== 'cartesian') throw new Error('no state');
  expect(orbit.epoch).toMatchObject({ mjd: 63364 });
  expect(orbit.epoch.secondOfDay).toBeCloseTo(45792, 3);
  return [...orbit.state.positionKm, ...orbit.state.velocityKmS];
};

describe('a table with named columns is read', () => {
  const tables: Record<string, string> = {
    'with commas': `JDTDB, Calendar Date (TDB), X, Y, Z, VX, VY, VZ\n2463365.03, A.D. 2032-May-12 12:43:12.0000, ${ROW.join(', ')},`,
    'with columns that are not used': `JDTDB, Date, X, Y, Z, VX, VY, VZ, LT, RG, RR\n2463365.03, A.D. 2032-May-12 12:43:12.0000, ${ROW.join(', ')}, 4.2E+02, 1.2E+08, -1.0E+00,`,
    'with blanks and units': `# MJD x(km) y(km) z(km) vx(km/s) vy(km/s) vz(km/s)\n63364.53 ${ROW.join(' ')}`,
    'with tabs': `epoch\tx\ty\tz\tvx\tvy\tvz\n2032-05-12T12:43:12\t${ROW.join('\t')}`,
    'with bars': `| JD | X | Y | Z | VX | VY | VZ |\n| 2463365.03 | ${ROW.join(' | ')} |`,
    'with the columns in another order': `JD VX VY VZ X Y Z\n2463365.03 ${[...V, ...R].join(' ')}`,
    'with semicolons and decimal commas': `JD;X;Y;Z;VX;VY;VZ\n2463365,03;${ROW.map((n) => String(n).replace('.', ',')).join(';')}`,
  };
  for (const [name, text] of Object.entries(tables)) {
    it(name, () => expect(stateOf(text)).toEqual(ROW));
  }

  it('of elements, without regard to the order of its columns', () => {
    const text = 'Epoch e a i Node Peri. M\n2463365.5 0.2 1.2 5 10 20 30';
    expect(readCase(text, {}).case?.state).toMatchObject({
      kind: 'elements',
      eccentricity: 0.2,
      nodeDeg: 10,
      phase: { kind: 'mean-anomaly', meanAnomalyDeg: 30 },
    });
  });

  it('and with two rows asks for one, since each has its own epoch', () => {
    const text = `JD X Y Z VX VY VZ\n2463365.03 ${ROW.join(' ')}\n2463366.03 ${ROW.join(' ')}`;
    const { case: orbit, problems } = readCase(text, {});
    expect(orbit).toBeNull();
    expect(problems[0]).toMatchObject({ severity: 'error', line: 3, read: '2 rows' });
  });
});

describe('other forms', () => {
  it('keys in quotes are labels', () => {
    const keys = ['x', 'y', 'z', 'vx', 'vy', 'vz'].map((key, i) => `"${key}": ${ROW[i]}`);
    expect(stateOf(`{ "epoch": "2032-05-12T12:43:12", ${keys.join(', ')} }`)).toEqual(ROW);
  });

  it('a bare modified Julian date before six numbers is the epoch, and that is noted', () => {
    const text = `63364.53 ${ROW.join(' ')}`;
    expect(stateOf(text)).toEqual(ROW);
    const { fields } = readCase(text, {});
    expect(fields.find(({ field }) => field === 'epoch')?.note).toContain('modified Julian date');
  });

  it('a decimal comma of an instant is not cut off', () => {
    const labelled = 'x y z vx vy vz'
      .split(' ')
      .map((key, i) => `${key} = ${ROW[i]}`)
      .join('\n');
    for (const instant of ['JD 2463365,03', 'MJD 63364,53', '2032 May 12,53']) {
      expect(stateOf(`${instant}\n${labelled}`)).toEqual(ROW);
    }
  });

  it('points that can only group are read as grouping', () => {
    const text = '2032-05-12T12:43:12\n-10.919.757 -103.043.558 -70.662.679\n29 -11 -2';
    expect(stateOf(text)).toEqual([-10919757, -103043558, -70662679, 29, -11, -2]);
    const { fields } = readCase(text, {});
    expect(fields.find(({ field }) => field === 'epoch')?.value).toBe('2032-05-12T12:43:12');
  });
});

describe('long texts', () => {
  // A count of steps is not to be had; a quadratic reader would take minutes over these.
  const rows: Record<string, string> = {
    blanks: `x${' '.repeat(1e6)}y`,
    hashes: '#'.repeat(1e6),
    brackets: `CCSDS_OPM_VERS = 3.0\nX = ${'['.repeat(1e6)}`,
    'words that say something': 'km earth '.repeat(1e5),
    dates: '2031-05-12 '.repeat(9e4),
    labels: 'velocity x = 1 '.repeat(6e4),
    'empty lines': `${'\n'.repeat(1e6)}x`,
  };
  for (const [name, text] of Object.entries(rows)) {
    it(`of ${name} end, without a case`, () => expect(readCase(text, {}).case).toBeNull());
  }

  it('are said not to be read in full', () => {
    const text = `2032-05-12T12:43:12 TDB\n${ROW.join(' ')}\n${'a note\n'.repeat(3000)}`;
    const { problems } = readCase(text, {});
    expect(problems).toMatchObject([{ severity: 'warning', line: 2001 }]);
  });
});

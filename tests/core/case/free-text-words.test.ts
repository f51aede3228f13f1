import { describe, expect, it } from 'vitest';
import { readCase } from '../../../core/case/read';
import type { Problem, ReadResult } from '../../../core/case/types';

/** What the words of a text say must never be lost: a lost one is an answer for another orbit. */

/** Invented. */
const STATE =
  '-10919757.4638 -103043558.9999 -70662679.3512\n29.4661585877 -11.8193145026 -2.464415455';
const NEAR = '300000 10000 20000 km\n-0.5 1 0.2 km/s';
const EPOCH = '2032-05-12T12:43:12 TDB';

const errors = (result: ReadResult): Problem[] =>
  result.problems.filter((item) => item.severity === 'error');
const fieldOf = (result: ReadResult, name: string): { value: string; origin: string } | null => {
  const found = result.fields.find((item) => item.field === name);
  return found === undefined ? null : { value: found.value, origin: found.origin };
};

describe('the time scale is read', () => {
  const texts: Record<string, string> = {
    'in brackets behind the word epoch': `Epoch (UTC): 2032-05-12 12:43:12\n${STATE}`,
    'behind the second form of the same instant': `2463365.030000000 = A.D. 2032-May-12 12:43:12.0000 UTC\n${STATE}`,
    'on a line of its own': `Time scale: UTC\n2032-05-12T12:43:12\n${STATE}`,
    'in small letters': `epoch 2032-05-12T12:43:12\nscale utc\n${STATE}`,
    'in the name of a column': `JDUTC X Y Z VX VY VZ\n2463365.03 ${STATE.replace('\n', ' ')}`,
  };
  for (const [place, text] of Object.entries(texts)) {
    it(place, () => {
      const result = readCase(text, {});
      expect(errors(result)).toEqual([]);
      expect(fieldOf(result, 'timeScale')).toEqual({ value: 'UTC', origin: 'read' });
    });
  }

  it('and two that differ are asked about', () => {
    const result = readCase(`Epoch (UTC): 2032-05-12 12:43:12\nall times TDB\n${STATE}`, {});
    expect(result.case).toBeNull();
    expect(result.questions[0]).toMatchObject({ field: 'timeScale' });
    expect(result.questions[0].readings.map(({ value }) => value)).toEqual(['UTC', 'TDB']);
  });

  it('and one that is not carried is refused, not replaced', () => {
    for (const text of [
      `2032-05-12T12:43:12 UT1\n${STATE}`,
      `time system: TCB\n2032-05-12T12:43:12\n${STATE}`,
      `2032-05-12T12:43:12+02:00\n${STATE}`,
    ]) {
      const result = readCase(text, {});
      expect(result.case).toBeNull();
      expect(errors(result)).toHaveLength(1);
      expect(errors(result)[0].line).toBe(1);
    }
  });
});

describe('the centre is read', () => {
  const said: Record<string, string> = {
    'Center body name: Earth (399)': 'Earth',
    'Central body: Earth': 'Earth',
    'origin = EARTH': 'Earth',
    'wrt Earth': 'Earth',
    'relative to the Earth': 'Earth',
    'Earth-centred inertial': 'Earth',
    geocentric: 'Earth',
    'state about the Moon': 'Moon',
    'CENTRE: MOON': 'Moon',
    'Earth-Moon barycenter': 'EarthBarycentre',
    'centre: EMB': 'EarthBarycentre',
  };
  for (const [words, centre] of Object.entries(said)) {
    it(`from “${words}”`, () => {
      const result = readCase(`${words}\n${EPOCH}\n${NEAR}`, {});
      expect(errors(result)).toEqual([]);
      expect(fieldOf(result, 'centre')).toEqual({ value: centre, origin: 'read' });
      expect(result.case?.centre).toBe(centre);
    });
  }

  it('from the code of the Sun and of the solar-system barycentre', () => {
    for (const [words, centre] of [
      ['Center body name: Sun (10)', 'Sun'],
      ['Center: Solar System Barycenter (0)', 'SSB'],
    ]) {
      expect(readCase(`${words}\n${EPOCH}\n${STATE}`, {}).case?.centre).toBe(centre);
    }
  });

  it('and one that is not carried is refused, not replaced by the Sun', () => {
    for (const words of ['Centre: Mars', 'venus-centered', 'areocentric', 'center = L2']) {
      const result = readCase(`${words}\n${EPOCH}\n${STATE}`, {});
      expect(result.case).toBeNull();
      expect(errors(result)).toHaveLength(1);
      expect(errors(result)[0]).toMatchObject({ field: 'centre', line: 1 });
    }
  });
});

describe('axes', () => {
  it('that are fixed to the Earth or of date are refused, not taken as inertial', () => {
    for (const words of [
      'ECEF',
      'ITRF2014',
      'TEME',
      'true equator of date',
      'frame: XYZ',
      'B1950',
    ]) {
      const result = readCase(`${words}\n${EPOCH}\n${STATE}`, {});
      expect(result.case).toBeNull();
      expect(errors(result)[0]).toMatchObject({ field: 'axes', line: 1 });
    }
  });

  it('of the ecliptic are read in their long form', () => {
    const words = 'Reference frame : Ecliptic of J2000.0';
    expect(readCase(`${words}\n${EPOCH}\n${STATE}`, {}).case?.axes).toBe('EclipticJ2000');
  });
});

describe('units', () => {
  it('of the whole table are read from one word', () => {
    const au = '-0.0729940 -0.6888036 -0.4723508\n0.0170181306 -0.0068262253 -0.0014233190';
    const result = readCase(`Output units: AU-D\n${EPOCH}\n${au}`, {});
    expect(fieldOf(result, 'lengthUnit')).toEqual({ value: 'au', origin: 'read' });
    expect(fieldOf(result, 'speedUnit')).toEqual({ value: 'au/d', origin: 'read' });
  });

  it('of the body are not those of the state', () => {
    const body =
      'H=22.1, G=0.15, A2=-1.2e-14 au/d^2\ndiameter=0.12 km albedo=0.14 density=2.1 g/cm3 strength=1 MPa';
    const result = readCase(`${EPOCH}\n${STATE}\n${body}`, {});
    expect(errors(result)).toEqual([]);
    expect(fieldOf(result, 'lengthUnit')).toEqual({ value: 'km', origin: 'assumed' });
    expect(result.case?.nonGravitational).toEqual({ a1AuD2: 0, a2AuD2: -1.2e-14, a3AuD2: 0 });
    expect(result.case?.physical).toEqual({
      absoluteMagnitude: 22.1,
      slopeParameter: 0.15,
      diameterM: 120,
      albedo: 0.14,
      densityKgM3: 2100,
      strengthPa: 1e6,
    });
  });

  it('of angles are radians when the text says so, and that is noted', () => {
    const text = `${EPOCH}\nangles in radians\na=1.2 e=0.2 i=0.1 node=0.2 peri=0.3 M=0.4`;
    const result = readCase(text, {});
    const state = result.case?.state;
    if (state?.kind !== 'elements') throw new Error('no elements');
    // 0.1 rad in degrees, by definition; one rounding.
    expect(state.inclinationDeg).toBeCloseTo(18 / Math.PI, 14);
    expect(result.fields.find(({ field }) => field === 'inclination')?.note).toContain('0.1 rad');
  });
});

describe('uncertainties in free text', () => {
  it('are said to be unused when they are not those of a whole set', () => {
    const text = `${EPOCH}\na = 1.2 ± 0.001\ne = 0.2\ni = 5\nnode = 10\nperi = 20\nM = 30`;
    const { problems, case: orbit } = readCase(text, {});
    expect(orbit).not.toBeNull();
    expect(problems).toMatchObject([{ severity: 'warning', line: 2, read: '0.001' }]);
  });
});

import { describe, expect, it } from 'vitest';
import { DEMOS } from '../../../app/desk/demos';
import { parseCaseFile, readDesk, writeCaseFile } from '../../../core/case/case-file';
import { readCase } from '../../../core/case/read';
import type { Problem, ReadResult } from '../../../core/case/types';

/** Invented states throughout. */
const KVN = DEMOS[0].text;
const XML = `<?xml version="1.0" encoding="UTF-8"?>
<opm id="CCSDS_OPM_VERS" version="3.0">
  <header><COMMENT>An invented object</COMMENT><CREATION_DATE>2031-03-01T09:00:00</CREATION_DATE><ORIGINATOR>DEMO</ORIGINATOR></header>
  <body><segment>
    <metadata>
      <OBJECT_NAME>Invented A</OBJECT_NAME><OBJECT_ID>INVENTED-A</OBJECT_ID>
      <CENTER_NAME>SUN</CENTER_NAME><REF_FRAME>ICRF</REF_FRAME><TIME_SYSTEM>TDB</TIME_SYSTEM>
    </metadata>
    <data>
      <stateVector>
        <EPOCH>2031-03-01T00:00:00.000</EPOCH>
        <X units="km">-116968342.9423</X><Y units="km">10740112.8277</Y><Z units="km">19883009.1765</Z>
        <X_DOT units="km/s">-17.3091705923</X_DOT><Y_DOT units="km/s">-23.9733256970</Y_DOT><Z_DOT units="km/s">-10.7018195987</Z_DOT>
      </stateVector>
      <userDefinedParameters><USER_DEFINED parameter="A2">-5.6e-14</USER_DEFINED></userDefinedParameters>
    </data>
  </segment></body>
</opm>`;

const errors = (result: ReadResult): Problem[] =>
  result.problems.filter((item) => item.severity === 'error');
/** The KVN with a line's value replaced; its 1-based line. */
const withLine = (key: string, line: string): { text: string; at: number } => {
  const lines = KVN.split('\n');
  const index = lines.findIndex((item) => item.startsWith(`${key} =`));
  lines[index] = line;
  return { text: lines.join('\n'), at: index + 1 };
};

describe('an OPM in KVN', () => {
  it('is read with its covariance and its own keys', () => {
    const { case: orbit, problems } = readCase(KVN, {});
    expect(problems).toEqual([]);
    expect(orbit).toMatchObject({
      name: 'Invented A, low pass',
      objectId: 'INVENTED-A',
      originator: 'SKIMLINE DEMO',
      invented: true,
      centre: 'Sun',
      axes: 'ICRF',
      epoch: { scale: 'TDB', mjd: 62926, secondOfDay: 0 },
      state: { kind: 'cartesian', positionKm: [-116968342.9423, 10740112.8277, 19883009.1765] },
      covariance: { frame: 'RTN' },
      physical: { absoluteMagnitude: 23.9, slopeParameter: 0.15 },
    });
    const { covariance } = orbit ?? {};
    expect(covariance?.kind).toBe('cartesian');
    if (covariance?.kind !== 'cartesian') return;
    expect(covariance.lowerTriangle).toHaveLength(21);
    expect(covariance.lowerTriangle[2]).toBe(14400);
  });

  it('and in XML says the same', () => {
    const kvn = readCase(KVN, {}).case;
    const xml = readCase(XML, {});
    expect(errors(xml)).toEqual([]);
    expect(xml.format).toBe('opm-xml');
    expect(xml.case?.state).toEqual(kvn?.state);
    expect(xml.case?.epoch).toEqual(kvn?.epoch);
    expect(xml.case?.nonGravitational).toEqual({ a1AuD2: 0, a2AuD2: -5.6e-14, a3AuD2: 0 });
    expect(xml.case?.invented).toBe(true);
  });

  it('has its problems beside their lines, with field, what was read and what was expected', () => {
    const cases: [string, string, RegExp][] = [
      ['X', 'X = 12abc [km]', /x: read “12abc”; expected a number/],
      ['X', 'X = -116968342.9423 [au]', /X: read .*\[au\].*expected .*\[km\]/],
      ['CENTER_NAME', 'CENTER_NAME = MARS', /CENTER_NAME: read “MARS”/],
      ['REF_FRAME', 'REF_FRAME = ITRF2000', /REF_FRAME: read “ITRF2000”.*Earth-fixed/],
      ['TIME_SYSTEM', 'TIME_SYSTEM = UT1', /TIME_SYSTEM: read “UT1”/],
      ['EPOCH', 'EPOCH = 2031-02-30T00:00:00', /2031-02-30|day/],
      ['COV_REF_FRAME', 'COV_REF_FRAME = ABC', /COV_REF_FRAME: read “ABC”/],
      ['CX_X', 'CX_X = -900', /CX_X.*zero or more/],
      ['X_DOT', 'X_DOT -17.3', /OPM: read “X_DOT -17.3”; expected a line of the form/],
    ];
    for (const [key, line, words] of cases) {
      const { text, at } = withLine(key, line);
      const result = readCase(text, {});
      expect(result.case).toBeNull();
      const here = errors(result).filter((item) => item.line === at);
      expect([key, here.length]).toEqual([key, 1]);
      expect(here[0].message).toMatch(words);
    }
  });

  it('says which mandatory keyword is missing, and which stands twice', () => {
    const missing = readCase(KVN.replace(/^Y_DOT.*\n/m, ''), {});
    expect(errors(missing).map((item) => item.field)).toContain('Y_DOT');
    const twice = readCase(KVN.replace(/^(Y_DOT.*\n)/m, '$1$1'), {});
    expect(errors(twice).some((item) => item.field === 'Y_DOT')).toBe(true);
  });

  it('assumes centre, frame and scale in the open when they are left out', () => {
    const result = readCase(KVN.replace(/^(CENTER_NAME|REF_FRAME|TIME_SYSTEM).*\n/gm, ''), {});
    expect(result.case).not.toBeNull();
    for (const name of ['centre', 'axes', 'timeScale']) {
      expect(result.fields.find((item) => item.field === name)?.origin).toBe('assumed');
    }
  });

  it('takes every centre, frame and scale that is named', () => {
    const take = (key: string, value: string) =>
      readCase(withLine(key, `${key} = ${value}`).text, {}).case;
    expect(take('CENTER_NAME', 'SOLAR SYSTEM BARYCENTER')?.centre).toBe('SSB');
    expect(take('CENTER_NAME', 'SSB')?.centre).toBe('SSB');
    expect(take('CENTER_NAME', 'EARTH BARYCENTER')?.centre).toBe('EarthBarycentre');
    expect(take('CENTER_NAME', 'EARTH')?.centre).toBe('Earth');
    expect(take('CENTER_NAME', 'MOON')?.centre).toBe('Moon');
    expect(take('REF_FRAME', 'GCRF')?.axes).toBe('ICRF');
    expect(take('REF_FRAME', 'EME2000')?.axes).toBe('ICRF');
    expect(take('REF_FRAME', 'ECLIPJ2000')?.axes).toBe('EclipticJ2000');
    for (const scale of ['TT', 'TAI', 'UTC', 'GPS']) {
      expect(take('TIME_SYSTEM', scale)?.epoch.scale).toBe(scale);
    }
  });

  it('notes the spacecraft block and warns of manoeuvres', () => {
    const result = readCase(`${KVN}MASS = 100\nMAN_DV_1 = 0.1\n`, {});
    expect(result.case).not.toBeNull();
    expect(result.problems.map((item) => item.severity).sort()).toEqual(['note', 'warning']);
  });

  it('uses the Keplerian block when there is no state', () => {
    const block = `SEMI_MAJOR_AXIS = 150000000\nECCENTRICITY = 0.3\nINCLINATION = 5\nRA_OF_ASC_NODE = 10\nARG_OF_PERICENTER = 20\nTRUE_ANOMALY = 30\nGM = 132712440041.9394\n`;
    const result = readCase(KVN.replace(/^[XYZ](_DOT)? =.*\n/gm, '') + block, {});
    expect(errors(result)).toEqual([]);
    expect(result.case?.state).toMatchObject({ kind: 'elements', periapsisKm: 105000000 });
  });

  it('that is another message is refused by name', () => {
    const result = readCase(KVN.replace('CCSDS_OPM_VERS', 'CCSDS_OEM_VERS'), {});
    expect(result.case).toBeNull();
    expect(errors(result)[0].message).toMatch(/CCSDS_OEM_VERS/);
  });

  it('in broken XML is told where it breaks', () => {
    const result = readCase(XML.replace('</stateVector>', ''), {});
    expect(result.case).toBeNull();
    expect(errors(result)[0].line).toBeGreaterThan(10);
  });
});

describe('a case file', () => {
  it('brings back every case, with what was set by hand', () => {
    for (const { text } of DEMOS) {
      const choices = { gm: 'DE405', name: 'renamed' };
      const orbit = readCase(text, choices).case;
      if (orbit === null) throw new Error('no case');
      const desk = { text, choices, clockTdbSeconds: 9e8, plateFindings: ['moid'] };
      const file = writeCaseFile(orbit, desk);
      expect(readCase(file, {}).case).toEqual(orbit);
      expect(readDesk(file)).toEqual(desk);
    }
  });

  it('without its text gives the same case from the case alone', () => {
    for (const { text } of DEMOS) {
      const orbit = readCase(text, { spanTo: '2035-01-01' }).case;
      if (orbit === null) throw new Error('no case');
      const alone = JSON.stringify({ format: 'skimline-case', version: 1, case: orbit });
      const again = readCase(alone, {});
      expect(errors(again)).toEqual([]);
      expect(again.case).toEqual(orbit);
    }
  });

  it('that is none is told where, and what was expected', () => {
    expect(errors(readCase('{ "format": "skimline-case", ', {}))).toHaveLength(1);
    const wrong = readCase('{\n "format": "skimline-case",\n "version": 2\n}', {});
    expect(errors(wrong)[0].line).toBe(3);
    expect(parseCaseFile('{}').file).toBeNull();
  });
});

import { readFileSync } from 'node:fs';
import { Ajv } from 'ajv';
import { beforeAll, describe, expect, it } from 'vitest';
import { DEMOS } from '../../../app/desk/demos';
import { runAssessment } from '../../../core/assess';
import { readCase } from '../../../core/case/read';
import { SAMPLE } from '../../../core/dynamics/sample-layout';
import { Trajectory } from '../../../core/dynamics/trajectory';
import { createEphemeris } from '../../../core/ephemeris';
import { fingerprintOf, reportJsonText } from '../../../core/report/canonical';
import { writeEphemerisCsv } from '../../../core/report/ephemeris-csv';
import { writeOem } from '../../../core/report/oem';
import type { Report } from '../../../core/report/report';
import { publishedSchemas } from '../../../core/report/schema';
import { fetchPacked, MADE_AT } from '../../helpers/assess';

/** The invented demonstration cases, carried through the whole pipeline. */

interface Outcome {
  report: Report;
  trajectory: Trajectory;
}

async function assessText(text: string, madeAt = MADE_AT): Promise<Outcome> {
  const reading = readCase(text, {});
  if (reading.case === null) throw new Error(JSON.stringify(reading.problems));
  const trajectory = new Trajectory();
  const report = await runAssessment(
    { text, reading, case: reading.case, madeAt },
    createEphemeris(),
    {
      fetchFile: fetchPacked,
      emit: (event) => {
        if (event.type === 'states') trajectory.append(event.direction, event.samples);
      },
      pause: async () => {},
      cancelled: () => false,
    },
  );
  return { report, trajectory };
}

const outcomes = new Map<string, Outcome>();
const of = (id: string): Outcome => {
  const found = outcomes.get(id);
  if (found === undefined) throw new Error(`no demo ${id}`);
  return found;
};
const main = ({ report }: Outcome) => report.approaches[report.principal ?? -1];

beforeAll(async () => {
  for (const demo of DEMOS) outcomes.set(demo.id, await assessText(demo.text));
});

describe('the report', () => {
  it('of every demonstration case is valid by the published schema, and a maimed one is not', () => {
    const schema = JSON.parse(
      readFileSync(new URL('../../../public/schema/report.schema.json', import.meta.url), 'utf8'),
    );
    const validate = new Ajv({ strict: false }).compile(schema);
    for (const { report } of outcomes.values()) {
      const file: unknown = JSON.parse(reportJsonText(report));
      expect([validate(file), validate.errors]).toEqual([true, null]);
    }
    const { approaches: _, ...maimed } = of('pass').report;
    expect(validate(maimed)).toBe(false);
    expect(validate({ ...of('pass').report, fingerprint: 7 })).toBe(false);
  });

  it('has the schemas that are published', () => {
    for (const [name, text] of Object.entries(publishedSchemas())) {
      const published = readFileSync(
        new URL(`../../../public/schema/${name}`, import.meta.url),
        'utf8',
      );
      expect(published).toBe(text);
    }
  });

  it('of the same case has the same bytes but for the time of making', async () => {
    const text = DEMOS[0].text;
    const again = await assessText(text, '2027-01-01T00:00:00Z');
    const before = of('pass').report;
    expect(again.report.fingerprint).toBe(before.fingerprint);
    expect(reportJsonText({ ...again.report, madeAt: MADE_AT })).toBe(reportJsonText(before));
  });

  it('has another fingerprint when any figure changes', () => {
    const { report } = of('pass');
    const changed = { ...report, classical: null };
    expect(fingerprintOf(changed)).not.toBe(report.fingerprint);
  });

  it('tells each outcome, with the caution exactly where the air is reached', () => {
    const caution = /civil-protection authority/;
    const told = (id: string): string => of(id).report.findings[0].text;
    for (const id of ['pass', 'wide-miss', 'lunar-near-miss', 'slow']) {
      expect(told(id)).toMatch(/^Passes /);
      expect(of(id).report.cautions.join(' ')).not.toMatch(caution);
      expect(main(of(id)).outcome).toBe('pass');
    }
    expect(told('graze')).toMatch(/^Reaches the atmosphere/);
    expect(told('impact')).toMatch(/strikes the Earth/);
    for (const id of ['graze', 'impact']) {
      expect(of(id).report.cautions.join(' ')).toMatch(caution);
      expect(of(id).report.findings[0].caution).toMatch(caution);
    }
  });

  it('says in its sentences the figures that stand in its sections', () => {
    for (const [, outcome] of outcomes) {
      const { findings } = outcome.report;
      for (const finding of findings) {
        expect(finding.text).not.toMatch(/NaN|undefined|null|Infinity/);
        expect(finding.text).not.toMatch(/!/);
      }
      const approach = main(outcome);
      if (approach.outcome !== 'pass' || approach.distanceKm > 1e6) continue;
      const digits = findings[0].text.replace(/\u2009/g, '');
      expect(digits).toContain(`${Math.round(approach.distanceKm)}km`);
    }
  });

  it('calls an invented case invented', () => {
    for (const { report } of outcomes.values()) {
      expect(report.case.invented).toBe(true);
      expect(report.cautions.join(' ')).toMatch(/invented/);
    }
  });

  it('lists what was assumed', () => {
    const fields = of('impact').report.case.asAssumed.map((item) => item.field);
    expect(fields).toContain('gm');
    expect(of('pass').report.case.asAssumed.map((item) => item.field)).not.toContain('axes');
  });
});

describe('the OEM', () => {
  it('has the header, the metadata in order and rising epochs that 502.0-B-3 asks for', () => {
    for (const { report, trajectory } of outcomes.values()) {
      const lines = writeOem(report, trajectory.samples()).split('\n');
      expect(lines[0]).toBe('CCSDS_OEM_VERS = 3.0');
      expect(lines.some((line) => line.startsWith('CREATION_DATE = '))).toBe(true);
      expect(lines.some((line) => line.startsWith('ORIGINATOR = '))).toBe(true);
      const keys = [
        'OBJECT_NAME',
        'OBJECT_ID',
        'CENTER_NAME',
        'REF_FRAME',
        'TIME_SYSTEM',
        'START_TIME',
        'STOP_TIME',
      ];
      const starts = lines.flatMap((line, i) => (line === 'META_START' ? [i] : []));
      expect(starts.length).toBeGreaterThan(0);
      for (const [n, start] of starts.entries()) {
        expect(lines.slice(start + 1, start + 8).map((line) => line.split(' = ')[0])).toEqual(keys);
        const end = starts[n + 1] ?? lines.length;
        const stop = lines.indexOf('META_STOP', start);
        const rows = lines.slice(stop + 1, end).filter((line) => line !== '');
        const epochs = rows.map((row) => row.split(' ')[0]);
        expect(epochs.length).toBeGreaterThan(1);
        expect(epochs).toEqual([...new Set(epochs)].sort());
        for (const row of rows) expect(row.split(' ')).toHaveLength(7);
        expect(lines[start + 6]).toBe(`START_TIME = ${epochs[0]}`);
        expect(lines[start + 7]).toBe(`STOP_TIME = ${epochs.at(-1)}`);
      }
    }
  });

  it('carries the states of the trajectory: geocentric distance at the pass', () => {
    const { report, trajectory } = of('pass');
    const text = writeOem(report, trajectory.samples());
    const earth = text.slice(text.indexOf('CENTER_NAME = EARTH'));
    const distances = earth
      .split('\n')
      .filter((line) => /^\d{4}-/.test(line))
      .map((line) => Math.hypot(...line.split(' ').slice(1, 4).map(Number)));
    const least = Math.min(...distances);
    // Samples stand apart; none can be nearer than the closest approach, one must be near it.
    expect(least).toBeGreaterThanOrEqual(main(of('pass')).distanceKm - 0.001);
    expect(least).toBeLessThan(main(of('pass')).distanceKm * 1.02);
  });
});

describe('the CSV', () => {
  it('has as many fields in every row as in its head', () => {
    const { trajectory } = of('impact');
    const lines = writeEphemerisCsv(trajectory.samples()).trimEnd().split('\r\n');
    const head = lines[0].split(',');
    expect(head).toContain('geocentricIcrf.xKm');
    expect(lines).toHaveLength(trajectory.count + 1);
    for (const line of lines) expect(line.split(',')).toHaveLength(head.length);
    expect(lines.join('')).not.toMatch(/NaN|Infinity/);
  });
});

describe('the streamed trajectory', () => {
  it('interpolates the pass to within a kilometre of the reported distance', () => {
    for (const id of ['pass', 'graze', 'slow']) {
      const approach = main(of(id));
      const sample = new Float64Array(SAMPLE.stride);
      expect(of(id).trajectory.at(approach.tdbSeconds, sample)).toBe(true);
      const at = SAMPLE.object;
      const distance = Math.hypot(sample[at], sample[at + 1], sample[at + 2]);
      expect(Math.abs(distance - approach.distanceKm)).toBeLessThan(1);
    }
  });

  it('ends where an impact does', () => {
    const { trajectory } = of('impact');
    const surface = main(of('impact')).surfaceImpact;
    expect(surface).toBeDefined();
    // The end of the last sample is the root of the altitude, to the rounding of 1e9 s.
    expect(Math.abs(trajectory.toTdbSeconds - (surface?.tdbSeconds ?? 0))).toBeLessThan(1e-5);
  });
});

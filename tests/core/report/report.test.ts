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
import { fetchPacked, MADE_AT } from '../../helpers/assess';
import { published } from './published';
import { readOem } from './read-oem';

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
  it('of every demonstration case is valid by the published schema', () => {
    const validate = published('report.schema.json');
    for (const { report } of outcomes.values()) {
      const file: unknown = JSON.parse(reportJsonText(report));
      expect([validate(file), validate.errors]).toEqual([true, null]);
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

describe('the OEM of a demonstration case', () => {
  it('is one by 502.0-B-3', () => {
    for (const { report, trajectory } of outcomes.values()) {
      const { segments } = readOem(writeOem(report, trajectory.samples()));
      expect(segments[0].meta.get('CENTER_NAME')).toBe('SUN');
      expect(segments[0].states.length).toBeGreaterThan(100);
    }
  });

  it('carries the states of the trajectory: geocentric distance at the pass', () => {
    const { report, trajectory } = of('pass');
    const { segments } = readOem(writeOem(report, trajectory.samples()));
    const earth = segments.find((segment) => segment.meta.get('CENTER_NAME') === 'EARTH');
    const distances = (earth?.states ?? []).map((state) => Math.hypot(...state.slice(0, 3)));
    const least = Math.min(...distances);
    // Samples stand apart; none can be nearer than the closest approach, one must be near it.
    expect(least).toBeGreaterThanOrEqual(main(of('pass')).distanceKm - 0.001);
    expect(least).toBeLessThan(main(of('pass')).distanceKm * 1.02);
  });
});

describe('the CSV of a demonstration case', () => {
  it('has a row for every sample, without a hole', () => {
    const { trajectory } = of('impact');
    const text = writeEphemerisCsv(trajectory.samples());
    expect(text.trimEnd().split('\r\n')).toHaveLength(trajectory.count + 1);
    expect(text).not.toMatch(/NaN|Infinity|,,/);
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

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { writeCaseFile } from '../../../core/case/case-file';
import { sealReport } from '../../../core/report/canonical';
import { writeFindings } from '../../../core/report/findings';
import { REPORT_VERSION, type Report } from '../../../core/report/report';
import { publishedSchemas } from '../../../core/report/schema';
import { caseOf } from '../../helpers/assess';
import { draftOf, farPass, GRAZE, IMPACT, MOON_IMPACT } from './drafts';
import { published, publishedText } from './published';

/** The published schemas, read by a validator of its own (ajv, JSON Schema draft-07). */

function sample(): Report {
  const draft = draftOf([IMPACT, GRAZE, MOON_IMPACT, farPass('Venus', '2041-06-01T12:00:00', 2e7)]);
  const madeAt = '2040-12-01T00:00:00Z';
  const head = { format: 'skimline-report', version: REPORT_VERSION, madeAt } as const;
  return sealReport({ ...head, ...draft, ...writeFindings(draft) });
}

type Path = (string | number)[];

/** Paths of every member of plain data, from the outside in. */
function pathsOf(value: unknown, path: Path = []): Path[] {
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value).flatMap(([key, item]) => {
    const own = [...path, Array.isArray(value) ? Number(key) : key];
    return [own, ...pathsOf(item, own)];
  });
}

function parentOf(root: Report, path: Path): Record<string | number, unknown> {
  let at: unknown = root;
  for (const key of path.slice(0, -1)) at = (at as Record<string | number, unknown>)[key];
  return at as Record<string | number, unknown>;
}
const last = (path: Path): string | number => path[path.length - 1];

/** Members a report may do without, and tables whose keys are free. */
const MAY_MISS = [
  'entry',
  'surfaceImpact',
  'uncertainty',
  'impactProbability',
  'orbitBefore',
  'orbitAfter',
];
const FREE_TABLES = ['physical', 'constants', 'searchLimitsKm'];

describe('the published schemas', () => {
  it('are those of the code: npm run schema was not forgotten', () => {
    for (const [name, text] of Object.entries(publishedSchemas())) {
      expect(publishedText(name)).toBe(text);
    }
  });

  it('have a title, a description and a relative name', () => {
    for (const [name, id] of [
      ['report.schema.json', 'skimline-report-1'],
      ['case.schema.json', 'skimline-case-1'],
    ]) {
      const schema = JSON.parse(publishedText(name));
      expect(schema.$id).toBe(id);
      expect(schema.title).toMatch(/^Skimline /);
      expect(schema.description.length).toBeGreaterThan(50);
    }
  });
});

describe('the schema of the report', () => {
  const validate = published('report.schema.json');

  it('takes a report with every outcome', () => {
    expect([validate(sample()), validate.errors]).toEqual([true, null]);
  });

  it('refuses a report that lacks any key that is not optional, however deep', () => {
    const paths = pathsOf(sample()).filter(
      (path) => typeof last(path) === 'string' && !FREE_TABLES.includes(String(path.at(-2))),
    );
    const accepted = paths.filter((path) => {
      const maimed = structuredClone(sample());
      delete parentOf(maimed, path)[last(path)];
      return validate(maimed);
    });
    expect(paths.length).toBeGreaterThan(300);
    expect(accepted.filter((path) => !MAY_MISS.includes(String(last(path))))).toEqual([]);
    expect(accepted.length).toBeGreaterThan(0);
  });

  it('refuses vectors of two or four components', () => {
    for (const vector of [
      [1, 2],
      [1, 2, 3, 4],
    ]) {
      const maimed = structuredClone(sample());
      Object.assign(maimed.case.normalised, { positionKm: vector });
      expect(validate(maimed)).toBe(false);
    }
  });

  it('refuses NaN, infinity and text in place of any number', () => {
    const report = sample();
    const numbers = pathsOf(report).filter(
      (path) => typeof parentOf(report, path)[last(path)] === 'number',
    );
    fc.assert(
      fc.property(
        fc.constantFrom(...numbers),
        fc.constantFrom(Number.NaN, Number.POSITIVE_INFINITY, '7'),
        (path, bad) => {
          const maimed = structuredClone(report);
          parentOf(maimed, path)[last(path)] = bad;
          expect(validate(maimed)).toBe(false);
        },
      ),
    );
  });
});

describe('the schema of the case file', () => {
  const validate = published('case.schema.json');
  const file = (): Record<string, unknown> =>
    JSON.parse(
      writeCaseFile(
        caseOf({
          epoch: { scale: 'TDB', mjd: 66490, secondOfDay: 0 },
          axes: 'ICRF',
          state: { kind: 'cartesian', positionKm: [1e8, -9e7, 1e7], velocityKmS: [20, 21, -3] },
        }),
        {
          text: 'pasted',
          choices: { gm: 'DE405' },
          clockTdbSeconds: null,
          plateFindings: ['moid'],
        },
      ),
    );

  it('takes a case file as it is written', () => {
    expect([validate(file()), validate.errors]).toEqual([true, null]);
  });

  it('refuses one without a case, and one of another format', () => {
    const { case: _, ...bare } = file();
    expect(validate(bare)).toBe(false);
    expect(validate({ ...file(), format: 'skimline-report' })).toBe(false);
  });
});

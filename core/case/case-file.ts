import * as v from 'valibot';
import { ELEMENT_LABELS } from '../uncertainty/covariance';
import type { DeskContent, OrbitCase } from './types';

/** The case file of our own: everything the desk knows, as JSON. */

export const CASE_FILE_VERSION = 1;

const finite = v.pipe(v.number(), v.finite());
const triple = v.strictTuple([finite, finite, finite]);
const epoch = v.object({
  scale: v.picklist(['TDB', 'TT', 'TAI', 'UTC', 'GPS']),
  mjd: v.pipe(v.number(), v.integer()),
  secondOfDay: v.pipe(v.number(), v.minValue(0), v.maxValue(86401)),
});

const isSquareOfLabels = ({ labels, matrix }: { labels: string[]; matrix: number[][] }): boolean =>
  matrix.length === labels.length && matrix.every((row) => row.length === labels.length);

const namesASet = ({ labels }: { labels: string[] }): boolean => {
  const count = (...names: string[]): number =>
    names.filter((name) => labels.includes(name)).length;
  return (
    new Set(labels).size === labels.length &&
    count('e', 'i', 'node', 'peri') === 4 &&
    count('q', 'a') === 1 &&
    count('tp', 'M') === 1
  );
};

const orbitCase = v.object({
  name: v.string(),
  objectId: v.nullable(v.string()),
  invented: v.boolean(),
  originator: v.nullable(v.string()),
  epoch,
  centre: v.picklist(['Sun', 'SSB', 'Earth', 'EarthBarycentre', 'Moon']),
  axes: v.picklist(['ICRF', 'EclipticJ2000']),
  state: v.variant('kind', [
    v.object({ kind: v.literal('cartesian'), positionKm: triple, velocityKmS: triple }),
    v.object({
      kind: v.literal('elements'),
      periapsisKm: finite,
      eccentricity: finite,
      inclinationDeg: finite,
      nodeDeg: finite,
      argumentOfPeriapsisDeg: finite,
      phase: v.variant('kind', [
        v.object({ kind: v.literal('mean-anomaly'), meanAnomalyDeg: finite }),
        v.object({ kind: v.literal('true-anomaly'), trueAnomalyDeg: finite }),
        v.object({ kind: v.literal('periapsis-time'), periapsisEpoch: epoch }),
      ]),
    }),
  ]),
  covariance: v.pipe(
    v.nullable(
      v.variant('kind', [
        v.object({
          kind: v.literal('cartesian'),
          frame: v.picklist(['ICRF', 'EclipticJ2000', 'RTN', 'TNW']),
          lowerTriangle: v.pipe(v.array(finite), v.length(21)),
        }),
        v.object({
          kind: v.literal('elements'),
          labels: v.array(v.picklist(ELEMENT_LABELS)),
          matrix: v.array(v.array(finite)),
        }),
      ]),
    ),
    v.check(
      (given) => given?.kind !== 'elements' || isSquareOfLabels(given),
      'expected a square matrix of as many rows as labels',
    ),
    v.check(
      (given) => given?.kind !== 'elements' || namesASet(given),
      'expected e, i, node, peri, one of q and a, one of tp and M, and any of A1, A2, A3',
    ),
  ),
  /** Epoch of the covariance, where it is said: it must be that of the state. */
  covarianceEpoch: v.exactOptional(epoch),
  nonGravitational: v.nullable(v.object({ a1AuD2: finite, a2AuD2: finite, a3AuD2: finite })),
  physical: v.object({
    absoluteMagnitude: v.exactOptional(finite),
    slopeParameter: v.exactOptional(finite),
    diameterM: v.exactOptional(finite),
    albedo: v.exactOptional(finite),
    densityKgM3: v.exactOptional(finite),
    strengthPa: v.exactOptional(finite),
  }),
  model: v.object({ gm: v.picklist(['DE405', 'DE431']) }),
  span: v.nullable(v.object({ fromTdbSeconds: finite, toTdbSeconds: finite })),
});

export const caseFileSchema = v.object({
  format: v.literal('skimline-case'),
  version: v.literal(CASE_FILE_VERSION),
  /** The case as understood when the file was written. */
  case: orbitCase,
  /** The text it was read from, and what was set by hand: read again when the file is opened. */
  text: v.exactOptional(v.string(), ''),
  choices: v.exactOptional(v.record(v.string(), v.string()), {}),
  desk: v.exactOptional(
    v.object({
      clockTdbSeconds: v.nullable(finite),
      plateFindings: v.array(v.string()),
    }),
    { clockTdbSeconds: null, plateFindings: [] },
  ),
});

export type CaseFile = v.InferOutput<typeof caseFileSchema>;

/** The file as text, indented. */
export function writeCaseFile(orbit: OrbitCase, desk: DeskContent): string {
  const { text, choices, clockTdbSeconds, plateFindings } = desk;
  const file = {
    format: 'skimline-case',
    version: CASE_FILE_VERSION,
    case: orbit,
    text,
    choices,
    desk: { clockTdbSeconds, plateFindings },
  };
  return `${JSON.stringify(file, null, 2)}\n`;
}

/** A case file, or what is wrong with it. */
export function parseCaseFile(
  text: string,
):
  | { file: CaseFile; issue: null }
  | { file: null; issue: { line: number; path: string; message: string } } {
  let data: unknown;
  try {
    data = JSON.parse(text);
  } catch (error) {
    const message = error instanceof Error ? error.message : String(error);
    const at = /position (\d+)/.exec(message);
    const line = at === null ? 1 : text.slice(0, Number(at[1])).split('\n').length;
    return { file: null, issue: { line, path: 'JSON', message } };
  }
  const result = v.safeParse(caseFileSchema, data);
  if (result.success) return { file: result.output, issue: null };
  const first = result.issues[0];
  const path = v.getDotPath(first) ?? 'file';
  const key = path.split('.').at(-1) ?? '';
  const index = text.split('\n').findIndex((line) => line.includes(`"${key}"`));
  return { file: null, issue: { line: index < 0 ? 1 : index + 1, path, message: first.message } };
}

/** What a case file says of the desk; null for any other text, and for a file without a text. */
export function readDesk(text: string): DeskContent | null {
  if (!looksLikeCaseFile(text)) return null;
  const { file } = parseCaseFile(text);
  if (file === null) return null;
  return {
    text: file.text,
    choices: file.choices,
    clockTdbSeconds: file.desk.clockTdbSeconds,
    plateFindings: file.desk.plateFindings,
  };
}

/** Other JSON (a state with its keys in quotes) is read as free text. */
export const looksLikeCaseFile = (text: string): boolean =>
  /^\s*\{/.test(text) && /"(?:format|case)"\s*:/.test(text);

import { readFile, writeFile } from 'node:fs/promises';
import { parseArgs } from 'node:util';
import { type Assessed, AssessmentCancelled, assess } from './assess';
import { readCase } from './case/read';
import { type Choices, FIELD_NAMES, type ReadResult } from './case/types';
import { Trajectory } from './dynamics/trajectory';
import { createEphemeris, type Ephemeris, loadEphemeris } from './ephemeris';
import { Estimate, MOST_CLONES } from './estimate';
import { reportJsonText } from './report/canonical';
import { writeEphemerisCsv } from './report/ephemeris-csv';
import { corridorGeoJson } from './report/geojson';
import { writeOem } from './report/oem';
import type { Report } from './report/report';
import { createCarrier } from './uncertainty/carry';

/** Case on standard input, report on standard output; errors on standard error with exit code 2, warnings there beside the report. */

const USAGE = `Usage: npm run -s assess -- [options] < case.txt > report.json
  --gm DE405|DE431   gravitational parameters (default DE431)
  --from DATE        start of the search (default: 30 days before the epoch)
  --to DATE          end of the search (default: see model.span.rule in the report)
  --set FIELD=VALUE  sets a field of the case, as an edit on the page does (may be repeated)
  --clones N         clones of the impact probability estimate (default 10000; 0 for none)
  --seed S           seed of its random numbers (default 1)
  --oem FILE         also writes the trajectory as a CCSDS OEM
  --csv FILE         also writes the ephemeris as CSV
  --geojson FILE     also writes the ground corridor as GeoJSON, where some clone hits the Earth
  --made-at TIME     time of making written in the report (default: now)
  --help
`;

/** A refusal that is told and ends with exit code 2. */
class Refused extends Error {}

function choicesOf(values: {
  gm?: string | undefined;
  from?: string | undefined;
  to?: string | undefined;
  set?: string[] | undefined;
}): Choices {
  const choices: Choices = {};
  for (const item of values.set ?? []) {
    const at = item.indexOf('=');
    if (at < 1) throw new Refused(`--set ${item}: expected FIELD=VALUE`);
    const field = FIELD_NAMES.find((name) => name === item.slice(0, at));
    if (field === undefined) {
      throw new Refused(`--set ${item}: expected one of the fields ${FIELD_NAMES.join(', ')}`);
    }
    choices[field] = item.slice(at + 1);
  }
  if (values.gm !== undefined) choices.gm = values.gm;
  if (values.from !== undefined) choices.spanFrom = values.from;
  if (values.to !== undefined) choices.spanTo = values.to;
  return choices;
}

function whyNot(reading: ReadResult): string {
  const errors = reading.problems.filter((problem) => problem.severity === 'error');
  const place = (line: number | null): string => (line === null ? '' : `line ${line}: `);
  return [
    ...errors.map((problem) => `${place(problem.line)}${problem.message}`),
    ...reading.questions.map(
      (question) =>
        `${place(question.line)}${question.message} Answer with ${question.readings
          .map((reading) => `--set ${question.field}=${reading.value} (${reading.label})`)
          .join(' or ')}.`,
    ),
  ].join('\n');
}

async function readStandardInput(): Promise<string> {
  const chunks: Uint8Array[] = [];
  for await (const chunk of process.stdin) chunks.push(chunk);
  return Buffer.concat(chunks).toString('utf8');
}

async function fetchFile(name: string): Promise<ArrayBuffer> {
  const bytes = await readFile(new URL(`../public/ephemeris/${name}`, import.meta.url));
  return bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength);
}

function wholeNumber(
  option: string,
  given: string | undefined,
  otherwise: number,
  most: number,
): number {
  if (given === undefined) return otherwise;
  const value = Number(given);
  if (!/^\d+$/.test(given) || value > most) {
    throw new Refused(`${option} ${given}: expected a whole number from 0 to ${most}`);
  }
  return value;
}

/** The report with the estimate of the impact probability, where there is a covariance for it. */
async function estimated(
  { report, estimate: basis }: Assessed,
  clones: number,
  seed: number,
  ephemeris: Ephemeris,
): Promise<Report> {
  if (basis === null || clones === 0) return report;
  const { plan } = basis;
  await loadEphemeris(ephemeris, plan.epochTdbSeconds, plan.toTdbSeconds, fetchFile);
  const carrier = createCarrier(plan, ephemeris);
  return new Estimate(basis, seed).run(clones, {
    carry: async (z) => carrier.carry(z),
    parallel: 1,
    emit: () => {},
    stopped: () => false,
  });
}

async function main(): Promise<void> {
  const { values } = parseArgs({
    options: {
      gm: { type: 'string' },
      from: { type: 'string' },
      to: { type: 'string' },
      set: { type: 'string', multiple: true },
      clones: { type: 'string' },
      seed: { type: 'string' },
      oem: { type: 'string' },
      csv: { type: 'string' },
      geojson: { type: 'string' },
      'made-at': { type: 'string' },
      help: { type: 'boolean' },
    },
  });
  if (values.help === true) {
    process.stderr.write(USAGE);
    return;
  }
  const text = await readStandardInput();
  if (text.trim() === '') {
    throw new Refused(
      'Standard input is empty; expected a case: an OPM, a case file, a state or elements.',
    );
  }
  const reading = readCase(text, choicesOf(values));
  if (reading.case === null) throw new Refused(whyNot(reading));
  const warnings = reading.problems.filter(({ severity }) => severity === 'warning');
  for (const { line, message } of warnings) {
    process.stderr.write(`Warning: ${line === null ? '' : `line ${line}: `}${message}\n`);
  }
  const trajectory = new Trajectory();
  const clones = wholeNumber('--clones', values.clones, 10_000, MOST_CLONES);
  const seed = wholeNumber('--seed', values.seed, 1, 2 ** 32 - 1);
  const ephemeris = createEphemeris();
  const assessed = await assess(
    {
      text,
      reading,
      case: reading.case,
      madeAt: values['made-at'] ?? new Date().toISOString(),
    },
    ephemeris,
    {
      fetchFile,
      emit: (event) => {
        if (event.type === 'states') trajectory.append(event.direction, event.samples);
      },
      pause: async () => {},
      cancelled: () => false,
    },
  );
  const report = await estimated(assessed, clones, seed, ephemeris);
  const samples = trajectory.samples();
  if (values.oem !== undefined) await writeFile(values.oem, writeOem(report, samples));
  if (values.csv !== undefined) await writeFile(values.csv, writeEphemerisCsv(samples));
  if (values.geojson !== undefined) {
    if (report.corridor === undefined) {
      throw new Refused(
        '--geojson: there is no ground corridor; no impact of the Earth was found, or none was looked for.',
      );
    }
    await writeFile(values.geojson, corridorGeoJson(report));
  }
  process.stdout.write(reportJsonText(report));
}

main().catch((error: unknown) => {
  const known =
    error instanceof Refused ||
    error instanceof AssessmentCancelled ||
    (error instanceof Error && 'code' in error);
  const words = error instanceof Error ? (known ? error.message : (error.stack ?? '')) : `${error}`;
  process.stderr.write(`${words}\n`);
  process.exitCode = 2;
});

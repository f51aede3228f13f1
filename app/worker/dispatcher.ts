import type { Choices, OrbitCase, ReadResult } from '../../core/case/types';
import type { AssessEvent, AssessHost, AssessInput } from '../../core/events';
import type { Report } from '../../core/report/report';
import { fileStem, slug } from './file-name';
import type { DeskState, ExportKind, Request, Response, WireError } from './messages';
import { Trajectory } from './trajectory';

/** Writers of the files that are handed over. */
export interface Writers {
  reportJsonText(report: Report): string;
  writeOem(report: Report, samples: Float64Array): string;
  writeEphemerisCsv(samples: Float64Array): string;
  writeCaseFile(orbit: OrbitCase, desk: DeskState): string;
}

export interface DispatcherDeps<Ephemeris> {
  readCase(text: string, choices: Choices): ReadResult;
  /** What a case file says of the desk; null for any other text. */
  readDesk(text: string): DeskState | null;
  runAssessment(input: AssessInput, ephemeris: Ephemeris, host: AssessHost): Promise<Report>;
  writers: Writers;
  ephemeris: Ephemeris;
  fetchFile(name: string): Promise<ArrayBuffer>;
  post(message: Response, transfer: Transferable[]): void;
  pause(): Promise<void>;
}

/** An export was asked for before there was anything to write. */
class NothingToExport extends Error {
  readonly code = 'nothing-to-export';
  override name = 'NothingToExport';
}

/** An error in the form that crosses between threads. */
function toWireError(error: unknown): WireError {
  if (!(error instanceof Error)) {
    return { name: 'Error', message: String(error), code: null, stack: null };
  }
  const code = 'code' in error && typeof error.code === 'string' ? error.code : null;
  return { name: error.name, message: error.message, code, stack: error.stack ?? null };
}

interface Run {
  id: number;
  live: boolean;
}

interface Finished {
  report: Report;
  trajectory: Trajectory;
}

/**
 * Answers the page's requests: reads cases, runs one assessment at a time, writes files.
 *
 * A new assessment, or a cancel with the id of the running one, silences the old one at once: it is
 * answered `cancelled`, and nothing of it is posted after that even while it still winds down.
 * Pure but for what is handed in, so the same tests run it straight and behind a port.
 *
 * @returns the handler of requests; its promise settles when the request has been answered
 */
export function createDispatcher<Ephemeris>(
  deps: DispatcherDeps<Ephemeris>,
): (request: Request) => Promise<void> {
  let run: Run | null = null;
  let finished: Finished | null = null;
  let lastCase: OrbitCase | null = null;

  function silence(): void {
    if (run === null) return;
    run.live = false;
    deps.post({ type: 'cancelled', id: run.id }, []);
    run = null;
  }

  async function assess(request: Extract<Request, { type: 'assess' }>): Promise<void> {
    silence();
    const own: Run = { id: request.id, live: true };
    run = own;
    const trajectory = new Trajectory();
    const host: AssessHost = {
      fetchFile: deps.fetchFile,
      pause: deps.pause,
      cancelled: () => !own.live,
      emit(event) {
        if (!own.live) return;
        if (event.type === 'states') trajectory.append(event.direction, event.samples);
        deps.post({ type: 'event', id: own.id, event }, transferOf(event));
      },
    };
    const { text, reading, madeAt } = request;
    try {
      const input = { text, reading, case: request.case, madeAt };
      const report = await deps.runAssessment(input, deps.ephemeris, host);
      if (!own.live) return;
      finished = { report, trajectory };
      deps.post({ type: 'done', id: own.id }, []);
    } catch (error) {
      if (!own.live) return;
      deps.post({ type: 'error', id: own.id, error: toWireError(error) }, []);
    } finally {
      if (run === own) run = null;
    }
  }

  function write(
    kind: ExportKind,
    desk: DeskState | null,
  ): { fileName: string; mediaType: string; text: string } {
    if (kind === 'case-file') {
      if (lastCase === null || desk === null) {
        throw new NothingToExport('There is no complete case to write; mend its problems first.');
      }
      const text = deps.writers.writeCaseFile(lastCase, desk);
      return { fileName: `${slug(lastCase.name)}-case.json`, mediaType: 'application/json', text };
    }
    if (finished === null) {
      throw new NothingToExport('There is no finished assessment to write; wait for the run.');
    }
    const { report } = finished;
    const samples = finished.trajectory.samples();
    const stem = fileStem(report);
    switch (kind) {
      case 'report-json':
        return {
          fileName: `${stem}-report.json`,
          mediaType: 'application/json',
          text: deps.writers.reportJsonText(report),
        };
      case 'oem':
        return {
          fileName: `${stem}.oem`,
          mediaType: 'text/plain',
          text: deps.writers.writeOem(report, samples),
        };
      case 'ephemeris-csv':
        return {
          fileName: `${stem}-ephemeris.csv`,
          mediaType: 'text/csv',
          text: deps.writers.writeEphemerisCsv(samples),
        };
    }
  }

  return async (request) => {
    if (request.type === 'assess') return assess(request);
    if (request.type === 'cancel') {
      if (run?.id === request.id) silence();
      return;
    }
    try {
      if (request.type === 'read') {
        const result = deps.readCase(request.text, request.choices);
        lastCase = result.case;
        const desk = deps.readDesk(request.text);
        deps.post({ type: 'read', id: request.id, result, desk }, []);
      } else {
        const file = write(request.kind, request.desk);
        deps.post({ type: 'export', id: request.id, ...file }, []);
      }
    } catch (error) {
      deps.post({ type: 'error', id: request.id, error: toWireError(error) }, []);
    }
  };
}

function transferOf(event: AssessEvent): Transferable[] {
  return event.type === 'states' ? [event.samples.buffer] : [];
}

import type { Choices, OrbitCase, ReadResult } from '../../core/case/types';
import type {
  AssessEvent,
  AssessHost,
  AssessInput,
  EstimateEvent,
  EstimateHost,
} from '../../core/events';
import type { Report } from '../../core/report/report';
import type { ClonePlan } from '../../core/uncertainty/clones';
import { createEstimateStream } from './estimate-stream';
import { fileStem, slug } from './file-name';
import type { DeskState, ExportKind, Request, Response } from './messages';
import type { CarrierPool } from './pool';
import { Trajectory } from './trajectory';
import { toWireError } from './wire-error';

/** Writers of the files that are handed over. */
export interface Writers {
  reportJsonText(report: Report): string;
  writeOem(report: Report, samples: Float64Array): string;
  writeEphemerisCsv(samples: Float64Array): string;
  corridorGeoJson(report: Report): string;
  writeCaseFile(orbit: OrbitCase, desk: DeskState): string;
}

/** Clones of one case, carried in as many runs as are asked for. */
export interface RunningEstimate {
  run(wanted: number, host: EstimateHost): Promise<Report>;
}

export interface DispatcherDeps<Ephemeris, Basis extends { plan: ClonePlan }> {
  readCase(text: string, choices: Choices): ReadResult;
  /** What a case file says of the desk; null for any other text. */
  readDesk(text: string): DeskState | null;
  assess(
    input: AssessInput,
    ephemeris: Ephemeris,
    host: AssessHost,
  ): Promise<{ report: Report; estimate: Basis | null }>;
  createEstimate(basis: Basis, seed: number): RunningEstimate;
  pool: CarrierPool;
  writers: Writers;
  ephemeris: Ephemeris;
  fetchFile(name: string): Promise<ArrayBuffer>;
  post(message: Response, transfer: Transferable[]): void;
  pause(): Promise<void>;
  /** A steady clock, ms. */
  now(): number;
}

/** An export was asked for before there was anything to write. */
class NothingToExport extends Error {
  readonly code = 'nothing-to-export';
  override name = 'NothingToExport';
}

/** There is no finished assessment with a covariance. */
class NothingToEstimate extends Error {
  readonly code = 'nothing-to-estimate';
  override name = 'NothingToEstimate';
}

interface Run {
  id: number;
  live: boolean;
}

interface EstimateRun extends Run {
  stopped: boolean;
}

interface Finished<Basis> {
  report: Report;
  trajectory: Trajectory;
  basis: Basis | null;
  estimate: { seed: number; clones: RunningEstimate } | null;
}

/**
 * Answers the page's requests: reads cases, runs one assessment at a time and one estimate of the
 * last one, writes files.
 *
 * A new assessment, or a cancel with the id of what runs, silences the old one and its estimate at
 * once: it is answered `cancelled`, and nothing of it is posted after that even while it still winds
 * down. A stopped estimate tells its report, and the next request carries it on.
 * Pure but for what is handed in, so the same tests run it straight and behind a port.
 *
 * @returns the handler of requests; its promise settles when the request has been answered
 */
export function createDispatcher<Ephemeris, Basis extends { plan: ClonePlan }>(
  deps: DispatcherDeps<Ephemeris, Basis>,
): (request: Request) => Promise<void> {
  let run: Run | null = null;
  let finished: Finished<Basis> | null = null;
  let estimating: EstimateRun | null = null;
  /** Settles when no estimate is winding down any more. */
  let estimated: Promise<void> = Promise.resolve();
  let lastCase: OrbitCase | null = null;

  function silence(): void {
    if (run === null) return;
    run.live = false;
    deps.post({ type: 'cancelled', id: run.id }, []);
    run = null;
  }

  function silenceEstimate(): void {
    if (estimating === null) return;
    estimating.live = false;
    deps.post({ type: 'cancelled', id: estimating.id }, []);
    estimating = null;
  }

  async function assess(request: Extract<Request, { type: 'assess' }>): Promise<void> {
    silence();
    silenceEstimate();
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
      const { report, estimate } = await deps.assess(input, deps.ephemeris, host);
      if (!own.live) return;
      finished = { report, trajectory, basis: estimate, estimate: null };
      deps.post({ type: 'done', id: own.id }, []);
    } catch (error) {
      if (!own.live) return;
      deps.post({ type: 'error', id: own.id, error: toWireError(error) }, []);
    } finally {
      if (run === own) run = null;
    }
  }

  async function estimate(request: Extract<Request, { type: 'estimate' }>): Promise<void> {
    silenceEstimate();
    const own: EstimateRun = { id: request.id, live: true, stopped: false };
    estimating = own;
    // Two runs of the same clones must not mix: the one before finishes its batches first.
    const before = estimated;
    let finish: () => void = () => {};
    estimated = new Promise((resolve) => {
      finish = resolve;
    });
    try {
      await before;
      if (own.live) await carry(request, own);
      if (own.live) deps.post({ type: 'done', id: own.id }, []);
    } catch (error) {
      if (own.live) deps.post({ type: 'error', id: own.id, error: toWireError(error) }, []);
    } finally {
      if (estimating === own) estimating = null;
      finish();
    }
  }

  async function carry(
    { clones, seed }: Extract<Request, { type: 'estimate' }>,
    own: EstimateRun,
  ): Promise<void> {
    const of = finished;
    if (of === null || of.basis === null) {
      throw new NothingToEstimate(
        'There are no clones to carry: they are drawn from the covariance of an assessed case.',
      );
    }
    if (of.estimate?.seed !== seed) {
      of.estimate = { seed, clones: deps.createEstimate(of.basis, seed) };
    }
    const stream = createEstimateStream(
      (event) => deps.post({ type: 'estimate-event', id: own.id, event }, transferOf(event)),
      deps.now,
    );
    const report = await of.estimate.clones.run(clones, {
      carry: deps.pool.carryFor(of.basis.plan),
      parallel: deps.pool.parallel,
      stopped: () => own.stopped || !own.live,
      emit(event) {
        if (own.live) stream.take(event);
      },
    });
    if (!own.live) return;
    stream.flush();
    of.report = report;
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
      case 'corridor-geojson':
        if (report.corridor === undefined) {
          throw new NothingToExport(
            'There is no corridor to write: no clone that has been carried reaches the ground.',
          );
        }
        return {
          fileName: `${stem}-corridor.geojson`,
          mediaType: 'application/geo+json',
          text: deps.writers.corridorGeoJson(report),
        };
    }
  }

  return async (request) => {
    if (request.type === 'assess') return assess(request);
    if (request.type === 'cancel') {
      if (run?.id === request.id) silence();
      if (estimating?.id === request.id) silenceEstimate();
      return;
    }
    if (request.type === 'estimate') return estimate(request);
    if (request.type === 'stop-estimate') {
      if (estimating?.id === request.id) estimating.stopped = true;
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

function transferOf(event: AssessEvent | EstimateEvent): Transferable[] {
  if (event.type === 'states') return [event.samples.buffer];
  if (event.type === 'spread') return [event.rows.buffer];
  return event.type === 'clones' ? [event.points.buffer] : [];
}

import type { OrbitCase, ReadResult } from './case/types';
import type { Report } from './report/report';
import type { CarryClones } from './uncertainty/clones';

/** What goes into an assessment and what streams out of it. */

export interface AssessInput {
  /** The text and its reading, so that the report can say what was read and what was assumed. */
  text: string;
  reading: ReadResult;
  case: OrbitCase;
  /** Time of making, ISO 8601 UTC; handed in, never read from a clock. */
  madeAt: string;
}

export { SAMPLE } from './dynamics/sample-layout';

export type AssessEvent =
  /** Samples in order of time when direction is 1, in reverse order when it is -1. */
  | { type: 'states'; direction: 1 | -1; samples: Float64Array }
  /** Share of the span done, 0 to 1, and what is being done. */
  | { type: 'progress'; fraction: number; note: string }
  /** First-order spread of the place along the trajectory, once, where there is a covariance. */
  | { type: 'spread'; rows: Float64Array }
  | { type: 'report'; report: Report };

/** What the assessment asks of whoever runs it: the page's worker, the command line, a test. */
export interface AssessHost {
  /** Bytes of a packed ephemeris file by its name, e.g. "de405-2030s.bin". */
  fetchFile(name: string): Promise<ArrayBuffer>;
  emit(event: AssessEvent): void;
  /** Awaited between chunks of work, so that a message (cancel, a new case) can get through. */
  pause(): Promise<void>;
  cancelled(): boolean;
}

/** What streams out of the estimate of the impact probability, after the assessment. */
export type EstimateEvent =
  /** Share done, 0 to 1, and what is being done. */
  | { type: 'progress'; fraction: number; note: string }
  | {
      type: 'clones';
      /** Index of the principal approach, whose points these are. */
      approach: number;
      /** Clones carried so far, and wanted. */
      count: number;
      wanted: number;
      /** Of those carried: reached the ground of the Earth within the span. */
      impacts: number;
      /** Clopper–Pearson, of the probability of impact. */
      interval95: [number, number];
      /** New points, CLONE_POINT.size numbers each; not of every clone when there are very many. */
      points: Float32Array;
      /** Drawn from the covariance, or by the rare-event estimate about the impacts. */
      drawn: 'plain' | 'rare';
    }
  | { type: 'report'; report: Report };

/** What the estimate asks of whoever runs it. */
export interface EstimateHost {
  carry: CarryClones;
  /** How many batches may be asked for at once: the number of carriers. */
  parallel: number;
  emit(event: EstimateEvent): void;
  /** True ends the run with what is known so far; it can be continued. */
  stopped(): boolean;
}

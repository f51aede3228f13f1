import type { OrbitCase, ReadResult } from './case/types';
import type { Report } from './report/report';

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

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

/**
 * One sample of the streamed trajectory, as consecutive doubles:
 * time, then position and velocity pairs (km, km/s, ICRF axes), then the Earth's orientation.
 */
export const SAMPLE = {
  tdbSeconds: 0,
  /** Object, geocentric. */
  object: 1,
  /** Earth, heliocentric. */
  earth: 7,
  /** Moon, geocentric. */
  moon: 13,
  /** Heliocentric planets. */
  mercury: 19,
  venus: 25,
  mars: 31,
  jupiter: 37,
  /** Unperturbed object: two-body motion about the Sun from the epoch, heliocentric. */
  unperturbed: 43,
  /** X, Y and s of the celestial intermediate pole (rad) and the unwrapped Earth rotation angle (rad). */
  orientation: 49,
  stride: 53,
} as const;

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

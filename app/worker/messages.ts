import type { Choices, OrbitCase, ReadResult } from '../../core/case/types';
import type { AssessEvent } from '../../core/events';

/** Everything that crosses between the page and the worker. Each request carries its id. */

export type ExportKind = 'report-json' | 'oem' | 'ephemeris-csv' | 'case-file';

export type Request =
  | { type: 'read'; id: number; text: string; choices: Choices }
  | {
      type: 'assess';
      id: number;
      text: string;
      reading: ReadResult;
      case: OrbitCase;
      madeAt: string;
    }
  /** Files written from the last finished assessment (the case file: from the given desk state). */
  | { type: 'export'; id: number; kind: ExportKind; madeAt: string; desk: DeskState | null }
  | { type: 'cancel'; id: number };

/** What the desk keeps in a case file beside the case itself. */
export interface DeskState {
  text: string;
  choices: Choices;
  clockTdbSeconds: number | null;
  plateFindings: string[];
}

export interface WireError {
  name: string;
  message: string;
  code: string | null;
  stack: string | null;
}

export type Response =
  | { type: 'read'; id: number; result: ReadResult; desk: DeskState | null }
  | { type: 'event'; id: number; event: AssessEvent }
  | { type: 'done'; id: number }
  | { type: 'cancelled'; id: number }
  | { type: 'export'; id: number; fileName: string; mediaType: string; text: string }
  | { type: 'error'; id: number; error: WireError };

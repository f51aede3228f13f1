import type { Choices, OrbitCase, ReadResult } from '../../core/case/types';
import type { AssessEvent, EstimateEvent } from '../../core/events';
import type { WireError } from './wire-error';

/** Everything that crosses between the page and the worker. Each request carries its id. */

export type ExportKind = 'report-json' | 'oem' | 'ephemeris-csv' | 'corridor-geojson' | 'case-file';

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
  /** Drops the running assessment or estimate with this id; nothing more of it is told. */
  | { type: 'cancel'; id: number }
  /** Carries clones of the last finished assessment until there are so many. */
  | { type: 'estimate'; id: number; clones: number; seed: number }
  /** Ends the estimate with this id where it is; it tells its report and can be continued. */
  | { type: 'stop-estimate'; id: number };

/** What the desk keeps in a case file beside the case itself. */
export interface DeskState {
  text: string;
  choices: Choices;
  clockTdbSeconds: number | null;
  plateFindings: string[];
}

export type Response =
  | { type: 'read'; id: number; result: ReadResult; desk: DeskState | null }
  | { type: 'event'; id: number; event: AssessEvent }
  | { type: 'estimate-event'; id: number; event: EstimateEvent }
  | { type: 'done'; id: number }
  | { type: 'cancelled'; id: number }
  | { type: 'export'; id: number; fileName: string; mediaType: string; text: string }
  | { type: 'error'; id: number; error: WireError };

import type { CloneOutcomes, ClonePlan } from '../../core/uncertainty/clones';
import type { WireError } from './wire-error';

/** Everything that crosses between the coordinating worker and a carrier of clones. */

export type CarrierRequest =
  /** The batches that follow are of this case. */
  { type: 'plan'; plan: ClonePlan } | { type: 'carry'; id: number; z: Float64Array };

export type CarrierResponse =
  | { type: 'carried'; id: number; outcomes: CloneOutcomes }
  | { type: 'error'; id: number; error: WireError };

/** One end of the line to a carrier; a test hands in its own. */
export interface CarrierPort {
  post(request: CarrierRequest): void;
  listen(onMessage: (message: CarrierResponse) => void, onDeath: (reason: string) => void): void;
  close(): void;
}

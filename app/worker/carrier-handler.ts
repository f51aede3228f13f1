import type { Carrier } from '../../core/uncertainty/carry';
import type { ClonePlan } from '../../core/uncertainty/clones';
import type { CarrierRequest, CarrierResponse } from './carrier-messages';
import { toWireError } from './wire-error';

/**
 * Carries the batches it is sent, each for the plan that came before it.
 *
 * @param load makes the carrier of a plan, with the ephemeris it needs
 * @returns    the handler of requests; its promise settles when the request has been answered
 */
export function createCarrierHandler(
  load: (plan: ClonePlan) => Promise<Carrier>,
  post: (message: CarrierResponse, transfer: Transferable[]) => void,
): (request: CarrierRequest) => Promise<void> {
  let carrier: Promise<Carrier> | null = null;

  return async (request) => {
    if (request.type === 'plan') {
      carrier = load(request.plan);
      // A plan that fails to load is told to every batch that needed it.
      carrier.catch(() => {});
      return;
    }
    const { id, z } = request;
    try {
      if (carrier === null) throw new Error('A batch of clones came before its plan.');
      const outcomes = (await carrier).carry(z);
      post({ type: 'carried', id, outcomes }, [outcomes.rows.buffer]);
    } catch (error) {
      post({ type: 'error', id, error: toWireError(error) }, []);
    }
  };
}

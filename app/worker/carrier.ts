import { createCarrierHandler } from './carrier-handler';
import { loadCarrier } from './carrier-load';
import type { CarrierRequest } from './carrier-messages';

/** A carrier worker's entry: carries batches of clones for the coordinating worker. */

const handle = createCarrierHandler(loadCarrier, (message, transfer) =>
  self.postMessage(message, { transfer }),
);

self.onmessage = (message: MessageEvent<CarrierRequest>) => void handle(message.data);

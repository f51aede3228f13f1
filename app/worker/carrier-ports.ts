import { createCarrierHandler } from './carrier-handler';
import { loadCarrier } from './carrier-load';
import type { CarrierPort, CarrierResponse } from './carrier-messages';

/** The line to a carrier worker. The page's base travels on in the worker's name. */
export function openCarrierPort(): CarrierPort {
  const worker = new Worker(new URL('./carrier.ts', import.meta.url), {
    type: 'module',
    name: self.name,
  });
  return {
    post: (request) => worker.postMessage(request),
    listen(onMessage, onDeath) {
      worker.onmessage = (message: MessageEvent<CarrierResponse>) => onMessage(message.data);
      worker.onerror = (event) => {
        onDeath(`A carrier stopped: ${event.message ?? 'its script could not be loaded'}.`);
      };
      worker.onmessageerror = () => onDeath('A carrier sent something that cannot be read.');
    },
    close: () => worker.terminate(),
  };
}

/** A carrier in this very thread, for browsers that let no worker start another; it pauses before each batch. */
export function openLocalCarrierPort(pause: () => Promise<void>): CarrierPort {
  let hear: (message: CarrierResponse) => void = () => {};
  const handle = createCarrierHandler(loadCarrier, (message) => hear(message));
  let turn: Promise<void> = Promise.resolve();
  return {
    post(request) {
      turn = turn.then(pause).then(() => handle(request));
    },
    listen(onMessage) {
      hear = onMessage;
    },
    close() {
      hear = () => {};
    },
  };
}

import { assess } from '../../core/assess';
import { readDesk, writeCaseFile } from '../../core/case/case-file';
import { readCase } from '../../core/case/read';
import { createEphemeris } from '../../core/ephemeris';
import { Estimate } from '../../core/estimate';
import { reportJsonText } from '../../core/report/canonical';
import { writeEphemerisCsv } from '../../core/report/ephemeris-csv';
import { corridorGeoJson } from '../../core/report/geojson';
import { writeOem } from '../../core/report/oem';
import { openCarrierPort, openLocalCarrierPort } from './carrier-ports';
import { createDispatcher } from './dispatcher';
import { fetchFile } from './fetch-file';
import type { Request } from './messages';
import { createCarrierPool } from './pool';

/** The worker's entry: wires the dispatcher to this thread. */

const pauses: (() => void)[] = [];
const channel = new MessageChannel();
channel.port1.onmessage = () => pauses.shift()?.();

/** Lets the messages that have arrived meanwhile be handled: a task of its own, without a delay. */
function pause(): Promise<void> {
  return new Promise((resolve) => {
    pauses.push(resolve);
    channel.port2.postMessage(null);
  });
}

const pool =
  typeof Worker === 'undefined'
    ? createCarrierPool(() => openLocalCarrierPort(pause), 1)
    : createCarrierPool(openCarrierPort, navigator.hardwareConcurrency);

const handle = createDispatcher({
  readCase,
  readDesk,
  assess,
  createEstimate: (basis, seed) => new Estimate(basis, seed),
  pool,
  writers: { reportJsonText, writeOem, writeEphemerisCsv, corridorGeoJson, writeCaseFile },
  ephemeris: createEphemeris(),
  fetchFile,
  pause,
  now: () => performance.now(),
  post: (message, transfer) => self.postMessage(message, { transfer }),
});

self.onmessage = (message: MessageEvent<Request>) => void handle(message.data);

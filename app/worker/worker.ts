import { runAssessment } from '../../core/assess';
import { readDesk, writeCaseFile } from '../../core/case/case-file';
import { readCase } from '../../core/case/read';
import { createEphemeris } from '../../core/ephemeris';
import { reportJsonText } from '../../core/report/canonical';
import { writeEphemerisCsv } from '../../core/report/ephemeris-csv';
import { writeOem } from '../../core/report/oem';
import { createDispatcher } from './dispatcher';
import type { Request } from './messages';

/** The worker's entry: wires the dispatcher to this thread. */

/** A packed ephemeris file could not be had. */
class EphemerisFileError extends Error {
  readonly code = 'ephemeris-file';
  override name = 'EphemerisFileError';
}

async function fetchFile(name: string): Promise<ArrayBuffer> {
  // The page names its worker after its own base: the files lie beside the page, not the script.
  const url = new URL(`ephemeris/${name}`, self.name);
  const answer = await fetch(url);
  const isPage = answer.headers.get('content-type')?.startsWith('text/html') ?? false;
  if (!answer.ok || isPage) {
    throw new EphemerisFileError(
      `The ephemeris file ${url.pathname} could not be fetched (${answer.status} ${answer.statusText}). It belongs beside the page, in ephemeris/.`,
    );
  }
  return answer.arrayBuffer();
}

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

const handle = createDispatcher({
  readCase,
  readDesk,
  runAssessment,
  writers: { reportJsonText, writeOem, writeEphemerisCsv, writeCaseFile },
  ephemeris: createEphemeris(),
  fetchFile,
  pause,
  post: (message, transfer) => self.postMessage(message, { transfer }),
});

self.onmessage = (message: MessageEvent<Request>) => void handle(message.data);

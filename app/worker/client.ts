import type { Choices, OrbitCase, ReadResult } from '../../core/case/types';
import type { AssessEvent, EstimateEvent } from '../../core/events';
import type { DeskState, ExportKind, Request, Response } from './messages';
import { WorkerError } from './wire-error';

/** One end of the line to a worker; a test hands in its own. */
export interface Port {
  post(request: Request): void;
  listen(onMessage: (message: Response) => void, onDeath: (reason: string) => void): void;
  close(): void;
}

/** The worker could not be started, or stopped working; what it was asked for is lost. */
export class WorkerDied extends Error {
  readonly code = 'worker-died';
  override name = 'WorkerDied';
}

export interface ReadAnswer {
  result: ReadResult;
  /** What a case file says of the desk; null for any other text. */
  desk: DeskState | null;
}

export interface ExportedFile {
  fileName: string;
  mediaType: string;
  text: string;
}

export interface AssessRequest {
  text: string;
  reading: ReadResult;
  case: OrbitCase;
  madeAt: string;
}

export interface Assessment {
  /** Rejects with WorkerError or WorkerDied. */
  outcome: Promise<'done' | 'cancelled'>;
  cancel(): void;
}

export interface EstimateRequest {
  /** Clones wanted in all. */
  clones: number;
  seed: number;
}

export interface EstimateRun {
  /** Done also after a stop. Rejects with WorkerError or WorkerDied. */
  outcome: Promise<'done' | 'cancelled'>;
  /** Ends with what is known so far, which is still told. */
  stop(): void;
  /** Nothing more of it is told. */
  cancel(): void;
}

export interface WorkerClient {
  read(text: string, choices: Choices): Promise<ReadAnswer>;
  /** Starts an assessment; one that still runs is cancelled, and says so, at once. */
  assess(request: AssessRequest, onEvent: (event: AssessEvent) => void): Assessment;
  /** Estimates the impact probability of the last finished assessment, or carries that on. */
  estimate(request: EstimateRequest, onEvent: (event: EstimateEvent) => void): EstimateRun;
  exportFile(kind: ExportKind, madeAt: string, desk: DeskState | null): Promise<ExportedFile>;
  /** Ends the worker; what is pending is rejected. The next request starts a new one. */
  close(): void;
}

interface Pending {
  answer(message: Response): void;
  fail(error: Error): void;
}

/** Requests to the worker as promises and streams. The first worker is started at once. */
export function createWorkerClient(openPort: () => Port): WorkerClient {
  const pending = new Map<number, Pending>();
  let nextId = 1;
  let port: Port | null = null;
  let running: Assessment | null = null;
  let estimating: Assessment | null = null;

  function open(): Port {
    const opened = openPort();
    opened.listen(
      (message) => {
        if (port !== opened) return;
        const request = pending.get(message.id);
        if (request === undefined) return;
        if (!isEvent(message)) pending.delete(message.id);
        if (message.type === 'error') request.fail(new WorkerError(message.error));
        else request.answer(message);
      },
      (reason) => {
        if (port === opened) end(reason);
      },
    );
    port = opened;
    return opened;
  }

  function end(reason: string): void {
    port?.close();
    port = null;
    running = null;
    estimating = null;
    const lost = [...pending.values()];
    pending.clear();
    for (const request of lost) request.fail(new WorkerDied(reason));
  }

  function send(request: Request): void {
    (port ?? open()).post(request);
  }

  function ask<T>(request: Request, pick: (message: Response) => T | null): Promise<T> {
    return new Promise<T>((resolve, reject) => {
      pending.set(request.id, {
        answer(message) {
          const picked = pick(message);
          if (picked === null) reject(new WorkerDied(`The worker answered with ${message.type}.`));
          else resolve(picked);
        },
        fail: reject,
      });
      send(request);
    });
  }

  /** Sends a request that is answered by a stream of events and its end. */
  function start(request: Request, onEvent: (message: Response) => void): Assessment {
    const { id } = request;
    let settle: (outcome: 'done' | 'cancelled') => void = () => {};
    const outcome = new Promise<'done' | 'cancelled'>((resolve, reject) => {
      settle = resolve;
      pending.set(id, {
        answer(message) {
          if (isEvent(message)) onEvent(message);
          else resolve(message.type === 'done' ? 'done' : 'cancelled');
        },
        fail: reject,
      });
    });
    send(request);
    return {
      outcome,
      cancel() {
        if (!pending.delete(id)) return;
        send({ type: 'cancel', id });
        settle('cancelled');
      },
    };
  }

  open();
  return {
    read(text, choices) {
      return ask({ type: 'read', id: nextId++, text, choices }, (message) =>
        message.type === 'read' ? { result: message.result, desk: message.desk } : null,
      );
    },
    assess(request, onEvent) {
      running?.cancel();
      estimating?.cancel();
      running = start({ type: 'assess', id: nextId++, ...request }, (message) => {
        if (message.type === 'event') onEvent(message.event);
      });
      return running;
    },
    estimate(request, onEvent) {
      estimating?.cancel();
      const id = nextId++;
      const own = start({ type: 'estimate', id, ...request }, (message) => {
        if (message.type === 'estimate-event') onEvent(message.event);
      });
      estimating = own;
      return {
        ...own,
        stop() {
          if (pending.has(id)) send({ type: 'stop-estimate', id });
        },
      };
    },
    exportFile(kind, madeAt, desk) {
      return ask({ type: 'export', id: nextId++, kind, madeAt, desk }, (message) =>
        message.type === 'export'
          ? { fileName: message.fileName, mediaType: message.mediaType, text: message.text }
          : null,
      );
    },
    close() {
      end('The worker was closed.');
    },
  };
}

function isEvent(message: Response): boolean {
  return message.type === 'event' || message.type === 'estimate-event';
}

/** The line to the real worker. The page's base travels in the worker's name. */
export function openWorkerPort(): Port {
  const worker = new Worker(new URL('./worker.ts', import.meta.url), {
    type: 'module',
    name: document.baseURI,
  });
  return {
    post: (request) => worker.postMessage(request),
    listen(onMessage, onDeath) {
      worker.onmessage = (message: MessageEvent<Response>) => onMessage(message.data);
      worker.onerror = (event) => {
        onDeath(`The worker stopped: ${event.message ?? 'its script could not be loaded'}.`);
      };
      worker.onmessageerror = () => onDeath('The worker sent something that cannot be read.');
    },
    close: () => worker.terminate(),
  };
}

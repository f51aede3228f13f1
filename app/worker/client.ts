import type { Choices, OrbitCase, ReadResult } from '../../core/case/types';
import type { AssessEvent } from '../../core/events';
import type { DeskState, ExportKind, Request, Response, WireError } from './messages';

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

/** An error thrown in the worker, with the name, code and stack it had there. */
export class WorkerError extends Error {
  readonly code: string | null;

  constructor(error: WireError) {
    super(error.message);
    this.name = error.name;
    this.code = error.code;
    if (error.stack !== null) this.stack = error.stack;
  }
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

export interface WorkerClient {
  read(text: string, choices: Choices): Promise<ReadAnswer>;
  /** Starts an assessment; one that still runs is cancelled, and says so, at once. */
  assess(request: AssessRequest, onEvent: (event: AssessEvent) => void): Assessment;
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

  function open(): Port {
    const opened = openPort();
    opened.listen(
      (message) => {
        if (port !== opened) return;
        const request = pending.get(message.id);
        if (request === undefined) return;
        if (message.type !== 'event') pending.delete(message.id);
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

  open();
  return {
    read(text, choices) {
      return ask({ type: 'read', id: nextId++, text, choices }, (message) =>
        message.type === 'read' ? { result: message.result, desk: message.desk } : null,
      );
    },
    assess(request, onEvent) {
      running?.cancel();
      const id = nextId++;
      let settle: (outcome: 'done' | 'cancelled') => void = () => {};
      const outcome = new Promise<'done' | 'cancelled'>((resolve, reject) => {
        settle = resolve;
        pending.set(id, {
          answer(message) {
            if (message.type === 'event') onEvent(message.event);
            else resolve(message.type === 'done' ? 'done' : 'cancelled');
          },
          fail: reject,
        });
      });
      const own: Assessment = {
        outcome,
        cancel() {
          if (!pending.delete(id)) return;
          send({ type: 'cancel', id });
          settle('cancelled');
        },
      };
      running = own;
      send({ type: 'assess', id, ...request });
      return own;
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

/** An error in the form that crosses between threads. */
export interface WireError {
  name: string;
  message: string;
  code: string | null;
  stack: string | null;
}

export function toWireError(error: unknown): WireError {
  if (!(error instanceof Error)) {
    return { name: 'Error', message: String(error), code: null, stack: null };
  }
  const code = 'code' in error && typeof error.code === 'string' ? error.code : null;
  return { name: error.name, message: error.message, code, stack: error.stack ?? null };
}

/** An error thrown in a worker, with the name, code and stack it had there. */
export class WorkerError extends Error {
  readonly code: string | null;

  constructor(error: WireError) {
    super(error.message);
    this.name = error.name;
    this.code = error.code;
    if (error.stack !== null) this.stack = error.stack;
  }
}

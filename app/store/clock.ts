/**
 * The desk's one clock. It changes every frame, so it lives outside the store: views read
 * `clock.tdbSeconds` in their own frame loop and subscribe to draw on demand.
 */
export interface Clock {
  readonly tdbSeconds: number;
  /** Sets the moment; all subscribers are told at once. */
  set(tdbSeconds: number): void;
  subscribe(listener: () => void): () => void;
}

export function createClock(tdbSeconds = 0): Clock {
  let now = tdbSeconds;
  const listeners = new Set<() => void>();
  return {
    get tdbSeconds() {
      return now;
    },
    set(next) {
      if (!Number.isFinite(next) || next === now) return;
      now = next;
      for (const listener of listeners) listener();
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => {
        listeners.delete(listener);
      };
    },
  };
}

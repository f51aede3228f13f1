import type { EstimateEvent } from '../../core/events';

/** Between two posts of clones to the page, ms: as often as a person reads a changing figure. */
const POST_EVERY_MS = 100;

type Clones = Extract<EstimateEvent, { type: 'clones' }>;

interface EstimateStream {
  take(event: EstimateEvent): void;
  /** Posts what is still held back. */
  flush(): void;
}

/**
 * Holds back progress and clones so that the page hears of them ten times a second and not for every batch.
 *
 * @param now a steady clock, ms
 */
export function createEstimateStream(
  post: (event: EstimateEvent) => void,
  now: () => number,
): EstimateStream {
  let progress: EstimateEvent | null = null;
  let clones: Clones | null = null;
  let points: Float32Array[] = [];
  let postedAt = Number.NEGATIVE_INFINITY;

  function flush(): void {
    postedAt = now();
    if (progress !== null) post(progress);
    if (clones !== null) post({ ...clones, points: joined(points) });
    progress = null;
    clones = null;
    points = [];
  }

  return {
    take(event) {
      if (event.type === 'progress') progress = event;
      else if (event.type === 'clones') {
        if (clones !== null && clones.drawn !== event.drawn) flush();
        clones = event;
        points.push(event.points);
      } else {
        flush();
        post(event);
        return;
      }
      if (now() - postedAt >= POST_EVERY_MS) flush();
    },
    flush,
  };
}

function joined(parts: Float32Array[]): Float32Array {
  const all = new Float32Array(parts.reduce((length, part) => length + part.length, 0));
  let end = 0;
  for (const part of parts) {
    all.set(part, end);
    end += part.length;
  }
  return all;
}

import { hermiteState } from '../math/hermite';
import { lastNotAfter } from '../math/sorted';
import { SAMPLE } from './sample-layout';

/**
 * The streamed trajectory, readable at any moment of the span so far.
 *
 * Grows by whole chunks at either end; reading interpolates (cubic Hermite) and allocates nothing.
 */
export class Trajectory {
  /** Rows of SAMPLE.stride doubles in order of time. */
  private rows = new Float64Array(0);
  private first = 0;
  private end = 0;
  /** Grows with every append: cheap to compare in a frame loop. */
  version = 0;

  get count(): number {
    return this.end - this.first;
  }

  get fromTdbSeconds(): number {
    return this.timeOf(0);
  }

  get toTdbSeconds(): number {
    return this.timeOf(this.count - 1);
  }

  timeOf(index: number): number {
    return this.rows[(this.first + index) * SAMPLE.stride];
  }

  /** One stored value of a sample: `offset` as in SAMPLE. */
  valueOf(index: number, offset: number): number {
    return this.rows[(this.first + index) * SAMPLE.stride + offset];
  }

  /** All samples in order of time, for the writers of files. A view, not a copy. */
  samples(): Float64Array {
    return this.rows.subarray(this.first * SAMPLE.stride, this.end * SAMPLE.stride);
  }

  /** Takes a streamed chunk; one in reverse order (direction −1) goes to the front. */
  append(direction: 1 | -1, samples: Float64Array): void {
    const added = samples.length / SAMPLE.stride;
    if (direction === 1) this.reserve(0, added);
    else this.reserve(added, 0);
    for (let i = 0; i < added; i++) {
      const row = samples.subarray(i * SAMPLE.stride, (i + 1) * SAMPLE.stride);
      // Both directions start with the sample of the epoch: it is kept once.
      if (this.count > 0 && !this.isBeyond(direction, row[SAMPLE.tdbSeconds])) continue;
      if (direction === 1) {
        this.rows.set(row, this.end * SAMPLE.stride);
        this.end += 1;
      } else {
        this.first -= 1;
        this.rows.set(row, this.first * SAMPLE.stride);
      }
    }
    this.version += 1;
  }

  private isBeyond(direction: 1 | -1, tdbSeconds: number): boolean {
    return direction === 1 ? tdbSeconds > this.toTdbSeconds : tdbSeconds < this.fromTdbSeconds;
  }

  private reserve(before: number, after: number): void {
    const capacity = this.rows.length / SAMPLE.stride;
    if (before <= this.first && after <= capacity - this.end) return;
    const count = this.count;
    const room = Math.max(256, count);
    const first = before + (before > 0 ? room : this.first);
    const grown = new Float64Array(
      (first + count + after + (after > 0 ? room : 0)) * SAMPLE.stride,
    );
    grown.set(this.samples(), first * SAMPLE.stride);
    this.rows = grown;
    this.first = first;
    this.end = first + count;
  }

  /** Index of the last sample not after the instant; clamped so that index + 1 exists. */
  indexAt(tdbSeconds: number): number {
    return lastNotAfter(this.rows, SAMPLE.stride, this.first, this.count, tdbSeconds);
  }

  /**
   * Writes the interpolated sample of an instant (clamped to the span) into `out` (SAMPLE.stride).
   *
   * @returns false, with `out` untouched, while fewer than two samples have arrived
   */
  at(tdbSeconds: number, out: Float64Array): boolean {
    if (this.count < 2) return false;
    const t = Math.min(Math.max(tdbSeconds, this.fromTdbSeconds), this.toTdbSeconds);
    const index = this.indexAt(t);
    const a = (this.first + index) * SAMPLE.stride;
    const b = a + SAMPLE.stride;
    const rows = this.rows;
    const h = rows[b] - rows[a];
    const u = (t - rows[a]) / h;
    out[SAMPLE.tdbSeconds] = t;
    for (let at = SAMPLE.object; at < SAMPLE.orientation; at += 6) {
      hermiteState(rows, a + at, rows, b + at, h, u, out, at);
    }
    for (let at = SAMPLE.orientation; at < SAMPLE.stride; at++) {
      out[at] = rows[a + at] + u * (rows[b + at] - rows[a + at]);
    }
    return true;
  }
}

import { lastNotAfter } from '../../core/math/sorted';
import { SPREAD } from '../../core/uncertainty/spread-layout';

export { SPREAD };

/** First-order spread of the object's place along its trajectory, readable at any moment. */
export class Spread {
  /** @param rows SPREAD.stride doubles each, in order of time, as the assessment sends them */
  constructor(readonly rows: Float64Array) {}

  get count(): number {
    return this.rows.length / SPREAD.stride;
  }

  timeOf(index: number): number {
    return this.rows[index * SPREAD.stride];
  }

  /** Index of the last row not after the instant; clamped so that index + 1 exists. */
  indexAt(tdbSeconds: number): number {
    return lastNotAfter(this.rows, SPREAD.stride, 0, this.count, tdbSeconds);
  }

  /**
   * Writes the row of an instant (clamped to the span) into `out` (SPREAD.stride), linear between
   * the rows: a mixture of two covariances is one too.
   *
   * @returns false, with `out` untouched, with fewer than two rows
   */
  at(tdbSeconds: number, out: Float64Array): boolean {
    if (this.count < 2) return false;
    const { stride } = SPREAD;
    const { rows } = this;
    const a = this.indexAt(tdbSeconds) * stride;
    const b = a + stride;
    const t = Math.min(Math.max(tdbSeconds, rows[0]), rows[rows.length - stride]);
    const u = rows[b] === rows[a] ? 0 : (t - rows[a]) / (rows[b] - rows[a]);
    for (let k = 0; k < stride; k++) out[k] = rows[a + k] + u * (rows[b + k] - rows[a + k]);
    return true;
  }
}

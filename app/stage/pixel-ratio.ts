/** Picks how finely the scenes are drawn from how long their frames take. */

/** Frames slower than this get a coarser picture, ms. */
const SLOW_MS = 40;
/** Frames faster than this can afford a finer one, ms. */
const FAST_MS = 21;
/** Frames looked at before a change. */
const FRAMES = 20;
/** A longer gap is a pause, not a frame, ms. */
const PAUSE_MS = 250;
const COARSER = 0.8;
const COARSEST = 0.75;
/** After a picture proved too slow, the same fineness is not tried again for this many frames. */
const PATIENCE_FRAMES = 900;

export class PixelRatio {
  private ratio: number;
  private sum = 0;
  private frames = 0;
  private lastMs: number | null = null;
  private patience = 0;

  /** @param finest  the display's own ratio, at most 2 */
  constructor(private finest: number) {
    this.ratio = finest;
  }

  get value(): number {
    return this.ratio;
  }

  /** Notes a drawn frame; true when the ratio has changed. */
  frame(nowMs: number): boolean {
    const elapsed = this.lastMs === null ? PAUSE_MS : nowMs - this.lastMs;
    this.lastMs = nowMs;
    if (elapsed >= PAUSE_MS) {
      this.sum = 0;
      this.frames = 0;
      return false;
    }
    this.sum += elapsed;
    this.frames += 1;
    this.patience = Math.max(0, this.patience - 1);
    if (this.frames < FRAMES) return false;
    const mean = this.sum / this.frames;
    this.sum = 0;
    this.frames = 0;
    const before = this.ratio;
    if (mean > SLOW_MS) {
      this.ratio = Math.max(Math.min(COARSEST, this.finest), this.ratio * COARSER);
      this.patience = PATIENCE_FRAMES;
    } else if (mean < FAST_MS && this.patience === 0) {
      this.ratio = Math.min(this.finest, this.ratio / COARSER);
    }
    return this.ratio !== before;
  }

  /** The page has moved to another display. */
  setFinest(finest: number): void {
    if (finest === this.finest) return;
    this.finest = finest;
    this.ratio = finest;
  }
}

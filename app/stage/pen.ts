import type { Vec3 } from '../worker/core-geometry';
import { type Curve, CurvePoints, decimate } from './curve';
import type { LineBuffer, Stroke } from './line-buffer';
import { keepAbove, type Occluder, type Share } from './occlusion';
import type { Projector } from './projection';

/** Lines are cut this far off the picture, px: their ends and dashes stay out of sight. */
const MARGIN_PX = 8;
/** Points nearer than this on the picture count as one, px. */
const SAME_POINT_PX = 0.02;
/** Nothing is drawn nearer to the eye than this share of the camera's distance. */
const NEAREST_SHARE = 1e-7;

/** Room that every pen writes in: one line is drawn at a time. */
const strip = new Float64Array(3 * 4096);
const points = new CurvePoints();

/** Draws lines of the scene on the picture: cuts them to it, takes away what globes hide. */
export class Pen {
  private stripCount = 0;
  private drawnPx = 0;
  private stroke: Stroke | null = null;
  private hiddenBy: readonly Occluder[] = [];
  private readonly part: Share = { from: 0, to: 1 };
  /** Start and end of the segment at hand from the eye: ICRF axes, then right, up, forward. */
  private a: Vec3 = [0, 0, 0];
  private b: Vec3 = [0, 0, 0];
  private ca: Vec3 = [0, 0, 0];
  private cb: Vec3 = [0, 0, 0];
  /** Where the strip ended: number of the segment and share of it. */
  private segment = 0;
  private endedAt = { segment: -1, share: 0 };

  constructor(
    private readonly lines: LineBuffer,
    readonly projector: Projector,
    readonly globes: readonly Occluder[],
  ) {}

  /** A curve of the scene, with as many points as its picture needs. */
  curve(curve: Curve, stroke: Stroke, hiddenBy = this.globes): void {
    decimate(curve, this.projector, points);
    this.line(points.xyz, points.count, stroke, hiddenBy);
  }

  /** A curve on the face of the first globe: seen where the face turns to the eye. */
  curveOnGlobe(curve: Curve, stroke: Stroke): void {
    decimate(curve, this.projector, points);
    this.lineOnGlobe(points.xyz, points.count, stroke);
  }

  /** A straight line between two points of the scene. */
  segmentLine(from: Vec3, to: Vec3, stroke: Stroke): void {
    this.line(Float64Array.of(...from, ...to), 2, stroke);
  }

  /**
   * A chain of straight lines.
   *
   * @param xyz       points, km, ICRF axes from the scene's centre
   * @param count     how many of them
   * @param hiddenBy  what may stand before it
   */
  line(xyz: Float64Array, count: number, stroke: Stroke, hiddenBy = this.globes): void {
    this.hiddenBy = hiddenBy;
    this.chain(xyz, count, stroke, false);
  }

  /** A chain of chords of the first globe's own surface. */
  lineOnGlobe(xyz: Float64Array, count: number, stroke: Stroke): void {
    this.chain(xyz, count, stroke, true);
  }

  private chain(xyz: Float64Array, count: number, stroke: Stroke, onGlobe: boolean): void {
    if (count < 2) return;
    this.begin(stroke);
    this.take(xyz, 0);
    for (let i = 1; i < count; i++) {
      this.a = this.b;
      this.ca = this.cb;
      this.take(xyz, 3 * i);
      this.segment = i;
      if (!this.cutToPicture()) continue;
      const { from, to } = this.part;
      if (!onGlobe) this.visible(from, to, 0);
      else if (this.globes[0].facingPart(this.a, this.b, this.part)) {
        this.emit(Math.max(from, this.part.from), Math.min(to, this.part.to));
      }
    }
    this.flush();
  }

  /** A line given on the picture itself, px. */
  flat(points: readonly { x: number; y: number }[], stroke: Stroke): void {
    this.begin(stroke);
    for (const point of points) this.push(point.x, point.y);
    this.flush();
  }

  private begin(stroke: Stroke): void {
    this.stroke = stroke;
    this.stripCount = 0;
    this.drawnPx = 0;
    this.endedAt.segment = -1;
  }

  private take(xyz: Float64Array, at: number): void {
    const { eye, right, up, forward } = this.projector;
    const x = xyz[at] - eye[0];
    const y = xyz[at + 1] - eye[1];
    const z = xyz[at + 2] - eye[2];
    this.b = [x, y, z];
    this.cb = [
      x * right[0] + y * right[1] + z * right[2],
      x * up[0] + y * up[1] + z * up[2],
      x * forward[0] + y * forward[1] + z * forward[2],
    ];
  }

  /** Cuts the segment to the pyramid that the picture takes in. */
  private cutToPicture(): boolean {
    const { widthPx, heightPx, focalPx, camera } = this.projector;
    const { ca, cb, part } = this;
    const halfWidth = widthPx / 2 + MARGIN_PX;
    const halfHeight = heightPx / 2 + MARGIN_PX;
    const nearest = camera.distanceKm * NEAREST_SHARE;
    part.from = 0;
    part.to = 1;
    const keep = (start: number, end: number): boolean => keepAbove(start, end - start, part);
    const side = (axis: 0 | 1, sign: number, half: number): boolean =>
      keep(ca[2] * half - sign * ca[axis] * focalPx, cb[2] * half - sign * cb[axis] * focalPx);
    return (
      keep(ca[2] - nearest, cb[2] - nearest) &&
      side(0, 1, halfWidth) &&
      side(0, -1, halfWidth) &&
      side(1, 1, halfHeight) &&
      side(1, -1, halfHeight)
    );
  }

  /** Draws what the hiding globes from number k on leave visible of a part of the segment. */
  private visible(from: number, to: number, k: number): void {
    if (!(from < to)) return;
    if (k === this.hiddenBy.length) {
      this.emit(from, to);
      return;
    }
    if (!this.hiddenBy[k].hiddenPart(this.a, this.b, this.part)) {
      this.visible(from, to, k + 1);
      return;
    }
    const { from: hiddenFrom, to: hiddenTo } = this.part;
    this.visible(from, Math.min(to, hiddenFrom), k + 1);
    this.visible(Math.max(from, hiddenTo), to, k + 1);
  }

  private emit(from: number, to: number): void {
    if (!(from < to)) return;
    const { segment, endedAt } = this;
    const goesOn =
      (from === 0 && endedAt.segment === segment - 1 && endedAt.share === 1) ||
      (endedAt.segment === segment && endedAt.share === from);
    if (!goesOn) {
      this.flush();
      this.pushShare(from);
    }
    this.pushShare(to);
    endedAt.segment = segment;
    endedAt.share = to;
  }

  private pushShare(share: number): void {
    const { ca, cb } = this;
    const { widthPx, heightPx, focalPx } = this.projector;
    const x = ca[0] + (cb[0] - ca[0]) * share;
    const y = ca[1] + (cb[1] - ca[1]) * share;
    const k = focalPx / (ca[2] + (cb[2] - ca[2]) * share);
    this.push(widthPx / 2 + k * x, heightPx / 2 - k * y);
  }

  private push(x: number, y: number): void {
    const at = 3 * this.stripCount;
    if (this.stripCount > 0) {
      const step = Math.hypot(x - strip[at - 3], y - strip[at - 2]);
      if (step < SAME_POINT_PX) return;
      this.drawnPx += step;
    }
    if (at === strip.length) {
      this.flush();
      strip.copyWithin(0, at - 3, at);
      this.stripCount = 1;
    }
    strip[3 * this.stripCount] = x;
    strip[3 * this.stripCount + 1] = y;
    strip[3 * this.stripCount + 2] = this.drawnPx;
    this.stripCount += 1;
  }

  private flush(): void {
    if (this.stroke !== null) this.lines.strip(strip, this.stripCount, this.stroke);
    this.stripCount = 0;
  }
}

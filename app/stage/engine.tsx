import { createRoot, type ReconcilerRoot, type RootState } from '@react-three/fiber';
import { WebGLRenderer } from 'three';
import type { SceneName } from '../plate/scene-source';
import type { DeskContext } from '../store/context';
import type { Station } from '../store/store';
import type { Palette } from '../theme/tokens';
import { BODY_RADIUS_KM } from '../worker/core-geometry';
import { type Camera, NEAREST_KM } from './camera';
import type { Box } from './labels';
import { Moments } from './moments';
import { Painter } from './painter';
import { PixelRatio } from './pixel-ratio';
import { NO_HAND, Rig, type StationCamera } from './rig';
import { SceneObjects } from './SceneObjects';
import type { Moment } from './sheet';
import { stationCamera } from './stations';

/** Whether a scene can be drawn: WebGL is there, was never there, or has been taken away. */
export type Drawing = 'drawn' | 'missing' | 'lost';

const FINEST_RATIO = 2;
/** Least time between two frames that are drawn only because states stream in, ms. */
const STREAM_MS = 90;
/** The camera stops this far above a body, as a share of its radius. */
const CLEARANCE = 0.04;

const CONTEXT: WebGLContextAttributes = {
  alpha: false,
  antialias: false,
  depth: false,
  stencil: false,
  powerPreference: 'high-performance',
};

/** One scene on the screen: its canvas, its camera, its frames. */
export class SceneEngine {
  readonly rig = new Rig();
  private readonly painter: Painter;
  private readonly moments: Moments;
  private readonly pictureMoments: Moments;
  private readonly canvas = document.createElement('canvas');
  private readonly ratio = new PixelRatio(displayRatio());
  private root: ReconcilerRoot<HTMLCanvasElement> | null = null;
  private state: RootState | null = null;
  private widthPx = 0;
  private heightPx = 0;
  private palette: Palette;
  private taken: readonly Box[] = [];
  private streamTimer: ReturnType<typeof setTimeout> | undefined;
  private framedFor: { tdbSeconds: number; frameKm: number } | null = null;
  private readonly stops: (() => void)[] = [];

  constructor(
    private readonly scene: SceneName,
    private readonly desk: DeskContext,
    host: HTMLElement,
    palette: Palette,
    private readonly onDrawing: (drawing: Drawing) => void,
  ) {
    this.palette = palette;
    this.painter = new Painter(scene);
    this.moments = new Moments(desk.store);
    this.pictureMoments = new Moments(desk.store);
    this.canvas.className = 'scene-canvas';
    host.prepend(this.canvas);
    const context = this.canvas.getContext('webgl2', CONTEXT);
    if (context === null) {
      onDrawing('missing');
      return;
    }
    this.start(context);
  }

  private start(context: WebGL2RenderingContext): void {
    const { canvas, desk } = this;
    const root = createRoot(canvas);
    void root.configure({
      gl: () => new WebGLRenderer({ canvas, context, ...CONTEXT }),
      frameloop: 'demand',
      flat: true,
      dpr: this.ratio.value,
      size: { width: 1, height: 1, top: 0, left: 0 },
      onCreated: (state) => {
        this.state = state;
        this.applyPalette();
        this.applySize();
      },
    });
    root.render(<SceneObjects painter={this.painter} beforeFrame={() => this.frame()} />);
    this.root = root;
    const lost = (event: Event) => {
      event.preventDefault();
      this.onDrawing('lost');
    };
    const restored = () => {
      this.onDrawing('drawn');
      this.applyPalette();
    };
    canvas.addEventListener('webglcontextlost', lost);
    canvas.addEventListener('webglcontextrestored', restored);
    this.stops.push(
      () => canvas.removeEventListener('webglcontextlost', lost),
      () => canvas.removeEventListener('webglcontextrestored', restored),
      desk.clock.subscribe(() => this.invalidate()),
      this.followStore(),
    );
    this.onDrawing('drawn');
  }

  dispose(): void {
    for (const stop of this.stops) stop();
    clearTimeout(this.streamTimer);
    this.root?.unmount();
    this.painter.dispose();
    this.canvas.remove();
  }

  /** The page's type has arrived. */
  rewrite(): void {
    this.painter.stamps.lettering.clear();
    this.invalidate();
  }

  invalidate(): void {
    this.state?.invalidate();
  }

  resize(widthPx: number, heightPx: number): void {
    if (widthPx === this.widthPx && heightPx === this.heightPx) return;
    this.widthPx = widthPx;
    this.heightPx = heightPx;
    this.ratio.setFinest(displayRatio());
    this.applySize();
  }

  setPalette(palette: Palette): void {
    this.palette = palette;
    this.applyPalette();
  }

  setTaken(taken: readonly Box[]): void {
    this.taken = taken;
    this.invalidate();
  }

  /** Forgets the hand's changes; the camera goes to the station as it is. */
  resetHand(): void {
    this.rig.hand = NO_HAND;
    this.rig.depart(performance.now(), isSmooth());
    this.invalidate();
  }

  turn(turnRad: number, liftRad: number): void {
    const station = this.stationNow();
    if (station === null) return;
    this.rig.turn(turnRad, liftRad, station);
    this.invalidate();
  }

  zoomBy(factor: number): void {
    const station = this.stationNow();
    if (station === null) return;
    this.rig.zoomBy(factor, station);
    this.invalidate();
  }

  /**
   * A picture apart from the screen, drawn with the station's own framing.
   *
   * @returns null when there is nothing to draw or nothing to draw with
   */
  picture(
    widthPx: number,
    heightPx: number,
    palette: Palette,
    tdbSeconds: number,
    station: Station,
  ): HTMLCanvasElement | null {
    const { state } = this;
    const moment = this.pictureMoments.at(tdbSeconds);
    const out = document.createElement('canvas');
    out.width = widthPx;
    out.height = heightPx;
    const context = out.getContext('2d');
    if (state === null || moment === null || context === null) return null;
    const { gl, scene, camera } = state;
    if (gl.getContext().isContextLost()) return null;
    const ratio = Math.max(1, Math.min(widthPx, heightPx) / PICTURE_SIDE_PX);
    gl.setPixelRatio(1);
    gl.setSize(widthPx, heightPx, false);
    gl.setClearColor(palette.ground);
    this.painter.draw(moment, {
      widthPx: widthPx / ratio,
      heightPx: heightPx / ratio,
      pixelRatio: ratio,
      palette,
      camera: stationCamera(this.scene, station, moment.encounter, moment.sample),
      taken: [],
    });
    gl.render(scene, camera);
    context.drawImage(gl.domElement, 0, 0, widthPx, heightPx);
    gl.setPixelRatio(this.ratio.value);
    gl.setSize(Math.max(1, this.widthPx), Math.max(1, this.heightPx), false);
    this.applyPalette();
    // The screen is drawn again before it is shown: the picture is not to be seen on it.
    this.frame();
    gl.render(scene, camera);
    return out;
  }

  private applySize(): void {
    const { state, widthPx, heightPx } = this;
    if (state === null || widthPx === 0 || heightPx === 0) return;
    state.setDpr(this.ratio.value);
    state.setSize(widthPx, heightPx);
    this.invalidate();
  }

  private applyPalette(): void {
    this.state?.gl.setClearColor(this.palette.ground);
    this.invalidate();
  }

  private frame(): void {
    const { widthPx, heightPx } = this;
    if (widthPx === 0 || heightPx === 0) return;
    const now = performance.now();
    const moment = this.moments.at(this.desk.clock.tdbSeconds);
    this.reframe(moment, now);
    this.painter.draw(moment, {
      widthPx,
      heightPx,
      pixelRatio: this.ratio.value,
      palette: this.palette,
      camera: this.cameraOf(moment, now),
      taken: this.taken,
    });
    if (this.rig.moving) this.invalidate();
    if (this.ratio.frame(now)) this.state?.setDpr(this.ratio.value);
  }

  private cameraOf(moment: Moment | null, nowMs: number): Camera {
    if (moment === null) return BLANK_CAMERA;
    const station = this.stationOf(moment);
    const least =
      this.station === 'riding'
        ? NEAREST_KM
        : BODY_RADIUS_KM[this.scene === 'sun' ? 'Sun' : 'Earth'] * (1 + CLEARANCE);
    return this.rig.camera(station, nowMs, least, isSmooth());
  }

  private get station(): Station {
    const { sunStation, earthStation } = this.desk.store.getState();
    return this.scene === 'sun' ? sunStation : earthStation;
  }

  private stationNow(): StationCamera | null {
    const moment = this.moments.at(this.desk.clock.tdbSeconds);
    return moment === null ? null : this.stationOf(moment);
  }

  private stationOf({ encounter, sample }: Moment): StationCamera {
    return (keepInView) => stationCamera(this.scene, this.station, encounter, sample, keepInView);
  }

  /** A new pass frames the scene anew; the hand's changes belonged to the one before. */
  private reframe(moment: Moment | null, nowMs: number): void {
    if (moment === null) return;
    const { tdbSeconds, frameKm } = moment.encounter;
    const before = this.framedFor;
    if (moment.report === null) return;
    this.framedFor = { tdbSeconds, frameKm };
    if (before === null || isSamePass(before, this.framedFor)) return;
    this.rig.hand = NO_HAND;
    this.rig.depart(nowMs, isSmooth());
  }

  private followStore(): () => void {
    let version = -1;
    return this.desk.store.subscribe((state, before) => {
      const grown = state.trajectory.version !== version;
      version = state.trajectory.version;
      if (state.sunStation !== before.sunStation || state.earthStation !== before.earthStation) {
        this.rig.hand = NO_HAND;
        this.rig.depart(performance.now(), isSmooth());
        this.invalidate();
      } else if (
        state.report !== before.report ||
        state.trajectory !== before.trajectory ||
        state.namedDistances !== before.namedDistances ||
        state.showUnperturbed !== before.showUnperturbed
      ) {
        this.invalidate();
      } else if (grown) {
        this.streamTimer ??= setTimeout(() => {
          this.streamTimer = undefined;
          this.invalidate();
        }, STREAM_MS);
      }
    });
  }
}

const BLANK_CAMERA: Camera = {
  target: [0, 0, 0],
  longitudeRad: -Math.PI / 2,
  latitudeRad: Math.PI / 2,
  distanceKm: 1e6,
};
/** A picture's shorter side is drawn as if it were this long, px: lettering grows with the picture. */
const PICTURE_SIDE_PX = 440;
const SAME_PASS_S = 86400;

function isSamePass(
  a: { tdbSeconds: number; frameKm: number },
  b: { tdbSeconds: number; frameKm: number },
): boolean {
  const ratio = a.frameKm / b.frameKm;
  return Math.abs(a.tdbSeconds - b.tdbSeconds) < SAME_PASS_S && ratio > 0.5 && ratio < 2;
}

function displayRatio(): number {
  return Math.min(FINEST_RATIO, devicePixelRatio);
}

function isSmooth(): boolean {
  return !matchMedia('(prefers-reduced-motion: reduce)').matches;
}

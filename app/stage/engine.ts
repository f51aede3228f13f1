import type { SceneName } from '../plate/scene-source';
import type { DeskContext } from '../store/context';
import type { Station } from '../store/store';
import type { Palette } from '../theme/tokens';
import { BODY_RADIUS_KM } from '../worker/core-geometry';
import { type Camera, NEAREST_KM } from './camera';
import type { Encounter } from './encounter';
import type { Box } from './labels';
import { Moments } from './moments';
import type { Painter } from './painter';
import { PixelRatio } from './pixel-ratio';
import { NO_HAND, Rig, type StationCamera } from './rig';
import type { Moment } from './sheet';
import { stationCamera } from './stations';
import { type Drawing, Surface } from './surface';

const FINEST_RATIO = 2;
/** Least time between two frames that are drawn only because states stream in, ms. */
const STREAM_MS = 90;
/** The camera stops this far above a body, as a share of its radius. */
const CLEARANCE = 0.04;
/** A picture's shorter side is drawn as if it were this long, px: lettering grows with the picture. */
const PICTURE_SIDE_PX = 350;
/** Two passes this near in time and alike in size are the same: the view stays as it is. */
const SAME_PASS_S = 86400;
const BLANK_CAMERA: Camera = {
  target: [0, 0, 0],
  longitudeRad: -Math.PI / 2,
  latitudeRad: Math.PI / 2,
  distanceKm: 1e6,
};

/** One scene on the screen: its camera, and when it is drawn. */
export class SceneEngine {
  private readonly surface: Surface;
  private readonly rig = new Rig();
  private readonly moments: Moments;
  private readonly pictureMoments: Moments;
  private readonly ratio = new PixelRatio(displayRatio());
  private readonly stops: (() => void)[];
  private widthPx = 0;
  private heightPx = 0;
  private taken: readonly Box[] = [];
  private streamTimer: ReturnType<typeof setTimeout> | undefined;
  private framedFor: Encounter | null = null;

  constructor(
    private readonly scene: SceneName,
    private readonly desk: DeskContext,
    host: HTMLElement,
    private palette: Palette,
    onDrawing: (drawing: Drawing) => void,
  ) {
    this.moments = new Moments(desk.store);
    this.pictureMoments = new Moments(desk.store);
    this.surface = new Surface(host, scene, {
      frame: (painter) => this.frame(painter),
      drawing: onDrawing,
    });
    this.surface.setGround(palette.ground);
    this.stops = [desk.clock.subscribe(() => this.surface.invalidate()), this.followStore()];
  }

  dispose(): void {
    for (const stop of this.stops) stop();
    clearTimeout(this.streamTimer);
    this.surface.dispose();
  }

  resize(widthPx: number, heightPx: number): void {
    if (widthPx === this.widthPx && heightPx === this.heightPx) return;
    this.widthPx = widthPx;
    this.heightPx = heightPx;
    this.ratio.setFinest(displayRatio());
    this.surface.setPixelRatio(this.ratio.value);
    this.surface.setSize(widthPx, heightPx);
  }

  setPalette(palette: Palette): void {
    this.palette = palette;
    this.surface.setGround(palette.ground);
  }

  /** Boxes of the page's own words over the picture, px. */
  setTaken(taken: readonly Box[]): void {
    this.taken = taken;
    this.surface.invalidate();
  }

  /** The page's type has arrived. */
  rewrite(): void {
    this.surface.rewrite();
  }

  /** Forgets the hand's changes; the camera goes to the station as it is. */
  resetHand(): void {
    this.rig.hand = NO_HAND;
    this.rig.depart(performance.now(), isSmooth());
    this.surface.invalidate();
  }

  turn(turnRad: number, liftRad: number): void {
    const station = this.stationNow();
    if (station === null) return;
    this.rig.turn(turnRad, liftRad, station);
    this.surface.invalidate();
  }

  zoomBy(factor: number): void {
    const station = this.stationNow();
    if (station === null) return;
    this.rig.zoomBy(factor, station);
    this.surface.invalidate();
  }

  /** A picture apart from the screen, with the station's own framing; null when none can be drawn. */
  picture(
    widthPx: number,
    heightPx: number,
    palette: Palette,
    tdbSeconds: number,
    station: Station,
  ): HTMLCanvasElement | null {
    const moment = this.pictureMoments.at(tdbSeconds);
    if (moment === null) return null;
    const pixelRatio = Math.max(1, Math.min(widthPx, heightPx) / PICTURE_SIDE_PX);
    const { encounter, sample } = moment;
    return this.surface.picture(widthPx, heightPx, palette.ground, (painter) =>
      painter.draw(moment, {
        widthPx: widthPx / pixelRatio,
        heightPx: heightPx / pixelRatio,
        pixelRatio,
        palette,
        camera: stationCamera(this.scene, station, encounter, sample),
        taken: [],
      }),
    );
  }

  private frame(painter: Painter): void {
    const { widthPx, heightPx } = this;
    if (widthPx === 0 || heightPx === 0) return;
    const nowMs = performance.now();
    const moment = this.moments.at(this.desk.clock.tdbSeconds);
    if (moment !== null) this.reframe(moment, nowMs);
    painter.draw(moment, {
      widthPx,
      heightPx,
      pixelRatio: this.ratio.value,
      palette: this.palette,
      camera: moment === null ? BLANK_CAMERA : this.cameraOf(moment, nowMs),
      taken: this.taken,
    });
    if (this.rig.moving) this.surface.invalidate();
    if (this.ratio.frame(nowMs)) this.surface.setPixelRatio(this.ratio.value);
  }

  private cameraOf(moment: Moment, nowMs: number): Camera {
    const body = this.scene === 'sun' ? 'Sun' : 'Earth';
    const leastKm = this.station === 'riding' ? NEAREST_KM : BODY_RADIUS_KM[body] * (1 + CLEARANCE);
    return this.rig.camera(this.stationOf(moment), nowMs, leastKm, isSmooth());
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
  private reframe({ report, encounter }: Moment, nowMs: number): void {
    const before = this.framedFor;
    if (report === null || encounter === before) return;
    this.framedFor = encounter;
    if (before === null || isSamePass(before, encounter)) return;
    this.rig.hand = NO_HAND;
    this.rig.depart(nowMs, isSmooth());
  }

  private followStore(): () => void {
    const { store } = this.desk;
    const field = this.scene === 'sun' ? 'sunStation' : 'earthStation';
    let version = -1;
    return store.subscribe((state, before) => {
      const hasGrown = state.trajectory.version !== version;
      version = state.trajectory.version;
      if (state[field] !== before[field]) this.resetHand();
      else if (
        state.report !== before.report ||
        state.trajectory !== before.trajectory ||
        state.namedDistances !== before.namedDistances ||
        state.showUnperturbed !== before.showUnperturbed ||
        state.showSpread !== before.showSpread
      ) {
        this.surface.invalidate();
      } else if (hasGrown) {
        this.streamTimer ??= setTimeout(() => {
          this.streamTimer = undefined;
          this.surface.invalidate();
        }, STREAM_MS);
      }
    });
  }
}

function isSamePass(a: Encounter, b: Encounter): boolean {
  const ratio = a.frameKm / b.frameKm;
  return Math.abs(a.tdbSeconds - b.tdbSeconds) < SAME_PASS_S && ratio > 0.5 && ratio < 2;
}

function displayRatio(): number {
  return Math.min(FINEST_RATIO, devicePixelRatio);
}

function isSmooth(): boolean {
  return !matchMedia('(prefers-reduced-motion: reduce)').matches;
}

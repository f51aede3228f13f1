import { norm, subtract } from '../worker/core-geometry';
import { between, type Camera, FARTHEST_KM, NEAREST_KM } from './camera';

/** What holds a scene's camera: the station, what a hand has changed, and the way between two. */

/** A hand's changes to the station's camera. */
export interface Hand {
  readonly turnRad: number;
  readonly liftRad: number;
  /** Share of the station's fixed distance; null lets the station frame the scene by itself. */
  readonly zoom: number | null;
}

export const NO_HAND: Hand = { turnRad: 0, liftRad: 0, zoom: null };

/** The camera of the station in force: framing what matters now, or fixed on the pass. */
export type StationCamera = (keepInView: boolean) => Camera;

const MOVE_MS = 600;
const QUARTER = Math.PI / 2;

export class Rig {
  hand: Hand = NO_HAND;
  private from: Camera | null = null;
  private departedMs = 0;
  private last: Camera | null = null;
  private lastWanted: Camera | null = null;

  /** On its way between two cameras: wants another frame. */
  get moving(): boolean {
    return this.from !== null;
  }

  /** Sets out, from where the camera is now, to wherever it belongs next. */
  depart(nowMs: number, smooth: boolean): void {
    this.from = smooth ? this.last : null;
    this.departedMs = nowMs;
  }

  /** Turns by hand: about the ecliptic's pole, and towards it. */
  turn(turnRad: number, liftRad: number, station: StationCamera): void {
    const { latitudeRad } = station(true);
    const lifted = upright(latitudeRad + this.hand.liftRad + liftRad);
    this.from = null;
    this.hand = {
      ...this.hand,
      turnRad: this.hand.turnRad + turnRad,
      liftRad: lifted - latitudeRad,
    };
  }

  /** Zooms by a factor of the distance; from then on the framing is the hand's. */
  zoomBy(factor: number, station: StationCamera): void {
    const fixed = station(false).distanceKm;
    const now = this.last?.distanceKm ?? fixed;
    this.from = null;
    this.hand = { ...this.hand, zoom: within(now * factor) / fixed };
  }

  /**
   * The camera of a moment. Where the station leaps (the clock was set to another day), the camera
   * goes there on its own way.
   *
   * @param leastKm  it comes no nearer to its target
   * @param smooth   false: it leaps with the station
   */
  camera(station: StationCamera, nowMs: number, leastKm: number, smooth: boolean): Camera {
    const { hand } = this;
    const base = station(hand.zoom === null);
    const wanted: Camera = {
      target: base.target,
      longitudeRad: base.longitudeRad + hand.turnRad,
      latitudeRad: upright(base.latitudeRad + hand.liftRad),
      distanceKm: Math.max(leastKm, within(base.distanceKm * (hand.zoom ?? 1))),
    };
    if (this.lastWanted !== null && leaps(this.lastWanted, wanted)) this.depart(nowMs, smooth);
    this.lastWanted = wanted;
    const share = (nowMs - this.departedMs) / MOVE_MS;
    if (share >= 1) this.from = null;
    this.last = this.from === null ? wanted : between(this.from, wanted, eased(Math.max(0, share)));
    return this.last;
  }
}

function within(distanceKm: number): number {
  return Math.min(FARTHEST_KM, Math.max(NEAREST_KM, distanceKm));
}

function upright(latitudeRad: number): number {
  return Math.min(QUARTER, Math.max(-QUARTER, latitudeRad));
}

/** A distance that changes more than this in one frame is a leap. */
const LEAP_RATIO = 1.4;

function leaps(before: Camera, after: Camera): boolean {
  const ratio = after.distanceKm / before.distanceKm;
  const moved = norm(subtract(after.target, before.target));
  return (
    ratio > LEAP_RATIO ||
    ratio < 1 / LEAP_RATIO ||
    moved > Math.max(before.distanceKm, after.distanceKm) / 2
  );
}

/** Starts at once and comes to rest softly. */
function eased(share: number): number {
  return 1 - (1 - share) ** 3;
}

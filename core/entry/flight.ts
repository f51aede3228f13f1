import { ENTRY_INTERFACE_ALTITUDE_KM } from '../constants';
import { geodeticFromItrf } from '../frames/geodetic';
import { vec3 } from '../math/vector';
import type { Deposition } from './deposition';
import type { EarthFixedState } from './earth-fixed';
import {
  type AirModel,
  type Body,
  DEPOSITED,
  type EarthField,
  FlyingBody,
  GRAVITY_WORK,
  LOG_MASS,
  RADIUS,
  SOLID,
  SPREAD_RATE,
  STANDARD_AIR,
  STATE_SIZE,
  sphereRadiusM,
  TURNING_EARTH,
} from './flying-body';
import { RungeKutta54 } from './runge-kutta';
import { checkWind, type WindProfile } from './wind';

/** The flight of one body, or of many like it, until something happens to it. */

export interface FlightSettings {
  readonly air: AirModel;
  readonly earth: EarthField;
  /** Motion of the air over the ground; null for air that turns with the Earth. */
  readonly wind: WindProfile | null;
  /** Error of a step: relative to speed, mass and energy; times 10 km of place. */
  readonly tolerance: number;
}

/** For one flight. `ENSEMBLE_TOLERANCE` is for many. */
export const DEFAULT_FLIGHT: FlightSettings = {
  air: STANDARD_AIR,
  earth: TURNING_EARTH,
  wind: null,
  tolerance: 1e-8,
};

/** What ends a flight, or a leg of it. */
export type FlightEnd =
  /** Reaches altitude 0. */
  | 'ground'
  /** Climbs through the entry interface. */
  | 'out'
  /** Ram pressure reaches its strength. */
  | 'strength'
  /** Spreads to its largest radius. */
  | 'spread'
  /** Loses all but a trace of its mass. */
  | 'burnt'
  /** Has slowed down to dust that falls. */
  | 'slow';

/** A flight that cannot go on: a state that is no number, or steps without end. */
export class FlightError extends Error {
  readonly code = 'FLIGHT';
}

/** What a leg of a flight watches for. */
export interface Stops {
  /** Pa; Infinity for a body that does not break. */
  strengthPa: number;
  /** m; Infinity for one that spreads freely. */
  radiusM: number;
  /** km/s; 0 for one followed to the ground. */
  slowKmS: number;
}

/** A moment of a flight. */
export interface FlightSample {
  seconds: number;
  altitudeKm: number;
  latitudeRad: number;
  longitudeRad: number;
  /** Through the air. */
  airSpeedKmS: number;
  /** Of one body; its like fly with it. */
  massKg: number;
  radiusM: number;
  dynamicPressurePa: number;
}

/** Mass at which a body counts as burnt, kg. */
const BURNT_KG = 1e-6;
/** Share of its mass at which a spreading body does: what is left is stopped within metres. */
const BURNT_SHARE = 1e-4;
/** A step changes the altitude by half a scale height at most, so that no peak is stepped over. */
const LONGEST_DROP_KM = 3.5;
const LONGEST_PATH_KM = 40;
const MAX_STEPS = 20000;
const MAX_REFINEMENTS = 30;

/**
 * Integrates one body. Its buffers serve flight after flight; nothing is allocated unless a track is
 * asked for.
 *
 * Accuracy: at tolerance 1e-8 the energy closes to 1e-6 and burst altitudes repeat to 1e-5; measured
 * in the tests.
 * Source: as `FlyingBody`; Dormand & Prince (1980).
 */
export class Flight {
  readonly y = new Float64Array(STATE_SIZE);
  readonly body: FlyingBody;
  /** Seconds since the first leg began. */
  seconds = 0;
  /** Largest ram pressure since `begin`, and the altitude where. */
  peakPressurePa = 0;
  peakPressureAltitudeKm = 0;
  /** How many like it fly together. */
  count = 1;
  /** Receives the energy given to the air; null where nobody asks. */
  deposition: Deposition | null = null;
  /** Receives a sample at every step; null where nobody asks. */
  track: FlightSample[] | null = null;

  private readonly stepper: RungeKutta54;
  private readonly scale = new Float64Array(STATE_SIZE);
  private readonly marks = new Float64Array(6);
  private readonly marksAtStart = new Float64Array(6);
  private readonly tolerance: number;
  private stepSeconds = 0.1;
  private startSpeed2 = 1;
  private lastError = 1;

  constructor(settings: FlightSettings) {
    if (settings.wind !== null) checkWind(settings.wind);
    this.body = new FlyingBody(settings.air, settings.earth, settings.wind);
    this.stepper = new RungeKutta54(this.body);
    this.tolerance = settings.tolerance;
  }

  /** Puts a solid body at a state; the clock and the peak are set back. */
  begin(state: EarthFixedState, body: Body): void {
    const { y } = this;
    for (let i = 0; i < 3; i++) {
      y[i] = state.rKm[i];
      y[3 + i] = state.vKmS[i];
    }
    this.body.ablationS2Km2 = body.ablationS2Km2;
    this.body.dragCoefficient = body.dragCoefficient;
    this.body.liftCoefficient = body.liftCoefficient;
    this.body.densityKgM3 = body.densityKgM3;
    this.seconds = 0;
    this.peakPressurePa = 0;
    this.peakPressureAltitudeKm = 0;
    this.rebase(body.massKg, 1, SOLID);
  }

  /** Goes on from here with bodies of another mass, number and shape: those of a break-up. */
  rebase(massKg: number, count: number, shape: number): void {
    const { y } = this;
    this.body.startMassKg = massKg;
    this.body.shape = shape;
    this.count = count;
    y[LOG_MASS] = 0;
    y[DEPOSITED] = 0;
    y[GRAVITY_WORK] = 0;
    y[RADIUS] = sphereRadiusM(massKg, this.body.densityKgM3);
    y[SPREAD_RATE] = 0;
    this.startSpeed2 = y[3] * y[3] + y[4] * y[4] + y[5] * y[5];
    this.stepSeconds = 0.1;
  }

  /** Mass of one body, kg. */
  get massKg(): number {
    return this.body.startMassKg * Math.exp(this.y[LOG_MASS]);
  }

  /** Radius of one body, or of what it has spread to, m. */
  get radiusM(): number {
    return this.body.shape === SOLID
      ? sphereRadiusM(this.massKg, this.body.densityKgM3)
      : this.y[RADIUS];
  }

  /** Kinetic energy of all of them over the ground, MJ. */
  get kineticMJ(): number {
    const { y } = this;
    return 0.5 * this.count * this.massKg * (y[3] * y[3] + y[4] * y[4] + y[5] * y[5]);
  }

  /** Energy given to the air, and work of gravity, since `rebase`, all of them, MJ. */
  get depositedMJ(): number {
    return this.count * this.body.startMassKg * this.y[DEPOSITED];
  }
  get gravityWorkMJ(): number {
    return this.count * this.body.startMassKg * this.y[GRAVITY_WORK];
  }

  /** Where it is, over the ground. */
  state(): EarthFixedState {
    return { rKm: vec3(this.y), vKmS: vec3(this.y, 3) };
  }

  /**
   * Flies until the first of the stops.
   *
   * @returns what ended the leg; the state is that of its moment
   * @throws  FlightError for a state that is no number, or after 20 000 steps
   */
  run(stops: Stops): FlightEnd {
    const { y, stepper, body } = this;
    body.observe(y);
    this.markTo(this.marksAtStart, stops);
    this.keepPeak();
    if (this.marksAtStart[1] >= 0) return 'out';
    if (this.marksAtStart[2] >= 0) return 'strength';
    if (this.track !== null && this.track.length === 0) this.sample(this.track);
    stepper.begin(y);
    this.stepSeconds = this.firstStep();
    this.lastError = 1;
    for (let step = 0; step < MAX_STEPS; step++) {
      const altitude0 = body.altitudeKm;
      const climb0 = body.climbKmS;
      let h = this.attemptStep(climb0);
      let end = this.firstStop(h, stops);
      if (end !== null) h = this.refine(h, end, stops);
      body.observe(stepper.end);
      this.deposition?.addStep(
        h,
        altitude0,
        climb0,
        body.altitudeKm,
        body.climbKmS,
        y[DEPOSITED],
        stepper.first[DEPOSITED],
        stepper.end[DEPOSITED],
        stepper.last[DEPOSITED],
        this.count * body.startMassKg,
      );
      y.set(stepper.end);
      this.seconds += h;
      this.keepPeak();
      if (this.track !== null) this.sample(this.track);
      if (end !== null) return ENDS[end];
      this.markTo(this.marksAtStart, stops);
      stepper.advance();
      end = null;
    }
    throw new FlightError(
      `flight of ${this.massKg} kg at ${body.altitudeKm} km did not end in ${MAX_STEPS} steps; check its mass, density and speed`,
    );
  }

  /** A step within which a body just broken neither stops nor spreads far. */
  private firstStep(): number {
    const { y, stepper } = this;
    const { first } = stepper;
    const speed = Math.hypot(y[3], y[4], y[5]);
    const slowing = Math.hypot(first[3], first[4], first[5]);
    const part = this.tolerance ** 0.2;
    let h = Math.min(0.1, (part * speed) / (slowing + 1e-12));
    if (first[RADIUS] > 0) h = Math.min(h, (part * y[RADIUS]) / first[RADIUS]);
    if (first[SPREAD_RATE] > 0) h = Math.min(h, part * Math.sqrt(y[RADIUS] / first[SPREAD_RATE]));
    return Math.max(h, 1e-7);
  }

  /** Makes a step that is accurate enough; returns its length, the result is the stepper's. */
  private attemptStep(climb: number): number {
    const { y, stepper, scale, tolerance } = this;
    const speed2 = y[3] * y[3] + y[4] * y[4] + y[5] * y[5];
    const speed = Math.sqrt(speed2);
    const place = tolerance * 10;
    const motion = tolerance * (speed + 0.01);
    const energy = 0.5 * tolerance * (this.startSpeed2 + 0.01);
    for (let i = 0; i < 3; i++) {
      scale[i] = place;
      scale[3 + i] = motion;
    }
    scale[LOG_MASS] = tolerance;
    scale[DEPOSITED] = energy;
    scale[GRAVITY_WORK] = energy;
    scale[RADIUS] = tolerance * y[RADIUS];
    scale[SPREAD_RATE] = tolerance * (y[SPREAD_RATE] + y[RADIUS]);
    let h = Math.min(
      this.stepSeconds,
      LONGEST_DROP_KM / (Math.abs(climb) + 1e-9),
      LONGEST_PATH_KM / (speed + 1e-9),
    );
    for (;;) {
      stepper.attempt(y, h);
      const error = stepper.error(h, scale);
      if (error <= 1) {
        // An error that grows from step to step foretells the next one's (Gustafsson 1991): in air that
        // stops a cloud within a kilometre half of all steps would be tried in vain.
        const now = Math.max(error, 1e-6);
        const trend = Math.min(1, (this.lastError / now) ** 0.1);
        this.stepSeconds = h * Math.min(3, 0.7 * now ** -0.2 * trend);
        this.lastError = now;
        return h;
      }
      h *= Number.isFinite(error) ? Math.max(0.2, 0.9 * error ** -0.2) : 0.1;
      if (!(h > 1e-9)) {
        throw new FlightError(
          `flight of ${this.massKg} kg at ${this.body.altitudeKm} km needs steps below 1e-9 s; check its mass, density and speed`,
        );
      }
    }
  }

  /** Signed distance of a state (already observed) to each stop: reached from zero on. */
  private markTo(out: Float64Array, stops: Stops, y: Float64Array = this.y): void {
    const { body } = this;
    out[0] = -body.altitudeKm;
    out[1] =
      body.climbKmS > 0
        ? body.altitudeKm - ENTRY_INTERFACE_ALTITUDE_KM
        : -Math.abs(body.altitudeKm - ENTRY_INTERFACE_ALTITUDE_KM) - 1e-6;
    out[2] = body.ramPressurePa / stops.strengthPa - 1;
    out[3] = body.shape === SOLID ? -1 : y[RADIUS] / stops.radiusM - 1;
    const burnt = body.shape === SOLID ? BURNT_KG / body.startMassKg : BURNT_SHARE;
    out[4] = Math.log(burnt) - y[LOG_MASS];
    out[5] = stops.slowKmS - body.airSpeedKmS;
  }

  /** Which stop the last attempt reaches first; null for none. */
  private firstStop(h: number, stops: Stops): number | null {
    const { body, stepper, marks } = this;
    body.observe(stepper.end);
    this.markTo(marks, stops, stepper.end);
    let first: number | null = null;
    let soonest = Number.POSITIVE_INFINITY;
    for (let i = 0; i < marks.length; i++) {
      if (marks[i] < 0 || this.marksAtStart[i] >= 0) continue;
      const at = (h * this.marksAtStart[i]) / (this.marksAtStart[i] - marks[i]);
      if (at < soonest) {
        soonest = at;
        first = i;
      }
    }
    return first;
  }

  /** Shortens the last attempt to the moment of a stop (Illinois form of the false position). */
  private refine(h: number, stop: number, stops: Stops): number {
    const { body, stepper, marks, y } = this;
    let low = 0;
    let high = h;
    let atLow = this.marksAtStart[stop];
    let atHigh = marks[stop];
    let side = 0;
    let length = h;
    for (let i = 0; i < MAX_REFINEMENTS; i++) {
      length = low + ((high - low) * atLow) / (atLow - atHigh);
      stepper.attempt(y, length);
      body.observe(stepper.end);
      this.markTo(marks, stops, stepper.end);
      const value = marks[stop];
      if (Math.abs(value) < this.tolerance || high - low < 1e-9) break;
      if (value >= 0) {
        high = length;
        atHigh = value;
        if (side === 1) atLow /= 2;
        side = 1;
      } else {
        low = length;
        atLow = value;
        if (side === -1) atHigh /= 2;
        side = -1;
      }
    }
    return length;
  }

  private keepPeak(): void {
    if (this.body.ramPressurePa > this.peakPressurePa) {
      this.peakPressurePa = this.body.ramPressurePa;
      this.peakPressureAltitudeKm = this.body.altitudeKm;
    }
  }

  private sample(track: FlightSample[]): void {
    const place = geodeticFromItrf(vec3(this.y));
    track.push({
      seconds: this.seconds,
      altitudeKm: place.altitudeKm,
      latitudeRad: place.latitudeRad,
      longitudeRad: place.longitudeRad,
      airSpeedKmS: this.body.airSpeedKmS,
      massKg: this.massKg,
      radiusM: this.radiusM,
      dynamicPressurePa: this.body.ramPressurePa,
    });
  }
}

const ENDS: readonly FlightEnd[] = ['ground', 'out', 'strength', 'spread', 'burnt', 'slow'];

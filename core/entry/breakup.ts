import { geodeticFromItrf } from '../frames/geodetic';
import { KILOTON_MJ } from './constants';
import { Deposition } from './deposition';
import type { EarthFixedState } from './earth-fixed';
import { Flight, type FlightEnd, type FlightSample, type FlightSettings } from './flight';
import { type Body, CLOUD, PANCAKE, RADIUS, SOLID, SPREAD, SPREAD_RATE } from './flying-body';
import { scaledStrengthPa } from './materials';
import { type SkipOut, skipOut } from './skip';

/** An entry from the interface to its end: flight, break-up, and what reaches the ground. */

/** How a body comes apart; `none` for one that is held together whatever the pressure. */
export type BreakupModel = 'pancake' | 'fragment cloud' | 'none';

export interface Breakup {
  readonly model: BreakupModel;
  /** Ram pressure at which a body of `strengthMassKg` breaks, Pa. */
  readonly strengthPa: number;
  /** Null: the strength is that of the entering body. */
  readonly strengthMassKg: number | null;
  /** α of strength = σ0 (m0/m)^α. */
  readonly weibullExponent: number;
  /** Pancake: its largest radius over the radius at break-up. */
  readonly spreadFactor: number;
  /** Fragment cloud: share of the mass that becomes dust at each break-up. */
  readonly cloudShare: number;
  /** Fragment cloud: number of equal pieces that the rest becomes. */
  readonly pieces: number;
}

/**
 * Customary values: spreading to 7 times the radius (Collins, Melosh & Marcus 2005, from memory; 2 in
 * Hills & Goda 1993, 5 to 10 in Chyba et al. 1993); two pieces and half the mass to the cloud at each
 * break-up (Wheeler, Register & Mathias 2017, from memory).
 */
export const CUSTOMARY_BREAKUP = { spreadFactor: 7, cloudShare: 0.5, pieces: 2 } as const;

/** Something that arrives at the ground: `count` bodies alike. */
export interface GroundArrival {
  readonly count: number;
  /** Of one of them. */
  readonly massKg: number;
  readonly speedKmS: number;
  readonly latitudeRad: number;
  readonly longitudeRad: number;
  readonly seconds: number;
  /** Radius of the swarm for a body that came apart, of the piece otherwise. */
  readonly radiusM: number;
  /** Whether it came apart before. */
  readonly spread: boolean;
}

/** What became of an entry. Energies in kt of 4.184e12 J. */
export interface EntryOutcome {
  readonly end: 'skips out' | 'reaches the ground' | 'ends in the air';
  readonly entryEnergyKt: number;
  readonly depositedKt: number;
  /** Kinetic energy of what reaches the ground. */
  readonly groundKt: number;
  /** Kinetic energy of what leaves the air again. */
  readonly leavingKt: number;
  /** (in + work of gravity − deposited − ground − leaving) / in. */
  readonly energyResidual: number;
  /** First break-up; null for none. */
  readonly breakAltitudeKm: number | null;
  readonly breakSpeedKmS: number | null;
  /**
   * Where most energy per kilometre is given to the air; null where nothing broke, and where half of
   * the energy or more reaches the ground.
   */
  readonly burstAltitudeKm: number | null;
  /** The same peak, broken or not. */
  readonly peakDepositionAltitudeKm: number;
  readonly peakDepositionKtPerKm: number;
  /** Largest ram pressure on the leading body, and where. */
  readonly peakDynamicPressurePa: number;
  readonly peakDynamicPressureAltitudeKm: number;
  readonly arrivals: readonly GroundArrival[];
  readonly skip: SkipOut | null;
  /** State of the leading body when it first broke; null where nothing broke. */
  readonly breakState: EarthFixedState | null;
}

/** Slower than this, dust and shreds count as stopped: their motion is the air's. */
const SLOW_CLOUD_KM_S = 0.5;
/** In the ensemble whatever is this slow counts as stopped: it has lost all but 1 % of its energy. */
const SLOW_IN_ENSEMBLE_KM_S = 1;
/** After so many generations pieces are gravel: they are not broken any further. */
const MAX_GENERATIONS = 60;

export interface SimulatorOptions {
  /** Thickness of the slabs of altitude that the energy is summed over, km. */
  readonly slabKm: number;
  /** Whether slow pieces are followed down to the ground. */
  readonly toGround: boolean;
}

/** For one entry, seen closely. */
export const CLOSE_LOOK: SimulatorOptions = { slabKm: 0.25, toGround: true };

/**
 * Simulates entries, one after the other, on the same buffers.
 *
 * `pancake`: once ram pressure reaches the strength the body spreads by its own inertia (Chyba, Thomas
 * & Zahnle 1993) to a largest radius, then keeps it. `fragment cloud`: at each break-up a share of the
 * mass becomes a cloud of dust that spreads and slows as one (Hills & Goda 1993), and the rest equal
 * pieces, stronger by Weibull's law, that fly on alone and break again (Wheeler, Register & Mathias
 * 2017, Icarus 295, 149; from memory).
 *
 * Accuracy: of the integration, see `Flight`; the models themselves scatter by some kilometres in
 * burst altitude.
 */
export class EntrySimulator {
  /** Energy by altitude of the last entry. */
  readonly deposition: Deposition;
  private readonly flight: Flight;
  private readonly lead = new Float64Array(11);
  private readonly stops = { strengthPa: 0, radiusM: 0, slowKmS: 0 };
  private arrivals: GroundArrival[] = [];
  private workMJ = 0;
  private groundMJ = 0;
  private leavingMJ = 0;
  private leftover: SkipOut | null = null;
  private entry: EarthFixedState | null = null;

  constructor(
    settings: FlightSettings,
    private readonly options: SimulatorOptions,
  ) {
    this.deposition = new Deposition(options.slabKm, 120);
    this.flight = new Flight(settings);
    this.flight.deposition = this.deposition;
  }

  /**
   * @param entry   at the entry interface or above, ITRF axes
   * @param body    what comes in
   * @param breakup how it comes apart
   * @param track   receives samples of the leading body; null where nobody asks
   * @throws FlightError for a body or state without sense
   */
  run(
    entry: EarthFixedState,
    body: Body,
    breakup: Breakup,
    track: FlightSample[] | null,
  ): EntryOutcome {
    const { flight, deposition, stops } = this;
    deposition.clear();
    this.arrivals = [];
    this.workMJ = 0;
    this.groundMJ = 0;
    this.leavingMJ = 0;
    this.leftover = null;
    this.entry = entry;
    flight.begin(entry, body);
    flight.track = track;
    const entryMJ = flight.kineticMJ;
    const strength = (massKg: number) =>
      breakup.model === 'none'
        ? Number.POSITIVE_INFINITY
        : scaledStrengthPa(
            breakup.strengthPa,
            breakup.strengthMassKg ?? body.massKg,
            massKg,
            breakup.weibullExponent,
          );

    stops.radiusM = Number.POSITIVE_INFINITY;
    stops.slowKmS = this.options.toGround ? 0 : SLOW_IN_ENSEMBLE_KM_S;
    stops.strengthPa = strength(body.massKg);
    let end = flight.run(stops);
    let breakAltitudeKm: number | null = null;
    let breakSpeedKmS: number | null = null;
    let breakState: EarthFixedState | null = null;
    if (end === 'strength') {
      breakAltitudeKm = flight.body.altitudeKm;
      breakSpeedKmS = flight.body.airSpeedKmS;
      breakState = flight.state();
      end = breakup.model === 'pancake' ? this.flatten(breakup) : this.shatter(breakup, strength);
    }
    this.close(end);

    const peak = deposition.peakAltitudeKm(deposition.energyMJ);
    const deposited = deposition.totalMJ();
    const toKt = 1 / KILOTON_MJ;
    return {
      end:
        this.leftover !== null
          ? 'skips out'
          : this.arrivals.length > 0
            ? 'reaches the ground'
            : 'ends in the air',
      entryEnergyKt: entryMJ * toKt,
      depositedKt: deposited * toKt,
      groundKt: this.groundMJ * toKt,
      leavingKt: this.leavingMJ * toKt,
      energyResidual:
        (entryMJ + this.workMJ - deposited - this.groundMJ - this.leavingMJ) / entryMJ,
      breakAltitudeKm,
      breakSpeedKmS,
      burstAltitudeKm: breakAltitudeKm === null || this.groundMJ >= 0.5 * entryMJ ? null : peak,
      peakDepositionAltitudeKm: peak,
      peakDepositionKtPerKm: (largest(deposition.energyMJ) * toKt) / deposition.slabKm,
      peakDynamicPressurePa: flight.peakPressurePa,
      peakDynamicPressureAltitudeKm: flight.peakPressureAltitudeKm,
      arrivals: this.arrivals,
      skip: this.leftover,
      breakState,
    };
  }

  /** The whole body spreads into one pancake. */
  private flatten(breakup: Breakup): FlightEnd {
    const { flight, stops } = this;
    this.workMJ += flight.gravityWorkMJ;
    flight.rebase(flight.massKg, 1, PANCAKE);
    stops.strengthPa = Number.POSITIVE_INFINITY;
    stops.radiusM = breakup.spreadFactor * flight.y[RADIUS];
    stops.slowKmS = this.options.toGround ? SLOW_CLOUD_KM_S : SLOW_IN_ENSEMBLE_KM_S;
    let end = flight.run(stops);
    if (end === 'spread') {
      flight.body.shape = SPREAD;
      flight.y[SPREAD_RATE] = 0;
      stops.radiusM = Number.POSITIVE_INFINITY;
      end = flight.run(stops);
    }
    return end;
  }

  /** Pieces break again and again, and leave clouds. */
  private shatter(breakup: Breakup, strength: (massKg: number) => number): FlightEnd {
    const { flight, stops, lead } = this;
    for (let generation = 0; ; generation++) {
      this.workMJ += flight.gravityWorkMJ;
      const massKg = flight.massKg;
      const count = flight.count;
      const pieceKg = (massKg * (1 - breakup.cloudShare)) / breakup.pieces;
      const { seconds, track, peakPressurePa, peakPressureAltitudeKm } = flight;
      lead.set(flight.y);

      flight.track = null;
      flight.rebase(massKg * breakup.cloudShare, count, CLOUD);
      stops.strengthPa = Number.POSITIVE_INFINITY;
      stops.slowKmS = this.options.toGround ? SLOW_CLOUD_KM_S : SLOW_IN_ENSEMBLE_KM_S;
      this.close(flight.run(stops));

      flight.track = track;
      flight.seconds = seconds;
      flight.peakPressurePa = peakPressurePa;
      flight.peakPressureAltitudeKm = peakPressureAltitudeKm;
      flight.y.set(lead);
      flight.rebase(pieceKg, count * breakup.pieces, SOLID);
      stops.strengthPa =
        generation < MAX_GENERATIONS ? strength(pieceKg) : Number.POSITIVE_INFINITY;
      stops.slowKmS = this.options.toGround ? 0 : SLOW_IN_ENSEMBLE_KM_S;
      const end = flight.run(stops);
      if (end !== 'strength') return end;
    }
  }

  /** Books what is left at the end of a flight. */
  private close(end: FlightEnd): void {
    const { flight } = this;
    const kinetic = flight.kineticMJ;
    this.workMJ += flight.gravityWorkMJ;
    if (end === 'ground') {
      const place = geodeticFromItrf(flight.state().rKm);
      this.groundMJ += kinetic;
      this.arrivals.push({
        count: flight.count,
        massKg: flight.massKg,
        speedKmS: flight.body.airSpeedKmS,
        latitudeRad: place.latitudeRad,
        longitudeRad: place.longitudeRad,
        seconds: flight.seconds,
        radiusM: flight.radiusM,
        spread: flight.body.shape !== SOLID,
      });
    } else if (end === 'out' && this.entry !== null) {
      this.leavingMJ += kinetic;
      this.leftover = skipOut(this.entry, flight.state(), flight.seconds, flight.massKg);
    } else {
      this.deposition.addAt(flight.body.altitudeKm, kinetic);
    }
  }
}

function largest(values: Float64Array): number {
  let most = 0;
  for (let i = 0; i < values.length; i++) most = Math.max(most, values[i]);
  return most;
}

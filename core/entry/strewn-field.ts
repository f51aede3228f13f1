import { geodeticFromItrf } from '../frames/geodetic';
import type { EarthFixedState } from './earth-fixed';
import { Flight, type FlightSettings } from './flight';
import type { Body } from './flying-body';

/** Where surviving pieces would lie: dark flight of pieces let go along the way. */

/** A piece let go at some altitude, and where it comes down. */
export interface StrewnPiece {
  readonly releaseMassKg: number;
  readonly releaseAltitudeKm: number;
  /** At the ground. */
  readonly massKg: number;
  readonly speedKmS: number;
  readonly latitudeRad: number;
  readonly longitudeRad: number;
  /** Since its release. */
  readonly seconds: number;
}

/** Masses at release, kg, from 1 g up: what arrives is lighter by what ablates. */
export const STREWN_MASSES_KG: readonly number[] = [0.001, 0.01, 0.1, 1, 10, 100];

const WHOLE = {
  strengthPa: Number.POSITIVE_INFINITY,
  radiusM: Number.POSITIVE_INFINITY,
  slowKmS: 0,
};

/**
 * Follows pieces of given masses from a moment of the flight to the ground: the line of a strewn field.
 *
 * @param release   states at which pieces come off (first break-up, burst, end of the bright flight),
 *                  ITRF axes
 * @param massesKg  of one piece each, at release
 * @param material  density, ablation and drag of the pieces; its mass is not looked at
 * @param settings  with the wind, which moves small pieces by kilometres
 * @returns         pieces that reach the ground with 1 g to 100 kg, or half a gram for rounding of 1 g
 * @throws          FlightError, WindError as `Flight`
 * Accuracy: of shape and wind: spheres fall further than flat stones; ejection sideways is left out
 * (tens of m/s, some hundred metres).
 * Source: dark flight as Ceplecha (1987), Bull. Astron. Inst. Czech. 38, 222 (from memory).
 */
export function strewnField(
  release: readonly EarthFixedState[],
  massesKg: readonly number[],
  material: Body,
  settings: FlightSettings,
): StrewnPiece[] {
  const flight = new Flight(settings);
  const found: StrewnPiece[] = [];
  for (const state of release) {
    for (const massKg of massesKg) {
      flight.begin(state, { ...material, massKg });
      const releaseAltitudeKm = geodeticFromItrf(state.rKm).altitudeKm;
      if (flight.run(WHOLE) !== 'ground') continue;
      if (flight.massKg < LIGHTEST_KG || flight.massKg > HEAVIEST_KG) continue;
      const place = geodeticFromItrf(flight.state().rKm);
      found.push({
        releaseMassKg: massKg,
        releaseAltitudeKm,
        massKg: flight.massKg,
        speedKmS: flight.body.airSpeedKmS,
        latitudeRad: place.latitudeRad,
        longitudeRad: place.longitudeRad,
        seconds: flight.seconds,
      });
    }
  }
  return found;
}

const LIGHTEST_KG = 0.0005;
/** A piece let go at 100 kg below the end of ablation arrives with just that. */
const HEAVIEST_KG = 100 * (1 + 1e-9);

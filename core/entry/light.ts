import { KILOTON_MJ } from './constants';
import type { Deposition } from './deposition';

/** How bright an entry is: light as a share of the energy given to the air. */

/**
 * Share of a bolide's energy that is seen as light, by its energy.
 *
 * @param energyKt total energy, kt
 * @returns        share, below 1
 * Domain: fitted to 13 bolides with an energy known otherwise, 0.1 to some tens of kt; below 0.01 kt
 * the value there.
 * Accuracy: the fit's scatter is a factor of about 1.5; published efficiencies of large bolides run from
 * 0.03 (Ceplecha et al. 1998) to 0.25 (Nemtchinov et al. 1997), from memory.
 * Source: Brown et al. (2002), Nature 420, 294: τ = 0.1212 E_o^0.115 with the optical energy E_o in
 * kt, so that E = 8.2508 E_o^0.885 (from memory).
 */
export function luminousEfficiency(energyKt: number): number {
  const energy = Math.max(energyKt, 0.01);
  const optical = (energy * 0.1212) ** (1 / 0.885);
  return Math.min(1, optical / energy);
}

/** Radiant intensity of magnitude 0 at 100 km, W/sr: a black body of 6000 K in all light. Brown et al. (1996), from memory. */
const ZERO_MAGNITUDE_W_SR = 248;

/**
 * Absolute (100 km) magnitude of a bolide.
 *
 * @param intensityWSr radiant intensity, W/sr, above zero
 * Source: Brown et al. (1996), Meteorit. Planet. Sci. 31, 502: 248 W/sr at magnitude 0 (from memory).
 */
export const absoluteMagnitude = (intensityWSr: number): number =>
  -2.5 * Math.log10(intensityWSr / ZERO_MAGNITUDE_W_SR);

/** Light by altitude, from the ground up. */
export interface LightCurve {
  readonly altitudesKm: Float64Array;
  readonly intensityWSr: Float64Array;
  readonly peakWSr: number;
  readonly peakAltitudeKm: number;
  readonly peakMagnitude: number;
}

/** Largest radiant intensity of an entry, W/sr: its light goes out evenly to all sides. */
export function peakIntensityWSr(deposition: Deposition, efficiency: number): number {
  let peak = 0;
  for (let i = 0; i < deposition.energySpeed.length; i++) {
    peak = Math.max(peak, deposition.energySpeed[i]);
  }
  return intensityWSr(peak, deposition.slabKm, efficiency);
}

const intensityWSr = (energySpeed: number, slabKm: number, efficiency: number): number =>
  (efficiency * 1e6 * energySpeed) / slabKm / (4 * Math.PI);

/**
 * Estimate of the light curve, against altitude.
 *
 * @param deposition energy given to the air; each part is taken as passing a slab with the others
 * @param efficiency share of it that is light: `luminousEfficiency`, or one's own
 * @returns          radiant intensity by altitude, its peak, and the peak's magnitude
 * Accuracy: that of the efficiency, a factor of about 1.5; clouds that lag behind are drawn together.
 */
export function lightCurve(deposition: Deposition, efficiency: number): LightCurve {
  const { slabKm, energySpeed } = deposition;
  const peakWSr = peakIntensityWSr(deposition, efficiency);
  return {
    altitudesKm: energySpeed.map((_, i) => (i + 0.5) * slabKm),
    intensityWSr: energySpeed.map((value) => intensityWSr(value, slabKm, efficiency)),
    peakWSr,
    peakAltitudeKm: deposition.peakAltitudeKm(energySpeed),
    peakMagnitude: absoluteMagnitude(peakWSr),
  };
}

/** Energy given to the air per kilometre of altitude, kt/km, from the ground up. */
export const ktPerKm = (deposition: Deposition): Float64Array =>
  deposition.energyMJ.map((energy) => energy / KILOTON_MJ / deposition.slabKm);

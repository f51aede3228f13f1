import type { Range } from './size';

/** Palermo and Torino scale of an impact, from probability, energy and the time left. */

const JULIAN_YEAR_S = 365.25 * 86400;

/** Impacts a year of at least an energy in Mt (Chesley et al. 2002). */
const backgroundPerYear = (energyMt: number): number => 0.03 * energyMt ** -0.8;

/**
 * Palermo scale, log10 of the probability over that of the background until then.
 *
 * @param probability  of the impact
 * @param energyMt     Mt of TNT
 * @param secondsLeft  until the impact, s
 * @returns null where it is not defined: a probability, an energy or a time that is not above zero
 * Source: Chesley, Chodas, Milani, Valsecchi & Yeomans (2002), Icarus 159, 423:
 * log10(PI / (f_B ΔT)), f_B = 0.03 E^(−0.8) a year.
 */
export function palermo(probability: number, energyMt: number, secondsLeft: number): number | null {
  if (!(probability > 0 && energyMt > 0 && secondsLeft > 0)) return null;
  const value = Math.log10(
    probability / (backgroundPerYear(energyMt) * (secondsLeft / JULIAN_YEAR_S)),
  );
  return Number.isFinite(value) ? value : null;
}

/** Sum over several dates: log10 Σ 10^PS, of those that are defined; null where none is. Source: the same. */
export function cumulativePalermo(values: readonly (number | null)[]): number | null {
  const defined = values.filter((value) => value !== null);
  if (defined.length === 0) return null;
  const most = Math.max(...defined);
  return most + Math.log10(defined.reduce((sum, value) => sum + 10 ** (value - most), 0));
}

/** The Torino scale is defined for impacts within so many years. */
const TORINO_YEARS = 100;
const CERTAIN = 0.99;
const ONE_PERCENT = 0.01;
/** Local, regional and global destruction, Mt: about 20 m, 100 m and 1 km. */
const LOCAL_MT = 1;
const REGIONAL_MT = 100;
const GLOBAL_MT = 1e5;
/** "The next few decades" of the categories 0 and 1, years. */
const FEW_DECADES = 30;

/** Least and most of the categories whose words fit. */
export type TorinoRange = [least: number, most: number];

/**
 * Torino scale, read from the words of its categories.
 *
 * The published diagram parts 0 from 1 and 2, 4 from 5 and 6 from 7 by slanted lines that are not at
 * hand in digits; where the words leave two or three categories open, all of them are given. Our
 * reading: "well below", "about the same as" and more than the chance that an object of the same size
 * hits within the next few decades are below 1 %, 1 to 30 % and above ten times of the background over
 * thirty years (Chesley et al. 2002), with two categories where those meet. The limits 1 Mt, 100 Mt,
 * 1e5 Mt, 1 % and 99 % are from memory.
 *
 * @param probability of the impact
 * @param energyMt    Mt of TNT
 * @param secondsLeft until the impact, s
 * @returns null in the past and more than 100 years ahead
 * Source: Binzel (2000), Planet. Space Sci. 48, 297; words: Morrison et al. (2004).
 */
export function torino(
  probability: number,
  energyMt: number,
  secondsLeft: number,
): TorinoRange | null {
  if (!(secondsLeft > 0 && secondsLeft <= TORINO_YEARS * JULIAN_YEAR_S)) return null;
  if (probability === 0 || energyMt < LOCAL_MT) return [0, 0];
  if (probability >= CERTAIN) {
    if (energyMt < REGIONAL_MT) return [8, 8];
    return energyMt < GLOBAL_MT ? [9, 9] : [10, 10];
  }
  if (probability >= ONE_PERCENT) {
    if (energyMt < REGIONAL_MT) return [3, 3];
    return energyMt < GLOBAL_MT ? [4, 5] : [6, 7];
  }
  const background = backgroundPerYear(energyMt) * FEW_DECADES;
  if (probability < 0.01 * background) return [0, 0];
  if (probability < 0.3 * background) return [0, 1];
  const most = energyMt < GLOBAL_MT ? 2 : 6;
  return probability <= 10 * background ? [1, most] : [2, most];
}

/** For the least, nominal and largest energy. */
export const overRange = <T>(energyMt: Range, of: (energyMt: number) => T): [T, T, T] => [
  of(energyMt[0]),
  of(energyMt[1]),
  of(energyMt[2]),
];

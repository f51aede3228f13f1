/** How big an object may be: diameter, mass and energy with the range that an unknown size gives. */

/** Least, nominal and largest. */
export type Range = [low: number, nominal: number, high: number];

export interface SizeInput {
  absoluteMagnitude?: number | undefined;
  diameterM?: number | undefined;
  albedo?: number | undefined;
  densityKgM3?: number | undefined;
}

export interface Size {
  diameterM: Range;
  densityKgM3: Range;
  massKg: Range;
  /** What was taken for granted, in words; empty where all is given. */
  assumed: string[];
}

/** Geometric albedo where none is given: common practice (0.14 is customary, from memory). */
const ALBEDO: Range = [0.03, 0.14, 0.5];
/** Bulk density where none is given, kg/m³: common practice (2600 is customary, from memory). */
const DENSITY_KG_M3: Range = [1000, 2600, 3500];
/** Diameter of a body of H = 0 and albedo 1, m. */
const DIAMETER_ZERO_M = 1_329_000;
/** One megaton of TNT, J. */
const MEGATON_J = 4.184e15;

/**
 * Diameter and mass of a sphere, with the range that an unknown albedo or density gives.
 *
 * @param input  H in magnitudes, diameter in m, geometric albedo, bulk density in kg/m³; a diameter
 *               given wins over H and albedo
 * @returns null where neither H nor a diameter above zero is known
 * Accuracy: of the formula only; a given value is taken as exact, its own error is not in the range.
 * Source: Fowler & Chillemi (1992); Pravec & Harris (2007): D = 1329 km/√p · 10^(−H/5).
 */
export function sizeOf(input: SizeInput): Size | null {
  const assumed: string[] = [];
  const diameterM = diameterRange(input, assumed);
  if (diameterM === null) return null;
  const densityKgM3 = known(input.densityKgM3) ?? DENSITY_KG_M3;
  if (densityKgM3 === DENSITY_KG_M3) {
    assumed.push('Density 2600 kg/m³, between 1000 and 3500 (common practice).');
  }
  const massKg = zip(diameterM, densityKgM3, (d, rho) => (Math.PI / 6) * rho * d ** 3);
  return { diameterM, densityKgM3, massKg, assumed };
}

/**
 * Kinetic energy in megatons of TNT (4.184e15 J).
 *
 * @param massKg    kg (3)
 * @param speedKmS  at impact, km/s
 */
export const energyMt = (massKg: Range, speedKmS: number): Range =>
  zip(massKg, massKg, (mass) => (0.5 * mass * (speedKmS * 1000) ** 2) / MEGATON_J);

function diameterRange(input: SizeInput, assumed: string[]): Range | null {
  const given = known(input.diameterM);
  if (given !== null) return given;
  if (input.absoluteMagnitude === undefined) return null;
  const scale = DIAMETER_ZERO_M * 10 ** (-input.absoluteMagnitude / 5);
  const albedo = known(input.albedo) ?? ALBEDO;
  if (albedo === ALBEDO) {
    assumed.push('Albedo 0.14, between 0.03 and 0.5 (common practice).');
  }
  // The darker, the bigger.
  return [scale / Math.sqrt(albedo[2]), scale / Math.sqrt(albedo[1]), scale / Math.sqrt(albedo[0])];
}

const known = (value: number | undefined): Range | null =>
  value === undefined || !(value > 0) ? null : [value, value, value];

const zip = (a: Range, b: Range, of: (a: number, b: number) => number): Range => [
  of(a[0], b[0]),
  of(a[1], b[1]),
  of(a[2], b[2]),
];

import {
  AIR_HEAT_RATIO,
  AIR_MOLAR_MASS_KG_KMOL,
  AVOGADRO_PER_KMOL,
  COLLISION_DIAMETER_M,
  GAS_CONSTANT_J_KMOL_K,
  GEOPOTENTIAL_RADIUS_KM,
  STANDARD_GRAVITY_M_S2,
} from './constants';
import { UPPER_ALTITUDES_KM, UPPER_DENSITIES_KG_M3, UPPER_MOLAR_MASSES } from './upper-air-table';

/** U.S. Standard Atmosphere 1976: a mean year at 45° N with moderate solar activity. */

/** Air at an altitude. */
export interface Air {
  /** Kinetic temperature. */
  temperatureK: number;
  pressurePa: number;
  densityKgM3: number;
  /** Up to 86 km; above it, where sound has no meaning for the standard, that of 86 km. */
  soundSpeedKmS: number;
  meanFreePathM: number;
}

/** Above it there is no standard: the density is taken as zero. */
const ATMOSPHERE_TOP_KM = 1000;
/** Here the layers of the lower part end. */
const LAYERS_TOP_KM = 86;

/** Geopotential altitudes at which a layer begins, km, and its slope of temperature, K/km. */
const BASES_KM = Float64Array.of(0, 11, 20, 32, 47, 51, 71);
const SLOPES_K_KM = Float64Array.of(-6.5, 0, 1, 2.8, 0, -2.8, -2);
const SEA_LEVEL_K = 288.15;
const SEA_LEVEL_PA = 101325;
/** g0 M0 / R*, K/km. */
const HYDROSTATIC_K_KM =
  (1000 * STANDARD_GRAVITY_M_S2 * AIR_MOLAR_MASS_KG_KMOL) / GAS_CONSTANT_J_KMOL_K;
const SPECIFIC_GAS_J_KG_K = GAS_CONSTANT_J_KMOL_K / AIR_MOLAR_MASS_KG_KMOL;

const BASE_TEMPERATURES_K = new Float64Array(BASES_KM.length);
const BASE_PRESSURES_PA = new Float64Array(BASES_KM.length);
BASE_TEMPERATURES_K[0] = SEA_LEVEL_K;
BASE_PRESSURES_PA[0] = SEA_LEVEL_PA;
for (let i = 1; i < BASES_KM.length; i++) {
  BASE_TEMPERATURES_K[i] =
    BASE_TEMPERATURES_K[i - 1] + SLOPES_K_KM[i - 1] * (BASES_KM[i] - BASES_KM[i - 1]);
  BASE_PRESSURES_PA[i] = pressureInLayer(i - 1, BASES_KM[i]);
}

/** Ratio of the molar mass to that at sea level from 80 to 86 km, every half kilometre. Table 8. */
const MOLAR_RATIOS_80_86 = Float64Array.of(
  1,
  0.999996,
  0.999989,
  0.999971,
  0.999941,
  0.999909,
  0.99987,
  0.999829,
  0.999786,
  0.999741,
  0.999694,
  0.999641,
  0.999579,
);

const UPPER_LOG_DENSITIES = UPPER_DENSITIES_KG_M3.map(Math.log);
// The layers carry more digits than the table: joined to them, the density has no step at 86 km.
UPPER_LOG_DENSITIES[0] = Math.log(layerDensity(LAYERS_TOP_KM));

function geopotentialKm(altitudeKm: number): number {
  return (GEOPOTENTIAL_RADIUS_KM * altitudeKm) / (GEOPOTENTIAL_RADIUS_KM + altitudeKm);
}

function layerAt(geopotential: number): number {
  let i = BASES_KM.length - 1;
  while (i > 0 && geopotential < BASES_KM[i]) i--;
  return i;
}

function molecularTemperature(layer: number, geopotential: number): number {
  return BASE_TEMPERATURES_K[layer] + SLOPES_K_KM[layer] * (geopotential - BASES_KM[layer]);
}

/** Equations 33a and 33b. */
function pressureInLayer(layer: number, geopotential: number): number {
  const slope = SLOPES_K_KM[layer];
  const base = BASE_TEMPERATURES_K[layer];
  const rise = geopotential - BASES_KM[layer];
  return slope === 0
    ? BASE_PRESSURES_PA[layer] * Math.exp((-HYDROSTATIC_K_KM * rise) / base)
    : BASE_PRESSURES_PA[layer] * (base / (base + slope * rise)) ** (HYDROSTATIC_K_KM / slope);
}

function layerDensity(altitudeKm: number): number {
  const geopotential = geopotentialKm(altitudeKm);
  const layer = layerAt(geopotential);
  const temperature = molecularTemperature(layer, geopotential);
  return pressureInLayer(layer, geopotential) / (SPECIFIC_GAS_J_KG_K * temperature);
}

/** Row of the upper table that begins the interval in which an altitude lies. */
function upperRow(altitudeKm: number): number {
  let low = 0;
  let high = UPPER_ALTITUDES_KM.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (altitudeKm < UPPER_ALTITUDES_KM[middle]) high = middle;
    else low = middle;
  }
  return low;
}

/** Value of a table's column, linear between its rows. */
function upperValue(column: Float64Array, altitudeKm: number): number {
  const row = upperRow(altitudeKm);
  const from = UPPER_ALTITUDES_KM[row];
  const part = (altitudeKm - from) / (UPPER_ALTITUDES_KM[row + 1] - from);
  return column[row] + part * (column[row + 1] - column[row]);
}

/** Kinetic temperature above 86 km. Equations 25, 27, 29 and 31. */
function upperTemperature(altitudeKm: number): number {
  if (altitudeKm <= 91) return 186.8673;
  if (altitudeKm <= 110) {
    const x = (altitudeKm - 91) / 19.9429;
    return 263.1905 - 76.3232 * Math.sqrt(1 - x * x);
  }
  if (altitudeKm <= 120) return 240 + 12 * (altitudeKm - 110);
  const rise =
    ((altitudeKm - 120) * (GEOPOTENTIAL_RADIUS_KM + 120)) / (GEOPOTENTIAL_RADIUS_KM + altitudeKm);
  return 1000 - 640 * Math.exp(-0.01875 * rise);
}

/** Kinetic over molecular-scale temperature up to 86 km. */
function molarRatio(altitudeKm: number): number {
  if (altitudeKm <= 80) return 1;
  const place = Math.min(2 * (altitudeKm - 80), MOLAR_RATIOS_80_86.length - 1.000001);
  const row = Math.floor(place);
  const from = MOLAR_RATIOS_80_86[row];
  return from + (place - row) * (MOLAR_RATIOS_80_86[row + 1] - from);
}

/**
 * Density of the air: the part of `airAt` that a flight asks for all the time.
 *
 * @param altitudeKm geometric altitude, km; below −5 km that of −5 km, above 1000 km none
 * @returns          kg/m³
 * Accuracy: as `airAt`.
 * Source: as `airAt`.
 */
export function airDensityKgM3(altitudeKm: number): number {
  if (altitudeKm <= LAYERS_TOP_KM) return layerDensity(Math.max(altitudeKm, -5));
  if (altitudeKm >= ATMOSPHERE_TOP_KM) return 0;
  return Math.exp(upperValue(UPPER_LOG_DENSITIES, altitudeKm));
}

/**
 * Speed of sound.
 *
 * @param altitudeKm geometric altitude, km; above 86 km the value there
 * @returns          km/s
 * Accuracy: as `airAt`. Source: equation 50.
 */
export function soundSpeedKmS(altitudeKm: number): number {
  const geopotential = geopotentialKm(Math.min(Math.max(altitudeKm, -5), LAYERS_TOP_KM));
  const temperature = molecularTemperature(layerAt(geopotential), geopotential);
  return Math.sqrt(AIR_HEAT_RATIO * SPECIFIC_GAS_J_KG_K * temperature) / 1000;
}

/**
 * Mean free path of the air's molecules.
 *
 * @param densityKgM3   density, kg/m³, above zero
 * @param molarKgKmol   mean molar mass, kg/kmol
 * @returns             m
 * Source: U.S. Standard Atmosphere 1976, equations 42 and 43.
 */
const freePath = (densityKgM3: number, molarKgKmol: number): number =>
  molarKgKmol /
  (Math.SQRT2 * Math.PI * COLLISION_DIAMETER_M ** 2 * AVOGADRO_PER_KMOL * densityKgM3);

/** Mean free path at an altitude, m; the density there (kg/m³) is handed in. */
export function meanFreePathM(altitudeKm: number, densityKgM3: number): number {
  if (altitudeKm <= LAYERS_TOP_KM) return freePath(densityKgM3, AIR_MOLAR_MASS_KG_KMOL);
  if (altitudeKm >= ATMOSPHERE_TOP_KM) return Number.POSITIVE_INFINITY;
  return freePath(densityKgM3, upperValue(UPPER_MOLAR_MASSES, altitudeKm));
}

/**
 * Temperature, pressure, density, speed of sound and mean free path at an altitude.
 *
 * @param altitudeKm geometric altitude, km; below −5 km the air of −5 km, above 1000 km none
 * @returns          air of the standard
 * Accuracy: the standard's own digits to 86 km; above it the table's four digits at its rows, and
 * between them density within 2.5 % (at 112 km; 0.4 % elsewhere below 110 km) of a quartic fit.
 * Source: U.S. Standard Atmosphere 1976 (NOAA, NASA, USAF), defining layers to 86 km and table I
 * above them, interpolated in the logarithm of the density.
 */
export function airAt(altitudeKm: number): Air {
  const densityKgM3 = airDensityKgM3(altitudeKm);
  const soundKmS = soundSpeedKmS(altitudeKm);
  const meanFreePath = meanFreePathM(altitudeKm, densityKgM3);
  if (altitudeKm <= LAYERS_TOP_KM) {
    const geopotential = geopotentialKm(Math.max(altitudeKm, -5));
    const layer = layerAt(geopotential);
    return {
      temperatureK: molecularTemperature(layer, geopotential) * molarRatio(altitudeKm),
      pressurePa: pressureInLayer(layer, geopotential),
      densityKgM3,
      soundSpeedKmS: soundKmS,
      meanFreePathM: meanFreePath,
    };
  }
  const temperatureK = upperTemperature(Math.min(altitudeKm, ATMOSPHERE_TOP_KM));
  const molar = upperValue(UPPER_MOLAR_MASSES, Math.min(altitudeKm, ATMOSPHERE_TOP_KM));
  return {
    temperatureK,
    pressurePa: (densityKgM3 * GAS_CONSTANT_J_KMOL_K * temperatureK) / molar,
    densityKgM3,
    soundSpeedKmS: soundKmS,
    meanFreePathM: meanFreePath,
  };
}

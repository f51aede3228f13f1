/** Drag and ablation by regime: rarefied to continuum by Knudsen number, subsonic to hypersonic by Mach. */

/** Drag coefficient of a body in free-molecular flow at hypersonic speed. Schaaf & Chambré (1961). */
const FREE_MOLECULAR = 2;
/** Beyond it the flow is free-molecular, below it continuum. Wilmoth, Mitcheltree & Moss (1999). */
const KNUDSEN_FREE = 10;
const KNUDSEN_CONTINUUM = 1e-3;

/** Mach numbers and the drag there relative to the hypersonic value. Ceplecha (1987), from memory. */
const MACHS = Float64Array.of(0.2, 0.4, 0.6, 0.8, 1, 2, 3, 4);
const MACH_FACTORS = Float64Array.of(
  0.33 / 0.58,
  0.35 / 0.58,
  0.39 / 0.58,
  0.44 / 0.58,
  0.5 / 0.58,
  0.63 / 0.58,
  0.62 / 0.58,
  1,
);

/** Above it the drag no longer depends on the Mach number. */
export const HYPERSONIC_MACH = 4;

/** Below it a body no longer ablates, km/s. Ceplecha et al. (1998): 3 km/s, end of the bright flight. */
const ABLATION_END_KM_S = 3;

/**
 * Drag relative to the hypersonic continuum, by Mach number.
 *
 * @param mach Mach number, zero or above
 * @returns    factor, linear between the table's rows; 1 from Mach 4 on
 * Accuracy: of the table, made for meteorite shapes: some 20 % from one shape to another.
 * Source: Ceplecha (1987), Bull. Astron. Inst. Czech. 38, 222 (Γ by Mach number; from memory).
 */
export function machFactor(mach: number): number {
  if (mach >= HYPERSONIC_MACH) return 1;
  if (mach <= MACHS[0]) return MACH_FACTORS[0];
  let i = 0;
  while (mach > MACHS[i + 1]) i++;
  const part = (mach - MACHS[i]) / (MACHS[i + 1] - MACHS[i]);
  return MACH_FACTORS[i] + part * (MACH_FACTORS[i + 1] - MACH_FACTORS[i]);
}

/**
 * Drag coefficient between continuum and free-molecular flow.
 *
 * @param continuum coefficient in the continuum (force = ½ ρ v² C_D A)
 * @param knudsen   mean free path over diameter
 * @returns         coefficient, between `continuum` and 2
 * Source: sine-squared bridging of Wilmoth, Mitcheltree & Moss (1999), J. Spacecraft Rockets 36, 436
 * (φ = π (3 + log10 Kn) / 8, from memory).
 */
export function bridgedDrag(continuum: number, knudsen: number): number {
  if (knudsen <= KNUDSEN_CONTINUUM) return continuum;
  if (knudsen >= KNUDSEN_FREE) return FREE_MOLECULAR;
  const sine = Math.sin((Math.PI / 8) * (3 + Math.log10(knudsen)));
  return continuum + (FREE_MOLECULAR - continuum) * sine * sine;
}

/**
 * Share of the ablation coefficient that acts at a speed: 1 − (3 km/s ÷ v)², none below 3 km/s.
 *
 * @param speedKmS relative to the air, km/s
 * Source: Bronshten (1983), Physics of Meteoric Phenomena (critical speed; from memory).
 */
export function ablationShare(speedKmS: number): number {
  if (speedKmS <= ABLATION_END_KM_S) return 0;
  const ratio = ABLATION_END_KM_S / speedKmS;
  return 1 - ratio * ratio;
}

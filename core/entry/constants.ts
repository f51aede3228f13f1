/** Physical constants of flight through the air: value, unit in the name, source in the comment. */

/** Standard gravity, m/s². U.S. Standard Atmosphere 1976 (exact there). */
export const STANDARD_GRAVITY_M_S2 = 9.80665;

/** Gas constant, J/(kmol K). U.S. Standard Atmosphere 1976: that edition's value, not today's. */
export const GAS_CONSTANT_J_KMOL_K = 8314.32;

/** Mean molar mass of air at sea level, kg/kmol. U.S. Standard Atmosphere 1976. */
export const AIR_MOLAR_MASS_KG_KMOL = 28.9644;

/** Ratio of specific heats of air. U.S. Standard Atmosphere 1976. */
export const AIR_HEAT_RATIO = 1.4;

/** Avogadro's number, 1/kmol. U.S. Standard Atmosphere 1976. */
export const AVOGADRO_PER_KMOL = 6.022169e26;

/** Effective collision diameter of air's molecules, m. U.S. Standard Atmosphere 1976. */
export const COLLISION_DIAMETER_M = 3.65e-10;

/** Radius that turns geometric into geopotential altitude, km. U.S. Standard Atmosphere 1976. */
export const GEOPOTENTIAL_RADIUS_KM = 6356.766;

/** Energy of a kiloton, in MJ (kg km²/s²): 4.184e12 J by convention. */
export const KILOTON_MJ = 4.184e6;

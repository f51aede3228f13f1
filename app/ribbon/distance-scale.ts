/** Between distance and height in the ribbon, 0 at its foot and 1 at its top; logarithmic. */
export interface DistanceScale {
  readonly lowestKm: number;
  readonly highestKm: number;
  /** Height of a distance; not clamped. */
  unitAt(km: number): number;
}

/** The foot of every ribbon: below the Earth's radius, so that the ground has a line of its own. */
const FOOT_KM = 5000;
/** Room above the largest distance. */
const HEADROOM = 1.6;

/** @param largestKm the largest distance that is drawn */
export function ribbonDistanceScale(largestKm: number): DistanceScale {
  const highestKm = Math.max(largestKm, 10 * FOOT_KM) * HEADROOM;
  const decades = Math.log(highestKm / FOOT_KM);
  return {
    lowestKm: FOOT_KM,
    highestKm,
    unitAt: (km) => Math.log(Math.max(km, 1) / FOOT_KM) / decades,
  };
}

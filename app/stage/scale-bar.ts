import { grouped, withUnit } from '../desk/figures';
import { AU_KM, EARTH_RADIUS_KM } from '../worker/core-values';

/** A bar of a round length. */

interface ScaleBar {
  readonly lengthPx: number;
  readonly lengthKm: number;
  readonly text: string;
  /** The same length in Earth radii, where that helps. */
  readonly radii: string | null;
}

const IN_AU_FROM_KM = 0.02 * AU_KM;
const RADII_FROM_KM = 0.2 * EARTH_RADIUS_KM;
const RADII_TO_KM = 200 * EARTH_RADIUS_KM;

/** The greatest of 1, 2, 5 times a power of ten that is not above a value. */
export function roundDown(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value));
  const lead = value / power;
  // A lead of 5 or 2 less a rounding error still counts.
  const step = [5, 2, 1].find((each) => lead >= each * (1 - 1e-12)) ?? 1;
  return step * power;
}

/**
 * The longest round bar that fits.
 *
 * @param kmPerPx  at the target
 * @param mostPx   room for it
 */
export function scaleBar(kmPerPx: number, mostPx: number): ScaleBar {
  const mostKm = kmPerPx * mostPx;
  const inAu = mostKm >= IN_AU_FROM_KM;
  const unitKm = inAu ? AU_KM : 1;
  const length = roundDown(mostKm / unitKm);
  const lengthKm = length * unitKm;
  const decimals = Math.max(0, -Math.floor(Math.log10(length) + 1e-9));
  const radii = lengthKm / EARTH_RADIUS_KM;
  return {
    lengthPx: lengthKm / kmPerPx,
    lengthKm,
    text: withUnit(grouped(length, decimals), inAu ? 'au' : 'km'),
    radii:
      lengthKm >= RADII_FROM_KM && lengthKm <= RADII_TO_KM
        ? withUnit(radii < 10 ? radii.toFixed(1) : radii.toFixed(0), 'Earth radii')
        : null,
  };
}

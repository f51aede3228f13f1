import { clopperPearson } from '../math/beta';

/** One method's answer beside the others', and which to go by. */

export interface PlainCount {
  /** Clones carried, and those of them that hit. */
  count: number;
  impacts: number;
}

export interface RareValue {
  value: number;
  /** 1 σ; null where no impact was found. */
  relativeError: number | null;
}

export type Method = 'first-order' | 'ensemble' | 'rare-event';

export interface Adopted {
  value: number;
  /** 95 %, of the sampling. */
  range95: [number, number];
  from: Method;
  /** Whether the other methods' answers are compatible with it; null where there is nothing to compare. */
  firstOrderAgrees: boolean | null;
  ensembleAgrees: boolean | null;
}

const CONFIDENCE = 0.95;
const Z95 = 1.959963984540054;
/** The first order is called in agreement within this factor of the adopted range. */
const FIRST_ORDER_FACTOR = 1.25;
/** Probabilities below this are nothing, whoever gives them. */
const NOTHING = 1e-10;

export const intervalOf = ({ impacts, count }: PlainCount): [number, number] =>
  clopperPearson(impacts, count, CONFIDENCE);

/**
 * The estimate to go by: the rare-event estimate where it was made, since plain sampling saw too few
 * impacts; else the ensemble; else the first order.
 *
 * @param firstOrder null where there is no target plane
 * @param plain      null where no clones were carried
 * @param rare       null where enough clones hit for the ensemble to be the better
 */
export function adopt(
  firstOrder: number | null,
  plain: PlainCount | null,
  rare: RareValue | null,
): Adopted | null {
  const interval = plain === null || plain.count === 0 ? null : intervalOf(plain);
  const settled = settle(firstOrder, plain, interval, rare);
  if (settled === null) return null;
  const [low, high] = settled.range95;
  return {
    ...settled,
    firstOrderAgrees:
      firstOrder === null || settled.from === 'first-order'
        ? null
        : settled.value === 0
          ? firstOrder < NOTHING
          : firstOrder >= low / FIRST_ORDER_FACTOR && firstOrder <= high * FIRST_ORDER_FACTOR,
    ensembleAgrees:
      interval === null || settled.from !== 'rare-event'
        ? null
        : high >= interval[0] && low <= interval[1],
  };
}

function settle(
  firstOrder: number | null,
  plain: PlainCount | null,
  interval: [number, number] | null,
  rare: RareValue | null,
): Pick<Adopted, 'value' | 'range95' | 'from'> | null {
  // Hits that the search did not lead to are hits all the same.
  if (rare !== null && (rare.value > 0 || plain === null || plain.impacts === 0)) {
    const spread = Math.exp(Z95 * (rare.relativeError ?? 0));
    // Where nothing was found, what the plain clones leave open is all that sampling says.
    const range95: [number, number] =
      rare.value === 0
        ? [0, interval === null ? 1 : interval[1]]
        : [rare.value / spread, Math.min(1, rare.value * spread)];
    return { value: rare.value, range95, from: 'rare-event' };
  }
  if (plain !== null && interval !== null) {
    return { value: plain.impacts / plain.count, range95: interval, from: 'ensemble' };
  }
  if (firstOrder === null) return null;
  return { value: firstOrder, range95: [firstOrder, firstOrder], from: 'first-order' };
}

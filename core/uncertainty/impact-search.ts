import { type CarriedClone, type Carrier, impactOf, SAME_PASS_S } from './clone-passes';
import { distance2, gaussian, identity } from './gaussian-mixture';
import { findRegion, type ImpactRegion, type RegionStart, stretchingAt } from './impact-region';
import { type LineScan, type LineStart, nearestOnLine } from './line-of-variations';

/** Where to look for impacting regions, and which of those found are the same. */

/** Places followed in any case, and at most. */
const SOME_STARTS = 24;
const MOST_STARTS = 120;
/** Places that promise together less than this share of all may be left out. */
const LEFT_OUT = 0.05;
/** Dates at which plain clones are followed where the lines led to no impact, and clones of each. */
const MOST_DATES = 8;
const CLONES_OF_DATE = 6;
/** Starts looked at together: a fixed number, so that the result depends on no machine. */
const TOGETHER = 4;
/** Regions of one date whose centres lie this near are one, in squared Mahalanobis distance. */
const SAME_REGION = 2;

/** Impacting regions, from the nearest passes along the lines; each once. */
export async function findRegions(
  carrier: Carrier,
  scans: readonly LineScan[],
  plain: readonly CarriedClone[],
  stopped: () => boolean,
): Promise<{ regions: ImpactRegion[]; isComplete: boolean }> {
  const regions: ImpactRegion[] = [];
  const follow = async (starts: readonly RegionStart[]): Promise<void> => {
    const found = await Promise.all(starts.map((start) => findRegion(carrier, start)));
    for (const region of found) if (region !== null) addRegion(regions, region);
  };
  const starts = scans.flatMap(nearestOnLine).sort((a, b) => b.promise - a.promise);
  const all = promised(starts);
  let at = 0;
  const isLeft = (): boolean => promised(starts.slice(at)) > LEFT_OUT * all;
  while (at < starts.length && (at < SOME_STARTS || (at < MOST_STARTS && isLeft())) && !stopped()) {
    await follow(starts.slice(at, at + TOGETHER));
    at += TOGETHER;
  }
  const led = [...regions];
  for (const { z, tdbSeconds } of nearestOfDates(plain)) {
    if (stopped()) break;
    if (led.some((region) => isSameDate(region.tdbSeconds, tdbSeconds))) continue;
    const start = await stretchingAt(carrier, z, tdbSeconds);
    if (start !== null) await follow([start]);
  }
  return { regions, isComplete: !isLeft() };
}

const promised = (starts: readonly LineStart[]): number =>
  starts.reduce((sum, { promise }) => sum + promise, 0);

/** The clones that pass nearest, some of each date, nearest dates first. */
function nearestOfDates(
  clones: readonly CarriedClone[],
): { z: Float64Array; tdbSeconds: number }[] {
  const passes = clones
    .flatMap(({ z, passes: own }) =>
      own.map(({ tdbSeconds, distanceKm }) => ({ z, tdbSeconds, distanceKm })),
    )
    .sort((a, b) => a.distanceKm - b.distanceKm);
  const dates: { tdbSeconds: number; clones: { z: Float64Array; tdbSeconds: number }[] }[] = [];
  for (const pass of passes) {
    const date = dates.find(({ tdbSeconds }) => isSameDate(tdbSeconds, pass.tdbSeconds));
    if (date === undefined) dates.push({ tdbSeconds: pass.tdbSeconds, clones: [pass] });
    else if (date.clones.length < CLONES_OF_DATE) date.clones.push(pass);
  }
  return dates.slice(0, MOST_DATES).flatMap((date) => date.clones);
}

function addRegion(regions: ImpactRegion[], region: ImpactRegion): void {
  const isKnown = regions.some(
    (known) =>
      isSameDate(known.tdbSeconds, region.tdbSeconds) &&
      Math.min(distance2(known.hits, region.hits.mean), distance2(region.hits, known.hits.mean)) <
        SAME_REGION,
  );
  if (!isKnown) regions.push(region);
}

const isSameDate = (a: number, b: number): boolean => Math.abs(a - b) < SAME_PASS_S;

/** Whether a hit lies where a region expects its own: within about 5 σ of the squared distance. */
export const isOf = ({ hits }: ImpactRegion, z: Float64Array): boolean =>
  distance2(hits, z) < z.length + 5 * Math.sqrt(2 * z.length);

/** Sees to it that a clone that hit lies in a region. */
export async function cover(
  carrier: Carrier,
  regions: ImpactRegion[],
  clone: CarriedClone,
): Promise<void> {
  const { z } = clone;
  const tdbSeconds = impactOf(clone)?.tdbSeconds ?? 0;
  if (regions.some((region) => isOf(region, z))) return;
  const start: RegionStart | null = await stretchingAt(carrier, z, tdbSeconds);
  const found = start === null ? null : await findRegion(carrier, start);
  if (found !== null) addRegion(regions, found);
  if (found !== null && isOf(found, z)) return;
  // Curved: the map about the region's middle does not reach here.
  const d = z.length;
  const near = regions.reduce<ImpactRegion | null>(
    (best, one) => (best === null || distance2(one.hits, z) < distance2(best.hits, z) ? one : best),
    null,
  );
  const covariance = near?.hits.covariance ?? identity(d).map((value) => value * 0.25);
  const probability = near === null ? 0 : near.probability / 4;
  regions.push({ tdbSeconds, hits: gaussian(z, covariance), probability });
}

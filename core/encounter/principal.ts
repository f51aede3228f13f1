import type { ApproachRecord } from './approach';

/** The approach the briefing is about: an impact, else the nearest pass of the Earth, else of any. */
export function principalOf(records: readonly ApproachRecord[]): number | null {
  const nearest = (wanted: (record: ApproachRecord) => boolean): number | null => {
    let best: number | null = null;
    for (const [i, record] of records.entries()) {
      if (!wanted(record)) continue;
      if (best === null || record.distanceKm < records[best].distanceKm) best = i;
    }
    return best;
  };
  return (
    nearest((record) => record.outcome === 'impact') ??
    nearest((record) => record.body === 'Earth') ??
    nearest(() => true)
  );
}

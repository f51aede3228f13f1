import { corridorSection, type ReportCorridor } from '../../../core/report/corridor';
import { corridorOf } from '../../../core/uncertainty/corridor';
import { type StripShape, stripRows } from '../uncertainty/corridor-strip';

/** Invented corridors of known shape. */

export const RADIUS_KM = 6371.0088;

export function sampleCorridor(changes: Partial<StripShape> = {}): ReportCorridor {
  const shape: StripShape = {
    poleLatitudeRad: 0.6,
    poleLongitudeRad: 1,
    fromRad: 0,
    extentRad: 1,
    sigmaRad: 30 / RADIUS_KM,
    count: 400,
    seed: 7,
    tdbSeconds: 1e9,
    durationS: 900,
    ...changes,
  };
  const corridor = corridorOf(
    stripRows(shape),
    new Float64Array(shape.count).fill(1e-4 / shape.count),
  );
  if (corridor === null) throw new Error('no corridor');
  return corridorSection(corridor);
}

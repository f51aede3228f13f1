import * as v from 'valibot';
import { jdFromTdbSeconds } from '../time/convert';
import { formatIso } from '../time/format';
import type { AxisPoint, Corridor, CorridorCell, Spread } from '../uncertainty/corridor';

/** The ground corridor in the report's form: degrees, UTC. */

const finite = v.pipe(v.number(), v.finite());
const number = (description: string) => v.pipe(finite, v.description(description));
const count = v.pipe(v.number(), v.integer(), v.minValue(0));
const spread = (description: string) =>
  v.pipe(v.tuple([finite, finite, finite]), v.description(`${description} 5, 50 and 95 %.`));
const instant = v.object({
  jdTdb: number('Julian date, TDB.'),
  tdbSeconds: number('The same instant in full precision: TDB seconds past J2000.'),
  utc: v.string(),
});
const ranges = {
  airSpeedKmS: spread('At the entry interface, against air that turns with the Earth.'),
  airFlightPathAngleDeg: spread('At the entry interface, against the air; negative going down.'),
};

const cell = v.object({
  latitudeDeg: number('Of the centre; geodetic, WGS 84.'),
  longitudeDeg: number('Of the centre; east.'),
  boundsDeg: v.pipe(
    v.tuple([finite, finite, finite, finite]),
    v.description('West, south, east, north: no cell lies across the antimeridian.'),
  ),
  probability: number('That it comes down here.'),
  densityPerKm2: number('The probability over the area of the cell, WGS 84.'),
  within: number('Share of the probability in the cells that are at least as dense.'),
});

const axisPoint = v.object({
  latitudeDeg: finite,
  longitudeDeg: number('East, from −180 to 180.'),
  entry: instant,
  halfWidthKm: number('Across the axis, 1 σ.'),
  ...ranges,
});

export const corridorSchema = v.object({
  note: v.pipe(v.string(), v.description('What is shown, how it was made, and the caution.')),
  probability: number('That it enters the air: the sum over the corridor.'),
  grazingProbability: number('Part of it that does not reach the ground in flight without air.'),
  clones: v.pipe(count, v.description('Impacting clones that it was made from.')),
  effectiveClones: number('Effective sample size, Kish 1965.'),
  cellKm: number('Height of the cells.'),
  kernelKm: number('Standard deviation of the kernel that the clones are spread with.'),
  firstEntry: instant,
  medianEntry: instant,
  lastEntry: instant,
  ...ranges,
  pieces: v.pipe(
    v.array(
      v.object({
        probability: finite,
        lengthKm: number('Along the axis.'),
        axis: v.array(axisPoint),
      }),
    ),
    v.description('Connected strips, the likeliest first; each axis in the order of entry.'),
  ),
  cells: v.pipe(v.array(cell), v.description('The densest first.')),
});

export type ReportCorridor = v.InferOutput<typeof corridorSchema>;
type Instant = v.InferOutput<typeof instant>;

const NOTE =
  'Where the clones that hit would meet the ground in flight without air; those that only graze the air count where they enter it. This is an analysis of one orbit solution, not a warning; public warnings and protective action belong to the responsible civil-protection authority.';

const degrees = (radians: number): number => (radians * 180) / Math.PI;
const spreadDegrees = ([low, middle, high]: Spread): [number, number, number] => [
  degrees(low),
  degrees(middle),
  degrees(high),
];
const instantOf = (tdbSeconds: number): Instant => ({
  jdTdb: jdFromTdbSeconds(tdbSeconds),
  tdbSeconds,
  utc: formatIso(tdbSeconds, 'UTC', 0),
});

/** The corridor of the clones as the report has it. */
export function corridorSection(corridor: Corridor): ReportCorridor {
  return {
    note: NOTE,
    probability: corridor.probability,
    grazingProbability: corridor.grazingProbability,
    clones: corridor.rows,
    effectiveClones: corridor.effectiveRows,
    cellKm: corridor.cellKm,
    kernelKm: corridor.kernelKm,
    firstEntry: instantOf(corridor.firstEntryTdbSeconds),
    medianEntry: instantOf(corridor.medianEntryTdbSeconds),
    lastEntry: instantOf(corridor.lastEntryTdbSeconds),
    airSpeedKmS: [...corridor.entryAirSpeedKmS],
    airFlightPathAngleDeg: spreadDegrees(corridor.entryAngleRad),
    pieces: corridor.pieces.map(({ probability, lengthKm, axis }) => ({
      probability,
      lengthKm,
      axis: axis.map(axisPointOf),
    })),
    cells: corridor.cells.map(cellOf),
  };
}

function axisPointOf(point: AxisPoint): ReportCorridor['pieces'][number]['axis'][number] {
  return {
    latitudeDeg: degrees(point.latitudeRad),
    longitudeDeg: degrees(point.longitudeRad),
    entry: instantOf(point.entryTdbSeconds),
    halfWidthKm: point.halfWidthKm,
    airSpeedKmS: [...point.entryAirSpeedKmS],
    airFlightPathAngleDeg: spreadDegrees(point.entryAngleRad),
  };
}

function cellOf(cell: CorridorCell): ReportCorridor['cells'][number] {
  const bounds = [cell.westRad, cell.southRad, cell.eastRad, cell.northRad].map(degrees);
  const [west, south, east, north] = bounds;
  return {
    latitudeDeg: (south + north) / 2,
    longitudeDeg: (west + east) / 2,
    boundsDeg: [west, south, east, north],
    probability: cell.probability,
    densityPerKm2: cell.probability / cell.areaKm2,
    within: cell.within,
  };
}

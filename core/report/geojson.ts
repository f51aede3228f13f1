import type { ReportCorridor } from './corridor';
import type { Report } from './report';

type Position = [number, number];
type Geometry =
  | { type: 'Point'; coordinates: Position }
  | { type: 'Polygon'; coordinates: Position[][] }
  | { type: 'LineString'; coordinates: Position[] }
  | { type: 'MultiLineString'; coordinates: Position[][] };
interface Feature {
  type: 'Feature';
  geometry: Geometry;
  properties: Record<string, unknown>;
}
type AxisPoint = ReportCorridor['pieces'][number]['axis'][number];

/** Ten centimetres on the ground: more digits would say more than is known (RFC 7946, 11.2). */
const DECIMALS = 6;
/** Parallels are cut so finely that a great circle between two points stays near them, degrees. */
const PARALLEL_STEP_DEG = 5;
/** The axis likewise: a straight line in longitude and latitude stays near the great circle. */
const AXIS_STEP_RAD = 0.02;
/** Near a pole, steps are halved until they turn by no more than this, or are half a kilometre. */
const TURN_STEP_DEG = 5;
const POLAR_STEP_RAD = 1e-4;
const POLAR_TURN_DEG = 60;

/**
 * The ground corridor as GeoJSON: a FeatureCollection of cells, axes, and the nominal's own points.
 *
 * @param report with a corridor; without one the collection has only what the nominal orbit meets
 * @returns      text; longitudes within ±180, rings by the right-hand rule, nothing across the
 *               antimeridian: the cells end there, and axes are cut there. Units stand in the names of
 *               the properties, which say of every feature what it belongs to and the cautions
 * Source: RFC 7946 (Butler et al. 2016), 3.1.6 winding, 3.1.9 cutting, 4 axes and order.
 */
export function corridorGeoJson(
  report: Pick<Report, 'case' | 'approaches' | 'principal' | 'cautions' | 'fingerprint'> & {
    corridor?: ReportCorridor | undefined;
  },
): string {
  const { corridor } = report;
  const common = {
    object: report.case.name,
    invented: report.case.invented,
    fingerprint: report.fingerprint,
    caution: [...report.cautions, ...(corridor === undefined ? [] : [corridor.note])].join(' '),
  };
  const features = [
    ...(corridor === undefined ? [] : corridor.pieces.map(axisFeature)),
    ...nominalFeatures(report),
    ...(corridor === undefined ? [] : corridor.cells.map(cellFeature)),
  ];
  const withCommon = features.map((feature) => ({
    ...feature,
    properties: { ...feature.properties, ...common },
  }));
  return `${JSON.stringify({ type: 'FeatureCollection', features: withCommon })}\n`;
}

const rounded = (value: number): number => Number(value.toFixed(DECIMALS));

function cellFeature(cell: ReportCorridor['cells'][number]): Feature {
  const [west, south, east, north] = cell.boundsDeg;
  const steps = Math.max(1, Math.ceil((east - west) / PARALLEL_STEP_DEG));
  const parallel = (latitude: number): Position[] =>
    Array.from({ length: steps + 1 }, (_, i) => [
      rounded(i === steps ? east : west + ((east - west) * i) / steps),
      rounded(latitude),
    ]);
  // Eastward along the south, westward along the north: counterclockwise. A ring that has a pole
  // keeps both corners there, which RFC 7946's plane of longitude and latitude needs.
  const ring = [...parallel(south), ...parallel(north).reverse()];
  ring.push(ring[0]);
  return {
    type: 'Feature',
    geometry: { type: 'Polygon', coordinates: [ring] },
    properties: {
      kind: 'density',
      probability: cell.probability,
      densityPerKm2: cell.densityPerKm2,
      within: cell.within,
    },
  };
}

function axisFeature(piece: ReportCorridor['pieces'][number]): Feature {
  const { axis } = piece;
  const column = <T>(of: (point: AxisPoint) => T): T[] => axis.map(of);
  return {
    type: 'Feature',
    geometry: lineOf(axis.map((point) => [point.longitudeDeg, point.latitudeDeg])),
    properties: {
      kind: 'axis',
      probability: piece.probability,
      lengthKm: piece.lengthKm,
      pointsDeg: column((point) => [rounded(point.longitudeDeg), rounded(point.latitudeDeg)]),
      entryUtc: column((point) => point.entry.utc),
      entryTdbSeconds: column((point) => point.entry.tdbSeconds),
      halfWidthKm: column((point) => point.halfWidthKm),
      airSpeedKmS: column((point) => point.airSpeedKmS),
      airFlightPathAngleDeg: column((point) => point.airFlightPathAngleDeg),
    },
  };
}

function nominalFeatures({
  approaches,
  principal,
}: Pick<Report, 'approaches' | 'principal'>): Feature[] {
  const main = principal === null ? null : approaches[principal];
  if (main === null || main.body !== 'Earth') return [];
  const { entry, surfaceImpact } = main;
  const point = (kind: string, at: NonNullable<typeof surfaceImpact | typeof entry>): Feature => ({
    type: 'Feature',
    geometry: { type: 'Point', coordinates: [rounded(at.longitudeDeg), rounded(at.latitudeDeg)] },
    properties: {
      kind,
      utc: at.utc,
      tdbSeconds: at.tdbSeconds,
      speedKmS: at.speedKmS,
      flightPathAngleDeg: at.flightPathAngleDeg,
    },
  });
  return [
    ...(entry === undefined ? [] : [point('nominal-entry', entry)]),
    ...(surfaceImpact === undefined ? [] : [point('nominal-ground', surfaceImpact)]),
  ];
}

/** A line along great circles through points, cut at the antimeridian; a point from one point. */
function lineOf(points: readonly Position[]): Geometry {
  if (points.length === 1) {
    return { type: 'Point', coordinates: [rounded(points[0][0]), rounded(points[0][1])] };
  }
  const dense = points.flatMap((point, i) => (i === 0 ? [point] : between(points[i - 1], point)));
  const lines: Position[][] = [[dense[0]]];
  for (let i = 1; i < dense.length; i++) {
    const before = dense[i - 1];
    const here = dense[i];
    const line = lines[lines.length - 1];
    if (Math.abs(turnOf(before, here)) > POLAR_TURN_DEG) {
      // Over a pole: up one meridian and down another.
      const pole = here[1] > 0 ? 90 : -90;
      line.push([before[0], pole]);
      lines.push([[here[0], pole], here]);
    } else if (Math.abs(here[0] - before[0]) > 180) {
      const turn = turnOf(before, here);
      const side = turn < 0 ? -180 : 180;
      const part = turn === 0 ? 0 : (side - before[0]) / turn;
      const latitude = before[1] + part * (here[1] - before[1]);
      line.push([side, latitude]);
      lines.push([[-side, latitude], here]);
    } else line.push(here);
  }
  const cut = lines.map(thinned).filter((line) => line.length > 1);
  if (cut.length === 0) return lineOf([points[0]]);
  return cut.length === 1
    ? { type: 'LineString', coordinates: cut[0] }
    : { type: 'MultiLineString', coordinates: cut };
}

/** The shorter way about, degrees, [−180, 180). */
const turnOf = (from: Position, to: Position): number =>
  ((((to[0] - from[0] + 180) % 360) + 360) % 360) - 180;

/** Rounded, and without points that then repeat the one before. */
function thinned(line: readonly Position[]): Position[] {
  const round = line.map(([x, y]): Position => [rounded(x), rounded(y)]);
  return round.filter(([x, y], i) => i === 0 || x !== round[i - 1][0] || y !== round[i - 1][1]);
}

/** Points on the great circle from one place to another, without the first. */
function between(from: Position, to: Position): Position[] {
  const a = vectorOf(from);
  const b = vectorOf(to);
  const chord = Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
  const isSwift = Math.abs(turnOf(from, to)) > TURN_STEP_DEG && chord > POLAR_STEP_RAD;
  if (chord <= AXIS_STEP_RAD && !isSwift) return [to];
  const [x, y, z] = [a[0] + b[0], a[1] + b[1], a[2] + b[2]];
  const middle: Position = [
    (Math.atan2(y, x) * 180) / Math.PI,
    (Math.atan2(z, Math.hypot(x, y)) * 180) / Math.PI,
  ];
  return [...between(from, middle), ...between(middle, to)];
}

function vectorOf([longitudeDeg, latitudeDeg]: Position): [number, number, number] {
  const longitude = (longitudeDeg * Math.PI) / 180;
  const latitude = (latitudeDeg * Math.PI) / 180;
  return [
    Math.cos(latitude) * Math.cos(longitude),
    Math.cos(latitude) * Math.sin(longitude),
    Math.sin(latitude),
  ];
}

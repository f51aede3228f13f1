import { geoDistance, geoInterpolate } from 'd3-geo';
import type { MultiLineString, MultiPolygon, Position } from 'geojson';
import type { ReportCorridor } from '../../core/report/corridor';
import { grouped, withUnit } from '../desk/figures';
import { formatIso } from '../worker/core-values';
import { outlineOf } from './corridor-outline';
import type { LonLat } from './ground-track';

/** What the maps draw of the ground corridor. */
export interface CorridorShapes {
  /** Densest first; each the cells up to a share of the probability. */
  bands: { within: number; shape: MultiPolygon }[];
  half: MultiLineString;
  most: MultiLineString;
  axes: MultiLineString;
  ticks: { at: LonLat; onward: LonLat; words: string }[];
  ends: { at: LonLat; words: string }[];
  /** The circle that holds 95 % of the probability. */
  centre: LonLat;
  radiusDeg: number;
}

type Piece = ReportCorridor['pieces'][number];
type AxisPoint = Piece['axis'][number];

const BANDS = [0.25, 0.5, 0.75, 0.95, 1];
const HALF = 0.5;
const MOST = 0.95;
/** Strips less likely than this part of the likeliest are drawn without words. */
const NAMED_SHARE = 0.1;
/** A great circle over so much of a parallel leaves it by less than 0.01° at any latitude. */
const PARALLEL_STEP_DEG = 2;
const TICKS_ALONG = 6;
/** Steps of time that a clock has, s. */
const STEPS_S = [1, 2, 5, 10, 15, 30, 60, 120, 300, 600, 900, 1800, 3600, 7200, 10800, 21600];
const RADIANS_TO_DEG = 180 / Math.PI;

/** Shapes of the corridor in east longitude and latitude, rings as d3 has them. */
export function corridorShapes(corridor: ReportCorridor): CorridorShapes {
  const { cells, pieces } = corridor;
  const named = pieces.filter(
    ({ probability }) => probability >= NAMED_SHARE * pieces[0].probability,
  );
  return {
    bands: BANDS.map((within, i) => ({
      within,
      shape: polygonsOf(
        cells.filter((cell) => cell.within <= within && cell.within > (BANDS[i - 1] ?? 0)),
      ),
    })),
    half: alongParallels(outlineOf(cells, HALF)),
    most: alongParallels(outlineOf(cells, MOST)),
    axes: {
      type: 'MultiLineString',
      coordinates: pieces.map(({ axis }) => axis.map(lonLatOf)).filter((line) => line.length > 1),
    },
    ticks: named.flatMap(ticksOf),
    ends: named.flatMap(endsOf),
    ...circleOf(cells),
  };
}

const lonLatOf = ({ longitudeDeg, latitudeDeg }: AxisPoint): LonLat => [longitudeDeg, latitudeDeg];

function polygonsOf(cells: ReportCorridor['cells']): MultiPolygon {
  return {
    type: 'MultiPolygon',
    coordinates: cells.map(({ boundsDeg: [west, south, east, north] }) => [
      [
        [west, south],
        ...parallel([west, north], [east, north]),
        ...parallel([east, south], [west, south]),
      ],
    ]),
  };
}

/**
 * Both ends of a side and places between them: the map joins places by great circles, which leave a
 * parallel the farther the nearer it is to a pole.
 */
function parallel([from, latitude]: Position, [to]: Position): Position[] {
  const steps = Math.max(1, Math.ceil(Math.abs(to - from) / PARALLEL_STEP_DEG));
  return Array.from({ length: steps + 1 }, (_, i) => [from + ((to - from) * i) / steps, latitude]);
}

function alongParallels({ coordinates }: MultiLineString): MultiLineString {
  return {
    type: 'MultiLineString',
    coordinates: coordinates.map(([start, end]) =>
      start[1] === end[1] ? parallel(start, end) : [start, end],
    ),
  };
}

/** Moments on the clock along an axis. */
function ticksOf({ axis }: Piece): CorridorShapes['ticks'] {
  const times = axis.map(({ entry }) => entry.tdbSeconds);
  const lasts = Math.max(...times) - Math.min(...times);
  const step = STEPS_S.find((each) => lasts / each <= TICKS_ALONG);
  if (step === undefined || lasts < STEPS_S[0]) return [];
  // Clocks show UTC: whole steps of it, by the offset of the axis' own start.
  const offset = Date.parse(formatIso(times[0], 'UTC', 3)) / 1000 - times[0];
  return axis.slice(1).flatMap((point, i) => {
    const before = axis[i];
    const [from, to] = [before.entry.tdbSeconds + offset, point.entry.tdbSeconds + offset];
    const way = geoInterpolate(lonLatOf(before), lonLatOf(point));
    const ticks: CorridorShapes['ticks'] = [];
    const first = Math.floor(Math.min(from, to) / step) + 1;
    for (let n = first; n * step <= Math.max(from, to); n++) {
      const at = way((n * step - from) / (to - from));
      const words = formatIso(n * step - offset, 'UTC', 0).slice(11, step < 60 ? 19 : 16);
      ticks.push({ at, onward: lonLatOf(point), words });
    }
    return ticks;
  });
}

function endsOf({ axis }: Piece): CorridorShapes['ends'] {
  const ends = axis.length === 1 ? axis : [axis[0], axis[axis.length - 1]];
  return ends.map((point) => ({
    at: lonLatOf(point),
    words: `${point.entry.utc.slice(11, 19)} UTC, ${withUnit(grouped(point.airSpeedKmS[1], 1), 'km/s')}, ${grouped(-point.airFlightPathAngleDeg[1])}° down`,
  }));
}

function circleOf(cells: ReportCorridor['cells']): Pick<CorridorShapes, 'centre' | 'radiusDeg'> {
  const main = cells.filter(({ within }, i) => i === 0 || within <= MOST);
  const sum = [0, 0, 0];
  for (const { latitudeDeg, longitudeDeg } of main) {
    const latitude = latitudeDeg / RADIANS_TO_DEG;
    const longitude = longitudeDeg / RADIANS_TO_DEG;
    sum[0] += Math.cos(latitude) * Math.cos(longitude);
    sum[1] += Math.cos(latitude) * Math.sin(longitude);
    sum[2] += Math.sin(latitude);
  }
  const centre: LonLat = [
    Math.atan2(sum[1], sum[0]) * RADIANS_TO_DEG,
    Math.atan2(sum[2], Math.hypot(sum[0], sum[1])) * RADIANS_TO_DEG,
  ];
  const radius = Math.max(
    ...main.map((cell) => geoDistance(centre, [cell.longitudeDeg, cell.latitudeDeg])),
  );
  return { centre, radiusDeg: radius * RADIANS_TO_DEG };
}

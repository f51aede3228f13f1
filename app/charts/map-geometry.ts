import { type GeoProjection, geoAzimuthalEqualArea, geoNaturalEarth1 } from 'd3-geo';
import type { Approach } from '../../core/report/report';
import { grouped } from '../desk/figures';
import type { GroundTrack, LonLat } from './ground-track';

/** Something of the report that has a place on the ground. */
export interface MapMark {
  kind: 'entry' | 'surface' | 'closest';
  at: LonLat;
  words: string;
}

/** The turn of the map is rounded to this, so that it keeps a familiar graticule, degrees. */
const TURN_STEP = 30;

/** A map of the whole Earth, turned so that the given longitude lies near its middle. */
export function mapProjection(
  widthPx: number,
  heightPx: number,
  middleLongitudeDeg: number,
): GeoProjection {
  const turn = Math.round(middleLongitudeDeg / TURN_STEP) * TURN_STEP;
  return geoNaturalEarth1()
    .rotate([-turn, 0])
    .fitExtent(
      [
        [1, 1],
        [widthPx - 1, heightPx - 1],
      ],
      { type: 'Sphere' },
    );
}

/** Wider corridors are seen on the map of the whole Earth only, degrees about their middle. */
export const WIDEST_CLOSE_DEG = 60;
/** A close map shows at least so much about the middle: the coasts are no better than that. */
const LEAST_CLOSE_DEG = 0.8;
const CLOSE_MARGIN = 1.25;

/** A map about a place, in equal area. */
export function closeProjection(
  widthPx: number,
  heightPx: number,
  centre: LonLat,
  radiusDeg: number,
): GeoProjection {
  const radius = (Math.max(LEAST_CLOSE_DEG, CLOSE_MARGIN * radiusDeg) * Math.PI) / 180;
  // An angle lies at 2 sin(angle/2) from the middle (Snyder 1987, eq. 24-3).
  const scale = Math.min(widthPx, heightPx) / 2 / (2 * Math.sin(Math.min(radius, Math.PI / 2) / 2));
  return geoAzimuthalEqualArea()
    .rotate([-centre[0], -centre[1]])
    .translate([widthPx / 2, heightPx / 2])
    .scale(scale)
    .clipAngle(120)
    .clipExtent([
      [0.5, 0.5],
      [widthPx - 0.5, heightPx - 0.5],
    ]);
}

/** True where a place has a point on the sheet. */
export function isOnSheet(
  projection: GeoProjection,
  at: LonLat,
  widthPx: number,
  heightPx: number,
): boolean {
  const [x, y] = projection(at) ?? [-1, -1];
  return x >= 0 && x <= widthPx && y >= 0 && y <= heightPx;
}

/** Of the graticule about a place, degrees: a few lines on the map. */
export function graticuleStep(radiusDeg: number): number {
  return (
    [0.2, 0.5, 1, 2, 5, 10].find((step) => Math.max(LEAST_CLOSE_DEG, radiusDeg) / step <= 5) ?? 30
  );
}

/** "41.86° S 137.56° E". */
export function placeWords([longitudeDeg, latitudeDeg]: LonLat): string {
  const part = (degrees: number, ahead: string, behind: string): string =>
    `${grouped(Math.abs(degrees), 2)}° ${degrees < 0 ? behind : ahead}`;
  return `${part(latitudeDeg, 'N', 'S')} ${part(longitudeDeg, 'E', 'W')}`;
}

/** Entry and ground from the report; the point of closest approach where there is neither. */
export function mapMarks(approach: Approach, track: GroundTrack, closest: LonLat): MapMark[] {
  const { entry, surfaceImpact } = approach;
  const marks: MapMark[] = [];
  if (entry !== undefined) {
    const at: LonLat = [entry.longitudeDeg, entry.latitudeDeg];
    marks.push({ kind: 'entry', at, words: `entry interface, ${placeWords(at)}` });
  }
  if (surfaceImpact !== undefined) {
    const at: LonLat = [surfaceImpact.longitudeDeg, surfaceImpact.latitudeDeg];
    marks.push({ kind: 'surface', at, words: `ground, without air, ${placeWords(at)}` });
  }
  if (marks.length === 0 && track.zeroTdbSeconds === approach.tdbSeconds) {
    marks.push({ kind: 'closest', at: closest, words: 'closest approach' });
  }
  return marks;
}

/** Longitude that the map is turned to: of the entry, else of the closest approach. */
export function middleLongitude(approach: Approach, closest: LonLat): number {
  return approach.entry?.longitudeDeg ?? closest[0];
}

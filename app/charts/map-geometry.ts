import { type GeoProjection, geoNaturalEarth1 } from 'd3-geo';
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

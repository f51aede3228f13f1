import type { GeoProjection } from 'd3-geo';
import type { GroundTrack, LonLat } from './ground-track';
import type { MapMark } from './map-geometry';

/** Labels nearer than this to another, or to a mark, are left out, px. */
const LABEL_ROOM_PX = 30;
const LABEL_AWAY_PX = 9;
/** Of the map's words, px. */
const LETTER_PX = 6.2;
const HALF_LINE_PX = 8;

/** Ticks of time along the track, named from the pass, their words beside the track. */
export function MapTicks(props: {
  map: { projection: GeoProjection; marks: MapMark[] };
  track: GroundTrack;
}) {
  const { map, track } = props;
  const place = ([longitude, latitude]: LonLat) => map.projection([longitude, latitude]) ?? [0, 0];
  const labelled: [number, number][] = map.marks.map(({ at }) => place(at));
  return track.ticks.map(({ at, onward, words }) => {
    const [x, y] = place(at);
    const [nextX, nextY] = place(onward);
    const isCrowded = labelled.some(([a, b]) => Math.hypot(a - x, b - y) < LABEL_ROOM_PX);
    if (!isCrowded) labelled.push([x, y]);
    // Across the track, on the side that looks up the map (or right, on an upright track).
    const length = Math.max(Math.hypot(nextX - x, nextY - y), 1e-9);
    const up = nextX >= x ? 1 : -1;
    const acrossX = (up * (nextY - y)) / length;
    const acrossY = (-up * (nextX - x)) / length;
    const anchor = acrossX > 0.4 ? 'start' : acrossX < -0.4 ? 'end' : 'middle';
    return (
      <g key={words} className="map-tick">
        <circle cx={x} cy={y} r={2.6} />
        {!isCrowded && (
          <text
            x={x + acrossX * LABEL_AWAY_PX}
            y={y + acrossY * LABEL_AWAY_PX * 1.3}
            dy="0.35em"
            textAnchor={anchor}
          >
            {words}
          </text>
        )}
      </g>
    );
  });
}

/** A part of the sheet, px. */
export interface Box {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

/** The part that words take which start at a place, or end there; `y` is their middle. */
export function wordsBox(words: string, x: number, y: number, side: 1 | 0 | -1): Box {
  const length = words.length * LETTER_PX;
  const left = side === 1 ? x : side === -1 ? x - length : x - length / 2;
  return { left, right: left + length, top: y - HALF_LINE_PX, bottom: y + HALF_LINE_PX };
}

export const meet = (a: Box, b: Box): boolean =>
  a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;

/** Where the words of a mark stand: below the track, one under the other. */
function markWords(x: number, y: number, index: number, widthPx: number) {
  const side: 1 | -1 = x < widthPx / 2 ? 1 : -1;
  return { side, x: x + side * 13, y: y + 20 + index * 15 };
}

/** What the marks and their words take of the sheet. */
export function markBoxes(
  map: { projection: GeoProjection; marks: MapMark[] },
  widthPx: number,
): Box[] {
  return map.marks.flatMap(({ at, words }, index) => {
    const [x, y] = map.projection(at) ?? [0, 0];
    const place = markWords(x, y, index, widthPx);
    return [
      { left: x - 7, right: x + 7, top: y - 7, bottom: y + 7 },
      wordsBox(words, place.x, place.y, place.side),
    ];
  });
}

/** Entry, ground, or closest approach, by shape and in words. */
export function MapMarks(props: {
  map: { projection: GeoProjection; marks: MapMark[] };
  withWords: boolean;
  widthPx: number;
}) {
  const { map, withWords, widthPx } = props;
  return map.marks.map(({ kind, at, words }, index) => {
    const [x, y] = map.projection(at) ?? [0, 0];
    // Ticks have their words above the track.
    const place = markWords(x, y, index, widthPx);
    return (
      <g key={kind} className={`map-mark map-mark-${kind}`}>
        <title>{words}</title>
        <path d={SHAPES[kind](x, y)} />
        {withWords && (
          <>
            <path
              className="map-lead"
              d={`M${x} ${y + 6}L${place.x - place.side * 3} ${place.y}`}
            />
            <text
              x={place.x}
              y={place.y}
              dy="0.35em"
              textAnchor={place.side === 1 ? 'start' : 'end'}
            >
              {words}
            </text>
          </>
        )}
      </g>
    );
  });
}

const SHAPES: Record<MapMark['kind'], (x: number, y: number) => string> = {
  entry: (x, y) => `M${x - 6} ${y - 5}h12L${x} ${y + 6}Z`,
  surface: (x, y) => `M${x - 5} ${y - 5}l10 10m0 -10l-10 10`,
  closest: (x, y) => `M${x} ${y - 6}l6 6l-6 6l-6 -6Z`,
};

import type { GeoProjection } from 'd3-geo';
import type { GroundTrack, LonLat } from './ground-track';
import type { MapMark } from './map-geometry';

/** Labels nearer than this to another, or to a mark, are left out, px. */
const LABEL_ROOM_PX = 30;
const LABEL_AWAY_PX = 9;

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

/** Entry, ground, or closest approach, by shape and in words. */
export function MapMarks(props: {
  map: { projection: GeoProjection; marks: MapMark[] };
  withWords: boolean;
  widthPx: number;
}) {
  const { map, withWords, widthPx } = props;
  return map.marks.map(({ kind, at, words }, index) => {
    const [x, y] = map.projection(at) ?? [0, 0];
    const side = x < widthPx / 2 ? 1 : -1;
    // Words stand below the track, one under the other: ticks have theirs above it.
    const down = 20 + index * 15;
    return (
      <g key={kind} className={`map-mark map-mark-${kind}`}>
        <title>{words}</title>
        <path d={SHAPES[kind](x, y)} />
        {withWords && (
          <>
            <path className="map-lead" d={`M${x} ${y + 6}L${x + side * 10} ${y + down}`} />
            <text
              x={x + side * 13}
              y={y + down}
              dy="0.35em"
              textAnchor={side === 1 ? 'start' : 'end'}
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

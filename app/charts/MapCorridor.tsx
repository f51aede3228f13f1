import type { GeoPath, GeoProjection } from 'd3-geo';
import type { ReportCorridor } from '../../core/report/corridor';
import { grouped, withUnit } from '../desk/figures';
import type { LonLat } from './ground-track';
import type { CorridorShapes } from './map-corridor';
import { isOnSheet } from './map-geometry';

/** Words nearer than this to others are left out, px. */
const ROOM_X_PX = 64;
const ROOM_Y_PX = 17;
const TICK_PX = 5;
const AWAY_PX = 11;
/** Ends nearer than this to one another have no marks: they would hide what lies between. */
const SPOT_PX = 60;
/** Their words stand so far to the side of the spot. */
const SPOT_AWAY_PX = 48;
/** Words at the ends are about so wide, px. */
const END_PX = 200;

/** Where the impacting clones come down: density, lines about half and 95 % of it, axis and times. */
export function MapCorridor(props: {
  map: { projection: GeoProjection; path: GeoPath };
  shapes: CorridorShapes;
  withWords: boolean;
  widthPx: number;
  heightPx: number;
}) {
  const { map, shapes, withWords, widthPx, heightPx } = props;
  const draw = (shape: Parameters<GeoPath>[0]) => map.path(shape) ?? '';
  return (
    <g className="map-corridor">
      {shapes.bands.map(({ within, shape }, i) => (
        <path key={within} className={`map-band map-band-${i + 1}`} d={draw(shape)} />
      ))}
      <path className="map-most" d={draw(shapes.most)} />
      <path className="map-half" d={draw(shapes.half)} />
      <path className="map-axis" d={draw(shapes.axes)} />
      {withWords && (
        <AxisWords
          map={map}
          shapes={shapes}
          isShown={(at) => isOnSheet(map.projection, at, widthPx, heightPx)}
          widthPx={widthPx}
        />
      )}
    </g>
  );
}

/** Times across the axis, and what it is like at the ends. */
function AxisWords(props: {
  map: { projection: GeoProjection };
  shapes: CorridorShapes;
  isShown: (at: LonLat) => boolean;
  widthPx: number;
}) {
  const { map, shapes, isShown, widthPx } = props;
  const place = (at: LonLat) => map.projection(at) ?? [0, 0];
  const ends = shapes.ends.filter(({ at }) => isShown(at));
  const endPlaces = ends.map(({ at }) => place(at));
  const taken = [...endPlaces];
  const isSpot =
    taken.length === 2 &&
    Math.hypot(taken[0][0] - taken[1][0], taken[0][1] - taken[1][1]) < SPOT_PX;
  const isCrowded = (x: number, y: number): boolean =>
    taken.some(([a, b]) => Math.abs(a - x) < ROOM_X_PX && Math.abs(b - y) < ROOM_Y_PX);
  return (
    <>
      {shapes.ticks
        .filter(({ at }) => isShown(at))
        .map(({ at, onward, words }) => {
          const [x, y] = place(at);
          const [nextX, nextY] = place(onward);
          const length = Math.max(Math.hypot(nextX - x, nextY - y), 1e-9);
          const isRightward = nextX >= x ? 1 : -1;
          // Across the axis, on the side that looks up the map.
          const acrossX = (isRightward * (nextY - y)) / length;
          const acrossY = (-isRightward * (nextX - x)) / length;
          const hasWords = !isCrowded(x, y);
          if (hasWords) taken.push([x, y]);
          return (
            <g key={`${words} ${at[0]}`} className="map-axis-tick">
              <path
                d={`M${x - acrossX * TICK_PX} ${y - acrossY * TICK_PX}L${x + acrossX * TICK_PX} ${y + acrossY * TICK_PX}`}
              />
              {hasWords && (
                <text
                  x={x + acrossX * AWAY_PX}
                  y={y + acrossY * AWAY_PX * 1.2}
                  dy="0.35em"
                  textAnchor={acrossX > 0.4 ? 'start' : acrossX < -0.4 ? 'end' : 'middle'}
                >
                  {words}
                </text>
              )}
            </g>
          );
        })}
      {ends.map(({ at, words }, i) => {
        const [x, y] = place(at);
        const isRight = x + END_PX < widthPx;
        const side = isRight ? 1 : -1;
        // The words of a spot's two ends stand one under the other beside its middle.
        const [other] = endPlaces.slice(1 - i);
        const middle = isSpot ? [(x + other[0]) / 2, (y + other[1]) / 2] : [x, y];
        const wordsX = isSpot ? middle[0] + side * SPOT_AWAY_PX : x + side * 8;
        const wordsY = isSpot ? middle[1] + 16 * i : y + 16;
        return (
          <g key={`${words} ${at[0]}`} className="map-axis-end">
            {!isSpot && <circle cx={x} cy={y} r={3.2} />}
            <text x={wordsX} y={wordsY} textAnchor={isRight ? 'start' : 'end'}>
              {words}
            </text>
          </g>
        );
      })}
    </>
  );
}

/** What the shades and lines of the corridor mean. */
export function CorridorKey({ corridor }: { corridor: ReportCorridor }) {
  return (
    <p className="map-key">
      <strong>Where it comes down if it hits</strong>
      <span>
        <Swatch className="map-half" isBox />
        50{'\u2009'}% inside
      </span>
      <span>
        <Swatch className="map-most" isBox />
        95{'\u2009'}% inside
      </span>
      <span>
        <Swatch className="map-axis" isBox={false} />
        axis, entry in UTC
      </span>
      <span>
        {grouped(corridor.effectiveClones)} effective clones, spread by{' '}
        {withUnit(grouped(corridor.kernelKm), 'km')}
      </span>
      <span>an analysis, not a warning</span>
    </p>
  );
}

function Swatch({ className, isBox }: { className: string; isBox: boolean }) {
  return (
    <svg className="map-swatch" viewBox="0 0 26 12" aria-hidden="true">
      {isBox ? (
        <>
          <path
            className={`map-band ${className === 'map-half' ? 'map-band-1' : 'map-band-4'}`}
            d="M2 2h22v8h-22z"
          />
          <path className={className} d="M2 2h22v8h-22z" />
        </>
      ) : (
        <path className={className} d="M1 6h24M13 2v8" />
      )}
    </svg>
  );
}

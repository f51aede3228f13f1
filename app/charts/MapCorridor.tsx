import type { GeoPath, GeoProjection } from 'd3-geo';
import type { ReportCorridor } from '../../core/report/corridor';
import { grouped, withUnit } from '../desk/figures';
import type { LonLat } from './ground-track';
import { type Box, meet, wordsBox } from './MapMarks';
import type { CorridorShapes } from './map-corridor';
import { isOnSheet } from './map-geometry';

const TICK_PX = 5;
const AWAY_PX = 11;
/** From the middle of words down to the line that they stand on. */
const BASELINE_PX = 4;
/** Ends nearer than this to one another have no marks: they would hide what lies between. */
const SPOT_PX = 60;
/** Their words stand so far to the side of the spot. */
const SPOT_AWAY_PX = 48;
/** How far down from its middle the first of them is tried, in turn. */
const SPOT_DOWN_PX = [0, -28, 44, -48, 64];
/** Words at the ends are about so wide, px. */
const END_PX = 200;

/** Where the impacting clones come down: density, lines about half and 95 % of it, axis and times. */
export function MapCorridor(props: {
  map: { projection: GeoProjection; path: GeoPath };
  shapes: CorridorShapes;
  /** Parts of the sheet that have words or marks of others. */
  taken: readonly Box[];
  withWords: boolean;
  widthPx: number;
  heightPx: number;
}) {
  const { map, shapes, taken, withWords, widthPx, heightPx } = props;
  const { path } = map;
  return (
    <g className="map-corridor">
      {shapes.bands.map(({ within, shape }, i) => (
        <Drawn key={within} className={`map-band map-band-${i + 1}`} path={path} shape={shape} />
      ))}
      <Drawn className="map-most" path={path} shape={shapes.most} />
      <Drawn className="map-half" path={path} shape={shapes.half} />
      <Drawn className="map-axis" path={path} shape={shapes.axes} />
      {withWords && (
        <AxisWords
          map={map}
          shapes={shapes}
          taken={taken}
          isShown={(at) => isOnSheet(map.projection, at, widthPx, heightPx)}
          widthPx={widthPx}
        />
      )}
    </g>
  );
}

/** A shape of the map; a component for each, so that other work can come between two of them. */
export function Drawn(props: { className: string; path: GeoPath; shape: Parameters<GeoPath>[0] }) {
  const { className, path, shape } = props;
  return <path className={className} d={path(shape) ?? ''} />;
}

/** Times across the axis, and what it is like at the ends. */
function AxisWords(props: {
  map: { projection: GeoProjection };
  shapes: CorridorShapes;
  taken: readonly Box[];
  isShown: (at: LonLat) => boolean;
  widthPx: number;
}) {
  const { map, shapes, isShown, widthPx } = props;
  const place = (at: LonLat) => map.projection(at) ?? [0, 0];
  const ends = endWords(
    shapes.ends.filter(({ at }) => isShown(at)).map(({ at, words }) => ({ words, at: place(at) })),
    props.taken,
    widthPx,
  );
  const full = [...props.taken, ...ends.map(boxOf)];
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
          const side = acrossX > 0.4 ? 1 : acrossX < -0.4 ? -1 : 0;
          const wordsX = x + acrossX * AWAY_PX;
          const wordsY = y + acrossY * AWAY_PX * 1.2;
          const box = wordsBox(words, wordsX, wordsY, side);
          const hasWords = !full.some((other) => meet(box, other));
          if (hasWords) full.push(box);
          return (
            <g key={`${words} ${at[0]}`} className="map-axis-tick">
              <path
                d={`M${x - acrossX * TICK_PX} ${y - acrossY * TICK_PX}L${x + acrossX * TICK_PX} ${y + acrossY * TICK_PX}`}
              />
              {hasWords && (
                <text x={wordsX} y={wordsY} dy="0.35em" textAnchor={ANCHORS[side]}>
                  {words}
                </text>
              )}
            </g>
          );
        })}
      {ends.map(({ words, at, x, y, side, isSpot }) => (
        <g key={`${words} ${at[0]}`} className="map-axis-end">
          {!isSpot && <circle cx={at[0]} cy={at[1]} r={3.2} />}
          <text x={x} y={y} textAnchor={ANCHORS[side]}>
            {words}
          </text>
        </g>
      ))}
    </>
  );
}

const ANCHORS = { 1: 'start', 0: 'middle', [-1]: 'end' } as const;

interface EndWords {
  words: string;
  /** The end itself, and where its words start or end, px. */
  at: [number, number];
  x: number;
  y: number;
  side: 1 | -1;
  isSpot: boolean;
}

/**
 * Where the words at the ends stand: below the end or above it, on a side that has room; those of a
 * spot's two ends one under the other beside its middle.
 */
function endWords(
  ends: { words: string; at: [number, number] }[],
  taken: readonly Box[],
  widthPx: number,
): EndWords[] {
  const [one, two] = ends.map(({ at }) => at);
  const isSpot = ends.length === 2 && Math.hypot(one[0] - two[0], one[1] - two[1]) < SPOT_PX;
  const isFree = (box: Box, full: readonly Box[]): boolean =>
    box.left > 0 && box.right < widthPx && !full.some((other) => meet(box, other));
  const sides = (x: number): (1 | -1)[] => (x + END_PX < widthPx ? [1, -1] : [-1, 1]);
  if (isSpot) {
    const [x, y] = [(one[0] + two[0]) / 2, (one[1] + two[1]) / 2];
    const pairs = sides(x).flatMap((side) =>
      SPOT_DOWN_PX.map((down) =>
        ends.map(({ words, at }, i) => {
          return { words, at, side, isSpot, x: x + side * SPOT_AWAY_PX, y: y + down + 16 * i };
        }),
      ),
    );
    return pairs.find((pair) => pair.every((each) => isFree(boxOf(each), taken))) ?? pairs[0];
  }
  const full = [...taken];
  return ends.map(({ words, at }) => {
    const places = sides(at[0]).flatMap((side) =>
      [16, -8].map((down) => ({ words, at, side, isSpot, x: at[0] + side * 8, y: at[1] + down })),
    );
    const chosen = places.find((each) => isFree(boxOf(each), full)) ?? places[0];
    full.push(boxOf(chosen));
    return chosen;
  });
}

const boxOf = ({ words, x, y, side }: EndWords): Box => wordsBox(words, x, y - BASELINE_PX, side);

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

import { memo, useId } from 'react';
import type { Approach } from '../../core/report/report';
import { distanceWords } from '../ribbon/words';
import { aimLabel, aimWords, leavingPlace } from './plane-aim';
import { AXES_WORDS, type PlaneAxes } from './plane-axes';
import type { PlaneGeometry } from './plane-geometry';
import { planeLine } from './plane-line';
import { planeWords } from './plane-words';

/** Width of a letter in the sheet's small text, px. */
const LETTER_PX = 6;
const LINE_PX = 15;
/** The same in the words of the ticks, px. */
const TICK_LETTER_PX = 6.3;
/** Room for the tick words under the sheet, px. */
const FOOT_PX = 23;
/** A narrower thumbnail has no room for the aim's words, px. */
const LEAST_WORDS_PX = 200;

/** The drawing itself: axes, the body, the capture disc, the ellipses, the line of variations, B. */
export const PlaneSheet = memo(function PlaneSheet(props: {
  approach: Approach;
  axes: PlaneAxes;
  geometry: PlaneGeometry;
  leftPx: number;
  widthPx: number;
  heightPx: number;
  isThumbnail: boolean;
}) {
  const { approach, axes, geometry, leftPx, widthPx, heightPx, isThumbnail } = props;
  const title = useId();
  return (
    <svg
      className="plane-svg"
      width={leftPx + widthPx + 1}
      height={heightPx + (isThumbnail ? 1 : FOOT_PX)}
      role="img"
      aria-labelledby={`${title} ${title}-words`}
    >
      <title id={title}>Target plane</title>
      <desc id={`${title}-words`}>{planeWords(approach)}</desc>
      <g transform={`translate(${leftPx + 0.5} 0.5)`}>
        <clipPath id={`${title}-clip`}>
          <rect width={widthPx} height={heightPx} />
        </clipPath>
        <g clipPath={`url(#${title}-clip)`}>
          <Axes geometry={geometry} axes={axes} widthPx={widthPx} heightPx={heightPx} />
          <Discs approach={approach} geometry={geometry} widthPx={widthPx} heightPx={heightPx} />
          <Ellipses geometry={geometry} />
          <Line approach={approach} geometry={geometry} isThumbnail={isThumbnail} />
          <Aim
            approach={approach}
            geometry={geometry}
            widthPx={widthPx}
            heightPx={heightPx}
            isThumbnail={isThumbnail}
          />
        </g>
        <rect className="plane-frame" width={widthPx} height={heightPx} />
        {!isThumbnail && <Ticks geometry={geometry} widthPx={widthPx} heightPx={heightPx} />}
      </g>
    </svg>
  );
});

function Axes(props: {
  geometry: PlaneGeometry;
  axes: PlaneAxes;
  widthPx: number;
  heightPx: number;
}) {
  const { geometry, axes, widthPx, heightPx } = props;
  const { x, y, aim } = geometry;
  const { across, upright, uprightPointsDown } = AXES_WORDS[axes];
  const tip = uprightPointsDown ? heightPx - 8 : 8;
  const back = uprightPointsDown ? -7 : 7;
  // The aim's words stand on its own side.
  const nameSide = aim.x > x ? -1 : 1;
  const nameX = Math.min(Math.max(x + nameSide * 9, 15), widthPx - 15);
  const nameY = Math.min(Math.max(y - 9, 16), heightPx - 9);
  return (
    <>
      <path className="plane-axis" d={`M0 ${y}H${widthPx}M${x} 0V${heightPx}`} />
      <path className="plane-tip" d={`M${widthPx - 8} ${y}l-7 -3.5v7Z`} />
      <path className="plane-tip" d={`M${x} ${tip}l-3.5 ${back}h7Z`} />
      <text className="plane-axis-name" x={widthPx - 12} y={nameY} textAnchor="end">
        {across}
      </text>
      <text
        className="plane-axis-name"
        x={nameX}
        y={tip + back}
        dy="0.35em"
        textAnchor={nameSide > 0 ? 'start' : 'end'}
      >
        {upright}
      </text>
    </>
  );
}

function Discs(props: {
  approach: Approach;
  geometry: PlaneGeometry;
  widthPx: number;
  heightPx: number;
}) {
  const { approach, geometry, widthPx, heightPx } = props;
  const { x, y, discPx, capturePx, aim } = geometry;
  // Words stand on the side away from the aim, and off the axes.
  const side = aim.y > y ? -1 : 1;
  const isWide = discPx > 34;
  const name = isWide ? 'capture disc' : `${approach.body}, capture disc`;
  const half = (name.length * LETTER_PX) / 2;
  const beside = x + (aim.x > x ? -1 : 1) * (capturePx * Math.SQRT1_2 + half + 7);
  const nameX = Math.min(Math.max(beside, half + 4), widthPx - half - 4);
  const away = capturePx * Math.SQRT1_2 + 10;
  // A small disc has the aim's words close by.
  const aimHalf = (aimWords(approach).length * LETTER_PX) / 2;
  const label = aimLabel(approach, geometry, aimHalf, widthPx, heightPx);
  const isTaken =
    geometry.aimIsShown &&
    Math.abs(label.x - nameX) < half + aimHalf + LETTER_PX &&
    Math.abs(label.y - (y + side * away)) < LINE_PX;
  return (
    <>
      <circle
        className={approach.body === 'Moon' ? 'plane-disc plane-disc-moon' : 'plane-disc'}
        cx={x}
        cy={y}
        r={discPx}
      />
      <circle className="plane-capture" cx={x} cy={y} r={capturePx} />
      {isWide && (
        <text
          className="plane-disc-name"
          x={x}
          y={y + side * discPx * 0.5}
          dy="0.35em"
          textAnchor="middle"
        >
          {approach.body}
        </text>
      )}
      <text x={nameX} y={y + (isTaken ? -side : side) * away} dy="0.35em" textAnchor="middle">
        {name}
      </text>
    </>
  );
}

/** The line of variations with whole σ marked on it; nothing until clones have been carried. */
function Line(props: { approach: Approach; geometry: PlaneGeometry; isThumbnail: boolean }) {
  const { approach, geometry, isThumbnail } = props;
  if (approach.lineOfVariations === undefined) return null;
  const { path, ticks } = planeLine(approach.lineOfVariations, geometry.project);
  return (
    <>
      <path className="plane-line" d={path} />
      {!isThumbnail &&
        ticks.map(({ sigma, x, y, nx, ny, words }) => (
          <g key={sigma}>
            <path
              className="plane-line"
              d={`M${x - 4 * nx} ${y - 4 * ny}L${x + 4 * nx} ${y + 4 * ny}`}
            />
            <text
              className="plane-line-words"
              x={x + 14 * nx}
              y={y + 14 * ny}
              dx={-Math.abs(nx) * 2}
              dy="0.35em"
              textAnchor={nx > 0.7 ? 'start' : nx < -0.7 ? 'end' : 'middle'}
            >
              {words}
            </text>
          </g>
        ))}
    </>
  );
}

/** Where the covariance says it may aim: 1, 2 and 3 σ. */
function Ellipses({ geometry: { aim, ellipse } }: { geometry: PlaneGeometry }) {
  if (ellipse === null) return null;
  return [3, 2, 1].map((sigmas) => (
    <ellipse
      key={sigmas}
      className="plane-ellipse"
      rx={sigmas * ellipse.majorPx}
      ry={sigmas * ellipse.minorPx}
      transform={`translate(${aim.x} ${aim.y}) rotate(${ellipse.turnDeg})`}
    />
  ));
}

function Aim(props: {
  approach: Approach;
  geometry: PlaneGeometry;
  widthPx: number;
  heightPx: number;
  isThumbnail: boolean;
}) {
  const { approach, geometry, widthPx, heightPx, isThumbnail } = props;
  const { x, y, aim, aimIsShown } = geometry;
  const km = approach.hyperbola?.impactParameterKm ?? 0;
  const dy = aim.y - y;
  if (!aimIsShown) {
    const leave = leavingPlace(geometry, widthPx, heightPx);
    if (leave === null) return null;
    const words = `B ${distanceWords(km)}, outside the sheet`;
    const half = (words.length * LETTER_PX) / 2;
    return (
      <>
        <path className="plane-b" d={`M${x} ${y}L${aim.x} ${aim.y}`} />
        <text
          x={Math.min(Math.max(leave.x, half + 6), widthPx - half - 6)}
          y={Math.min(Math.max(leave.y + (dy > 0 ? -18 : 18), 14), heightPx - 14)}
          dy="0.35em"
          textAnchor="middle"
        >
          {words}
        </text>
      </>
    );
  }
  const cross = `M${aim.x - 7} ${aim.y}h14M${aim.x} ${aim.y - 7}v14`;
  const words = aimWords(approach);
  const half = (words.length * LETTER_PX) / 2;
  const label = aimLabel(approach, geometry, half, widthPx, heightPx);
  const isOnDisc =
    Math.abs(label.y - y) < geometry.discPx && Math.abs(label.x - x) < geometry.discPx + half;
  return (
    <>
      <path className="plane-b" d={`M${x} ${y}L${aim.x} ${aim.y}`} />
      <path className="plane-aim-rim" d={cross} />
      <path className="plane-aim" d={cross} />
      <circle className="plane-aim plane-aim-open" cx={aim.x} cy={aim.y} r={3.5} />
      {!(isThumbnail && (widthPx < LEAST_WORDS_PX || isOnDisc)) && (
        <text x={label.x} y={label.y} dy="0.35em" textAnchor="middle">
          {words}
        </text>
      )}
    </>
  );
}

function Ticks(props: { geometry: PlaneGeometry; widthPx: number; heightPx: number }) {
  const { geometry, widthPx, heightPx } = props;
  const fits = (px: number, words: string) => {
    const half = (words.length * TICK_LETTER_PX) / 2;
    return px > half - 4 && px < widthPx - half + 1;
  };
  return (
    <>
      {geometry.ticks.across.map(({ px, words }) => (
        <g key={words}>
          <path className="plane-tick" d={`M${px} ${heightPx}v5`} />
          {fits(px, words) && (
            <text className="plane-tick-words" x={px} y={heightPx + 17} textAnchor="middle">
              {words}
            </text>
          )}
        </g>
      ))}
      {geometry.ticks.upright.map(({ px, words }) => (
        <g key={words}>
          <path className="plane-tick" d={`M0 ${px}h-5`} />
          {px > 5 && (
            <text className="plane-tick-words" x={-8} y={px} dy="0.35em" textAnchor="end">
              {words}
            </text>
          )}
        </g>
      ))}
      <text className="plane-tick-words" x={-8} y={heightPx + 17} textAnchor="end">
        km
      </text>
    </>
  );
}

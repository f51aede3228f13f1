import { useEffect, useId, useRef } from 'react';
import type { Approach } from '../../core/report/report';
import { distanceWords } from '../ribbon/words';
import { AXES_WORDS, type PlaneAxes, type PlaneGeometry, planeGeometry } from './plane-geometry';
import { planeWords } from './plane-words';

/** Room for the tick words at the left and at the foot, px. */
const MARGIN_LEFT = 58;
const MARGIN_FOOT = 22;
/** Below this height the sheet is a thumbnail: no ticks, fewer words. */
const THUMBNAIL_PX = 260;
const WHEEL_ZOOM = 1 / 500;
/** Width of a letter in the sheet's small text, px. */
const LETTER_PX = 6;

/** The drawing itself: axes, the body, the capture disc, the B vector. */
export function PlaneSheet(props: {
  approach: Approach;
  axes: PlaneAxes;
  halfKm: number;
  size: { widthPx: number; heightPx: number };
  zoom(factor: number): void;
}) {
  const { approach, axes, halfKm, size, zoom } = props;
  const title = useId();
  const svg = useRef<SVGSVGElement>(null);
  const latestZoom = useRef(zoom);
  useEffect(() => {
    latestZoom.current = zoom;
  }, [zoom]);

  const hasRoom = size.widthPx > 60 && size.heightPx > 60;
  useEffect(() => {
    const element = svg.current;
    if (element === null || !hasRoom) return;
    const wheel = (event: WheelEvent) => {
      event.preventDefault();
      const lines = event.deltaMode === WheelEvent.DOM_DELTA_LINE ? 16 : 1;
      latestZoom.current(Math.exp(event.deltaY * lines * WHEEL_ZOOM));
    };
    element.addEventListener('wheel', wheel, { passive: false });
    return () => element.removeEventListener('wheel', wheel);
  }, [hasRoom]);

  if (!hasRoom) return null;
  const isThumbnail = size.heightPx < THUMBNAIL_PX;
  const left = isThumbnail ? 0 : MARGIN_LEFT;
  const widthPx = size.widthPx - left - 1;
  const heightPx = size.heightPx - (isThumbnail ? 0 : MARGIN_FOOT) - 1;
  const geometry = planeGeometry(approach, axes, halfKm, widthPx, heightPx);
  if (geometry === null) return null;
  return (
    <svg
      ref={svg}
      className="plane-svg"
      width={size.widthPx}
      height={size.heightPx}
      role="img"
      aria-labelledby={`${title} ${title}-words`}
    >
      <title id={title}>Target plane</title>
      <desc id={`${title}-words`}>{planeWords(approach)}</desc>
      <g transform={`translate(${left + 0.5} 0.5)`}>
        <clipPath id={`${title}-clip`}>
          <rect width={widthPx} height={heightPx} />
        </clipPath>
        <g clipPath={`url(#${title}-clip)`}>
          <Axes geometry={geometry} axes={axes} widthPx={widthPx} heightPx={heightPx} />
          <Discs approach={approach} geometry={geometry} />
          <Ellipses geometry={geometry} />
          <Aim approach={approach} geometry={geometry} widthPx={widthPx} heightPx={heightPx} />
        </g>
        <rect className="plane-frame" width={widthPx} height={heightPx} />
        {!isThumbnail && <Ticks geometry={geometry} heightPx={heightPx} />}
      </g>
    </svg>
  );
}

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
  return (
    <>
      <path className="plane-axis" d={`M0 ${y}H${widthPx}M${x} 0V${heightPx}`} />
      <path className="plane-tip" d={`M${widthPx - 8} ${y}l-7 -3.5v7Z`} />
      <path className="plane-tip" d={`M${x} ${tip}l-3.5 ${back}h7Z`} />
      <text className="plane-axis-name" x={widthPx - 12} y={y - 9} textAnchor="end">
        {across}
      </text>
      <text
        className="plane-axis-name"
        x={x + nameSide * 9}
        y={tip + back}
        dy="0.35em"
        textAnchor={nameSide > 0 ? 'start' : 'end'}
      >
        {upright}
      </text>
    </>
  );
}

function Discs({ approach, geometry }: { approach: Approach; geometry: PlaneGeometry }) {
  const { x, y, discPx, capturePx, aim } = geometry;
  // Words stand on the side away from the aim.
  const side = aim.y > y ? -1 : 1;
  const isWide = discPx > 34;
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
      <text x={x} y={y + side * (capturePx + 10)} dy="0.35em" textAnchor="middle">
        {isWide ? 'capture disc' : `${approach.body}, capture disc`}
      </text>
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
}) {
  const { approach, geometry, widthPx, heightPx } = props;
  const { x, y, aim, aimIsShown } = geometry;
  const km = approach.hyperbola?.impactParameterKm ?? 0;
  const dx = aim.x - x;
  const dy = aim.y - y;
  if (!aimIsShown) {
    // At the frame, on the way to the aim.
    const reach = Math.min(
      Math.abs((widthPx / 2 - 4) / (dx === 0 ? 1e-9 : dx)),
      Math.abs((heightPx / 2 - 4) / (dy === 0 ? 1e-9 : dy)),
    );
    return (
      <>
        <path className="plane-b" d={`M${x} ${y}l${dx * reach} ${dy * reach}`} />
        <text
          x={x + dx * reach * 0.8}
          y={y + dy * reach * 0.8 + (dy > 0 ? -12 : 12)}
          textAnchor={dx > 0 ? 'end' : 'start'}
        >
          B, {distanceWords(km)}, outside the sheet
        </text>
      </>
    );
  }
  const outward = dx > 0 ? 1 : -1;
  const words = `B ${distanceWords(km)}`;
  const half = (words.length * LETTER_PX) / 2;
  const hasRoomBeside = outward > 0 ? aim.x + 2 * half + 12 < widthPx : aim.x - 2 * half - 12 > 0;
  // Clear of the upright axis and its name.
  const clear = x + outward * (half + 22);
  const label = hasRoomBeside
    ? { x: aim.x + outward * (half + 11), y: aim.y }
    : {
        x: Math.min(
          Math.max(half + 4, outward > 0 ? Math.max(aim.x, clear) : Math.min(aim.x, clear)),
          widthPx - half - 4,
        ),
        y: aim.y + (dy > 0 ? 16 : -16),
      };
  return (
    <>
      <path className="plane-b" d={`M${x} ${y}L${aim.x} ${aim.y}`} />
      <path className="plane-aim" d={`M${aim.x - 6} ${aim.y}h12M${aim.x} ${aim.y - 6}v12`} />
      <circle className="plane-aim" cx={aim.x} cy={aim.y} r={3.5} />
      <text x={label.x} y={label.y} dy="0.35em" textAnchor="middle">
        {words}
      </text>
    </>
  );
}

function Ticks({ geometry, heightPx }: { geometry: PlaneGeometry; heightPx: number }) {
  return (
    <>
      {geometry.ticks.across.map(({ px, words }) => (
        <g key={words}>
          <path className="plane-tick" d={`M${px} ${heightPx}v5`} />
          <text className="plane-tick-words" x={px} y={heightPx + 17} textAnchor="middle">
            {words}
          </text>
        </g>
      ))}
      {geometry.ticks.upright.map(({ px, words }) => (
        <g key={words}>
          <path className="plane-tick" d={`M0 ${px}h-5`} />
          <text className="plane-tick-words" x={-8} y={px} dy="0.35em" textAnchor="end">
            {words}
          </text>
        </g>
      ))}
      <text className="plane-tick-words" x={-8} y={heightPx + 17} textAnchor="end">
        km
      </text>
    </>
  );
}

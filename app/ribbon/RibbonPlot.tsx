import { memo } from 'react';
import { bandOutline, type RibbonBand, type RibbonGeometry } from './geometry';
import { initialOf } from './mark-words';
import type { Box, PlacedFlag } from './place-flags';

/** The ribbon's still parts: axes, curves, flags. Drawn when the geometry changes, not by the clock. */
export const RibbonPlot = memo(function RibbonPlot({ geometry }: { geometry: RibbonGeometry }) {
  const { plot, curves, band, flags } = geometry;
  return (
    <>
      <DistanceAxes geometry={geometry} />
      <TimeAxis geometry={geometry} />
      {band !== null && <BandPart band={band} plot={plot} />}
      <path className="ribbon-moon" d={polyline(curves.moon)} />
      <path className="ribbon-unperturbed" d={polyline(curves.unperturbed)} />
      <path className="ribbon-curve" d={polyline(curves.object)} />
      <rect className="ribbon-frame" {...frameOf(plot)} />
      {flags.map((flag, index) => (
        <Flag key={`${flag.event.tdbSeconds} ${flag.event.label}`} flag={flag} index={index} />
      ))}
    </>
  );
});

const frameOf = ({ x0, y0, x1, y1 }: Box) => ({ x: x0, y: y0, width: x1 - x0, height: y1 - y0 });

function polyline(points: Float64Array): string {
  let path = '';
  for (let i = 0; i < points.length; i += 2) {
    path += `${i === 0 ? 'M' : 'L'}${points[i].toFixed(1)} ${points[i + 1].toFixed(1)}`;
  }
  return path;
}

/** A key of its own: the band is named where the plot is empty, at its foot. */
function BandPart({ band, plot }: { band: RibbonBand; plot: Box }) {
  const [x, y] = [plot.x0 + 9, plot.y1 - 10];
  return (
    <>
      <path className="ribbon-band" d={`${polyline(bandOutline(band))}Z`} />
      <path className="ribbon-band-edge" d={polyline(band.low) + polyline(band.high)} />
      <path className="ribbon-band" d={`M${x} ${y - 4}h18v8h-18Z`} />
      <path className="ribbon-band-edge" d={`M${x} ${y - 4}h18m0 8h-18`} />
      <text className="ribbon-words" x={x + 24} y={y} dy="0.33em">
        {band.words}
      </text>
    </>
  );
}

function DistanceAxes({ geometry }: { geometry: RibbonGeometry }) {
  const { plot, named, decades } = geometry;
  return (
    <>
      {named.map(({ y, textY, words }) => (
        <g key={words}>
          <path className="ribbon-level" d={`M${plot.x0} ${y}H${plot.x1}`} />
          <path className="ribbon-tick" d={`M${plot.x0 - 12} ${textY}L${plot.x0 - 5} ${y}h5`} />
          <text className="ribbon-words" x={plot.x0 - 15} y={textY} dy="0.33em" textAnchor="end">
            {words}
          </text>
        </g>
      ))}
      {decades.map(({ y, textY, words }) => (
        <g key={words}>
          <path className="ribbon-tick" d={`M${plot.x1} ${y}h5L${plot.x1 + 8} ${textY}`} />
          <text className="ribbon-words" x={plot.x1 + 11} y={textY} dy="0.33em">
            {words}
          </text>
        </g>
      ))}
    </>
  );
}

function TimeAxis({ geometry }: { geometry: RibbonGeometry }) {
  const { plot, timeTicks } = geometry;
  return timeTicks.map(({ x, words, date }) => (
    <g key={x}>
      <path className="ribbon-tick" d={`M${x} ${plot.y1}v5`} />
      <text className="ribbon-words" x={x} y={plot.y1 + 16} textAnchor="middle">
        {words}
      </text>
      <text className="ribbon-date" x={x} y={plot.y1 + 29} textAnchor="middle">
        {date}
      </text>
    </g>
  ));
}

function Flag({ flag, index }: { flag: PlacedFlag; index: number }) {
  const { event, x, y, label } = flag;
  return (
    <g
      className={`ribbon-flag ribbon-flag-${event.kind}`}
      data-event={index}
      data-body={event.body}
    >
      <title>{event.label}</title>
      {label !== null && (
        <>
          <path className="ribbon-pole" d={`M${x} ${y}V${label.y}`} />
          <text x={label.x} y={label.y} dy="0.34em" textAnchor={label.anchor}>
            {label.text}
          </text>
        </>
      )}
      {event.kind === 'approach' ? (
        <>
          <circle className="ribbon-ring" cx={x} cy={y} r={6.5} />
          <text className="ribbon-initial" x={x} y={y} dy="0.35em" textAnchor="middle">
            {initialOf(event.body)}
          </text>
        </>
      ) : (
        <path className="ribbon-arrow" d={arrowPath(flag)} />
      )}
    </g>
  );
}

/** Down for a way in, up for a way out, a cross for a surface. */
function arrowPath({ event, x, y }: PlacedFlag): string {
  if (event.kind === 'surface') return `M${x - 4} ${y - 4}l8 8m0 -8l-8 8`;
  const down = event.direction === 'in' ? 1 : -1;
  return `M${x - 4} ${y - 3 * down}h8L${x} ${y + 4 * down}Z`;
}

import type { ReportCorridor } from './corridor';
import {
  formatDegrees,
  formatDuration,
  formatKm,
  formatMoment,
  formatNumber,
  formatPlace,
  formatSpeed,
} from './figures';
import { figure, finding, km, kmS } from './finding';
import type { Finding } from './report';

/** Below so many effective clones the finding says that the shape is hardly known. */
const FEW_CLONES = 30;
/** A strip in time longer than this is several dates, each with its own entry. */
const ONE_DATE_S = 86400;

/** Wider than this share of its length a strip is called an area: its ends are hardly defined. */
const WIDE = 0.25;

type Piece = ReportCorridor['pieces'][number];

/** A whole length with the two figures that a person would say. */
function roughKm(value: number): string {
  if (value < 10) return formatKm(value);
  const step = 10 ** (Math.floor(Math.log10(value)) - 1);
  return formatKm(Math.round(value / step) * step);
}

/** Where it comes down if it hits: sentences about the corridor, figures from the report itself. */
export function corridorFinding(corridor: ReportCorridor, caution: string | null): Finding | null {
  const { pieces, airSpeedKmS, airFlightPathAngleDeg } = corridor;
  if (pieces.length === 0) return null;
  const [main] = pieces;
  const width = 2 * usualHalfWidthKm(main);
  return finding(
    'corridor',
    [
      `If it hits, it comes down ${placeOf(main, width)}${share(corridor)}.`,
      when(corridor),
      `It enters at ${range(airSpeedKmS, (value) => formatSpeed(value))} against the air, ${range(airFlightPathAngleDeg.map((angle) => -angle).reverse(), (value) => formatDegrees(value, 0))} below the horizontal (90\u2009% of the cases).`,
      ...(corridor.effectiveClones < FEW_CLONES
        ? [
            `This rests on ${corridor.clones} impacting ${corridor.clones === 1 ? 'clone' : 'clones'}, as good as ${formatNumber(corridor.effectiveClones, 0)} of equal weight: its shape is hardly known.`,
          ]
        : []),
      'Flight without air to the ground; air would shorten it by some kilometres or more.',
    ].join(' '),
    [
      km('length of the strip', main.lengthKm),
      km('its width, 2 σ', width),
      kmS('entry speed against the air, median', airSpeedKmS[1]),
      figure('impacting clones, effective number', corridor.effectiveClones, '', 0),
    ],
    {
      model: 'impacting clones, carried by the n-body model to the ground without air',
      formula: 'mean places of sections of each connected strip; deviation across; quantiles',
      source: 'Kish 1965; Tenenbaum et al. 2000; Scott 1992',
    },
    corridor.medianEntry.tdbSeconds,
    caution,
  );
}

function placeOf({ axis, lengthKm }: Piece, width: number): string {
  const [first] = axis;
  const last = axis[axis.length - 1];
  const at = (point: typeof first): string => formatPlace(point.latitudeDeg, point.longitudeDeg);
  if (axis.length === 1) {
    const size = width > 0 ? `, on a spot about ${roughKm(width)} wide` : '';
    return `near ${at(first)}${size}`;
  }
  if (width > WIDE * lengthKm) {
    return `on an area about ${roughKm(lengthKm)} by ${roughKm(width)} (2\u2009σ) whose middle line runs from near ${at(first)} to near ${at(last)}`;
  }
  return `on a strip from ${at(first)} to ${at(last)}, ${roughKm(lengthKm)} long and about ${roughKm(width)} wide (2\u2009σ)`;
}

function share({ pieces, probability }: ReportCorridor): string {
  if (pieces.length === 1) return '';
  const percent = formatNumber((100 * pieces[0].probability) / probability, 0);
  const others = pieces.length - 1;
  return ` in ${percent}\u2009% of the cases, else on ${others === 1 ? 'another strip' : `one of ${others} others`}`;
}

function when({ firstEntry, medianEntry, lastEntry, pieces }: ReportCorridor): string {
  const lasts = lastEntry.tdbSeconds - firstEntry.tdbSeconds;
  if (lasts > ONE_DATE_S) {
    return `The likeliest strip is met on ${formatMoment(pieces[0].axis[0].entry.tdbSeconds)}; other strips are met on other days.`;
  }
  const within = lasts >= 1 ? `, all within ${formatDuration(lasts)}` : '';
  return `Entry is near ${formatMoment(medianEntry.tdbSeconds)}${within}.`;
}

function range(values: readonly number[], words: (value: number) => string): string {
  const low = words(values[0]);
  const high = words(values[values.length - 1]);
  return low === high ? low : `${low} to ${high}`;
}

function usualHalfWidthKm({ axis }: Piece): number {
  const widths = axis.map(({ halfWidthKm }) => halfWidthKm).sort((a, b) => a - b);
  return widths[widths.length >> 1];
}

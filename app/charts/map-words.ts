import type { ReportCorridor } from '../../core/report/corridor';
import type { Approach } from '../../core/report/report';
import { grouped, withUnit } from '../desk/figures';
import { type MapMark, placeWords } from './map-geometry';

/** The ground map in words, for those who do not see it. */
export function mapWords(
  approach: Approach,
  marks: readonly MapMark[],
  corridor: ReportCorridor | null,
): string {
  const track =
    'The track of the point beneath the object on a map of the Earth, with day and night at the moment of the clock.';
  const strip = corridor === null ? '' : ` ${corridorWords(corridor)}`;
  if (approach.outcome === 'pass') {
    return corridor === null
      ? `${track} The object passes and meets neither the atmosphere nor the ground.`
      : `${track} The nominal orbit passes.${strip}`;
  }
  return `${track} Marked: ${marks.map(({ words }) => words).join('; ')}.${strip}`;
}

/** Where the clones that hit come down. */
function corridorWords({ pieces }: ReportCorridor): string {
  if (pieces.length === 0) return 'Shaded: where it comes down if it hits.';
  const strips = pieces.map(({ axis, lengthKm }) => {
    const [first] = axis;
    const last = axis[axis.length - 1];
    const from = placeWords([first.longitudeDeg, first.latitudeDeg]);
    if (axis.length === 1) return `near ${from}`;
    const to = placeWords([last.longitudeDeg, last.latitudeDeg]);
    return `from ${from} to ${to}, ${withUnit(grouped(lengthKm), 'km')}`;
  });
  return `Shaded: where it comes down if it hits, ${strips.join('; ')}.`;
}

import type { Approach } from '../../core/report/report';
import type { MapMark } from './map-geometry';

/** The ground map in words, for those who do not see it. */
export function mapWords(approach: Approach, marks: readonly MapMark[]): string {
  const track =
    'The track of the point beneath the object on a map of the Earth, with day and night at the moment of the clock.';
  if (approach.outcome === 'pass') {
    return `${track} The object passes and meets neither the atmosphere nor the ground.`;
  }
  return `${track} Marked: ${marks.map(({ words }) => words).join('; ')}.`;
}

import { formatKm, formatNumber } from './figures';
import type { Approach, Finding, Report } from './report';

/** What findings are made of: the draft they are taken from, figures, names, and where figures come from. */

export type FindingsDraft = Pick<
  Report,
  | 'case'
  | 'model'
  | 'classical'
  | 'approaches'
  | 'principal'
  | 'comparison'
  | 'impactProbability'
  | 'corridor'
  | 'scales'
  | 'entryFlight'
>;

export const N_BODY: Finding['basis'] = {
  model: 'n-body integration (see the model section of the report)',
  formula: 'minimum of the distance to the centre of the body along the integrated trajectory',
  source:
    'Dormand–Prince 8(5,3): Hairer, Nørsett & Wanner 1993; ephemeris DE405: Standish 1998; equations: Newhall, Standish & Williams 1983',
};
export const HYPERBOLA: Finding['basis'] = {
  model: 'two-body hyperbola osculating the integrated trajectory',
  formula: 'v² = v∞² + 2GM/r;  b = q √(1 + 2GM/(q v∞²))',
  source: 'Bate, Mueller & White 1971',
};

type Figure = Finding['figures'][number];

export const figure = (
  label: string,
  value: number,
  unit: string,
  text: string | number,
): Figure => ({
  label,
  value,
  unit,
  text: typeof text === 'number' ? formatNumber(value, text) : text,
});

/** Whole kilometres, as in the sentences: the ephemeris itself is known to about one. */
export const km = (label: string, value: number): Figure =>
  figure(label, value, 'km', Math.abs(value) < 10 ? 1 : 0);
export const kmS = (label: string, value: number): Figure => figure(label, value, 'km/s', 3);
export const deg = (label: string, value: number): Figure => figure(label, value, '°', 2);

/** A supporting finding; `tdbSeconds` where it is about a moment. */
export function finding(
  id: string,
  text: string,
  figures: Figure[],
  basis: Finding['basis'],
  tdbSeconds: number | null = null,
  caution: string | null = null,
): Finding {
  return { id, kind: 'support', text, figures, basis, caution, tdbSeconds };
}

export const NAMES: Record<Approach['body'], string> = {
  Earth: 'the Earth',
  Moon: 'the Moon',
  Venus: 'Venus',
  Mars: 'Mars',
  Mercury: 'Mercury',
  Jupiter: 'Jupiter',
};

export const CENTRES: Record<Approach['body'], string> = {
  Earth: 'Earth’s centre',
  Moon: 'the Moon’s centre',
  Venus: 'the centre of Venus',
  Mars: 'the centre of Mars',
  Mercury: 'the centre of Mercury',
  Jupiter: 'the centre of Jupiter',
};

/** "16 240 km from Earth’s centre". */
export const fromCentre = ({ distanceKm, body }: Approach): string =>
  `${formatKm(distanceKm)} from ${CENTRES[body]}`;

/** "2.5 Earth radii". */
export function radii({ distanceRadii, body }: Approach): string {
  const n = formatNumber(distanceRadii, distanceRadii < 100 ? 1 : 0);
  if (body === 'Earth') return `${n} Earth radii`;
  return body === 'Moon' ? `${n} lunar radii` : `${n} of its radii`;
}

import { AU_KM } from '../constants';
import type { ElementLabel } from '../uncertainty/covariance';
import { type DeviationKind, deviationUnit } from './deviation-units';
import type { Fielding } from './fielding';
import { plainNumber, type RawDeviation, remark } from './raw';
import type { Axes, FieldName, OrbitCase } from './types';
import { LENGTH_UNITS, SPEED_UNITS } from './vocabulary';

/** Standard deviations made a covariance: uncorrelated, which is assumed in the open. */

const STATE: readonly FieldName[] = ['x', 'y', 'z', 'vx', 'vy', 'vz'];
const ELEMENTS: readonly [ElementLabel, FieldName, DeviationKind | null][] = [
  ['e', 'eccentricity', null],
  ['q', 'periapsisDistance', 'length'],
  ['a', 'semiMajorAxis', 'length'],
  ['tp', 'periapsisTime', 'time'],
  ['M', 'meanAnomaly', 'angle'],
  ['node', 'node', 'angle'],
  ['peri', 'argumentOfPeriapsis', 'angle'],
  ['i', 'inclination', 'angle'],
  ['A1', 'a1', null],
  ['A2', 'a2', null],
  ['A3', 'a3', null],
];

type Covariance = NonNullable<OrbitCase['covariance']>;

/** Unit taken where none is said, as sizes in km, km/s, degrees and days. */
function ownSize(f: Fielding, kind: DeviationKind): number {
  if (kind === 'angle' || kind === 'time') return 1;
  const field = kind === 'length' ? 'lengthUnit' : 'speedUnit';
  const shown = f.fields.find((item) => item.field === field)?.value;
  const words = kind === 'length' ? LENGTH_UNITS : SPEED_UNITS;
  return words.find(({ value }) => value === shown)?.size ?? 1;
}

/**
 * The covariance of standard deviations beside a state or elements, as a field that is assumed.
 *
 * @returns null when there are none, or with problems when they are not a set
 */
export function deviationCovariance(
  f: Fielding,
  given: ReadonlyMap<FieldName, RawDeviation>,
  state: OrbitCase['state'],
  axes: Axes,
): Covariance | null {
  if (given.size === 0) return null;
  const wanted: readonly (readonly [string, FieldName, DeviationKind | null])[] =
    state.kind === 'cartesian'
      ? STATE.map((field, i) => [field, field, i < 3 ? 'length' : 'speed'] as const)
      : ELEMENTS.filter(([, field]) => given.has(field));
  const line = [...given.values()][0].line;
  if (!isSet(f, given, state, wanted, line)) return null;
  let noUnit = false;
  const sigmas = wanted.map(([label, field, kind]) => {
    const deviation = given.get(field);
    if (deviation === undefined) return null;
    const { unit } = deviation;
    const said = unit === null ? null : deviationUnit(unit);
    const value = plainNumber(deviation.text);
    if (value === null || value <= 0 || (said !== null && said.kind !== kind)) {
      const what =
        value === null || value <= 0
          ? 'a standard deviation above zero'
          : `a unit of ${kind ?? 'none'}`;
      const read = `${deviation.text}${unit === null ? '' : ` ${unit}`}`;
      const message = `σ of ${label}: read “${read}”; expected ${what}.`;
      f.problems.push(remark('error', deviation.line, 'covariance', read, message));
      return null;
    }
    if (kind !== null && said === null) noUnit = true;
    const size = said?.size ?? (kind === null ? 1 : ownSize(f, kind));
    return (value * size) / deviation.times;
  });
  const all = sigmas.filter((value) => value !== null);
  if (all.length < wanted.length) return null;
  const units = noUnit ? '; without a unit, taken in those of the state (angles °, time d)' : '';
  const times = [...given.values()].find((item) => item.times !== 1)?.times;
  const counted = times === undefined ? '' : `; given as ${times} σ, divided by it`;
  const note = `the text gives no correlations: taken as uncorrelated, in the axes of the state${units}${counted}`;
  const words = wanted.map(([label], i) => `${label} ${inWords(label, all[i])}`).join(', ');
  f.show('covariance', 'covariance', `σ ${words}; uncorrelated`, null, note);
  f.note(line, 'covariance', '', `Standard deviations were read: σ ${words}; ${note}.`);
  if (state.kind === 'cartesian') {
    const lowerTriangle = all.flatMap((sigma, i) => [...Array<number>(i).fill(0), sigma ** 2]);
    return { kind: 'cartesian', frame: axes, lowerTriangle };
  }
  const labels = ELEMENTS.filter(([, field]) => given.has(field)).map(([label]) => label);
  const inAu = all.map((sigma, i) =>
    labels[i] === 'q' || labels[i] === 'a' ? sigma / AU_KM : sigma,
  );
  const matrix = inAu.map((sigma, i) => inAu.map((_, j) => (i === j ? sigma ** 2 : 0)));
  return { kind: 'elements', labels, matrix };
}

const UNIT_SHOWN: Readonly<Record<string, string>> = {
  ...{ x: ' km', y: ' km', z: ' km', vx: ' km/s', vy: ' km/s', vz: ' km/s' },
  ...{ q: ' km', a: ' km', tp: ' d', M: '°', node: '°', peri: '°', i: '°' },
  ...{ A1: ' au/d²', A2: ' au/d²', A3: ' au/d²' },
};
const inWords = (label: string, sigma: number): string =>
  `${Number(sigma.toPrecision(4))}${UNIT_SHOWN[label] ?? ''}`;

/** Six of a state, or a whole set of elements and nothing else; said when it is not. */
function isSet(
  f: Fielding,
  given: ReadonlyMap<FieldName, RawDeviation>,
  state: OrbitCase['state'],
  wanted: readonly (readonly [string, FieldName, DeviationKind | null])[],
  line: number,
): boolean {
  const fields = wanted.map(([, field]) => field);
  const one = (...of: FieldName[]): boolean => of.filter((field) => given.has(field)).length === 1;
  const isWhole =
    state.kind === 'cartesian'
      ? STATE.every((field) => given.has(field))
      : one('periapsisDistance', 'semiMajorAxis') &&
        one('periapsisTime', 'meanAnomaly') &&
        one('eccentricity') &&
        one('node') &&
        one('argumentOfPeriapsis') &&
        one('inclination');
  const other = [...given.keys()].filter((field) => !fields.includes(field));
  if (isWhole && other.length === 0) return true;
  const names = [...given].map(([field, { text }]) => `${field} ${text}`).join(', ');
  const expected =
    state.kind === 'cartesian'
      ? 'σ of x, y, z, vx, vy and vz'
      : 'σ of e, q or a, tp or M, node, peri and i (and of A1, A2, A3 where they are uncertain)';
  f.problems.push(
    remark(
      'warning',
      line,
      'uncertainty',
      [...given.values()].map(({ text }) => text).join(', '),
      `Uncertainties are not used: read σ of ${names}; a covariance needs ${expected}.`,
    ),
  );
  return false;
}

/** σ that no orbit solution has: said, since units may be wrong. */
export function tellOddDeviations(f: Fielding, covariance: Covariance, line: number | null): void {
  if (covariance.kind !== 'cartesian') return;
  const diagonal = [0, 2, 5, 9, 14, 20].map((at) => Math.sqrt(covariance.lowerTriangle[at]));
  const position = diagonal.slice(0, 3);
  const velocity = diagonal.slice(3);
  const odd = [
    position.some((km) => km > AU_KM) ? 'σ of position over 1 au' : null,
    velocity.some((kmS) => kmS > 10) ? 'σ of velocity over 10 km/s' : null,
    position.some((km) => km > 0 && km < 1e-6) ? 'σ of position under 1 mm' : null,
  ].filter((item) => item !== null);
  if (odd.length === 0) return;
  const message = `The covariance has ${odd.join(' and ')}: are its units (km, km/s) right?`;
  f.problems.push(remark('warning', line, 'covariance', '', message));
}

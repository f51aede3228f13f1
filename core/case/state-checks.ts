import { AU_KM } from '../constants';
import type { Fielding } from './fielding';
import { remark } from './raw';
import { absurdity, escapeSpeedKmS, isPlausible } from './sanity';
import type { CartesianState, Centre, FieldName } from './types';
import { LENGTH_UNITS, SPEED_UNITS } from './vocabulary';

/** What is wrong or odd about a state, beside its line, with what would make sense of it. */

const AXES: readonly FieldName[] = ['x', 'y', 'z', 'vx', 'vy', 'vz'];
/** Excess speed about the Sun beyond which an object is worth a second look, km/s. */
const FAST_EXCESS_KM_S = 5;
/** Part of the escape speed about the Sun below which the orbit falls almost straight in. */
const SLOW_PART = 0.05;

export function checkState(f: Fielding, state: CartesianState, centre: Centre): void {
  const distanceKm = Math.hypot(...state.positionKm);
  const speedKmS = Math.hypot(...state.velocityKmS);
  tellRepeated(f, state);
  const bad = absurdity(centre, distanceKm, speedKmS);
  const tell = (severity: 'error' | 'warning', kind: 'position' | 'velocity', what: string) => {
    const first = f.raw(kind === 'position' ? 'x' : 'vx');
    const hint = otherUnits(f, centre, distanceKm, speedKmS);
    const message = `${kind}: ${what}. ${hint ?? 'Is the unit or the centre another one?'}`;
    f.problems.push(remark(severity, first?.line ?? null, kind, first?.text ?? '', message));
  };
  if (bad !== null) {
    tell('error', bad.field, bad.message);
    return;
  }
  if (centre !== 'Sun' && centre !== 'SSB') return;
  const escapeKmS = escapeSpeedKmS(centre, distanceKm);
  const excessKmS = Math.sqrt(Math.max(0, speedKmS ** 2 - escapeKmS ** 2));
  if (excessKmS > FAST_EXCESS_KM_S) {
    const words = `the orbit is a hyperbola about the Sun with ${excessKmS.toPrecision(3)} km/s to spare`;
    tell('warning', 'velocity', words);
  } else if (speedKmS < SLOW_PART * escapeKmS) {
    const words = `${speedKmS.toPrecision(3)} km/s at ${(distanceKm / AU_KM).toPrecision(3)} au: the orbit falls almost straight into the Sun`;
    tell('warning', 'velocity', words);
  }
}

/** The units, one of them changed, that would make an ordinary state of the same numbers. */
function otherUnits(
  f: Fielding,
  centre: Centre,
  distanceKm: number,
  speedKmS: number,
): string | null {
  const shown = (field: FieldName): string | undefined =>
    f.fields.find((item) => item.field === field)?.value;
  const length = LENGTH_UNITS.find(({ value }) => value === shown('lengthUnit'));
  const speed = SPEED_UNITS.find(({ value }) => value === shown('speedUnit'));
  if (length === undefined || speed === undefined || distanceKm === 0 || speedKmS === 0)
    return null;
  const found: string[] = [];
  for (const other of LENGTH_UNITS) {
    if (other === length) continue;
    const km = (distanceKm / length.size) * other.size;
    if (isPlausible(centre, km, speedKmS)) found.push(`the position in ${other.value}`);
  }
  for (const other of SPEED_UNITS) {
    if (other === speed) continue;
    const kmS = (speedKmS / speed.size) * other.size;
    if (isPlausible(centre, distanceKm, kmS)) found.push(`the velocity in ${other.value}`);
  }
  if (found.length === 0) return null;
  return `It was taken in ${length.value} and ${speed.value}; with ${found.join(' or ')} it would make sense.`;
}

/** A number that stands twice was perhaps pasted twice. */
function tellRepeated(f: Fielding, state: CartesianState): void {
  const numbers = [...state.positionKm, ...state.velocityKmS];
  for (const [i, field] of AXES.entries()) {
    const text = f.textOf(field) ?? '';
    const before = AXES.findIndex((_, j) => j < i && numbers[j] === numbers[i]);
    const digits = text.replace(/e.*$/i, '').replace(/\D/g, '').replace(/^0+/, '');
    // Short numbers such as 0 or 12.5 may well stand twice.
    if (before < 0 || digits.length < 5) continue;
    f.problems.push(
      remark(
        'warning',
        f.raw(field)?.line ?? null,
        field,
        text,
        `${field} and ${AXES[before]} are the same number, ${text}: was it pasted twice?`,
      ),
    );
  }
}

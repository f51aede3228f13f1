import { AU_KM } from '../constants';
import type { Epoch } from '../time/epoch';
import type { Fielding } from './fielding';
import { checkPhases, readPhase } from './orbit-phase';
import { problem } from './raw';
import type { Centre, ElementsState } from './types';
import { saidUnit, sizeOf } from './units';
import { LENGTH_UNITS } from './vocabulary';

/** Elements of a case, about its centre. */

/** Elements about the centre; null with problems. */
export function readElements(
  f: Fielding,
  centre: Centre | null,
  epoch: Epoch | null,
): ElementsState | null {
  const unit = saidUnit(f, 'lengthUnit', 'unit of length', LENGTH_UNITS);
  if (unit === undefined) return null;
  const assumedUnit = centre === 'Sun' || centre === 'SSB' || centre === null ? 'au' : 'km';
  const length = unit ?? assumedUnit;
  f.show(
    'lengthUnit',
    'unit of length',
    length,
    null,
    unit === null ? 'the text does not say; usual for elements' : null,
    LENGTH_UNITS.map(({ value, label }) => ({ value, label })),
  );
  const km = sizeOf(LENGTH_UNITS, length);
  const e = f.number('eccentricity', 'eccentricity', null, { from: 0, to: 1e4 });
  const a = f.number('semiMajorAxis', 'semi-major axis', length, { optional: true });
  const q = f.number('periapsisDistance', 'periapsis distance', length, {
    optional: true,
    from: 1e-12,
  });
  const inclinationDeg = f.number('inclination', 'inclination', '°', { from: -180, to: 180 });
  const nodeDeg = f.number('node', 'longitude of the ascending node', '°');
  const argumentOfPeriapsisDeg = f.number('argumentOfPeriapsis', 'argument of periapsis', '°');
  const phase = readPhase(f, e, epoch);
  if (e === null) return null;
  // One that was set by hand stands over the other.
  const overA = f.isEdited('periapsisDistance') && !f.isEdited('semiMajorAxis') && q !== null;
  const overQ = f.isEdited('semiMajorAxis') && !f.isEdited('periapsisDistance') && a !== null;
  const periapsis = periapsisOf(f, overA ? null : a, overQ ? null : q, e);
  if (
    periapsis === null ||
    inclinationDeg === null ||
    nodeDeg === null ||
    argumentOfPeriapsisDeg === null ||
    phase === null
  ) {
    return null;
  }
  const periapsisKm = periapsis * km;
  checkPhases(f, phase, { periapsisKm, eccentricity: e, centre: centre ?? 'Sun', epoch });
  if (centre === 'Sun' && (periapsisKm < 695700 || periapsisKm > 100 * AU_KM)) {
    const raw = f.raw('periapsisDistance') ?? f.raw('semiMajorAxis');
    f.problems.push(
      problem(
        'error',
        raw?.line ?? null,
        'periapsis distance',
        `${periapsis} ${length}`,
        'an orbit that passes outside the Sun and within 100 au of it',
        'Is the unit another one?',
      ),
    );
    return null;
  }
  return {
    kind: 'elements',
    periapsisKm,
    eccentricity: e,
    inclinationDeg,
    nodeDeg,
    argumentOfPeriapsisDeg,
    phase,
  };
}

/** Periapsis distance from a or q, in the unit given. */
function periapsisOf(f: Fielding, a: number | null, q: number | null, e: number): number | null {
  const raw = f.raw('semiMajorAxis');
  if (a === null && q === null) {
    f.problems.push(
      problem(
        'error',
        null,
        'size of the orbit',
        '',
        'a semi-major axis a or a periapsis distance q',
      ),
    );
    return null;
  }
  if (a === null || raw === null) return q;
  if (e === 1 || a === 0) {
    if (q !== null) return q;
    f.problems.push(
      problem(
        'error',
        raw.line,
        'semi-major axis',
        raw.text,
        'a periapsis distance q: a parabola has no semi-major axis',
      ),
    );
    return null;
  }
  if (e < 1 && a < 0) {
    f.problems.push(
      problem(
        'error',
        raw.line,
        'semi-major axis',
        raw.text,
        `a positive length for an eccentricity of ${e}`,
      ),
    );
    return null;
  }
  if (e > 1 && a > 0) {
    f.note(
      raw.line,
      'semi-major axis',
      raw.text,
      `semi-major axis: ${raw.text} is taken as −${raw.text}, since the orbit is a hyperbola.`,
    );
  }
  const fromA = Math.abs(a) * Math.abs(1 - e);
  if (q !== null && Math.abs(fromA - q) > 1e-6 * q) {
    f.problems.push(
      problem(
        'error',
        f.raw('periapsisDistance')?.line ?? raw.line,
        'periapsis distance',
        `q = ${q} beside a (1 − e) = ${fromA}`,
        'the same from both; leave one of a and q out',
      ),
    );
    return null;
  }
  return q ?? fromA;
}

import { EARTH_RADIUS_KM } from '../constants';
import { formatAu, formatDay, formatDuration, formatKm } from './figures';
import { type FindingsDraft, figure, finding, km } from './finding';
import type { Approach, Finding } from './report';

/** Findings about the two-body answer: against the n-body one, and the distance of the orbits. */

const PATCHED: Finding['basis'] = {
  model:
    'two-body motion about the Sun joined to a geocentric hyperbola at the sphere of influence',
  formula: 'Kepler’s equation; sphere of influence a (m/M)^(2/5)',
  source: 'Bate, Mueller & White 1971; Danby 1988',
};

const READ_AS: Record<Approach['outcome'], string> = {
  pass: 'a pass',
  atmosphere: 'a pass through the atmosphere',
  impact: 'an impact',
};

/** What the classical periapsis alone would be read as. */
function classicalOutcome(periapsisKm: number, belowInterface: boolean): Approach['outcome'] {
  if (periapsisKm < EARTH_RADIUS_KM) return 'impact';
  return belowInterface ? 'atmosphere' : 'pass';
}

export function classicalFinding(draft: FindingsDraft, main: Approach): Finding | null {
  const { comparison, classical } = draft;
  if (classical === null || main.body !== 'Earth') return null;
  if (comparison === null) {
    return finding(
      'classical-check',
      `The two-body orbits alone do not show this pass: they come closest, ${formatKm(classical.closest.distanceKm)}, on ${formatDay(classical.closest.tdbSeconds)}. The pulls they leave out decide here; the n-body answer stands.`,
      [km('two-body closest distance', classical.closest.distanceKm)],
      PATCHED,
      classical.closest.tdbSeconds,
    );
  }
  const periapsis = comparison.classicalPeriapsisKm;
  const focused =
    periapsis === null
      ? 'without entering the sphere of influence'
      : `focused to ${formatKm(periapsis)} by the hyperbola`;
  const late = comparison.classicalTimeMinusNBodyS;
  const alone =
    periapsis === null ? 'pass' : classicalOutcome(periapsis, classical.periapsisBelowInterface);
  const verdict =
    alone === main.outcome
      ? ''
      : ` By the classical chain alone this would have been read as ${READ_AS[alone]}.`;
  return finding(
    'classical-check',
    `The classical chain gives an unperturbed miss of ${formatKm(comparison.unperturbedDistanceKm)}, ${focused}, ${formatDuration(late)} ${late < 0 ? 'early' : 'late'}; the n-body answer is ${formatKm(comparison.nBodyDistanceKm)}. The difference is what the other pulls on the way do, and what joining two conics leaves out.${verdict}`,
    [
      km('unperturbed two-body miss', comparison.unperturbedDistanceKm),
      ...(periapsis === null ? [] : [km('periapsis by patched conics', periapsis)]),
      km('n-body distance', comparison.nBodyDistanceKm),
      figure('classical less n-body time', late, 's', 0),
    ],
    PATCHED,
    main.tdbSeconds,
  );
}

export function moidFinding({ classical }: FindingsDraft): Finding | null {
  if (classical === null) return null;
  const { distanceKm, distanceAu } = classical.moid;
  return finding(
    'moid',
    `The two orbits, as they are at the epoch, come within ${formatAu(distanceAu)} (${formatKm(distanceKm)}) of each other.`,
    [km('minimum orbit intersection distance', distanceKm)],
    {
      model: 'osculating heliocentric orbits of the object and of the Earth at the epoch',
      formula: 'least distance over both true anomalies',
      source: 'definition; damped Newton search, Levenberg 1944',
    },
  );
}

import {
  formatDay,
  formatDuration,
  formatKm,
  formatProbability,
  formatSmall,
  formatUtcDay,
} from './figures';
import { type FindingsDraft, figure, finding, fromCentre, N_BODY, NAMES } from './finding';
import { isOfPass } from './moon-pass';
import type { Approach, Finding } from './report';

/** Findings about the case as a whole: other approaches, how sure it is, what was assumed. */

export function othersFinding(draft: FindingsDraft, main: Approach | null): Finding | null {
  const others = draft.approaches.filter(
    (item) => item !== main && !(main !== null && isOfPass(item, main)),
  );
  if (others.length === 0) return null;
  const nearest = others.reduce((a, b) => (b.distanceKm < a.distanceKm ? b : a));
  const next = main === null ? undefined : others.find((item) => item.tdbSeconds > main.tdbSeconds);
  const where = (item: Approach): string => `${fromCentre(item)} on ${formatDay(item.tdbSeconds)}`;
  const { fromUtc, toUtc } = draft.model.span;
  const span = `from ${formatUtcDay(fromUtc)} to ${formatUtcDay(toUtc)}`;
  const many =
    others.length === 1
      ? `One other approach ${span}: ${where(nearest)}.`
      : `${others.length} other approaches ${span}; the nearest is ${where(nearest)}.`;
  const following = next === undefined || next === nearest ? '' : ` The next is ${where(next)}.`;
  const touching = others
    .filter((item) => item.outcome !== 'pass')
    .map(
      (item) =>
        ` On ${formatDay(item.tdbSeconds)} it ${item.outcome === 'impact' ? `strikes ${NAMES[item.body]}` : 'reaches the atmosphere'}.`,
    );
  return finding(
    'other-approaches',
    `${many}${following}${touching.join('')}`,
    [],
    N_BODY,
    nearest.tdbSeconds,
  );
}

const NOMINAL: Finding['basis'] = {
  model: 'one trajectory, from the state as given',
  formula: 'none',
  source: 'digits show how the model is computed, not how well the orbit is known',
};

const FIRST_ORDER: Finding['basis'] = {
  model:
    'covariance of the case carried to the approach by the variational equations (first order)',
  formula: 'P = Φ P₀ Φᵀ at the moving time of closest approach; Gaussian of B over the impact disc',
  source: 'Milani & Gronchi 2010; Montenbruck & Gill 2000',
};

const sigma = (label: string, value: number, unit: string): Finding['figures'][number] =>
  figure(label, value, unit, formatSmall(value));

/** @param hasClones other orbits within the uncertainty were carried */
export function certaintyFinding(main: Approach | null, hasClones: boolean): Finding {
  const given = main?.uncertainty;
  if (main === null) {
    return finding(
      'certainty',
      hasClones
        ? 'The nominal orbit makes no approach here; other orbits within its uncertainty were carried as clones.'
        : 'This is about the nominal orbit alone: what other orbits within its uncertainty do was not looked at.',
      [],
      NOMINAL,
    );
  }
  if (given === undefined) {
    return finding(
      'certainty',
      'No covariance was used: these are figures of the nominal orbit alone, and how sure they are is not known here.',
      [],
      NOMINAL,
    );
  }
  const [low, high] = given.distance3SigmaKm;
  const probability = main.impactProbability?.firstOrder ?? undefined;
  const hit =
    probability === undefined
      ? ''
      : ` The probability of impact is ${formatProbability(probability)} at first order.`;
  // An impact has no closest approach: its distance is that of the periapsis it aims at.
  const distance = main.outcome === 'impact' ? 'distance of the periapsis it aims at' : 'distance';
  return finding(
    'certainty',
    `By the covariance given, at first order (1\u2009σ): ${distance} ±\u2009${formatKm(given.sigmaDistanceKm)}, time ±\u2009${formatDuration(given.sigmaTimeS)}. The 3-σ range of that distance is ${formatKm(low)} to ${formatKm(high)}.${hit}`,
    [
      sigma('σ of distance', given.sigmaDistanceKm, 'km'),
      sigma('σ of time', given.sigmaTimeS, 's'),
      sigma('σ of speed', given.sigmaSpeedKmS, 'km/s'),
      ...(given.ellipse === null
        ? []
        : [
            sigma('1 σ on the target plane, major', given.ellipse.semiMajorKm, 'km'),
            sigma('1 σ on the target plane, minor', given.ellipse.semiMinorKm, 'km'),
          ]),
      ...(probability === undefined
        ? []
        : [
            figure(
              'probability of impact, first order',
              probability,
              '',
              formatProbability(probability),
            ),
          ]),
    ],
    FIRST_ORDER,
    main.tdbSeconds,
  );
}

/** "timeScale" as a person says it: "time scale". */
const inWords = (field: string): string =>
  field === 'gm'
    ? 'gravitational parameters'
    : field.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);

export function assumptionsFinding(draft: FindingsDraft): Finding | null {
  const of = (origin: 'assumed' | 'edited'): string[] =>
    draft.case.asAssumed
      .filter((item) => item.origin === origin)
      .map((item) => `${inWords(item.field)} ${item.value}`);
  const assumed = of('assumed');
  const edited = of('edited');
  const sentences = [
    ...(assumed.length === 0
      ? []
      : [
          `${assumed.length === 1 ? 'One field is not, or not wholly, in the text and was' : `${assumed.length} fields are not, or not wholly, in the text and were`} assumed: ${assumed.join('; ')}.`,
        ]),
    ...(edited.length === 0 ? [] : [`Set by hand: ${edited.join('; ')}.`]),
  ];
  if (sentences.length === 0) return null;
  return finding('assumptions', sentences.join(' '), [], {
    model: 'the case as understood',
    formula: 'none',
    source: 'each is marked on the case sheet and can be changed',
  });
}

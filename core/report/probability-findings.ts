import { tdbSecondsFromJdTdb } from '../time/convert';
import { formatIso } from '../time/format';
import { formatDay, formatNumber, formatProbability, formatSpeed } from './figures';
import { figure, finding, NAMES } from './finding';
import type { Finding, ImpactDate, ImpactProbability, Report } from './report';

/** Findings about the probability of impact: how likely, when, whether the methods agree. */

/** The probability as a sentence to follow the answer; null where it is zero or not known. */
export function probabilitySentence({
  impactProbability,
}: Pick<Report, 'impactProbability'>): string | null {
  const value = impactProbability?.adopted?.value ?? 0;
  return value > 0 ? `The probability that it strikes the Earth is ${chance(value)}.` : null;
}

const PERCENT_FROM = 0.001;
/** Named one by one; more are counted. */
const MOST_DATES = 3;

/** "0.19 %" or "1 in 23 000": what a person can weigh. */
function chance(p: number): string {
  if (p === 0) return 'zero';
  if (p >= 0.995) return 'above 99.5\u2009%';
  return p >= PERCENT_FROM
    ? `${formatNumber(100 * p, p < 0.1 ? 2 : 1)}\u2009%`
    : formatProbability(p);
}

const BASIS: Record<NonNullable<ImpactProbability['adopted']>['from'], Finding['basis']> = {
  'first-order': {
    model: 'covariance carried to the target plane by the variational equations',
    formula: 'Gaussian of B over the disc of the impact radius',
    source: 'Milani & Gronchi 2010',
  },
  ensemble: {
    model: 'clones drawn from the covariance, carried by the n-body model',
    formula: 'impacts / clones; exact binomial interval',
    source: 'Clopper & Pearson 1934; random numbers: Salmon et al. 2011, Wichura 1988',
  },
  'rare-event': {
    model: 'clones drawn where impacts are, weighted, carried by the n-body model',
    formula: 'mean of 1(hit) φ(z)/q(z) over a mixture about the likeliest impactors',
    source: 'Milani et al. 2005; Hasofer & Lind 1974; Owen & Zhou 2000; Rubinstein 1999',
  },
};

export function probabilityFindings(
  draft: Pick<Report, 'impactProbability'>,
  caution: string | null,
): Finding[] {
  const { impactProbability } = draft;
  if (impactProbability?.adopted === undefined) return [];
  return [
    probabilityFinding(impactProbability, caution),
    datesFinding(impactProbability, caution),
    agreementFinding(impactProbability),
    reliabilityFinding(impactProbability),
  ].filter((item) => item !== null);
}

function probabilityFinding(
  { adopted, ensemble, rareEvent, untilJdTdb }: ImpactProbability,
  caution: string | null,
): Finding | null {
  if (adopted === undefined) return null;
  const { value, range95, from } = adopted;
  // The end of the span is asked for in TDB: its midnight is still the day before in UTC.
  const until = `by ${formatIso(tdbSecondsFromJdTdb(untilJdTdb), 'TDB', 0).slice(0, 10)}`;
  const counted =
    ensemble === undefined
      ? ''
      : ` Of ${formatNumber(ensemble.count, 0)} clones ${ensemble.impacts === 0 ? 'none hits' : `${formatNumber(ensemble.impacts, 0)} ${ensemble.impacts === 1 ? 'hits' : 'hit'}`} the Earth.`;
  const answer =
    value === 0
      ? `No impact of the Earth ${until} was found within the uncertainty given.`
      : `The probability that it strikes the Earth ${until} is ${chance(value)} (95\u2009%: ${chance(range95[0])} to ${chance(range95[1])}).`;
  return finding(
    'impact-probability',
    `${answer}${counted}`,
    [
      figure('probability of impact', value, '', chance(value)),
      ...(rareEvent?.relativeError === undefined || rareEvent.relativeError === null
        ? []
        : [figure('its relative error, 1 σ', 100 * rareEvent.relativeError, '%', 0)]),
    ],
    BASIS[from],
    null,
    value > 0 ? caution : null,
  );
}

function datesFinding({ dates }: ImpactProbability, caution: string | null): Finding | null {
  if (dates.length === 0) return null;
  const likely = [...dates].sort((a, b) => b.value - a.value);
  const named = likely.slice(0, MOST_DATES);
  const say = (date: ImpactDate): string =>
    `${NAMES[date.body]} on ${formatDay(date.tdbSeconds)} (${chance(date.value)}, at ${formatSpeed(date.impactSpeedKmS)}${date.approach === null ? ', an approach that the nominal orbit does not make' : ''})`;
  const rest = likely.length - named.length;
  return finding(
    'impact-dates',
    `${named[0].value < 0.995 ? 'It may strike' : 'It strikes'} ${named.map(say).join('; ')}${rest > 0 ? `; and ${rest} less likely ${rest === 1 ? 'date' : 'dates'}` : ''}.`,
    named.map((date) =>
      figure(`${date.body}, ${formatDay(date.tdbSeconds)}`, date.value, '', chance(date.value)),
    ),
    {
      model: 'impacts among the clones, gathered by date (30 days apart or more)',
      formula: 'share of the clones, or sum of the weights, of each date',
      source: 'the clones; dates of the Moon from the plain clones only',
    },
    likely[0].tdbSeconds,
    caution,
  );
}

function agreementFinding({
  adopted,
  firstOrder,
  ensemble,
  rareEvent,
}: ImpactProbability): Finding | null {
  if (adopted === undefined) return null;
  const said = [
    ...(firstOrder === null ? [] : [`first order ${chance(firstOrder)}`]),
    ...(ensemble === undefined
      ? []
      : [`clones ${chance(ensemble.interval95[0])} to ${chance(ensemble.interval95[1])}`]),
    ...(rareEvent === undefined ? [] : [`rare-event estimate ${chance(rareEvent.value)}`]),
  ];
  return finding(
    'agreement',
    `Probability of impact by method: ${said.join('; ')}. ${adopted.why}`,
    [
      ...(firstOrder === null ? [] : [figure('first order', firstOrder, '', chance(firstOrder))]),
      ...(ensemble === undefined
        ? []
        : [figure('share of the clones', ensemble.value, '', chance(ensemble.value))]),
      ...(rareEvent === undefined
        ? []
        : [figure('rare-event estimate', rareEvent.value, '', chance(rareEvent.value))]),
    ],
    {
      model: 'the three estimates side by side',
      formula: '95 % ranges overlap; the first order within 1.25 times the range',
      source: 'our choice of the limits',
    },
  );
}

function reliabilityFinding({ reliability }: ImpactProbability): Finding | null {
  if (reliability === null) return null;
  return finding('reliability', reliability, [], {
    model: 'neighbouring clones on the line of variations',
    formula: 'growth of their distance from one approach to the next',
    source: 'the scan of the line',
  });
}

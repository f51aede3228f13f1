import { BODIES, SECONDS_PER_DAY } from '../constants';
import { jdFromTdbSeconds } from '../time/convert';
import { formatIso } from '../time/format';
import { type Adopted, adopt, intervalOf, type PlainCount } from '../uncertainty/adopt';
import type { ImpactGroup } from '../uncertainty/tally';
import { rounded } from './canonical';
import { formatNumber } from './figures';
import type { Approach, ImpactDate, ImpactProbability, LineOfVariations, Report } from './report';
import { instant } from './sections';

/** The rare-event estimate as the report tells of it. */
export interface RareSummary {
  method: string;
  value: number;
  /** 1 σ; null where no impact was found. */
  relativeError: number | null;
  samples: number;
  /** Where it stops being reliable, in words; null where nothing speaks against it. */
  reliability: string | null;
}

/** What the clones and the rare-event estimate found, in the report's form. */
export interface ProbabilityFacts {
  report: Report;
  epochTdbSeconds: number;
  /** Where the clones were carried to. */
  untilTdbSeconds: number;
  seed: number;
  plain: PlainCount;
  /** Impacts among the plain clones, weight one each. */
  plainGroups: readonly ImpactGroup[];
  /** Null where the plain clones hit often enough. */
  rare: RareSummary | null;
  /** Impacts of the rare-event estimate; the weights sum to its value. */
  rareGroups: readonly ImpactGroup[];
  /** Lines of variations, by index into the report's approaches. */
  lines: ReadonlyMap<number, LineOfVariations>;
}

/** Fewer impacts are not called a count. */
const COUNTABLE = 30;
/** A group of impacts this near a nominal approach belongs to it, s. */
const SAME_APPROACH_S = 30 * SECONDS_PER_DAY;

/**
 * The keys that the estimate adds to a report.
 *
 * @returns the probability over the span, and the approaches with their own
 */
export function probabilitySection(facts: ProbabilityFacts): {
  impactProbability: ImpactProbability;
  approaches: Report['approaches'];
} {
  const { report, epochTdbSeconds, plain, rare } = facts;
  const ahead = report.approaches.filter((item) => item.tdbSeconds > epochTdbSeconds);
  const firstOrders = ahead
    .filter((item) => item.body === 'Earth')
    .flatMap((item) => item.impactProbability?.firstOrder ?? []);
  const firstOrder =
    firstOrders.length === 0 ? null : 1 - firstOrders.reduce((miss, p) => miss * (1 - p), 1);
  return {
    impactProbability: rounded({
      ...keysOf(firstOrder, plain, rare, facts.lines.size > 0),
      dates: datesOf(facts),
      untilJdTdb: jdFromTdbSeconds(facts.untilTdbSeconds),
      seed: facts.seed,
      reliability: rare?.reliability ?? null,
    }),
    approaches: report.approaches.map((item, index) =>
      item.tdbSeconds > epochTdbSeconds && item.uncertainty !== undefined && isWatched(item)
        ? { ...item, ...rounded(ofApproach(item, index, facts)) }
        : item,
    ),
  };
}

/** Clones are watched at the Earth and the Moon; of other bodies they say nothing. */
const isWatched = ({ body }: Approach): boolean => body === 'Earth' || body === 'Moon';

type Keys = Pick<ImpactProbability, 'firstOrder' | 'ensemble' | 'rareEvent' | 'adopted'>;

function keysOf(
  firstOrder: number | null,
  plain: PlainCount,
  rare: Omit<RareSummary, 'reliability'> | null,
  hasLines: boolean,
): Keys {
  const adopted = adopt(firstOrder, plain, rare);
  return {
    firstOrder,
    ...(plain.count === 0
      ? {}
      : {
          ensemble: {
            count: plain.count,
            impacts: plain.impacts,
            value: plain.impacts / plain.count,
            interval95: intervalOf(plain),
          },
        }),
    ...(rare === null
      ? {}
      : {
          rareEvent: {
            method: rare.method,
            value: rare.value,
            relativeError: rare.relativeError,
            samples: rare.samples,
          },
        }),
    ...(adopted === null
      ? {}
      : {
          adopted: {
            value: adopted.value,
            range95: adopted.range95,
            from: adopted.from,
            why: whyOf(adopted, plain, hasLines),
          },
        }),
  };
}

/** Why this estimate, and whether the others agree: sentences. */
function whyOf(adopted: Adopted, plain: PlainCount, hasLines: boolean): string {
  const { from, value, firstOrderAgrees, ensembleAgrees } = adopted;
  const hits = `${plain.impacts === 0 ? 'none' : formatNumber(plain.impacts, 0)} of ${formatNumber(plain.count, 0)} clones`;
  const reasons: Record<Adopted['from'], string> = {
    'first-order': 'No clones were carried: this is the linear answer, which nothing has tested.',
    ensemble: `Counted: ${hits} carried by the n-body model hit.`,
    'rare-event':
      value === 0
        ? `Looked for and not found: ${hits} hit${hasLines ? ', and no way to an impact was found along the line of variations within 6.5\u2009σ' : '; there is no line of variations to search, since the nominal orbit has no approach of the Earth ahead'}.`
        : `Sampled where impacts are: ${hits} hit, ${plain.impacts < COUNTABLE ? 'too few to count' : 'a less sharp count'}.`,
  };
  const first =
    firstOrderAgrees === null
      ? ''
      : firstOrderAgrees
        ? ' The first order agrees.'
        : ' The first order does not agree: it takes the map from the epoch to the target plane for linear, which it is not over this uncertainty, and knows only the approaches of the nominal orbit. The clones are to be believed.';
  const ensemble =
    ensembleAgrees === null
      ? ''
      : ensembleAgrees
        ? ' The plain count agrees.'
        : ' The plain count does not agree: impacting regions were missed, or counted that are none. Neither is to be relied on; carry more clones.';
  return `${reasons[from]}${ensemble}${first}`;
}

function ofApproach(item: Approach, index: number, facts: ProbabilityFacts): Partial<Approach> {
  const { plain, rare } = facts;
  const mine = (group: ImpactGroup): boolean => approachOf(group, facts.report) === index;
  const impacts = sum(facts.plainGroups.filter(mine).map((group) => group.count));
  const groups = facts.rareGroups.filter(mine);
  const value = sum(groups.map((group) => group.weight));
  // The rare-event estimate is made for the Earth alone.
  const own =
    rare === null || item.body !== 'Earth'
      ? null
      : {
          method: rare.method,
          samples: rare.samples,
          value,
          relativeError:
            value === 0 ? null : Math.sqrt(sum(groups.map((group) => group.weight2))) / value,
        };
  const line = facts.lines.get(index);
  return {
    impactProbability: keysOf(
      item.impactProbability?.firstOrder ?? null,
      { count: plain.count, impacts },
      own,
      facts.lines.size > 0,
    ),
    ...(line === undefined || line.length === 0 ? {} : { lineOfVariations: line }),
  };
}

const sum = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0);

/** The nominal approach that a group of impacts belongs to, as an index; null for none. */
function approachOf({ body, meanTdbSeconds }: ImpactGroup, report: Report): number | null {
  let best: number | null = null;
  let nearest = SAME_APPROACH_S;
  for (const [i, item] of report.approaches.entries()) {
    const apart = Math.abs(item.tdbSeconds - meanTdbSeconds);
    if (item.body !== BODIES[body] || apart > nearest) continue;
    best = i;
    nearest = apart;
  }
  return best;
}

function datesOf(facts: ProbabilityFacts): ImpactDate[] {
  const { rare, plain } = facts;
  // The Earth's from the estimate that is adopted, the Moon's from the plain clones.
  const dates = facts.plainGroups
    .filter((group) => rare === null || BODIES[group.body] !== 'Earth')
    .map((group) => {
      const count = { count: plain.count, impacts: group.count };
      return dateOf(group, group.count / plain.count, intervalOf(count), facts.report);
    });
  const rareDates = facts.rareGroups.map((group) => {
    const spread = Math.exp((1.96 * Math.sqrt(group.weight2)) / group.weight);
    return dateOf(
      group,
      group.weight,
      [group.weight / spread, Math.min(1, group.weight * spread)],
      facts.report,
    );
  });
  return [...dates, ...rareDates].sort((a, b) => a.tdbSeconds - b.tdbSeconds);
}

function dateOf(
  group: ImpactGroup,
  value: number,
  range95: [number, number],
  report: Report,
): ImpactDate {
  return {
    body: BODIES[group.body] === 'Moon' ? 'Moon' : 'Earth',
    ...instant(group.meanTdbSeconds),
    firstUtc: formatIso(group.firstTdbSeconds, 'UTC', 0),
    lastUtc: formatIso(group.lastTdbSeconds, 'UTC', 0),
    approach: approachOf(group, report),
    value,
    range95,
    excessSpeedKmS: Number.isNaN(group.excessSpeedKmS) ? null : group.excessSpeedKmS,
    impactSpeedKmS: group.speedKmS,
  };
}

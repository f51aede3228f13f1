import type { EstimateBasis } from './assess';
import { BODY_INDEX, ENTRY_INTERFACE_ALTITUDE_KM, SECONDS_PER_DAY } from './constants';
import type { AirEntry } from './entry/earth-fixed';
import type { EstimateHost } from './events';
import { fly } from './fly';
import { clopperPearson } from './math/beta';
import { normalsOf } from './math/random';
import { rounded, sealReport } from './report/canonical';
import { corridorSection } from './report/corridor';
import { writeFindings } from './report/findings';
import { probabilitySection } from './report/probability-section';
import type { Report } from './report/report';
import { scalesSection } from './report/scales';
import { tdbSecondsFromEpoch } from './time/convert';
import { readEpochText } from './time/read';
import { CLONE_POINT, CLONE_ROW, type CloneOutcomes } from './uncertainty/clones';
import { type Corridor, corridorOf } from './uncertainty/corridor';
import { estimateRareEvent, linesOfVariations, type RareEvent } from './uncertainty/rare-event';
import { groupImpacts, type ImpactGroup, ImpactTally } from './uncertainty/tally';

/** More clones take longer than anyone waits, and sharpen nothing that matters. */
export const MOST_CLONES = 1_000_000;
/** Clones in a batch: part of what the result depends on, so it never changes with the machine. */
const BATCH = 500;
/** A clone's approach this far from the nominal one is another approach, s. */
const SAME_APPROACH_S = 30 * SECONDS_PER_DAY;
/** Flights through the air of the impacting clones, and of how many entries. */
const FLIGHTS = 1000;
const MOST_ENTRIES = 500;
/** Clones whose points are sent to be drawn. */
const DRAWN_CLONES = 20_000;
const NO_ROWS = new Float64Array(0);
/** Fewer impacts than these are less sharp than the rare-event estimate (6 %, 1 σ), and too few for a map. */
const ENOUGH_IMPACTS = 300;
/** Aim of the rare-event estimate, 1 σ relative. */
const RARE_RELATIVE_ERROR = 0.08;
/** Stream of the random numbers of the plain clones. */
const PLAIN_STREAM = 0;

/**
 * The estimate of the impact probability of one case: clones carried by the n-body model.
 *
 * The same seed and number of clones give the same result, whatever carries them and in however many
 * runs.
 */
export class Estimate {
  private batches = 0;
  private readonly tally = new ImpactTally();
  private carried = 0;
  private rare: RareEvent | null = null;
  private lines: RareEvent['lines'] | null = null;

  constructor(
    private readonly basis: EstimateBasis,
    private readonly seed: number,
  ) {}

  /** The nominal orbit's passes of the Earth that lie ahead. */
  private get passes(): Report['approaches'] {
    const { report, plan } = this.basis;
    return report.approaches.filter(
      (item) => item.body === 'Earth' && item.tdbSeconds > plan.epochTdbSeconds,
    );
  }

  /** Clones carried so far. */
  get count(): number {
    return this.carried;
  }

  /**
   * Carries clones until there are as many as wanted.
   *
   * @param wanted number of clones in all, rounded up to whole batches
   * @param host   carries batches, takes events, says when to stop
   * @returns      the report with the estimate in it; with what is known so far when it was stopped
   */
  async run(wanted: number, host: EstimateHost): Promise<Report> {
    await this.carryPlain(wanted, host);
    if (!host.stopped()) await this.estimateRest(host);
    const report = this.report();
    host.emit({ type: 'report', report });
    return report;
  }

  /** Lines of variations; and where plain clones hit too seldom, the rare-event estimate. */
  private async estimateRest(host: EstimateHost): Promise<void> {
    const { carry, parallel, stopped } = host;
    const nominal = this.passes.map(({ tdbSeconds }) => ({ tdbSeconds, direction: null }));
    if (this.tally.earth >= ENOUGH_IMPACTS) {
      this.rare = null;
      this.lines ??= await linesOfVariations({
        carry,
        parallel,
        dimension: this.basis.plan.dimension,
        nominal,
        stopped,
      });
      return;
    }
    if (this.rare !== null) return;
    const rare = await estimateRareEvent({
      dimension: this.basis.plan.dimension,
      seed: this.seed,
      parallel,
      carry,
      nominal,
      relativeError: RARE_RELATIVE_ERROR,
      progress: (note, fraction) => host.emit({ type: 'progress', fraction, note }),
      stopped,
    });
    if (stopped()) return;
    this.rare = rare;
    this.lines = rare.lines;
    this.emitPoints(rare.impacts.rows, 0, this.carried, 'rare', host);
  }

  private async carryPlain(wanted: number, host: EstimateHost): Promise<void> {
    const goal = Math.ceil(wanted / BATCH);
    const { dimension } = this.basis.plan;
    const fly = async (batch: number): Promise<{ batch: number; outcomes: CloneOutcomes }> => {
      const z = new Float64Array(BATCH * dimension);
      normalsOf(this.seed, PLAIN_STREAM, batch * BATCH, BATCH, dimension, z);
      return { batch, outcomes: await host.carry(z) };
    };
    // Batches are taken in their order, so that a stop leaves a whole number of them.
    const flying: Promise<{ batch: number; outcomes: CloneOutcomes }>[] = [];
    let next = this.batches;
    while (this.batches < goal) {
      while (next < goal && flying.length < host.parallel && !host.stopped()) {
        flying.push(fly(next));
        next += 1;
      }
      const first = flying.shift();
      if (first === undefined) break;
      const { batch, outcomes } = await first;
      this.batches += 1;
      this.carried += outcomes.count;
      this.tally.add(outcomes.rows);
      host.emit({
        type: 'progress',
        fraction: this.batches / goal,
        note: 'carrying clones',
      });
      const drawn = batch * BATCH < DRAWN_CLONES ? outcomes.rows : NO_ROWS;
      this.emitPoints(drawn, batch * BATCH, goal * BATCH, 'plain', host);
    }
  }

  /** Sends the points at the principal approach of what was carried. */
  private emitPoints(
    rows: Float64Array,
    firstClone: number,
    wanted: number,
    drawn: 'plain' | 'rare',
    host: EstimateHost,
  ): void {
    const { report } = this.basis;
    const count = this.carried;
    const impacts = this.tally.earth;
    const principal = report.principal === null ? null : report.approaches[report.principal];
    if (report.principal === null || principal === null) return;
    const body = BODY_INDEX[principal.body];
    const points: number[] = [];
    for (let at = 0; at < rows.length; at += CLONE_ROW.size) {
      const laterS = rows[at + CLONE_ROW.tdbSeconds] - principal.tdbSeconds;
      const bT = rows[at + CLONE_ROW.bDotTKm];
      if (rows[at + CLONE_ROW.body] !== body || Math.abs(laterS) > SAME_APPROACH_S) continue;
      if (Number.isNaN(bT)) continue;
      const point = new Array<number>(CLONE_POINT.size);
      point[CLONE_POINT.clone] = firstClone + rows[at + CLONE_ROW.clone];
      point[CLONE_POINT.bDotTKm] = bT;
      point[CLONE_POINT.bDotRKm] = rows[at + CLONE_ROW.bDotRKm];
      point[CLONE_POINT.laterS] = laterS;
      point[CLONE_POINT.distanceKm] = rows[at + CLONE_ROW.distanceKm];
      point[CLONE_POINT.speedKmS] = rows[at + CLONE_ROW.speedKmS];
      point[CLONE_POINT.outcome] = rows[at + CLONE_ROW.outcome];
      points.push(...point);
    }
    host.emit({
      type: 'clones',
      approach: report.principal,
      count,
      wanted,
      impacts,
      interval95: rounded(clopperPearson(impacts, count, 0.95)),
      points: Float32Array.from(points),
      drawn,
    });
  }

  private report(): Report {
    const { report, plan } = this.basis;
    // Where plain clones hit often the estimate is a count of a few more: the ensemble's own is the one.
    const rare = this.rare?.isPlain === true ? null : this.rare;
    const plainGroups = this.tally.groups();
    const rareGroups = rare === null ? [] : groupImpacts(rare.impacts.rows, rare.impacts.weights);
    const likeliest = likeliestOfEarth(rare === null ? plainGroups : rareGroups, rare === null);
    const corridor =
      likeliest === null
        ? null
        : corridorOfGroup(likeliest, rare === null ? 1 / this.carried : null);
    const flight =
      likeliest === null || report.entryFlight !== undefined
        ? null
        : fly(report.case.physical, entriesOf(likeliest), 'impacting clones', FLIGHTS);
    const { fingerprint: _, findings: __, cautions: ___, ...sections } = report;
    const probability = probabilitySection({
      report,
      epochTdbSeconds: plan.epochTdbSeconds,
      untilTdbSeconds: plan.toTdbSeconds,
      seed: this.seed,
      plain: { count: this.carried, impacts: this.tally.earth },
      plainGroups,
      rare,
      rareGroups,
      lines: new Map(
        (this.lines ?? []).map(({ nominal, points }) => [
          report.approaches.indexOf(this.passes[nominal]),
          points.filter((point) => !Number.isNaN(point.bDotTKm)),
        ]),
      ),
    });
    const scales = scalesSection({
      dates: probability.impactProbability.dates,
      physical: report.case.physical,
      madeAtTdbSeconds: dayOfMaking(report.madeAt) ?? plan.epochTdbSeconds,
      epochTdbSeconds: plan.epochTdbSeconds,
    });
    const draft = {
      ...sections,
      ...probability,
      ...(corridor === null ? {} : { corridor: rounded(corridorSection(corridor)) }),
      ...(scales === null ? {} : { scales: rounded(scales) }),
      ...(flight === null ? {} : { entryFlight: flight }),
    };
    return sealReport({ ...draft, ...writeFindings(draft) });
  }
}

/**
 * Start of the UTC day of making, TDB seconds past J2000; null where it cannot be read. The day alone,
 * so that a report made again the same day is the same.
 */
function dayOfMaking(madeAt: string): number | null {
  const reading = readEpochText(madeAt);
  if (reading === null) return null;
  return tdbSecondsFromEpoch({ scale: 'UTC', mjd: reading.mjd, secondOfDay: 0 });
}

/** Impacts of the Earth on the likeliest date; null when there are none. */
function likeliestOfEarth(groups: readonly ImpactGroup[], counted: boolean): ImpactGroup | null {
  const size = ({ count, weight }: ImpactGroup): number => (counted ? count : weight);
  return groups
    .filter(({ body }) => body === BODY_INDEX.Earth)
    .reduce<ImpactGroup | null>(
      (best, one) => (best === null || size(one) > size(best) ? one : best),
      null,
    );
}

/** @param each probability of a plain clone; null where the rows have their weights */
function corridorOfGroup(group: ImpactGroup, each: number | null): Corridor | null {
  // Of very many impacts only some rows are kept: they stand for all.
  const scale = each === null ? 1 : (each * group.count) / group.weight;
  return corridorOf(
    group.rows,
    group.weights.map((weight) => weight * scale),
  );
}

/** Entries of the impacting clones, each as likely: at even steps of the summed weights. */
function entriesOf({ rows, weights, weight }: ImpactGroup): AirEntry[] {
  const entries: AirEntry[] = [];
  const most = Math.min(MOST_ENTRIES, weights.length);
  let sum = 0;
  for (let i = 0; i < weights.length; i++) {
    sum += weights[i];
    const at = i * CLONE_ROW.size;
    while (entries.length < most && sum >= ((entries.length + 0.5) / most) * weight) {
      entries.push({
        latitudeRad: rows[at + CLONE_ROW.entryLatitudeRad],
        longitudeRad: rows[at + CLONE_ROW.entryLongitudeRad],
        altitudeKm: ENTRY_INTERFACE_ALTITUDE_KM,
        airSpeedKmS: rows[at + CLONE_ROW.entryAirSpeedKmS],
        airFlightPathAngleRad: rows[at + CLONE_ROW.entryAirFlightPathAngleRad],
        airAzimuthRad: rows[at + CLONE_ROW.entryAirAzimuthRad],
      });
    }
  }
  return entries;
}

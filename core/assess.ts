import { epochOf, type NormalisedCase, normaliseCase } from './case/normalise';
import type { OrbitCase } from './case/types';
import {
  AU_KM,
  BODY_INDEX,
  EARTH_RADIUS_KM,
  ENTRY_INTERFACE_ALTITUDE_KM,
  GM_KM3_S2,
  SECONDS_PER_DAY,
  SPHERE_OF_INFLUENCE_KM,
} from './constants';
import { createForceModel } from './dynamics/force-model';
import { INTEGRATION_TOLERANCE } from './dynamics/propagate';
import { Sampler } from './dynamics/samples';
import { assembleApproaches } from './encounter/approach';
import { integrateLeg, type Leg, type LegHost, LONGEST_STEP_S } from './encounter/leg';
import { principalOf } from './encounter/principal';
import type { EncounterEvent } from './encounter/scan';
import { EPHEMERIS_COVERAGE, type Ephemeris, loadEphemeris } from './ephemeris';
import { bodyState, earthFromBarycentre, earthMoonBarycentre } from './ephemeris/earth-moon';
import type { AssessHost, AssessInput } from './events';
import { fly } from './fly';
import { add } from './math/vector';
import { classicalEncounter } from './orbit/classical';
import { comparisonOf, endsInWords, orbitChange } from './pass-sections';
import { sealReport } from './report/canonical';
import { caseSection } from './report/case-section';
import { writeFindings } from './report/findings';
import { modelSection } from './report/model-section';
import { REPORT_VERSION, type Report } from './report/report';
import { approachSection, classicalSection } from './report/sections';
import { uncertaintiesOf } from './uncertainty/approaches';
import type { ClonePlan } from './uncertainty/clones';
import { factorOf } from './uncertainty/factor';

/** Thrown when the host says the assessment is no longer wanted. */
export class AssessmentCancelled extends Error {
  readonly code = 'assessment-cancelled';
  constructor() {
    super('The assessment was stopped.');
    this.name = 'AssessmentCancelled';
  }
}

/** What the estimate of the impact probability starts from. */
export interface EstimateBasis {
  plan: ClonePlan;
  report: Report;
}

export interface Assessed {
  report: Report;
  /** Null without a covariance. */
  estimate: EstimateBasis | null;
}

const DAY = SECONDS_PER_DAY;
const YEAR = 365.25 * DAY;
/** Default span of the search about the epoch; the rule stands in the report. */
const BEFORE_EPOCH_S = 30 * DAY;
const AFTER_EPOCH_S = YEAR;
const AFTER_APPROACH_S = 60 * DAY;
const LONGEST_S = 10 * YEAR;
const NEAR_APPROACH_KM = 0.05 * AU_KM;
const DEFAULT_RULE =
  'From 30 days before the epoch to the later of one year after it and 60 days past the first approach to the Earth within 0.05 au; ten years when there is none.';
const ASKED_RULE = 'As asked.';
/** Flights of the nominal entry through the air. */
const FLIGHTS = 200;
/** How far the classical chain looks past the end on a surface. */
const PAST_SURFACE_S = 30 * DAY;

/**
 * The pipeline: a case becomes a stream of states and, at the end, one report.
 *
 * @param input     the text, its reading and the case; the time of making is handed in
 * @param ephemeris filled with the files the span needs, as it goes
 * @param host      fetches files, takes events, lets messages through, says when to stop
 * @returns         the sealed report, also emitted as the last event, and what the estimate of the
 *                  impact probability starts from
 * @throws          AssessmentCancelled; EphemerisRangeError when the epoch or the asked span is not
 *                  covered; StepCollapse when the integration cannot go on
 */
export async function assess(
  input: AssessInput,
  ephemeris: Ephemeris,
  host: AssessHost,
): Promise<Assessed> {
  const orbit = input.case;
  const epoch = epochOf(orbit);
  const gm = GM_KM3_S2[orbit.model.gm];
  await loadEphemeris(ephemeris, epoch, epoch, host.fetchFile);
  if (orbit.span !== null) {
    const { fromTdbSeconds, toTdbSeconds } = orbit.span;
    await loadEphemeris(ephemeris, fromTdbSeconds, toTdbSeconds, host.fetchFile);
  }
  const normalised = normaliseCase(orbit, ephemeris);
  const from = orbit.span?.fromTdbSeconds ?? withinCoverage(epoch - BEFORE_EPOCH_S);
  const span = { from, to: (events: readonly EncounterEvent[]) => endOfSpan(orbit, epoch, events) };
  const { forward, backward } = await integrate(orbit, normalised, span, ephemeris, host);

  const to =
    forward.circled === null
      ? (forward.surface?.tdbSeconds ?? span.to(forward.events))
      : forward.reachedTdbSeconds;
  const records = assembleApproaches([...backward.events, ...forward.events], orbit.model.gm);
  const principal = principalOf(records);
  const { approaches: uncertainties, spread } = uncertaintiesOf(
    records,
    [backward, forward],
    normalised.covariance,
    orbit.model.gm,
    ephemeris,
  );
  if (spread !== null) host.emit({ type: 'spread', rows: spread });
  const classical = classicalEncounter({
    object: { r: normalised.positionKm, v: normalised.velocityKmS },
    earth: earthMoonBarycentre(ephemeris, epoch),
    gmSun: gm.Sun,
    gmEarthMoon: gm.Earth + gm.Moon,
    gmEarth: gm.Earth,
    earthOffset: (dtS) => earthFromBarycentre(ephemeris, withinCoverage(epoch + dtS)),
    // The two-body orbits know of no surface: they run on past it to their own closest approach.
    spanS: [
      from - epoch,
      withinCoverage(forward.surface === null ? to : to + PAST_SURFACE_S) - epoch,
    ],
    sphereOfInfluenceKm: SPHERE_OF_INFLUENCE_KM,
    entryRadiusKm: ENTRY_RADIUS_KM,
  });
  const draft: Omit<Report, 'fingerprint' | 'findings' | 'cautions'> = {
    format: 'skimline-report',
    version: REPORT_VERSION,
    madeAt: input.madeAt,
    case: caseSection(input, normalised),
    model: modelSection({
      gm: orbit.model.gm,
      coverageText: EPHEMERIS_COVERAGE.text,
      tolerance: INTEGRATION_TOLERANCE,
      nonGravitational: orbit.nonGravitational !== null,
      fromTdbSeconds:
        backward.circled === null
          ? (backward.surface?.tdbSeconds ?? from)
          : backward.reachedTdbSeconds,
      toTdbSeconds: to,
      rule: orbit.span === null ? DEFAULT_RULE : ASKED_RULE,
      trajectoryEnds: endsInWords(forward, backward),
    }),
    classical: classicalSection(classical, epoch, {
      sphereKm: SPHERE_OF_INFLUENCE_KM,
      sphereFormulaKm: AU_KM * (gm.Earth / gm.Sun) ** 0.4,
      entryKm: ENTRY_RADIUS_KM,
    }),
    approaches: records.map((record) => ({
      ...approachSection(record, uncertainties.get(record) ?? null),
      ...orbitChange(record, [backward, forward], ephemeris, gm.Sun),
    })),
    principal,
    comparison: comparisonOf(principal === null ? null : records[principal], classical, epoch),
  };
  const entry = principal === null ? null : records[principal].entry;
  const flight =
    entry === null ? null : fly(orbit.physical, [entry.point], 'nominal orbit', FLIGHTS);
  const whole = { ...draft, ...(flight === null ? {} : { entryFlight: flight }) };
  const report = sealReport({ ...whole, ...writeFindings(whole) });
  host.emit({ type: 'report', report });
  return {
    report,
    estimate: estimateBasis(orbit, normalised, ephemeris, report, span.to(forward.events)),
  };
}

/** The report alone. */
export async function runAssessment(
  input: AssessInput,
  ephemeris: Ephemeris,
  host: AssessHost,
): Promise<Report> {
  return (await assess(input, ephemeris, host)).report;
}

/** What the clones are drawn from; null without a covariance, or where nothing lies ahead. */
function estimateBasis(
  orbit: OrbitCase,
  normalised: NormalisedCase,
  ephemeris: Ephemeris,
  report: Report,
  toTdbSeconds: number,
): EstimateBasis | null {
  const { covariance, epochTdbSeconds, a1KmS2, a2KmS2, a3KmS2 } = normalised;
  if (covariance === null || toTdbSeconds <= epochTdbSeconds) return null;
  const { factor, dimension } = factorOf(covariance.matrix, 9);
  if (dimension === 0) return null;
  const forcesUncertain = factor.subarray(6 * dimension).some((value) => value !== 0);
  return {
    report,
    plan: {
      gm: orbit.model.gm,
      epochTdbSeconds,
      toTdbSeconds,
      state: barycentric(normalised, ephemeris),
      forces:
        orbit.nonGravitational === null && !forcesUncertain
          ? null
          : Float64Array.of(a1KmS2, a2KmS2, a3KmS2),
      factor,
      dimension,
    },
  };
}

const ENTRY_RADIUS_KM = EARTH_RADIUS_KM + ENTRY_INTERFACE_ALTITUDE_KM;

/** The nearest instant that the ephemeris covers. */
function withinCoverage(tdbSeconds: number): number {
  const { fromTdbSeconds, toTdbSeconds } = EPHEMERIS_COVERAGE;
  return Math.min(Math.max(tdbSeconds, fromTdbSeconds), toTdbSeconds);
}

function endOfSpan(orbit: OrbitCase, epoch: number, events: readonly EncounterEvent[]): number {
  if (orbit.span !== null) return orbit.span.toTdbSeconds;
  const near = events.find(
    (event) =>
      event.kind === 'minimum' && event.body === 'Earth' && event.distanceKm <= NEAR_APPROACH_KM,
  );
  const wanted =
    near === undefined
      ? epoch + LONGEST_S
      : Math.max(epoch + AFTER_EPOCH_S, near.tdbSeconds + AFTER_APPROACH_S);
  return withinCoverage(Math.min(wanted, epoch + LONGEST_S));
}

/** Both legs of the n-body answer, streamed as they go. */
async function integrate(
  orbit: OrbitCase,
  normalised: NormalisedCase,
  span: { from: number; to: (events: readonly EncounterEvent[]) => number },
  ephemeris: Ephemeris,
  host: AssessHost,
): Promise<{ forward: Leg; backward: Leg }> {
  const epoch = normalised.epochTdbSeconds;
  const gm = GM_KM3_S2[orbit.model.gm];
  const { positionKm, velocityKmS } = normalised;
  const model = createForceModel(ephemeris, {
    gm: orbit.model.gm,
    nonGravitational:
      orbit.nonGravitational === null
        ? null
        : { a1: normalised.a1KmS2, a2: normalised.a2KmS2, a3: normalised.a3KmS2 },
  });
  const plan = {
    model,
    ephemeris,
    sampler: new Sampler(ephemeris, epoch, positionKm, velocityKmS, gm.Sun),
    start: { tdbSeconds: epoch, state: barycentric(normalised, ephemeris) },
  };
  const legHost = (direction: 1 | -1, goal: (reached: number) => number): LegHost => ({
    prepare: async (tdbSeconds) => {
      const ahead = withinCoverage(tdbSeconds + direction * LONGEST_STEP_S);
      if (!ephemeris.covers(Math.min(tdbSeconds, ahead), Math.max(tdbSeconds, ahead))) {
        await loadEphemeris(
          ephemeris,
          Math.min(tdbSeconds, ahead),
          Math.max(tdbSeconds, ahead),
          host.fetchFile,
        );
      }
    },
    chunk: async (samples, reached) => {
      if (samples.length > 0) host.emit({ type: 'states', direction, samples });
      host.emit({
        type: 'progress',
        fraction: Math.min(1, (reached - epoch) / (goal(reached) - epoch)),
        note: direction === 1 ? 'integrating forward' : 'integrating backward',
      });
      await host.pause();
      if (host.cancelled()) throw new AssessmentCancelled();
    },
  });
  const forward = await integrateLeg(
    { ...plan, direction: 1, keepFrom: Math.max(span.from, epoch), goal: span.to },
    legHost(1, () => span.to([])),
  );
  const latest = Math.min(epoch, span.to(forward.events));
  const backward = await integrateLeg(
    { ...plan, direction: -1, keepFrom: latest, goal: () => span.from },
    legHost(-1, () => span.from),
  );
  return { forward, backward };
}

function barycentric(n: NormalisedCase, ephemeris: Ephemeris): Float64Array {
  const sun = bodyState(ephemeris, BODY_INDEX.Sun, n.epochTdbSeconds);
  return Float64Array.from([...add(n.positionKm, sun.r), ...add(n.velocityKmS, sun.v)]);
}

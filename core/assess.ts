import { epochOf, type NormalisedCase, normaliseCase } from './case/normalise';
import type { OrbitCase } from './case/types';
import {
  AU_KM,
  BODY_INDEX,
  EARTH_MOON_MASS_RATIO,
  EARTH_RADIUS_KM,
  ENTRY_INTERFACE_ALTITUDE_KM,
  GM_KM3_S2,
  SECONDS_PER_DAY,
  SPHERE_OF_INFLUENCE_KM,
} from './constants';
import { createForceModel } from './dynamics/force-model';
import { INTEGRATION_TOLERANCE } from './dynamics/propagate';
import { Sampler } from './dynamics/samples';
import { type ApproachRecord, assembleApproaches } from './encounter/approach';
import { integrateLeg, type Leg, type LegHost, LONGEST_STEP_S, stateInLeg } from './encounter/leg';
import type { EncounterEvent } from './encounter/scan';
import { EPHEMERIS_COVERAGE, type Ephemeris, loadEphemeris } from './ephemeris';
import type { AssessHost, AssessInput } from './events';
import { fly } from './fly';
import { icrfToEcliptic } from './frames/ecliptic';
import { add, scale, subtract, type Vec3, vec3 } from './math/vector';
import { type ClassicalEncounter, classicalEncounter } from './orbit/classical';
import { elementsFromState } from './orbit/elements';
import { sealReport } from './report/canonical';
import { caseSection } from './report/case-section';
import { writeFindings } from './report/findings';
import { modelSection } from './report/model-section';
import {
  type Approach,
  type Comparison,
  REPORT_VERSION,
  type Report,
  type ReportElements,
} from './report/report';
import { approachSection, classicalSection, elementsSection } from './report/sections';
import { jdFromTdbSeconds } from './time/convert';
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
/** The orbit before and after a pass is taken this far from it, or as far as the span allows. */
const ORBIT_CHANGE_S = 60 * DAY;
const LEAST_ORBIT_CHANGE_S = 5 * DAY;
/** Flights of the nominal entry through the air. */
const FLIGHTS = 200;
/** How far the classical chain looks past the end on a surface. */
const PAST_SURFACE_S = 30 * DAY;
/** A two-body approach this far in time from the n-body one is not the same pass. */
const SAME_PASS_S = 10 * DAY;

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

function bodyState(ephemeris: Ephemeris, body: number, tdbSeconds: number): { r: Vec3; v: Vec3 } {
  const base = Math.floor(tdbSeconds);
  const all = new Float64Array(66);
  ephemeris.states(base, tdbSeconds - base, all);
  return { r: vec3(all, body * 6), v: vec3(all, body * 6 + 3) };
}

function barycentric(n: NormalisedCase, ephemeris: Ephemeris): Float64Array {
  const sun = bodyState(ephemeris, BODY_INDEX.Sun, n.epochTdbSeconds);
  return Float64Array.from([...add(n.positionKm, sun.r), ...add(n.velocityKmS, sun.v)]);
}

/** The Earth's centre relative to the Earth–Moon barycentre. */
function earthFromBarycentre(ephemeris: Ephemeris, tdbSeconds: number): { r: Vec3; v: Vec3 } {
  const earth = bodyState(ephemeris, BODY_INDEX.Earth, tdbSeconds);
  const moon = bodyState(ephemeris, BODY_INDEX.Moon, tdbSeconds);
  const share = 1 / (1 + EARTH_MOON_MASS_RATIO);
  return {
    r: scale(subtract(earth.r, moon.r), share),
    v: scale(subtract(earth.v, moon.v), share),
  };
}

/** Heliocentric state of the Earth–Moon barycentre. */
function earthMoonBarycentre(ephemeris: Ephemeris, tdbSeconds: number): { r: Vec3; v: Vec3 } {
  const earth = bodyState(ephemeris, BODY_INDEX.Earth, tdbSeconds);
  const sun = bodyState(ephemeris, BODY_INDEX.Sun, tdbSeconds);
  const offset = earthFromBarycentre(ephemeris, tdbSeconds);
  return {
    r: subtract(subtract(earth.r, sun.r), offset.r),
    v: subtract(subtract(earth.v, sun.v), offset.v),
  };
}

/** The approach the briefing is about: an impact, else the nearest pass of the Earth, else of any. */
function principalOf(records: readonly ApproachRecord[]): number | null {
  const nearest = (wanted: (record: ApproachRecord) => boolean): number | null => {
    let best: number | null = null;
    for (const [i, record] of records.entries()) {
      if (!wanted(record)) continue;
      if (best === null || record.distanceKm < records[best].distanceKm) best = i;
    }
    return best;
  };
  return (
    nearest((record) => record.outcome === 'impact') ??
    nearest((record) => record.body === 'Earth') ??
    nearest(() => true)
  );
}

/** Heliocentric elements before and after a pass inside the Earth's sphere of influence. */
function orbitChange(
  record: ApproachRecord,
  legs: readonly Leg[],
  ephemeris: Ephemeris,
  gmSun: number,
): Pick<Approach, 'orbitBefore' | 'orbitAfter'> {
  if (record.body !== 'Earth' || record.distanceKm > SPHERE_OF_INFLUENCE_KM) return {};
  const at = (direction: 1 | -1): ReportElements | null => {
    const state = new Float64Array(6);
    for (let reach = ORBIT_CHANGE_S; reach >= LEAST_ORBIT_CHANGE_S; reach -= LEAST_ORBIT_CHANGE_S) {
      const tdbSeconds = record.tdbSeconds + direction * reach;
      if (!legs.some((leg) => stateInLeg(leg, tdbSeconds, state))) continue;
      const sun = bodyState(ephemeris, BODY_INDEX.Sun, tdbSeconds);
      return elementsSection(
        elementsFromState(
          icrfToEcliptic(subtract(vec3(state), sun.r)),
          icrfToEcliptic(subtract(vec3(state, 3), sun.v)),
          gmSun,
        ),
      );
    }
    return null;
  };
  const before = at(-1);
  const after = record.outcome === 'impact' ? null : at(1);
  return {
    ...(before === null ? {} : { orbitBefore: before }),
    ...(after === null ? {} : { orbitAfter: after }),
  };
}

/** The two answers for the principal pass of the Earth side by side. */
function comparisonOf(
  record: ApproachRecord | null,
  classical: ClassicalEncounter,
  epoch: number,
): Comparison | null {
  if (record === null || record.body !== 'Earth') return null;
  const unperturbed = classical.approaches
    .filter((item) => Math.abs(epoch + item.dtS - record.tdbSeconds) <= SAME_PASS_S)
    .sort((a, b) => a.distanceKm - b.distanceKm)[0];
  if (unperturbed === undefined) return null;
  const sameEntry = classical.closest.dtS === unperturbed.dtS;
  const periapsis = sameEntry ? classical.periapsis : null;
  return {
    jdTdb: jdFromTdbSeconds(record.tdbSeconds),
    unperturbedDistanceKm: unperturbed.distanceKm,
    classicalPeriapsisKm: periapsis?.distanceKm ?? null,
    nBodyDistanceKm: record.distanceKm,
    impactParameterKm: record.hyperbola?.impactParameterKm ?? null,
    classicalTimeMinusNBodyS: epoch + (periapsis?.dtS ?? unperturbed.dtS) - record.tdbSeconds,
  };
}

function endsInWords(forward: Leg, backward: Leg): string | null {
  const circled = forward.circled ?? backward.circled;
  const words = [
    ...(forward.surface === null
      ? []
      : [`It ends where it meets the surface of the ${forward.surface.body}.`]),
    ...(backward.surface === null
      ? []
      : [`It begins on the surface of the ${backward.surface.body}.`]),
    ...(circled === null
      ? []
      : [
          `The search was stopped after a hundred approaches: the object circles the ${circled}. Ask for a shorter span to see another part.`,
        ]),
  ];
  return words.length === 0 ? null : words.join(' ');
}

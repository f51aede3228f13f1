import * as v from 'valibot';
import type { EntryOutcome } from '../entry/breakup';
import type { EnsembleSummary, Percentiles } from '../entry/entry-ensemble';
import type { FlightSample } from '../entry/flight';
import type { KnownBody } from '../entry/known-body';
import type { Span } from '../entry/materials';

/** The flight through the air in the report: percentiles of an ensemble, and one flight in full. */

const finite = v.pipe(v.number(), v.finite());
const number = (description: string) => v.pipe(finite, v.description(description));
const text = (description: string) => v.pipe(v.string(), v.description(description));
const count = v.pipe(v.number(), v.integer(), v.minValue(0));
const percentiles = (description: string) =>
  v.nullable(
    v.pipe(
      v.tuple([finite, finite, finite, finite, finite]),
      v.description(`${description} 5, 25, 50, 75 and 95 %.`),
    ),
  );
const span = v.tuple([finite, finite, finite]);

const material = v.object({
  name: v.string(),
  share: number('Of the ensemble.'),
  densityKgM3: span,
  strengthPa: span,
  ablationS2Km2: span,
  weibullExponent: span,
  albedo: span,
  sources: v.array(v.string()),
});

const sample = v.object({
  seconds: finite,
  altitudeKm: finite,
  latitudeDeg: finite,
  longitudeDeg: finite,
  airSpeedKmS: finite,
  massKg: finite,
  dynamicPressureMPa: finite,
});

export const entryFlightSchema = v.object({
  model: text('How the bodies fly and come apart.'),
  caution: v.string(),
  from: v.picklist(['nominal orbit', 'impacting clones']),
  entries: v.pipe(count, v.description('Entry states that the ensemble draws from.')),
  members: count,
  /** Members of each fate; one that breaks and reaches the ground counts in both. */
  burst: count,
  reachGround: v.pipe(count, v.description('With at least half of their energy.')),
  skipOut: count,
  materials: v.array(material),
  diameterM: percentiles('Of a sphere.'),
  energyMt: percentiles('Kinetic energy at entry, Mt of TNT.'),
  breakAltitudeKm: percentiles('First break-up.'),
  burstAltitudeKm: percentiles('Where most energy per kilometre goes into the air.'),
  peakDepositionKtPerKm: percentiles('There.'),
  peakDynamicPressureMPa: percentiles('On the leading body.'),
  groundEnergyShare: percentiles('Of the energy at entry.'),
  /** A flight with customary values of an ordinary chondrite, as a pancake, from the first entry. */
  trajectory: v.object({
    diameterM: finite,
    densityKgM3: finite,
    strengthPa: finite,
    energyMt: finite,
    end: v.picklist(['skips out', 'reaches the ground', 'ends in the air']),
    breakAltitudeKm: v.nullable(finite),
    burstAltitudeKm: v.nullable(finite),
    samples: v.array(sample),
  }),
});

export type EntryFlight = v.InferOutput<typeof entryFlightSchema>;

export interface EntryFlightFacts {
  from: EntryFlight['from'];
  entries: number;
  known: KnownBody;
  summary: EnsembleSummary;
  outcome: EntryOutcome;
  track: readonly FlightSample[];
}

const MODEL =
  'Flight of a point mass over the turning WGS 84 Earth with J2, U.S. Standard Atmosphere 1976, drag and ablation; break-up where ram pressure reaches a strength that falls with size (Weibull); after it, half of the flights each, a spreading pancake (Chyba, Thomas & Zahnle 1993) and pieces with a cloud of dust (Wheeler, Register & Mathias 2017, from memory). Density, strength, ablation and albedo are drawn from published ranges.';
const CAUTION =
  'Ranges of a model, not a forecast and not a warning: protective action belongs to the responsible civil-protection authority. What a burst does on the ground is not modelled.';
/** Rows of the trajectory that are kept. */
const MOST_SAMPLES = 80;

const degrees = (radians: number): number => (radians * 180) / Math.PI;

export function entryFlightSection(facts: EntryFlightFacts): EntryFlight {
  const { summary, known, outcome, track } = facts;
  const { percentiles: of } = summary;
  const { body, strengthPa } = known.customary;
  const every = Math.max(1, Math.ceil(track.length / MOST_SAMPLES));
  return {
    model: MODEL,
    caution: CAUTION,
    from: facts.from,
    entries: facts.entries,
    members: summary.members,
    burst: summary.bursts,
    reachGround: summary.impacts,
    skipOut: summary.skips,
    materials: known.materials.map(({ material: m, weight }) => ({
      name: m.name,
      share: weight,
      densityKgM3: spanOf(m.densityKgM3),
      strengthPa: spanOf(m.strengthPa),
      ablationS2Km2: spanOf(m.ablationS2Km2),
      weibullExponent: spanOf(m.weibullExponent),
      albedo: spanOf(m.albedo),
      sources: [
        ...new Set([
          m.densitySource,
          m.strengthSource,
          m.ablationSource,
          m.weibullSource,
          m.albedoSource,
        ]),
      ],
    })),
    diameterM: five(of.diameterM, 1),
    energyMt: five(of.entryEnergyKt, 1e-3),
    breakAltitudeKm: five(of.breakAltitudeKm, 1),
    burstAltitudeKm: five(of.burstAltitudeKm, 1),
    peakDepositionKtPerKm: five(of.peakDepositionKtPerKm, 1),
    peakDynamicPressureMPa: five(of.peakDynamicPressurePa, 1e-6),
    groundEnergyShare: five(of.groundEnergyShare, 1),
    trajectory: {
      diameterM: 2 * Math.cbrt((3 * body.massKg) / (4 * Math.PI * body.densityKgM3)),
      densityKgM3: body.densityKgM3,
      strengthPa,
      energyMt: outcome.entryEnergyKt * 1e-3,
      end: outcome.end,
      breakAltitudeKm: outcome.breakAltitudeKm,
      burstAltitudeKm: outcome.burstAltitudeKm,
      samples: track
        .filter((_, i) => i % every === 0 || i === track.length - 1)
        .map((item) => ({
          seconds: item.seconds,
          altitudeKm: item.altitudeKm,
          latitudeDeg: degrees(item.latitudeRad),
          longitudeDeg: degrees(item.longitudeRad),
          airSpeedKmS: item.airSpeedKmS,
          massKg: item.massKg,
          dynamicPressureMPa: item.dynamicPressurePa * 1e-6,
        })),
    },
  };
}

const spanOf = ([low, middle, high]: Span): [number, number, number] => [low, middle, high];

function five(
  of: Percentiles | null,
  unit: number,
): [number, number, number, number, number] | null {
  return of === null
    ? null
    : [of.p5 * unit, of.p25 * unit, of.p50 * unit, of.p75 * unit, of.p95 * unit];
}

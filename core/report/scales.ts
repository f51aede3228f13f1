import * as v from 'valibot';
import { formatIso } from '../time/format';
import {
  cumulativePalermo,
  overRange,
  palermo,
  type TorinoRange,
  torino,
} from '../uncertainty/scales';
import { energyMt, type SizeInput, sizeOf } from '../uncertainty/size';

/** Palermo and Torino scale in the report, with the range that an unknown size gives. */

const finite = v.pipe(v.number(), v.finite());
const text = (description: string) => v.pipe(v.string(), v.description(description));
const range = (description: string) =>
  v.pipe(
    v.tuple([finite, finite, finite]),
    v.description(`${description} Least, nominal, largest.`),
  );
const level = v.pipe(v.number(), v.integer(), v.minValue(0), v.maxValue(10));
const palermoRange = v.nullable(
  range('Palermo scale; null where the probability is zero or the date is not ahead.'),
);
const torinoRange = v.nullable(
  v.pipe(
    v.tuple([level, level]),
    v.description(
      'Torino scale, least and most over the range of sizes and over the categories whose words fit; null outside the 100 years it is defined for.',
    ),
  ),
);

const dateScales = v.object({
  tdbSeconds: finite,
  utc: v.string(),
  probability: v.pipe(finite, v.description('As in the dates of impactProbability.')),
  yearsLeft: v.pipe(finite, v.description('From `countedFrom` to the date, Julian years.')),
  energyMt: range('Kinetic energy at the entry interface, Mt of TNT (4.184e15 J).'),
  palermo: palermoRange,
  torino: torinoRange,
});

export const scalesSchema = v.object({
  /** Null where the scales are given. */
  why: v.nullable(text('Why there are no scales.')),
  size: v.nullable(
    v.object({
      diameterM: range('Diameter of a sphere, m.'),
      densityKgM3: range('Bulk density.'),
      massKg: range('Mass.'),
    }),
  ),
  assumed: v.array(v.string()),
  /** The epoch where a date lies before the day of making. */
  countedFrom: v.picklist(['day-of-making', 'epoch']),
  dates: v.array(dateScales),
  cumulativePalermo: palermoRange,
  highestTorino: torinoRange,
  caution: v.string(),
});

export type Scales = v.InferOutput<typeof scalesSchema>;
type DateScales = Scales['dates'][number];

export interface ScalesInput {
  /** Of impactProbability; those of other bodies than the Earth are left out. */
  dates: readonly {
    body: string;
    tdbSeconds: number;
    value: number;
    impactSpeedKmS: number;
  }[];
  physical: SizeInput;
  /** Start of the day on which the report is made, TDB seconds past J2000. */
  madeAtTdbSeconds: number;
  /** Of the case, TDB seconds past J2000. */
  epochTdbSeconds: number;
}

const YEAR_S = 365.25 * 86400;
const CAUTION =
  'A scale value is an analysis of one orbit solution, not an announcement. Levels that go out to the public are those of the bodies that compute them for all objects; public warnings and protective action belong to the responsible civil-protection authority.';
const NO_SIZE =
  'Neither an absolute magnitude H nor a diameter is given, so there is no energy to put on the Palermo and Torino scales.';
const FROM_EPOCH =
  'A date lies before the day of making: the time left is counted from the epoch of the case.';

/**
 * The scales of all dates on which the Earth may be struck, and their sum.
 *
 * @returns null without such a date; with a `why` and no figures where the size is unknown
 */
export function scalesSection(input: ScalesInput): Scales | null {
  const dates = input.dates.filter(({ body }) => body === 'Earth');
  if (dates.length === 0) return null;
  const late = dates.some(({ tdbSeconds }) => tdbSeconds <= input.madeAtTdbSeconds);
  const from = late ? input.epochTdbSeconds : input.madeAtTdbSeconds;
  const countedFrom = late ? 'epoch' : 'day-of-making';
  const size = sizeOf(input.physical);
  if (size === null) {
    return {
      why: NO_SIZE,
      size: null,
      assumed: [],
      countedFrom,
      dates: [],
      cumulativePalermo: null,
      highestTorino: null,
      caution: CAUTION,
    };
  }
  const { diameterM, densityKgM3, massKg } = size;
  const all = dates.map(({ tdbSeconds, value, impactSpeedKmS }): DateScales => {
    const energy = energyMt(massKg, impactSpeedKmS);
    const left = tdbSeconds - from;
    return {
      tdbSeconds,
      utc: formatIso(tdbSeconds, 'UTC', 0),
      probability: value,
      yearsLeft: left / YEAR_S,
      energyMt: energy,
      palermo: complete(overRange(energy, (mt) => palermo(value, mt, left))),
      torino: spanOf(overRange(energy, (mt) => torino(value, mt, left))),
    };
  });
  return {
    why: null,
    size: { diameterM, densityKgM3, massKg },
    assumed: late ? [...size.assumed, FROM_EPOCH] : size.assumed,
    countedFrom,
    dates: all,
    cumulativePalermo: complete(
      at((i) => cumulativePalermo(all.map((date) => date.palermo?.[i] ?? null))),
    ),
    highestTorino: highest(all.map(({ torino: levels }) => levels)),
    caution: CAUTION,
  };
}

const at = <T>(of: (i: 0 | 1 | 2) => T): [T, T, T] => [of(0), of(1), of(2)];

function complete([low, nominal, high]: [number | null, number | null, number | null]):
  | [number, number, number]
  | null {
  return low === null || nominal === null || high === null ? null : [low, nominal, high];
}

function spanOf(levels: readonly (TorinoRange | null)[]): TorinoRange | null {
  const known = levels.filter((level) => level !== null);
  if (known.length === 0) return null;
  return [Math.min(...known.map(([low]) => low)), Math.max(...known.map(([, high]) => high))];
}

/** The highest of the dates: of their least and of their most. */
function highest(levels: readonly (TorinoRange | null)[]): TorinoRange | null {
  const known = levels.filter((level) => level !== null);
  if (known.length === 0) return null;
  return [Math.max(...known.map(([low]) => low)), Math.max(...known.map(([, high]) => high))];
}

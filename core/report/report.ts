import * as v from 'valibot';
import { corridorSchema } from './corridor';
import { entryFlightSchema } from './entry-flight';
import { scalesSchema } from './scales';

/**
 * The report: the one object every figure on the page, the plate and the files comes from.
 *
 * Units stand in the key names; angles are degrees, epochs Julian dates TDB (`jdTdb`) with the same
 * instant as TDB seconds past J2000 (`tdbSeconds`, full precision) and as UTC text.
 */

export const REPORT_VERSION = 1;

const finite = v.pipe(v.number(), v.finite());
const triple = v.tuple([finite, finite, finite]);
/** With a description that goes into the published schema. */
const number = (description: string) => v.pipe(finite, v.description(description));
const text = (description: string) => v.pipe(v.string(), v.description(description));
const vector = (description: string) => v.pipe(triple, v.description(description));
const instant = {
  jdTdb: number('Julian date, TDB.'),
  tdbSeconds: number('The same instant in full precision: TDB seconds past J2000.'),
  utc: text('The same instant as ISO 8601 UTC, rounded.'),
};

export const BOUNDARIES = [
  'sphere-of-influence',
  'moon-distance',
  'geosynchronous',
  'low-orbit-shell',
  'entry-sphere',
  'entry-interface',
  'ground',
] as const;

const bodyName = v.picklist(['Earth', 'Moon', 'Venus', 'Mars', 'Mercury', 'Jupiter']);

/** Heliocentric, on the ecliptic and equinox of J2000. */
const elements = v.object({
  semiMajorAxisKm: v.nullable(number('Negative for a hyperbola, null for a parabola.')),
  semiMajorAxisAu: v.nullable(finite),
  eccentricity: finite,
  periapsisKm: finite,
  periapsisAu: finite,
  inclinationDeg: finite,
  nodeDeg: finite,
  argumentOfPeriapsisDeg: finite,
  trueAnomalyDeg: finite,
  meanAnomalyDeg: v.nullable(finite),
  periodDays: v.nullable(number('Null for an orbit that is not closed.')),
  timeFromPeriapsisDays: number('Positive after periapsis.'),
});

const hyperbola = v.object({
  semiMajorAxisKm: finite,
  eccentricity: finite,
  periapsisKm: finite,
  impactParameterKm: number('Distance of the incoming asymptote from the centre, |h|/v∞.'),
  excessSpeedKmS: number('Speed at infinity, v∞.'),
  turnAngleDeg: number('Between the incoming and the outgoing asymptote.'),
  asymptoteTrueAnomalyDeg: finite,
  periapsisSpeedKmS: finite,
});

const targetPlane = v.object({
  bDotTKm: finite,
  bDotRKm: finite,
  xiKm: number('Across the projected heliocentric motion of the body.'),
  zetaKm: number('Against the projected heliocentric motion of the body.'),
  impactRadiusKm: number(
    'Impact parameter whose periapsis is the radius R of the body: R √(1 + 2GM/(R v∞²)).',
  ),
  s: vector('Direction of motion along the incoming asymptote; unit vector, ICRF.'),
  t: vector('S × K made unit, K the north pole of the ecliptic of J2000; ICRF.'),
  r: vector('S × T; ICRF.'),
});

const crossing = v.object({
  boundary: v.picklist(BOUNDARIES),
  direction: v.picklist(['in', 'out']),
  ...instant,
  distanceKm: finite,
  speedKmS: finite,
});

const entry = v.object({
  ...instant,
  latitudeDeg: number('Geodetic, WGS 84.'),
  longitudeDeg: number('East, above −180 up to 180.'),
  altitudeKm: number('Geodetic, over WGS 84.'),
  speedKmS: number('Geocentric, against axes that do not turn.'),
  airSpeedKmS: number('Against air that turns with the Earth.'),
  flightPathAngleDeg: number('Of the inertial velocity; negative below the horizontal.'),
  azimuthDeg: number('Of the inertial velocity, from north through east.'),
  airFlightPathAngleDeg: number('Of the velocity against the air; negative below the horizontal.'),
  airAzimuthDeg: number('Of the velocity against the air, from north through east.'),
});

/** Where the trajectory meets a surface: the ground in vacuum flight, or the Moon's surface. */
const surfaceImpact = v.object({
  ...instant,
  latitudeDeg: finite,
  longitudeDeg: number('East, above −180 up to 180.'),
  speedKmS: finite,
  flightPathAngleDeg: number('Negative below the horizontal.'),
  note: text('Which surface, and what is not modelled.'),
});

/** First-order uncertainty, from the covariance of the case by the variational equations. */
const uncertainty = v.object({
  sigmaDistanceKm: finite,
  sigmaTimeS: finite,
  sigmaSpeedKmS: finite,
  distance3SigmaKm: v.pipe(
    v.tuple([finite, finite]),
    v.description('Least and largest; never below zero.'),
  ),
  /** Null where the object is bound. */
  ellipse: v.nullable(
    v.object({
      semiMajorKm: number('1 σ on the target plane.'),
      semiMinorKm: number('1 σ on the target plane.'),
      angleTrDeg: number('Of the major axis, from T towards R.'),
      angleXiZetaDeg: number('Of the major axis, from ξ towards ζ.'),
      covarianceKm2: vector('Of B·T and B·R, km²: TT, TR, RR.'),
    }),
  ),
  stretchingEarthRadiiPerSigma: v.nullable(finite),
});

const interval = (description: string) =>
  v.pipe(v.tuple([finite, finite]), v.description(description));
const count = v.pipe(v.number(), v.integer(), v.minValue(0));

export const ESTIMATES = ['first-order', 'ensemble', 'rare-event'] as const;

/** Probability of impact by each method that was used, and the one to go by. */
const probabilityKeys = {
  firstOrder: v.nullable(
    number(
      'Gaussian of the target plane over the disc of the impact radius; null without a plane.',
    ),
  ),
  ensemble: v.optional(
    v.object({
      count,
      impacts: count,
      value: finite,
      interval95: interval('Clopper–Pearson, 95 %.'),
    }),
  ),
  rareEvent: v.optional(
    v.object({
      method: v.string(),
      value: finite,
      relativeError: v.nullable(number('1 σ, of the sampling; null where no impact was found.')),
      samples: count,
    }),
  ),
  adopted: v.optional(
    v.object({
      value: finite,
      range95: interval('Of the sampling, 95 %.'),
      from: v.picklist(ESTIMATES),
      why: text('Why this one, and whether the others agree.'),
    }),
  ),
};

/** Impacts of one body within some days of one another, from the clones. */
const impactDate = v.object({
  body: bodyName,
  ...instant,
  firstUtc: v.string(),
  lastUtc: v.string(),
  approach: v.nullable(
    number('Index into approaches; null where the nominal orbit makes no such approach.'),
  ),
  value: number('Probability of impact on this date.'),
  range95: interval('Of the sampling, 95 %.'),
  excessSpeedKmS: v.nullable(finite),
  impactSpeedKmS: number('At the entry interface (the Moon: at the surface), mean of the impacts.'),
});

/** Over the whole span, impacts of the Earth. */
const impactProbability = v.object({
  ...probabilityKeys,
  dates: v.array(impactDate),
  untilJdTdb: number(
    'To where the clones were carried; the nominal trajectory may end before, on the ground.',
  ),
  seed: v.nullable(count),
  /** Null where nothing speaks against it. */
  reliability: v.nullable(text('Where the estimate stops being reliable, and why.')),
});

/** On the line of variations, from clones carried by the n-body model. */
const lineOfVariations = v.array(
  v.object({
    sigma: number('Distance along the line at the epoch, in standard deviations.'),
    bDotTKm: finite,
    bDotRKm: finite,
    tdbSeconds: finite,
    distanceKm: finite,
  }),
);

const approach = v.object({
  body: bodyName,
  ...instant,
  distanceKm: number(
    'From the centre of the body; for an impact, of the periapsis it aims at and never reaches.',
  ),
  distanceRadii: number('The distance in radii of the body.'),
  speedKmS: number('Relative to the body, at that distance.'),
  excessSpeedKmS: v.nullable(number('Null where the object is bound to the body.')),
  outcome: v.picklist(['pass', 'atmosphere', 'impact']),
  osculatingAt: v.pipe(
    v.picklist(['closest-approach', 'entry-sphere', 'surface']),
    v.description('Where the hyperbola, the target plane and the excess speed osculate.'),
  ),
  hyperbola: v.nullable(hyperbola),
  targetPlane: v.nullable(targetPlane),
  crossings: v.array(crossing),
  entry: v.optional(entry),
  surfaceImpact: v.optional(surfaceImpact),
  uncertainty: v.optional(uncertainty),
  impactProbability: v.optional(v.object(probabilityKeys)),
  lineOfVariations: v.optional(lineOfVariations),
  /** Heliocentric elements before and after the pass, where the body is the Earth and inside its sphere of influence. */
  orbitBefore: v.optional(elements),
  orbitAfter: v.optional(elements),
});

const classical = v.object({
  method: text('What the chain takes for granted, in words.'),
  objectElements: elements,
  earthElements: elements,
  moid: v.object({
    distanceKm: finite,
    distanceAu: finite,
    objectTrueAnomalyDeg: finite,
    earthTrueAnomalyDeg: finite,
  }),
  closest: v.object({
    ...instant,
    distanceKm: number('Between the two-body orbits, without the pull of the Earth.'),
  }),
  sphereOfInfluence: v.object({
    radiusKm: number('As used.'),
    formulaRadiusKm: number('a (m/M)^(2/5).'),
  }),
  sphereEntry: v.nullable(
    v.object({
      ...instant,
      geocentricPositionKm: triple,
      geocentricVelocityKmS: triple,
      speedKmS: finite,
    }),
  ),
  hyperbola: v.nullable(hyperbola),
  periapsisBelowInterface: v.boolean(),
  interface: v.nullable(
    v.object({
      ...instant,
      radiusKm: finite,
      speedKmS: finite,
      flightPathAngleDeg: number('Negative below the horizontal.'),
      travelTimeS: number('From the sphere of influence to the interface.'),
    }),
  ),
  periapsis: v.nullable(
    v.object({ ...instant, distanceKm: finite, speedKmS: finite, travelTimeS: finite }),
  ),
});

/** The unperturbed miss against the focused one: how far the Earth's pull moves the pass. */
const comparison = v.object({
  jdTdb: number('Of the n-body approach.'),
  unperturbedDistanceKm: number('Between the two-body orbits, without the pull of the Earth.'),
  classicalPeriapsisKm: v.nullable(number('Of the hyperbola joined at the sphere of influence.')),
  nBodyDistanceKm: finite,
  impactParameterKm: v.nullable(number('Of the hyperbola osculating the n-body trajectory.')),
  classicalTimeMinusNBodyS: finite,
});

const finding = v.object({
  id: v.string(),
  kind: v.picklist(['answer', 'support', 'caution']),
  text: text('Sentences a person can read aloud.'),
  figures: v.array(
    v.object({
      label: v.string(),
      value: finite,
      unit: v.string(),
      text: text('The value with the digits it deserves; the sentence may say fewer.'),
    }),
  ),
  /** Where it comes from. */
  basis: v.object({ model: v.string(), formula: v.string(), source: v.string() }),
  caution: v.nullable(v.string()),
  tdbSeconds: v.nullable(number('Instant the finding is about; null when it is about none.')),
});

const assumed = v.object({
  field: v.string(),
  value: v.string(),
  origin: v.picklist(['assumed', 'edited']),
  note: v.string(),
});

const caseSection = v.object({
  name: v.string(),
  objectId: v.nullable(v.string()),
  invented: v.boolean(),
  asRead: v.object({
    format: v.string(),
    text: v.string(),
    fields: v.array(
      v.object({
        field: v.string(),
        value: v.string(),
        unit: v.nullable(v.string()),
        origin: v.picklist(['read', 'assumed', 'edited']),
      }),
    ),
    notes: v.array(v.string()),
  }),
  asAssumed: v.array(assumed),
  normalised: v.object({
    epochJdTdb: finite,
    epochTdbSeconds: finite,
    epochUtc: v.string(),
    centre: v.literal('Sun'),
    axes: v.literal('ICRF'),
    positionKm: triple,
    velocityKmS: triple,
    a1KmS2: finite,
    a2KmS2: finite,
    a3KmS2: finite,
  }),
  physical: v.record(v.string(), finite),
});

const model = v.object({
  ephemeris: v.string(),
  ephemerisCoverage: v.string(),
  gmSet: v.picklist(['DE405', 'DE431']),
  bodies: v.array(v.object({ body: v.string(), gmKm3S2: finite })),
  terms: v.array(v.string()),
  integrator: v.string(),
  tolerance: finite,
  constants: v.record(v.string(), finite),
  span: v.object({
    fromJdTdb: finite,
    toJdTdb: finite,
    fromUtc: v.string(),
    toUtc: v.string(),
    rule: v.string(),
  }),
  searchLimitsKm: v.pipe(
    v.record(v.string(), finite),
    v.description('By body: a minimum of the distance farther out is not an approach.'),
  ),
  timeAssumptions: v.array(v.string()),
  notModelled: v.array(v.string()),
  /** Null where the trajectory runs to the ends of the span. */
  trajectoryEnds: v.nullable(text('Why the trajectory ends before the span does.')),
});

export const reportSchema = v.object({
  format: v.literal('skimline-report'),
  version: v.literal(REPORT_VERSION),
  madeAt: text('Time of making, UTC; not part of the fingerprint.'),
  case: caseSection,
  model,
  classical: v.nullable(classical),
  approaches: v.array(approach),
  principal: v.nullable(
    v.pipe(
      v.number(),
      v.integer(),
      v.description('Index into approaches of the one the briefing is about; null without one.'),
    ),
  ),
  comparison: v.nullable(comparison),
  /** Absent without a covariance, and until it has been estimated. */
  impactProbability: v.optional(impactProbability),
  /** Absent where no clone hits the Earth. */
  corridor: v.optional(corridorSchema),
  /** Absent where nothing enters the air, or its size is not known. */
  entryFlight: v.optional(entryFlightSchema),
  /** Absent where no date of an impact of the Earth was found. */
  scales: v.optional(scalesSchema),
  findings: v.array(finding),
  cautions: v.array(v.string()),
  fingerprint: text('SHA-256, hex, of the canonical JSON without madeAt and fingerprint.'),
});

export type Report = v.InferOutput<typeof reportSchema>;
export type Approach = v.InferOutput<typeof approach>;
export type Crossing = v.InferOutput<typeof crossing>;
export type Entry = v.InferOutput<typeof entry>;
export type SurfaceImpact = v.InferOutput<typeof surfaceImpact>;
export type ApproachUncertainty = v.InferOutput<typeof uncertainty>;
export type ImpactProbability = v.InferOutput<typeof impactProbability>;
export type ImpactDate = v.InferOutput<typeof impactDate>;
export type LineOfVariations = v.InferOutput<typeof lineOfVariations>;
export type Finding = v.InferOutput<typeof finding>;
export type ClassicalResult = v.InferOutput<typeof classical>;
export type Comparison = v.InferOutput<typeof comparison>;
export type ReportElements = v.InferOutput<typeof elements>;
export type ReportHyperbola = v.InferOutput<typeof hyperbola>;
export type TargetPlane = v.InferOutput<typeof targetPlane>;
export type Boundary = (typeof BOUNDARIES)[number];
export type ApproachBody = v.InferOutput<typeof bodyName>;

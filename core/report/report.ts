import * as v from 'valibot';

/**
 * The report: the one object every figure on the page, the plate and the files comes from.
 *
 * Units stand in the key names; angles are degrees, epochs Julian dates TDB (`jdTdb`) with the same
 * instant as TDB seconds past J2000 (`tdbSeconds`, full precision) and as UTC text.
 */

export const REPORT_VERSION = 1;

const finite = v.pipe(v.number(), v.finite());
const triple = v.tuple([finite, finite, finite]);
const instant = { jdTdb: finite, tdbSeconds: finite, utc: v.string() };

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
  semiMajorAxisKm: v.nullable(finite),
  semiMajorAxisAu: v.nullable(finite),
  eccentricity: finite,
  periapsisKm: finite,
  periapsisAu: finite,
  inclinationDeg: finite,
  nodeDeg: finite,
  argumentOfPeriapsisDeg: finite,
  trueAnomalyDeg: finite,
  meanAnomalyDeg: v.nullable(finite),
  periodDays: v.nullable(finite),
  timeFromPeriapsisDays: finite,
});

const hyperbola = v.object({
  semiMajorAxisKm: finite,
  eccentricity: finite,
  periapsisKm: finite,
  impactParameterKm: finite,
  excessSpeedKmS: finite,
  turnAngleDeg: finite,
  asymptoteTrueAnomalyDeg: finite,
  periapsisSpeedKmS: finite,
});

const targetPlane = v.object({
  bDotTKm: finite,
  bDotRKm: finite,
  xiKm: finite,
  zetaKm: finite,
  /** Impact parameter whose periapsis is the body's radius: b = R sqrt(1 + 2GM/(R v²)). */
  impactRadiusKm: finite,
  /** Unit vectors, ICRF. */
  s: triple,
  t: triple,
  r: triple,
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
  latitudeDeg: finite,
  longitudeDeg: finite,
  altitudeKm: finite,
  speedKmS: finite,
  airSpeedKmS: finite,
  flightPathAngleDeg: finite,
  azimuthDeg: finite,
  airFlightPathAngleDeg: finite,
  airAzimuthDeg: finite,
});

/** Where the trajectory meets a surface: the ground in vacuum flight, or the Moon's surface. */
const surfaceImpact = v.object({
  ...instant,
  latitudeDeg: finite,
  longitudeDeg: finite,
  speedKmS: finite,
  /** Below the local horizontal, negative going down. */
  flightPathAngleDeg: finite,
  note: v.string(),
});

/** First-order uncertainty, from the covariance of the case by the variational equations. */
const uncertainty = v.object({
  sigmaDistanceKm: finite,
  sigmaTimeS: finite,
  sigmaSpeedKmS: finite,
  /** Never below zero. */
  distance3SigmaKm: v.tuple([finite, finite]),
  /** 1 σ, on the target plane; null where the object is bound. */
  ellipse: v.nullable(
    v.object({
      semiMajorKm: finite,
      semiMinorKm: finite,
      /** Of the major axis, from T towards R. */
      angleTrDeg: finite,
      /** Of the major axis, from ξ towards ζ. */
      angleXiZetaDeg: finite,
      /** Of B·T and B·R, km²: TT, TR, RR. */
      covarianceKm2: triple,
    }),
  ),
  stretchingEarthRadiiPerSigma: v.nullable(finite),
});

const approach = v.object({
  body: bodyName,
  ...instant,
  distanceKm: finite,
  /** Distance in radii of the body. */
  distanceRadii: finite,
  speedKmS: finite,
  /** Null when the object is bound to the body at closest approach. */
  excessSpeedKmS: v.nullable(finite),
  outcome: v.picklist(['pass', 'atmosphere', 'impact']),
  /** Where the hyperbola and the target plane osculate. */
  osculatingAt: v.picklist(['closest-approach', 'entry-sphere', 'surface']),
  hyperbola: v.nullable(hyperbola),
  targetPlane: v.nullable(targetPlane),
  crossings: v.array(crossing),
  entry: v.optional(entry),
  surfaceImpact: v.optional(surfaceImpact),
  uncertainty: v.optional(uncertainty),
  /** Gaussian of the target plane over the disc of the impact radius. */
  impactProbability: v.optional(v.object({ firstOrder: finite })),
  /** Heliocentric elements before and after the pass, where the body is the Earth and inside its sphere of influence. */
  orbitBefore: v.optional(elements),
  orbitAfter: v.optional(elements),
});

const classical = v.object({
  /** What the chain takes for granted, in words. */
  method: v.string(),
  objectElements: elements,
  earthElements: elements,
  moid: v.object({
    distanceKm: finite,
    distanceAu: finite,
    objectTrueAnomalyDeg: finite,
    earthTrueAnomalyDeg: finite,
  }),
  closest: v.object({ ...instant, distanceKm: finite }),
  sphereOfInfluence: v.object({ radiusKm: finite, formulaRadiusKm: finite }),
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
      flightPathAngleDeg: finite,
      travelTimeS: finite,
    }),
  ),
  periapsis: v.nullable(
    v.object({ ...instant, distanceKm: finite, speedKmS: finite, travelTimeS: finite }),
  ),
});

/** The unperturbed miss against the focused one: how far the Earth's pull moves the pass. */
const comparison = v.object({
  jdTdb: finite,
  unperturbedDistanceKm: finite,
  classicalPeriapsisKm: v.nullable(finite),
  nBodyDistanceKm: finite,
  impactParameterKm: v.nullable(finite),
  classicalTimeMinusNBodyS: finite,
});

const finding = v.object({
  id: v.string(),
  kind: v.picklist(['answer', 'support', 'caution']),
  /** A sentence a person can read aloud. */
  text: v.string(),
  figures: v.array(
    v.object({
      label: v.string(),
      value: finite,
      unit: v.string(),
      /** The value with the digits it deserves, as it stands in the text. */
      text: v.string(),
    }),
  ),
  /** Where it comes from. */
  basis: v.object({ model: v.string(), formula: v.string(), source: v.string() }),
  caution: v.nullable(v.string()),
  /** Instant the finding is about, for "go there"; null when it is about no instant. */
  tdbSeconds: v.nullable(finite),
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
  searchLimitsKm: v.record(v.string(), finite),
  timeAssumptions: v.array(v.string()),
  notModelled: v.array(v.string()),
  /** Why the trajectory ends before the span does, when it does (impact). */
  trajectoryEnds: v.nullable(v.string()),
});

export const reportSchema = v.object({
  format: v.literal('skimline-report'),
  version: v.literal(REPORT_VERSION),
  /** Time of making, UTC; not part of the fingerprint. */
  madeAt: v.string(),
  case: caseSection,
  model,
  classical: v.nullable(classical),
  approaches: v.array(approach),
  /** Index into approaches of the one the briefing is about; null when there is none. */
  principal: v.nullable(v.pipe(v.number(), v.integer())),
  comparison: v.nullable(comparison),
  findings: v.array(finding),
  cautions: v.array(v.string()),
  /** SHA-256, hex, of the report's canonical JSON without `madeAt` and `fingerprint`. */
  fingerprint: v.string(),
});

export type Report = v.InferOutput<typeof reportSchema>;
export type Approach = v.InferOutput<typeof approach>;
export type Crossing = v.InferOutput<typeof crossing>;
export type Entry = v.InferOutput<typeof entry>;
export type SurfaceImpact = v.InferOutput<typeof surfaceImpact>;
export type ApproachUncertainty = v.InferOutput<typeof uncertainty>;
export type Finding = v.InferOutput<typeof finding>;
export type ClassicalResult = v.InferOutput<typeof classical>;
export type Comparison = v.InferOutput<typeof comparison>;
export type ReportElements = v.InferOutput<typeof elements>;
export type ReportHyperbola = v.InferOutput<typeof hyperbola>;
export type TargetPlane = v.InferOutput<typeof targetPlane>;
export type Boundary = (typeof BOUNDARIES)[number];
export type ApproachBody = v.InferOutput<typeof bodyName>;

import type { FindingsDraft } from '../../../core/report/finding';
import type { Approach, Report } from '../../../core/report/report';

/** Hand-made sections of reports with invented numbers: no trajectory stands behind them. */

/** TDB less UTC since 2017-01-01, s: 37 leap seconds and 32.184 s (BIPM; IAU 1991), to 2 ms. */
const TDB_MINUS_UTC = 69.184;
const J2000_MS = Date.UTC(2000, 0, 1, 12);
const DAY = 86400;

/** An instant from calendar UTC after 2016, written by the platform's own calendar. */
export function instantOf(utc: string): { jdTdb: number; tdbSeconds: number; utc: string } {
  const tdbSeconds = (Date.parse(`${utc}Z`) - J2000_MS) / 1000 + TDB_MINUS_UTC;
  return { jdTdb: 2451545 + tdbSeconds / DAY, tdbSeconds, utc: `${utc}Z` };
}

export const PASS: Approach = {
  body: 'Earth',
  ...instantOf('2041-03-09T04:05:06.250'),
  distanceKm: 21345.678,
  distanceRadii: 3.3467,
  speedKmS: 9.8765,
  excessSpeedKmS: 7.654321,
  outcome: 'pass',
  osculatingAt: 'closest-approach',
  hyperbola: {
    semiMajorAxisKm: -6803.21,
    eccentricity: 4.1375,
    periapsisKm: 21345.678,
    impactParameterKm: 27313.4,
    excessSpeedKmS: 7.654321,
    turnAngleDeg: 27.97,
    asymptoteTrueAnomalyDeg: 103.99,
    periapsisSpeedKmS: 9.8765,
  },
  targetPlane: {
    bDotTKm: -20123.4,
    bDotRKm: 18468.9,
    xiKm: 512.3,
    zetaKm: -27308.6,
    impactRadiusKm: 11305.2,
    s: [1, 0, 0],
    t: [0, 1, 0],
    r: [0, 0, 1],
  },
  crossings: [
    {
      boundary: 'sphere-of-influence',
      direction: 'in',
      ...instantOf('2041-03-07T19:31:07.100'),
      distanceKm: 925000,
      speedKmS: 7.71,
    },
    {
      boundary: 'geosynchronous',
      direction: 'in',
      ...instantOf('2041-03-09T03:06:07.900'),
      distanceKm: 42164,
      speedKmS: 8.8,
    },
    {
      boundary: 'sphere-of-influence',
      direction: 'out',
      ...instantOf('2041-03-10T12:41:13.700'),
      distanceKm: 925000,
      speedKmS: 7.71,
    },
  ],
  orbitBefore: orbit(1.23456, 0.4321, 5.4321, 0.70111),
  orbitAfter: orbit(1.34567, 0.4567, 6.5432, 0.73109),
};

function orbit(a: number, e: number, i: number, q: number): NonNullable<Approach['orbitBefore']> {
  return {
    semiMajorAxisKm: a * 149597870.7,
    semiMajorAxisAu: a,
    eccentricity: e,
    periapsisKm: q * 149597870.7,
    periapsisAu: q,
    inclinationDeg: i,
    nodeDeg: 12.3,
    argumentOfPeriapsisDeg: 45.6,
    trueAnomalyDeg: 78.9,
    meanAnomalyDeg: 34.5,
    periodDays: 365.25 * a ** 1.5,
    timeFromPeriapsisDays: 42.5,
  };
}

const ENTRY: NonNullable<Approach['entry']> = {
  ...instantOf('2041-03-09T04:03:02.750'),
  latitudeDeg: -12.3456,
  longitudeDeg: 98.7654,
  altitudeKm: 100,
  speedKmS: 13.579,
  airSpeedKmS: 13.246,
  flightPathAngleDeg: -6.54,
  azimuthDeg: 81.3,
  airFlightPathAngleDeg: -6.72,
  airAzimuthDeg: 80.6,
};

const INTERFACE: Approach['crossings'][number] = {
  boundary: 'entry-interface',
  direction: 'in',
  ...instantOf('2041-03-09T04:03:02.750'),
  distanceKm: 6477.4,
  speedKmS: 13.579,
};

export const GRAZE: Approach = {
  ...PASS,
  distanceKm: 6441.987,
  distanceRadii: 1.01001,
  speedKmS: 13.612,
  outcome: 'atmosphere',
  osculatingAt: 'entry-sphere',
  crossings: [PASS.crossings[0], PASS.crossings[1], INTERFACE, PASS.crossings[2]],
  entry: ENTRY,
};

export const IMPACT: Approach = {
  ...without(PASS, 'orbitAfter'),
  distanceKm: 3456.789,
  distanceRadii: 0.54198,
  outcome: 'impact',
  osculatingAt: 'entry-sphere',
  crossings: [
    PASS.crossings[0],
    PASS.crossings[1],
    INTERFACE,
    {
      boundary: 'ground',
      direction: 'in',
      ...instantOf('2041-03-09T04:03:14.350'),
      distanceKm: 6377.2,
      speedKmS: 13.701,
    },
  ],
  entry: ENTRY,
  surfaceImpact: {
    ...instantOf('2041-03-09T04:03:14.350'),
    latitudeDeg: -12.9876,
    longitudeDeg: -179.1234,
    speedKmS: 13.701,
    flightPathAngleDeg: -47.31,
    note: 'invented ground',
  },
};

export const MOON_IMPACT: Approach = {
  ...without(PASS, 'orbitBefore', 'orbitAfter'),
  body: 'Moon',
  distanceKm: 1234.5,
  distanceRadii: 0.7105,
  outcome: 'impact',
  osculatingAt: 'surface',
  crossings: [],
  surfaceImpact: {
    ...instantOf('2041-03-08T22:10:44.400'),
    latitudeDeg: 23.4567,
    longitudeDeg: -34.5678,
    speedKmS: 8.642,
    flightPathAngleDeg: -55.5,
    note: 'invented surface of the Moon',
  },
};

/** A pass of a body far from anything, to stand beside the principal one. */
export function farPass(body: Approach['body'], utc: string, distanceKm: number): Approach {
  return {
    body,
    ...instantOf(utc),
    distanceKm,
    distanceRadii: distanceKm / 5000,
    speedKmS: 11.1,
    excessSpeedKmS: 11,
    outcome: 'pass',
    osculatingAt: 'closest-approach',
    hyperbola: null,
    targetPlane: null,
    crossings: [],
  };
}

export const CLASSICAL: NonNullable<Report['classical']> = {
  method: 'invented',
  objectElements: orbit(1.23456, 0.4321, 5.4321, 0.70111),
  earthElements: orbit(1, 0.0167, 0, 0.9833),
  moid: {
    distanceKm: 67890.1,
    distanceAu: 0.000453817,
    objectTrueAnomalyDeg: 1,
    earthTrueAnomalyDeg: 2,
  },
  closest: { ...instantOf('2041-03-09T05:00:00.000'), distanceKm: 31313.1 },
  sphereOfInfluence: { radiusKm: 925000, formulaRadiusKm: 924649 },
  sphereEntry: null,
  hyperbola: null,
  periapsisBelowInterface: false,
  interface: null,
  periapsis: null,
};

export const COMPARISON: NonNullable<Report['comparison']> = {
  jdTdb: PASS.jdTdb,
  unperturbedDistanceKm: 31313.1,
  classicalPeriapsisKm: 22222.2,
  nBodyDistanceKm: 21345.678,
  impactParameterKm: 27313.4,
  classicalTimeMinusNBodyS: -1234.5,
};

/** A draft about the given approaches, of which the first is the principal one. */
export function draftOf(
  approaches: Approach[],
  changes: Partial<FindingsDraft> = {},
): FindingsDraft {
  return {
    case: {
      name: 'Sample',
      objectId: null,
      invented: false,
      asRead: { format: 'free-text', text: '', fields: [], notes: [] },
      asAssumed: [],
      normalised: {
        epochJdTdb: 2466490.5,
        epochTdbSeconds: 1291204800,
        epochUtc: '2040-12-01T00:00:00.000Z',
        centre: 'Sun',
        axes: 'ICRF',
        positionKm: [1.1e8, -9.9e7, 1.2e7],
        velocityKmS: [20.1, 21.2, -3.3],
        a1KmS2: 0,
        a2KmS2: 0,
        a3KmS2: 0,
      },
      physical: {},
    },
    model: {
      ephemeris: 'invented',
      ephemerisCoverage: 'invented',
      gmSet: 'DE431',
      bodies: [],
      terms: [],
      integrator: 'invented',
      tolerance: 1e-13,
      constants: {},
      span: {
        fromJdTdb: 2466459.5,
        toJdTdb: 2466855.5,
        fromUtc: '2040-11-01T00:00:00Z',
        toUtc: '2041-12-02T00:00:00Z',
        rule: 'invented',
      },
      searchLimitsKm: { Earth: 7.4e7, Moon: 3e6 },
      timeAssumptions: [],
      notModelled: [],
      trajectoryEnds: null,
    },
    classical: CLASSICAL,
    approaches,
    principal: approaches.length === 0 ? null : 0,
    comparison: COMPARISON,
    ...changes,
  };
}

function without<T extends object, K extends keyof T>(value: T, ...keys: K[]): Omit<T, K> {
  const copy = { ...value };
  for (const key of keys) delete copy[key];
  return copy;
}

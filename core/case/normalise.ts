import { AU_KM, BODY_INDEX, type Body, DEG_TO_RAD, GM_KM3_S2, SECONDS_PER_DAY } from '../constants';
import type { Ephemeris } from '../ephemeris';
import { eclipticToIcrf } from '../frames/ecliptic';
import { add, scale, subtract, type Vec3, vec3 } from '../math/vector';
import { stateFromElements } from '../orbit/elements';
import { trueAnomalyFromMean, trueAnomalyFromTimeSincePeriapsis } from '../orbit/kepler';
import { tdbSecondsFromEpoch } from '../time/convert';
import {
  cartesianCovariance,
  type EpochCovariance,
  elementCovariance,
} from '../uncertainty/covariance';
import { gmOfCentre } from './centre-gm';
import type { Centre, ElementsState, OrbitCase } from './types';

/** A case carried to the core's own terms. */
export interface NormalisedCase {
  epochTdbSeconds: number;
  /** Heliocentric, ICRF axes, km and km/s. */
  positionKm: Vec3;
  velocityKmS: Vec3;
  /** Non-gravitational accelerations at 1 au, km/s^2. */
  a1KmS2: number;
  a2KmS2: number;
  a3KmS2: number;
  /** Of the heliocentric state and A1 to A3; null when the case has none. */
  covariance: EpochCovariance | null;
}

/** The case's epoch, TDB seconds past J2000. */
export function epochOf(orbit: OrbitCase): number {
  return tdbSecondsFromEpoch(orbit.epoch);
}

/**
 * Carries a case to the Sun's centre, ICRF axes, km, km/s and TDB.
 *
 * @param orbit     the case, in the centre, axes and scale it was given in
 * @param ephemeris covering the case's epoch
 * @returns         heliocentric state, ICRF axes, at the epoch
 * @throws          EphemerisRangeError when the epoch is not covered
 * Elements become a state with the centre's GM of the case's own set (about the solar-system
 * barycentre: the Sun's) and au 149 597 870.700 km.
 */
export function normaliseCase(orbit: OrbitCase, ephemeris: Ephemeris): NormalisedCase {
  const epochTdbSeconds = epochOf(orbit);
  const base = Math.floor(epochTdbSeconds);
  const bodies = new Float64Array(66);
  ephemeris.states(base, epochTdbSeconds - base, bodies);
  const given =
    orbit.state.kind === 'cartesian'
      ? { r: orbit.state.positionKm as Vec3, v: orbit.state.velocityKmS as Vec3 }
      : elementsToState(orbit.state, gmOfCentre(orbit.centre, orbit.model.gm), epochTdbSeconds);
  const turn = (x: Vec3): Vec3 => (orbit.axes === 'EclipticJ2000' ? eclipticToIcrf(x) : x);
  const centre = centreState(orbit.centre, orbit, bodies);
  const sun = bodyState('Sun', bodies);
  const a = AU_KM / SECONDS_PER_DAY ** 2;
  const forces = orbit.nonGravitational;
  return {
    epochTdbSeconds,
    positionKm: subtract(add(turn(given.r), centre.r), sun.r),
    velocityKmS: subtract(add(turn(given.v), centre.v), sun.v),
    a1KmS2: (forces?.a1AuD2 ?? 0) * a,
    a2KmS2: (forces?.a2AuD2 ?? 0) * a,
    a3KmS2: (forces?.a3AuD2 ?? 0) * a,
    covariance: covarianceOf(orbit, given),
  };
}

function covarianceOf(orbit: OrbitCase, given: State): EpochCovariance | null {
  const { covariance } = orbit;
  if (covariance === null) return null;
  const ecliptic = orbit.axes === 'EclipticJ2000';
  const state = { ...given, ecliptic, gm: gmOfCentre(orbit.centre, orbit.model.gm) };
  return covariance.kind === 'cartesian'
    ? cartesianCovariance(covariance.lowerTriangle, covariance.frame, state)
    : elementCovariance(covariance.labels, covariance.matrix, state);
}

interface State {
  r: Vec3;
  v: Vec3;
}

function bodyState(body: Body, bodies: Float64Array): State {
  const at = BODY_INDEX[body] * 6;
  return { r: vec3(bodies, at), v: vec3(bodies, at + 3) };
}

/** Barycentric state of the case's centre. */
function centreState(centre: Centre, orbit: OrbitCase, bodies: Float64Array): State {
  if (centre === 'SSB') return { r: [0, 0, 0], v: [0, 0, 0] };
  if (centre !== 'EarthBarycentre') return bodyState(centre, bodies);
  const gm = GM_KM3_S2[orbit.model.gm];
  const share = gm.Moon / (gm.Earth + gm.Moon);
  const earth = bodyState('Earth', bodies);
  const moon = bodyState('Moon', bodies);
  const mix = (e: Vec3, m: Vec3): Vec3 => add(scale(e, 1 - share), scale(m, share));
  return { r: mix(earth.r, moon.r), v: mix(earth.v, moon.v) };
}

function elementsToState(given: ElementsState, gm: number, epochTdbSeconds: number): State {
  const { phase, eccentricity, periapsisKm } = given;
  let trueAnomalyRad: number;
  if (phase.kind === 'true-anomaly') {
    trueAnomalyRad = phase.trueAnomalyDeg * DEG_TO_RAD;
  } else if (phase.kind === 'mean-anomaly') {
    trueAnomalyRad = trueAnomalyFromMean(phase.meanAnomalyDeg * DEG_TO_RAD, eccentricity);
  } else {
    trueAnomalyRad = trueAnomalyFromTimeSincePeriapsis(
      epochTdbSeconds - tdbSecondsFromEpoch(phase.periapsisEpoch),
      periapsisKm,
      eccentricity,
      gm,
    );
  }
  return stateFromElements(
    {
      semiLatusRectumKm: periapsisKm * (1 + eccentricity),
      eccentricity,
      inclinationRad: given.inclinationDeg * DEG_TO_RAD,
      nodeRad: given.nodeDeg * DEG_TO_RAD,
      argumentOfPeriapsisRad: given.argumentOfPeriapsisDeg * DEG_TO_RAD,
      trueAnomalyRad,
    },
    gm,
  );
}

import { AU_KM, BODY_RADIUS_KM, DEG_TO_RAD, EARTH_RADIUS_KM, SECONDS_PER_DAY } from '../constants';
import type { ApproachRecord } from '../encounter/approach';
import type { EncounterEvent } from '../encounter/scan';
import type { EntryPoint } from '../encounter/surface';
import type { TargetPlane } from '../encounter/target-plane';
import { add, dot, scale, type Vec3 } from '../math/vector';
import type { ClassicalEncounter } from '../orbit/classical';
import type { Elements } from '../orbit/elements';
import type { Hyperbola } from '../orbit/hyperbola';
import { jdFromTdbSeconds } from '../time/convert';
import { formatIso } from '../time/format';
import type { RecordUncertainty } from '../uncertainty/approaches';
import type {
  Approach,
  ClassicalResult,
  Crossing,
  ReportElements,
  ReportHyperbola,
} from './report';

/** From the core's radians and TDB seconds to the report's degrees, Julian dates and UTC. */

const deg = (rad: number): number => rad / DEG_TO_RAD;

/** East longitude in (−180, 180]. */
const longitude = (rad: number): number => {
  const turned = ((((deg(rad) + 180) % 360) + 360) % 360) - 180;
  return turned === -180 ? 180 : turned;
};

export interface ReportInstant {
  jdTdb: number;
  tdbSeconds: number;
  utc: string;
}

export function instant(tdbSeconds: number): ReportInstant {
  return {
    jdTdb: jdFromTdbSeconds(tdbSeconds),
    tdbSeconds,
    utc: formatIso(tdbSeconds, 'UTC', 3),
  };
}

export function elementsSection(e: Elements): ReportElements {
  return {
    semiMajorAxisKm: e.semiMajorAxisKm,
    semiMajorAxisAu: e.semiMajorAxisKm === null ? null : e.semiMajorAxisKm / AU_KM,
    eccentricity: e.eccentricity,
    periapsisKm: e.periapsisKm,
    periapsisAu: e.periapsisKm / AU_KM,
    inclinationDeg: deg(e.inclinationRad),
    nodeDeg: deg(e.nodeRad),
    argumentOfPeriapsisDeg: deg(e.argumentOfPeriapsisRad),
    trueAnomalyDeg: deg(e.trueAnomalyRad),
    meanAnomalyDeg: e.semiMajorAxisKm === null ? null : deg(e.meanAnomalyRad),
    periodDays: e.periodS === null ? null : e.periodS / SECONDS_PER_DAY,
    timeFromPeriapsisDays: e.timeFromPeriapsisS / SECONDS_PER_DAY,
  };
}

export function hyperbolaSection(h: Hyperbola): ReportHyperbola {
  return {
    semiMajorAxisKm: h.semiMajorAxisKm,
    eccentricity: h.eccentricity,
    periapsisKm: h.periapsisKm,
    impactParameterKm: h.impactParameterKm,
    excessSpeedKmS: h.excessSpeedKmS,
    turnAngleDeg: deg(h.turnAngleRad),
    asymptoteTrueAnomalyDeg: deg(h.asymptoteTrueAnomalyRad),
    periapsisSpeedKmS: h.periapsisSpeedKmS,
  };
}

function crossingSection(event: EncounterEvent): Crossing | null {
  if (event.boundary === null || event.direction === null) return null;
  return {
    boundary: event.boundary,
    direction: event.direction,
    ...instant(event.tdbSeconds),
    distanceKm: event.distanceKm,
    speedKmS: Math.hypot(event.relative[3], event.relative[4], event.relative[5]),
  };
}

function entrySection(tdbSeconds: number, point: EntryPoint): NonNullable<Approach['entry']> {
  return {
    ...instant(tdbSeconds),
    latitudeDeg: deg(point.latitudeRad),
    longitudeDeg: longitude(point.longitudeRad),
    altitudeKm: point.altitudeKm,
    speedKmS: point.speedKmS,
    airSpeedKmS: point.airSpeedKmS,
    flightPathAngleDeg: deg(point.flightPathAngleRad),
    azimuthDeg: deg(point.azimuthRad),
    airFlightPathAngleDeg: deg(point.airFlightPathAngleRad),
    airAzimuthDeg: deg(point.airAzimuthRad),
  };
}

const SURFACE_NOTES: Partial<Record<ApproachRecord['body'], string>> = {
  Earth:
    'Geodetic point where the flight without air meets the WGS 84 ellipsoid; air, break-up and relief are left out of it.',
  Moon: 'Selenographic point (mean Earth/polar axis) on a sphere of 1 737.4 km; relief is not modelled.',
};

function uncertaintySection(
  { firstOrder, impactProbability }: RecordUncertainty,
  plane: TargetPlane | null,
): Pick<Approach, 'uncertainty' | 'impactProbability'> {
  const { ellipse, range } = firstOrder;
  const axis = (a: Vec3, b: Vec3, angle: number): Vec3 =>
    add(scale(a, Math.cos(angle)), scale(b, Math.sin(angle)));
  const major =
    plane === null || ellipse === null ? null : axis(plane.t, plane.r, ellipse.angleRad);
  return {
    uncertainty: {
      sigmaDistanceKm: firstOrder.sigmaDistanceKm,
      sigmaTimeS: firstOrder.sigmaTimeS,
      sigmaSpeedKmS: firstOrder.sigmaSpeedKmS,
      distance3SigmaKm: [range[0], range[1]],
      ellipse:
        plane === null || ellipse === null || major === null
          ? null
          : {
              semiMajorKm: ellipse.semiMajorKm,
              semiMinorKm: ellipse.semiMinorKm,
              angleTrDeg: deg(ellipse.angleRad),
              angleXiZetaDeg: deg(Math.atan(dot(major, plane.zeta) / dot(major, plane.xi))),
              covarianceKm2: [...ellipse.covariance],
            },
      stretchingEarthRadiiPerSigma: ellipse === null ? null : ellipse.semiMajorKm / EARTH_RADIUS_KM,
    },
    ...(impactProbability === null ? {} : { impactProbability: { firstOrder: impactProbability } }),
  };
}

export function approachSection(
  record: ApproachRecord,
  uncertainty: RecordUncertainty | null,
): Approach {
  const { hyperbola, plane, entry, surface } = record;
  return {
    body: record.body,
    ...instant(record.tdbSeconds),
    distanceKm: record.distanceKm,
    distanceRadii: record.distanceKm / BODY_RADIUS_KM[record.body],
    speedKmS: record.speedKmS,
    excessSpeedKmS: hyperbola === null ? null : hyperbola.excessSpeedKmS,
    outcome: record.outcome,
    osculatingAt: record.osculatingAt,
    hyperbola: hyperbola === null ? null : hyperbolaSection(hyperbola),
    targetPlane:
      plane === null
        ? null
        : {
            bDotTKm: plane.bDotTKm,
            bDotRKm: plane.bDotRKm,
            xiKm: plane.xiKm,
            zetaKm: plane.zetaKm,
            impactRadiusKm: plane.impactRadiusKm,
            s: [...plane.s],
            t: [...plane.t],
            r: [...plane.r],
          },
    crossings: record.crossings.map(crossingSection).filter((item) => item !== null),
    ...(entry === null ? {} : { entry: entrySection(entry.tdbSeconds, entry.point) }),
    ...(surface === null
      ? {}
      : {
          surfaceImpact: {
            ...instant(surface.tdbSeconds),
            latitudeDeg: deg(surface.point.latitudeRad),
            longitudeDeg: longitude(surface.point.longitudeRad),
            speedKmS: surface.point.speedKmS,
            flightPathAngleDeg: deg(surface.point.flightPathAngleRad),
            note: SURFACE_NOTES[record.body] ?? '',
          },
        }),
    ...(uncertainty === null ? {} : uncertaintySection(uncertainty, plane)),
  };
}

/**
 * The classical chain as a section of the report.
 *
 * @param c           the chain's result, times in seconds past the epoch
 * @param epoch       TDB seconds past J2000 of the chain's epoch
 * @param radii       the boundary radii the chain ran with, km, and the sphere's by its formula
 */
export function classicalSection(
  c: ClassicalEncounter,
  epoch: number,
  radii: { sphereKm: number; sphereFormulaKm: number; entryKm: number },
): ClassicalResult {
  const at = (dtS: number): ReportInstant => instant(epoch + dtS);
  const entry = c.sphereEntry;
  const passage = c.interface;
  const periapsis = c.periapsis;
  return {
    method:
      'Two-body motion about the Sun for the object and for the Earth–Moon barycentre (the Earth set off from it by the ephemeris), joined to a geocentric two-body hyperbola at the sphere of influence. The elements and the distance between the orbits are of the heliocentric orbits that object and Earth osculate at the epoch.',
    objectElements: elementsSection(c.objectElements),
    earthElements: elementsSection(c.earthElements),
    moid: {
      distanceKm: c.moid.distanceKm,
      distanceAu: c.moid.distanceKm / AU_KM,
      objectTrueAnomalyDeg: deg(c.moid.trueAnomalyARad),
      earthTrueAnomalyDeg: deg(c.moid.trueAnomalyBRad),
    },
    closest: { ...at(c.closest.dtS), distanceKm: c.closest.distanceKm },
    sphereOfInfluence: { radiusKm: radii.sphereKm, formulaRadiusKm: radii.sphereFormulaKm },
    sphereEntry:
      entry === null
        ? null
        : {
            ...at(entry.dtS),
            geocentricPositionKm: [...entry.r],
            geocentricVelocityKmS: [...entry.v],
            speedKmS: Math.hypot(...entry.v),
          },
    hyperbola: c.hyperbola === null ? null : hyperbolaSection(c.hyperbola),
    periapsisBelowInterface: c.periapsisBelowInterface,
    interface:
      passage === null
        ? null
        : {
            ...at(passage.dtS),
            radiusKm: radii.entryKm,
            speedKmS: passage.speedKmS,
            flightPathAngleDeg: deg(passage.flightPathAngleRad),
            travelTimeS: passage.travelTimeS,
          },
    periapsis:
      periapsis === null
        ? null
        : {
            ...at(periapsis.dtS),
            distanceKm: periapsis.distanceKm,
            speedKmS: periapsis.speedKmS,
            travelTimeS: periapsis.travelTimeS,
          },
  };
}

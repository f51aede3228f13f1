import { SPHERE_OF_INFLUENCE_KM } from '../constants';
import {
  formatAu,
  formatDegrees,
  formatDuration,
  formatKm,
  formatMoment,
  formatNumber,
  formatPlace,
  formatSpeed,
} from './figures';
import { deg, figure, finding, HYPERBOLA, km, kmS, NAMES } from './finding';
import type { Approach, Crossing, Finding } from './report';

/** Findings about one pass: where it enters, how fast, what it crosses, how it is bent. */

const AIR_BASIS: Finding['basis'] = {
  model: 'n-body state at the geodetic altitude of 100 km over WGS 84',
  formula: 'v − ω × r for air that turns with the Earth; IAU 2006/2000B orientation, UT1 = UTC',
  source: 'NIMA TR8350.2; Capitaine et al. 2003; McCarthy & Luzum 2003; 100 km: common practice',
};

export function entryFinding({ entry }: Approach, caution: string | null): Finding | null {
  if (entry === undefined) return null;
  return finding(
    'entry',
    `It meets the entry interface, 100\u2009km up, on ${formatMoment(entry.tdbSeconds)} over ${formatPlace(entry.latitudeDeg, entry.longitudeDeg)}, at ${formatSpeed(entry.airSpeedKmS)} through the air, ${formatDegrees(-entry.airFlightPathAngleDeg)} below the horizontal, heading ${formatDegrees(entry.airAzimuthDeg, 0)} from north through east.`,
    [
      deg('latitude', entry.latitudeDeg),
      deg('longitude, east', entry.longitudeDeg),
      kmS('speed, inertial', entry.speedKmS),
      kmS('speed relative to the turning air', entry.airSpeedKmS),
      deg('flight-path angle, inertial', entry.flightPathAngleDeg),
      deg('azimuth of motion, inertial', entry.azimuthDeg),
    ],
    AIR_BASIS,
    entry.tdbSeconds,
    caution,
  );
}

/** Where the flight without air ends: the ground of the Earth, the surface of the Moon. */
export function groundFinding(
  { body, surfaceImpact }: Approach,
  caution: string | null,
): Finding | null {
  if (surfaceImpact === undefined) return null;
  const { tdbSeconds, latitudeDeg, longitudeDeg, speedKmS, flightPathAngleDeg } = surfaceImpact;
  const where = `${formatPlace(latitudeDeg, longitudeDeg)} on ${formatMoment(tdbSeconds)}`;
  const how = `at ${formatSpeed(speedKmS)}, ${formatDegrees(-flightPathAngleDeg)} below the horizontal`;
  return finding(
    'ground',
    body === 'Earth'
      ? `Were there no air it would reach the ground at ${where}, ${how}. The air changes that: neither the place nor the speed is where or how it arrives.`
      : `It meets the surface at ${where}, ${how}.`,
    [
      deg('latitude', latitudeDeg),
      deg('longitude, east', longitudeDeg),
      kmS('speed', speedKmS),
      deg('flight-path angle', flightPathAngleDeg),
    ],
    {
      model: surfaceImpact.note,
      formula: 'root of the height above the surface along the integrated trajectory',
      source: body === 'Earth' ? 'NIMA TR8350.2' : 'Archinal et al. 2011',
    },
    tdbSeconds,
    caution,
  );
}

export function speedFinding(main: Approach): Finding {
  const excess = main.excessSpeedKmS;
  const arrives = main.outcome !== 'impact';
  const atClosest = arrives ? ` and moves at ${formatSpeed(main.speedKmS)} at its closest` : '';
  const bound = `is bound to ${NAMES[main.body]}: it has no excess speed`;
  return finding(
    'speed',
    excess === null
      ? `It ${bound}${arrives ? `, and moves at ${formatSpeed(main.speedKmS)} at its closest` : ''}.`
      : `It comes in with an excess speed of ${formatSpeed(excess)}${atClosest}.`,
    [
      ...(excess === null ? [] : [kmS('excess speed', excess)]),
      ...(arrives ? [kmS('speed at closest approach', main.speedKmS)] : []),
      ...(arrives && main.hyperbola !== null
        ? [deg('turn of its path', main.hyperbola.turnAngleDeg)]
        : []),
    ],
    HYPERBOLA,
    main.tdbSeconds,
  );
}

const BOUNDARY_WORDS: Record<Crossing['boundary'], string> = {
  'sphere-of-influence': 'the Earth’s sphere of influence',
  'moon-distance': 'the Moon’s mean distance',
  geosynchronous: 'the geosynchronous distance',
  'low-orbit-shell': 'the shell of low orbits',
  'entry-sphere': 'the entry sphere',
  'entry-interface': 'the entry interface',
  ground: 'the ground',
};

function comesTo({ boundary }: Crossing): string {
  if (boundary === 'ground') return 'would reach the ground, were there no air,';
  if (boundary === 'entry-interface') return 'reaches the entry interface';
  if (boundary === 'sphere-of-influence') return `enters ${BOUNDARY_WORDS[boundary]}`;
  return `comes inside ${BOUNDARY_WORDS[boundary]}`;
}

export function crossingsFinding(main: Approach): Finding | null {
  const inward = main.crossings.filter(
    (item) =>
      item.direction === 'in' &&
      item.boundary !== 'entry-sphere' &&
      item.tdbSeconds <= main.tdbSeconds,
  );
  if (main.body !== 'Earth' || inward.length === 0) return null;
  const first = inward[0];
  const last = inward[inward.length - 1];
  const out = main.crossings.findLast((item) => item.direction === 'out');
  const deepest =
    last === first
      ? ''
      : ` and ${comesTo(last)} ${formatDuration(last.tdbSeconds - first.tdbSeconds)} later`;
  const leaves =
    out === undefined
      ? ''
      : `; it leaves ${BOUNDARY_WORDS[out.boundary]} on ${formatMoment(out.tdbSeconds)}`;
  return finding(
    'crossings',
    `It ${comesTo(first)} on ${formatMoment(first.tdbSeconds)}${deepest}${leaves}.`,
    [],
    {
      model: 'n-body trajectory against spheres about the Earth’s centre, and the WGS 84 ellipsoid',
      formula: 'root of the distance less the radius, to 1e-6 s',
      source: 'radii: common practice (925 000, 384 400, 42 164, 8 378.137 km)',
    },
    first.tdbSeconds,
  );
}

/** Said inside the sphere of influence only: farther out a hyperbola about the Earth means little. */
export function focusingFinding(main: Approach): Finding | null {
  const { hyperbola, targetPlane } = main;
  if (hyperbola === null || targetPlane === null || main.body !== 'Earth') return null;
  if (main.distanceKm > SPHERE_OF_INFLUENCE_KM) return null;
  const inside = hyperbola.impactParameterKm < targetPlane.impactRadiusKm;
  return finding(
    'focusing',
    `Its incoming line of motion would miss Earth’s centre by ${formatKm(hyperbola.impactParameterKm)}; the Earth’s pull focuses that to ${formatKm(hyperbola.periapsisKm)}. At this speed everything that aims within ${formatKm(targetPlane.impactRadiusKm)} meets the Earth; this orbit aims ${inside ? 'inside' : 'outside'} it.`,
    [
      km('impact parameter', hyperbola.impactParameterKm),
      km('periapsis of the hyperbola', hyperbola.periapsisKm),
      km('impact radius', targetPlane.impactRadiusKm),
    ],
    {
      ...HYPERBOLA,
      formula: 'b = |h|/v∞;  impact radius R √(1 + 2GM/(R v∞²))',
      source: 'Öpik 1976',
    },
    main.tdbSeconds,
  );
}

const OSCULATES: Record<Approach['osculatingAt'], string> = {
  'closest-approach': 'closest approach',
  'entry-sphere': 'the entry sphere',
  surface: 'the surface',
};

export function targetPlaneFinding(main: Approach): Finding | null {
  const plane = main.targetPlane;
  if (plane === null) return null;
  return finding(
    'target-plane',
    `On the target plane it aims at B·T ${formatKm(plane.bDotTKm)}, B·R ${formatKm(plane.bDotRKm)} (ξ ${formatKm(plane.xiKm)}, ζ ${formatKm(plane.zetaKm)}).`,
    [
      km('B·T', plane.bDotTKm),
      km('B·R', plane.bDotRKm),
      km('ξ', plane.xiKm),
      km('ζ', plane.zetaKm),
    ],
    {
      model: `hyperbola osculating at ${OSCULATES[main.osculatingAt]}`,
      formula:
        'T = S × K made unit, K the ecliptic north pole; R = S × T; ζ against the projected motion of the body',
      source: 'Kizner 1961; Valsecchi et al. 2003',
    },
    main.tdbSeconds,
  );
}

export function orbitFinding(main: Approach): Finding | null {
  const before = main.orbitBefore;
  const after = main.orbitAfter;
  if (before === undefined || after === undefined) return null;
  const orbit = (item: typeof before): string => {
    const { semiMajorAxisAu, eccentricity, inclinationDeg, periapsisAu } = item;
    const size =
      semiMajorAxisAu === null || semiMajorAxisAu < 0
        ? `an open orbit with q = ${formatAu(periapsisAu)}`
        : `a = ${formatAu(semiMajorAxisAu)}`;
    return `${size}, e = ${formatNumber(eccentricity, 3)}, i = ${formatDegrees(inclinationDeg, 2)}`;
  };
  return finding(
    'orbit-change',
    `The pass turns its orbit about the Sun from ${orbit(before)} to ${orbit(after)}.`,
    [
      figure('periapsis before', before.periapsisAu, 'au', 5),
      figure('periapsis after', after.periapsisAu, 'au', 5),
      ...(before.periodDays === null ? [] : [figure('period before', before.periodDays, 'd', 1)]),
      ...(after.periodDays === null ? [] : [figure('period after', after.periodDays, 'd', 1)]),
    ],
    {
      model: 'heliocentric elements osculating up to 60 days before and after the pass',
      formula: 'elements of the n-body state about the Sun',
      source: 'Vallado 2013, algorithm 9',
    },
  );
}

import { EARTH_RADIUS_KM } from '../constants';
import {
  formatAu,
  formatDay,
  formatDegrees,
  formatDuration,
  formatKm,
  formatMoment,
  formatNumber,
  formatPlace,
  formatProbability,
  formatSpeed,
} from './figures';
import type { Approach, Crossing, Finding, Report } from './report';

/** Findings: sentences a person can read aloud, every figure taken from the report itself. */

export type FindingsDraft = Pick<
  Report,
  'case' | 'model' | 'classical' | 'approaches' | 'principal' | 'comparison'
>;

export const CIVIL_PROTECTION_CAUTION =
  'This is an analysis of one orbit solution, not a warning; public warnings and protective action belong to the responsible civil-protection authority.';
const INVENTED_CAUTION = 'This is an invented case: no such object exists.';

const N_BODY = {
  model: 'n-body integration (see the model section of the report)',
  formula: 'minimum of the distance to the centre of the body along the integrated trajectory',
  source:
    'Dormand–Prince 8(5,3): Hairer, Nørsett & Wanner 1993; ephemeris DE405: Standish 1998; equations: Newhall, Standish & Williams 1983',
};
const HYPERBOLA = {
  model: 'two-body hyperbola osculating the integrated trajectory',
  formula: 'v² = v∞² + 2GM/r;  b = q √(1 + 2GM/(q v∞²))',
  source: 'Bate, Mueller & White 1971',
};
const PATCHED = {
  model:
    'two-body motion about the Sun joined to a geocentric hyperbola at the sphere of influence',
  formula: 'Kepler’s equation; sphere of influence a (m/M)^(2/5)',
  source: 'Bate, Mueller & White 1971; Danby 1988',
};

type Figure = Finding['figures'][number];

const km = (label: string, value: number): Figure => ({
  label,
  value,
  unit: 'km',
  text: formatNumber(value, Math.abs(value) < 1e5 ? 1 : 0),
});
const kmS = (label: string, value: number): Figure => ({
  label,
  value,
  unit: 'km/s',
  text: formatNumber(value, 3),
});
const deg = (label: string, value: number): Figure => ({
  label,
  value,
  unit: '°',
  text: formatNumber(value, 2),
});

function finding(
  id: string,
  text: string,
  figures: Figure[],
  basis: Finding['basis'],
  tdbSeconds: number | null = null,
  caution: string | null = null,
): Finding {
  return { id, kind: 'support', text, figures, basis, caution, tdbSeconds };
}

/**
 * The findings and the cautions of a report.
 *
 * @param draft the report's sections; the first finding is the answer
 */
export function writeFindings(draft: FindingsDraft): { findings: Finding[]; cautions: string[] } {
  const main = draft.principal === null ? null : draft.approaches[draft.principal];
  const reachesAir = draft.approaches.some(
    (item) => item.body === 'Earth' && item.outcome !== 'pass',
  );
  const caution = reachesAir ? CIVIL_PROTECTION_CAUTION : null;
  const moon = main === null ? null : nearMoon(draft, main);
  const answer = main === null ? nothingFound(draft) : answerOf(main, moon);
  const findings = [
    { ...answer, kind: 'answer' as const, caution },
    ...(main === null
      ? []
      : [
          entryFinding(main, caution),
          speedFinding(main),
          crossingsFinding(main),
          focusingFinding(main),
          classicalFinding(draft, main),
          targetPlaneFinding(main),
          moon === null ? null : moonFinding(moon),
          orbitFinding(main),
        ]),
    moidFinding(draft),
    othersFinding(draft, main),
    certaintyFinding(main),
    assumptionsFinding(draft),
  ].filter((item) => item !== null);
  return {
    findings,
    cautions: [
      ...(caution === null ? [] : [caution]),
      ...(draft.case.invented ? [INVENTED_CAUTION] : []),
    ],
  };
}

const CENTRES: Record<Approach['body'], string> = {
  Earth: 'Earth’s centre',
  Moon: 'the Moon’s centre',
  Venus: 'the centre of Venus',
  Mars: 'the centre of Mars',
  Mercury: 'the centre of Mercury',
  Jupiter: 'the centre of Jupiter',
};

const radii = (approach: Approach): string => {
  const n = formatNumber(approach.distanceRadii, approach.distanceRadii < 100 ? 1 : 0);
  if (approach.body === 'Earth') return `${n} Earth radii`;
  return approach.body === 'Moon' ? `${n} lunar radii` : `${n} of its radii`;
};

function answerOf(approach: Approach, moon: Approach | null): Finding {
  const { body, distanceKm, tdbSeconds, entry, surfaceImpact } = approach;
  const figures = [km('distance from the centre', distanceKm), kmS('speed', approach.speedKmS)];
  if (approach.outcome === 'impact') {
    const at = entry ?? surfaceImpact;
    const where =
      at === undefined
        ? ''
        : `, over ${formatPlace(at.latitudeDeg, at.longitudeDeg)}${entry === undefined ? '' : ', 100\u2009km above the ground'}`;
    const verb =
      body === 'Earth'
        ? 'On this orbit it strikes the Earth: it enters the atmosphere'
        : `On this orbit it strikes ${body === 'Moon' ? 'the Moon' : body}`;
    return finding(
      'answer',
      `${verb} on ${formatMoment(at?.tdbSeconds ?? tdbSeconds)}${where}.`,
      at === undefined ? figures : [kmS('speed', at.speedKmS)],
      N_BODY,
      at?.tdbSeconds ?? tdbSeconds,
    );
  }
  if (approach.outcome === 'atmosphere') {
    const lowest = distanceKm - EARTH_RADIUS_KM;
    return finding(
      'answer',
      `Reaches the atmosphere and, without drag, leaves it again: its lowest point is ${formatKm(distanceKm)} from Earth’s centre (${formatKm(lowest)} above the equatorial radius) on ${formatMoment(tdbSeconds)}.`,
      figures,
      {
        ...N_BODY,
        model: `${N_BODY.model}; drag is not modelled: air may slow it, break it up or bring it down`,
      },
      tdbSeconds,
    );
  }
  const height =
    body === 'Earth' && distanceKm < 50000
      ? `, ${formatKm(distanceKm - EARTH_RADIUS_KM)} above the surface`
      : '';
  const give =
    approach.uncertainty === undefined
      ? ''
      : ` ±\u2009${formatDuration(approach.uncertainty.sigmaTimeS)} (1\u2009σ)`;
  const moonToo =
    moon === null || moon.distanceRadii > NEAR_MOON_RADII
      ? ''
      : ` It comes within ${formatKm(moon.distanceKm)} of the Moon’s centre, ${radii(moon)}, on ${formatMoment(moon.tdbSeconds)}.`;
  return finding(
    'answer',
    `Passes ${formatKm(distanceKm)} from ${CENTRES[body]}, ${radii(approach)}${height}, on ${formatMoment(tdbSeconds)}${give}.${moonToo}`,
    figures,
    N_BODY,
    tdbSeconds,
  );
}

function nothingFound(draft: FindingsDraft): Finding {
  const limits = Object.entries(draft.model.searchLimitsKm)
    .map(([body, limit]) => `${body} ${formatKm(limit)}`)
    .join(', ');
  return finding(
    'answer',
    `No approach was found between ${draft.model.span.fromUtc.slice(0, 10)} and ${draft.model.span.toUtc.slice(0, 10)} within the distances looked at.`,
    [],
    { ...N_BODY, model: `${N_BODY.model}; looked at: ${limits}` },
  );
}

function entryFinding(main: Approach, caution: string | null): Finding | null {
  const { entry } = main;
  if (entry === undefined) return null;
  return finding(
    'entry',
    `It meets the entry interface, 100\u2009km up, over ${formatPlace(entry.latitudeDeg, entry.longitudeDeg)} at ${formatSpeed(entry.airSpeedKmS)} through the air, ${formatDegrees(-entry.airFlightPathAngleDeg)} below the horizontal, heading ${formatDegrees(entry.airAzimuthDeg, 0)} from north through east.`,
    [
      deg('latitude', entry.latitudeDeg),
      deg('longitude, east', entry.longitudeDeg),
      kmS('speed, inertial', entry.speedKmS),
      kmS('speed relative to the turning air', entry.airSpeedKmS),
      deg('flight-path angle, inertial', entry.flightPathAngleDeg),
      deg('azimuth of motion, inertial', entry.azimuthDeg),
    ],
    {
      model: 'n-body state at the geodetic altitude of 100 km over WGS 84',
      formula: 'v − ω × r for air that turns with the Earth; IAU 2006/2000B orientation, UT1 = UTC',
      source:
        'NIMA TR8350.2; Capitaine et al. 2003; McCarthy & Luzum 2003; 100 km: common practice',
    },
    entry.tdbSeconds,
    caution,
  );
}

function speedFinding(main: Approach): Finding {
  const excess = main.excessSpeedKmS;
  return finding(
    'speed',
    excess === null
      ? `At its closest it moves at ${formatSpeed(main.speedKmS)} and is bound to the ${main.body}: it has no excess speed.`
      : `It comes in with an excess speed of ${formatSpeed(excess)}${main.outcome === 'impact' ? '' : ` and moves at ${formatSpeed(main.speedKmS)} at its closest`}.`,
    [
      ...(excess === null ? [] : [kmS('excess speed', excess)]),
      ...(main.outcome === 'impact' ? [] : [kmS('speed at closest approach', main.speedKmS)]),
      ...(main.hyperbola === null ? [] : [deg('turn of its path', main.hyperbola.turnAngleDeg)]),
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

function crossingsFinding(main: Approach): Finding | null {
  const inward = main.crossings.filter(
    (item) =>
      item.direction === 'in' &&
      item.boundary !== 'entry-sphere' &&
      item.tdbSeconds <= main.tdbSeconds,
  );
  if (main.body !== 'Earth' || inward.length === 0) return null;
  const last = inward[inward.length - 1];
  const out = main.crossings.findLast((item) => item.direction === 'out');
  const first = inward[0];
  const leaves =
    out === undefined
      ? ''
      : `; it leaves ${BOUNDARY_WORDS[out.boundary]} on ${formatMoment(out.tdbSeconds)}`;
  const reaches: Partial<Record<Crossing['boundary'], string>> = {
    ground: 'would reach the ground, were there no air,',
    'entry-interface': 'reaches the entry interface',
  };
  const deepest =
    last === first
      ? ''
      : ` and ${reaches[last.boundary] ?? `comes inside ${BOUNDARY_WORDS[last.boundary]}`} ${formatDuration(last.tdbSeconds - first.tdbSeconds)} later`;
  return finding(
    'crossings',
    `It enters ${BOUNDARY_WORDS[first.boundary]} on ${formatMoment(first.tdbSeconds)}${deepest}${leaves}.`,
    [],
    {
      model: 'n-body trajectory against spheres about the Earth’s centre, and the WGS 84 ellipsoid',
      formula: 'root of the distance less the radius, to 1e-6 s',
      source: 'radii: common practice (925 000, 384 400, 42 164, 8 378.137 km)',
    },
    first.tdbSeconds,
  );
}

function focusingFinding(main: Approach): Finding | null {
  const { hyperbola, targetPlane } = main;
  if (hyperbola === null || targetPlane === null || main.body !== 'Earth') return null;
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

function classicalFinding(draft: FindingsDraft, main: Approach): Finding | null {
  const { comparison, classical } = draft;
  if (classical === null || main.body !== 'Earth') return null;
  if (comparison === null) {
    return finding(
      'classical-check',
      `The two-body orbits alone do not show this pass: they come closest, ${formatKm(classical.closest.distanceKm)}, on ${formatDay(classical.closest.tdbSeconds)}. The pulls they leave out decide here; the n-body answer stands.`,
      [km('two-body closest distance', classical.closest.distanceKm)],
      PATCHED,
      classical.closest.tdbSeconds,
    );
  }
  const periapsis = comparison.classicalPeriapsisKm;
  const focused =
    periapsis === null
      ? 'without entering the sphere of influence'
      : `focused to ${formatKm(periapsis)} by the hyperbola`;
  const late = comparison.classicalTimeMinusNBodyS;
  return finding(
    'classical-check',
    `The classical chain gives an unperturbed miss of ${formatKm(comparison.unperturbedDistanceKm)}, ${focused}, ${formatDuration(late)} ${late < 0 ? 'early' : 'late'}; the n-body answer is ${formatKm(comparison.nBodyDistanceKm)}. The difference is what the other pulls on the way do.`,
    [
      km('unperturbed two-body miss', comparison.unperturbedDistanceKm),
      ...(periapsis === null ? [] : [km('periapsis by patched conics', periapsis)]),
      km('n-body distance', comparison.nBodyDistanceKm),
      { label: 'classical less n-body time', value: late, unit: 's', text: formatNumber(late, 0) },
    ],
    PATCHED,
    main.tdbSeconds,
  );
}

function targetPlaneFinding(main: Approach): Finding | null {
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
      model: `hyperbola osculating at ${main.osculatingAt === 'closest-approach' ? 'closest approach' : 'the first of its entry'}`,
      formula:
        'T = S × K made unit, K the ecliptic north pole; R = S × T; ζ against the projected motion of the body',
      source: 'Kizner 1961; Valsecchi et al. 2003',
    },
    main.tdbSeconds,
  );
}

/** A pass of the Moon this near belongs to the answer, lunar radii. */
const NEAR_MOON_RADII = 10;
/** Approaches of the Moon this close in time belong to a pass of the Earth, s. */
const SAME_PASS_S = 5 * 86400;

/** The nearest pass of the Moon that goes with a pass of the Earth. */
function nearMoon(draft: FindingsDraft, main: Approach): Approach | null {
  if (main.body !== 'Earth') return null;
  return (
    draft.approaches
      .filter(
        (item) => item.body === 'Moon' && Math.abs(item.tdbSeconds - main.tdbSeconds) < SAME_PASS_S,
      )
      .sort((a, b) => a.distanceKm - b.distanceKm)[0] ?? null
  );
}

function moonFinding(near: Approach): Finding {
  return finding(
    'moon',
    `It passes ${formatKm(near.distanceKm)} from the Moon’s centre, ${radii(near)}, on ${formatMoment(near.tdbSeconds)}.`,
    [km('distance from the Moon’s centre', near.distanceKm), kmS('speed', near.speedKmS)],
    N_BODY,
    near.tdbSeconds,
  );
}

function orbitFinding(main: Approach): Finding | null {
  const before = main.orbitBefore;
  const after = main.orbitAfter;
  if (before === undefined || after === undefined) return null;
  const size = (item: typeof before): string =>
    item.semiMajorAxisAu === null ? 'no closed orbit' : formatAu(item.semiMajorAxisAu);
  const plain = (label: string, value: number, digits: number, unit: string): Figure => ({
    label,
    value,
    unit,
    text: formatNumber(value, digits),
  });
  return finding(
    'orbit-change',
    `The pass turns its orbit about the Sun from a = ${size(before)}, e = ${formatNumber(before.eccentricity, 3)}, i = ${formatDegrees(before.inclinationDeg, 2)} to a = ${size(after)}, e = ${formatNumber(after.eccentricity, 3)}, i = ${formatDegrees(after.inclinationDeg, 2)}.`,
    [
      plain('periapsis before', before.periapsisAu, 5, 'au'),
      plain('periapsis after', after.periapsisAu, 5, 'au'),
      ...(before.periodDays === null ? [] : [plain('period before', before.periodDays, 1, 'd')]),
      ...(after.periodDays === null ? [] : [plain('period after', after.periodDays, 1, 'd')]),
    ],
    {
      model: 'heliocentric elements osculating up to 60 days before and after the pass',
      formula: 'elements of the n-body state about the Sun',
      source: 'Vallado 2013, algorithm 9',
    },
  );
}

function moidFinding(draft: FindingsDraft): Finding | null {
  if (draft.classical === null) return null;
  const { distanceKm, distanceAu } = draft.classical.moid;
  return finding(
    'moid',
    `The two orbits, as they are at the epoch, come within ${formatAu(distanceAu)} (${formatKm(distanceKm)}) of each other.`,
    [km('minimum orbit intersection distance', distanceKm)],
    {
      model: 'osculating heliocentric orbits of the object and of the Earth at the epoch',
      formula: 'least distance over both true anomalies',
      source: 'definition; damped Newton search, Levenberg 1944',
    },
  );
}

function othersFinding(draft: FindingsDraft, main: Approach | null): Finding | null {
  const others = draft.approaches.filter(
    (item) =>
      item !== main &&
      !(
        item.body === 'Moon' &&
        main !== null &&
        Math.abs(item.tdbSeconds - main.tdbSeconds) < SAME_PASS_S
      ),
  );
  if (others.length === 0) return null;
  const nearest = others.reduce((a, b) => (b.distanceKm < a.distanceKm ? b : a));
  const many = others.length === 1 ? 'One other approach' : `${others.length} other approaches`;
  return finding(
    'other-approaches',
    `${many} in the span ${draft.model.span.fromUtc.slice(0, 10)} to ${draft.model.span.toUtc.slice(0, 10)}; the nearest is ${formatKm(nearest.distanceKm)} from ${CENTRES[nearest.body]} on ${formatDay(nearest.tdbSeconds)}.`,
    [],
    N_BODY,
    nearest.tdbSeconds,
  );
}

const FIRST_ORDER = {
  model:
    'covariance of the case carried to the approach by the variational equations (first order)',
  formula: 'P = Φ P₀ Φᵀ at the moving time of closest approach; Gaussian of B over the impact disc',
  source: 'Milani & Gronchi 2010; Montenbruck & Gill 2000',
};

function certaintyFinding(main: Approach | null): Finding {
  const given = main?.uncertainty;
  if (main === null || given === undefined) {
    return finding(
      'certainty',
      'No covariance was given: these are figures of the nominal orbit alone, and how sure they are is not known here.',
      [],
      {
        model: 'one trajectory, from the state as given',
        formula: 'none',
        source: 'digits show how the model is computed, not how well the orbit is known',
      },
    );
  }
  const [low, high] = given.distance3SigmaKm;
  const probability = main.impactProbability?.firstOrder;
  const hit =
    probability === undefined
      ? ''
      : ` The probability of impact is ${formatProbability(probability)} at first order.`;
  return finding(
    'certainty',
    `By the covariance given, at first order (1\u2009σ): distance ±\u2009${formatKm(given.sigmaDistanceKm)}, time ±\u2009${formatDuration(given.sigmaTimeS)}. The 3-σ range of the distance is ${formatKm(low)} to ${formatKm(high)}.${hit}`,
    [
      km('σ of distance', given.sigmaDistanceKm),
      {
        label: 'σ of time',
        value: given.sigmaTimeS,
        unit: 's',
        text: formatNumber(given.sigmaTimeS, 1),
      },
      kmS('σ of speed', given.sigmaSpeedKmS),
      ...(given.ellipse === null
        ? []
        : [
            km('1 σ on the target plane, major', given.ellipse.semiMajorKm),
            km('1 σ on the target plane, minor', given.ellipse.semiMinorKm),
          ]),
      ...(probability === undefined
        ? []
        : [
            {
              label: 'probability of impact, first order',
              value: probability,
              unit: '',
              text: formatProbability(probability),
            },
          ]),
    ],
    FIRST_ORDER,
    main.tdbSeconds,
  );
}

function assumptionsFinding(draft: FindingsDraft): Finding | null {
  const list = draft.case.asAssumed.filter((item) => item.origin === 'assumed');
  if (list.length === 0) return null;
  const named = list.map((item) => `${item.field} ${item.value}`).join('; ');
  return finding(
    'assumptions',
    `${list.length === 1 ? 'One field was' : `${list.length} fields were`} not in the text and ${list.length === 1 ? 'was' : 'were'} assumed: ${named}.`,
    [],
    {
      model: 'the case as understood',
      formula: 'none',
      source: 'each is marked on the case sheet and can be changed',
    },
  );
}

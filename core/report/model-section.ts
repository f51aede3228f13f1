import {
  AU_KM,
  BODIES,
  EARTH_FLATTENING,
  EARTH_J2,
  EARTH_RADIUS_KM,
  ENTRY_INTERFACE_ALTITUDE_KM,
  GM_KM3_S2,
  type GmSet,
  MOON_RADIUS_KM,
  OBLIQUITY_J2000_ARCSEC,
  SPEED_OF_LIGHT_KM_S,
  SPHERE_OF_INFLUENCE_KM,
  SUN_J2,
} from '../constants';
import { TARGETS } from '../encounter/targets';
import { jdFromTdbSeconds } from '../time/convert';
import { formatIso } from '../time/format';
import { LEAP_SECONDS_KNOWN_TO } from '../time/leap-seconds';
import type { Report } from './report';

/** What the model section is made from. */
export interface ModelFacts {
  gm: GmSet;
  coverageText: string;
  tolerance: number;
  nonGravitational: boolean;
  fromTdbSeconds: number;
  toTdbSeconds: number;
  rule: string;
  trajectoryEnds: string | null;
}

/** The model behind the figures, in full: ephemeris, masses, terms, integrator, span, assumptions. */
export function modelSection(facts: ModelFacts): Report['model'] {
  const gm = GM_KM3_S2[facts.gm];
  const bodies = BODIES.filter((body) => gm[body] > 0);
  return {
    ephemeris:
      'JPL DE405 (Standish 1998), Chebyshev coefficients as published; planets with their satellites as one point',
    ephemerisCoverage: facts.coverageText,
    gmSet: facts.gm,
    bodies: bodies.map((body) => ({ body, gmKm3S2: gm[body] })),
    terms: [
      `Newtonian point masses: ${bodies.join(', ')}`,
      'relativity of the Sun, first post-Newtonian order (Schwarzschild)',
      ...(SUN_J2[facts.gm] > 0 ? ['oblateness J2 of the Sun'] : []),
      'oblateness J2 of the Earth within 10 000 000 km, pole of date',
      ...(facts.nonGravitational
        ? ['non-gravitational A1, A2, A3 with g(r) = (1 au/r)² (Marsden, Sekanina & Yeomans 1973)']
        : []),
    ],
    integrator:
      'Dormand–Prince 8(5,3) (Hairer, Nørsett & Wanner 1993), barycentric ICRF, dense output; events refined on fresh steps',
    tolerance: facts.tolerance,
    constants: {
      auKm: AU_KM,
      speedOfLightKmS: SPEED_OF_LIGHT_KM_S,
      earthEquatorialRadiusKm: EARTH_RADIUS_KM,
      earthFlattening: EARTH_FLATTENING,
      earthJ2: EARTH_J2,
      moonRadiusKm: MOON_RADIUS_KM,
      obliquityJ2000Arcsec: OBLIQUITY_J2000_ARCSEC,
      entryInterfaceAltitudeKm: ENTRY_INTERFACE_ALTITUDE_KM,
      sphereOfInfluenceKm: SPHERE_OF_INFLUENCE_KM,
    },
    span: {
      fromJdTdb: jdFromTdbSeconds(facts.fromTdbSeconds),
      toJdTdb: jdFromTdbSeconds(facts.toTdbSeconds),
      fromUtc: formatIso(facts.fromTdbSeconds, 'UTC', 0),
      toUtc: formatIso(facts.toTdbSeconds, 'UTC', 0),
      rule: facts.rule,
    },
    searchLimitsKm: Object.fromEntries(TARGETS.map((target) => [target.body, target.limitKm])),
    timeAssumptions: [
      LEAP_SECONDS_KNOWN_TO,
      'UT1 = UTC: the Earth’s rotation may be off by up to 0.9 s (0.4 km on the equator).',
      'Polar motion neglected (up to 0.5″, 15 m on the ground).',
    ],
    notModelled: [
      'atmospheric drag, lift, ablation and break-up',
      'asteroids other than the object; gravity of the Earth beyond J2, of the Moon beyond a point mass',
      'relativity of the planets',
      'frame bias between ICRF and EME2000 (0.02″)',
      'light time and aberration: states are geometric',
    ],
    trajectoryEnds: facts.trajectoryEnds,
  };
}

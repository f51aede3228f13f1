import { BODY_INDEX, SECONDS_PER_DAY, SPHERE_OF_INFLUENCE_KM } from './constants';
import type { ApproachRecord } from './encounter/approach';
import { type Leg, stateInLeg } from './encounter/leg';
import type { Ephemeris } from './ephemeris';
import { bodyState } from './ephemeris/earth-moon';
import { icrfToEcliptic } from './frames/ecliptic';
import { subtract, vec3 } from './math/vector';
import type { ClassicalEncounter } from './orbit/classical';
import { elementsFromState } from './orbit/elements';
import type { Approach, Comparison, ReportElements } from './report/report';
import { elementsSection } from './report/sections';
import { jdFromTdbSeconds } from './time/convert';

/** Parts of the report that need the trajectory: what a pass does, and how the two answers compare. */

/** The orbit before and after a pass is taken this far from it, or as far as the span allows. */
const ORBIT_CHANGE_S = 60 * SECONDS_PER_DAY;
const LEAST_ORBIT_CHANGE_S = 5 * SECONDS_PER_DAY;
/** A two-body approach this far in time from the n-body one is not the same pass. */
const SAME_PASS_S = 10 * SECONDS_PER_DAY;

/** Heliocentric elements before and after a pass inside the Earth's sphere of influence. */
export function orbitChange(
  record: ApproachRecord,
  legs: readonly Leg[],
  ephemeris: Ephemeris,
  gmSun: number,
): Pick<Approach, 'orbitBefore' | 'orbitAfter'> {
  if (record.body !== 'Earth' || record.distanceKm > SPHERE_OF_INFLUENCE_KM) return {};
  const at = (direction: 1 | -1): ReportElements | null => {
    const state = new Float64Array(6);
    for (let reach = ORBIT_CHANGE_S; reach >= LEAST_ORBIT_CHANGE_S; reach -= LEAST_ORBIT_CHANGE_S) {
      const tdbSeconds = record.tdbSeconds + direction * reach;
      if (!legs.some((leg) => stateInLeg(leg, tdbSeconds, state))) continue;
      const sun = bodyState(ephemeris, BODY_INDEX.Sun, tdbSeconds);
      return elementsSection(
        elementsFromState(
          icrfToEcliptic(subtract(vec3(state), sun.r)),
          icrfToEcliptic(subtract(vec3(state, 3), sun.v)),
          gmSun,
        ),
      );
    }
    return null;
  };
  const before = at(-1);
  const after = record.outcome === 'impact' ? null : at(1);
  return {
    ...(before === null ? {} : { orbitBefore: before }),
    ...(after === null ? {} : { orbitAfter: after }),
  };
}

/** The two answers for the principal pass of the Earth side by side. */
export function comparisonOf(
  record: ApproachRecord | null,
  classical: ClassicalEncounter,
  epoch: number,
): Comparison | null {
  if (record === null || record.body !== 'Earth') return null;
  const unperturbed = classical.approaches
    .filter((item) => Math.abs(epoch + item.dtS - record.tdbSeconds) <= SAME_PASS_S)
    .sort((a, b) => a.distanceKm - b.distanceKm)[0];
  if (unperturbed === undefined) return null;
  const sameEntry = classical.closest.dtS === unperturbed.dtS;
  const periapsis = sameEntry ? classical.periapsis : null;
  return {
    jdTdb: jdFromTdbSeconds(record.tdbSeconds),
    unperturbedDistanceKm: unperturbed.distanceKm,
    classicalPeriapsisKm: periapsis?.distanceKm ?? null,
    nBodyDistanceKm: record.distanceKm,
    impactParameterKm: record.hyperbola?.impactParameterKm ?? null,
    classicalTimeMinusNBodyS: epoch + (periapsis?.dtS ?? unperturbed.dtS) - record.tdbSeconds,
  };
}

export function endsInWords(forward: Leg, backward: Leg): string | null {
  const circled = forward.circled ?? backward.circled;
  const words = [
    ...(forward.surface === null
      ? []
      : [`It ends where it meets the surface of the ${forward.surface.body}.`]),
    ...(backward.surface === null
      ? []
      : [`It begins on the surface of the ${backward.surface.body}.`]),
    ...(circled === null
      ? []
      : [
          `The search was stopped after a hundred approaches: the object circles the ${circled}. Ask for a shorter span to see another part.`,
        ]),
  ];
  return words.length === 0 ? null : words.join(' ');
}

import { AU_KM, SECONDS_PER_DAY } from '../constants';
import { icrfToEcliptic } from '../frames/ecliptic';
import { findRoot } from '../math/roots';
import { add, dot, norm, subtract, type Vec3 } from '../math/vector';
import { type Elements, elementsFromState } from './elements';
import {
  flightPathAngleAtRadius,
  type Hyperbola,
  hyperbolaFromState,
  speedAtRadius,
  timeToPeriapsisFrom,
  travelTime,
} from './hyperbola';
import { type Moid, moid } from './moid';
import { propagateTwoBody } from './propagate';

interface State {
  r: Vec3;
  v: Vec3;
}

export interface ClassicalInput {
  /** Heliocentric states at the epoch, km and km/s, ICRF axes. */
  object: State;
  /** Of the Earth–Moon barycentre. */
  earth: State;
  gmSun: number;
  gmEarthMoon: number;
  gmEarth: number;
  /** The Earth's centre relative to the Earth–Moon barycentre, so many seconds after the epoch. */
  earthOffset(dtS: number): State;
  /** First and last second looked at, relative to the epoch. */
  spanS: readonly [number, number];
  sphereOfInfluenceKm: number;
  entryRadiusKm: number;
}

/** Times are seconds after the epoch. */
export interface ClassicalEncounter {
  /** On the ecliptic and equinox of J2000. */
  objectElements: Elements;
  earthElements: Elements;
  moid: Moid;
  /** The nearest the two unperturbed orbits bring object and Earth in the span. */
  closest: { dtS: number; distanceKm: number };
  /** Every local minimum of that distance below 0.5 au. */
  approaches: { dtS: number; distanceKm: number }[];
  /** Entering the sphere of influence before the closest approach; null when it is never entered. */
  sphereEntry: { dtS: number; r: Vec3; v: Vec3 } | null;
  hyperbola: Hyperbola | null;
  periapsisBelowInterface: boolean;
  /** At the entry radius on the way in; travel time from the sphere of influence. */
  interface: {
    dtS: number;
    speedKmS: number;
    flightPathAngleRad: number;
    travelTimeS: number;
  } | null;
  periapsis: { dtS: number; distanceKm: number; speedKmS: number; travelTimeS: number } | null;
}

const APPROACH_LIMIT_KM = 0.5 * AU_KM;
const TIME_TOLERANCE_S = 1e-3;

/**
 * The classical chain: two-body orbits about the Sun, sphere of influence, geocentric hyperbola.
 *
 * @param input states at the epoch and the boundaries
 * @returns     the chain's result; parts that do not come about are null. An object that is inside
 *              the sphere at the epoch, on the passage of its closest approach, takes its geocentric
 *              state there and the entry by running that hyperbola back; bound to the Earth, it
 *              counts as entering at the epoch.
 * @throws      DegenerateOrbit, KeplerFailure for states with no orbit
 * Accuracy: that of its assumptions; it is the first answer and the cross-check of the n-body one.
 * Source: patched conics, Bate, Mueller & White, Fundamentals of Astrodynamics (1971), ch. 7 and 8.
 */
export function classicalEncounter(input: ClassicalInput): ClassicalEncounter {
  const { object, earth, gmSun, gmEarthMoon } = input;
  const elements = ({ r, v }: State, gm: number): Elements =>
    elementsFromState(icrfToEcliptic(r), icrfToEcliptic(v), gm);
  const objectElements = elements(object, gmSun);
  // The Earth's own osculating orbit: against it the published distances between orbits are taken.
  const offset = input.earthOffset(0);
  const earthElements = elements({ r: add(earth.r, offset.r), v: add(earth.v, offset.v) }, gmSun);
  const relative = (dtS: number): State => {
    const a = propagateTwoBody(object.r, object.v, gmSun, dtS);
    const b = propagateTwoBody(earth.r, earth.v, gmSun + gmEarthMoon, dtS);
    const offset = input.earthOffset(dtS);
    return {
      r: subtract(subtract(a.r, b.r), offset.r),
      v: subtract(subtract(a.v, b.v), offset.v),
    };
  };
  const { closest, minima } = search(relative, input.spanS);
  const sphereEntry = entryBefore(relative, closest, input);
  return {
    objectElements,
    earthElements,
    moid: moid(objectElements, earthElements),
    closest,
    approaches: minima.filter((item) => item.distanceKm <= APPROACH_LIMIT_KM),
    sphereEntry,
    ...encounterOf(sphereEntry, input),
  };
}

type Approach = ClassicalEncounter['closest'];

/** All local minima of the distance in the span, and the least distance in it. */
function search(
  relative: (dtS: number) => State,
  [from, to]: readonly [number, number],
): { closest: Approach; minima: Approach[] } {
  const count = Math.max(8, Math.ceil((to - from) / SECONDS_PER_DAY));
  const radial = (t: number): number => {
    const { r, v } = relative(t);
    return dot(r, v);
  };
  const at = (t: number): Approach => ({ dtS: t, distanceKm: norm(relative(t).r) });
  const minima: Approach[] = [];
  let before = radial(from);
  for (let i = 1; i <= count; i++) {
    const t = from + ((to - from) * i) / count;
    const now = radial(t);
    if (before < 0 && now >= 0) {
      minima.push(at(findRoot(radial, t - (to - from) / count, t, TIME_TOLERANCE_S)));
    }
    before = now;
  }
  const closest = [...minima, at(from), at(to)].reduce((a, b) =>
    b.distanceKm < a.distanceKm ? b : a,
  );
  return { closest, minima };
}

/** Entering the sphere before the closest approach, or as the epoch's own hyperbola says. */
function entryBefore(
  relative: (dtS: number) => State,
  closest: Approach,
  input: ClassicalInput,
): ClassicalEncounter['sphereEntry'] {
  const { sphereOfInfluenceKm: radius, gmEarth } = input;
  if (closest.distanceKm >= radius) return null;
  const entry = edgeOfSphere(relative, closest, radius, -1);
  const epoch = relative(0);
  if (norm(epoch.r) < radius && (entry === null || entry <= 0)) {
    const exit = edgeOfSphere(relative, closest, radius, 1);
    if (exit === null || exit >= 0) {
      const hyperbola = hyperbolaFromState(epoch.r, epoch.v, gmEarth);
      const back = hyperbola === null ? null : timeToPeriapsisFrom(hyperbola, radius, gmEarth);
      if (hyperbola === null || back === null) return { dtS: 0, ...epoch };
      const dtS = hyperbola.timeToPeriapsisS - back;
      return { dtS, ...propagateTwoBody(epoch.r, epoch.v, gmEarth, dtS) };
    }
  }
  return entry === null ? null : { dtS: entry, ...relative(entry) };
}

/** Steps to the sphere's edge before an object counts as staying inside. */
const MOST_STEPS_INSIDE = 400;

/** When the sphere is entered before (or left after) the closest approach; null when it is not. */
function edgeOfSphere(
  relative: (dtS: number) => State,
  closest: Approach,
  radius: number,
  direction: 1 | -1,
): number | null {
  const excess = (t: number): number => norm(relative(t).r) - radius;
  // A fifth of the sphere at a time; a faster object has left it in a few steps.
  const step = (0.2 * radius * direction) / Math.max(0.5, norm(relative(closest.dtS).v));
  for (let i = 1; i <= MOST_STEPS_INSIDE; i++) {
    const t = closest.dtS + i * step;
    if (excess(t) >= 0) return findRoot(excess, t - step, t, TIME_TOLERANCE_S);
  }
  return null;
}

/** What the hyperbola from the sphere's edge says. */
function encounterOf(
  entry: ClassicalEncounter['sphereEntry'],
  input: ClassicalInput,
): Pick<ClassicalEncounter, 'hyperbola' | 'periapsisBelowInterface' | 'interface' | 'periapsis'> {
  const { gmEarth, entryRadiusKm } = input;
  const hyperbola = entry === null ? null : hyperbolaFromState(entry.r, entry.v, gmEarth);
  if (entry === null || hyperbola === null) {
    return { hyperbola: null, periapsisBelowInterface: false, interface: null, periapsis: null };
  }
  const toPeriapsis = hyperbola.timeToPeriapsisS;
  const below = hyperbola.periapsisKm < entryRadiusKm;
  const travelTimeS = travelTime(hyperbola, norm(entry.r), entryRadiusKm, gmEarth);
  const angle = flightPathAngleAtRadius(hyperbola, entryRadiusKm);
  return {
    hyperbola,
    periapsisBelowInterface: below,
    interface:
      travelTimeS === null || angle === null
        ? null
        : {
            dtS: entry.dtS + travelTimeS,
            speedKmS: speedAtRadius(hyperbola, entryRadiusKm, gmEarth),
            flightPathAngleRad: angle,
            travelTimeS,
          },
    periapsis: {
      dtS: entry.dtS + toPeriapsis,
      distanceKm: hyperbola.periapsisKm,
      speedKmS: hyperbola.periapsisSpeedKmS,
      travelTimeS: toPeriapsis,
    },
  };
}

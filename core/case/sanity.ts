import { AU_KM, BODY_RADIUS_KM } from '../constants';
import { gmOfCentre } from './centre-gm';
import type { Centre } from './types';

/** What is absurd about a state, in words. */

const FASTEST_KM_S = 300;
const FARTHEST_KM = 100 * AU_KM;

const CENTRE_BODY: Partial<Record<Centre, { name: string; radiusKm: number }>> = {
  Sun: { name: 'the Sun', radiusKm: BODY_RADIUS_KM.Sun },
  SSB: { name: 'the Sun', radiusKm: 0.1 * BODY_RADIUS_KM.Sun },
  Earth: { name: 'the Earth', radiusKm: BODY_RADIUS_KM.Earth - 25 },
  Moon: { name: 'the Moon', radiusKm: BODY_RADIUS_KM.Moon },
};

export interface Absurdity {
  field: 'position' | 'velocity';
  message: string;
}

/**
 * @param distanceKm from the centre
 * @param speedKmS   relative to the centre
 * @returns          the first thing that cannot be, or null
 */
export function absurdity(centre: Centre, distanceKm: number, speedKmS: number): Absurdity | null {
  const body = CENTRE_BODY[centre];
  if (distanceKm === 0) return { field: 'position', message: 'the position is the centre itself' };
  if (body !== undefined && distanceKm < body.radiusKm) {
    return {
      field: 'position',
      message: `the position lies inside ${body.name}: ${say(distanceKm)} km from its centre`,
    };
  }
  if (distanceKm > FARTHEST_KM) {
    return {
      field: 'position',
      message: `the position is ${say(distanceKm / AU_KM)} au out; nothing beyond 100 au is an Earth approach`,
    };
  }
  if (speedKmS > FASTEST_KM_S) {
    return {
      field: 'velocity',
      message: `the speed is ${say(speedKmS)} km/s; nothing in the solar system moves faster than 300 km/s`,
    };
  }
  if (speedKmS === 0) {
    return {
      field: 'velocity',
      message: 'the velocity is zero: the orbit would be a straight fall',
    };
  }
  return null;
}

const say = (value: number): string => String(Number(value.toPrecision(4)));

/** Escape speed from the centre at a distance, km/s. */
export function escapeSpeedKmS(centre: Centre, distanceKm: number): number {
  return Math.sqrt((2 * gmOfCentre(centre, 'DE431')) / distanceKm);
}

/** Speeds, in parts of the escape speed, between which orbits about the Sun are usual. */
const USUAL_PARTS = [0.05, 2] as const;
/** Nothing bound to the Sun passes the Earth or the Moon faster, km/s (retrograde, head-on). */
const FASTEST_PASS_KM_S = 80;

/** Whether an object could well have a state: what guesses and hints about units go by. */
export function isPlausible(centre: Centre, distanceKm: number, speedKmS: number): boolean {
  if (absurdity(centre, distanceKm, speedKmS) !== null) return false;
  const escapeKmS = escapeSpeedKmS(centre, distanceKm);
  if (speedKmS < USUAL_PARTS[0] * escapeKmS) return false;
  return centre === 'Sun' || centre === 'SSB'
    ? speedKmS < USUAL_PARTS[1] * escapeKmS
    : speedKmS < FASTEST_PASS_KM_S + escapeKmS;
}

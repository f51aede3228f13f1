import { GM_KM3_S2, type GmSet } from '../constants';
import type { Centre } from './types';

/** Gravitational parameter that an orbit about a centre is used with, km³/s²; about SSB the Sun's. */
export function gmOfCentre(centre: Centre, set: GmSet): number {
  const gm = GM_KM3_S2[set];
  switch (centre) {
    case 'Sun':
    case 'SSB':
      return gm.Sun;
    case 'EarthBarycentre':
      return gm.Earth + gm.Moon;
    default:
      return gm[centre];
  }
}

import { AU_KM, type GmSet, SECONDS_PER_DAY } from '../constants';
import type { TimeScale } from '../time/epoch';
import type { Axes, Centre } from './types';

/** The words of the trade that a case is written in, and what each is taken for. */

export interface Word<T> {
  value: T;
  label: string;
  /** Spoken forms, upper case, with runs of blanks, hyphens and underscores as one blank. */
  spoken: string[];
}

export const CENTRES: Word<Centre>[] = [
  { value: 'Sun', label: 'the Sun', spoken: ['SUN', 'HELIOCENTRIC', 'HELIOCENTRE', '10'] },
  {
    value: 'SSB',
    label: 'the solar-system barycentre',
    spoken: [
      'SSB',
      'SOLAR SYSTEM BARYCENTER',
      'SOLAR SYSTEM BARYCENTRE',
      'BARYCENTRIC',
      'BARYCENTER',
      'BARYCENTRE',
      '0',
    ],
  },
  { value: 'Earth', label: 'the Earth', spoken: ['EARTH', 'GEOCENTRIC', 'GEOCENTER', '399'] },
  {
    value: 'EarthBarycentre',
    label: 'the Earth–Moon barycentre',
    spoken: [
      'EARTHBARYCENTRE',
      'EARTH BARYCENTER',
      'EARTH BARYCENTRE',
      'EARTH MOON BARYCENTER',
      'EARTH MOON BARYCENTRE',
      'EMB',
      '3',
    ],
  },
  { value: 'Moon', label: 'the Moon', spoken: ['MOON', 'SELENOCENTRIC', '301'] },
];

export const AXES: Word<Axes>[] = [
  {
    value: 'ICRF',
    label: 'ICRF (equator of J2000)',
    spoken: ['ICRF', 'ICRS', 'GCRF', 'EME2000', 'J2000', 'EQUATORIAL', 'EQUATOR', 'ICRF2', 'ICRF3'],
  },
  {
    value: 'EclipticJ2000',
    label: 'ecliptic and equinox of J2000',
    spoken: ['ECLIPTICJ2000', 'ECLIPJ2000', 'ECLIPTIC', 'ECLIPTIC J2000', 'ECLIP'],
  },
];

export const SCALES: Word<TimeScale>[] = [
  { value: 'TDB', label: 'TDB', spoken: ['TDB', 'ET'] },
  { value: 'TT', label: 'TT', spoken: ['TT', 'TDT'] },
  { value: 'TAI', label: 'TAI', spoken: ['TAI'] },
  { value: 'UTC', label: 'UTC', spoken: ['UTC', 'UT', 'GMT'] },
  { value: 'GPS', label: 'GPS', spoken: ['GPS'] },
];

export const GM_SETS: Word<GmSet>[] = [
  { value: 'DE431', label: 'DE431 (fits published approaches)', spoken: ['DE431'] },
  { value: 'DE405', label: 'DE405 (that of the ephemeris)', spoken: ['DE405'] },
];

export const NUMBER_FORMATS: Word<'point' | 'comma'>[] = [
  { value: 'point', label: 'decimal point', spoken: ['POINT'] },
  { value: 'comma', label: 'decimal comma', spoken: ['COMMA'] },
];

export interface Unit {
  /** km, or km/s, of one. */
  size: number;
}

export const LENGTH_UNITS: (Word<string> & Unit)[] = [
  { value: 'km', label: 'km', size: 1, spoken: ['KM', 'KILOMETRES', 'KILOMETERS', 'KILOMETRE'] },
  { value: 'au', label: 'au', size: AU_KM, spoken: ['AU', 'UA', 'ASTRONOMICAL UNITS'] },
  { value: 'm', label: 'm', size: 1e-3, spoken: ['M', 'METRES', 'METERS'] },
  { value: 'Mkm', label: 'million km', size: 1e6, spoken: ['MKM', 'GM', 'MILLION KM'] },
];

export const SPEED_UNITS: (Word<string> & Unit)[] = [
  {
    value: 'km/s',
    label: 'km/s',
    size: 1,
    spoken: ['KM/S', 'KM/SEC', 'KM S 1', 'KM S^ 1', 'KM*S** 1'],
  },
  {
    value: 'au/d',
    label: 'au/d',
    size: AU_KM / SECONDS_PER_DAY,
    spoken: ['AU/D', 'AU/DAY', 'AU D 1', 'AU DAY 1'],
  },
  { value: 'm/s', label: 'm/s', size: 1e-3, spoken: ['M/S', 'M S 1'] },
  { value: 'km/d', label: 'km/d', size: 1 / SECONDS_PER_DAY, spoken: ['KM/D', 'KM/DAY'] },
];

const plain = (text: string): string =>
  text
    .toUpperCase()
    .replace(/[-_\s\u2212\u2013]+/g, ' ')
    .trim();

/** The word that a text stands for, or null. */
export function lookUp<W extends Word<unknown>>(words: readonly W[], text: string): W | null {
  const spoken = plain(text);
  return words.find((word) => word.spoken.includes(spoken) || word.value === text.trim()) ?? null;
}

/** What could have been said, for a message. */
export const known = (words: readonly Word<unknown>[]): string =>
  words.map((word) => String(word.value)).join(', ');

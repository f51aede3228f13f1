/** What an epoch is, before and after it is carried to TDB seconds past J2000. */

export type TimeScale = 'TDB' | 'TT' | 'TAI' | 'UTC' | 'GPS';

/**
 * An instant in a named time scale, split so that no digit is lost: whole days as a modified Julian
 * day number (0 h of that scale) and the second of the day (UTC: up to 86 401 on a day that ends
 * with a leap second).
 */
export interface Epoch {
  readonly scale: TimeScale;
  readonly mjd: number;
  readonly secondOfDay: number;
}

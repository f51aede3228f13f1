import { describe, expect, it } from 'vitest';
import { calendarFromMjd, mjdFromCalendar } from '../../core/time/calendar';
import { epochFromTdbSeconds, tdbSecondsFromEpoch } from '../../core/time/convert';
import type { TimeScale } from '../../core/time/epoch';
import { formatIso } from '../../core/time/format';
import { taiMinusUtc } from '../../core/time/leap-seconds';
import { readEpochText } from '../../core/time/read';
import reference from './data/time-erfa.json';

/** Time scales, calendar and text against ERFA 2.0.0; the generating script is in the data file. */

const texts = reference.texts as unknown as [TimeScale, number, number, number, string][];
const instants = [...reference.instants, ...reference.leapInstants];

/** Two units in the last place of a double of 2e9 s. */
const ROUNDING_S = 5e-7;

/** The epoch `seconds` after 0 h of day `mjd`, where the scale's day is 86400 s. */
function uniform(scale: TimeScale, mjd: number, seconds: number) {
  const days = Math.floor(seconds / 86400);
  return { scale, mjd: mjd + days, secondOfDay: seconds - 86400 * days };
}

function largest(rows: readonly unknown[], errors: readonly number[]): number {
  expect(errors.length).toBe(rows.length);
  expect(rows.length).toBeGreaterThan(90);
  return errors.reduce((worst, error) => Math.max(worst, Math.abs(error)), 0);
}

describe('against ERFA', () => {
  it('TAI − UTC is that of eraDat in every month from 1960 to 2030, drift and steps included', () => {
    const errors = reference.offsets.map(
      ([mjd, fraction, seconds]) => taiMinusUtc(mjd + fraction) - seconds,
    );
    const worst = largest(reference.offsets, errors);
    // 1e-9 s: the day with its fraction in one double is good to 4e-12 d, the drift is 3 ms per day.
    expect(worst, `largest error ${worst} s`).toBeLessThan(1e-9);
  });

  it('UTC gives the TAI, TT and GPS of eraUtctai and eraTaitt, inside leap seconds too', () => {
    const errors = instants.flatMap(([mjd, second, tai, tt]) => {
      const tdbSeconds = tdbSecondsFromEpoch({ scale: 'UTC', mjd, secondOfDay: second });
      const back = (scale: TimeScale) => {
        const epoch = epochFromTdbSeconds(tdbSeconds, scale);
        return (epoch.mjd - mjd) * 86400 + epoch.secondOfDay;
      };
      // GPS time is TAI − 19 s by definition.
      return [back('TAI') - tai, back('TT') - tt, back('GPS') - (tai - 19)];
    });
    const worst = largest([...instants, ...instants, ...instants], errors);
    expect(worst, `largest error ${worst} s`).toBeLessThan(ROUNDING_S);
  });

  it('TAI gives back the UTC clock that ERFA started from, inside leap seconds too', () => {
    const errors = instants.map(([mjd, second, tai]) => {
      const utc = epochFromTdbSeconds(tdbSecondsFromEpoch(uniform('TAI', mjd, tai)), 'UTC');
      // A second lost or won by rounding over midnight shows as a wrong day: compare both.
      return utc.mjd === mjd ? utc.secondOfDay - second : Number.POSITIVE_INFINITY;
    });
    const worst = largest(instants, errors);
    expect(worst, `largest error ${worst} s`).toBeLessThan(ROUNDING_S);
  });

  it('UTC gives the TDB of eraDtdb within the 10 µs of the short series', () => {
    const errors = instants.map(([mjd, second, , , tdb]) => {
      const midnight = (mjd - 51544.5) * 86400;
      return tdbSecondsFromEpoch({ scale: 'UTC', mjd, secondOfDay: second }) - (midnight + tdb);
    });
    const worst = largest(instants, errors);
    expect(worst, `largest error ${worst} s`).toBeLessThan(10e-6);
  });

  it('TDB − TT is that of the full Fairhead & Bretagnon series within 10 µs over 1600–2200', () => {
    const errors = reference.tdbMinusTt.map(([days, seconds]) => {
      const mjd = 51544 + Math.floor(days + 0.5);
      const secondOfDay = (days + 0.5 - Math.floor(days + 0.5)) * 86400;
      const tt = (mjd - 51544.5) * 86400 + secondOfDay;
      return tdbSecondsFromEpoch({ scale: 'TT', mjd, secondOfDay }) - tt - seconds;
    });
    const worst = largest(reference.tdbMinusTt, errors);
    // The published bound, and 2 µs for the double of 1.3e10 s in which the sum is held.
    expect(worst, `largest error ${worst} s`).toBeLessThan(12e-6);
  });

  it('calendar dates are those of eraJd2cal', () => {
    expect(reference.dates.length).toBeGreaterThan(400);
    for (const [mjd, year, month, day] of reference.dates) {
      expect(calendarFromMjd(mjd)).toEqual({ year, month, day });
      expect(mjdFromCalendar(year, month, day)).toBe(mjd);
    }
  });

  it('text is that of eraD2dtf, with carries into minutes and days and in leap seconds', () => {
    expect(texts.length).toBeGreaterThan(900);
    for (const [scale, mjd, secondOfDay, decimals, text] of texts) {
      const tdbSeconds = tdbSecondsFromEpoch({ scale, mjd, secondOfDay });
      expect(formatIso(tdbSeconds, scale, decimals)).toBe(text);
    }
  });

  it("eraD2dtf's text reads as the instant that it was made from, within its last digit", () => {
    for (const [scale, mjd, secondOfDay, decimals, text] of texts) {
      const reading = readEpochText(scale === 'UTC' ? text : `${text} ${scale}`);
      if (reading === null || reading.scale === null) throw new Error(`not read: ${text}`);
      const { mjd: readMjd, secondOfDay: readSecond } = reading;
      const read = tdbSecondsFromEpoch({ scale, mjd: readMjd, secondOfDay: readSecond });
      const made = tdbSecondsFromEpoch({ scale, mjd, secondOfDay });
      expect(reading.scale).toBe(scale);
      expect(Math.abs(read - made), text).toBeLessThan(0.5 * 10 ** -decimals + ROUNDING_S);
    }
  });
});

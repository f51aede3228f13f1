import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  epochFromTdbSeconds,
  jdFromTdbSeconds,
  tdbSecondsFromEpoch,
  tdbSecondsFromJdTdb,
} from '../../../core/time/convert';
import type { TimeScale } from '../../../core/time/epoch';
import { EpochError } from '../../../core/time/epoch-error';
import { LEAP_SECONDS_KNOWN_TO, taiMinusUtc, utcDay } from '../../../core/time/leap-seconds';

const SCALES: readonly TimeScale[] = ['TDB', 'TT', 'TAI', 'UTC', 'GPS'];
/** Coverage of the ephemeris with room to spare: 1950 to 2070. */
const seconds = fc.double({ min: -1.58e9, max: 2.21e9, noNaN: true });

describe('leap seconds', () => {
  it('TAI − UTC is 10 s on 1972-01-01 and 37 s since 2017-01-01', () => {
    // IERS Bulletin C 52; the 10 s of 1972 by CCIR Recommendation 460.
    expect(taiMinusUtc(41317)).toBe(10);
    expect(taiMinusUtc(57753.999)).toBe(36);
    expect(taiMinusUtc(57754)).toBe(37);
    expect(taiMinusUtc(73459)).toBe(37);
    expect(LEAP_SECONDS_KNOWN_TO).toContain('37 s since 2017-01-01');
  });

  it('before 1960 the offset of 1960-01-01 is held, without a step', () => {
    expect(taiMinusUtc(36911)).toBe(taiMinusUtc(36934));
    expect(utcDay(36933).lengthSeconds).toBe(86400);
  });

  it('27 days since 1972 have 86401 seconds and all others 86400', () => {
    // 27 leap seconds from 1972 to 2016: IERS Bulletin C.
    const lengths = Array.from(
      { length: 73459 - 41317 },
      (_, i) => utcDay(41317 + i).lengthSeconds,
    );
    expect(lengths.filter((length) => length === 86401).length).toBe(27);
    expect(lengths.filter((length) => length === 86400).length).toBe(lengths.length - 27);
  });
});

describe('epochs and TDB seconds', () => {
  it('J2000.0 is 2000-01-01 12 h TDB', () => {
    expect(tdbSecondsFromEpoch({ scale: 'TDB', mjd: 51544, secondOfDay: 43200 })).toBe(0);
    expect(epochFromTdbSeconds(0, 'TDB')).toEqual({ scale: 'TDB', mjd: 51544, secondOfDay: 43200 });
  });

  it('J2000.0 is 11:58:55.816 UTC and 11:59:27.816 TAI', () => {
    // 12 h TT − 32.184 s − 32 s (Seidelmann 1992); TDB − TT is −95 µs there.
    expect(epochFromTdbSeconds(0, 'UTC').secondOfDay).toBeCloseTo(43135.816, 3);
    expect(epochFromTdbSeconds(0, 'TAI').secondOfDay).toBeCloseTo(43167.816, 3);
  });

  it('GPS time equals UTC at its start, 1980-01-06 0 h', () => {
    // IS-GPS-200, section 3.3.4.
    const start = tdbSecondsFromEpoch({ scale: 'GPS', mjd: 44244, secondOfDay: 0 });
    expect(start).toBe(tdbSecondsFromEpoch({ scale: 'UTC', mjd: 44244, secondOfDay: 0 }));
  });

  it('every scale comes back within a microsecond', () => {
    fc.assert(
      fc.property(seconds, fc.constantFrom(...SCALES), (t, scale) => {
        const epoch = epochFromTdbSeconds(t, scale);
        // Two units in the last place of 2e9 s are 5e-7 s.
        expect(Math.abs(tdbSecondsFromEpoch(epoch) - t)).toBeLessThan(1e-6);
        expect(Number.isInteger(epoch.mjd)).toBe(true);
        expect(epoch.secondOfDay).toBeGreaterThanOrEqual(0);
        const limit = scale === 'UTC' ? Math.max(86400, utcDay(epoch.mjd).lengthSeconds) : 86400;
        expect(epoch.secondOfDay).toBeLessThan(limit);
      }),
      { numRuns: 2000 },
    );
  });

  it('time runs forward through the leap second of 2016-12-31', () => {
    const midnight = tdbSecondsFromEpoch({ scale: 'UTC', mjd: 57754, secondOfDay: 0 });
    const clock = [-1.25, -0.75, -0.25, 0.25].map((ahead) => {
      const { mjd, secondOfDay } = epochFromTdbSeconds(midnight + ahead, 'UTC');
      return [mjd, Math.round(secondOfDay * 1e4) / 1e4];
    });
    expect(clock).toEqual([
      [57753, 86399.75],
      [57753, 86400.25],
      [57753, 86400.75],
      [57754, 0.25],
    ]);
  });

  it('around every step of UTC since 1960 the clock and the instant agree both ways', () => {
    const steps = Array.from({ length: 57755 - 36934 }, (_, i) => 36934 + i).filter(
      (mjd) => Math.abs(utcDay(mjd).lengthSeconds - 86400) > 1e-6,
    );
    // 27 leap seconds and, before 1972, 11 changes with a step (the other 3 change the rate alone):
    // tai-utc.dat.
    expect(steps.length).toBe(38);
    for (const mjd of steps) {
      const after = tdbSecondsFromEpoch({ scale: 'UTC', mjd: mjd + 1, secondOfDay: 0 });
      for (const ahead of [-1.2, -1, -0.6, -0.05, -0.001, 0.001, 0.5]) {
        const epoch = epochFromTdbSeconds(after + ahead, 'UTC');
        expect(Math.abs(tdbSecondsFromEpoch(epoch) - after - ahead)).toBeLessThan(1e-6);
        expect(epoch.mjd).toBe(ahead < 0 ? mjd : mjd + 1);
      }
    }
  });

  it('a Julian date carries over to seconds and back within its own resolution', () => {
    fc.assert(
      fc.property(seconds, (t) => {
        // Half a unit in the last place of 2.4e6 days is 20 µs.
        expect(Math.abs(tdbSecondsFromJdTdb(jdFromTdbSeconds(t)) - t)).toBeLessThan(2.1e-5);
      }),
    );
    expect(jdFromTdbSeconds(0)).toBe(2451545);
    expect(jdFromTdbSeconds(43200)).toBe(2451545.5);
  });

  it('what is not an instant is refused with a code', () => {
    const code = (act: () => unknown): string => {
      try {
        act();
      } catch (error) {
        if (error instanceof EpochError) return error.code;
        throw error;
      }
      return 'none';
    };
    const of = (scale: TimeScale, mjd: number, secondOfDay: number) =>
      code(() => tdbSecondsFromEpoch({ scale, mjd, secondOfDay }));
    expect(of('TDB', 51544.5, 0)).toBe('not-an-instant');
    expect(of('TDB', 51544, Number.NaN)).toBe('not-an-instant');
    expect(of('TDB', 51544, -1)).toBe('not-an-instant');
    expect(of('TDB', 57753, 86400)).toBe('not-an-instant');
    expect(of('UTC', 57753, 86400)).toBe('none');
    expect(of('UTC', 57753, 86401)).toBe('not-an-instant');
    expect(of('UTC', 57752, 86400)).toBe('not-an-instant');
    expect(of('TT', 1e9, 0)).toBe('out-of-range');
    expect(code(() => epochFromTdbSeconds(Number.NaN, 'UTC'))).toBe('out-of-range');
    expect(code(() => epochFromTdbSeconds(Number.POSITIVE_INFINITY, 'TDB'))).toBe('out-of-range');
  });
});

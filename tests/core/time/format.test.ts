import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { tdbSecondsFromEpoch } from '../../../core/time/convert';
import type { TimeScale } from '../../../core/time/epoch';
import { formatIso } from '../../../core/time/format';
import { readEpochText } from '../../../core/time/read';

const at = (scale: TimeScale, mjd: number, secondOfDay: number): number =>
  tdbSecondsFromEpoch({ scale, mjd, secondOfDay });

describe('formatIso', () => {
  it('carries a rounded second into minute, hour, day, month and year', () => {
    expect(formatIso(at('TT', 62867, 59.9996), 'TT', 3)).toBe('2031-01-01T00:01:00.000');
    expect(formatIso(at('TDB', 62866, 86399.9996), 'TDB', 3)).toBe('2031-01-01T00:00:00.000');
    expect(formatIso(at('UTC', 62866, 86399.6), 'UTC', 0)).toBe('2031-01-01T00:00:00Z');
  });

  it('writes a leap second as second 60 and carries out of it', () => {
    expect(formatIso(at('UTC', 57753, 86400.25), 'UTC', 2)).toBe('2016-12-31T23:59:60.25Z');
    expect(formatIso(at('UTC', 57753, 86399.9996), 'UTC', 3)).toBe('2016-12-31T23:59:60.000Z');
    expect(formatIso(at('UTC', 57753, 86400.9996), 'UTC', 3)).toBe('2017-01-01T00:00:00.000Z');
    expect(formatIso(at('UTC', 57753, 86400.25), 'TAI', 2)).toBe('2017-01-01T00:00:36.25');
  });

  it('puts Z behind UTC alone', () => {
    const t = at('UTC', 62870, 11560.123);
    expect(formatIso(t, 'UTC', 3)).toBe('2031-01-04T03:12:40.123Z');
    expect(formatIso(t, 'GPS', 3)).toBe('2031-01-04T03:12:58.123');
    expect(formatIso(t, 'TT', 3)).toBe('2031-01-04T03:13:49.307');
  });

  it('writes years before 0 with sign and six digits', () => {
    // ISO 8601-1:2019, 4.3.2 and 5.2.2.3: expanded representation. JD 0 is −4712-11-24, Gregorian.
    expect(formatIso(at('TDB', -2400001, 43200), 'TDB', 0)).toBe('-004713-11-24T12:00:00');
  });

  it('refuses decimals that are no count of digits', () => {
    for (const decimals of [-1, 10, 0.5, Number.NaN]) {
      expect(() => formatIso(0, 'UTC', decimals)).toThrow(RangeError);
    }
  });

  it('is read back as the same instant in every scale', () => {
    const seconds = fc.double({ min: -1.58e9, max: 2.21e9, noNaN: true });
    const scales = fc.constantFrom<TimeScale[]>('UTC', 'TDB', 'TT', 'TAI', 'GPS');
    fc.assert(
      fc.property(seconds, scales, fc.integer({ min: 0, max: 6 }), (t, scale, decimals) => {
        const text = formatIso(t, scale, decimals);
        const reading = readEpochText(scale === 'UTC' ? text : `${text} ${scale}`);
        expect(reading?.scale).toBe(scale);
        const { mjd, secondOfDay } = reading ?? { mjd: 0, secondOfDay: 0 };
        const error = Math.abs(at(scale, mjd, secondOfDay) - t);
        // Half of the last digit, and two units in the last place of 2e9 s.
        expect(error, text).toBeLessThan(0.5 * 10 ** -decimals + 5e-7);
      }),
      { numRuns: 2000 },
    );
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  formatDuration,
  formatKm,
  formatMoment,
  formatNumber,
  formatPlace,
  formatProbability,
  formatSmall,
  formatSpeed,
} from '../../../core/report/figures';

const THIN = '\u2009';
const MINUS = '\u2212';

/** The number that a text shows, in the unit it shows. */
const shown = (text: string): number =>
  Number(
    text
      .replaceAll(THIN, '')
      .replace(MINUS, '-')
      .replace(/[^\d.-].*$/, ''),
  );

const anyNumber = fc.double({ min: -1e12, max: 1e12, noNaN: true });

describe('a number', () => {
  it('reads back within half a unit of its last decimal', () => {
    fc.assert(
      fc.property(anyNumber, fc.integer({ min: 0, max: 6 }), (value, decimals) => {
        // 1e-15: reading the decimal text back rounds too.
        const half = 0.5 * 10 ** -decimals + 1e-15 * Math.abs(value);
        expect(Math.abs(shown(formatNumber(value, decimals)) - value)).toBeLessThanOrEqual(half);
      }),
    );
  });

  it('is grouped by threes with thin spaces before the point and has a true minus', () => {
    fc.assert(
      fc.property(anyNumber, fc.integer({ min: 0, max: 6 }), (value, decimals) => {
        expect(formatNumber(value, decimals)).toMatch(/^\u2212?\d{1,3}(\u2009\d{3})*(\.\d+)?$/);
      }),
    );
    expect(formatNumber(-1234567.891, 2)).toBe(`${MINUS}1${THIN}234${THIN}567.89`);
  });

  it('that rounds to zero has no sign', () => {
    expect(formatNumber(-0.04, 1)).toBe('0.0');
    expect(formatNumber(-0.06, 1)).toBe(`${MINUS}0.1`);
  });
});

describe('a small figure', () => {
  it('keeps two significant figures below ten and is never shown as zero', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-9, max: 9.9, noNaN: true }), (value) => {
        // Two significant figures: within 5 % of the leading digit at worst.
        expect(Math.abs(shown(formatSmall(value)) / value - 1)).toBeLessThanOrEqual(0.05 + 1e-9);
      }),
    );
    expect(formatSmall(0)).toBe('0');
  });
});

describe('a distance', () => {
  it('has whole kilometres from ten up, thousands from a million up, metres below 100 m', () => {
    const cases: [number, string][] = [
      [0, '0 km'],
      [0.0123, '12 m'],
      [-0.0042, '−4.2 m'],
      [0.1, '0.1 km'],
      [9.94, '9.9 km'],
      [10.4, '10 km'],
      [16240.4, '16 240 km'],
      [-412.345, '−412 km'],
      [999999, '999 999 km'],
      [1e6, '1.000 million km'],
      [-2934398, '−2.934 million km'],
    ];
    for (const [km, text] of cases) expect(formatKm(km).replaceAll(THIN, ' ')).toBe(text);
  });
});

describe('a speed, a place, a length of time', () => {
  it('are said as a person would', () => {
    expect(formatSpeed(14.996)).toBe(`15.00${THIN}km/s`);
    expect(formatPlace(12.344, -45.678)).toBe(`12.34°${THIN}N 45.68°${THIN}W`);
    const times: [number, string][] = [
      [0, '0 s'],
      [0.0041, '0.0041 s'],
      [8.9, '8.9 s'],
      [-119.2, '119 s'],
      [120, '2.0 min'],
      [7199, '120.0 min'],
      [7200, '2.0 h'],
      [172800, '2.0 days'],
    ];
    for (const [s, text] of times) expect(formatDuration(s).replaceAll(THIN, ' ')).toBe(text);
  });
});

describe('a probability', () => {
  it('is never said to be certain, one way or the other', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 1, noNaN: true }), (p) => {
        expect(formatProbability(p)).not.toMatch(/^(0|0\.0+|1|1\.0+|1 in 1|1 in 0)$/);
      }),
    );
    expect(formatProbability(0)).toBe('below 1 in a million million');
    expect(formatProbability(1)).toBe('above 0.99');
    expect(formatProbability(0.994)).toBe('0.99');
  });

  it('below a tenth is one in so many, to two figures', () => {
    fc.assert(
      fc.property(fc.double({ min: -11.9, max: -1, noNaN: true }), (exponent) => {
        const p = 10 ** exponent;
        const many = shown(formatProbability(p).replace('1 in ', ''));
        expect(Math.abs(many * p - 1)).toBeLessThanOrEqual(0.05 + 1e-9);
      }),
    );
  });
});

describe('a moment', () => {
  it('is rounded to the second and carries into the next day', () => {
    // TDB less UTC since 2017: 69.184 s to 2 ms. 2031-05-14 is day 11456 after 2000-01-01.
    const midnight = 11456 * 86400 - 43200 + 69.184;
    expect(formatMoment(midnight + 11560.3)).toBe('2031 May 14 at 03:12:40 UTC');
    expect(formatMoment(midnight - 0.4)).toBe('2031 May 14 at 00:00:00 UTC');
    expect(formatMoment(midnight - 0.6)).toBe('2031 May 13 at 23:59:59 UTC');
  });

  it('names a leap second', () => {
    // 2016-12-31T23:59:60 UTC (IERS Bulletin C 52) is 2017-01-01T00:01:08.184 TT; that day is 6210
    // after 2000-01-01, J2000 at its noon; TDB is within 2 ms of TT.
    expect(formatMoment(6210 * 86400 - 43200 + 68.184)).toBe('2016 December 31 at 23:59:60 UTC');
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { EpochError, type EpochReading, readEpochText } from '../../../core/time/read';

function read(text: string): EpochReading {
  const reading = readEpochText(text);
  if (reading === null) throw new Error(`"${text}" was not taken for an epoch`);
  return reading;
}

function refusal(text: string): EpochError {
  try {
    const reading = readEpochText(text);
    throw new Error(`"${text}" was read as ${JSON.stringify(reading)}`);
  } catch (error) {
    if (error instanceof EpochError) return error;
    throw error;
  }
}

/** 2031-05-12 0 h: JD 2462998.5 by ERFA cal2jd(2031, 5, 12). */
const MAY_12 = 62998;
const CLOCK = 3 * 3600 + 4 * 60 + 5;

describe('readEpochText reads', () => {
  it.each([
    ['2031-05-12T03:04:05.678', 'iso', CLOCK + 0.678, null, 0.001],
    ['2031-05-12 03:04:05,678', 'iso', CLOCK + 0.678, null, 0.001],
    ['2031-05-12T03:04:05Z', 'iso', CLOCK, 'UTC', 1],
    ['2031-05-12T03:04:05.5+00:00', 'iso', CLOCK + 0.5, 'UTC', 0.1],
    ['20310512T030405Z', 'iso', CLOCK, 'UTC', 1],
    ['2031-05-12T03:04', 'iso', 11040, null, 60],
    ['2031-05-12T03', 'iso', 10800, null, 3600],
    ['2031-05-12', 'iso', 0, null, 86400],
    ['2031-132T03:04:05', 'iso', CLOCK, null, 1],
    ['2031-132', 'iso', 0, null, 86400],
    ['2031 May 12.5', 'calendar', 43200, null, 8640],
    ['2031 May 12,5 TT', 'calendar', 43200, 'TT', 8640],
    ['2031-May-12 03:04:05', 'calendar', CLOCK, null, 1],
    ['A.D. 2031-May-12 03:04:05.0000 TDB', 'calendar', CLOCK, 'TDB', 0.0001],
    ['12 May 2031 03:04', 'calendar', 11040, null, 60],
    ['12. May 2031, 03:04 GMT', 'calendar', 11040, 'UTC', 60],
    ['May 12, 2031', 'calendar', 0, null, 86400],
    ['May 12th, 2031 03:04:05 UT', 'calendar', CLOCK, 'UTC', 1],
    ['may 12.25 2031 (TDB)', 'calendar', 21600, 'TDB', 864],
    ['2031 05 12.5', 'calendar', 43200, null, 8640],
    ['2031-05-12.5', 'calendar', 43200, null, 8640],
    ['2031/05/12 03:04:05 TAI', 'calendar', CLOCK, 'TAI', 1],
    ['13/05/2031', 'calendar', 86400, null, 86400],
    ['05/13/2031', 'calendar', 86400, null, 86400],
    ['JD 2462998.75', 'jd', 21600, null, 864],
    ['JD=2462998.75 TDB', 'jd', 21600, 'TDB', 864],
    ['JDTDB 2462998.75', 'jd', 21600, 'TDB', 864],
    ['JDTT2462998.75', 'jd', 21600, 'TT', 864],
    ['JDUTC: 2462998,75', 'jd', 21600, 'UTC', 864],
    ['JED 2462998.75', 'jd', 21600, 'TDB', 864],
    ['JDE 2462998.75 TT', 'jd', 21600, 'TT', 864],
    ['2462998.75', 'jd', 21600, null, 864],
    ['2.462.998,75', 'jd', 21600, null, 864],
    ['2,462,998.75', 'jd', 21600, null, 864],
    ['TDB 2462998.5', 'jd', 0, 'TDB', 8640],
    ['MJD 62998.25', 'mjd', 21600, null, 864],
    ['62998.25 TT', 'mjd', 21600, 'TT', 864],
    ['62998', 'mjd', 0, null, 86400],
    ['62998 MJD', 'mjd', 0, null, 86400],
    ['ET 2031-05-12', 'iso', 0, 'TDB', 86400],
    ['2031-05-12 TDT', 'iso', 0, 'TT', 86400],
    ['2031-05-12T00:00:00 GPS', 'iso', 0, 'GPS', 1],
  ] as const)('%s', (text, form, seconds, scale, precision) => {
    const reading = read(text);
    expect(reading.form).toBe(form);
    expect(reading.scale).toBe(scale);
    // 1e-11 s: one unit in the last place of a second of the day.
    const error = (reading.mjd - MAY_12) * 86400 + reading.secondOfDay - seconds;
    expect(Math.abs(error)).toBeLessThan(1.5e-11);
    expect(reading.precisionSeconds / precision).toBeCloseTo(1, 12);
  });

  it('the two CCSDS time codes of one instant alike', () => {
    // CCSDS 301.0-B-4, section 3.5, examples of codes A and B, from memory.
    const a = read('1988-01-18T17:20:43.123456Z');
    expect(read('1988-018T17:20:43.123456Z')).toEqual(a);
    expect(a).toMatchObject({ mjd: 47178, scale: 'UTC', precisionSeconds: 1e-6 });
    expect(a.secondOfDay).toBeCloseTo(62443.123456, 9);
  });

  it('a long Julian date without losing digits to its whole part', () => {
    // 0.030000001 d = 2592.0000864 s past noon; a double of 2.4e6 d would be 4e-5 s off.
    const { mjd, secondOfDay } = read('2463392.030000001');
    expect(mjd).toBe(63391);
    expect(Math.abs(secondOfDay - (43200 + 2592.0000864))).toBeLessThan(1.5e-11);
    const morning = read('2463392.999999999999');
    expect(morning.mjd).toBe(63392);
    // One unit of the twelfth digit is 8.64e-8 s.
    expect(43200 - morning.secondOfDay).toBeCloseTo(8.64e-8, 10);
  });

  it('modified Julian dates before 1858', () => {
    expect(read('MJD -0.25')).toMatchObject({ mjd: -1, secondOfDay: 64800 });
    expect(read('MJD -12')).toMatchObject({ mjd: -12, secondOfDay: 0 });
  });

  it('decimals that round up to the whole day as the next day', () => {
    const nines = '9'.repeat(25);
    expect(read(`2031 May 12.${nines}`)).toMatchObject({ mjd: MAY_12 + 1, secondOfDay: 0 });
    expect(read(`2031-05-12T23:59:59.${nines}`)).toMatchObject({ mjd: MAY_12 + 1, secondOfDay: 0 });
    expect(read(`MJD -12.${nines}`)).toMatchObject({ mjd: -13, secondOfDay: 0 });
  });

  it('a leap second as UTC, where there is one', () => {
    const leap = { mjd: 57753, secondOfDay: 86400.5, scale: 'UTC' };
    expect(read('2016-12-31T23:59:60.5Z')).toMatchObject(leap);
    expect(read('2016-366 23:59:60.5')).toMatchObject(leap);
    expect(read('1972 June 30 23:59:60 UTC')).toMatchObject({ mjd: 41498, secondOfDay: 86400 });
  });
});

describe('readEpochText refuses, naming what was read', () => {
  it.each([
    ['2031-13-02', 'month', 'month 13'],
    ['2031 Foo 12', 'month', '"Foo"'],
    ['12 Mai 2031', 'month', '"Mai"'],
    ['2031-02-30', 'day', 'day 30'],
    ['2031-02-29', 'day', 'from 1 to 28'],
    ['2100 Feb 29.5', 'day', 'from 1 to 28'],
    ['2031-366', 'day-of-year', 'from 1 to 365'],
    ['2032-000', 'day-of-year', 'day of year 0'],
    ['2031-05-12T25:00', 'hour', 'hour 25'],
    ['2031-05-12T24:00:00', 'hour', 'hour 24'],
    ['2031-05-12T23:60', 'minute', 'minute 60'],
    ['2031-05-12T23:59:61Z', 'second', 'second 61'],
    ['2031-12-31T23:59:60Z', 'leap-second', 'second 60'],
    ['2016-12-31T22:59:60Z', 'leap-second', 'second 60'],
    ['2016-12-31T23:59:60 TDB', 'leap-second', 'TDB'],
    ['2031-05-12T03:04:05+02:00', 'time-zone', '+02:00'],
    ['2031-05-12 03:04 UTC+2', 'time-zone', 'UTC+2'],
    ['2031-05-12T03:04:05Z TDB', 'scale', 'UTC'],
    ['2031-05-12 TCB', 'scale', 'TCB'],
    ['2462998.5 UT1', 'scale', 'UT1'],
    ['JD 62998.5', 'number', 'MJD'],
    ['JD 2462998.5.3', 'number', '2462998.5.3'],
    ['MJD 2462998.5', 'number', 'up to six digits'],
    ['2031-05', 'unreadable', '2031-05'],
    ['May 2031', 'unreadable', 'May 2031'],
    ['2031-W20-1', 'unreadable', '2031-W20-1'],
    ['2031-05-12T3 pm', 'unreadable', '2031-05-12'],
    ['2031-05-12 03:04 pm', 'unreadable', '03:04 pm'],
    ['2031-05-12.5T03:04', 'unreadable', 'decimals of the day'],
  ])('%s', (text, code, named) => {
    const error = refusal(text);
    expect(error.code).toBe(code);
    expect(error.message).toContain(named);
    expect(error.expected.length).toBeGreaterThan(5);
  });

  it('a date whose day and month cannot be told, with both readings', () => {
    const { code, readings } = refusal('05/12/2031 03:04 UTC');
    expect(code).toBe('ambiguous-date');
    expect(readings).toEqual(['2031-12-05 03:04 UTC', '2031-05-12 03:04 UTC']);
    expect(readings.map((text) => read(text).mjd)).toEqual([63205, 62998]);
    expect(refusal('5.12.2031').code).toBe('ambiguous-date');
    expect(read('5.5.2031').mjd).toBe(62991);
  });
});

describe('readEpochText leaves alone', () => {
  it.each([
    '',
    'TDB',
    'JD',
    'hello',
    '-2462998.5',
    '1234567.8',
    '12345.6',
    '149597870.7',
    '2.4629985e6',
    '2031 AB12',
    '2031 5.12',
    '1234 5 6.7',
    '12 345 678',
    '1.0 2.0 3.0',
    'X = 1.5',
    'May',
    '23:59',
    '5.3 TT',
    '5.3 TCG',
    'x'.repeat(500),
  ])('%s', (text) => {
    expect(readEpochText(text)).toBeNull();
  });
});

describe('readEpochText on any text', () => {
  const piece = fc.constantFrom(
    ...[
      '2031',
      '-',
      '05',
      '12',
      'T',
      ':',
      '.',
      ',',
      ' ',
      'JD',
      'MJD',
      'UTC',
      'TDB',
      'Z',
      'May',
      '5',
    ],
    ...[
      '2462998',
      '62998',
      '+',
      '/',
      '60',
      '59',
      '23',
      'e',
      '0',
      '99',
      'A.D.',
      '(',
      ')',
      '_',
      'NaN',
    ],
  );
  const text = fc.oneof(
    fc.string({ maxLength: 40 }),
    fc.array(piece, { maxLength: 12 }).map((pieces) => pieces.join('')),
  );

  it('gives a whole day and a second of it, null or an EpochError, never NaN', () => {
    fc.assert(
      fc.property(text, (any) => {
        let reading: EpochReading | null = null;
        try {
          reading = readEpochText(any);
        } catch (error) {
          expect(error).toBeInstanceOf(EpochError);
        }
        if (reading === null) return;
        expect(Number.isInteger(reading.mjd)).toBe(true);
        expect(reading.secondOfDay).toBeGreaterThanOrEqual(0);
        expect(reading.secondOfDay).toBeLessThan(86401);
        expect(reading.precisionSeconds).toBeGreaterThan(0);
        expect(reading.precisionSeconds).toBeLessThanOrEqual(86400);
      }),
      { numRuns: 20000 },
    );
  });

  it('reads every Julian date as the modified one half a day less', () => {
    const digits = fc.integer({ min: 0, max: 999999999 });
    fc.assert(
      fc.property(fc.integer({ min: 2400001, max: 2999999 }), digits, (whole, decimals) => {
        const tail = String(decimals).padStart(9, '0');
        const jd = read(`JD ${whole}.${tail}`);
        const mjd = read(`MJD ${whole - 2400000}.${tail}`);
        const apart = (mjd.mjd - jd.mjd) * 86400 + mjd.secondOfDay - jd.secondOfDay;
        expect(Math.abs(apart - 43200)).toBeLessThan(3e-11);
      }),
    );
  });
});

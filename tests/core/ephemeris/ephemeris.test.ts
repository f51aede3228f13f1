import { describe, expect, it } from 'vitest';
import {
  createEphemeris,
  EPHEMERIS_COVERAGE,
  EphemerisFileError,
  EphemerisRangeError,
  ephemerisFileNames,
  loadEphemeris,
} from '../../../core/ephemeris';
import { fetchPacked } from '../../helpers/assess';

const year = (y: number): number => (y - 2000) * 365.25 * 86400;

describe('the packed ephemeris', () => {
  it('fetches only the decades that a span needs, and each once', async () => {
    expect(ephemerisFileNames(year(2031.3), year(2032.4))).toEqual(['de405-2030s.bin']);
    expect(ephemerisFileNames(year(2029.3), year(2030.4))).toEqual([
      'de405-2020s.bin',
      'de405-2030s.bin',
    ]);
    const asked: string[] = [];
    const fetchFile = (name: string): Promise<ArrayBuffer> => {
      asked.push(name);
      return fetchPacked(name);
    };
    const ephemeris = createEphemeris();
    await loadEphemeris(ephemeris, year(2031), year(2032), fetchFile);
    await loadEphemeris(ephemeris, year(2031), year(2033), fetchFile);
    expect(asked).toEqual(['de405-2030s.bin']);
  });

  it('has every record of its coverage in the files that it names', async () => {
    const ephemeris = createEphemeris();
    const { fromTdbSeconds, toTdbSeconds } = EPHEMERIS_COVERAGE;
    await loadEphemeris(ephemeris, fromTdbSeconds, toTdbSeconds, fetchPacked);
    expect(ephemeris.covers(fromTdbSeconds, toTdbSeconds)).toBe(true);
    // Any month of the century can be had on its own.
    for (let t = fromTdbSeconds; t < toTdbSeconds - 31 * 86400; t += 29 * 86400) {
      const alone = new Set(ephemerisFileNames(t, t + 30 * 86400));
      expect(alone.size).toBeGreaterThan(0);
      expect(alone.size).toBeLessThanOrEqual(2);
    }
  });

  it('says the dates when an instant is not covered', async () => {
    const ephemeris = createEphemeris();
    const load = loadEphemeris(ephemeris, year(2059), year(2061), fetchPacked);
    await expect(load).rejects.toThrow(EphemerisRangeError);
    // MJD 36912 and 36912 + 32 × 1143 = 73488, by the calendar of the language's own dates.
    const day = (mjd: number): string =>
      new Date(Date.UTC(1858, 10, 17 + mjd)).toISOString().slice(0, 10);
    await expect(load).rejects.toThrow(`which covers ${day(36912)} to ${day(73488)} (TDB)`);
    expect(() => ephemeris.states(Math.round(year(1950)), 0, new Float64Array(66))).toThrow(
      EphemerisRangeError,
    );
  });

  it('refuses bytes that are no packed file', () => {
    const ephemeris = createEphemeris();
    expect(() => ephemeris.addFile(new ArrayBuffer(3))).toThrow(EphemerisFileError);
    expect(() => ephemeris.addFile(new ArrayBuffer(64))).toThrow(EphemerisFileError);
  });

  it('has velocities that are the rate of its positions', async () => {
    const ephemeris = createEphemeris();
    await loadEphemeris(ephemeris, year(2031), year(2032), fetchPacked);
    const states = new Float64Array(66);
    const before = new Float64Array(33);
    const after = new Float64Array(33);
    const base = Math.round(year(2031.4));
    ephemeris.states(base, 0, states);
    ephemeris.positions(base, -50, before);
    ephemeris.positions(base, 50, after);
    for (let body = 0; body < 11; body++) {
      for (let k = 0; k < 3; k++) {
        const rate = (after[body * 3 + k] - before[body * 3 + k]) / 100;
        // Rounding of 1e9 km over 100 s, and h²/6 of the third derivative.
        expect(Math.abs(rate - states[body * 6 + 3 + k])).toBeLessThan(3e-8);
      }
    }
  });
});

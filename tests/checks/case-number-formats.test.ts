import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readCase } from '../../core/case/read';

/**
 * Numbers as the locales of the Unicode CLDR write them, by the runtime's own Intl.NumberFormat
 * (ECMA-402): signs, grouping and decimal marks come from there and not from the reader.
 */
const LOCALES = {
  'en-US': 'comma groups, decimal point',
  'en-IN': 'lakhs and crores, decimal point',
  'de-DE': 'point groups, decimal comma',
  'de-CH': 'typographic apostrophe groups, decimal point',
  'fr-FR': 'narrow no-break space groups, decimal comma',
  'sv-SE': 'no-break space groups, decimal comma, minus sign U+2212',
  'es-ES': 'point groups from five digits on, decimal comma',
  'pl-PL': 'no-break space groups from five digits on, decimal comma',
};

const written = (value: number, locale: string): string =>
  new Intl.NumberFormat(locale, { maximumFractionDigits: 9 }).format(value);

const length = fc.integer({ min: -300_000_000_000, max: 300_000_000_000 }).map((n) => n / 1000);
const speed = fc.integer({ min: -30_000_000_000, max: 30_000_000_000 }).map((n) => n / 1e9);
const states = fc
  .tuple(length, length, length, speed, speed, speed)
  .filter((s) => Math.hypot(s[0], s[1], s[2]) > 2e7 && Math.hypot(s[3], s[4], s[5]) > 1);

describe('six numbers written as a locale does', () => {
  for (const [locale, what] of Object.entries(LOCALES)) {
    it(`are read as they are or asked about, never as others: ${locale} (${what})`, () => {
      let read = 0;
      let runs = 0;
      fc.assert(
        fc.property(states, (state) => {
          const [r, v] = [state.slice(0, 3), state.slice(3)].map((three) =>
            three.map((value) => written(value, locale)).join('  '),
          );
          const text = `heliocentric ICRF, km and km/s\n2031-05-12T00:00:00 TDB\n${r}\n${v}`;
          const { case: orbit, questions } = readCase(text, {});
          runs += 1;
          if (orbit === null) {
            expect(questions.map(({ field }) => field)).toEqual(['numberFormat']);
            return;
          }
          read += 1;
          if (orbit.state.kind !== 'cartesian') throw new Error('not a state');
          // Exact: the digits are the shortest that name the number.
          expect([...orbit.state.positionKm, ...orbit.state.velocityKmS]).toEqual(state);
        }),
        { numRuns: 300, seed: 20310512 },
      );
      // A question is for the rare state whose every comma stands before three digits.
      expect(read / runs).toBeGreaterThan(0.95);
    });
  }
});

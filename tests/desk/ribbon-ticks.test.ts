import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ribbonDistanceScale } from '../../app/ribbon/distance-scale';
import { decadeTicks, namedTicks, spreadLabels } from '../../app/ribbon/distance-ticks';
import { linearTimeScale, stretchedTimeScale } from '../../app/ribbon/time-scale';
import { timeTicks } from '../../app/ribbon/time-ticks';
import {
  distanceWords,
  momentWords,
  spanWords,
  tickDateWords,
  tickWords,
} from '../../app/ribbon/words';

const DAY = 86400;
/** Thin spaces and true minus signs written plainly, so that the expected texts can be read. */
const plain = (text: string): string => text.replaceAll('\u2009', ' ').replaceAll('\u2212', '-');

describe('the time ticks', () => {
  it('count days, hours and minutes from the zero on a stretched ribbon', () => {
    const scale = stretchedTimeScale(-90 * DAY, 90 * DAY, {
      centreTdbSeconds: 0,
      scaleSeconds: 900,
    });
    const words = timeTicks(scale, 0, true, 0.03).map((tick) => plain(tick.words));
    // By hand, asinh(t/900 s)/19.512: 10 min 0.032, 30 min 0.074, 1 h 0.107, 6 h 0.198, 1 d 0.269,
    // 3 d 0.326, 10 d 0.388, 30 d 0.444, 60 d 0.479; 1 min, at 0.003, has no room beside the zero.
    const away = ['10 min', '30 min', '1 h', '6 h', '1 d', '3 d', '10 d', '30 d', '60 d'];
    expect(words).toEqual([
      ...away.map((each) => `-${each}`).reverse(),
      '0',
      ...away.map((each) => `+${each}`),
    ]);
  });

  it('keep one step on a linear ribbon, counted from the zero', () => {
    const scale = linearTimeScale(-7 * DAY, 21 * DAY);
    const ticks = timeTicks(scale, 0, false, 0.1);
    expect(ticks.map((tick) => tick.tdbSeconds / DAY)).toEqual([-5, 0, 5, 10, 15, 20]);
  });

  it('never stand nearer than asked', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 60, max: 20 * DAY, noNaN: true }),
        fc.double({ min: 0.02, max: 0.3, noNaN: true }),
        fc.double({ min: 1, max: 3000, noNaN: true }),
        fc.boolean(),
        (scaleSeconds, gap, days, stretched) => {
          const [from, to] = [-days * DAY, 2 * days * DAY];
          const scale = stretched
            ? stretchedTimeScale(from, to, { centreTdbSeconds: 0, scaleSeconds })
            : linearTimeScale(from, to);
          const units = timeTicks(scale, 0, stretched, gap).map((tick) =>
            scale.unitAt(tick.tdbSeconds),
          );
          expect(units.length).toBeGreaterThan(0);
          for (let i = 1; i < units.length; i++) {
            // A part in a million is left to the rounding of an even step.
            expect(units[i] - units[i - 1]).toBeGreaterThan(gap * (1 - 2e-6));
          }
        },
      ),
    );
  });
});

describe('the words of the ribbon', () => {
  it('write a distance in kilometres, millions of kilometres and astronomical units', () => {
    expect([16240.4, 3120000, 149597870.7].map(distanceWords).map(plain)).toEqual([
      '16 240 km',
      '3.12 million km',
      '1.000 au',
    ]);
  });

  it('write spans with about two digits and ticks whole', () => {
    expect([44, 100, 11520, 3.24 * DAY, 913 * DAY].map(spanWords).map(plain)).toEqual([
      '44 s',
      '1.7 min',
      '3.2 h',
      '3.2 d',
      '2.5 yr',
    ]);
    expect([-60 * DAY, 600, 0, 3600].map(tickWords).map(plain)).toEqual([
      '-60 d',
      '+10 min',
      '0',
      '+1 h',
    ]);
  });

  it('write an instant of TDB in UTC', () => {
    // IERS: from 2017 on TAI − UTC = 37 s; TT = TAI + 32.184 s; TDB within 2 ms of TT.
    // 2031-05-14T03:12:40 UTC is day 11 456 after 2000-01-01.
    const seconds = 11456 * DAY - DAY / 2 + 3 * 3600 + 12 * 60 + 40 + 37 + 32.184;
    expect(momentWords(seconds)).toBe('2031 May 14 03:12:40');
    expect(momentWords(seconds + 0.25, 1)).toMatch(/^2031 May 14 03:12:40\.[23]$/);
  });

  it('give a tick only the parts of its date that matter', () => {
    const at = 11456 * DAY - DAY / 2 + 3 * 3600 + 12 * 60 + 40 + 37 + 32.184;
    expect(tickDateWords(at, 0)).toBe('2031 May 14 03:12:40');
    expect(tickDateWords(at, -60)).toBe('03:12:40');
    expect(tickDateWords(at, 6 * 3600)).toBe('03:12');
    expect(tickDateWords(at, 10 * DAY)).toBe('May 14');
    expect(tickDateWords(at, -60 * DAY)).toBe('2031 May 14');
  });
});

describe('the distance axis', () => {
  it('has the ground above its foot and the largest distance below its top', () => {
    const scale = ribbonDistanceScale(1.2e8);
    expect(scale.unitAt(6378.137)).toBeGreaterThan(0);
    expect(scale.unitAt(1.2e8)).toBeLessThan(1);
    expect(scale.unitAt(scale.highestKm)).toBeCloseTo(1, 12);
  });

  it('takes the same room for every factor of ten', () => {
    const scale = ribbonDistanceScale(1.2e8);
    const decade = scale.unitAt(1e5) - scale.unitAt(1e4);
    expect(scale.unitAt(1e8) - scale.unitAt(1e7)).toBeCloseTo(decade, 12);
  });

  it('names only what the ribbon reaches', () => {
    const scale = ribbonDistanceScale(2e6);
    expect(namedTicks(scale).map((tick) => tick.words)).toEqual([
      'surface',
      'geosynchronous',
      'Moon',
      'sphere of influence',
    ]);
    expect(decadeTicks(scale).map((tick) => plain(tick.words))).toEqual([
      '10 000 km',
      '100 000 km',
      '1 million km',
    ]);
  });

  it('moves labels apart in their order, inside the bounds, and leaves free ones alone', () => {
    const places = fc.array(fc.double({ min: 0, max: 100, noNaN: true }), { maxLength: 8 });
    fc.assert(
      fc.property(places, (wanted) => {
        const sorted = [...wanted].sort((a, b) => a - b);
        const spread = spreadLabels(sorted, 11, 0, 100);
        expect(spread).toHaveLength(sorted.length);
        spread.forEach((place, i) => {
          expect(place).toBeGreaterThan(-1e-9);
          expect(place).toBeLessThan(100 + 1e-9);
          if (i > 0) expect(place - spread[i - 1]).toBeGreaterThan(11 - 1e-9);
        });
        const isFree = sorted.every((place, i) => i === 0 || place - sorted[i - 1] >= 11);
        if (isFree) expect(spread).toEqual(sorted);
      }),
    );
    expect(spreadLabels([50, 52], 11, 0, 100)).toEqual([45.5, 56.5]);
  });
});

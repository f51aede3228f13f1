import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bodyRadiusKm,
  fittingHalfKm,
  limitedHalfKm,
  planeGeometry,
  roundStep,
} from '../../app/charts/plane-geometry';
import { planeWords } from '../../app/charts/plane-words';
import type { Approach } from '../../core/report/report';
import { inventedReport } from './fixtures/report';

/** A pass aimed 20 000 km along T and 10 000 km along R, with the impact radius of the Earth. */
function approach(bDotTKm = 20000, bDotRKm = 10000, impactRadiusKm = 9000): Approach {
  const impactParameterKm = Math.hypot(bDotTKm, bDotRKm);
  return {
    ...inventedReport().approaches[0],
    distanceKm: 15945.3425,
    distanceRadii: 2.5,
    targetPlane: {
      bDotTKm,
      bDotRKm,
      // The same B on axes turned by a right angle: ξ along −R, ζ along −T.
      xiKm: -bDotRKm,
      zetaKm: -bDotTKm,
      impactRadiusKm,
      s: [1, 0, 0],
      t: [0, 1, 0],
      r: [0, 0, 1],
    },
    hyperbola: {
      semiMajorAxisKm: -4000,
      eccentricity: 3,
      periapsisKm: 15945,
      impactParameterKm,
      excessSpeedKmS: 10,
      turnAngleDeg: 30,
      asymptoteTrueAnomalyDeg: 110,
      periapsisSpeedKmS: 12,
    },
  };
}

const plain = (text: string): string => text.replaceAll('\u2009', ' ').replaceAll('\u2212', '-');

describe('the target plane in pixels', () => {
  it('has T to the right and R downwards, to one scale', () => {
    // 400 px for 2 × 40 000 km: 200 km a pixel.
    const geometry = planeGeometry(approach(), 'tr', 40000, 600, 400);
    expect(geometry).toMatchObject({ x: 300, y: 200, aim: { x: 400, y: 250 }, capturePx: 45 });
    // 15 945.3425 km are 2.5 radii: 6 378.137 km, 31.890685 px.
    expect(geometry?.discPx).toBeCloseTo(31.890685, 6);
    expect(geometry?.aimIsShown).toBe(true);
  });

  it('has ξ to the right and ζ upwards', () => {
    const geometry = planeGeometry(approach(), 'xi-zeta', 40000, 600, 400);
    expect(geometry?.aim).toEqual({ x: 250, y: 300 });
  });

  it('counts its ticks from the centre in the sense of each axis', () => {
    const tr = planeGeometry(approach(), 'tr', 40000, 400, 400)?.ticks;
    const words = (ticks: { words: string }[] | undefined) =>
      ticks?.map((tick) => plain(tick.words));
    // 64 px of 200 km are 12 800 km: the next round step is 20 000 km.
    expect(words(tr?.across)).toEqual(['-40 000', '-20 000', '0', '20 000', '40 000']);
    expect(words(tr?.upright)).toEqual(['-40 000', '-20 000', '0', '20 000', '40 000']);
    const turned = planeGeometry(approach(), 'xi-zeta', 40000, 400, 400)?.ticks;
    expect(words(turned?.upright)).toEqual(['40 000', '20 000', '0', '-20 000', '-40 000']);
    expect(turned?.upright.map((tick) => tick.px)).toEqual([0, 100, 200, 300, 400]);
  });

  it('shows the aim and the whole capture disc when it fits', () => {
    const inRange = fc.double({ min: -900000, max: 900000, noNaN: true });
    fc.assert(
      fc.property(inRange, inRange, (t, r) => {
        const one = approach(t, r);
        const geometry = planeGeometry(one, 'tr', fittingHalfKm(one), 300, 240);
        expect(geometry?.aimIsShown).toBe(true);
        expect(geometry?.capturePx).toBeLessThan(120);
      }),
    );
  });

  it('says when the aim lies beyond the sheet', () => {
    expect(planeGeometry(approach(), 'tr', 7000, 400, 400)?.aimIsShown).toBe(false);
  });

  it('zooms from the body’s radius to a million kilometres', () => {
    const one = approach();
    expect(limitedHalfKm(one, 1)).toBe(bodyRadiusKm(one));
    expect(limitedHalfKm(one, 1e9)).toBe(1e6);
    expect(limitedHalfKm(one, 50000)).toBe(50000);
  });

  it('is nothing where the object is bound', () => {
    expect(planeGeometry(inventedReport().approaches[0], 'tr', 1000, 100, 100)).toBeNull();
  });

  it('has ticks a round step apart and never closer than asked', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 1e9, noNaN: true }), (least) => {
        const step = roundStep(least);
        expect(step).toBeGreaterThanOrEqual(least * (1 - 1e-8));
        expect(step).toBeLessThanOrEqual(least * 2.5 * (1 + 1e-8));
        const digit = Number(step.toExponential(6).split('e')[0]);
        expect([1, 2, 5]).toContain(digit);
      }),
    );
  });
});

describe('the target plane in words', () => {
  it('says on which side of the capture disc the line of motion runs', () => {
    expect(planeWords(approach(20000, 10000, 9000))).toContain('runs outside that disc');
    expect(planeWords(approach(2000, 1000, 9000))).toContain('runs inside that disc');
  });

  it('says why there is none', () => {
    expect(planeWords(inventedReport().approaches[0])).toContain('There is no target plane');
  });
});

import { describe, expect, it } from 'vitest';
import type { Vec3 } from '../../core/math/vector';
import { elementsFromState, stateFromElements } from '../../core/orbit/elements';
import {
  eccentricAnomaly,
  hyperbolicAnomaly,
  meanFromTrueAnomaly,
  trueAnomalyFromMean,
} from '../../core/orbit/kepler';
import { propagateTwoBody } from '../../core/orbit/propagate';
import reference from './data/orbit-exact.json';

/**
 * Kepler's equation and two-body motion against 60-digit arithmetic (mpmath); the generating script
 * is in the data file. A double answer cannot be surer than its given numbers: each tolerance counts
 * what half a unit in their last place moves, as the reference itself measured it.
 */

const HALF_UNIT = 2 ** -53;

type KeplerRow = [number, number, number, number, number, number];
const kepler = reference.kepler as KeplerRow[];

type Triple = [number, number, number];
type MotionRow = [number, number, number, number, Triple, Triple, Triple, Triple, number, number];
const motion = reference.motion as unknown as MotionRow[];

const apart = (a: Vec3, b: Vec3): number => Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
const size = (a: Vec3): number => Math.hypot(...a);
const turnsOff = (angle: number): number =>
  Math.abs(angle - 2 * Math.PI * Math.round(angle / (2 * Math.PI)));

describe('Kepler’s equation for 0 ≤ e ≤ 10 and |M| ≤ 1e4, against 60 digits', () => {
  it('has 420 places, 135 of them within 1e-5 of the parabola or on it', () => {
    expect(kepler).toHaveLength(420);
    expect(kepler.filter(([e]) => Math.abs(e - 1) < 1.5e-5)).toHaveLength(135);
  });

  it('gives the eccentric or hyperbolic anomaly to the rounding of M and of the answer', () => {
    let worst = 0;
    for (const [e, m, anomaly, , rate] of kepler) {
      if (e === 1) continue;
      const ours = e < 1 ? eccentricAnomaly(m, e) : hyperbolicAnomaly(m, e);
      const unit = HALF_UNIT * (Math.abs(anomaly) + rate * Math.abs(m));
      worst = Math.max(worst, Math.abs(ours - anomaly) / unit);
    }
    // 4: one rounding each of M reduced, the two terms of the equation and the answer.
    expect(worst, `largest error ${worst} roundings`).toBeLessThan(4);
  });

  it('gives the true anomaly to the rounding of M and of the answer, on the parabola too', () => {
    let worst = 0;
    for (const [e, m, , anomaly, , rate] of kepler) {
      const unit = HALF_UNIT * (Math.abs(anomaly) + rate * Math.abs(m));
      worst = Math.max(worst, turnsOff(trueAnomalyFromMean(m, e) - anomaly) / unit);
    }
    // 4: one rounding each of the anomaly, of the two square roots' ratio, tangent and arctangent.
    expect(worst, `largest error ${worst} roundings`).toBeLessThan(4);
  });

  it('gives back the mean anomaly of the true one to what a rounding of the true one moves', () => {
    let worst = 0;
    for (const [e, m, , anomaly, , rate] of kepler) {
      const reduced = e < 1 ? m - 2 * Math.PI * Math.round(m / (2 * Math.PI)) : m;
      const unit = HALF_UNIT * (Math.abs(anomaly) / rate + Math.abs(m));
      worst = Math.max(worst, turnsFrom(e, meanFromTrueAnomaly(anomaly, e), reduced) / unit);
    }
    // 8: the roundings above, and those of the reduction by whole turns here.
    expect(worst, `largest error ${worst} roundings`).toBeLessThan(8);
  });
});

const turnsFrom = (e: number, a: number, b: number): number =>
  e < 1 ? turnsOff(a - b) : Math.abs(a - b);

describe('two-body motion for 0 ≤ e ≤ 10 and |M| ≤ 1e4, against 60 digits', () => {
  it('lands within three times of what half a unit in the last place of the given state moves', () => {
    expect(motion).toHaveLength(153);
    let worst = 0;
    for (const [, , , dtS, r, v, rAfter, vAfter, slackKm, slackKmS] of motion) {
      const ours = propagateTwoBody(r, v, reference.gmKm3S2, dtS);
      worst = Math.max(
        worst,
        apart(ours.r, rAfter) / (slackKm + HALF_UNIT * size(rAfter)),
        apart(ours.v, vAfter) / (slackKmS + HALF_UNIT * size(vAfter)),
      );
    }
    expect(worst, `largest error ${worst} times that`).toBeLessThan(3);
  });

  it('lands within 1e-12 wherever the given state determines its answer to 2e-13', () => {
    const sure = motion.filter(([, , , , , , rAfter, , slackKm]) => slackKm < 2e-13 * size(rAfter));
    expect(sure.length).toBeGreaterThan(100);
    let worst = 0;
    for (const [, , , dtS, r, v, rAfter] of sure) {
      const ours = propagateTwoBody(r, v, reference.gmKm3S2, dtS);
      worst = Math.max(worst, apart(ours.r, rAfter) / size(rAfter));
    }
    expect(worst, `largest relative error ${worst}`).toBeLessThan(1e-12);
  });
});

describe('state to elements and back', () => {
  it('keeps the state to the roundings that a true anomaly holds at its distance', () => {
    let worst = 0;
    for (const [, , , , r, v] of motion) {
      const elements = elementsFromState(r, v, reference.gmKm3S2);
      const back = stateFromElements(elements, reference.gmKm3S2);
      // r = p/(1 + e cos ν): a rounding of ν moves r by e r/p of itself.
      const unit = HALF_UNIT * (1 + (elements.eccentricity * size(r)) / elements.semiLatusRectumKm);
      worst = Math.max(worst, apart(back.r, r) / size(r) / unit);
    }
    // 16: ν is a difference of two arctangents and is read back through a sine and a cosine.
    expect(worst, `largest error ${worst} roundings`).toBeLessThan(16);
  });

  it('is within 1e-12 of the state out to 300 semi-latus recta', () => {
    let worst = 0;
    let count = 0;
    for (const [, , , , r, v] of motion) {
      const elements = elementsFromState(r, v, reference.gmKm3S2);
      if (size(r) > 300 * elements.semiLatusRectumKm) continue;
      count++;
      const back = stateFromElements(elements, reference.gmKm3S2);
      worst = Math.max(worst, apart(back.r, r) / size(r), apart(back.v, v) / size(v));
    }
    expect(count).toBeGreaterThan(100);
    expect(worst, `largest relative error ${worst}`).toBeLessThan(1e-12);
  });
});

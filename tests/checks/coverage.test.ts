import { describe, expect, it } from 'vitest';
import { DEMOS } from '../../app/desk/demos';
import { clopperPearson } from '../../core/math/beta';
import { normalsOf, uniformsOf } from '../../core/math/random';
import type { Report } from '../../core/report/report';
import { assessText } from '../helpers/estimate';

/**
 * Do 95 % ranges contain the truth as often as they say? 200 invented cases, each a truth and an orbit
 * solution that is off from it by a draw from the very covariance that the solution states. The truth
 * is assessed by itself, with the covariance left out.
 */

const CASES = 200;
/** 95 % of 200 cases, give or take 3.3 standard deviations of a binomial count: false once in a thousand. */
const LEAST = 180;
const MOST = 199;
const SIGMAS = [30, 120, 25, 1.26e-5, 5e-6, 6.3e-6];
const Z95 = 1.96;

const NAMES = ['X', 'Y', 'Z', 'X_DOT', 'Y_DOT', 'Z_DOT'];
const TRUTH = DEMOS[0].text.replace('COV_REF_FRAME = RTN', 'COV_REF_FRAME = ICRF');

/** The case's OPM with its state shifted and its covariance that of SIGMAS, uncorrelated in ICRF. */
function shifted(deviation: ArrayLike<number>): string {
  let text = TRUTH;
  for (const [i, name] of NAMES.entries()) {
    text = text.replace(
      new RegExp(`^(${name} = )(\\S+)`, 'm'),
      (_, key: string, value: string) => `${key}${Number(value) + deviation[i]}`,
    );
    const diagonal = `C${name}_${name}`;
    text = text.replace(
      new RegExp(`^(${diagonal} = )(\\S+)`, 'm'),
      (_, key: string) => `${key}${SIGMAS[i] ** 2}`,
    );
  }
  return text;
}

const SPAN = { spanFrom: '2031-03-01', spanTo: '2031-05-20' };

const mainOf = ({ approaches, principal }: Report) => approaches[principal ?? -1];

describe('ranges of 95 %', () => {
  it('of distance, time and speed contain the truth in about 95 of 100 invented cases', async () => {
    const truth = mainOf((await assessText(shifted(new Float64Array(6)), SPAN)).assessed.report);
    const z = new Float64Array(CASES * 6);
    normalsOf(29, 0, 0, CASES, 6, z);
    const contained = { distance: 0, time: 0, speed: 0 };
    for (let i = 0; i < CASES; i++) {
      const deviation = SIGMAS.map((sigma, k) => sigma * z[i * 6 + k]);
      const { report } = (await assessText(shifted(deviation), SPAN)).assessed;
      const main = mainOf(report);
      const given = main.uncertainty;
      if (given === undefined) throw new Error('no uncertainty');
      const within = (own: number, of: number, sigma: number): number =>
        Math.abs(own - of) <= Z95 * sigma ? 1 : 0;
      contained.distance += within(main.distanceKm, truth.distanceKm, given.sigmaDistanceKm);
      contained.time += within(main.tdbSeconds, truth.tdbSeconds, given.sigmaTimeS);
      contained.speed += within(main.speedKmS, truth.speedKmS, given.sigmaSpeedKmS);
    }
    for (const count of Object.values(contained)) {
      expect(count).toBeGreaterThanOrEqual(LEAST);
      expect(count).toBeLessThanOrEqual(MOST);
    }
  });

  it('of a probability contain it in at least 95 of 100 counts', () => {
    // Clopper and Pearson's interval is never too short, whatever the probability.
    const trials = 400;
    const draws = 300;
    for (const [row, p] of [0.003, 0.02, 0.3, 0.9].entries()) {
      let inside = 0;
      const u = new Float64Array(draws);
      for (let trial = 0; trial < trials; trial++) {
        uniformsOf(31, row, trial * draws, draws, 1, u);
        const [low, high] = clopperPearson(u.filter((value) => value < p).length, draws, 0.95);
        if (low <= p && p <= high) inside += 1;
      }
      // Three standard deviations below 95 %.
      expect(inside / trials).toBeGreaterThan(0.95 - 3 * Math.sqrt((0.95 * 0.05) / trials));
    }
  });
});

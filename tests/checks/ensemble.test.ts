import { describe, expect, it } from 'vitest';
import { DEMOS } from '../../app/desk/demos';
import { BODY_INDEX } from '../../core/constants';
import { normalsOf } from '../../core/math/random';
import { createCarrier } from '../../core/uncertainty/carry';
import { CLONE_ROW } from '../../core/uncertainty/clones';
import { planClones } from '../helpers/clones';
import { assessText } from '../helpers/estimate';

/**
 * The ensemble against the first order where the map from the epoch to the target plane is linear: two
 * ways that share the case and nothing else (variational equations; clones carried by the n-body model).
 */
describe('the ensemble of a tight invented case', () => {
  it('has the mean and the covariance of the first order on the target plane, within its own errors', async () => {
    const { assessed } = await assessText(DEMOS[0].text, { spanTo: '2031-06-10' });
    const { approaches, principal } = assessed.report;
    const main = approaches[principal ?? 0];
    const ellipse = main.uncertainty?.ellipse;
    const plane = main.targetPlane;
    if (ellipse === undefined || ellipse === null || plane === null) throw new Error('no ellipse');
    // A tenth of the covariance's own size: the plane's curvature is then far below a standard error.
    const scale = 0.1;
    const { plan, ephemeris } = await planClones(DEMOS[0].text, 76, { scale });
    const carrier = createCarrier(plan, ephemeris);
    const count = 20_000;
    const b: [number, number][] = [];
    for (let first = 0; first < count; first += 500) {
      const z = new Float64Array(500 * plan.dimension);
      normalsOf(11, 0, first, 500, plan.dimension, z);
      const { rows } = carrier.carry(z);
      for (let at = 0; at < rows.length; at += CLONE_ROW.size) {
        if (rows[at + CLONE_ROW.body] !== BODY_INDEX.Earth) continue;
        b.push([rows[at + CLONE_ROW.bDotTKm], rows[at + CLONE_ROW.bDotRKm]]);
      }
    }
    expect(b.length).toBe(count);
    const mean = [0, 1].map((k) => b.reduce((sum, item) => sum + item[k], 0) / count);
    const covariance = (i: number, j: number): number =>
      b.reduce((sum, item) => sum + (item[i] - mean[i]) * (item[j] - mean[j]), 0) / (count - 1);
    const [tt, tr, rr] = ellipse.covarianceKm2.map((value) => value * scale * scale);
    // Five standard errors: of a mean σ/√n, of a variance √(2/n), of a covariance √((1 + ρ²)/n).
    expect(Math.abs(mean[0] - plane.bDotTKm)).toBeLessThan(5 * Math.sqrt(tt / count));
    expect(Math.abs(mean[1] - plane.bDotRKm)).toBeLessThan(5 * Math.sqrt(rr / count));
    expect(Math.abs(covariance(0, 0) / tt - 1)).toBeLessThan(5 * Math.sqrt(2 / count));
    expect(Math.abs(covariance(1, 1) / rr - 1)).toBeLessThan(5 * Math.sqrt(2 / count));
    const error = Math.sqrt((tt * rr + tr * tr) / count);
    expect(Math.abs(covariance(0, 1) - tr)).toBeLessThan(5 * error);
    // The ellipse is a thin one: its determinant is what a rotation or a lost term would spoil.
    const determinant = covariance(0, 0) * covariance(1, 1) - covariance(0, 1) ** 2;
    expect(Math.abs(determinant / (tt * rr - tr * tr) - 1)).toBeLessThan(5 * Math.sqrt(4 / count));
  });
});

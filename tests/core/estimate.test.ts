import { describe, expect, it } from 'vitest';
import { DEMOS } from '../../app/desk/demos';
import { Estimate } from '../../core/estimate';
import type { EstimateEvent, EstimateHost } from '../../core/events';
import { assessText, withCovariance } from '../helpers/estimate';

/** An invented pass whose covariance is wide enough that some clones hit. */
const WIDE = withCovariance(DEMOS[0].text, 60 ** 2);
const SHORT = { spanTo: '2031-06-10' };

/** Carriers that answer late and out of turn. */
function outOfTurn(host: EstimateHost, parallel: number): EstimateHost {
  let asked = 0;
  return {
    ...host,
    parallel,
    carry: async (z) => {
      const own = asked++;
      const outcomes = await host.carry(z);
      for (let i = 0; i < (own % parallel) * 3; i++) await Promise.resolve();
      return outcomes;
    },
  };
}

describe('the estimate', () => {
  it('gives the same report whatever the number of carriers', async () => {
    const { basis, host } = await assessText(WIDE, SHORT);
    const one = await new Estimate(basis, 1).run(3000, host);
    const many = await new Estimate(basis, 1).run(3000, outOfTurn(host, 5));
    expect(one.impactProbability?.ensemble?.impacts).toBeGreaterThan(30);
    expect(many).toEqual(one);
  });

  it('goes on where it was stopped, to the same report as in one run', async () => {
    const { basis, host } = await assessText(WIDE, SHORT);
    const whole = await new Estimate(basis, 1).run(3000, host);
    const estimate = new Estimate(basis, 1);
    let carried = 0;
    const stopped = await estimate.run(3000, {
      ...host,
      emit: (event) => {
        if (event.type === 'clones' && event.drawn === 'plain') carried = event.count;
      },
      stopped: () => carried >= 1000,
    });
    expect(stopped.impactProbability?.ensemble?.count).toBe(1000);
    expect(estimate.count).toBe(1000);
    expect(await estimate.run(3000, host)).toEqual(whole);
  });

  it('draws other clones with another seed', async () => {
    const { basis, host } = await assessText(WIDE, SHORT);
    const a = await new Estimate(basis, 1).run(1000, host);
    const b = await new Estimate(basis, 2).run(1000, host);
    expect(b.impactProbability?.seed).toBe(2);
    expect(b.fingerprint).not.toBe(a.fingerprint);
  });

  it('tells of every batch: counts that grow, impacts, interval and points of the principal pass', async () => {
    const { basis, host } = await assessText(WIDE, SHORT);
    const events: EstimateEvent[] = [];
    const report = await new Estimate(basis, 1).run(1500, {
      ...host,
      emit: (event) => events.push(event),
    });
    const clones = events.flatMap((event) =>
      event.type === 'clones' && event.drawn === 'plain' ? [event] : [],
    );
    expect(clones.map((event) => event.count)).toEqual([500, 1000, 1500]);
    expect(clones.map((event) => event.points.length / 7)).toEqual([500, 500, 500]);
    const last = clones[clones.length - 1];
    expect(last.impacts).toBe(report.impactProbability?.ensemble?.impacts);
    expect(last.interval95).toEqual(report.impactProbability?.ensemble?.interval95);
    expect(events.at(-1)).toEqual({ type: 'report', report });
  });

  it('starts from a report also where an object bound to the Earth hits: no target plane, no NaN', async () => {
    const bound = `Invented, bound\nEarth-centred, ICRF, km, km/s\n2031-03-01T00:00:00 TDB\n200000 0 0 -0.5 0.3 0.02\nsigma 100 km, 1 cm/s\n`;
    const { assessed } = await assessText(bound, { spanTo: '2031-03-10' });
    const main = assessed.report.approaches[assessed.report.principal ?? -1];
    expect(main.outcome).toBe('impact');
    expect(main.uncertainty?.ellipse).toBeNull();
    expect(main.uncertainty?.sigmaDistanceKm).toBeGreaterThan(0);
  });

  it('speaks of passes of the Earth and the Moon, bound ones too, and of no planet', async () => {
    const wide = await assessText(WIDE, { spanTo: '2031-08-01' });
    const report = await new Estimate(wide.basis, 1).run(500, wide.host);
    const of = (body: string) => report.approaches.find((item) => item.body === body);
    expect(of('Earth')?.impactProbability?.ensemble?.count).toBe(500);
    expect(of('Moon')?.impactProbability?.ensemble?.count).toBe(500);
    expect(of('Venus')?.impactProbability?.firstOrder).toBeDefined();
    expect(of('Venus')?.impactProbability?.adopted).toBeUndefined();
    const slow = DEMOS.find(({ id }) => id === 'slow')?.text ?? '';
    const bound = await assessText(`${slow}sigma 50 km, 1 mm/s\n`, { spanTo: '2033-04-01' });
    const held = await new Estimate(bound.basis, 1).run(500, bound.host);
    const pass = held.approaches.find((item) => item.body === 'Earth');
    expect(pass?.targetPlane).toBeNull();
    expect(pass?.impactProbability?.firstOrder).toBeNull();
    expect(pass?.impactProbability?.adopted).toBeDefined();
  });
});

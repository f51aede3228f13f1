import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { JD_J2000, SECONDS_PER_DAY } from '../../core/constants';
import type { Report } from '../../core/report/report';
import { assessCase, caseOf } from '../helpers/assess';

/**
 * Invented encounters integrated by an independent implementation (SciPy's 8th-order
 * Dormand–Prince, DE405): source, model and constants stand in the file's own header.
 */
interface Oracle {
  cases: {
    id: string;
    kind: string;
    epoch: { mjd_day: number; sec_of_day: number };
    state_helio_ecl_j2000: {
      r_km: [number, number, number];
      v_km_s: [number, number, number];
    };
    truth: {
      event: 'entry_100km' | 'perigee';
      time: { mjd_day: number; sec_of_day: number };
      distance_km: number;
      speed_km_s: number;
      v_inf_km_s: number;
      osculating_perigee_km: number;
      b_km: number;
      BT_km: number;
      BR_km: number;
      soi_925000km: { mjd_day: number; sec_of_day: number };
      entry_angle_below_horizontal_deg?: number;
      moon_closest?: { distance_km: number };
    };
  }[];
}

const oracle: Oracle = JSON.parse(
  readFileSync(new URL('data/encounters-open.json', import.meta.url), 'utf8'),
);

const MJD_J2000 = JD_J2000 - 2400000.5;
const tdbSeconds = (t: { mjd_day: number; sec_of_day: number }): number =>
  (t.mjd_day - MJD_J2000) * SECONDS_PER_DAY + t.sec_of_day;

/** Tolerances of the issue: 0.01 km in B and distance, 0.01 s in time, 1e-5 km/s in excess speed. */
const KM = 0.01;
const S = 0.01;
const KM_S = 1e-5;

async function assess(item: Oracle['cases'][number]): Promise<Report> {
  const { report } = await assessCase(
    caseOf({
      epoch: { scale: 'TDB', mjd: item.epoch.mjd_day, secondOfDay: item.epoch.sec_of_day },
      axes: 'EclipticJ2000',
      state: {
        kind: 'cartesian',
        positionKm: item.state_helio_ecl_j2000.r_km,
        velocityKmS: item.state_helio_ecl_j2000.v_km_s,
      },
      model: { gm: 'DE405' },
    }),
  );
  return report;
}

describe('invented encounters of the open set, GM of DE405', () => {
  it('holds the eight cases that its header announces', () => {
    expect(oracle.cases).toHaveLength(8);
  });

  for (const item of oracle.cases) {
    it(`${item.id} (${item.kind}) agrees in B·T, B·R, distance, time and excess speed`, async () => {
      const report = await assess(item);
      const { truth } = item;
      const at = tdbSeconds(truth.time);
      const approach = report.approaches.find(
        (candidate) =>
          candidate.body === 'Earth' && Math.abs(candidate.tdbSeconds - at) < SECONDS_PER_DAY,
      );
      expect(approach).toBeDefined();
      if (approach === undefined) return;
      const within = (value: number | undefined, expected: number, tolerance: number): void => {
        expect(value).toBeDefined();
        expect(Math.abs((value ?? Number.NaN) - expected)).toBeLessThan(tolerance);
      };
      within(approach.targetPlane?.bDotTKm, truth.BT_km, KM);
      within(approach.targetPlane?.bDotRKm, truth.BR_km, KM);
      within(approach.hyperbola?.impactParameterKm, truth.b_km, KM);
      within(approach.excessSpeedKmS ?? undefined, truth.v_inf_km_s, KM_S);
      within(approach.hyperbola?.periapsisKm, truth.osculating_perigee_km, KM);
      const crossing = (name: string) =>
        approach.crossings.find((c) => c.boundary === name && c.direction === 'in');
      within(crossing('sphere-of-influence')?.tdbSeconds, tdbSeconds(truth.soi_925000km), S);
      if (truth.event === 'entry_100km') {
        const entry = crossing('entry-sphere');
        within(entry?.tdbSeconds, at, S);
        within(entry?.distanceKm, truth.distance_km, KM);
        within(entry?.speedKmS, truth.speed_km_s, KM_S);
        expect(approach.outcome).not.toBe('pass');
      } else {
        within(approach.tdbSeconds, at, S);
        within(approach.distanceKm, truth.distance_km, KM);
        within(approach.speedKmS, truth.speed_km_s, KM_S);
        expect(approach.outcome).toBe('pass');
      }
    });
  }
});

import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { BODY_INDEX, BODY_RADIUS_KM } from '../../../core/constants';
import { createForceModel } from '../../../core/dynamics/force-model';
import { createPropagator } from '../../../core/dynamics/propagate';
import type { TargetBody } from '../../../core/encounter/targets';
import { createEphemeris, type Ephemeris, loadEphemeris } from '../../../core/ephemeris';
import { celestialToTerrestrial, earthOrientation } from '../../../core/frames/earth-orientation';
import { itrfFromGeodetic } from '../../../core/frames/geodetic';
import { moonBodyFixed } from '../../../core/frames/moon-orientation';
import {
  cross,
  dot,
  norm,
  rotate,
  rotateBack,
  scale,
  unit,
  type Vec3,
} from '../../../core/math/vector';
import { epochFromTdbSeconds } from '../../../core/time/convert';
import { assessCase, caseOf, fetchPacked } from '../../helpers/assess';

/**
 * Passes that are known by construction: a state with r ⊥ v at a body is an extremum of its
 * distance; run back to an epoch some days before, the search must find it again.
 */

const DAY = 86400;
let ephemeris: Ephemeris;
beforeAll(async () => {
  ephemeris = createEphemeris();
  await loadEphemeris(ephemeris, 0.9e9, 1.2e9, fetchPacked);
});

/** Heliocentric ICRF state at an earlier instant of an object with a given state at a body. */
function stateBefore(body: TargetBody, r: Vec3, v: Vec3, at: number, leadS: number): number[] {
  const bodies = new Float64Array(66);
  ephemeris.states(at, 0, bodies);
  const index = BODY_INDEX[body] * 6;
  const state = Float64Array.from([...r, ...v].map((x, k) => x + bodies[index + k]));
  const model = createForceModel(ephemeris, { gm: 'DE431', nonGravitational: null });
  const back = createPropagator(model, { tdbSeconds: at, state }, -1, { longestStepS: 40 * DAY });
  const end = new Float64Array(6);
  for (;;) {
    const segment = back.step(at - leadS);
    if (segment.baseSeconds + segment.endOffset <= at - leadS) {
      segment.exactState(segment.endOffset, end);
      ephemeris.states(at - leadS, 0, bodies);
      return Array.from(end, (x, k) => x - bodies[BODY_INDEX.Sun * 6 + k]);
    }
  }
}

const direction = fc
  .tuple(
    fc.double({ min: -1, max: 1, noNaN: true }),
    fc.double({ min: 0, max: 2 * Math.PI, noNaN: true }),
  )
  .map(
    ([z, a]): Vec3 => [Math.sqrt(1 - z * z) * Math.cos(a), Math.sqrt(1 - z * z) * Math.sin(a), z],
  );

async function find(body: TargetBody, r: Vec3, v: Vec3, at: number, leadS: number) {
  const s = stateBefore(body, r, v, at, leadS);
  const { report } = await assessCase(
    caseOf({
      epoch: epochFromTdbSeconds(at - leadS, 'TDB'),
      axes: 'ICRF',
      state: {
        kind: 'cartesian',
        positionKm: [s[0], s[1], s[2]],
        velocityKmS: [s[3], s[4], s[5]],
      },
      span: { fromTdbSeconds: at - leadS - DAY, toTdbSeconds: at + 5 * DAY },
    }),
  );
  return report.approaches.filter(
    (item) => item.body === body && Math.abs(item.tdbSeconds - at) < 60,
  );
}

describe('the search for close approaches', () => {
  it('misses no pass of any body, however short, slow or distant', async () => {
    const bodies: TargetBody[] = ['Earth', 'Moon', 'Venus', 'Mars', 'Mercury', 'Jupiter'];
    await fc.assert(
      fc.asyncProperty(
        fc.constantFrom(...bodies),
        direction,
        direction,
        // From just above the surface to far out; up to 65 km/s.
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.double({ min: 0.5, max: 65, noNaN: true }),
        fc.integer({ min: 10, max: 400 }),
        async (body, side, across, reach, excess, when) => {
          fc.pre(norm(cross(side, across)) > 0.05);
          const nearest = 1.3 * BODY_RADIUS_KM[body];
          const farthest = body === 'Moon' ? 1e6 : 8e6;
          const distance = nearest * (Math.max(farthest, 3 * nearest) / nearest) ** reach;
          const gm = {
            Earth: 398600,
            Moon: 4903,
            Venus: 324859,
            Mars: 42828,
            Mercury: 22032,
            Jupiter: 1.267e8,
          };
          const speed = Math.sqrt(excess ** 2 + (2 * gm[body]) / distance);
          // r ⊥ v is a minimum where v²/r outruns the pulls of body and Sun; far and slow it is none.
          const orbit = {
            Earth: 1.5e8,
            Moon: 1.5e8,
            Venus: 1.08e8,
            Mars: 2.1e8,
            Mercury: 4.6e7,
            Jupiter: 7.4e8,
          };
          const tide = (4 * 1.33e11 * distance) / orbit[body] ** 3;
          fc.pre(speed ** 2 / distance > 2 * tide + 1.05 * (gm[body] / distance ** 2));
          const r = scale(side, distance);
          const v = scale(unit(cross(side, across)), speed);
          const at = 1e9 + when * DAY;
          const found = await find(body, r, v, at, 4.3 * DAY);
          expect(found).toHaveLength(1);
          // Out and back through the pass: 1e-14 a step, stretched by what the pass bends.
          expect(Math.abs(found[0].tdbSeconds - at)).toBeLessThan(0.05);
          expect(Math.abs(found[0].distanceKm / distance - 1)).toBeLessThan(1e-6);
        },
      ),
      { numRuns: 60, seed: 20260103 },
    );
  });

  it('gives an object that is held by the Earth every one of its perigees', async () => {
    // Bound with a period of about three days: five perigees in fifteen days after the first.
    const at = 1.0e9;
    const r: Vec3 = [30000, 0, 0];
    const a = 88000;
    const v: Vec3 = [0, Math.sqrt(398600.4354 * (2 / 30000 - 1 / a)), 0.2];
    const s = stateBefore('Earth', r, v, at, DAY);
    const { report } = await assessCase(
      caseOf({
        epoch: epochFromTdbSeconds(at - DAY, 'TDB'),
        axes: 'ICRF',
        state: {
          kind: 'cartesian',
          positionKm: [s[0], s[1], s[2]],
          velocityKmS: [s[3], s[4], s[5]],
        },
        span: { fromTdbSeconds: at - DAY, toTdbSeconds: at + 15 * DAY },
      }),
    );
    const perigees = report.approaches.filter((item) => item.body === 'Earth');
    const period = (2 * Math.PI * Math.sqrt(a ** 3 / 398600.4354)) / DAY;
    expect(perigees).toHaveLength(1 + Math.floor(15 / period));
    for (const item of perigees) expect(item.excessSpeedKmS).toBeNull();
  });
});

describe('a satellite', () => {
  it('is stopped after a hundred perigees, and the report says so', async () => {
    const at = 1.0e9;
    const { report } = await assessCase(
      caseOf({
        epoch: epochFromTdbSeconds(at, 'TDB'),
        axes: 'ICRF',
        centre: 'Earth',
        state: { kind: 'cartesian', positionKm: [7000, 0, 0], velocityKmS: [0, 5.4, 5.4] },
        span: { fromTdbSeconds: at - 600, toTdbSeconds: at + 30 * DAY },
      }),
    );
    expect(report.model.trajectoryEnds).toMatch(/circles the Earth/);
    // A hundred turns of about 1.7 h.
    const days = report.model.span.toJdTdb - report.model.span.fromJdTdb;
    expect(days).toBeGreaterThan(5);
    expect(days).toBeLessThan(10);
  });
});

describe('an impact', () => {
  /** A state on a surface, moving inwards at some angle. */
  async function strike(body: 'Earth' | 'Moon', r: Vec3, v: Vec3, at: number) {
    const s = stateBefore(body, r, v, at, 3 * DAY);
    const { report } = await assessCase(
      caseOf({
        epoch: epochFromTdbSeconds(at - 3 * DAY, 'TDB'),
        axes: 'ICRF',
        state: {
          kind: 'cartesian',
          positionKm: [s[0], s[1], s[2]],
          velocityKmS: [s[3], s[4], s[5]],
        },
      }),
    );
    const found = report.approaches[report.principal ?? -1];
    return { report, found };
  }

  it('on the Moon has its instant, place and angle, and ends the trajectory', async () => {
    const at = 1.02e9;
    const side = unit([0.3, -0.8, 0.4]);
    const r = scale(side, 1737.4);
    const v = scale(unit([-0.9, 0.5, -0.2]), 14);
    const { report, found } = await strike('Moon', r, v, at);
    expect([found.body, found.outcome, found.osculatingAt]).toEqual(['Moon', 'impact', 'surface']);
    const spot = found.surfaceImpact;
    expect(Math.abs((spot?.tdbSeconds ?? 0) - at)).toBeLessThan(1e-3);
    expect(spot?.speedKmS).toBeCloseTo(14, 6);
    const sine = dot(unit(r), unit(v));
    expect(spot?.flightPathAngleDeg).toBeCloseTo((Math.asin(sine) * 180) / Math.PI, 4);
    // The place as a direction of the Moon's own axes.
    const axes = moonBodyFixed(at);
    const own = rotate(axes, side);
    expect(spot?.latitudeDeg).toBeCloseTo((Math.asin(own[2]) * 180) / Math.PI, 4);
    expect(spot?.longitudeDeg).toBeCloseTo((Math.atan2(own[1], own[0]) * 180) / Math.PI, 4);
    expect(report.model.trajectoryEnds).toMatch(/Moon/);
    expect(report.findings[0].text).toMatch(/strikes the Moon/);
  });

  it('on the Earth is at the geodetic place it was built from, below its entry interface', async () => {
    const at = 1.03e9;
    const place = { latitudeRad: -0.4, longitudeRad: 2.1, altitudeKm: 0 };
    const r = rotateBack(celestialToTerrestrial(earthOrientation(at)), itrfFromGeodetic(place));
    const v = scale(unit([-r[0] + 2000, -r[1], -r[2] + 1500]), 17);
    const { report, found } = await strike('Earth', r, v, at);
    expect([found.body, found.outcome, found.osculatingAt]).toEqual([
      'Earth',
      'impact',
      'entry-sphere',
    ]);
    const spot = found.surfaceImpact;
    expect(Math.abs((spot?.tdbSeconds ?? 0) - at)).toBeLessThan(1e-3);
    expect(spot?.latitudeDeg).toBeCloseTo((-0.4 * 180) / Math.PI, 5);
    expect(spot?.longitudeDeg).toBeCloseTo((2.1 * 180) / Math.PI, 5);
    expect(found.entry?.altitudeKm).toBeCloseTo(100, 6);
    expect(found.entry?.tdbSeconds).toBeLessThan(at);
    const after = report.approaches.filter((item) => item.tdbSeconds > at + 3600);
    expect(after).toEqual([]);
  });
});

describe('crossings', () => {
  it('come in pairs that nest, each on its own sphere', async () => {
    await fc.assert(
      fc.asyncProperty(
        direction,
        direction,
        fc.double({ min: 3, max: 30, noNaN: true }),
        async (side, across, excess) => {
          fc.pre(norm(cross(side, across)) > 0.05);
          const at = 1.01e9;
          const distance = 7500;
          const speed = Math.sqrt(excess ** 2 + (2 * 398600.4354) / distance);
          const found = await find(
            'Earth',
            scale(side, distance),
            scale(unit(cross(side, across)), speed),
            at,
            6 * DAY,
          );
          const { crossings } = found[0];
          const radii = {
            'sphere-of-influence': 925000,
            'moon-distance': 384400,
            geosynchronous: 42164,
            'low-orbit-shell': 8378.137,
          };
          const names = Object.keys(radii) as (keyof typeof radii)[];
          const of = (name: string, way: 'in' | 'out') =>
            crossings.filter((item) => item.boundary === name && item.direction === way);
          let before = Number.NEGATIVE_INFINITY;
          let after = Number.POSITIVE_INFINITY;
          for (const name of names) {
            const [inward, outward] = [of(name, 'in'), of(name, 'out')];
            expect([name, inward.length]).toEqual([name, 1]);
            // Times to 1e-6 s at 30 km/s.
            expect(Math.abs(inward[0].distanceKm - radii[name])).toBeLessThan(1e-3);
            expect(inward[0].tdbSeconds).toBeGreaterThan(before);
            before = inward[0].tdbSeconds;
            if (outward.length === 0) continue;
            expect(Math.abs(outward[0].distanceKm - radii[name])).toBeLessThan(1e-3);
            expect(outward[0].tdbSeconds).toBeLessThan(after);
            after = outward[0].tdbSeconds;
          }
          expect(after).toBeGreaterThan(before);
        },
      ),
      { numRuns: 12, seed: 20260104 },
    );
  });
});

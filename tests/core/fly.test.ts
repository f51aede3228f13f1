import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { fly } from '../../core/fly';
import { entryFlightSchema } from '../../core/report/entry-flight';
import { entryFlightFinding } from '../../core/report/entry-flight-findings';

const RAD = Math.PI / 180;
const entry = (speed: number, angleDeg: number) => ({
  latitudeRad: 55 * RAD,
  longitudeRad: 61 * RAD,
  altitudeKm: 100,
  airSpeedKmS: speed,
  airFlightPathAngleRad: -angleDeg * RAD,
  airAzimuthRad: 280 * RAD,
});

describe('an entering body', () => {
  it('has no flight where neither its size nor an entry is known', () => {
    expect(fly({ albedo: 0.1 }, [entry(19, 18)], 'nominal orbit', 10)).toBeNull();
    expect(fly({ diameterM: 20 }, [], 'nominal orbit', 10)).toBeNull();
  });

  it('brings the kinetic energy of its mass and speed', () => {
    const known = { diameterM: 20, densityKgM3: 3300 };
    const flight = fly(known, [entry(19, 18)], 'nominal orbit', 50);
    // π/6 · 3300 kg/m³ · (20 m)³ = 1.3823e7 kg; ½ m v² at 19 km/s = 2.495e15 J = 0.5963 Mt of 4.184e15 J.
    for (const energy of flight?.energyMt ?? [0]) expect(energy).toBeCloseTo(0.5963, 3);
    expect(flight?.trajectory.energyMt).toBeCloseTo(0.5963, 3);
  });

  it('gives percentiles in order, that fit the schema and are the same again', () => {
    const one = fly({ absoluteMagnitude: 25 }, [entry(15, 40)], 'impacting clones', 200);
    expect(v.is(entryFlightSchema, one)).toBe(true);
    expect(fly({ absoluteMagnitude: 25 }, [entry(15, 40)], 'impacting clones', 200)).toEqual(one);
    for (const of of [one?.burstAltitudeKm, one?.energyMt, one?.peakDynamicPressureMPa]) {
      expect([...(of ?? [])].sort((a, b) => a - b)).toEqual(of);
    }
    const heights = one?.trajectory.samples.map((sample) => sample.altitudeKm) ?? [];
    expect(heights[0]).toBeCloseTo(100, 0);
    expect(Math.min(...heights)).toBeLessThan(one?.trajectory.burstAltitudeKm ?? 0);
  });

  it('is told as leaving again where it grazes, and as bursting where it does', () => {
    const graze = fly({ diameterM: 15 }, [entry(12, 1)], 'nominal orbit', 40);
    expect(graze?.skipOut).toBeGreaterThan(30);
    if (graze === null) throw new Error('no flight');
    expect(entryFlightFinding(graze).text).toContain('It leaves the air again in');
    const steep = fly({ diameterM: 15 }, [entry(18, 45)], 'nominal orbit', 40);
    if (steep === null) throw new Error('no flight');
    expect(entryFlightFinding(steep).text).toMatch(/^In the air it breaks up near \d+\u2009km/);
    expect(entryFlightFinding(steep).caution).toContain('civil-protection');
  });
});

import { describe, expect, it } from 'vitest';
import { earthFixedFromEntry } from '../../core/entry/earth-fixed';
import { DEFAULT_FLIGHT, Flight, type FlightSample } from '../../core/entry/flight';
import type { AirModel } from '../../core/entry/flying-body';

/**
 * Allen & Eggers (1958), NACA Report 1381: constant angle, exponential air, no gravity, no ablation.
 *   v = v_E exp(−K e^(−h/H)), K = C_D A ρ0 H / (2 m sin γ)
 *   peak deceleration v_E² sin γ / (2 e H), at v = v_E e^(−1/2)
 */
const H = 7.2;
const SEA = 1.752;
const AIR: AirModel = {
  densityKgM3: (altitude) => SEA * Math.exp(-altitude / H),
  // Sound that slow and paths that short: hypersonic continuum all the way down.
  soundSpeedKmS: () => 1e-9,
  meanFreePathM: () => 0,
};
const EARTH = { gmKm3S2: 0, j2: 0, rotationRadS: 0 };
const BODY = {
  massKg: 2000,
  densityKgM3: 3000,
  ablationS2Km2: 0,
  dragCoefficient: 1.3,
  liftCoefficient: 0,
};
const AREA = Math.PI * ((3 * BODY.massKg) / (4 * Math.PI * BODY.densityKgM3)) ** (2 / 3);

function fly(downRad: number): {
  track: FlightSample[];
  peakPressurePa: number;
  altitudeKm: number;
} {
  const flight = new Flight({ ...DEFAULT_FLIGHT, air: AIR, earth: EARTH, tolerance: 1e-10 });
  flight.track = [];
  const entry = earthFixedFromEntry({
    latitudeRad: 0,
    longitudeRad: 0,
    altitudeKm: 200,
    airSpeedKmS: 17,
    airFlightPathAngleRad: -downRad,
    airAzimuthRad: 1,
  });
  flight.begin(entry, BODY);
  const end = flight.run({
    strengthPa: Number.POSITIVE_INFINITY,
    radiusM: Number.POSITIVE_INFINITY,
    slowKmS: 0.1,
  });
  expect(['slow', 'ground']).toContain(end);
  return {
    track: flight.track,
    peakPressurePa: flight.peakPressurePa,
    altitudeKm: flight.peakPressureAltitudeKm,
  };
}

const K = (sine: number): number =>
  (BODY.dragCoefficient * AREA * SEA * H * 1000) / (2 * BODY.massKg * sine);

describe('Allen and Eggers, straight down', () => {
  const flown = fly(Math.PI / 2);

  it('gives the speed at every altitude to 1e-7 of the entry speed', () => {
    // Straight down the angle is constant on a round Earth too: only the integration's error is left.
    expect(flown.track.length).toBeGreaterThan(30);
    for (const { altitudeKm, airSpeedKmS } of flown.track) {
      const speed = 17 * Math.exp(-K(1) * Math.exp(-altitudeKm / H));
      expect(Math.abs(airSpeedKmS - speed) / 17).toBeLessThan(1e-7);
    }
  });

  it('gives the peak deceleration to 0.1 % and its altitude to 0.3 km', () => {
    // The peak is read at the steps, which stand up to 0.3 km from it; it is flat there.
    const deceleration = (0.5 * BODY.dragCoefficient * AREA * flown.peakPressurePa) / BODY.massKg;
    const expected = (17000 * 17000) / (2 * Math.E * H * 1000);
    expect(Math.abs(deceleration / expected - 1)).toBeLessThan(1e-3);
    expect(Math.abs(flown.altitudeKm - H * Math.log(2 * K(1)))).toBeLessThan(0.3);
  });
});

describe('Allen and Eggers, at 60°', () => {
  it('gives the peak deceleration to 2 %, which is what the round Earth turns the path by', () => {
    // From 200 km down to the peak the horizon turns by 1°: sin γ changes by about 1 %.
    const sine = Math.sin(Math.PI / 3);
    const flown = fly(Math.PI / 3);
    const deceleration = (0.5 * BODY.dragCoefficient * AREA * flown.peakPressurePa) / BODY.massKg;
    const expected = (17000 * 17000 * sine) / (2 * Math.E * H * 1000);
    expect(Math.abs(deceleration / expected - 1)).toBeLessThan(0.02);
  });
});

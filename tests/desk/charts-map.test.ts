import { geoContains, geoPath } from 'd3-geo';
import { describe, expect, it } from 'vitest';
import { groundTrack, pointsBeneath } from '../../app/charts/ground-track';
import { LAND } from '../../app/charts/land';
import {
  mapMarks,
  mapProjection,
  middleLongitude,
  placeWords,
} from '../../app/charts/map-geometry';
import { Trajectory } from '../../app/worker/trajectory';
import { SAMPLE } from '../../core/events';
import type { Approach, Crossing } from '../../core/report/report';
import { inventedReport } from './fixtures/report';
import { evenTimes, straightTrajectory } from './ribbon-straight-path';

const DAY = 86400;
const plain = (text: string): string => text.replaceAll('\u2009', ' ');

/** An object at rest on an axis of the inertial frame, the Earth turned by an angle (and no pole). */
function resting(direction: [number, number, number], eraRad: number): Trajectory {
  const samples = new Float64Array(2 * SAMPLE.stride);
  [0, 100].forEach((t, index) => {
    const at = index * SAMPLE.stride;
    samples[at] = t;
    samples.set(direction, at + SAMPLE.object);
    // The Sun lies towards +y of the Earth: the Earth towards −y of the Sun.
    samples.set([0, -1.5e8, 0], at + SAMPLE.earth);
    samples[at + SAMPLE.orientation + 3] = eraRad;
  });
  const trajectory = new Trajectory();
  trajectory.append(1, samples);
  return trajectory;
}

describe('the points beneath', () => {
  it('turn west under an object at rest as the Earth turns east', () => {
    // By definition of the rotation angle: the prime meridian lies at right ascension ERA.
    const still = pointsBeneath(resting([50000, 0, 0], 0), 50);
    expect(still?.object[0]).toBeCloseTo(0, 9);
    expect(still?.object[1]).toBeCloseTo(0, 9);
    const turned = pointsBeneath(resting([50000, 0, 0], Math.PI / 6), 50);
    expect(turned?.object[0]).toBeCloseTo(-30, 9);
  });

  it('put the Sun a quarter of a turn east of an object a quarter west of it', () => {
    const points = pointsBeneath(resting([50000, 0, 0], Math.PI / 6), 50);
    expect(points?.sun[0]).toBeCloseTo(60, 9);
    expect(points?.sun[1]).toBeCloseTo(0, 9);
  });

  it('give the height over the equator', () => {
    // WGS 84 equatorial radius 6 378.137 km.
    expect(pointsBeneath(resting([50000, 0, 0], 0), 50)?.altitudeKm).toBeCloseTo(43621.863, 6);
  });

  it('stay at the end of the path when the clock is past it', () => {
    expect(pointsBeneath(resting([50000, 0, 0], 0), 1e6)?.tdbSeconds).toBe(100);
  });
});

function crossing(direction: 'in' | 'out', tdbSeconds: number): Crossing {
  return {
    boundary: 'moon-distance',
    direction,
    tdbSeconds,
    jdTdb: 2451545,
    utc: '',
    distanceKm: 384400,
    speedKmS: 10,
  };
}

const passing = (crossings: Crossing[]): Approach => ({
  ...inventedReport().approaches[0],
  tdbSeconds: 0,
  distanceKm: 20000,
  speedKmS: 10,
  crossings,
});

describe('the ground track', () => {
  const trajectory = straightTrajectory({
    missKm: 20000,
    speedKmS: 10,
    times: evenTimes(-5 * DAY, 5 * DAY, 2000),
  });

  it('covers the time inside the Moon’s distance', () => {
    const track = groundTrack(
      passing([crossing('in', -38388), crossing('out', 38388)]),
      trajectory,
    );
    expect(track?.fromTdbSeconds).toBe(-38388);
    expect(track?.toTdbSeconds).toBe(38388);
  });

  it('ends a day from the pass where the object stays inside for longer', () => {
    const slow = passing([crossing('in', -3 * DAY), crossing('out', 3 * DAY)]);
    expect(groundTrack(slow, trajectory)).toMatchObject({
      fromTdbSeconds: -DAY,
      toTdbSeconds: DAY,
    });
  });

  it('covers half a day on both sides of a distant pass', () => {
    expect(groundTrack(passing([]), trajectory)).toMatchObject({
      fromTdbSeconds: -DAY / 2,
      toTdbSeconds: DAY / 2,
    });
  });

  it('lies closer together in time near the pass, where the point runs fastest', () => {
    const points = groundTrack(passing([]), trajectory)?.points ?? [];
    // A day in 480 even steps of 180 s would turn by 1 800/20 000 rad = 5 degrees at the pass.
    const steps = points
      .slice(1)
      .map(([longitude], i) => Math.abs(((longitude - points[i][0] + 540) % 360) - 180));
    expect(points).toHaveLength(481);
    expect(Math.max(...steps)).toBeLessThan(2);
  });

  it('is nothing before there is a trajectory', () => {
    expect(groundTrack(passing([]), new Trajectory())).toBeNull();
  });
});

describe('the map', () => {
  it('has the wanted longitude near its middle and fits its sheet', () => {
    const projection = mapProjection(600, 320, 137.6);
    const [x, y] = projection([150, 0]) ?? [0, 0];
    expect(x).toBeCloseTo(300, 6);
    expect(y).toBeCloseTo(160, 6);
    const [[x0, y0], [x1, y1]] = geoPath(projection).bounds({ type: 'Sphere' });
    expect(x0).toBeGreaterThanOrEqual(0);
    expect(y0).toBeGreaterThanOrEqual(0);
    expect(x1).toBeLessThanOrEqual(600);
    expect(y1).toBeLessThanOrEqual(320);
  });

  it('carries coastlines: Alice Springs lies on land and the middle of the Pacific does not', () => {
    expect(geoContains(LAND, [133.88, -23.7])).toBe(true);
    expect(geoContains(LAND, [-150, -20])).toBe(false);
  });

  it('writes places with their hemispheres', () => {
    expect(plain(placeWords([137.5637, -41.8571]))).toBe('41.86° S 137.56° E');
    expect(plain(placeWords([-0.5, 0.25]))).toBe('0.25° N 0.50° W');
  });

  it('marks entry and ground from the report, and the closest point only on a pass', () => {
    const pass = passing([]);
    const track = { zeroTdbSeconds: 0, fromTdbSeconds: -1, toTdbSeconds: 1, points: [], ticks: [] };
    expect(mapMarks(pass, track, [10, 20]).map((mark) => mark.kind)).toEqual(['closest']);
    const entry = {
      jdTdb: 2451545,
      tdbSeconds: -100,
      utc: '',
      latitudeDeg: -41.86,
      longitudeDeg: 137.56,
      altitudeKm: 100,
      speedKmS: 15,
      airSpeedKmS: 15,
      flightPathAngleDeg: -40,
      azimuthDeg: 160,
      airFlightPathAngleDeg: -40,
      airAzimuthDeg: 160,
    };
    const entering: Approach = { ...pass, entry };
    expect(mapMarks(entering, track, [10, 20])).toMatchObject([
      { kind: 'entry', at: [137.56, -41.86] },
    ]);
    expect(middleLongitude(entering, [10, 20])).toBe(137.56);
    expect(middleLongitude(pass, [10, 20])).toBe(10);
  });
});

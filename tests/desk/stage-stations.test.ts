import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { axesOf, type Camera, distanceToFrame } from '../../app/stage/camera';
import type { Encounter } from '../../app/stage/encounter';
import { Projector } from '../../app/stage/projection';
import { NO_HAND, Rig } from '../../app/stage/rig';
import { frameRadiusKm, stationCamera } from '../../app/stage/stations';
import { AU_KM, EARTH_RADIUS_KM, MOON_MEAN_DISTANCE_KM } from '../../core/constants';
import { SAMPLE } from '../../core/dynamics/sample-layout';
import { ECLIPTIC_POLE_ICRF } from '../../core/frames/ecliptic';
import { cross, dot, scale, unit, type Vec3 } from '../../core/math/vector';

const S = unit([0.3, -0.8, 0.25]);

function encounter(frameKm: number): Encounter {
  return {
    tdbSeconds: 0,
    frameKm,
    direction: S,
    earthKm: [0.6 * AU_KM, -0.7 * AU_KM, -0.3 * AU_KM],
    farthestFromSunKm: 1.3 * AU_KM,
  };
}

function sampleWith(object: Vec3): Float64Array {
  const sample = new Float64Array(SAMPLE.stride);
  sample.set(object, SAMPLE.object);
  sample.set(encounter(1).earthKm, SAMPLE.earth);
  return sample;
}

const NEAR = sampleWith([12000, 9000, -4000]);

/** Directions are unit vectors: what is left is rounding. */
function expectSame(a: Vec3, b: Vec3): void {
  for (let k = 0; k < 3; k++) expect(a[k]).toBeCloseTo(b[k], 12);
}

describe('the stations', () => {
  it('along the approach show the target plane: T to the right, R downwards, S into the picture', () => {
    // T = unit(S × K), R = S × T, K the ecliptic north pole: the definition in the report.
    const t = unit(cross(S, ECLIPTIC_POLE_ICRF));
    for (const scene of ['sun', 'earth'] as const) {
      const axes = axesOf(stationCamera(scene, 'along-approach', encounter(2e4), NEAR));
      expectSame(axes.forward, S);
      expectSame(axes.right, t);
      expectSame(axes.up, scale(cross(S, t), -1));
    }
  });

  it('from the north ecliptic pole have the vernal equinox to the right', () => {
    const axes = axesOf(stationCamera('sun', 'north-pole', encounter(2e4), NEAR));
    expectSame(axes.forward, scale(ECLIPTIC_POLE_ICRF, -1));
    expectSame(axes.right, [1, 0, 0]);
  });

  it('edge-on keep the eye in the plane of the ecliptic and its pole upright', () => {
    for (const scene of ['sun', 'earth'] as const) {
      const axes = axesOf(stationCamera(scene, 'edge-on', encounter(2e4), NEAR));
      expectSame(axes.up, ECLIPTIC_POLE_ICRF);
    }
  });

  it('edge-on have the object fly to the right past the Earth', () => {
    const { right } = axesOf(stationCamera('earth', 'edge-on', encounter(2e4), NEAR));
    const inPlane = unit(cross(cross(ECLIPTIC_POLE_ICRF, S), ECLIPTIC_POLE_ICRF));
    expect(dot(right, inPlane)).toBeCloseTo(1, 12);
  });

  it('riding keep the object in the middle and the Earth in the picture before it', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 5, max: 8.2, noNaN: true }),
        fc.double({ min: -3, max: 3, noNaN: true }),
        fc.double({ min: -1.2, max: 1.2, noNaN: true }),
        (log, longitude, latitude) => {
          const r = 10 ** log;
          const c = Math.cos(latitude);
          const sample = sampleWith([
            r * c * Math.cos(longitude),
            r * c * Math.sin(longitude),
            r * Math.sin(latitude),
          ]);
          const camera = stationCamera('earth', 'riding', encounter(2e4), sample);
          const projector = new Projector(camera, 300, 400);
          const object = projector.project(camera.target);
          const earth = projector.project([0, 0, 0]);
          expect(object?.x).toBeCloseTo(150, 6);
          expect(object?.y).toBeCloseTo(200, 6);
          expect(earth !== null && object !== null && earth.depthKm > object.depthKm).toBe(true);
          expect(earth !== null && projector.shows(earth)).toBe(true);
        },
      ),
    );
  });
});

describe('the framing', () => {
  it('of the Earth scene takes in a few times the pass, but never less than the globe', () => {
    const pass = frameRadiusKm('earth', encounter(30_000), NEAR, false);
    expect(pass / 30_000).toBeGreaterThan(2);
    expect(pass / 30_000).toBeLessThan(5);
    expect(frameRadiusKm('earth', encounter(6_400), NEAR, false)).toBeGreaterThan(
      2 * EARTH_RADIUS_KM,
    );
  });

  it('of the Earth scene keeps the object in the picture however far it is', () => {
    for (const r of [2e4, MOON_MEAN_DISTANCE_KM, 5e6, 2e8]) {
      const sample = sampleWith([r, 0, 0]);
      const camera = stationCamera('earth', 'north-pole', encounter(2e4), sample);
      const projector = new Projector(camera, 320, 400);
      const point = projector.project([r, 0, 0]);
      expect(point !== null && projector.shows(point)).toBe(true);
    }
  });

  it('of the Sun scene takes in the farthest point of the path, and at least the Earth’s orbit', () => {
    expect(frameRadiusKm('sun', encounter(2e4), NEAR, true)).toBeGreaterThan(1.3 * AU_KM);
    const inner = { ...encounter(2e4), farthestFromSunKm: 0.6 * AU_KM };
    expect(frameRadiusKm('sun', inner, NEAR, true)).toBeGreaterThan(1.017 * AU_KM);
  });
});

describe('the camera in a hand', () => {
  const fixed = (km: number): Camera => ({
    target: [0, 0, 0],
    longitudeRad: 0,
    latitudeRad: 0.5,
    distanceKm: km,
  });

  it('keeps its distance once it has been zoomed, whatever the station would frame', () => {
    const rig = new Rig();
    const early = (keep: boolean) => fixed(keep ? 5e6 : 1e5);
    rig.camera(early, 0, 1, false);
    rig.zoomBy(0.5, early);
    const late = (keep: boolean) => fixed(keep ? 1e5 : 1e5);
    expect(rig.camera(early, 10, 1, false).distanceKm).toBeCloseTo(2.5e6, 3);
    expect(rig.camera(late, 20, 1, false).distanceKm).toBeCloseTo(2.5e6, 3);
    rig.hand = NO_HAND;
    expect(rig.camera(late, 30, 1, false).distanceKm).toBe(1e5);
  });

  it('zooms from 60 au down to 1 km and no further', () => {
    const rig = new Rig();
    const station = () => fixed(1e6);
    for (let i = 0; i < 300; i++) {
      rig.camera(station, i, 1, false);
      rig.zoomBy(0.7, station);
    }
    expect(rig.camera(station, 400, 1, false).distanceKm).toBeCloseTo(1, 9);
    for (let i = 0; i < 300; i++) {
      rig.camera(station, i, 1, false);
      rig.zoomBy(1.5, station);
    }
    expect(rig.camera(station, 800, 1, false).distanceKm / AU_KM).toBeCloseTo(60, 0);
  });

  it('is never lifted over the pole', () => {
    const rig = new Rig();
    for (let i = 0; i < 40; i++) rig.turn(0, 0.2, () => fixed(1e6));
    expect(rig.camera(() => fixed(1e6), 0, 1, false).latitudeRad).toBeCloseTo(Math.PI / 2, 12);
  });

  it('is on its way for a while after a leap, and leaps at once when motion is reduced', () => {
    const start = () => fixed(1e6);
    const end = () => fixed(1e8);
    const smooth = new Rig();
    smooth.camera(start, 0, 1, true);
    const between = smooth.camera(end, 1, 1, true).distanceKm;
    const later = smooth.camera(end, 100, 1, true).distanceKm;
    expect(between).toBeLessThan(2e6);
    expect(later).toBeGreaterThan(between);
    expect(smooth.camera(end, 2000, 1, true).distanceKm).toBe(1e8);
    const still = new Rig();
    still.camera(start, 0, 1, false);
    expect(still.camera(end, 1, 1, false).distanceKm).toBe(1e8);
  });

  it('frames a circle of the asked radius to the edge of the shorter side', () => {
    const projector = new Projector({ ...fixed(distanceToFrame(1000)), latitudeRad: 0 }, 500, 300);
    expect(1000 * projector.pxPerKm).toBeCloseTo(150, 9);
  });
});

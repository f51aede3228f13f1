import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  celestialToTerrestrial,
  type EarthOrientation,
  earthOrientation,
} from '../../../core/frames/earth-orientation';
import {
  geodeticAltitudeKm,
  geodeticFromItrf,
  itrfFromGeodetic,
  localAngles,
  velocityRelativeToAir,
} from '../../../core/frames/geodetic';
import {
  add,
  cross,
  norm,
  rotateBack,
  scale,
  subtract,
  type Vec3,
} from '../../../core/math/vector';

const latitude = fc.double({ min: -Math.PI / 2, max: Math.PI / 2, noNaN: true });
const longitude = fc.double({ min: -Math.PI, max: Math.PI, noNaN: true });
const component = fc.double({ min: -1, max: 1, noNaN: true });
const seconds = fc.double({ min: -1.26e9, max: 1.9e9, noNaN: true });
/** From 107 km off the centre to 1e8 km, by size. */
const altitude = fc.oneof(
  fc.double({ min: -6250, max: 200, noNaN: true }),
  fc.double({ min: 2, max: 8, noNaN: true }).map((power) => 10 ** power),
);

/** Unit vectors east, north and up of a place, ITRF axes. */
function local(lat: number, lon: number): { east: Vec3; north: Vec3; up: Vec3 } {
  const up: Vec3 = [Math.cos(lat) * Math.cos(lon), Math.cos(lat) * Math.sin(lon), Math.sin(lat)];
  const east: Vec3 = [-Math.sin(lon), Math.cos(lon), 0];
  return { east, north: cross(up, east), up };
}

describe('geodetic coordinates', () => {
  it('have the equator and the poles of WGS 84', () => {
    // Semi-axes 6378.137 km and 6356.752314245 km: NIMA TR8350.2, table 3.1 and derived.
    expect(geodeticAltitudeKm([0, 6478.137, 0])).toBeCloseTo(100, 9);
    expect(geodeticFromItrf([0, 0, -6456.752314245])).toEqual({
      latitudeRad: -Math.PI / 2,
      longitudeRad: 0,
      altitudeKm: expect.closeTo(100, 8),
    });
    expect(geodeticFromItrf([-6378.137, 0, 0]).longitudeRad).toBe(Math.PI);
  });

  it('put the centre under the north pole', () => {
    const centre = geodeticFromItrf([0, 0, 0]);
    expect(centre.latitudeRad).toBe(Math.PI / 2);
    expect(centre.altitudeKm).toBeCloseTo(-6356.752314245, 8);
  });

  it('come back from a position to 1e-9 rad and 1e-6 km', () => {
    fc.assert(
      fc.property(latitude, longitude, altitude, (latitudeRad, longitudeRad, altitudeKm) => {
        const place = geodeticFromItrf(itrfFromGeodetic({ latitudeRad, longitudeRad, altitudeKm }));
        const across =
          2 * Math.sin((place.longitudeRad - longitudeRad) / 2) * Math.cos(latitudeRad);
        expect(Math.abs(place.latitudeRad - latitudeRad)).toBeLessThan(1e-9);
        expect(Math.abs(across)).toBeLessThan(1e-9);
        expect(Math.abs(place.altitudeKm - altitudeKm)).toBeLessThan(1e-6);
      }),
      { numRuns: 2000 },
    );
  });

  it('are finite, and a normal through the point, for every point down to the centre', () => {
    fc.assert(
      fc.property(
        component,
        component,
        component,
        fc.double({ min: 0, max: 3, noNaN: true }),
        (...a) => {
          const [x, y, z, power] = a;
          const r = scale([x, y, z], 10 ** power);
          const place = geodeticFromItrf(r);
          // The foot of a true normal leads back to the point: to rounding of the Earth's size.
          expect(norm(subtract(itrfFromGeodetic(place), r))).toBeLessThan(1e-8);
        },
      ),
      { numRuns: 2000 },
    );
  });
});

describe('velocityRelativeToAir', () => {
  it('is zero for a point that stands on the turning ground', () => {
    // Velocity of the ground by difference of the full rotation over 2 s: 1e-6 km/s covers the
    // difference's own curvature and the pole's motion.
    fc.assert(
      fc.property(latitude, longitude, seconds, (latitudeRad, longitudeRad, t) => {
        const ground = itrfFromGeodetic({ latitudeRad, longitudeRad, altitudeKm: 0 });
        const still = (o: EarthOrientation) => rotateBack(celestialToTerrestrial(o), ground);
        const before = earthOrientation(t - 1);
        const after = earthOrientation(t + 1);
        // Not over a step of UTC, where UT1 = UTC jumps.
        fc.pre(Math.abs(after.eraRad - before.eraRad - 2 * 7.292115e-5) < 1e-8);
        const v = scale(subtract(still(after), still(before)), 0.5);
        const o = earthOrientation(t);
        expect(norm(velocityRelativeToAir(still(o), v, o))).toBeLessThan(1e-6);
      }),
      { numRuns: 300 },
    );
  });

  it('takes 0.4651 km/s off an eastward motion on the equator', () => {
    // 6378.137 km × 7.292115e-5 rad/s (WGS 84, NIMA TR8350.2).
    const o: EarthOrientation = { xRad: 0, yRad: 0, sRad: 0, eraRad: 0 };
    const [x, y, z] = velocityRelativeToAir([6378.137, 0, 0], [0, 10, 0], o);
    expect([x, z]).toEqual([0, 0]);
    expect(10 - y).toBeCloseTo(6378.137 * 7.292115e-5, 7);
  });
});

describe('localAngles', () => {
  it('give back the flight-path angle and azimuth that a velocity was made from', () => {
    const slope = fc.double({ min: -1.57, max: 1.57, noNaN: true });
    const heading = fc.double({ min: 0, max: 2 * Math.PI, maxExcluded: true, noNaN: true });
    fc.assert(
      fc.property(latitude, longitude, slope, heading, seconds, (lat, lon, path, azimuth, t) => {
        const o = earthOrientation(t);
        const matrix = celestialToTerrestrial(o);
        const { east, north, up } = local(lat, lon);
        const level = add(scale(north, Math.cos(azimuth)), scale(east, Math.sin(azimuth)));
        const v = add(scale(level, 20 * Math.cos(path)), scale(up, 20 * Math.sin(path)));
        const r = itrfFromGeodetic({ latitudeRad: lat, longitudeRad: lon, altitudeKm: 100 });
        const angles = localAngles(rotateBack(matrix, r), rotateBack(matrix, v), o);
        expect(Math.abs(angles.flightPathAngleRad - path)).toBeLessThan(1e-12);
        expect(angles.azimuthRad).toBeGreaterThanOrEqual(0);
        expect(angles.azimuthRad).toBeLessThan(2 * Math.PI);
        // An azimuth loses digits towards the vertical and towards the poles.
        const weight = Math.cos(path) * Math.cos(lat);
        const turn = Math.abs(Math.sin((angles.azimuthRad - azimuth) / 2));
        expect(turn * weight).toBeLessThan(1e-12);
      }),
      { numRuns: 1000 },
    );
  });

  it('measure from the geodetic horizontal, 0.19° off the geocentric one at 45°', () => {
    // Geodetic minus geocentric latitude at 45°: 11.55′ on the ground (Explanatory Supplement 1992,
    // section 4.22), from memory; 11.3′ at 100 km altitude.
    const o: EarthOrientation = { xRad: 0, yRad: 0, sRad: 0, eraRad: 0 };
    const r = itrfFromGeodetic({ latitudeRad: Math.PI / 4, longitudeRad: 0, altitudeKm: 0 });
    const inward = localAngles(r, scale(r, -1), o);
    expect(90 * 60 - Math.abs(inward.flightPathAngleRad) * (10800 / Math.PI)).toBeCloseTo(11.55, 1);
  });

  it('call a motion going down negative, and due west 270°', () => {
    const o: EarthOrientation = { xRad: 0, yRad: 0, sRad: 0, eraRad: 0 };
    const { flightPathAngleRad, azimuthRad } = localAngles([7000, 0, 0], [-1, -1, 0], o);
    expect(flightPathAngleRad).toBeCloseTo(-Math.PI / 4, 12);
    expect(azimuthRad).toBeCloseTo((3 * Math.PI) / 2, 12);
    expect(localAngles([7000, 0, 0], [0, 0, 0], o)).toEqual({
      flightPathAngleRad: 0,
      azimuthRad: 0,
    });
  });
});

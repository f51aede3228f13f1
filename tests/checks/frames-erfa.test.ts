import { describe, expect, it } from 'vitest';
import { celestialToTerrestrial, earthOrientation } from '../../core/frames/earth-orientation';
import { geodeticFromItrf, itrfFromGeodetic } from '../../core/frames/geodetic';
import { norm, rotate, subtract, type Vec3, vec3 } from '../../core/math/vector';
import { tdbSecondsFromEpoch } from '../../core/time/convert';
import reference from './data/frames-erfa.json';

/** Earth orientation and geodetic coordinates against ERFA 2.0.0; script in the data file. */

const TURN = 2 * Math.PI;
const EARTH_RADIUS_KM = 6378.137;
/** Two milliarcseconds: 1 mas of the abridged nutation by its authors, twice that outside 1995–2050. */
const POLE_RAD = 2 * (Math.PI / 648e6);

const turned = (angle: number): number => angle - TURN * Math.round(angle / TURN);

const rows = reference.orientation.map((row) => {
  const { mjdUtc: mjd, secondOfDay } = row;
  const o = earthOrientation(tdbSecondsFromEpoch({ scale: 'UTC', mjd, secondOfDay }));
  return { ...row, o, ours: celestialToTerrestrial(o) };
});

function largest(errors: readonly number[]): number {
  expect(errors.length).toBeGreaterThan(200);
  return errors.reduce((worst, error) => Math.max(worst, Math.abs(error)), 0);
}

describe('against ERFA, 1960–2060', () => {
  it('Earth rotation angle is that of eraEra00', () => {
    const worst = largest(rows.map(({ o, era }) => turned(o.eraRad - era)));
    // 1e-9 rad is 6 mm on the equator; an angle of 1.4e5 rad is held to 3e-11.
    expect(worst, `largest error ${worst} rad`).toBeLessThan(1e-9);
  });

  it('the pole is that of eraXys06a within the accuracy of the abridged nutation', () => {
    const worst = largest(rows.flatMap(({ o, x, y }) => [o.xRad - x, o.yRad - y]));
    expect(worst, `largest error ${worst} rad`).toBeLessThan(POLE_RAD);
  });

  it('the locator s is that of eraXys06a within 0.1 mas', () => {
    const worst = largest(rows.map(({ o, s }) => o.sRad - s));
    // s + XY/2 is exact to some µas; XY/2 moves by 1 mas × X (0.006 at most) = 6 µas.
    expect(worst, `largest error ${worst} rad`).toBeLessThan(1e-4 * (Math.PI / 648e3));
  });

  it('ground points are where eraC2t06a puts them within 0.1 m', () => {
    const errors = rows.flatMap(({ matrix, ours }) =>
      [0, 1, 2].map((axis) => {
        // A ground point on each celestial axis, carried to the ground by both matrices.
        const column = (m: readonly number[]): Vec3 => [m[axis], m[axis + 3], m[axis + 6]];
        return EARTH_RADIUS_KM * norm(subtract(column(ours), column(matrix)));
      }),
    );
    const worst = largest(errors);
    expect(worst, `largest error ${worst * 1000} m`).toBeLessThan(1e-4);
  });

  it('the true equinox stands at minus the apparent sidereal time of eraGst06a', () => {
    const errors = rows.map(({ ours, equinox, gast }) => {
      const [x, y] = rotate(ours, vec3(equinox));
      return turned(Math.atan2(y, x) + gast);
    });
    const worst = largest(errors);
    expect(worst, `largest error ${worst} rad`).toBeLessThan(2 * POLE_RAD);
  });
});

describe('WGS 84 against ERFA', () => {
  it('geodetic coordinates come back from eraGd2gc from −6250 km to 1e8 km', () => {
    let worstAngle = 0;
    let worstAltitude = 0;
    expect(reference.geodetic.length).toBeGreaterThan(400);
    for (const [latitude, longitude, height, x, y, z] of reference.geodetic) {
      const place = geodeticFromItrf([x, y, z]);
      const east = turned(place.longitudeRad - longitude) * Math.cos(latitude);
      const angle = Math.max(Math.abs(place.latitudeRad - latitude), Math.abs(east));
      worstAngle = Math.max(worstAngle, angle);
      worstAltitude = Math.max(worstAltitude, Math.abs(place.altitudeKm - height));
    }
    // The accuracy stated for the function; at 1e8 km one unit in the last place is 1.5e-8 km.
    expect(worstAngle, `largest error ${worstAngle} rad`).toBeLessThan(1e-9);
    expect(worstAltitude, `largest error ${worstAltitude} km`).toBeLessThan(1e-6);
  });

  it('positions are those of eraGd2gc', () => {
    let worst = 0;
    for (const [latitudeRad, longitudeRad, altitudeKm, ...xyz] of reference.geodetic) {
      const ours = itrfFromGeodetic({ latitudeRad, longitudeRad, altitudeKm });
      const scale = Math.max(EARTH_RADIUS_KM, altitudeKm);
      worst = Math.max(worst, norm(subtract(ours, vec3(xyz))) / scale);
    }
    // Some units in the last place of the largest term.
    expect(worst, `largest relative error ${worst}`).toBeLessThan(1e-15);
  });
});

import { describe, expect, it } from 'vitest';
import { moonBodyFixed, selenographic } from '../../core/frames/moon-orientation';
import { rotate, scale, type Vec3 } from '../../core/math/vector';
import moon from './data/frames-erfa.json';
import axes from './data/frames-moon.json';

const DEG = Math.PI / 180;

/** Selenographic longitude and latitude of the Earth's centre, degrees. */
function earthSeenFromMoon([days, x, y, z]: readonly number[]): [number, number] {
  const toEarth: Vec3 = scale([x, y, z], -1);
  const place = selenographic(rotate(moonBodyFixed(days * 86400), toEarth));
  return [place.longitudeRad / DEG, place.latitudeRad / DEG];
}

describe("the Moon's axes", () => {
  it('have the pole and prime meridian of an independent writing of the WGCCRE formulae', () => {
    let worst = 0;
    expect(axes.rows.length).toBeGreaterThan(100);
    for (const [days, rightAscension, declination, w] of axes.rows) {
      const m = moonBodyFixed(days * 86400);
      const [a, d] = [rightAscension * DEG, declination * DEG];
      const pole = [Math.cos(d) * Math.cos(a), Math.cos(d) * Math.sin(a), Math.sin(d)];
      for (let k = 0; k < 3; k++) worst = Math.max(worst, Math.abs(m[6 + k] - pole[k]));
      // The node of the Moon's equator stands at −W from the prime meridian.
      const [x, y] = rotate(m, [-Math.sin(a), Math.cos(a), 0]);
      const angle = Math.atan2(y, x) + w * DEG;
      worst = Math.max(worst, Math.abs(Math.sin(angle)), 1 - Math.cos(angle));
    }
    // W runs to 2e5°, which a double turned to radians holds to 1e-12.
    expect(worst, `largest error ${worst} rad`).toBeLessThan(1e-10);
  });

  it('show the Earth at the libration of 1992 April 12, 0 h TD', () => {
    // l = −1.23°, b = +4.20°: Meeus, Astronomical Algorithms (1998), example 53.a, from memory.
    // His theory (Eckhardt 1981) counts latitude from the equator of the principal axes: its terms
    // −0.0224° sin F in ρ and +0.0224° cos F in σ add up to a constant in latitude. Principal and
    // mean-Earth axes differ there by 78.56″ (Williams, Boggs & Folkner 2008, DE421), from memory.
    const principalToMeanEarth = -78.56 / 3600;
    const [longitude, latitude] = earthSeenFromMoon(moon.moonMeeus);
    // 0.01°: half of the last digit published, and 0.005° for the formulae.
    expect(Math.abs(longitude + 1.23), `${longitude}°`).toBeLessThan(0.01);
    expect(Math.abs(latitude - (4.2 + principalToMeanEarth)), `${latitude}°`).toBeLessThan(0.01);
  });

  it('turn the prime meridian to the mean Earth, with librations of the known size', () => {
    const seen = moon.moon.map(earthSeenFromMoon);
    expect(seen.length).toBeGreaterThan(300);
    const mean = (k: 0 | 1) => seen.reduce((sum, row) => sum + row[k], 0) / seen.length;
    const most = (k: 0 | 1) => Math.max(...seen.map((row) => Math.abs(row[k])));
    // By the definition of mean-Earth axes; 0.2° for 400 samples of oscillations of 5°.
    expect(Math.abs(mean(0)), `mean longitude ${mean(0)}°`).toBeLessThan(0.2);
    expect(Math.abs(mean(1)), `mean latitude ${mean(1)}°`).toBeLessThan(0.2);
    // Libration in longitude reaches 8.2°, in latitude 6.9°, at the geocentre (handbook figures,
    // from memory); 400 samples come within a degree of both.
    expect(most(0)).toBeGreaterThan(7);
    expect(most(0)).toBeLessThan(8.3);
    expect(most(1)).toBeGreaterThan(6);
    expect(most(1)).toBeLessThan(7);
  });
});

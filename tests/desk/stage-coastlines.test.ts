import { describe, expect, it } from 'vitest';
import { readCoastlines, weights } from '../../app/stage/coastlines';
import { halved, unrolled } from '../../app/stage/land-picture';
import { geodeticFromItrf } from '../../core/frames/geodetic';
import { vec3 } from '../../core/math/vector';

const COASTS = readCoastlines();

/** Distance from a point to the nearest chord of a chain, km. */
function offChain(chain: number[], itrf: Float64Array, i: number): number {
  const at = (k: number) => vec3(itrf, 3 * k);
  let nearest = Number.POSITIVE_INFINITY;
  const p = at(i);
  for (let k = 1; k < chain.length; k++) {
    const [a, b] = [at(chain[k - 1]), at(chain[k])];
    const d = [b[0] - a[0], b[1] - a[1], b[2] - a[2]];
    const f = [p[0] - a[0], p[1] - a[1], p[2] - a[2]];
    const length2 = d[0] ** 2 + d[1] ** 2 + d[2] ** 2;
    const along = length2 > 0 ? (f[0] * d[0] + f[1] * d[1] + f[2] * d[2]) / length2 : 0;
    const share = Math.min(1, Math.max(0, along));
    const off = Math.hypot(f[0] - share * d[0], f[1] - share * d[1], f[2] - share * d[2]);
    nearest = Math.min(nearest, off);
  }
  return nearest;
}

describe('the coastlines', () => {
  it('lie on the ellipsoid', () => {
    for (const { itrf } of COASTS) {
      for (let i = 0; i < itrf.length; i += 3) {
        // Millimetres: rounding on a length of 6 400 km.
        expect(Math.abs(geodeticFromItrf(vec3(itrf, i)).altitudeKm)).toBeLessThan(1e-6);
      }
    }
  });

  it('pass within 60 km of capes known to stand out into the sea', () => {
    // Places from memory; the source is generalised to 1:110 million, a few tens of km.
    const capes = [
      { name: 'Agulhas', latitude: -34.83, longitude: 20.0 },
      { name: 'São Vicente', latitude: 37.02, longitude: -9.0 },
      { name: 'Guardafui', latitude: 11.83, longitude: 51.29 },
      { name: 'York', latitude: -10.69, longitude: 142.53 },
    ];
    for (const { name, latitude, longitude } of capes) {
      let nearest = Number.POSITIVE_INFINITY;
      for (const { itrf } of COASTS) {
        for (let i = 0; i < itrf.length; i += 3) {
          const place = geodeticFromItrf(vec3(itrf, i));
          const north = place.latitudeRad - (latitude * Math.PI) / 180;
          const east =
            (place.longitudeRad - (longitude * Math.PI) / 180) * Math.cos(place.latitudeRad);
          nearest = Math.min(nearest, 6371 * Math.hypot(north, east));
        }
      }
      expect(nearest, name).toBeLessThan(60);
    }
  });

  it('do not run along the antimeridian, where the source is cut', () => {
    for (const { itrf } of COASTS) {
      for (let i = 3; i < itrf.length; i += 3) {
        const [a, b] = [vec3(itrf, i - 3), vec3(itrf, i)].map(geodeticFromItrf);
        const bothThere = [a, b].every((p) => Math.abs(Math.abs(p.longitudeRad) - Math.PI) < 1e-5);
        expect(bothThere).toBe(false);
      }
    }
  });

  it('thinned at 50 km keep every point within 50 km of what is left', () => {
    const least = 50;
    let kept = 0;
    let all = 0;
    for (const { itrf, weightKm } of COASTS) {
      const chain = [...weightKm.keys()].filter((i) => weightKm[i] >= least);
      kept += chain.length;
      all += weightKm.length;
      for (let i = 0; i < weightKm.length; i++) {
        expect(offChain(chain, itrf, i)).toBeLessThanOrEqual(least);
      }
    }
    expect(kept).toBeLessThan(all / 3);
  });
});

describe('the weight of a point', () => {
  it('is how far it stands off the line between its neighbours that weigh more', () => {
    const zigzag = Float64Array.from([0, 0, 0, 1, 1, 0, 2, 0, 0, 3, 5, 0, 4, 0, 0]);
    const found = weights(zigzag);
    expect(found[0]).toBe(Number.POSITIVE_INFINITY);
    expect(found[4]).toBe(Number.POSITIVE_INFINITY);
    expect(found[3]).toBeCloseTo(5, 12);
    // Distance of (2, 0) from the line through (0, 0) and (3, 5): 10 / √34.
    expect(found[2]).toBeCloseTo(10 / Math.sqrt(34), 12);
    // Then of (1, 1) from the line through (0, 0) and (2, 0): 1, less than the split above.
    expect(found[1]).toBeCloseTo(1, 12);
  });
});

describe('the picture of the land', () => {
  it('counts longitudes on over the antimeridian', () => {
    const ring = [
      [170, 60],
      [-170, 62],
      [-175, 65],
      [170, 60],
    ];
    expect(unrolled(ring)).toEqual([
      [170, 60],
      [190, 62],
      [185, 65],
      [170, 60],
    ]);
  });

  it('closes a ring around the south pole along it', () => {
    const ring = [
      [-180, -80],
      [-60, -75],
      [60, -70],
      [180, -80],
      [-180, -80],
    ];
    const flat = unrolled(ring);
    expect(flat.slice(-2)).toEqual([
      [180, -90],
      [-180, -90],
    ]);
  });

  it('halves by the mean of four', () => {
    const level = { data: Uint8Array.from([0, 100, 4, 4, 200, 100, 4, 8]), width: 4, height: 2 };
    expect(halved(level)).toEqual({ data: Uint8Array.from([100, 5]), width: 2, height: 1 });
  });
});

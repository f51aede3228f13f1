import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Camera } from '../../app/stage/camera';
import { ellipse, osculatingEllipse, outline } from '../../app/stage/conic';
import { type Curve, CurvePoints, decimate } from '../../app/stage/curve';
import { spheroid } from '../../app/stage/occlusion';
import { type PicturePoint, Projector } from '../../app/stage/projection';
import { cross, dot, norm, scale, subtract, unit, type Vec3, vec3 } from '../../core/math/vector';

const WIDTH = 640;
const HEIGHT = 400;
/** What a reader can see of a chord's error on a line one to two pixels wide, px. */
const VISIBLE_PX = 0.7;

const angle = fc.double({ min: -Math.PI, max: Math.PI, noNaN: true });
const latitude = fc.double({ min: -1.5, max: 1.5, noNaN: true });
const direction = fc
  .tuple(angle, latitude)
  .map(([a, b]): Vec3 => [Math.cos(b) * Math.cos(a), Math.cos(b) * Math.sin(a), Math.sin(b)]);

function camera(target: Vec3, longitudeRad: number, latitudeRad: number, km: number): Camera {
  return { target, longitudeRad, latitudeRad, distanceKm: km };
}

function pointOf(curve: Curve, parameter: number): Vec3 {
  const out = new Float64Array(3);
  curve.at(parameter, out, 0);
  return vec3(out);
}

function distanceToChord(p: PicturePoint, a: PicturePoint, b: PicturePoint): number {
  const [dx, dy] = [b.x - a.x, b.y - a.y];
  const length2 = dx * dx + dy * dy;
  const along = length2 > 0 ? ((p.x - a.x) * dx + (p.y - a.y) * dy) / length2 : 0;
  const share = Math.min(1, Math.max(0, along));
  return Math.hypot(p.x - a.x - share * dx, p.y - a.y - share * dy);
}

/** Largest distance on the picture between the curve, sampled densely, and its chords. */
function worstError(curve: Curve, projector: Projector, points: CurvePoints): number {
  let worst = 0;
  for (let i = 1; i < points.count; i++) {
    const a = projector.project(vec3(points.xyz, 3 * i - 3));
    const b = projector.project(vec3(points.xyz, 3 * i));
    if (a === null || b === null) continue;
    const [from, to] = [points.parameters[i - 1], points.parameters[i]];
    for (let k = 1; k < 16; k++) {
      const p = projector.project(pointOf(curve, from + ((to - from) * k) / 16));
      if (p === null || !projector.shows(p)) continue;
      worst = Math.max(worst, distanceToChord(p, a, b));
    }
  }
  return worst;
}

const ORBIT = ellipse([-4e7, 0, 0], [1.6e8, 0, 0], [0, 1.2e8, 6e7]);

describe('the thinning of a curve', () => {
  it('keeps every visible point of an orbit within 0.7 px of its chords, from 1 km to 30 au', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 2 * Math.PI, noNaN: true }),
        angle,
        latitude,
        fc.double({ min: 0, max: 9.6, noNaN: true }),
        (parameter, longitude, lat, logKm) => {
          const target = pointOf(ORBIT, parameter);
          const projector = new Projector(
            camera(target, longitude, lat, 10 ** logKm),
            WIDTH,
            HEIGHT,
          );
          const points = new CurvePoints();
          decimate(ORBIT, projector, points);
          expect(worstError(ORBIT, projector, points)).toBeLessThan(VISIBLE_PX);
        },
      ),
      { numRuns: 150 },
    );
  });

  it('needs at most 200 points for a whole orbit that fills the picture', () => {
    const projector = new Projector(camera([0, 0, 0], 0.4, 1.2, 1.1e9), WIDTH, HEIGHT);
    const points = new CurvePoints();
    decimate(ORBIT, projector, points);
    expect(points.count).toBeGreaterThan(40);
    expect(points.count).toBeLessThanOrEqual(200);
  });

  it('needs at most 200 points where a kilometre of it fills the picture', () => {
    const projector = new Projector(camera(pointOf(ORBIT, 1), 0.4, 1.2, 2), WIDTH, HEIGHT);
    const points = new CurvePoints();
    decimate(ORBIT, projector, points);
    expect(points.count).toBeLessThanOrEqual(200);
  });

  it('begins and ends where the curve does', () => {
    const projector = new Projector(camera([0, 0, 0], 0, 0.5, 1e9), WIDTH, HEIGHT);
    const points = new CurvePoints();
    decimate(ORBIT, projector, points);
    expect(vec3(points.xyz)).toEqual(pointOf(ORBIT, 0));
    expect(vec3(points.xyz, 3 * points.count - 3)).toEqual(pointOf(ORBIT, 2 * Math.PI));
  });
});

describe('the osculating ellipse', () => {
  const GM = 1.32712440041e11;

  it('holds the state and keeps the sum of distances to both foci (the ellipse’s definition)', () => {
    fc.assert(
      fc.property(
        direction,
        direction,
        fc.double({ min: 0.75, max: 1.3, noNaN: true }),
        (towards, across, factor) => {
          const sideways = cross(towards, across);
          fc.pre(norm(sideways) > 0.05);
          const r = scale(towards, 1.5e8);
          const v = scale(unit(sideways), factor * Math.sqrt(GM / 1.5e8));
          const curve = osculatingEllipse(r, v, GM);
          if (curve === null) throw new Error('a bound state must have an ellipse');
          const axis = 1 / (2 / norm(r) - dot(v, v) / GM);
          const ends = [0, Math.PI].map((e) => pointOf(curve, e));
          const centre = scale(
            [ends[0][0] + ends[1][0], ends[0][1] + ends[1][1], ends[0][2] + ends[1][2]],
            0.5,
          );
          const second = scale(centre, 2);
          for (let i = 0; i < 24; i++) {
            const p = pointOf(curve, (i * Math.PI) / 12);
            // Rounding of lengths of 1e8 km: far below a metre.
            expect(norm(p) + norm(subtract(p, second))).toBeCloseTo(2 * axis, 4);
          }
          expect(norm(r) + norm(subtract(r, second))).toBeCloseTo(2 * axis, 4);
        },
      ),
    );
  });

  it('is null for an unbound state', () => {
    expect(osculatingEllipse([1.5e8, 0, 0], [0, 45, 0], GM)).toBeNull();
  });
});

describe('the outline of a flattened globe', () => {
  it('consists of the points where a ray from the eye touches the surface', () => {
    fc.assert(
      fc.property(
        direction,
        direction,
        fc.double({ min: 1.05, max: 80, noNaN: true }),
        (pole, to, far) => {
          const [radius, flattening] = [6378.137, 1 / 298.257];
          const eye = scale(to, far * radius);
          const curve = outline(spheroid([0, 0, 0], radius, flattening, pole), eye);
          if (curve === null) throw new Error('the eye is outside');
          const squeeze2 = 1 / (1 - flattening) ** 2;
          for (let i = 0; i < 12; i++) {
            const p = pointOf(curve, (i * Math.PI) / 6);
            const height = dot(p, pole);
            const across = subtract(p, scale(pole, height));
            // On the surface, and the surface's normal at right angles to the line of sight.
            expect((dot(across, across) + height * height * squeeze2) / radius ** 2).toBeCloseTo(
              1,
              9,
            );
            const normal = unit(subtract(across, scale(pole, -height * squeeze2)));
            expect(dot(normal, unit(subtract(eye, p)))).toBeCloseTo(0, 9);
          }
        },
      ),
    );
  });
});

import { add, cross, dot, norm, scale, subtract, unit, type Vec3 } from '../worker/core-geometry';
import type { Curve } from './curve';
import { type Globe, stretched } from './occlusion';

/** Circles and ellipses of the scenes. */

/** centre + a cos E + b sin E for a full turn of E; a and b at right angles, km. */
export function ellipse(centre: Vec3, a: Vec3, b: Vec3): Curve {
  return {
    from: 0,
    to: 2 * Math.PI,
    parts: 8,
    at(parameter, out, at) {
      const c = Math.cos(parameter);
      const s = Math.sin(parameter);
      out[at] = centre[0] + a[0] * c + b[0] * s;
      out[at + 1] = centre[1] + a[1] * c + b[1] * s;
      out[at + 2] = centre[2] + a[2] * c + b[2] * s;
    },
  };
}

/** A circle about an axis (unit vector). */
export function circle(centre: Vec3, axis: Vec3, radiusKm: number): Curve {
  const a = anyAcross(axis);
  return ellipse(centre, scale(a, radiusKm), scale(cross(axis, a), radiusKm));
}

function anyAcross(axis: Vec3): Vec3 {
  return unit(cross(axis, Math.abs(axis[0]) < 0.9 ? [1, 0, 0] : [0, 1, 0]));
}

/**
 * The ellipse that a body would follow from its state, by two-body motion.
 *
 * @param r   position from the attracting centre, km
 * @param v   velocity, km/s, same axes
 * @param gm  gravitational parameter of the centre, km^3/s^2
 * @returns   null when the orbit is not closed
 * Source: eccentricity vector and vis-viva, any textbook (Vallado 2013, eqs 2-78 and 2-22).
 */
export function osculatingEllipse(r: Vec3, v: Vec3, gm: number): Curve | null {
  const distance = norm(r);
  const inverseAxis = 2 / distance - dot(v, v) / gm;
  if (!(inverseAxis > 0)) return null;
  const semiMajor = 1 / inverseAxis;
  const h = cross(r, v);
  const e = subtract(scale(cross(v, h), 1 / gm), scale(r, 1 / distance));
  const eccentricity = norm(e);
  const toPeriapsis = eccentricity > 1e-9 ? scale(e, 1 / eccentricity) : unit(r);
  const semiMinor = semiMajor * Math.sqrt(Math.max(0, 1 - eccentricity * eccentricity));
  return ellipse(
    scale(toPeriapsis, -semiMajor * eccentricity),
    scale(toPeriapsis, semiMajor),
    scale(unit(cross(h, toPeriapsis)), semiMinor),
  );
}

/** The outline of a globe as the eye sees it; null from within. */
export function outline(globe: Globe, eye: Vec3): Curve | null {
  const { axis, stretch, radiusKm } = globe;
  const toEye = stretched(subtract(eye, globe.centre), axis, stretch);
  const distance = norm(toEye);
  if (distance <= radiusKm) return null;
  const k = radiusKm / distance;
  const size = radiusKm * Math.sqrt((1 - k) * (1 + k));
  const normal = scale(toEye, 1 / distance);
  const a = anyAcross(normal);
  const back = (v: Vec3) => stretched(v, axis, 1 / (1 + stretch) - 1);
  return ellipse(
    add(globe.centre, back(scale(toEye, k * k))),
    back(scale(a, size)),
    back(scale(cross(normal, a), size)),
  );
}

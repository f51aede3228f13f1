import { cross, dot, norm, scale, subtract, unit, type Vec3 } from '../math/vector';

/** Target plane of an encounter: axes and where the incoming asymptote pierces it. */
export interface TargetPlane {
  /** Unit vectors, ICRF: direction of incoming motion, T in the plane, R = S × T. */
  s: Vec3;
  t: Vec3;
  r: Vec3;
  bDotTKm: number;
  bDotRKm: number;
  /** Components on the axes ξ and ζ of Öpik's theory: ζ against the projected planet's motion. */
  xiKm: number;
  zetaKm: number;
  /** Unit vectors of those axes, ICRF. */
  xi: Vec3;
  zeta: Vec3;
  /** Impact parameter whose periapsis touches the body's radius. */
  impactRadiusKm: number;
}

/**
 * Target plane of a hyperbolic encounter state.
 *
 * @param r              position relative to the body, km, ICRF (3)
 * @param v              velocity relative to the body, km/s, ICRF (3)
 * @param asymptote      unit direction of motion on the incoming asymptote (S), ICRF (3)
 * @param excessSpeed    hyperbolic excess speed, km/s
 * @param pole           north pole the T axis is referred to (ecliptic of J2000), unit, ICRF (3)
 * @param bodyVelocity   heliocentric velocity of the body, km/s, ICRF (3); sets the ζ axis
 * @param gm             gravitational parameter of the body, km^3/s^2
 * @param radiusKm       radius of the body, km
 * @returns              B = (S × h)/v∞ on T, R and on ξ, ζ, all km; impact radius by focusing, km
 * T is S × K made a unit vector; an asymptote along the pole itself takes T along ICRF x.
 * Source: Kizner (1961), Planet. Space Sci. 7, 125 (B-plane); Valsecchi, Milani, Gronchi & Chesley
 * (2003), A&A 408, 1179 (ξ, η, ζ).
 */
export function targetPlane(
  r: Vec3,
  v: Vec3,
  asymptote: Vec3,
  excessSpeed: number,
  pole: Vec3,
  bodyVelocity: Vec3,
  gm: number,
  radiusKm: number,
): TargetPlane {
  const s = asymptote;
  const along = cross(s, pole);
  const t = norm(along) > 1e-12 ? unit(along) : unit(subtract([1, 0, 0], scale(s, s[0])));
  const rAxis = cross(s, t);
  const b = scale(cross(s, cross(r, v)), 1 / excessSpeed);
  const inPlane = subtract(bodyVelocity, scale(s, dot(bodyVelocity, s)));
  const zeta = norm(inPlane) > 1e-9 ? scale(unit(inPlane), -1) : rAxis;
  const xi = cross(s, zeta);
  return {
    s,
    t,
    r: rAxis,
    bDotTKm: dot(b, t),
    bDotRKm: dot(b, rAxis),
    xiKm: dot(b, xi),
    zetaKm: dot(b, zeta),
    xi,
    zeta,
    impactRadiusKm: radiusKm * Math.sqrt(1 + (2 * gm) / (radiusKm * excessSpeed ** 2)),
  };
}

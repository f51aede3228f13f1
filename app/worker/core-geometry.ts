/** Geometry of the core that the scenes are drawn with; nothing is propagated here. */
export {
  BODY_RADIUS_KM,
  EARTH_FLATTENING,
  ENTRY_INTERFACE_ALTITUDE_KM,
  GM_KM3_S2,
} from '../../core/constants';
export { ECLIPTIC_POLE_ICRF, eclipticToIcrf, icrfToEcliptic } from '../../core/frames/ecliptic';
export { itrfFromGeodetic } from '../../core/frames/geodetic';
export { hermiteState } from '../../core/math/hermite';
export {
  add,
  cross,
  dot,
  type Mat3,
  norm,
  rotate,
  rotateBack,
  scale,
  subtract,
  unit,
  type Vec3,
  vec3,
} from '../../core/math/vector';

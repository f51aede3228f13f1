import {
  EARTH_FLATTENING,
  itrfFromGeodetic,
  type Mat3,
  rotateBack,
  type Vec3,
} from '../worker/core-geometry';
import { EARTH_RADIUS_KM } from '../worker/core-values';
import { type Coastline, readCoastlines } from './coastlines';
import { ellipse } from './conic';
import { TOLERANCE_PX } from './curve';
import type { Stroke } from './line-buffer';
import type { Pen } from './pen';

/** What is engraved on the globe: coasts and the graticule. */

const STEP_DEG = 30;
const RAD = Math.PI / 180;
const POLAR_KM = EARTH_RADIUS_KM * (1 - EARTH_FLATTENING);

let coastlines: Coastline[] | null = null;
let kept = new Float64Array(3 * 1024);

/** Coasts with the points that matter at this zoom. */
export function drawCoastlines(pen: Pen, axes: Mat3, stroke: Stroke): void {
  coastlines ??= readCoastlines();
  const { eye, focalPx } = pen.projector;
  const nearestKm = Math.max(1, Math.hypot(eye[0], eye[1], eye[2]) - EARTH_RADIUS_KM);
  const leastKm = (TOLERANCE_PX * nearestKm) / focalPx;
  for (const { itrf, weightKm } of coastlines) {
    if (kept.length < itrf.length) kept = new Float64Array(itrf.length);
    let count = 0;
    for (let i = 0; i < weightKm.length; i++) {
      if (weightKm[i] < leastKm) continue;
      rotateBackInto(axes, itrf, 3 * i, kept, 3 * count);
      count += 1;
    }
    pen.lineOnGlobe(kept, count, stroke);
  }
}

function rotateBackInto(
  m: Mat3,
  from: Float64Array,
  at: number,
  out: Float64Array,
  to: number,
): void {
  const x = from[at];
  const y = from[at + 1];
  const z = from[at + 2];
  out[to] = m[0] * x + m[3] * y + m[6] * z;
  out[to + 1] = m[1] * x + m[4] * y + m[7] * z;
  out[to + 2] = m[2] * x + m[5] * y + m[8] * z;
}

/** Meridians and parallels every 30°. */
export function drawGraticule(pen: Pen, axes: Mat3, stroke: Stroke): void {
  const turned = (v: Vec3) => rotateBack(axes, v);
  const pole = turned([0, 0, POLAR_KM]);
  for (let longitude = 0; longitude < 180; longitude += STEP_DEG) {
    const [c, s] = [Math.cos(longitude * RAD), Math.sin(longitude * RAD)];
    const equator = turned([EARTH_RADIUS_KM * c, EARTH_RADIUS_KM * s, 0]);
    pen.curveOnGlobe(ellipse([0, 0, 0], equator, pole), stroke);
  }
  for (let latitude = -60; latitude <= 60; latitude += STEP_DEG) {
    const [r, , z] = itrfFromGeodetic({
      latitudeRad: latitude * RAD,
      longitudeRad: 0,
      altitudeKm: 0,
    });
    const centre = turned([0, 0, z]);
    pen.curveOnGlobe(ellipse(centre, turned([r, 0, 0]), turned([0, r, 0])), stroke);
  }
}

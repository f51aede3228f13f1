import { SAMPLE } from '../../core/dynamics/sample-layout';
import { celestialToTerrestrial } from '../../core/frames/earth-orientation';
import { geodeticFromItrf } from '../../core/frames/geodetic';
import { type Mat3, rotate, vec3 } from '../../core/math/vector';

export { Trajectory } from '../../core/dynamics/trajectory';

/** A point over the Earth, east longitude in (−180, 180]. */
export interface GroundPoint {
  latitudeDeg: number;
  longitudeDeg: number;
  altitudeKm: number;
}

const DEG = 180 / Math.PI;

/** Rotation from ICRF to the Earth-fixed axes (row-major) at a sample. */
export function earthFixedAxes(sample: Float64Array): Mat3 {
  const at = SAMPLE.orientation;
  return celestialToTerrestrial({
    xRad: sample[at],
    yRad: sample[at + 1],
    sRad: sample[at + 2],
    eraRad: sample[at + 3],
  });
}

/** The point of the Earth beneath a body of the sample (offset as in SAMPLE, geocentric rows). */
export function groundPoint(sample: Float64Array, offset: number): GroundPoint {
  const place = geodeticFromItrf(rotate(earthFixedAxes(sample), vec3(sample, offset)));
  return {
    latitudeDeg: place.latitudeRad * DEG,
    longitudeDeg: place.longitudeRad * DEG,
    altitudeKm: place.altitudeKm,
  };
}

import type { SceneName } from '../plate/scene-source';
import type { Station } from '../store/store';
import { add, icrfToEcliptic, norm, type Vec3, vec3 } from '../worker/core-geometry';
import { AU_KM, EARTH_RADIUS_KM, SAMPLE } from '../worker/core-values';
import { type Camera, distanceToFrame } from './camera';
import type { Encounter } from './encounter';

/** The named places to look from, and how much of the scene each takes in by itself. */

export const STATIONS: readonly { station: Station; word: string; name: string }[] = [
  { station: 'north-pole', word: 'Pole', name: 'from the north ecliptic pole' },
  { station: 'along-approach', word: 'Approach', name: 'along the approach' },
  { station: 'edge-on', word: 'Edge-on', name: 'edge-on' },
  { station: 'riding', word: 'Riding', name: 'riding the object' },
];

const CENTRE: Vec3 = [0, 0, 0];
/** The Earth scene takes in the pass this many times over, and no less than the globe. */
const PASSES_IN_VIEW = 2.75;
const GLOBES_IN_VIEW = 2.4;
/** Room left around what is framed. */
const ROOM = 1.18;
const LEAST_SUN_FRAME_KM = 1.08 * AU_KM;
const MOST_SUN_FRAME_KM = 5.6 * AU_KM;
/** Riding: this far behind the object, as a share of its distance from the centre. */
const RIDING_SHARE = 0.7;
/** Riding: lifted so that the centre stands above the object and not behind it. */
const RIDING_LIFT_RAD = 0.2;
const RIDING_TURN_RAD = 0.1;

/**
 * Radius about the centre that a scene takes in by itself, km.
 *
 * @param keepInView  true: as much as the object needs at this moment; false: the pass alone
 */
export function frameRadiusKm(
  scene: SceneName,
  encounter: Encounter,
  sample: Float64Array,
  keepInView: boolean,
): number {
  if (scene === 'sun') {
    const wanted = ROOM * Math.max(encounter.farthestFromSunKm, AU_KM / ROOM);
    return Math.min(MOST_SUN_FRAME_KM, Math.max(LEAST_SUN_FRAME_KM, wanted));
  }
  const pass = Math.max(PASSES_IN_VIEW * encounter.frameKm, GLOBES_IN_VIEW * EARTH_RADIUS_KM);
  return keepInView ? Math.max(pass, ROOM * norm(vec3(sample, SAMPLE.object))) : pass;
}

/** The object's place in a scene, km from the scene's centre, ICRF axes. */
function objectPlace(scene: SceneName, sample: Float64Array): Vec3 {
  const geocentric = vec3(sample, SAMPLE.object);
  return scene === 'earth' ? geocentric : add(geocentric, vec3(sample, SAMPLE.earth));
}

/** The camera of a station at a moment, before a hand has turned it. */
export function stationCamera(
  scene: SceneName,
  station: Station,
  encounter: Encounter,
  sample: Float64Array,
  keepInView = true,
): Camera {
  if (station === 'riding') return ridingCamera(objectPlace(scene, sample));
  const distanceKm = distanceToFrame(frameRadiusKm(scene, encounter, sample, keepInView));
  return { target: CENTRE, distanceKm, ...direction(scene, station, encounter) };
}

function direction(
  scene: SceneName,
  station: Exclude<Station, 'riding'>,
  encounter: Encounter,
): Pick<Camera, 'longitudeRad' | 'latitudeRad'> {
  const inward = anglesOf(encounter.direction);
  switch (station) {
    case 'north-pole':
      // The vernal equinox to the right, as on a chart.
      return { longitudeRad: -Math.PI / 2, latitudeRad: Math.PI / 2 };
    case 'along-approach':
      return { longitudeRad: inward.longitudeRad + Math.PI, latitudeRad: -inward.latitudeRad };
    case 'edge-on': {
      // The Earth of that day, or the object's motion, points to the right.
      const across = scene === 'sun' ? anglesOf(encounter.earthKm) : inward;
      return { longitudeRad: across.longitudeRad - Math.PI / 2, latitudeRad: 0 };
    }
  }
}

function ridingCamera(object: Vec3): Camera {
  const outward = anglesOf(object);
  const latitude = outward.latitudeRad + RIDING_LIFT_RAD;
  return {
    target: object,
    longitudeRad: outward.longitudeRad + RIDING_TURN_RAD,
    latitudeRad: Math.min(Math.PI / 2, latitude),
    distanceKm: RIDING_SHARE * norm(object),
  };
}

/** Ecliptic longitude and latitude of a direction, ICRF axes. */
function anglesOf(v: Vec3): Pick<Camera, 'longitudeRad' | 'latitudeRad'> {
  const [x, y, z] = icrfToEcliptic(v);
  return { longitudeRad: Math.atan2(y, x), latitudeRad: Math.atan2(z, Math.hypot(x, y)) };
}

/** Values and conversions of the core that the page draws with; nothing is propagated here. */
export {
  AU_KM,
  EARTH_RADIUS_KM,
  GEOSYNCHRONOUS_RADIUS_KM,
  MOON_MEAN_DISTANCE_KM,
  SECONDS_PER_DAY,
  SPHERE_OF_INFLUENCE_KM,
} from '../../core/constants';
export { SAMPLE } from '../../core/dynamics/sample-layout';
export { formatIso } from '../../core/time/format';
export { CLONE_OUTCOME, CLONE_POINT } from '../../core/uncertainty/clones';

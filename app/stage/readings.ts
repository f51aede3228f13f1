import type { SceneName } from '../plate/scene-source';
import { add, norm, vec3 } from '../worker/core-geometry';
import { SAMPLE } from '../worker/core-values';
import { groundPoint } from '../worker/trajectory';
import { astronomicalUnits, distance, kilometres, pictured, place, speed } from './figures';

/** What is written beside a scene about the moment of the clock, from the streamed states. */

export interface Reading {
  readonly label: string;
  readonly text: string;
}

/** Below this the altitude says more than the distance, km. */
const ALTITUDE_BELOW_KM = 100_000;

export function readingsOf(scene: SceneName, sample: Float64Array): Reading[] {
  return scene === 'sun' ? sunReadings(sample) : earthReadings(sample);
}

function sunReadings(sample: Float64Array): Reading[] {
  const earth = vec3(sample, SAMPLE.earth);
  const object = vec3(sample, SAMPLE.object);
  const velocity = add(vec3(sample, SAMPLE.earth + 3), vec3(sample, SAMPLE.object + 3));
  return [
    { label: 'from the Sun', text: astronomicalUnits(norm(add(earth, object))) },
    { label: 'from the Earth', text: distance(norm(object)) },
    { label: 'speed', text: speed(norm(velocity)) },
  ];
}

function earthReadings(sample: Float64Array): Reading[] {
  const fromCentre = norm(vec3(sample, SAMPLE.object));
  const under = groundPoint(sample, SAMPLE.object);
  const readings = [
    { label: 'from the centre', text: distance(fromCentre) },
    { label: '', text: pictured(fromCentre) },
    { label: 'speed', text: speed(norm(vec3(sample, SAMPLE.object + 3))) },
    { label: 'overhead at', text: place(under.latitudeDeg, under.longitudeDeg) },
  ];
  if (under.altitudeKm < ALTITUDE_BELOW_KM) {
    readings.splice(2, 0, { label: 'altitude', text: kilometres(under.altitudeKm) });
  }
  return readings;
}

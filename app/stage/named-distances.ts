import { type Vec3, vec3 } from '../worker/core-geometry';
import {
  GEOSYNCHRONOUS_RADIUS_KM,
  MOON_MEAN_DISTANCE_KM,
  SPHERE_OF_INFLUENCE_KM,
} from '../worker/core-values';
import { outline } from './conic';
import type { Curve } from './curve';
import { kilometres } from './figures';
import type { Stroke } from './line-buffer';
import { label } from './marks';
import { sphere } from './occlusion';
import type { PicturePoint } from './projection';
import type { Moment, Sheet } from './sheet';

/** Spheres of named distances about the Earth, drawn as the outlines that the eye sees. */

const CENTRE: Vec3 = [0, 0, 0];
/** A smaller outline says nothing, px. */
const LEAST_PX = 14;

interface NamedDistance {
  readonly id: string;
  readonly words: string;
  readonly radiusKm: number;
  readonly shown: boolean;
  readonly stroke: Stroke;
}

export function drawNamedDistances(sheet: Sheet, moment: Moment): void {
  const { inks, projector, pen } = sheet;
  const { sphereOfInfluence, moonDistance, geosynchronous } = moment.namedDistances;
  const all: NamedDistance[] = [
    {
      id: 'sphere',
      words: 'sphere of influence',
      radiusKm: SPHERE_OF_INFLUENCE_KM,
      shown: sphereOfInfluence,
      stroke: inks.sphereOfInfluence,
    },
    {
      id: 'moon-distance',
      words: 'Moon’s mean distance',
      radiusKm: MOON_MEAN_DISTANCE_KM,
      shown: moonDistance,
      stroke: inks.moonDistance,
    },
    {
      id: 'geosynchronous',
      words: 'geosynchronous',
      radiusKm: GEOSYNCHRONOUS_RADIUS_KM,
      shown: geosynchronous,
      stroke: inks.geosynchronous,
    },
  ];
  for (const { id, words, radiusKm, shown, stroke } of all) {
    if (!shown || projector.radiusPx(CENTRE, radiusKm) < LEAST_PX) continue;
    const edge = outline(sphere(CENTRE, radiusKm), projector.eye);
    if (edge === null) continue;
    pen.curve(edge, stroke);
    nameRing(sheet, edge, { id, text: `${words}, ${kilometres(radiusKm)}` });
  }
}

/** Bearings on the picture at which a ring may carry its name, degrees from the right. */
const BEARINGS = [38, 142, -38, -142, 90, -90, 15, 165, 60, 120];
const NAME_INSET_PX = 14;

export function nameRing(sheet: Sheet, edge: Curve, entry: { id: string; text: string }): void {
  const { projector, inks } = sheet;
  const middle = projector.project(CENTRE);
  if (middle === null) return;
  const here = new Float64Array(3);
  const count = 72;
  const around = Array.from({ length: count }, (_, i) => {
    edge.at((i * 2 * Math.PI) / count, here, 0);
    return projector.project(vec3(here));
  }).filter((point) => point !== null);
  for (const [i, bearing] of BEARINGS.entries()) {
    const wanted = (bearing * Math.PI) / 180;
    const point = nearestBearing(around, middle, wanted);
    if (point === null || !projector.shows(point, -NAME_INSET_PX)) continue;
    label(sheet, point, {
      id: `${entry.id} ${bearing}`,
      group: entry.id,
      text: entry.text,
      gap: 3,
      prefer: [Math.cos(wanted), -Math.sin(wanted)],
      style: 'note',
      colour: inks.rgb.inkSoft,
      priority: 35 - i / BEARINGS.length,
    });
  }
}

function nearestBearing(
  around: readonly PicturePoint[],
  middle: PicturePoint,
  wantedRad: number,
): PicturePoint | null {
  let best: PicturePoint | null = null;
  let least = Number.POSITIVE_INFINITY;
  for (const point of around) {
    const turn = Math.atan2(middle.y - point.y, point.x - middle.x) - wantedRad;
    const off = Math.abs(turn - 2 * Math.PI * Math.round(turn / (2 * Math.PI)));
    if (off >= least) continue;
    least = off;
    best = point;
  }
  return best;
}

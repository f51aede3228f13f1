import {
  add,
  BODY_RADIUS_KM,
  ECLIPTIC_POLE_ICRF,
  eclipticToIcrf,
  GM_KM3_S2,
  norm,
  type Vec3,
  vec3,
} from '../worker/core-geometry';
import { AU_KM, SAMPLE } from '../worker/core-values';
import { circle, osculatingEllipse } from './conic';
import type { Stroke } from './line-buffer';
import { disc, farArrow, label, sunMark } from './marks';
import { objectName } from './object-name';
import { drawObject, drawPath, dropLine } from './object-path';
import { type Globe, sphere } from './occlusion';
import { roundDown } from './scale-bar';
import type { Moment, Sheet } from './sheet';
import { drawEllipsoid } from './tube';

/** The Sun-centred scene. */

const CENTRE: Vec3 = [0, 0, 0];
/** Only the orbit's shape is drawn with it; the two sets differ by 1e-12. */
const GM_SUN = GM_KM3_S2.DE431.Sun;

interface Planet {
  readonly name: string;
  readonly offset: number;
  readonly radiusKm: number;
  readonly leastPx: number;
}

const PLANETS: readonly Planet[] = [
  { name: 'Mercury', offset: SAMPLE.mercury, radiusKm: BODY_RADIUS_KM.Mercury, leastPx: 2 },
  { name: 'Venus', offset: SAMPLE.venus, radiusKm: BODY_RADIUS_KM.Venus, leastPx: 2.6 },
  { name: 'Earth', offset: SAMPLE.earth, radiusKm: BODY_RADIUS_KM.Earth, leastPx: 3.2 },
  { name: 'Mars', offset: SAMPLE.mars, radiusKm: BODY_RADIUS_KM.Mars, leastPx: 2.3 },
  { name: 'Jupiter', offset: SAMPLE.jupiter, radiusKm: BODY_RADIUS_KM.Jupiter, leastPx: 4 },
];

const LEAST_SUN_PX = 5;

export function sunSceneGlobes(): Globe[] {
  return [sphere(CENTRE, BODY_RADIUS_KM.Sun)];
}

export function drawSunScene(sheet: Sheet, moment: Moment): void {
  const { sample } = moment;
  const { inks } = sheet;
  drawGrid(sheet);
  for (const planet of PLANETS) drawOrbit(sheet, planet, sample);
  const object = add(vec3(sample, SAMPLE.earth), vec3(sample, SAMPLE.object));
  dropLine(sheet, object, inks.objectHair);
  drawPath(sheet, moment, 'sun');
  drawSun(sheet);
  for (const planet of PLANETS) drawPlanet(sheet, planet, sample);
  if (moment.spread !== null) drawEllipsoid(sheet, moment.spread, object);
  drawObject(sheet, object, objectName(moment));
  farArrow(sheet, [1, 0, 0], 'vernal equinox', inks.arrow);
  farArrow(sheet, ECLIPTIC_POLE_ICRF, 'ecliptic north', inks.arrow);
}

/** Rings of the grid that fit into half the picture's shorter side. */
const RINGS_IN_VIEW = 2;
const BEYOND_TARGET = 1.6;
/** Seen flatter than this, the rings carry no figures. */
const LEAST_TILT_RAD = 0.15;
const DEGREE_STEP = 10;
const STRONG_DEGREES = 30;
const LABEL_BEARING_RAD = (58 * Math.PI) / 180;

/** Circles in the plane of the ecliptic, the outermost graduated in longitude from the equinox. */
function drawGrid(sheet: Sheet): void {
  const { pen, inks, projector } = sheet;
  const framedKm = Math.min(projector.widthPx, projector.heightPx) / 2 / projector.pxPerKm;
  // Riding, the grid is that of the Sun's surroundings and not of the object's.
  const reachAu = Math.max(framedKm, BEYOND_TARGET * norm(projector.camera.target)) / AU_KM;
  const step = roundDown(reachAu / RINGS_IN_VIEW);
  const count = Math.max(1, Math.floor(reachAu / step));
  for (let k = 1; k <= count; k++) {
    const radiusKm = k * step * AU_KM;
    pen.curve(
      circle(CENTRE, ECLIPTIC_POLE_ICRF, radiusKm),
      k === count ? inks.gridStrong : inks.grid,
    );
    const at = projector.project(onEcliptic(LABEL_BEARING_RAD, radiusKm));
    if (at === null || Math.abs(projector.camera.latitudeRad) < LEAST_TILT_RAD) continue;
    label(sheet, at, {
      id: `ring ${k}`,
      text: `${Number((k * step).toPrecision(6))}\u2009au`,
      gap: -8,
      style: 'figure',
      colour: inks.rgb.inkSoft,
      priority: 25,
    });
  }
  const outer = count * step * AU_KM;
  for (let degrees = 0; degrees < 360; degrees += DEGREE_STEP) {
    const strong = degrees % STRONG_DEGREES === 0;
    const angle = (degrees * Math.PI) / 180;
    const reach = strong ? 1.03 : 1.018;
    pen.segmentLine(onEcliptic(angle, outer), onEcliptic(angle, outer * reach), inks.gridStrong);
  }
}

function onEcliptic(longitudeRad: number, radiusKm: number): Vec3 {
  return eclipticToIcrf([radiusKm * Math.cos(longitudeRad), radiusKm * Math.sin(longitudeRad), 0]);
}

function drawOrbit(sheet: Sheet, planet: Planet, sample: Float64Array): void {
  const { pen, inks } = sheet;
  const orbit = osculatingEllipse(
    vec3(sample, planet.offset),
    vec3(sample, planet.offset + 3),
    GM_SUN,
  );
  if (orbit === null) return;
  const stroke: Stroke = planet.name === 'Earth' ? inks.earthOrbit : inks.planetOrbit;
  pen.curve(orbit, stroke);
}

function drawPlanet(sheet: Sheet, planet: Planet, sample: Float64Array): void {
  const { inks, projector } = sheet;
  const place = vec3(sample, planet.offset);
  const point = projector.project(place);
  if (point === null) return;
  const colour = planet.name === 'Earth' ? inks.rgb.earth : inks.rgb.planet;
  const radiusPx = Math.max(planet.leastPx, projector.radiusPx(place, planet.radiusKm));
  if (Number.isFinite(radiusPx)) disc(sheet, point, radiusPx, colour);
  label(sheet, point, {
    id: planet.name,
    text: planet.name,
    gap: radiusPx + 5,
    style: 'name',
    colour: planet.name === 'Earth' ? inks.rgb.earth : inks.rgb.inkSoft,
    priority: planet.name === 'Earth' ? 80 : 65,
  });
}

function drawSun(sheet: Sheet): void {
  const { projector, inks } = sheet;
  const point = projector.project(CENTRE);
  if (point === null) return;
  const radiusPx = Math.max(LEAST_SUN_PX, projector.radiusPx(CENTRE, BODY_RADIUS_KM.Sun));
  if (!Number.isFinite(radiusPx)) return;
  sunMark(sheet, point, radiusPx);
  label(sheet, point, {
    id: 'sun',
    text: 'Sun',
    gap: radiusPx + 9,
    style: 'name',
    colour: inks.rgb.sun,
    priority: 75,
  });
}

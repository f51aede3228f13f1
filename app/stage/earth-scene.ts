import {
  BODY_RADIUS_KM,
  EARTH_FLATTENING,
  ECLIPTIC_POLE_ICRF,
  ENTRY_INTERFACE_ALTITUDE_KM,
  itrfFromGeodetic,
  type Mat3,
  norm,
  rotateBack,
  scale,
  unit,
  type Vec3,
  vec3,
} from '../worker/core-geometry';
import { EARTH_RADIUS_KM, SAMPLE, SECONDS_PER_DAY } from '../worker/core-values';
import { earthFixedAxes, groundPoint } from '../worker/trajectory';
import { outline } from './conic';
import { drawCoastlines, drawGraticule } from './earth-face';
import { kilometres } from './figures';
import type { GlobeInk } from './globe-ink';
import { disc, farArrow, label, ring } from './marks';
import { drawNamedDistances, nameRing } from './named-distances';
import { objectName } from './object-name';
import { drawObject, drawPath, visiblePoint } from './object-path';
import { type Globe, sphere, spheroid } from './occlusion';
import type { Moment, Sheet } from './sheet';
import { MOON_GEOCENTRIC, trajectoryCurve } from './trajectory-curve';
import { drawEllipsoid } from './tube';

/** The Earth-centred scene. */

const CENTRE: Vec3 = [0, 0, 0];
const MOON_KM = BODY_RADIUS_KM.Moon;
const UNTURNED: Mat3 = [1, 0, 0, 0, 1, 0, 0, 0, 1];
/** Smaller than this a body is a disc of the least size, px. */
const LEAST_GLOBE_PX = 3;
const LEAST_DISC_PX = 2.6;
const COASTS_FROM_PX = 26;
/** The axis and the point of the ground are marked from here on, px. */
const MARKED_FROM_PX = 9;
/** Coasts are drawn at their full weight from here on, px. */
const FULL_COASTS_PX = 110;
const GRATICULE_FROM_PX = 40;
/** The entry interface is drawn once it stands this clear of the ground, px. */
const INTERFACE_FROM_PX = 2.5;
/** Half of the Moon's track that is drawn, s: it closes to a turn about the stars. */
const HALF_MONTH_S = 13.66 * SECONDS_PER_DAY;
/** The axis stands out of the globe by this share of its radius. */
const AXIS_REACH = 1.22;

interface EarthGlobes {
  readonly earth: GlobeInk;
  readonly moon: GlobeInk;
}

/** The bodies of the scene that hide what lies behind them, the Earth first. */
export function earthSceneGlobes(moment: Moment): Globe[] {
  const axes = earthFixedAxes(moment.sample);
  const pole: Vec3 = [axes[6], axes[7], axes[8]];
  return [
    spheroid(CENTRE, EARTH_RADIUS_KM, EARTH_FLATTENING, pole),
    sphere(vec3(moment.sample, SAMPLE.moon), MOON_KM),
  ];
}

export function drawEarthScene(sheet: Sheet, moment: Moment, globes: EarthGlobes): void {
  const { sample } = moment;
  const { inks, projector } = sheet;
  const axes = earthFixedAxes(sample);
  const [earth] = earthSceneGlobes(moment);
  const toSun = unit(scale(vec3(sample, SAMPLE.earth), -1));
  const earthPx = projector.radiusPx(CENTRE, EARTH_RADIUS_KM);

  drawNamedDistances(sheet, moment);
  drawMoon(sheet, moment, toSun, globes.moon);
  drawEarth(sheet, { axes, toSun, earthPx, earth }, globes.earth);
  drawPath(sheet, moment, 'earth');
  drawGroundPoint(sheet, moment, axes, earthPx);
  const object = vec3(sample, SAMPLE.object);
  if (moment.spread !== null) drawEllipsoid(sheet, moment.spread, object);
  drawObject(sheet, object, objectName(moment));
  farArrow(sheet, toSun, 'the Sun', { ...inks.arrow, colour: inks.rgb.sun });
  farArrow(sheet, [1, 0, 0], 'vernal equinox', inks.arrow);
  farArrow(sheet, ECLIPTIC_POLE_ICRF, 'ecliptic north', inks.arrow);
}

function drawEarth(
  sheet: Sheet,
  view: { axes: Mat3; toSun: Vec3; earthPx: number; earth: Globe },
  ink: GlobeInk,
): void {
  const { pen, inks, projector } = sheet;
  const { axes, earthPx } = view;
  ink.mesh.visible = earthPx >= LEAST_GLOBE_PX && Number.isFinite(earthPx);
  const centre = projector.project(CENTRE);
  if (!ink.mesh.visible) {
    if (centre === null || earthPx >= LEAST_GLOBE_PX) return;
    disc(sheet, centre, LEAST_DISC_PX, inks.rgb.earth);
    nameEarth(sheet, LEAST_DISC_PX);
    return;
  }
  ink.place(
    projector,
    CENTRE,
    EARTH_RADIUS_KM,
    EARTH_FLATTENING,
    axes,
    view.toSun,
    sheet.pixelRatio,
  );
  const limb = outline(view.earth, projector.eye);
  if (earthPx >= GRATICULE_FROM_PX) drawGraticule(pen, axes, inks.graticule);
  if (earthPx >= COASTS_FROM_PX) {
    const weight = Math.min(1, earthPx / FULL_COASTS_PX + 0.4);
    drawCoastlines(pen, axes, { ...inks.coast, widthPx: weight * inks.coast.widthPx });
  }
  if (limb !== null) pen.curve(limb, inks.limb, []);
  drawInterface(sheet, view.earth, earthPx);
  if (earthPx >= MARKED_FROM_PX) drawAxis(sheet, axes);
  nameEarth(sheet, earthPx);
}

function nameEarth(sheet: Sheet, earthPx: number): void {
  const centre = sheet.projector.project(CENTRE);
  if (centre === null || earthPx > 0.3 * sheet.projector.widthPx) return;
  if (earthPx < 200) {
    sheet.taken.push({
      left: centre.x - earthPx * 0.8,
      right: centre.x + earthPx * 0.8,
      top: centre.y - earthPx * 0.8,
      bottom: centre.y + earthPx * 0.8,
    });
  }
  label(sheet, centre, {
    id: 'earth',
    text: 'Earth',
    gap: earthPx + 5,
    style: 'name',
    colour: sheet.inks.rgb.earth,
    priority: 50,
  });
}

function drawInterface(sheet: Sheet, earth: Globe, earthPx: number): void {
  const gapPx = (earthPx * ENTRY_INTERFACE_ALTITUDE_KM) / EARTH_RADIUS_KM;
  if (gapPx < INTERFACE_FROM_PX) return;
  const radiusKm = EARTH_RADIUS_KM + ENTRY_INTERFACE_ALTITUDE_KM;
  const edge = outline({ ...earth, radiusKm }, sheet.projector.eye);
  if (edge === null) return;
  sheet.pen.curve(edge, sheet.inks.interface, []);
  nameRing(sheet, edge, {
    id: 'interface',
    text: `entry interface, ${kilometres(ENTRY_INTERFACE_ALTITUDE_KM)}`,
  });
}

function drawAxis(sheet: Sheet, axes: Mat3): void {
  const { pen, inks } = sheet;
  const polar = EARTH_RADIUS_KM * (1 - EARTH_FLATTENING);
  for (const sign of [1, -1]) {
    const foot = rotateBack(axes, [0, 0, sign * polar]);
    const tip = scale(foot, AXIS_REACH);
    pen.segmentLine(foot, tip, { ...inks.limb, widthPx: 1 });
    const point = visiblePoint(sheet, tip);
    if (sign > 0 && point !== null) {
      label(sheet, point, {
        id: 'pole',
        text: 'N',
        gap: 2,
        style: 'name',
        colour: inks.rgb.earth,
        priority: 45,
      });
    }
  }
}

function drawMoon(sheet: Sheet, moment: Moment, toSun: Vec3, ink: GlobeInk): void {
  const { pen, inks, projector } = sheet;
  const { trajectory, sample } = moment;
  const now = sample[SAMPLE.tdbSeconds];
  const track = trajectoryCurve(trajectory, MOON_GEOCENTRIC, {
    fromTdbSeconds: now - HALF_MONTH_S,
    toTdbSeconds: now + HALF_MONTH_S,
  });
  pen.curve(track, inks.moonTrack);
  const place = vec3(sample, SAMPLE.moon);
  const radiusPx = projector.radiusPx(place, MOON_KM);
  const point = projector.project(place);
  ink.mesh.visible = radiusPx >= LEAST_GLOBE_PX && Number.isFinite(radiusPx) && point !== null;
  if (ink.mesh.visible) {
    ink.place(projector, place, MOON_KM, 0, UNTURNED, toSun, sheet.pixelRatio);
    const limb = outline(sphere(place, MOON_KM), projector.eye);
    if (limb !== null)
      pen.curve(limb, { ...inks.limb, colour: inks.rgb.moon }, pen.globes.slice(0, 1));
  }
  const seen = visiblePoint(sheet, scale(place, 1 - (1.01 * MOON_KM) / norm(place)));
  if (point === null || seen === null) return;
  if (!ink.mesh.visible) disc(sheet, point, LEAST_DISC_PX, inks.rgb.moon);
  label(sheet, point, {
    id: 'moon',
    text: 'Moon',
    gap: Math.max(LEAST_DISC_PX, radiusPx) + 5,
    style: 'name',
    colour: inks.rgb.moon,
    priority: 70,
  });
}

/** The point of the ground beneath the object, and the thin line down to it. */
function drawGroundPoint(sheet: Sheet, moment: Moment, axes: Mat3, earthPx: number): void {
  const { pen, inks } = sheet;
  const object = vec3(moment.sample, SAMPLE.object);
  const under = groundPoint(moment.sample, SAMPLE.object);
  const foot = rotateBack(
    axes,
    itrfFromGeodetic({
      latitudeRad: (under.latitudeDeg * Math.PI) / 180,
      longitudeRad: (under.longitudeDeg * Math.PI) / 180,
      altitudeKm: 0,
    }),
  );
  pen.segmentLine(object, foot, inks.objectHair);
  if (earthPx < MARKED_FROM_PX) return;
  // A hair above the ground, so that the ground itself does not hide it.
  const point = visiblePoint(sheet, scale(foot, 1 + 1e-6));
  if (point === null) return;
  ring(sheet, point, 2.6, inks.rgb.object);
}

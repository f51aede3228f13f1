import type { SceneName } from '../plate/scene-source';
import type { Palette } from '../theme/tokens';
import { SAMPLE } from '../worker/core-values';
import type { Camera } from './camera';
import { drawEarthScene, earthSceneGlobes } from './earth-scene';
import { GlobeInk } from './globe-ink';
import { type Inks, inksOf, mixed, type Rgb } from './inks';
import { type Box, placeLabels } from './labels';
import { LineBuffer } from './line-buffer';
import { Occluder } from './occlusion';
import { Pen } from './pen';
import { Projector } from './projection';
import { drawScale } from './scale-mark';
import type { Moment, Sheet } from './sheet';
import { StampBuffer } from './stamp-buffer';
import { drawSunScene, sunSceneGlobes } from './sun-scene';

/** Draws a whole scene at a moment: lines, marks, words and globes as meshes for three. */

interface Picture {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Device pixels per px. */
  readonly pixelRatio: number;
  readonly palette: Palette;
  readonly camera: Camera;
  /** Boxes of the page's own words over the picture, px. */
  readonly taken: readonly Box[];
}

/** How far the land's tint is from the sea's towards the ink. */
const LAND_SHARE = 0.17;

export class Painter {
  readonly lines = new LineBuffer();
  readonly stamps = new StampBuffer();
  readonly globes: readonly GlobeInk[];
  private readonly memory = new Map<string, number>();

  constructor(readonly scene: SceneName) {
    this.globes = scene === 'earth' ? [new GlobeInk(true), new GlobeInk(false)] : [];
  }

  /** Fills the lines, stamps and globes of a frame; `moment` null leaves the plate empty. */
  draw(moment: Moment | null, picture: Picture): void {
    const { widthPx, heightPx, pixelRatio, palette } = picture;
    const inks = inksOf(palette);
    this.lines.begin(widthPx, heightPx, pixelRatio);
    this.stamps.begin(widthPx, heightPx, pixelRatio, inks.rgb.ground);
    for (const globe of this.globes) globe.mesh.visible = false;
    if (moment !== null) this.drawMoment(moment, picture, inks);
    this.lines.end();
    this.stamps.end();
  }

  dispose(): void {
    this.lines.dispose();
    this.stamps.dispose();
    for (const globe of this.globes) globe.dispose();
  }

  private drawMoment(moment: Moment, picture: Picture, inks: Inks): void {
    const { lines, stamps, scene } = this;
    const projector = new Projector(picture.camera, picture.widthPx, picture.heightPx);
    const bodies = scene === 'earth' ? earthSceneGlobes(moment) : sunSceneGlobes();
    const occluders = bodies.map((body) => new Occluder(body, projector.eye));
    const sheet: Sheet = {
      pen: new Pen(lines, projector, occluders),
      stamps,
      projector,
      inks,
      tdbSeconds: moment.sample[SAMPLE.tdbSeconds],
      pixelRatio: picture.pixelRatio,
      labels: [],
      taken: [...picture.taken],
    };
    drawScale(sheet, scene);
    if (scene === 'sun') drawSunScene(sheet, moment);
    else {
      const [earth, moon] = this.globes;
      earth.colour(globeLook(inks.rgb.sheet, inks.rgb.earth));
      moon.colour(globeLook(inks.rgb.sheet, inks.rgb.moon));
      drawEarthScene(sheet, moment, { earth, moon });
    }
    const placed = placeLabels(
      sheet.labels,
      sheet.taken,
      picture,
      ({ style, text }) => stamps.lettering.width(style, text),
      this.memory,
    );
    for (const { box, style, text, colour } of placed) {
      stamps.word((box.left + box.right) / 2, (box.top + box.bottom) / 2, style, text, colour);
    }
  }
}

function globeLook(day: Rgb, ink: Rgb) {
  const share = (colour: Rgb): Rgb => [colour[0] / 255, colour[1] / 255, colour[2] / 255];
  return { day: share(day), land: share(mixed(day, ink, LAND_SHARE)), ink: share(ink) };
}

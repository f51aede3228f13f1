import type { SceneName } from '../plate/scene-source';
import type { Palette } from '../theme/tokens';
import type { Camera } from './camera';
import { drawEarthScene, earthSceneGlobes } from './earth-scene';
import { GlobeInk } from './globe-ink';
import { inksOf, mixed } from './inks';
import { type Box, placeLabels } from './labels';
import { paintLand } from './land-picture';
import { labelWidth, writeLabels } from './lettering';
import { LineBuffer } from './line-buffer';
import { Occluder } from './occlusion';
import { Pen } from './pen';
import { Projector } from './projection';
import { drawScale } from './scale-mark';
import type { Moment, Sheet } from './sheet';
import { drawSunScene, sunSceneGlobes } from './sun-scene';

/** Draws a whole scene at a moment: lines and globes for three, marks and lettering on the overlay. */

export interface Picture {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Device pixels per px, for the lines; the overlay has its own. */
  readonly pixelRatio: number;
  readonly palette: Palette;
  readonly camera: Camera;
  /** Boxes of the page's own words over the picture, px. */
  readonly taken: readonly Box[];
}

const LAND_WIDTH_PX = 1024;
/** How far the land's tint is from the sea's towards the ink. */
const LAND_SHARE = 0.11;

export class Painter {
  readonly lines = new LineBuffer();
  readonly globes: readonly GlobeInk[];
  private readonly memory = new Map<string, number>();

  constructor(readonly scene: SceneName) {
    this.globes =
      scene === 'earth' ? [new GlobeInk(paintLand(LAND_WIDTH_PX)), new GlobeInk(null)] : [];
  }

  /** Fills the lines and globes of a frame and draws the overlay; `moment` null draws an empty plate. */
  draw(moment: Moment | null, picture: Picture, context: CanvasRenderingContext2D): void {
    const { widthPx, heightPx, pixelRatio, palette } = picture;
    const projector = new Projector(picture.camera, widthPx, heightPx);
    this.lines.begin(widthPx, heightPx, pixelRatio);
    context.setTransform(1, 0, 0, 1, 0, 0);
    context.clearRect(0, 0, context.canvas.width, context.canvas.height);
    const overlayRatio = context.canvas.width / widthPx;
    context.setTransform(overlayRatio, 0, 0, overlayRatio, 0, 0);
    for (const globe of this.globes) globe.mesh.visible = false;
    if (moment !== null) {
      const bodies = this.scene === 'earth' ? earthSceneGlobes(moment) : sunSceneGlobes();
      const occluders = bodies.map((body) => new Occluder(body, projector.eye));
      const inks = inksOf(palette);
      const sheet: Sheet = {
        pen: new Pen(this.lines, projector, occluders),
        projector,
        context,
        inks,
        pixelRatio,
        labels: [],
        taken: [...picture.taken],
      };
      drawScale(sheet, this.scene);
      if (this.scene === 'sun') drawSunScene(sheet, moment);
      else {
        const [earth, moon] = this.globes;
        earth.colour(globeLook(inks.rgb.sheet, inks.rgb.earth, inks.rgb.earth));
        moon.colour(globeLook(inks.rgb.sheet, inks.rgb.moon, inks.rgb.moon));
        drawEarthScene(sheet, moment, { earth, moon });
      }
      const placed = placeLabels(
        sheet.labels,
        sheet.taken,
        picture,
        (label) => labelWidth(context, label),
        this.memory,
      );
      writeLabels(context, placed, palette.ground);
    }
    this.lines.end();
  }

  dispose(): void {
    this.lines.dispose();
    for (const globe of this.globes) globe.dispose();
  }
}

type Rgb = readonly [number, number, number];

function globeLook(day: Rgb, land: Rgb, ink: Rgb) {
  const unitOf = ([r, g, b]: Rgb): Rgb => [r / 255, g / 255, b / 255];
  return {
    day: unitOf(day),
    land: unitOf(mixed(day, land, LAND_SHARE)),
    ink: unitOf(ink),
  };
}

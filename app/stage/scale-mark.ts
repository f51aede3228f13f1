import type { SceneName } from '../plate/scene-source';
import { LABEL_FONTS } from './labels';
import { scaleBar } from './scale-bar';
import type { Sheet } from './sheet';

const LEFT_PX = 12;
const BOTTOM_PX = 14;
const MOST_PX = 110;
const END_PX = 4;

/** The scale in the lower left corner: true at the distance of what the camera looks at. */
export function drawScale(sheet: Sheet, scene: SceneName): void {
  const { context, inks, projector } = sheet;
  const bar = scaleBar(1 / projector.pxPerKm, Math.min(MOST_PX, projector.widthPx / 3));
  const y = projector.heightPx - BOTTOM_PX;
  const right = LEFT_PX + bar.lengthPx;
  context.beginPath();
  context.moveTo(LEFT_PX, y - END_PX);
  context.lineTo(LEFT_PX, y);
  context.lineTo(right, y);
  context.lineTo(right, y - END_PX);
  context.strokeStyle = inks.palette.ink;
  context.lineWidth = 1;
  context.stroke();
  context.font = LABEL_FONTS.figure;
  context.letterSpacing = '0px';
  context.textAlign = 'left';
  context.textBaseline = 'alphabetic';
  context.fillStyle = inks.palette.ink;
  const text = scene === 'earth' && bar.radii !== null ? `${bar.text} = ${bar.radii}` : bar.text;
  context.fillText(text, LEFT_PX, y - 7);
  sheet.taken.push({
    left: 0,
    right: LEFT_PX + Math.max(bar.lengthPx, context.measureText(text).width),
    top: y - 20,
    bottom: projector.heightPx,
  });
}

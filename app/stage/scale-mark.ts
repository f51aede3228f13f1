import type { SceneName } from '../plate/scene-source';
import { scaleBar } from './scale-bar';
import type { Sheet } from './sheet';

const LEFT_PX = 12;
const BOTTOM_PX = 14;
const MOST_PX = 110;
const END_PX = 4;
const TEXT_RISE_PX = 11;

/** The scale in the lower left corner: true at the distance of what the camera looks at. */
export function drawScale(sheet: Sheet, scene: SceneName): void {
  const { inks, pen, projector, stamps } = sheet;
  const bar = scaleBar(1 / projector.pxPerKm, Math.min(MOST_PX, projector.widthPx / 3));
  const y = projector.heightPx - BOTTOM_PX;
  const right = LEFT_PX + bar.lengthPx;
  pen.flat(
    [LEFT_PX, right].map((x) => ({ x, y })),
    inks.scale,
  );
  for (const x of [LEFT_PX, right]) {
    pen.flat(
      [y - END_PX, y + 0.5].map((end) => ({ x, y: end })),
      inks.scale,
    );
  }
  const text = scene === 'earth' && bar.radii !== null ? `${bar.text} = ${bar.radii}` : bar.text;
  const width = stamps.lettering.width('figure', text);
  stamps.word(LEFT_PX + width / 2, y - TEXT_RISE_PX, 'figure', text, inks.rgb.ink);
  sheet.taken.push({
    left: 0,
    right: LEFT_PX + Math.max(bar.lengthPx, width),
    top: y - 20,
    bottom: projector.heightPx,
  });
}

import type { Station } from '../store/store';
import type { Palette } from '../theme/tokens';

/** How the plate gets pictures of both scenes without importing three: the stage registers itself. */

export type SceneName = 'sun' | 'earth';

export interface SceneSource {
  /**
   * Draws a scene at a moment, apart from what the screen shows.
   *
   * @param scene       the Sun-centred or the Earth-centred scene
   * @param widthPx     size of the picture in device pixels
   * @param heightPx    size of the picture in device pixels
   * @param palette     the palette the plate is drawn in
   * @param tdbSeconds  the moment, TDB seconds past J2000
   * @param station     the camera's place
   * @returns           a canvas to be read in the same task; null when nothing can be drawn
   */
  render(
    scene: SceneName,
    widthPx: number,
    heightPx: number,
    palette: Palette,
    tdbSeconds: number,
    station: Station,
  ): HTMLCanvasElement | null;
}

let current: SceneSource | null = null;

/** Called by the stage once it can draw, and with null when it no longer can. */
export function setSceneSource(source: SceneSource | null): void {
  current = source;
}

export function getSceneSource(): SceneSource | null {
  return current;
}

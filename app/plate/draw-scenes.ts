import { momentWords } from '../ribbon/words';
import type { NamedDistances, Station } from '../store/store';
import { type Area, frame, measureIn, type Pen, write, writeCaps } from './pen';
import type { SceneName, SceneSource } from './scene-source';

/** What the pictures of the scenes are asked for. */
export interface SceneRequest {
  scenes: SceneSource | null;
  sunStation: Station;
  earthStation: Station;
  namedDistances: NamedDistances;
  clockTdbSeconds: number;
}

const TITLES: Record<SceneName, string> = { sun: 'Sun-centred', earth: 'Earth-centred' };

const STATION_WORDS: Record<Station, string> = {
  'north-pole': 'from the north ecliptic pole',
  'along-approach': 'along the approach',
  'edge-on': 'edge-on',
  riding: 'riding the object',
};

const CIRCLE_WORDS: Record<keyof NamedDistances, string> = {
  sphereOfInfluence: 'influence',
  moonDistance: 'Moon',
  geosynchronous: 'geosynchronous',
};

const CAPTION = { px: 18, italic: true };

/** A scene's picture under its caption: the station, and the moment or the circles that are drawn. */
export function drawScene(pen: Pen, area: Area, scene: SceneName, request: SceneRequest): void {
  const { context, palette } = pen;
  const { scenes, clockTdbSeconds } = request;
  const station = scene === 'sun' ? request.sunStation : request.earthStation;
  const base = area.y - 14;
  const capsEnd = writeCaps(pen, TITLES[scene], area.x, base, 17, palette.inkSoft);
  write(pen, STATION_WORDS[station], capsEnd + 14, base, CAPTION, palette.inkSoft);
  const stationEnd = capsEnd + 14 + measureIn(pen, CAPTION)(STATION_WORDS[station]);
  const right = scene === 'sun' ? `${momentWords(clockTdbSeconds)} UTC` : circlesIn(request);
  if (stationEnd + 24 + measureIn(pen, CAPTION)(right) <= area.x + area.width) {
    write(pen, right, area.x + area.width, base, CAPTION, palette.inkSoft, 'right');
  }
  const picture =
    scenes?.render(scene, area.width, area.height, palette, clockTdbSeconds, station) ?? null;
  if (picture !== null) context.drawImage(picture, area.x, area.y, area.width, area.height);
  else {
    const words = '3-D view not available on this machine (no WebGL).';
    const middle = { x: area.x + area.width / 2, y: area.y + area.height / 2 };
    write(pen, words, middle.x, middle.y, { px: 22 }, palette.inkSoft, 'center');
  }
  frame(pen, area, palette.ink);
}

function circlesIn({ namedDistances }: SceneRequest): string {
  const words = (Object.keys(CIRCLE_WORDS) as (keyof NamedDistances)[])
    .filter((name) => namedDistances[name])
    .map((name) => CIRCLE_WORDS[name]);
  return words.length === 0 ? '' : `circles: ${words.join(', ')}`;
}

import { type SceneName, type SceneSource, setSceneSource } from '../plate/scene-source';

/** Offers the scenes' pictures to the plate for as long as there is a scene that can be drawn. */

interface Pictured {
  picture: (
    ...request: Parameters<SceneSource['render']> extends [SceneName, ...infer Rest] ? Rest : never
  ) => HTMLCanvasElement | null;
}

const drawn = new Map<SceneName, Pictured>();

const source: SceneSource = {
  render: (scene, ...request) => drawn.get(scene)?.picture(...request) ?? null,
};

/** Offers a scene; the answer takes it back. */
export function offerPictures(scene: SceneName, pictured: Pictured): () => void {
  drawn.set(scene, pictured);
  setSceneSource(source);
  return () => {
    if (drawn.get(scene) === pictured) drawn.delete(scene);
    if (drawn.size === 0) setSceneSource(null);
  };
}

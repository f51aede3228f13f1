import { type RefObject, useEffect } from 'react';
import type { SceneEngine } from './engine';

/** Turning and zooming a scene by hand: pointer, wheel and keys. */

const TURN_RAD_PER_PX = 0.006;
const KEY_TURN_RAD = Math.PI / 36;
const WHEEL_RATE = 0.0014;
/** A wheel that counts lines or pages, in px. */
const LINE_PX = 18;
const PAGE_PX = 300;
export const ZOOM_STEP = 1.3;

type Engine = RefObject<SceneEngine | null>;

export function useGestures(target: RefObject<HTMLElement | null>, engine: Engine): void {
  useEffect(() => {
    const element = target.current;
    if (element === null) return;
    const stops = [followPointers(element, engine), followWheel(element, engine)];
    return () => {
      for (const stop of stops) stop();
    };
  }, [target, engine]);
}

/** One pointer turns, two zoom by their distance. */
function followPointers(element: HTMLElement, engine: Engine): () => void {
  const down = new Map<number, { x: number; y: number }>();
  const spread = (): number => {
    const [a, b] = [...down.values()];
    return Math.hypot(a.x - b.x, a.y - b.y);
  };
  const press = (event: PointerEvent) => {
    if (event.button !== 0) return;
    element.setPointerCapture(event.pointerId);
    down.set(event.pointerId, { x: event.clientX, y: event.clientY });
  };
  const move = (event: PointerEvent) => {
    const last = down.get(event.pointerId);
    if (last === undefined) return;
    const before = down.size === 2 ? spread() : 0;
    down.set(event.pointerId, { x: event.clientX, y: event.clientY });
    if (down.size === 2) {
      const after = spread();
      if (before > 0 && after > 0) engine.current?.zoomBy(before / after);
    } else {
      const right = event.clientX - last.x;
      const below = event.clientY - last.y;
      engine.current?.turn(-right * TURN_RAD_PER_PX, below * TURN_RAD_PER_PX);
    }
  };
  const release = (event: PointerEvent) => down.delete(event.pointerId);
  element.addEventListener('pointerdown', press);
  element.addEventListener('pointermove', move);
  element.addEventListener('pointerup', release);
  element.addEventListener('pointercancel', release);
  return () => {
    element.removeEventListener('pointerdown', press);
    element.removeEventListener('pointermove', move);
    element.removeEventListener('pointerup', release);
    element.removeEventListener('pointercancel', release);
  };
}

function followWheel(element: HTMLElement, engine: Engine): () => void {
  const wheel = (event: WheelEvent) => {
    event.preventDefault();
    const unit = [1, LINE_PX, PAGE_PX][event.deltaMode];
    engine.current?.zoomBy(Math.exp(event.deltaY * unit * WHEEL_RATE));
  };
  element.addEventListener('wheel', wheel, { passive: false });
  return () => element.removeEventListener('wheel', wheel);
}

/** Keys of a focused scene; true when the key was one of them. */
export function pressKey(key: string, engine: SceneEngine | null): boolean {
  switch (key) {
    case 'ArrowLeft':
      engine?.turn(-KEY_TURN_RAD, 0);
      return true;
    case 'ArrowRight':
      engine?.turn(KEY_TURN_RAD, 0);
      return true;
    case 'ArrowUp':
      engine?.turn(0, KEY_TURN_RAD);
      return true;
    case 'ArrowDown':
      engine?.turn(0, -KEY_TURN_RAD);
      return true;
    case '+':
    case '=':
      engine?.zoomBy(1 / ZOOM_STEP);
      return true;
    case '-':
    case '_':
      engine?.zoomBy(ZOOM_STEP);
      return true;
    case '0':
      engine?.resetHand();
      return true;
    default:
      return false;
  }
}

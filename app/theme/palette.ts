import { useSyncExternalStore } from 'react';
import { useDeskStore } from '../store/context';
import type { Theme } from '../store/store';
import { NIGHT, PAPER, type Palette } from './tokens';

const DARK = '(prefers-color-scheme: dark)';

function subscribeToSystem(listener: () => void): () => void {
  const query = matchMedia(DARK);
  query.addEventListener('change', listener);
  return () => query.removeEventListener('change', listener);
}

const systemIsDark = (): boolean => matchMedia(DARK).matches;

/** The palette of a theme now, outside React. */
export function paletteOf(theme: Theme): Palette {
  const night = theme === 'auto' ? systemIsDark() : theme === 'night';
  return night ? NIGHT : PAPER;
}

/** The palette in force: the person's choice, or the system's when the choice is `auto`. */
export function usePalette(): Palette {
  const theme = useDeskStore((state) => state.theme);
  useSyncExternalStore(subscribeToSystem, systemIsDark);
  return paletteOf(theme);
}

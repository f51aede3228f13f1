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

function paletteOf(theme: Theme, systemIsDark: boolean): Palette {
  if (theme === 'auto') return systemIsDark ? NIGHT : PAPER;
  return theme === 'night' ? NIGHT : PAPER;
}

/** The palette in force: the person's choice, or the system's when the choice is `auto`. */
export function usePalette(): Palette {
  const theme = useDeskStore((state) => state.theme);
  const systemIsDark = useSyncExternalStore(subscribeToSystem, () => matchMedia(DARK).matches);
  return paletteOf(theme, systemIsDark);
}

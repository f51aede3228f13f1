import { createContext, useContext } from 'react';
import { useStore } from 'zustand';
import type { Clock } from './clock';
import type { DeskStore, DeskStoreApi } from './store';

/** What every part of the desk works with; handed down once by the entry. */
export interface DeskContext {
  store: DeskStoreApi;
  clock: Clock;
}

const Context = createContext<DeskContext | null>(null);

export const DeskProvider = Context.Provider;

export function useDesk(): DeskContext {
  const desk = useContext(Context);
  if (desk === null) throw new Error('useDesk is called outside DeskProvider');
  return desk;
}

/** Re-renders when the selected part of the store changes. */
export function useDeskStore<T>(select: (state: DeskStore) => T): T {
  return useStore(useDesk().store, select);
}

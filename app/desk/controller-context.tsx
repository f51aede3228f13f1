import { createContext, useContext } from 'react';
import type { Controller } from './controller';

const Context = createContext<Controller | null>(null);

export const ControllerProvider = Context.Provider;

/** What the person can do; handed down once by the entry. */
export function useController(): Controller {
  const controller = useContext(Context);
  if (controller === null) throw new Error('useController is called outside ControllerProvider');
  return controller;
}

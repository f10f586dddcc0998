'use client';

import { useSyncExternalStore } from 'react';

/** The cellar that this tab showed and that its person is no longer in; kept over a load of the page, until that person has read it. */
const KEY = 'fallbright-left';
const listeners = new Set<() => void>();

function set(name: string | null): void {
  try {
    if (name === null) sessionStorage.removeItem(KEY);
    else sessionStorage.setItem(KEY, name);
  } catch {
    // Storage is closed to this page: the mail alone says it.
  }
  for (const listener of listeners) listener();
}

function get(): string | null {
  try {
    return sessionStorage.getItem(KEY);
  } catch {
    return null;
  }
}

export const noteLeft = (person: string, cellar: string): void => set(`${person} ${cellar}`);
export const forgetLeft = (): void => set(null);

/** The name of that cellar, for nobody else who uses this tab later. */
export function useLeft(person: string | undefined): string | null {
  const kept = useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    get,
    () => null,
  );
  return person !== undefined && kept?.startsWith(`${person} `) ? kept.slice(person.length + 1) : null;
}

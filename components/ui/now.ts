'use client';

import { useSyncExternalStore } from 'react';

const MINUTE = 60_000;
const listeners = new Set<() => void>();
let timer: ReturnType<typeof setTimeout> | undefined;
let current = 0;

function tick(): void {
  current = Date.now();
  for (const listener of listeners) listener();
  timer = setTimeout(tick, MINUTE - (Date.now() % MINUTE) + 20);
}

/** A page that was put away wakes with an old time: look again at once. */
function wake(): void {
  if (document.visibilityState !== 'visible') return;
  clearTimeout(timer);
  tick();
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  if (listeners.size === 1) {
    document.addEventListener('visibilitychange', wake);
    tick();
  }
  return () => {
    listeners.delete(listener);
    if (listeners.size > 0) return;
    document.removeEventListener('visibilitychange', wake);
    clearTimeout(timer);
  };
}

/** The time in ms since 1970, anew each minute; null while the server draws, which does not know the reader's clock. */
export function useNow(): number | null {
  return useSyncExternalStore<number | null>(
    subscribe,
    () => current || Math.floor(Date.now() / MINUTE) * MINUTE,
    () => null,
  );
}

'use client';

import { useEffect, useSyncExternalStore } from 'react';

interface Kept {
  /** When the server gave it, ms. */
  givenAt: number;
  /** When it was shown from the device, ms. */
  shownAt: number;
}

/** Which answers on this page are not the server's of now but were kept on the device. */
const kept = new Map<string, Kept>();
const listeners = new Set<() => void>();
let oldest: number | null = null;

/** The header by which the service worker says that it answered from what it kept. */
export const KEPT_HEADER = 'x-fallbright-kept';
/** Once the server answers, what was shown before this and was not asked for again is not on the page any more. */
const FORGOTTEN_MS = 20_000;

/** Notes of one answer whether it was kept; null: it is the server's. */
export function noteAnswer(path: string, keptAt: string | null): void {
  const at = Date.now();
  if (keptAt !== null) kept.set(path, { givenAt: Date.parse(keptAt), shownAt: at });
  else {
    kept.delete(path);
    for (const [other, { shownAt }] of kept) if (at - shownAt > FORGOTTEN_MS) kept.delete(other);
  }
  const now = kept.size === 0 ? null : Math.min(...[...kept.values()].map(({ givenAt }) => givenAt));
  if (now === oldest) return;
  oldest = now;
  for (const listener of listeners) listener();
}

const subscribe = (listener: () => void) => {
  listeners.add(listener);
  return () => void listeners.delete(listener);
};

/** How old the oldest thing shown is, ms since 1970; null: all of it is the server's. */
export const useKeptSince = (): number | null => useSyncExternalStore(subscribe, () => oldest, () => null);

const AGAIN_MS = 8_000;

/** Asks again for what the device answered, as long as the line is up: a slow server answers in the end. */
export function useCatchingUp(online: boolean, askAgain: () => Promise<unknown>): void {
  const stale = useKeptSince() !== null;
  useEffect(() => {
    if (!online || !stale) return;
    const timer = setInterval(() => void askAgain().catch(() => undefined), AGAIN_MS);
    return () => clearInterval(timer);
  }, [online, stale, askAgain]);
}

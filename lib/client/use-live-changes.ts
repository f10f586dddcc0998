'use client';

import { useEffect, useSyncExternalStore } from 'react';
import { liveLine, type LiveState } from './live';

const BEFORE: LiveState = { state: 'connecting', offlineSince: null };

/** Keeps the page's resources as new as the server's. Once, in the layout. */
export function useLiveChanges(): LiveState {
  useEffect(() => liveLine.use(), []);
  return useLiveState();
}

/** Whether the line to the server is up, for anything that shows it. */
export function useLiveState(): LiveState {
  return useSyncExternalStore(liveLine.subscribe, liveLine.snapshot, () => BEFORE);
}

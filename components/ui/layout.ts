'use client';

import { useSyncExternalStore } from 'react';

/** `strip` below 720 px, `middle` to 1099, `wide` from 1100: as the look names them. */
export type PageLayout = 'strip' | 'middle' | 'wide';

const queries = { strip: '(width < 45em)', wide: '(width >= 68.75em)' };

function subscribe(listener: () => void): () => void {
  const lists = Object.values(queries).map((query) => window.matchMedia(query));
  for (const list of lists) list.addEventListener('change', listener);
  return () => {
    for (const list of lists) list.removeEventListener('change', listener);
  };
}

function read(): PageLayout {
  if (window.matchMedia(queries.strip).matches) return 'strip';
  return window.matchMedia(queries.wide).matches ? 'wide' : 'middle';
}

/** Where the drawing itself differs by width, not only its style; the server draws the wide one. */
export function usePageLayout(): PageLayout {
  return useSyncExternalStore(subscribe, read, () => 'wide' as const);
}

'use client';

import { useEffect, useState, type RefObject } from 'react';

/** An element's width in whole px, as it changes; `first` until it is measured. */
export function useWidth(element: RefObject<HTMLElement | null>, first: number): number {
  const [width, setWidth] = useState(first);
  useEffect(() => {
    const measured = element.current;
    if (!measured) return;
    const watch = new ResizeObserver(() => setWidth(Math.round(measured.clientWidth)));
    watch.observe(measured);
    return () => watch.disconnect();
  }, [element]);
  return width;
}

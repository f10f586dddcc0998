'use client';

import { useEffect, useRef, useState, type RefObject } from 'react';

/** An element's width in whole px, as it changes; `first` until it is measured. It may come later than what holds it, or go. */
export function useWidth(element: RefObject<HTMLElement | null>, first: number): number {
  const [width, setWidth] = useState(first);
  const watched = useRef<{ element: HTMLElement; stop: () => void } | null>(null);
  const leave = () => {
    watched.current?.stop();
    watched.current = null;
  };
  // After every drawing: what is drawn once there are data is not there at the first.
  useEffect(() => {
    const measured = element.current;
    if (measured === (watched.current?.element ?? null)) return;
    leave();
    if (!measured) return;
    const watch = new ResizeObserver(() => setWidth(Math.round(measured.clientWidth)));
    watch.observe(measured);
    watched.current = { element: measured, stop: () => watch.disconnect() };
  });
  useEffect(() => leave, []);
  return width;
}

'use client';

import { useEffect, type RefObject } from 'react';

const typing = (target: EventTarget | null) => target instanceof HTMLElement && target.closest('input:not([type=checkbox]), textarea, select, [contenteditable]') !== null;

/** Arrows go from lane to lane, Home and End to the ends; Enter opens, as on any link; `t` ticks the first job. */
export function useShelfKeys(list: RefObject<HTMLElement | null>, tickFirst: () => void): void {
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey || typing(event.target)) return;
      if (event.key === 't') {
        event.preventDefault();
        tickFirst();
        return;
      }
      if (!['ArrowDown', 'ArrowUp', 'Home', 'End'].includes(event.key)) return;
      const lanes = [...(list.current?.querySelectorAll<HTMLElement>('[data-lane]') ?? [])];
      const here = lanes.findIndex((lane) => lane === document.activeElement);
      // Away from the lanes, the arrows scroll the page as everywhere; only the first step in is taken from the page's top.
      if (here < 0 && (event.key !== 'ArrowDown' || document.activeElement !== document.body)) return;
      const to = { ArrowDown: here + 1, ArrowUp: here - 1, Home: 0, End: lanes.length - 1 }[event.key] ?? here;
      const lane = lanes[to];
      if (!lane) return;
      event.preventDefault();
      lane.focus();
      lane.scrollIntoView({ block: 'nearest' });
    };
    document.addEventListener('keydown', onKey);
    return () => document.removeEventListener('keydown', onKey);
  }, [list, tickFirst]);
}

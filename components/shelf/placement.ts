'use client';

import { useLayoutEffect, useRef, type RefObject } from 'react';
import type { ShelfGroup } from '@/lib/core/calls/attention';
import { GROUPS, inOrder, type LaneView } from './lanes';

export interface Placed {
  group: ShelfGroup;
  views: LaneView[];
}

/** Where the lanes stood at one moment, by batch. */
export type Places = ReadonlyMap<string, { group: ShelfGroup; place: number }>;

export function placesOf(groups: readonly Placed[]): Places {
  const flat = groups.flatMap(({ group, views }) => views.map((view) => ({ id: view.lane.id, group })));
  return new Map(flat.map(({ id, group }, place) => [id, { group, place }]));
}

/**
 * Lanes by group in the shelf's order. While somebody points at the lanes,
 * `held` says where they stood: one that was there keeps its place, so that
 * nothing moves away from under the finger; what it says is new all the same.
 */
export function placeLanes(views: readonly LaneView[], held: Places | null): Placed[] {
  const placed = inOrder(views).map((view, index) => {
    const before = held?.get(view.lane.id);
    return { view, group: before?.group ?? view.attention.group, place: before?.place ?? index };
  });
  return GROUPS.map(({ group }) => ({
    group,
    views: placed
      .filter((item) => item.group === group)
      .sort((a, b) => a.place - b.place)
      .map((item) => item.view),
  }));
}

const SLIDE_MS = 200;

/** A lane that moved slides there once; whoever asked for less motion sees it there at once. */
export function useSlides(list: RefObject<HTMLElement | null>, order: string): void {
  const tops = useRef(new Map<string, number>());
  useLayoutEffect(() => {
    const still = window.matchMedia('(prefers-reduced-motion: reduce)').matches;
    const next = new Map<string, number>();
    for (const link of list.current?.querySelectorAll<HTMLElement>('[data-lane]') ?? []) {
      const lane = link.closest('li');
      const id = link.dataset.lane;
      if (!lane || !id) continue;
      const top = lane.offsetTop;
      const before = tops.current.get(id);
      if (!still && before !== undefined && Math.abs(before - top) > 60) lane.animate([{ transform: `translateY(${before - top}px)` }, { transform: 'none' }], { duration: SLIDE_MS, easing: 'ease-out' });
      next.set(id, top);
    }
    tops.current = next;
  }, [list, order]);
}

import type { ComponentType } from 'react';
import { BookIcon, BottleIcon, CompareIcon, FlagIcon, FloatIcon, LabelIcon, LinesIcon, RoundsIcon, SheetIcon, ShelfIcon } from '@/components/ui/icons';
import type { Action } from '@/lib/core/actions';

/** A page of the main navigation. */
export interface Place {
  href: '/shelf' | '/rounds' | '/musts' | '/bench' | '/labels' | '/book' | '/compare' | '/alerts' | '/sensors' | '/settings';
  name: string;
  icon: ComponentType<{ size?: number; className?: string }>;
  /** Things there that nobody has yet. */
  count?: number;
  /** Has a tab on a phone, where there is room for four and More; the others stand on More. */
  tab?: boolean;
}

/** Pages below it are part of it too; a batch stands on the shelf. */
export function isHere(place: Place, path: string): boolean {
  if (place.href === '/shelf' && path.startsWith('/batches')) return true;
  return path === place.href || path.startsWith(`${place.href}/`);
}

/** What is there for this person; a guest sees neither alerts nor sensors. */
export function placesFor(may: (action: Action) => boolean, openAlerts: number): Place[] {
  return [
    { href: '/shelf', name: 'Shelf', icon: ShelfIcon, tab: true },
    ...(may('jobs.read') ? [{ href: '/rounds' as const, name: 'Rounds', icon: RoundsIcon, tab: true }] : []),
    ...(may('musts.read') ? [{ href: '/musts' as const, name: 'Musts', icon: SheetIcon }] : []),
    ...(may('lots.bottle') ? [{ href: '/bench' as const, name: 'Bench', icon: BottleIcon }] : []),
    ...(may('labels.print') ? [{ href: '/labels' as const, name: 'Labels', icon: LabelIcon }] : []),
    ...(may('lots.read') ? [{ href: '/book' as const, name: 'Book', icon: BookIcon }] : []),
    ...(may('batches.read') ? [{ href: '/compare' as const, name: 'Compare', icon: CompareIcon }] : []),
    ...(may('alerts.read') ? [{ href: '/alerts' as const, name: 'Alerts', icon: FlagIcon, count: openAlerts, tab: true }] : []),
    ...(may('sensors.read') ? [{ href: '/sensors' as const, name: 'Sensors', icon: FloatIcon, tab: true }] : []),
  ];
}

/** The phone's last tab: what stands behind the person's name elsewhere. */
export const MORE: Place = { href: '/settings', name: 'More', icon: LinesIcon };

'use client';

import Link from 'next/link';
import { useMe } from '@/lib/client/me';
import { placesFor } from './places';

/** On a phone: the pages that have no tab of their own. */
export function MorePlaces() {
  const { may } = useMe();
  const places = placesFor(may, 0).filter((place) => !place.tab);
  if (places.length === 0) return null;
  return (
    <nav aria-label="More pages" className="border-b-[1.5px] border-ink strip:hidden">
      {places.map((place) => (
        <Link key={place.href} href={place.href} className="flex min-h-12 items-center gap-4 border-b px-(--margin) font-mono text-[0.875rem] font-semibold no-underline">
          <place.icon />
          {place.name}
        </Link>
      ))}
    </nav>
  );
}

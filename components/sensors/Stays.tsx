'use client';

import Link from 'next/link';
import { dayName } from '@/components/charts/zone';
import { GroupBar } from '@/components/ui/Page';
import { useStays } from '@/lib/client/sensors';

/** Which batches it was in, from when to when, and how much it said there. */
export function Stays({ id, timeZone }: { id: string; timeZone: string }) {
  const { data } = useStays(id);
  if (!data || data.items.length === 0) return null;
  const day = (at: string) => dayName(Date.parse(at) / 1000, timeZone);
  return (
    <section aria-label="Where it was">
      <GroupBar word="Where it was" note="a late reading goes where it was then" />
      <ul>
        {data.items.map((stay) => (
          <li key={`${stay.batch.id}${stay.from}`} className="grid gap-x-5 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,1fr)_14rem_7rem]">
            <Link href={`/batches/${stay.batch.id}`} className="type-name-low min-w-0 break-words underline-offset-2 hover:underline">
              {stay.batch.name}
            </Link>
            <span className="type-label text-ink2">
              {day(stay.from)} to {stay.to ? day(stay.to) : 'now'}
            </span>
            <span className="type-label strip:text-right">{stay.readings} readings</span>
          </li>
        ))}
      </ul>
    </section>
  );
}

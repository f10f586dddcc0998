'use client';

import Link from 'next/link';
import { clock, dayName } from '@/components/charts/zone';
import { GroupBar } from '@/components/ui/Page';
import { useStays } from '@/lib/client/sensors';

/** Which batches it was in, from when to when, and how much it said there. */
export function Stays({ id, timeZone }: { id: string; timeZone: string }) {
  const { data } = useStays(id);
  if (!data || data.items.length === 0) return null;
  const at = (iso: string) => `${dayName(Date.parse(iso) / 1000, timeZone)} ${clock(Date.parse(iso) / 1000, timeZone)}`;
  return (
    <section aria-label="Where it was">
      <GroupBar word="Where it was" note="a late reading goes where it was then" />
      <ul>
        {data.items.map((stay) => (
          <li key={`${stay.batch.id}${stay.from}`} className="grid gap-x-5 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,1fr)_21rem_8rem]">
            <Link href={`/batches/${stay.batch.id}`} className="type-name-low min-w-0 break-words underline-offset-2 hover:underline">
              {stay.batch.name}
            </Link>
            <span className="type-label text-ink2">
              {at(stay.from)} to {stay.to ? at(stay.to) : 'now'}
            </span>
            <span className="type-label strip:text-right">{stay.readings} {stay.readings === 1 ? 'reading' : 'readings'}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}

'use client';

import type { Action } from '@/lib/core/actions';
import type { ChosenUnits } from '@/lib/core/units/chosen';
import { useBatches } from '@/lib/client/batches';
import { useMe } from '@/lib/client/me';

/** What the header says of the cellar. Times are seconds since 1970. */
export interface CellarGlance {
  person: string | null;
  cellar: string | null;
  cellarId: string | null;
  cellars: { id: string; name: string }[];
  timeZone: string;
  /** Working batches; null until known. */
  vessels: number | null;
  /** When any sensor in a vessel was last heard. */
  heardAt: number | null;
  units: ChosenUnits;
  may: (action: Action) => boolean;
}

/** `units` are the person's as the server knew them: until the page has asked for itself, they hold. */
export function useGlance(units: ChosenUnits): CellarGlance {
  const { me, may } = useMe();
  const { batches } = useBatches({ state: 'working' });
  const heard = (batches ?? []).flatMap((batch) => (batch.sensor?.last_heard_at ? [Date.parse(batch.sensor.last_heard_at) / 1000] : []));
  return {
    person: me?.person.name ?? null,
    cellar: me?.cellar.name ?? null,
    cellarId: me?.cellar.id ?? null,
    cellars: me?.cellars ?? [],
    timeZone: me?.cellar.time_zone ?? 'UTC',
    vessels: batches?.length ?? null,
    heardAt: heard.length > 0 ? Math.max(...heard) : null,
    units: me?.person.units ?? units,
    may,
  };
}

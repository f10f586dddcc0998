'use client';

import { useState } from 'react';
import { clock, dayName } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { ErrorState } from '@/components/ui/Notice';
import { useTrail } from '@/lib/client/account';
import { useMe } from '@/lib/client/me';

const ALL = { kind: null, person: null, from: null, to: null };

/** What happened to one's own account, so that a stranger's doing stands out. */
export function AccountTrail() {
  const { me } = useMe();
  const [limit, setLimit] = useState(10);
  const { lines, more, loading, error, retry } = useTrail('/account/trail', ALL, limit);
  const zone = me?.person.time_zone ?? 'UTC';
  if (loading) return <Haze height={48} label="Loading what happened" className="mx-(--margin) my-3" />;
  if (!lines)
    return (
      <ErrorState title="It did not load" onRetry={retry}>
        {error?.message}
      </ErrorState>
    );
  return (
    <>
      <ul>
        {lines.map((line) => (
          <li key={line.id} className="grid items-baseline gap-x-5 border-b border-rule px-(--margin) py-1.5 strip:grid-cols-[9rem_minmax(0,1fr)_auto]">
            <span className="type-label text-ink2">
              {dayName(Date.parse(line.at) / 1000, zone)} {clock(Date.parse(line.at) / 1000, zone)}
            </span>
            <span className="type-body min-w-0 break-words first-letter:uppercase">{line.says}</span>
            <span className="type-label text-ink2">{line.address ? `from ${line.address}` : ''}</span>
          </li>
        ))}
      </ul>
      {more && limit < 200 && (
        <div className="px-(--margin) py-3">
          <Button onClick={() => setLimit(Math.min(200, limit + 40))}>Show more</Button>
        </div>
      )}
    </>
  );
}

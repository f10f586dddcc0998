'use client';

import { clock } from '@/components/charts/zone';
import { StateMark } from '@/components/ui/StateMark';
import type { LiveState } from '@/lib/client/live';

/** Under the header while the line to the server is down; it goes away by itself. */
export function OfflineBar({ live, timeZone }: { live: LiveState; timeZone: string }) {
  const since = live.state === 'offline' ? live.offlineSince : null;
  return (
    <div role="status">
      {since !== null && (
        <p className="type-label flex items-center gap-3 bg-ink px-(--margin) py-1.5 text-on">
          <StateMark state="Silent" className="text-on!" />
          <span>
            <b className="font-semibold">Offline since {clock(since / 1000, timeZone)}.</b> Showing what was known then. It catches up by itself.
          </span>
        </p>
      )}
    </div>
  );
}

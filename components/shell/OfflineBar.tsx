'use client';

import Link from 'next/link';
import { barWords } from '@/components/offline/words';
import { StateMark } from '@/components/ui/StateMark';
import { useNow } from '@/components/ui/now';
import { useCatchingUp, useKeptSince } from '@/lib/client/kept';
import type { LiveState } from '@/lib/client/live';
import { useSendingUnsent, useUnsent } from '@/lib/client/unsent/use-unsent';
import { refresh } from '@/lib/client/use-resource';

const everything = () => refresh(() => true);

/** Under the header while the line to the server is down, or something waits to be sent; it goes away by itself. */
export function OfflineBar({ live, timeZone }: { live: LiveState; timeZone: string }) {
  const keptSince = useKeptSince();
  useCatchingUp(live.state === 'online', everything);
  const unsent = useUnsent();
  const stopped = useSendingUnsent();
  const now = useNow();
  const words =
    now === null
      ? null
      : barWords({
          offlineSince: live.state === 'offline' ? live.offlineSince : null,
          // While the line is being tried, what is kept is shown without a word for a moment.
          keptSince: live.state === 'connecting' ? null : keptSince,
          waiting: unsent.filter(({ state }) => state === 'waiting').length,
          refused: unsent.filter(({ state }) => state === 'refused'),
          stopped,
          now,
          timeZone,
        });
  const away = words?.tone === 'away';
  return (
    <div role="status">
      {words && (
        <p className={`type-label flex flex-wrap items-center gap-x-3 gap-y-1 px-(--margin) py-1.5 ${away ? 'bg-ink text-on' : 'border-b bg-desk text-ink'}`}>
          <StateMark state={away ? 'Silent' : 'Due'} className={away ? 'text-on!' : ''} />
          <span className="min-w-0 flex-1">
            <b className="font-semibold">{words.strong}</b> {words.rest}
          </span>
          {words.link && (
            <Link href={words.link.href} className={`underline underline-offset-4 ${away ? 'text-on' : 'text-ink'}`}>
              {words.link.word}
            </Link>
          )}
        </p>
      )}
    </div>
  );
}

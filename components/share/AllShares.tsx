'use client';

import Link from 'next/link';
import { dayWords } from '@/components/book/words';
import { Button } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState, FormError } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { useAct } from '@/components/ui/use-act';
import { useMe } from '@/lib/client/me';
import { lookedWords } from './words';
import { revokeShare, useShares } from '@/lib/client/tastings';

/** Every share link of the cellar, each with its batch; made on the batch's own page. */
export function AllShares() {
  const { shares, loading, error, retry } = useShares();
  const { me } = useMe();
  const now = useNow() ?? 0;
  const { busy, failed, act } = useAct();
  if (loading) return <Haze height={96} label="Loading the links" className="mx-(--margin) my-3" />;
  if (!shares)
    return (
      <ErrorState title="The links did not load" onRetry={retry}>
        {error?.message}
      </ErrorState>
    );
  if (shares.length === 0) return <EmptyState title="No link yet">A link shows one batch to whoever has its address. It is made on the batch’s page.</EmptyState>;
  const day = (at: string) => dayWords(at, me?.cellar.time_zone ?? 'UTC', now);
  return (
    <>
      {failed && <FormError>{failed}</FormError>}
      <ul>
        {shares.map((share) => (
          <li key={share.id} className="grid items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,1fr)_auto]">
            <div className="min-w-0">
              <Link href={`/batches/${share.batch.id}`} className="type-name-low break-words underline underline-offset-4">
                {share.batch.name}
              </Link>
              <p className="type-label text-ink2">
                {share.revoked_at ? `revoked ${day(share.revoked_at)}` : share.open ? `until ${day(share.expires_at)}` : `expired ${day(share.expires_at)}`}, {lookedWords(share.looked_at)}
                {share.created_by && `, made by ${share.created_by.name}`}
              </p>
            </div>
            {share.open && (
              <Button size="lane" disabled={busy} aria-label={`Revoke the link to ${share.batch.name}`} onClick={() => void act(() => revokeShare(share))}>
                Revoke
              </Button>
            )}
          </li>
        ))}
      </ul>
    </>
  );
}

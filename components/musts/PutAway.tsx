'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { FormError } from '@/components/ui/Notice';
import { ClientError } from '@/lib/client/fetcher';
import { archiveMust } from '@/lib/client/musts';
import type { MustBody } from '@/lib/contracts/musts';

/** A sheet leaves the list; what was made from it keeps it. */
export function PutAway({ must }: { must: MustBody }) {
  const router = useRouter();
  const [busy, setBusy] = useState(false);
  const [failed, setFailed] = useState<string | null>(null);
  if (must.archived) return <p className="type-reason text-ink2">Put away: it stands no more in the list. Keeping a new version brings it back.</p>;

  async function putAway() {
    setBusy(true);
    setFailed(null);
    try {
      await archiveMust(must.id);
      router.push('/musts');
    } catch (error) {
      setFailed(error instanceof ClientError ? error.message : 'It was not put away. Try again.');
      setBusy(false);
    }
  }

  return (
    <div className="flex flex-wrap items-center justify-end gap-3 pt-2">
      {failed && <FormError>{failed}</FormError>}
      <p className="type-label text-ink2">Out of the list; its batches keep it.</p>
      <Button look="quiet" disabled={busy} onClick={() => void putAway()}>
        Put it away
      </Button>
    </div>
  );
}

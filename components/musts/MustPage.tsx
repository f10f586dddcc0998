'use client';

import { useState } from 'react';
import { LinkButton } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { ErrorState } from '@/components/ui/Notice';
import { useMe } from '@/lib/client/me';
import { useMust } from '@/lib/client/musts';
import { MustSheetPage } from './MustSheetPage';

/** One must sheet, in its newest version or an older one. */
export function MustPage({ id }: { id: string }) {
  const [version, setVersion] = useState<number | undefined>();
  const { me, may } = useMe();
  const { must, error, retry } = useMust(id, version);
  if (error?.status === 404) {
    return (
      <ErrorState title="There is no such sheet here">
        <p>It may be in another cellar.</p>
        <LinkButton href="/musts" className="mt-2">
          To the sheets
        </LinkButton>
      </ErrorState>
    );
  }
  if (error && !must) {
    return (
      <ErrorState title="The sheet did not load" onRetry={retry}>
        {error.message}
      </ErrorState>
    );
  }
  if (!must || !me) return <Haze height={400} className="m-(--margin)" label="Loading the sheet" />;
  return <MustSheetPage key={must.version_id} must={must} mayWrite={may('musts.write')} mayStart={may('batches.create')} keptAs={`${me.person.id} ${me.cellar.id}`} timeZone={me.cellar.time_zone} onVersion={setVersion} />;
}

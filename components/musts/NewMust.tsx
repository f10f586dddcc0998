'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, FormError } from '@/components/ui/Notice';
import { PageHead } from '@/components/ui/Page';
import { useMe } from '@/lib/client/me';
import { createMust } from '@/lib/client/musts';
import { emptyDraft } from './draft';
import { useKeep } from './use-keep';
import { Workbench } from './Workbench';

export function NewMust() {
  const router = useRouter();
  const { me, may } = useMe();
  const [draft, setDraft] = useState(emptyDraft);
  const { errors, failed, sending, save } = useKeep(async (sheet) => router.push(`/musts/${(await createMust(sheet)).id}`));
  if (!me) return <Haze height={320} className="m-(--margin)" />;
  if (!may('musts.write')) {
    return (
      <EmptyState title="Must sheets are written by brewers" action={<LinkButton href="/musts">To the sheets</LinkButton>}>
        Ask a keeper of {me.cellar.name} for the role of a brewer.
      </EmptyState>
    );
  }

  return (
    <>
      <PageHead title="New must sheet" meta="The figures follow as you write." />
      <Workbench draft={draft} errors={errors} onChange={setDraft}>
        {failed && <FormError>{failed}</FormError>}
        <div className="flex justify-end gap-2">
          <LinkButton look="quiet" href="/musts">
            Not now
          </LinkButton>
          <Button look="first" disabled={sending} onClick={() => void save(draft)}>
            {sending ? 'Keeping' : 'Keep the sheet'}
          </Button>
        </div>
      </Workbench>
    </>
  );
}

'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { focusFirstError } from '@/components/batch/focus';
import { Button, LinkButton } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, FormError } from '@/components/ui/Notice';
import { PageHead } from '@/components/ui/Page';
import { ClientError } from '@/lib/client/fetcher';
import { useMe } from '@/lib/client/me';
import { createMust } from '@/lib/client/musts';
import { checked, emptyDraft, type SheetErrors } from './draft';
import { Workbench } from './Workbench';

export function NewMust() {
  const router = useRouter();
  const { me, may } = useMe();
  const [draft, setDraft] = useState(emptyDraft);
  const [errors, setErrors] = useState<SheetErrors>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  if (!me) return <Haze height={320} className="m-(--margin)" />;
  if (!may('musts.write')) {
    return (
      <EmptyState title="Must sheets are written by brewers" action={<LinkButton href="/musts">To the sheets</LinkButton>}>
        Ask a keeper of {me.cellar.name} for the role of a brewer.
      </EmptyState>
    );
  }

  async function save() {
    const made = checked(draft);
    setErrors(made.errors ?? {});
    setFailed(null);
    if (made.errors) {
      if (made.errors.sheet) setFailed(made.errors.sheet);
      focusFirstError();
      return;
    }
    setSending(true);
    try {
      const must = await createMust(made.sheet);
      router.push(`/musts/${must.id}`);
    } catch (error) {
      setFailed(error instanceof ClientError ? error.message : 'It was not kept. Try again.');
      setSending(false);
    }
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
          <Button look="first" disabled={sending} onClick={() => void save()}>
            {sending ? 'Keeping' : 'Keep the sheet'}
          </Button>
        </div>
      </Workbench>
    </>
  );
}

'use client';

import { useRouter } from 'next/navigation';
import { Button, LinkButton } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, FormError } from '@/components/ui/Notice';
import { PageHead } from '@/components/ui/Page';
import { useMe } from '@/lib/client/me';
import { createMust } from '@/lib/client/musts';
import { emptyDraft } from './draft';
import { NotKeptYet } from '@/components/ui/NotKeptYet';
import { useKeep } from './use-keep';
import { useKept } from '@/components/ui/use-kept';
import { Workbench } from './Workbench';

export function NewMust() {
  const { me, may } = useMe();
  if (!me) return <Haze height={320} className="m-(--margin)" />;
  if (!may('musts.write')) {
    return (
      <EmptyState title="Must sheets are written by brewers" action={<LinkButton href="/musts">To the sheets</LinkButton>}>
        Ask a keeper of {me.cellar.name} for the role of a brewer.
      </EmptyState>
    );
  }
  return <NewSheet keptAs={`${me.person.id} ${me.cellar.id} new must`} />;
}

function NewSheet({ keptAs }: { keptAs: string }) {
  const router = useRouter();
  const [draft, setDraft, found, forget] = useKept(keptAs, emptyDraft);
  const { errors, failed, sending, save } = useKeep(async (sheet) => {
    const { id } = await createMust(sheet);
    forget();
    router.push(`/musts/${id}`);
  });
  return (
    <>
      <PageHead title="New must sheet" meta="The figures follow as you write." />
      {found && <NotKeptYet />}
      <Workbench draft={draft} errors={errors} onChange={setDraft}>
        {failed && <FormError>{failed}</FormError>}
        <div className="flex justify-end gap-2">
          <LinkButton look="quiet" href="/musts" onClick={forget}>
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

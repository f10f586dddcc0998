'use client';

import { useMemo, useState } from 'react';
import { Sheet } from '@/components/ui/Sheet';
import { Button, LinkButton } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { PageHead } from '@/components/ui/Page';
import { updateMust } from '@/lib/client/musts';
import type { MustBody } from '@/lib/contracts/musts';
import { CopyForm } from './CopyForm';
import { draftOf } from './draft';
import { Measured } from './Measured';
import { NotKeptYet } from '@/components/ui/NotKeptYet';
import { PutAway } from './PutAway';
import { useKeep } from './use-keep';
import { useKept } from '@/components/ui/use-kept';
import { Versions } from './Versions';
import { Workbench } from './Workbench';
import { WorkSheet } from './WorkSheet';

interface MustSheetPageProps {
  must: MustBody;
  mayWrite: boolean;
  mayStart: boolean;
  /** The person and cellar that what is written here belongs to. */
  keptAs: string;
  timeZone: string;
  onVersion: (version: number | undefined) => void;
}

export function MustSheetPage({ must, mayWrite, mayStart, keptAs, timeZone, onVersion }: MustSheetPageProps) {
  const [draft, setDraft, found, forget] = useKept(`${keptAs} ${must.version_id}`, () => draftOf(must.sheet));
  const [note, setNote] = useState('');
  const [opened, setOpened] = useState<'copy' | 'measure' | null>(null);
  const newest = must.versions[0]?.version ?? must.version;
  const old = must.version !== newest;
  const changed = useMemo(() => JSON.stringify(draft) !== JSON.stringify(draftOf(must.sheet)), [draft, must.sheet]);

  const { errors, failed, sending, save } = useKeep(async (sheet) => {
    await updateMust(must.id, { sheet, base_version: newest, change_note: note.trim() === '' ? null : note });
    forget();
    onVersion(undefined);
  });

  return (
    <>
      <div className="not-printed">
        <PageHead
          title={must.sheet.name}
          meta={
            <>
              version {must.version}
              {must.archived && ', put away'}
              {old && `, not the newest (${newest})`}
              {must.copied_from && `, copied from ${must.copied_from.name}`}
            </>
          }
        >
          <Button look="quiet" onClick={() => window.print()}>
            Print
          </Button>
          <Button onClick={() => setOpened('measure')}>Measure and pitch</Button>
          {mayWrite && <Button onClick={() => setOpened('copy')}>Copy</Button>}
          {mayStart && must.result.ok && !changed && (
            <LinkButton look="first" href={`/batches/new?must=${must.id}&version=${must.version}`}>
              Start a batch
            </LinkButton>
          )}
        </PageHead>
        {must.next_time.map((item) => (
          <p key={`${item.lot.id} ${item.at}`} className="type-body border-b bg-lit px-(--margin) py-2">
            <span className="type-label text-ink2">next time, from {item.lot.code}: </span>
            {item.note}
          </p>
        ))}
      </div>
      {found && changed && <NotKeptYet />}
      <Workbench draft={draft} errors={errors} onChange={setDraft}>
        {mayWrite ? (
          <>
            <Field label="What is different in this version" autoComplete="off" maxLength={500} value={note} onChange={(event) => setNote(event.target.value)} hint="A batch keeps the version it was made from." />
            {failed && <FormError>{failed}</FormError>}
            <div className="flex justify-end gap-2">
              {changed && (
                <Button
                  look="quiet"
                  onClick={() => {
                    setDraft(draftOf(must.sheet));
                    forget();
                  }}
                >
                  As it was
                </Button>
              )}
              <Button look="first" disabled={sending || (!changed && !old)} onClick={() => void save(draft)}>
                {sending ? 'Keeping' : `Keep as version ${newest + 1}`}
              </Button>
            </div>
          </>
        ) : (
          <p className="type-reason text-ink2">You may try changes here; a brewer keeps them.</p>
        )}
        <Versions must={must} timeZone={timeZone} onVersion={(version) => onVersion(version === newest ? undefined : version)} />
        {mayWrite && <PutAway must={must} />}
      </Workbench>
      <WorkSheet must={must} timeZone={timeZone} />
      {opened === 'copy' && (
        <Sheet title={`Copy of ${must.sheet.name}`} onClose={() => setOpened(null)}>
          <CopyForm must={must} draft={draft} changed={changed} />
        </Sheet>
      )}
      {opened === 'measure' && (
        <Sheet title="Measure and pitch" onClose={() => setOpened(null)}>
          <Measured must={must} keptAs={`${keptAs} ${must.version_id} measured`} mayStart={mayStart && !changed} />
        </Sheet>
      )}
    </>
  );
}

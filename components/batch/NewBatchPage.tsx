'use client';

import { useRouter } from 'next/navigation';
import { useState, type FormEvent } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { Select } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState, FormError } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { PageHead } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { Vessel } from '@/components/vessel/Vessel';
import { createBatch } from '@/lib/client/batches';
import { ClientError } from '@/lib/client/fetcher';
import { focusFirstError } from '@/lib/client/focus';
import { useMe } from '@/lib/client/me';
import { useBatchProposal } from '@/lib/client/musts';
import type { BatchProposal } from '@/lib/contracts/musts';
import { useSensors } from '@/lib/client/sensors';
import { BatchFields } from './BatchFields';
import { batchErrors, batchToCreate, draftOfProposal, newDraft, type BatchDraft, type BatchErrors } from './batch-form';
import { toLocal } from './entry-form';
import { typedNumber } from './figures';

/** `must`: the sheet it is made from, in the version given. */
export function NewBatchPage({ must = null, version, gravity = '' }: { must?: string | null; version?: number | undefined; /** As measured at the sheet, SG. */ gravity?: string }) {
  const { me, may, error: notMe, retry: askMe } = useMe();
  const { proposal, error: noProposal, retry: askProposal } = useBatchProposal(must, { ...(version === undefined ? {} : { version }) });
  const now = useNow();
  const error = notMe ?? noProposal;
  const retry = notMe ? askMe : askProposal;
  if (error && (!me || (must && !proposal))) {
    return (
      <ErrorState title="The page did not load" onRetry={retry}>
        {error.message}
      </ErrorState>
    );
  }
  if (!me || now === null || (must && !proposal)) return <Haze height={320} className="m-(--margin)" />;
  if (!may('batches.create')) {
    return (
      <EmptyState title="Starting a batch is for brewers" action={<LinkButton href="/shelf">To the shelf</LinkButton>}>
        Ask a keeper of {me.cellar.name} for the role of a brewer.
      </EmptyState>
    );
  }
  return <NewBatchForm timeZone={me.cellar.time_zone} now={now / 1000} proposal={proposal ?? null} gravity={gravity} />;
}

function NewBatchForm({ timeZone, now, proposal, gravity }: { timeZone: string; now: number; proposal: BatchProposal | null; gravity: string }) {
  const router = useRouter();
  const { sensors } = useSensors();
  const [draft, setDraft] = useState<BatchDraft>(() => ({ ...(proposal ? draftOfProposal(proposal, now, timeZone) : newDraft('cider', now, timeZone)), gravity }));
  const [errors, setErrors] = useState<BatchErrors>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const free = (sensors ?? []).filter((sensor) => !sensor.disabled && sensor.batch === null);
  const [volume, vessel] = [typedNumber(draft.volume), typedNumber(draft.vessel)];
  const level = volume && vessel && volume > 0 && vessel > 0 ? Math.min(1, volume / vessel) : null;
  const tag = typedNumber(draft.tag);

  async function send(event: FormEvent) {
    event.preventDefault();
    const made = batchToCreate(draft, timeZone);
    setErrors(made.errors ?? {});
    setFailed(null);
    if (made.errors) {
      focusFirstError();
      return;
    }
    setSending(true);
    try {
      const batch = await createBatch({ ...made.batch, must_version_id: proposal?.must_version_id ?? null });
      router.push(`/batches/${batch.id}`);
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      const fields = batchErrors(told?.fields ?? {});
      setErrors(fields);
      if (Object.keys(fields).length === 0) setFailed(told?.message ?? 'It was not started. Try again.');
      else focusFirstError();
      setSending(false);
    }
  }

  return (
    <>
      <PageHead title="Start a batch" meta={proposal ? 'From its must sheet; the batch keeps this version.' : 'Everything but the name, the kind and the volumes can be told later.'} />
      <div className="wide:grid wide:min-h-[calc(100dvh-var(--header)-56px)] wide:grid-cols-[minmax(0,1fr)_424px]">
        <form onSubmit={(event) => void send(event)} noValidate className="flex max-w-[860px] flex-col gap-5 px-(--margin) py-4">
          {proposal && (
            <p className="type-body border-l-[3px] border-rule2 pl-3">
              <Sentence>{`Promised ${proposal.expected_original_gravity.value.lo.toFixed(3)} to ${proposal.expected_original_gravity.value.hi.toFixed(3)}. ${gravity === '' ? 'Write the gravity as measured, corrected to 20 °C.' : 'The gravity below is the one you measured, corrected to 20 °C.'}`}</Sentence>
            </p>
          )}
          <BatchFields draft={draft} errors={errors} onChange={setDraft} latest={toLocal(now, timeZone)} fresh promise={proposal ? { volumeL: proposal.volume_l, vesselL: proposal.vessel_l, neck: proposal.neck, fits: proposal.fits, sentence: proposal.neck_reason } : undefined}>
            <Select label="Sensor" value={draft.sensor} onChange={(event) => setDraft({ ...draft, sensor: event.target.value })} error={errors.sensor} hint={free.length === 0 ? 'No free sensor: readings by hand work alone.' : undefined}>
              <option value="">none</option>
              {free.map((sensor) => (
                <option key={sensor.id} value={sensor.id}>
                  {sensor.name}
                </option>
              ))}
            </Select>
          </BatchFields>
          {failed && <FormError>{failed}</FormError>}
          <div className="flex justify-end gap-2">
            <LinkButton look="quiet" href="/shelf">
              Not now
            </LinkButton>
            <Button look="first" type="submit" disabled={sending}>
              {sending ? 'Starting' : 'Start the batch'}
            </Button>
          </div>
        </form>
        <aside className="hidden border-l bg-desk wide:block">
          <div className="sticky top-0 flex flex-col items-center gap-3 px-(--margin) py-8">
            <Vessel
              silentPicture
              height={170}
              vessel={{ kind: draft.vesselKind, neck: draft.neck, level, drink: draft.colour, clearness: 'hazy', krausen: false, lees: 'none', tag: tag !== null && Number.isInteger(tag) && tag > 0 && tag < 1000 ? tag : null, silent: false }}
            />
            <p className="type-name text-center">{draft.name || 'An empty place'}</p>
          </div>
        </aside>
      </div>
    </>
  );
}

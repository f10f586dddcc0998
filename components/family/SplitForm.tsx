'use client';

import Link from 'next/link';
import { type FormEvent } from 'react';
import { timeTyped } from '@/components/batch/entry-form';
import { WhenField } from '@/components/batch/WhenField';
import { litres, typedNumber } from '@/components/batch/figures';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { NotKeptYet } from '@/components/ui/NotKeptYet';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { useKept } from '@/components/ui/use-kept';
import { UnitField } from '@/components/units/UnitField';
import { splitBatch } from '@/lib/client/cellarwork';
import type { BatchBody } from '@/lib/contracts/batches';
import { splitForm } from '@/lib/contracts/family';
import { useSend } from '@/lib/client/use-send';
import { newVessel, showsVessel, vesselBody, VesselFields, type VesselDraft } from './VesselFields';

interface PartDraft {
  key: number;
  litres: string;
  vessel: VesselDraft;
}

const MOST_PARTS = 8;
const numberOr = (text: string, other: number) => typedNumber(text) ?? other;

/** Splits a batch into vessels with a log of their own; what is not taken stays where it is. */
export function SplitForm({ keptAs, batch, now, timeZone }: { keptAs: string; batch: BatchBody; now: number; timeZone: string }) {
  const [draft, setDraft, found, forget] = useKept(keptAs, () => ({ parts: [{ key: 1, litres: '', vessel: newVessel(`${batch.name}, second vessel`.slice(0, 80)) }] as readonly PartDraft[], lost: '', at: '', text: '', clientId: crypto.randomUUID() as string }));
  const { parts, lost, at, text, clientId } = draft;
  const set = (next: Partial<typeof draft>) => setDraft({ ...draft, ...next });
  const { errors, failed, sending, answer, submit } = useSend(
    splitForm,
    async (form) => {
      const done = await splitBatch(batch.id, form);
      forget();
      return done;
    },
    (path) => path === 'at' || path === 'lost_l' || parts.some((_, index) => path === `parts.${index}.volume_l` || showsVessel(path, `parts.${index}`)),
  );

  if (answer) {
    return (
      <section aria-live="polite" className="max-w-[600px] self-start border-l-[3px] border-green bg-lit py-2 pl-3">
        <p className="type-verdict">Done and logged.</p>
        <p className="type-body">
          <Sentence>{answer.batch.state === 'ended' ? `Nothing is left of ${batch.name}: its log has ended.` : `${litres(answer.batch.volume_l)} stays in ${batch.name}.`}</Sentence>
        </p>
        <ul>
          {answer.parts.map((part) => (
            <li key={part.id} className="type-body">
              <Link href={`/batches/${part.id}`}>{part.name}</Link>: {litres(part.volume_l)}
            </li>
          ))}
        </ul>
      </section>
    );
  }

  const taken = parts.reduce((sum, part) => sum + numberOr(part.litres, 0), numberOr(lost, 0));
  const stays = batch.volume_l - taken;
  const change = (key: number, part: Partial<PartDraft>) => set({ parts: parts.map((item) => (item.key === key ? { ...item, ...part } : item)) });
  function send(event: FormEvent) {
    event.preventDefault();
    void submit({ at: timeTyped(at, timeZone), text: text.trim() || null, client_id: clientId, lost_l: numberOr(lost, 0), parts: parts.map((part) => ({ ...vesselBody(part.vessel), volume_l: numberOr(part.litres, NaN) })) });
  }

  return (
    <form onSubmit={send} noValidate className="flex max-w-[600px] flex-col gap-4">
      {found && <NotKeptYet />}
      {parts.map((part, index) => (
        <fieldset key={part.key} className="grid grid-cols-2 gap-3 border-b pb-4">
          <legend className="type-verdict mb-2">Into vessel {index + 1}</legend>
          <UnitField measure="volume" className="col-span-full" label="How much goes in" value={part.litres} onChange={(event) => change(part.key, { litres: event.target.value })} error={errors[`parts.${index}.volume_l`]} />
          <VesselFields draft={part.vessel} errors={errors} prefix={`parts.${index}`} onChange={(vessel) => change(part.key, { vessel })} />
          {parts.length > 1 && (
            <Button look="quiet" className="justify-self-start" onClick={() => set({ parts: parts.filter((item) => item.key !== part.key) })}>
              Leave it out
            </Button>
          )}
        </fieldset>
      ))}
      {parts.length < MOST_PARTS && (
        <Button className="self-start" onClick={() => set({ parts: [...parts, { key: Math.max(...parts.map((item) => item.key)) + 1, litres: '', vessel: newVessel(`${batch.name}, vessel ${parts.length + 2}`.slice(0, 80)) }] })}>
          Another vessel
        </Button>
      )}
      <UnitField measure="volume" label="Lost on the way" value={lost} onChange={(event) => set({ lost: event.target.value })} error={errors.lost_l} />
      {Number.isFinite(stays) && (
        <p role="status" className={`type-body border-l-[3px] pl-3 ${stays < -1e-6 ? 'border-madder' : 'border-rule2'}`}>
          <Sentence>{stays < -1e-6 ? `${litres(taken)} are asked of ${litres(batch.volume_l)}.` : stays < 0.005 ? `Nothing stays in ${batch.name}: its log ends.` : `${litres(stays)} stays in ${batch.name}.`}</Sentence>
        </p>
      )}
      <p className="type-reason text-ink2">Each part keeps the pitch, the yeast and the original gravity it comes with, and is read by hand until it has a sensor of its own. Each must be read anew before its bench says anything.</p>
      <WhenField value={at} onType={(typed) => set({ at: typed })} now={now} timeZone={timeZone} error={errors.at} />
      <Field label="Note" autoComplete="off" maxLength={2000} value={text} onChange={(event) => set({ text: event.target.value })} />
      {failed && <FormError>{failed}</FormError>}
      <Button look="first" type="submit" className="self-end" disabled={sending}>
        {sending ? 'Saving' : 'Split'}
      </Button>
    </form>
  );
}

'use client';

import Link from 'next/link';
import { useMemo, useState, type FormEvent } from 'react';
import { timeTyped } from '@/components/batch/entry-form';
import { WhenField } from '@/components/batch/WhenField';
import { litres, percent, typedNumber } from '@/components/batch/figures';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field, Select } from '@/components/ui/Field';
import { How } from '@/components/ui/How';
import { NotKeptYet } from '@/components/ui/NotKeptYet';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { useKept } from '@/components/ui/use-kept';
import { useBatches } from '@/lib/client/batches';
import { blendBatches } from '@/lib/client/cellarwork';
import type { BatchBody } from '@/lib/contracts/batches';
import { blendForm, type DrinkBody } from '@/lib/contracts/family';
import { blendInto } from '@/lib/core/family/cellarwork';
import { BlendPart, type BlendPartDraft } from './BlendPart';
import { contentsIn } from './poured';
import { useSend } from '@/lib/client/use-send';
import { newVessel, showsVessel, vesselBody, VesselFields } from './VesselFields';

/** Pours this batch together with others, into a new vessel or into one of them. What it comes to is told before anything is poured. */
export function BlendForm({ keptAs, batch, now, timeZone }: { keptAs: string; batch: BatchBody; now: number; timeZone: string }) {
  const { batches } = useBatches({ state: 'working' });
  const [draft, setDraft, found, forget] = useKept(keptAs, () => ({
    parts: [{ key: 1, batchId: batch.id, litres: String(batch.volume_l) }, { key: 2, batchId: '', litres: '' }] as readonly BlendPartDraft[],
    where: 'new' as 'new' | 'there',
    intoId: '',
    vessel: newVessel(`${batch.name}, blended`.slice(0, 80)),
    at: '',
    text: '',
    clientId: crypto.randomUUID() as string,
  }));
  const { parts, where, intoId, vessel, at, text, clientId } = draft;
  const set = (next: Partial<typeof draft>) => setDraft({ ...draft, ...next });
  const [drinks, setDrinks] = useState<Readonly<Record<string, DrinkBody>>>({});
  const { errors, failed, sending, answer, submit } = useSend(
    blendForm,
    async (form) => {
      const done = await blendBatches(form);
      forget();
      return done;
    },
    (path) => ['at', 'into_batch_id'].includes(path) || showsVessel(path, 'into') || /^parts\.\d+\./.test(path),
  );

  const preview = useMemo(() => {
    const contents = parts.map((part) => {
      const drink = drinks[part.batchId];
      return drink ? contentsIn(drink, typedNumber(part.litres) ?? NaN) : null;
    });
    const known = contents.flatMap((item) => (item ? [item] : []));
    return known.length === parts.length && known.length > 1 ? blendInto(known) : null;
  }, [parts, drinks]);

  if (answer) {
    return (
      <section aria-live="polite" className="max-w-[600px] self-start border-l-[3px] border-green bg-lit py-2 pl-3">
        <p className="type-verdict">Done and logged.</p>
        <p className="type-body">
          <Link href={`/batches/${answer.batch.id}`}>{answer.batch.name}</Link>
          <Sentence>{`: ${litres(answer.batch.volume_l)}${answer.reading ? `; what went in stood at ${answer.reading.gravity.toFixed(3)}, ${percent(answer.reading.abv_percent)}` : ''}.`}</Sentence>
        </p>
        <p className="type-reason text-ink2">Two drinks that had finished may begin again together. Keep it under an airlock and read it by hand; its bench begins anew.</p>
        {answer.how && <How how={answer.how} of="the blend" />}
      </section>
    );
  }

  const asked = parts.flatMap((part) => {
    const item = (batches ?? []).find(({ id }) => id === part.batchId);
    const asks = typedNumber(part.litres);
    return item && asks !== null && asks > item.volume_l + 1e-6 ? [{ name: item.name, asks, has: item.volume_l }] : [];
  });
  const others = (batches ?? []).filter((item) => !parts.some((part) => part.batchId === item.id));
  const change = (key: number, part: Partial<BlendPartDraft>) => set({ parts: parts.map((item) => (item.key === key ? { ...item, ...part } : item)) });
  function send(event: FormEvent) {
    event.preventDefault();
    void submit({
      at: timeTyped(at, timeZone),
      text: text.trim() || null,
      client_id: clientId,
      parts: parts.map((part) => ({ batch_id: part.batchId, volume_l: typedNumber(part.litres) ?? NaN })),
      into_batch_id: where === 'there' ? intoId || null : null,
      into: where === 'new' ? { ...vesselBody(vessel), drink_colour: batch.drink_colour } : null,
    });
  }

  return (
    <form onSubmit={send} noValidate className="flex max-w-[600px] flex-col gap-4">
      {found && <NotKeptYet />}
      <fieldset className="flex flex-col gap-3">
        <legend className="type-verdict mb-2">What goes in</legend>
        {parts.map((part, index) => (
          <BlendPart
            key={part.key}
            part={part}
            batches={(batches ?? []).filter((item) => item.id === part.batchId || others.includes(item))}
            errors={{ batch: errors[`parts.${index}.batch_id`], litres: errors[`parts.${index}.volume_l`] }}
            onChange={(next) => change(part.key, next)}
            onDrink={(drink) => setDrinks((before) => (before[drink.batch_id] === drink ? before : { ...before, [drink.batch_id]: drink }))}
            onRemove={parts.length > 1 ? () => set({ parts: parts.filter((item) => item.key !== part.key) }) : null}
          />
        ))}
        {others.length > 0 && parts.length < 12 && (
          <Button className="self-start" onClick={() => set({ parts: [...parts, { key: Math.max(...parts.map((item) => item.key)) + 1, batchId: '', litres: '' }] })}>
            Another batch
          </Button>
        )}
      </fieldset>
      {preview?.reading && (
        <section aria-live="polite" aria-label="What it comes to" className="border-l-[3px] border-rule2 pl-3">
          <p className="type-verdict-now">
            <Sentence strong>{`${preview.reading.volumeL.toFixed(2)} L at ${preview.reading.gravity.toFixed(3)}, ${percent(preview.reading.abvPercent)}`}</Sentence>
          </p>
          <p className="type-reason text-ink2">
            <Sentence>{`As if it had begun at ${preview.reading.effectiveOg.toFixed(3)}. By conserved masses; nothing is poured yet.`}</Sentence>
          </p>
          <How how={preview.how} of="what it comes to" />
        </section>
      )}
      {asked.map(({ name, asks, has }) => (
        <p key={name} role="status" className="type-body border-l-[3px] border-madder pl-3">
          <Sentence>{`${litres(asks)} are asked of ${name}, which has ${litres(has)}.`}</Sentence>
        </p>
      ))}
      <Choice label="Into" value={where} onChoose={(chosen) => set({ where: chosen })} options={[{ value: 'new', name: 'a vessel of its own' }, { value: 'there', name: 'a batch that is there' }]} />
      {where === 'there' ? (
        <Select label="Which batch takes it" value={intoId} onChange={(event) => set({ intoId: event.target.value })} error={errors.into_batch_id ?? errors.into}>
          <option value="">Choose</option>
          {others.map((item) => (
            <option key={item.id} value={item.id}>
              {item.name}, room for {litres(Math.max(0, item.vessel_l - item.volume_l))}
            </option>
          ))}
        </Select>
      ) : (
        <div className="grid grid-cols-2 gap-3">
          <VesselFields draft={vessel} errors={errors} prefix="into" onChange={(next) => set({ vessel: next })} />
        </div>
      )}
      <p className="type-reason text-ink2">Sugar of one and yeast of the other can begin again. Leave room, keep an airlock on it, and read it by hand before it goes near a bottle.</p>
      <WhenField value={at} onType={(typed) => set({ at: typed })} now={now} timeZone={timeZone} error={errors.at} />
      <Field label="Note" autoComplete="off" maxLength={2000} value={text} onChange={(event) => set({ text: event.target.value })} />
      {failed && <FormError>{failed}</FormError>}
      <Button look="first" type="submit" className="self-end" disabled={sending}>
        {sending ? 'Saving' : 'Blended'}
      </Button>
    </form>
  );
}

'use client';

import { useState, type FormEvent } from 'react';
import { degrees, typedNumber } from '@/components/batch/figures';
import { sizeWords } from '@/components/bench/words';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field, Select, TextField } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { ClientError } from '@/lib/client/fetcher';
import { moveBottles, openBottles, usePlaces } from '@/lib/client/lots';
import type { LotBody, OPENING_KINDS } from '@/lib/contracts/lots';
import { BOTTLES } from '@/lib/core/bottling/bottles';
import { OPENING_WORDS } from './words';

type Act = (typeof OPENING_KINDS)[number] | 'moved';
const ACTS: readonly { value: Act; name: string }[] = [...(['opened', 'given', 'broken', 'gushed'] as const).map((value) => ({ value, name: OPENING_WORDS[value] })), { value: 'moved', name: 'moved' }];

/** What became of bottles: opened, given, broken, gushed, or moved to another place. */
export function Serve({ lot, onDone }: { lot: LotBody; onDone: () => void }) {
  const { places } = usePlaces();
  const stands = lot.bottles.flatMap((bottle) => bottle.stands.filter((stand) => stand.count > 0).map((stand) => ({ key: `${bottle.id}/${stand.place?.id ?? ''}`, bottle, stand })));
  const [act, setAct] = useState<Act>('opened');
  const [from, setFrom] = useState(stands[0]?.key ?? '');
  const [count, setCount] = useState('1');
  const [to, setTo] = useState('');
  const [note, setNote] = useState('');
  const [reason, setReason] = useState('');
  const [errors, setErrors] = useState<Record<string, string[]>>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const chosen = stands.find((stand) => stand.key === from) ?? stands[0];
  if (!chosen) return <p className="type-body">None is left.</p>;
  const { bottle, stand } = chosen;

  async function send(event: FormEvent) {
    event.preventDefault();
    const many = typedNumber(count);
    if (many === null || !Number.isInteger(many) || many < 1 || many > stand.count) {
      setErrors({ count: [`1 to ${stand.count}`] });
      return;
    }
    setSending(true);
    setErrors({});
    setFailed(null);
    try {
      if (act === 'moved') await moveBottles(lot.id, { bottle_id: bottle.id, from_place_id: stand.place?.id ?? null, to_place_id: to || null, count: many, override_reason: reason.trim() || null });
      else await openBottles(lot.id, { at: new Date().toISOString(), kind: act, bottle_id: bottle.id, place_id: stand.place?.id ?? null, count: many, to: act === 'given' ? to.trim() || null : null, note: note.trim() || null });
      onDone();
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      setErrors(told?.fields ?? {});
      setFailed(told?.message ?? 'It was not written down. Try again.');
      setSending(false);
    }
  }

  return (
    <form onSubmit={(event) => void send(event)} className="flex flex-col gap-3">
      <Choice
        label="what became of it"
        value={act}
        options={ACTS}
        onChoose={(value) => {
          setAct(value);
          setTo('');
        }}
      />
      {act === 'gushed' && (
        <p className="type-body border-l-[3px] border-madder pl-3">Eye protection and gloves. Move the whole lot somewhere cold, and let the gas out of every bottle outdoors, away from faces. The lot carries a caution from now on.</p>
      )}
      <Select label="which" value={chosen.key} onChange={(event) => setFrom(event.target.value)}>
        {stands.map((one) => (
          <option key={one.key} value={one.key}>
            {sizeWords(one.bottle.size_ml)} {BOTTLES[one.bottle.kind].name}, {one.stand.place?.name ?? 'no place named'}: {one.stand.count}
          </option>
        ))}
      </Select>
      <Field label="how many" inputMode="numeric" value={count} error={errors.count?.[0]} onChange={(event) => setCount(event.target.value)} />
      {act === 'given' && <Field label="to whom" value={to} maxLength={80} error={errors.to?.[0]} onChange={(event) => setTo(event.target.value)} />}
      {act === 'moved' && (
        <>
          <Select label="to" value={to} error={errors.to_place_id?.[0]} onChange={(event) => setTo(event.target.value)}>
            <option value="">no place named</option>
            {(places ?? []).filter((place) => place.id !== stand.place?.id).map((place) => (
              <option key={place.id} value={place.id}>
                {place.name}
                {place.temperature_c === null ? '' : `, up to ${degrees(place.temperature_c)}`}
                {place.capacity === null ? '' : `, room for ${Math.max(0, place.capacity - place.bottles)}`}
              </option>
            ))}
          </Select>
          {(errors.override_reason || failed) && <TextField label="why they go there all the same" value={reason} error={errors.override_reason?.[0]} onChange={(event) => setReason(event.target.value)} />}
        </>
      )}
      {act !== 'moved' && <TextField label="note" rows={2} value={note} maxLength={500} onChange={(event) => setNote(event.target.value)} />}
      {failed && <FormError>{failed}</FormError>}
      <Button type="submit" look="first" size="tall" disabled={sending} className="self-end">
        {act === 'moved' ? 'Moved' : 'Written down'}
      </Button>
    </form>
  );
}

'use client';

import { useState, type FormEvent } from 'react';
import { fromLocal, toLocal } from '@/components/batch/entry-form';
import { typedNumber } from '@/components/batch/figures';
import { Button } from '@/components/ui/Button';
import { Field, Select, TextField } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { useBatches } from '@/lib/client/batches';
import { ClientError } from '@/lib/client/fetcher';
import { createJob } from '@/lib/client/jobs';

/** A job that somebody puts on the rounds. */
export function NewJob({ now, timeZone, onDone }: { now: number; timeZone: string; onDone: () => void }) {
  const { batches } = useBatches({ state: 'working' });
  const [title, setTitle] = useState('');
  const [note, setNote] = useState('');
  const [at, setAt] = useState(() => toLocal(now + 3600, timeZone));
  const [exact, setExact] = useState('day');
  const [batch, setBatch] = useState('');
  const [repeat, setRepeat] = useState('');
  const [errors, setErrors] = useState<Record<string, string>>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);

  async function send(event: FormEvent) {
    event.preventDefault();
    const due = fromLocal(at, timeZone);
    const days = typedNumber(repeat);
    const wrong = {
      ...(title.trim() === '' ? { title: 'say what is to be done' } : {}),
      ...(due === null ? { due_at: 'choose a day and a time' } : {}),
      ...(days !== null && !(Number.isInteger(days) && days >= 1 && days <= 365) ? { repeat_days: 'must be whole days, 1 to 365' } : {}),
    };
    setErrors(wrong);
    setFailed(null);
    if (Object.keys(wrong).length > 0 || due === null) return;
    setSending(true);
    try {
      await createJob({ title: title.trim(), note: note.trim() === '' ? null : note, due_at: due, exact: exact === 'hour', batch_id: batch === '' ? null : batch, repeat_days: days });
      onDone();
    } catch (error) {
      const fields = error instanceof ClientError ? error.fields : {};
      setErrors(Object.fromEntries(Object.entries(fields).flatMap(([field, sentences]) => (sentences[0] ? [[field, sentences[0]]] : []))));
      if (Object.keys(fields).length === 0) setFailed(error instanceof ClientError ? error.message : 'It was not put down. Try again.');
      setSending(false);
    }
  }

  return (
    <form onSubmit={(event) => void send(event)} noValidate className="flex flex-col gap-4">
      <Field label="What is to be done" maxLength={120} autoComplete="off" value={title} onChange={(event) => setTitle(event.target.value)} error={errors.title} />
      <Select label="On which batch" value={batch} onChange={(event) => setBatch(event.target.value)} error={errors.batch_id}>
        <option value="">none</option>
        {(batches ?? []).map((item) => (
          <option key={item.id} value={item.id}>
            {item.tag === null ? item.name : `${item.name}, tag ${item.tag}`}
          </option>
        ))}
      </Select>
      <div className="grid grid-cols-2 gap-3">
        <Field className="col-span-full" label="Due" type="datetime-local" value={at} onChange={(event) => setAt(event.target.value)} error={errors.due_at} />
        <Select label="What counts" value={exact} onChange={(event) => setExact(event.target.value)}>
          <option value="day">the day</option>
          <option value="hour">the hour</option>
        </Select>
        <Field label="Again after" unit="days" inputMode="numeric" autoComplete="off" value={repeat} onChange={(event) => setRepeat(event.target.value)} error={errors.repeat_days} hint="Empty: once." />
      </div>
      <TextField label="Note" rows={2} maxLength={1000} value={note} onChange={(event) => setNote(event.target.value)} />
      {failed && <FormError>{failed}</FormError>}
      <div className="flex justify-end">
        <Button look="first" type="submit" disabled={sending}>
          {sending ? 'Putting it down' : 'Put it down'}
        </Button>
      </div>
    </form>
  );
}

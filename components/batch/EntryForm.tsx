'use client';

import { useId, useRef, useState, type FormEvent } from 'react';
import { Button } from '@/components/ui/Button';
import { Field, Select, TextField } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { createEntry } from '@/lib/client/entries';
import { ClientError } from '@/lib/client/fetcher';
import { NECKS } from '@/lib/core/types';
import { emptyDraft, entryOf, errorsOf, FIELDS, toLocal, type DraftErrors, type EntryDraft, type EntryKind } from './entry-form';
import { focusFirstError } from './focus';
import { NECK_WORDS } from './words';

const KINDS: { kind: EntryKind; name: string; alters: boolean }[] = [
  { kind: 'reading', name: 'Hydrometer reading', alters: false },
  { kind: 'observation', name: 'What I see', alters: false },
  { kind: 'note', name: 'Note', alters: false },
  { kind: 'neck', name: 'Change of neck', alters: false },
  { kind: 'addition', name: 'Addition', alters: true },
  { kind: 'rack', name: 'Racking', alters: true },
  { kind: 'top_up', name: 'Topping up', alters: true },
  { kind: 'stabilise', name: 'Stabilising', alters: true },
  { kind: 'pitch', name: 'Pitch', alters: true },
];

/** The save button is the person's own word for what they did. */
const DONE_WORDS: Record<EntryKind, string> = {
  reading: 'Read',
  observation: 'Seen',
  note: 'Write it down',
  neck: 'Changed',
  addition: 'Added',
  rack: 'Racked',
  top_up: 'Topped up',
  stabilise: 'Stabilised',
  pitch: 'Pitched',
};

const TEXT_LABEL: Partial<Record<EntryKind, string>> = { observation: 'What you see', note: 'Note', addition: 'What it was (yeast food, spice, acid …)' };

export interface EntryFormProps {
  batchId: string;
  kind: EntryKind;
  neck?: EntryDraft['neck'] | undefined;
  /** Seconds since 1970. */
  now: number;
  timeZone: string;
  /** May log what changes the drink. */
  mayAlter: boolean;
  onDone: () => void;
}

/** One form for all that is logged; the kind decides what it asks. */
export function EntryForm({ batchId, kind, neck = '', now, timeZone, mayAlter, onDone }: EntryFormProps) {
  const [draft, setDraft] = useState<EntryDraft>(() => ({ ...emptyDraft(kind, now, timeZone), neck }));
  const [errors, setErrors] = useState<DraftErrors>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const clientId = useRef<string | null>(null);
  const form = useId();

  const set = (field: keyof EntryDraft) => (event: { target: { value: string } }) => setDraft((before) => ({ ...before, [field]: event.target.value }));

  async function send(event: FormEvent) {
    event.preventDefault();
    clientId.current ??= crypto.randomUUID();
    const made = entryOf(draft, timeZone, clientId.current);
    setErrors(made.errors ?? {});
    setFailed(null);
    if (made.errors) {
      focusFirstError();
      return;
    }
    setSending(true);
    try {
      await createEntry(batchId, made.entry);
      onDone();
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      const fields = errorsOf(told?.fields ?? {});
      setErrors(fields);
      if (Object.keys(fields).length === 0) setFailed(told?.message ?? 'It was not saved. Try again; saving twice keeps one.');
      setSending(false);
    }
  }

  const fields: Partial<Record<keyof EntryDraft, React.ReactNode>> = {
    gravity: <Field label={draft.kind === 'addition' || draft.kind === 'top_up' ? 'Gravity of what went in' : 'Gravity as read'} unit="SG" inputMode="decimal" placeholder="1.048" autoComplete="off" value={draft.gravity} onChange={set('gravity')} error={errors.gravity} />,
    temperature: <Field label="Sample temperature" unit="°C" inputMode="decimal" autoComplete="off" value={draft.temperature} onChange={set('temperature')} error={errors.temperature} hint="The reading is corrected to 20 °C. Empty: kept as read." />,
    calibratedAt: <Field label="Hydrometer made for" unit="°C" inputMode="decimal" autoComplete="off" value={draft.calibratedAt} onChange={set('calibratedAt')} error={errors.calibratedAt} hint="Printed on it: 20, often 15.6 on older ones." />,
    volume: <Field label={draft.kind === 'addition' || draft.kind === 'top_up' ? 'Liquid that went in' : 'Volume in the vessel now'} unit="L" inputMode="decimal" autoComplete="off" value={draft.volume} onChange={set('volume')} error={errors.volume} />,
    sugar: <Field label="Sugar" unit="g" inputMode="decimal" autoComplete="off" value={draft.sugar} onChange={set('sugar')} error={errors.sugar} />,
    fruit: <Field label="Fruit or other pieces" unit="g" inputMode="decimal" autoComplete="off" value={draft.fruit} onChange={set('fruit')} error={errors.fruit} />,
    neck: (
      <Select label="The neck now" value={draft.neck} onChange={set('neck')} error={errors.neck}>
        <option value="">{draft.kind === 'neck' ? 'Choose' : 'As it was'}</option>
        {NECKS.map((name) => (
          <option key={name} value={name}>
            {NECK_WORDS[name]}
          </option>
        ))}
      </Select>
    ),
    text: <TextField label={TEXT_LABEL[draft.kind] ?? 'Note'} value={draft.text} onChange={set('text')} error={errors.text} rows={draft.kind === 'note' || draft.kind === 'observation' ? 5 : 2} maxLength={2000} />,
    at: <Field label="When" type="datetime-local" max={toLocal(now + 600, timeZone)} value={draft.at} onChange={set('at')} error={errors.at} />,
  };

  return (
    <form id={form} onSubmit={(event) => void send(event)} noValidate className="flex flex-col gap-4">
      <Select label="What happened" value={draft.kind} onChange={(event) => setDraft((before) => ({ ...before, kind: event.target.value as EntryKind }))}>
        {KINDS.filter((item) => mayAlter || !item.alters).map((item) => (
          <option key={item.kind} value={item.kind}>
            {item.name}
          </option>
        ))}
      </Select>
      <div className="grid grid-cols-2 gap-x-3 gap-y-4">
        {FIELDS[draft.kind].map((field) => (
          <div key={field} className={field === 'temperature' || field === 'calibratedAt' || field === 'sugar' || field === 'fruit' ? '' : 'col-span-2'}>
            {fields[field]}
          </div>
        ))}
      </div>
      {draft.kind === 'neck' && draft.neck === 'bung' && <p className="type-reason border-l-[3px] border-madder pl-3">Never stop a vessel that still works: the pressure can break the glass. An airlock lets the gas out.</p>}
      {draft.kind === 'stabilise' && <p className="type-reason border-l-[3px] border-ochre pl-3">Sulphite: weigh it, keep to the packet’s and your country’s limits, air the room; it harms people with asthma. Name it on the label.</p>}
      {failed && <FormError>{failed}</FormError>}
      <div className="flex justify-end gap-2">
        <Button look="first" type="submit" disabled={sending}>
          {sending ? 'Saving' : DONE_WORDS[draft.kind]}
        </Button>
      </div>
    </form>
  );
}

'use client';

import { useId, useRef, useState, type FormEvent } from 'react';
import { Button } from '@/components/ui/Button';
import { Select } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { createEntry, updateEntry } from '@/lib/client/entries';
import { ClientError } from '@/lib/client/fetcher';
import { focusFirstError } from '@/lib/client/focus';
import type { EntryBody } from '@/lib/contracts/batches';
import { correctionOf, draftOfEntry, emptyDraft, entryOf, errorsOf, toLocal, type DraftErrors, type EntryDraft, type EntryKind } from './entry-form';
import { EntryFields } from './EntryFields';
import type { MustKnown } from './refractometer';

const KINDS: { kind: EntryKind; name: string; alters: boolean }[] = [
  { kind: 'reading', name: 'Gravity reading', alters: false },
  { kind: 'observation', name: 'Looked, smelled, tasted', alters: false },
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
  overrule: 'Overruled',
};

/** What is told before it is done, where it could hurt somebody or the batch. */
function cautionOf(draft: EntryDraft): { text: string; grave: boolean } | null {
  if (draft.kind === 'neck' && draft.neck === 'bung') return { text: 'Never stop a vessel that still works: the pressure can break the glass. An airlock lets the gas out.', grave: true };
  const sulphite = draft.kind === 'stabilise' || (draft.kind === 'addition' && draft.substance === 'sulphite');
  if (sulphite) return { text: 'Sulphite: weigh it, keep to the packet’s and your country’s limits, air the room; it harms people with asthma. Name it on the label.', grave: false };
  if (draft.kind === 'addition' && (draft.substance === 'sugar' || draft.substance === 'honey' || draft.substance === 'fruit')) return { text: 'A drink full of gas foams over when it goes in: add it slowly and leave room.', grave: false };
  return null;
}

export interface EntryFormProps {
  batchId: string;
  kind: EntryKind;
  neck?: EntryDraft['neck'] | undefined;
  /** The line to be corrected; absent: a new one. */
  entry?: EntryBody | undefined;
  known: MustKnown;
  /** Seconds since 1970. */
  now: number;
  timeZone: string;
  /** May log what changes the drink. */
  mayAlter: boolean;
  onDone: () => void;
}

/** One form for all that is logged, and for its correction; the kind decides what it asks. */
export function EntryForm({ batchId, kind, neck = '', entry, known, now, timeZone, mayAlter, onDone }: EntryFormProps) {
  const [draft, setDraft] = useState<EntryDraft>(() => (entry ? draftOfEntry(entry, kind, timeZone) : { ...emptyDraft(kind, now, timeZone), neck }));
  const [errors, setErrors] = useState<DraftErrors>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const clientId = useRef<string | null>(null);
  const form = useId();
  const change = (part: Partial<EntryDraft>) => setDraft((before) => ({ ...before, ...part }));
  const caution = cautionOf(draft);

  /** Null: there is something wrong with it. */
  function request(): (() => Promise<unknown>) | null {
    if (entry) {
      const made = correctionOf(draft, entry, timeZone);
      setErrors(made.errors ?? {});
      if (made.errors) return null;
      const { change: correction } = made;
      return correction ? () => updateEntry(batchId, entry.id, correction) : () => Promise.resolve();
    }
    clientId.current ??= crypto.randomUUID();
    const made = entryOf(draft, timeZone, clientId.current);
    setErrors(made.errors ?? {});
    if (made.errors) return null;
    // Of several lines in one minute the last stays the last.
    const exact = new Date().toISOString();
    const logged = exact.slice(0, 16) === made.entry.at.slice(0, 16) ? { ...made.entry, at: exact } : made.entry;
    return () => createEntry(batchId, logged);
  }

  async function send(event: FormEvent) {
    event.preventDefault();
    setFailed(null);
    const act = request();
    if (!act) {
      focusFirstError();
      return;
    }
    setSending(true);
    try {
      await act();
      onDone();
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      const fields = errorsOf(told?.fields ?? {});
      setErrors(fields);
      if (Object.keys(fields).length === 0) setFailed(told?.message ?? 'It was not saved. Try again; saving twice keeps one.');
      else focusFirstError();
      setSending(false);
    }
  }

  return (
    <form id={form} onSubmit={(event) => void send(event)} noValidate className="flex flex-col gap-4">
      {!entry && (
        <Select label="What happened" value={draft.kind} onChange={(event) => change({ kind: event.target.value as EntryKind })}>
          {KINDS.filter((item) => mayAlter || !item.alters).map((item) => (
            <option key={item.kind} value={item.kind}>
              {item.name}
            </option>
          ))}
        </Select>
      )}
      <EntryFields draft={draft} errors={errors} latest={toLocal(now + 600, timeZone)} known={known} onChange={change} />
      {caution && <p className={`type-reason border-l-[3px] pl-3 ${caution.grave ? 'border-madder' : 'border-ochre'}`}>{caution.text}</p>}
      {failed && <FormError>{failed}</FormError>}
      {/* Stays under the thumb however long the form is. */}
      <div className="sticky bottom-0 -mx-(--margin) flex justify-end gap-2 border-t bg-sheet px-(--margin) py-3 max-strip:[&>*]:flex-1">
        <Button look="first" type="submit" disabled={sending}>
          {sending ? 'Saving' : entry ? 'Correct it' : DONE_WORDS[draft.kind]}
        </Button>
      </div>
    </form>
  );
}

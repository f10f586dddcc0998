'use client';

import { useRouter } from 'next/navigation';
import { useState, type FormEvent } from 'react';
import { Button } from '@/components/ui/Button';
import { Field, TextField } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { ClientError } from '@/lib/client/fetcher';
import { copyMust } from '@/lib/client/musts';
import type { MustBody } from '@/lib/contracts/musts';
import { checked, type SheetDraft } from './draft';

/** A sheet of its own, with the one change noted. What was changed on the page goes with it. */
export function CopyForm({ must, draft, changed }: { must: MustBody; draft: SheetDraft; changed: boolean }) {
  const router = useRouter();
  const [name, setName] = useState(`${must.sheet.name}, again`.slice(0, 80));
  const [note, setNote] = useState(must.next_time[0]?.note ?? '');
  const [failed, setFailed] = useState<string | null>(null);
  const [noteError, setNoteError] = useState<string | undefined>();
  const [sending, setSending] = useState(false);

  async function copy(event: FormEvent) {
    event.preventDefault();
    if (note.trim() === '') return setNoteError('say what is different, or why it is made again');
    setNoteError(undefined);
    const made = changed ? checked({ ...draft, name }) : null;
    if (made?.errors) return setFailed('A line of the sheet is not filled in yet.');
    setSending(true);
    try {
      const copied = await copyMust(must.id, { name, version: must.version, change_note: note, ...(made ? { sheet: made.sheet } : {}) });
      router.push(`/musts/${copied.id}`);
    } catch (error) {
      setFailed(error instanceof ClientError ? error.message : 'It was not copied. Try again.');
      setSending(false);
    }
  }

  return (
    <form onSubmit={(event) => void copy(event)} noValidate className="flex flex-col gap-4">
      <Field label="Name of the copy" maxLength={80} autoComplete="off" value={name} onChange={(event) => setName(event.target.value)} />
      <TextField label="The one change" maxLength={500} value={note} onChange={(event) => setNote(event.target.value)} error={noteError} hint={changed ? 'The amounts as they stand on the page go with it.' : 'Less of the spice, another yeast: change it in the copy.'} />
      {failed && <FormError>{failed}</FormError>}
      <div className="flex justify-end">
        <Button look="first" type="submit" disabled={sending}>
          {sending ? 'Copying' : 'Copy it'}
        </Button>
      </div>
    </form>
  );
}

'use client';

import { useRef, useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Select } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { useAct } from '@/components/ui/use-act';
import { ARCHIVE_LIMIT_BYTES, IMPORT_LIMIT_BYTES, type ImportPreviewBody } from '@/lib/contracts/imports';
import { useBatches } from '@/lib/client/batches';
import { keepFile, lookAtFile, useImports } from '@/lib/client/imports';
import { ClientError } from '@/lib/client/fetcher';
import { Preview, type Chosen } from './Preview';
import { countWords } from './words';

type Kind = 'readings' | 'batches' | 'archive';
const KINDS: readonly { value: Kind; name: string }[] = [
  { value: 'readings', name: 'Readings' },
  { value: 'batches', name: 'Old batches' },
  { value: 'archive', name: 'Archive' },
];
const SAYS: Record<Kind, string> = {
  readings: 'A CSV that a logger wrote: a time and a gravity in each line, temperature where there is one.',
  batches: 'A CSV with a line for each batch you made before: name, dates, gravities, litres, notes.',
  archive: 'The JSON that this page saves, of this house or another. It comes in beside what is here.',
};

type Looked = { file: { file_name: string; text: string }; preview: ImportPreviewBody };
/** What the server is asked with; the answer's choices unless a person chose otherwise. */
const choicesOf = ({ columns, gravity_unit, temperature_unit, time_zone, date_order }: ImportPreviewBody): Chosen => ({ columns, gravity_unit, temperature_unit, time_zone, date_order });

function formOf(kind: Kind, file: Looked['file'], chosen: Chosen | null, batch: string): Record<string, unknown> {
  const into = kind === 'readings' && batch !== '' ? { batch_id: batch } : {};
  if (kind === 'archive' || !chosen) return { kind, ...file, ...into };
  const { columns, time_zone, date_order } = chosen;
  return { kind, ...file, ...into, columns, time_zone, date_order, ...(kind === 'readings' && { gravity_unit: chosen.gravity_unit ?? undefined, temperature_unit: chosen.temperature_unit ?? undefined }) };
}

/** Choose a file, look at what it would bring, set it right, keep it. */
export function ImportFile() {
  const { batches } = useBatches({});
  const [kind, setKind] = useState<Kind>('readings');
  const [looked, setLooked] = useState<Looked | null>(null);
  const [batch, setBatch] = useState('');
  const [done, setDone] = useState<{ id: string; says: string } | null>(null);
  const { imports } = useImports();
  // What was taken out again is kept no more.
  const kept = done !== null && !imports?.some(({ id, undone_at }) => id === done.id && undone_at !== null) ? done.says : null;
  const { busy, failed, fields, act } = useAct('The file was not read. Try again.');
  const input = useRef<HTMLInputElement>(null);

  // Of two looks at a file the later one counts, whichever is answered first.
  const looks = useRef(0);

  const look = (file: Looked['file'], chosen: Chosen | null, as = kind, into = batch) =>
    act(async () => {
      looks.current += 1;
      const mine = looks.current;
      // What is chosen stands at once: the next choice, made before the answer, goes beside it.
      if (chosen) setLooked((before) => before && { file, preview: { ...before.preview, ...chosen, notes: [] } });
      // The server's schema checks the whole of it; the union is told apart by its kind.
      const preview = await lookAtFile(formOf(as, file, chosen, into) as Parameters<typeof lookAtFile>[0]);
      if (mine === looks.current) setLooked({ file, preview });
    });

  async function choose(files: FileList | null) {
    const file = files?.[0];
    if (!file) return;
    setDone(null);
    setLooked(null);
    looks.current += 1;
    await act(async () => {
      const limit = kind === 'archive' ? ARCHIVE_LIMIT_BYTES : IMPORT_LIMIT_BYTES;
      if (file.size > limit) throw new ClientError(413, 'too-large', `${file.name} is larger than ${limit / 1e6} MB. ${kind === 'archive' ? 'Take it out batch by batch, or use a backup.' : 'Cut it in parts.'}`);
      const given = { file_name: file.name.slice(0, 120), text: await file.text() };
      setLooked({ file: given, preview: await lookAtFile(formOf(kind, given, null, batch) as Parameters<typeof lookAtFile>[0]) });
    });
    if (input.current) input.current.value = '';
  }

  async function keep() {
    if (!looked) return;
    const form = formOf(kind, looked.file, choicesOf(looked.preview), batch);
    await act(async () => {
      const kept = await keepFile(form as Parameters<typeof keepFile>[0]);
      setDone({ id: kept.id, says: `Kept: ${countWords(kept.counts)}.` });
      setLooked(null);
    });
  }

  return (
    <section aria-label="Bring in">
      <GroupBar word="Bring in" note="nothing is kept until you say so" />
      <div className="flex flex-col gap-3 border-b bg-desk px-(--margin) py-4">
        {failed && <FormError>{fields.text ? `The file ${fields.text}.` : failed}</FormError>}
        <Choice
          label="what it holds"
          value={kind}
          onChoose={(value) => {
            setKind(value);
            setDone(null);
            if (looked) void look(looked.file, null, value).then((read) => read || setLooked(null));
          }}
          options={KINDS}
          className="max-w-[460px]"
        />
        <p className="type-reason -mt-1.5 text-ink2">{SAYS[kind]}</p>
        <label className="type-label flex flex-col items-start gap-1 text-ink2">
          file
          <input ref={input} type="file" accept={kind === 'archive' ? '.json,application/json' : '.csv,.tsv,.txt,text/csv'} disabled={busy} onChange={(event) => void choose(event.target.files)} className="font-mono text-[0.8125rem] text-ink file:mr-3 file:min-h-9 file:rounded file:border-[1.5px] file:border-ink file:bg-lit file:px-3 file:font-semibold" />
        </label>
        <span role="status" className="type-label text-ink">
          {busy ? 'reading the file' : kept}
        </span>
      </div>
      {looked && (
        <>
          <Preview preview={looked.preview} onChoose={(chosen) => void look(looked.file, chosen)} />
          <div className="flex flex-wrap items-end gap-3 border-b bg-desk px-(--margin) py-4">
            {kind === 'readings' && (
              <Select
                label="into"
                value={batch}
                onChange={(event) => {
                  setBatch(event.target.value);
                  void look(looked.file, choicesOf(looked.preview), kind, event.target.value);
                }}
                error={fields.batch_id}
                className="min-w-56"
              >
                <option value="">choose a batch</option>
                {(batches ?? []).map((item) => (
                  <option key={item.id} value={item.id}>
                    {item.name}
                  </option>
                ))}
              </Select>
            )}
            {kind === 'readings' && (
              <div role="status" className="order-last basis-full empty:hidden">
                {looked.preview.notes.map((note) => (
                  <div key={note}>
                    <State state="Check" word="Before the pitch" />
                    <p className="type-reason max-w-[70ch] break-words">
                      <Sentence>{note}</Sentence>
                    </p>
                  </div>
                ))}
              </div>
            )}
            <Button look="first" disabled={busy || looked.preview.good === 0 || (kind === 'readings' && batch === '')} onClick={() => void keep()}>
              Keep {countWords({ [kind === 'readings' ? 'readings' : 'batches']: looked.preview.good })}
            </Button>
            <Button
              onClick={() => {
                looks.current += 1;
                setLooked(null);
              }}
            >
              Leave it
            </Button>
          </div>
        </>
      )}
    </section>
  );
}

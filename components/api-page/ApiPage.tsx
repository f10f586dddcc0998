'use client';

import { useEffect, useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { ErrorState } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { ClientError, getJson } from '@/lib/client/fetcher';
import { groupOf, operationsOf, type Operation } from './description';
import { TryIt } from './TryIt';

function Call({ operation }: { operation: Operation }) {
  const [open, setOpen] = useState(false);
  return (
    <li className="border-b border-rule">
      <button type="button" aria-expanded={open} onClick={() => setOpen(!open)} className="grid min-h-11 w-full grid-cols-[5.25rem_minmax(0,1fr)] items-baseline gap-x-3 px-(--margin) py-2 text-left hover:bg-lit strip:grid-cols-[5.25rem_minmax(0,24rem)_minmax(0,1fr)]">
        <span className="opens whitespace-nowrap font-mono text-[0.75rem] font-bold">{operation.method}</span>
        <span className="min-w-0 break-all font-mono text-[0.8125rem]">{operation.path.replace('/api/v1', '')}</span>
        <span className="type-body text-ink2 max-strip:col-start-2">{operation.summary}</span>
      </button>
      {open && <TryIt operation={operation} />}
    </li>
  );
}

/** The web API, made from the description that programs read: to find a call, read it and try it as oneself. */
export function ApiPage() {
  const [operations, setOperations] = useState<Operation[] | null>(null);
  const [failed, setFailed] = useState<string | null>(null);
  const [wanted, setWanted] = useState('');
  const [turn, setTurn] = useState(0);
  useEffect(() => {
    let gone = false;
    getJson<Parameters<typeof operationsOf>[0]>('/openapi.json').then(
      (description) => !gone && setOperations(operationsOf(description)),
      (error: unknown) => !gone && setFailed(error instanceof ClientError ? error.message : 'The description did not load.'),
    );
    return () => {
      gone = true;
    };
  }, [turn]);

  if (failed && !operations) {
    return (
      <ErrorState
        title="The description did not load"
        onRetry={() => {
          setFailed(null);
          setTurn(turn + 1);
        }}
      >
        {failed}
      </ErrorState>
    );
  }
  if (!operations) return <Haze height={160} label="Loading the description" className="m-(--margin)" />;
  const words = wanted.toLowerCase().split(/\s+/).filter(Boolean);
  const shown = operations.filter((operation) => words.every((word) => `${operation.method} ${operation.path} ${operation.summary} ${operation.id}`.toLowerCase().includes(word)));
  const groups = [...new Set(shown.map((operation) => groupOf(operation.path)))].sort();
  return (
    <>
      <div className="flex flex-wrap items-end gap-4 border-b bg-desk px-(--margin) py-4">
        <Field label="find a call" value={wanted} onChange={(event) => setWanted(event.target.value)} className="w-72" autoComplete="off" />
        <p className="type-body max-w-[64ch] flex-1 text-ink2">
          Programs send <code className="font-mono text-[0.8125rem]">Authorization: Bearer fbt_…</code> with a token of yours. The whole description for their tools:{' '}
          <a href="/api/v1/openapi.json" className="underline underline-offset-2">
            openapi.json
          </a>
          .
        </p>
        {wanted !== '' && (
          <Button size="lane" onClick={() => setWanted('')}>
            All of them
          </Button>
        )}
      </div>
      {shown.length === 0 && <p className="type-body px-(--margin) py-3 text-ink2">No call has these words.</p>}
      {groups.map((group) => (
        <section key={group} aria-label={group}>
          <GroupBar word={group} note={String(shown.filter((operation) => groupOf(operation.path) === group).length)} />
          <ul>
            {shown
              .filter((operation) => groupOf(operation.path) === group)
              .map((operation) => (
                <Call key={operation.id} operation={operation} />
              ))}
          </ul>
        </section>
      ))}
    </>
  );
}

'use client';

import { useState } from 'react';
import { dayName } from '@/components/charts/zone';
import { useAct } from '@/components/ui/use-act';
import { Button } from '@/components/ui/Button';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { undoImport, useImports } from '@/lib/client/imports';
import { useMe } from '@/lib/client/me';
import { countWords } from './words';

/** What was brought in, each to be taken out again in one step. */
export function Imports() {
  const { me } = useMe();
  const { imports, error, retry } = useImports();
  const { busy, failed, act } = useAct('It was not taken out. Try again.');
  const [sure, setSure] = useState<string | null>(null);
  const day = (at: string) => dayName(Date.parse(at) / 1000, me?.cellar.time_zone ?? 'UTC');
  if (error && !imports)
    return (
      <section aria-label="Brought in">
        <GroupBar word="Brought in" />
        <ErrorState title="What was brought in did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      </section>
    );
  if (!imports || imports.length === 0) return null;
  return (
    <section aria-label="Brought in">
      <GroupBar word="Brought in" note="taken out again in one step" />
      {failed && <FormError>{failed}</FormError>}
      <ul>
        {imports.map((item) => (
          <li key={item.id} className={`flex flex-wrap items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2 ${item.undone_at ? 'text-ink3' : ''}`}>
            <span className="min-w-0 flex-1">
              <span className="type-body block break-words">
                <b className="font-semibold">{item.file_name}</b>
                {item.batch && ` into ${item.batch.name}`}
              </span>
              <span className="type-label text-ink2">
                {countWords(item.counts)}; {day(item.created_at)}
                {item.by && `, ${item.by}`}
                {item.undone_at && `; taken out ${day(item.undone_at)}`}
              </span>
            </span>
            {!item.undone_at &&
              (sure === item.id ? (
                <span className="flex gap-2">
                  <Button size="lane" look="final" disabled={busy} onClick={() => void act(() => undoImport(item.id)).then(() => setSure(null))}>
                    Take all of it out
                  </Button>
                  <Button size="lane" onClick={() => setSure(null)}>
                    Leave it
                  </Button>
                </span>
              ) : (
                <Button size="lane" look="quiet" onClick={() => setSure(item.id)}>
                  Take out
                </Button>
              ))}
          </li>
        ))}
      </ul>
    </section>
  );
}

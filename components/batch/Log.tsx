'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { FilterTabs } from '@/components/ui/FilterTabs';
import { Haze } from '@/components/ui/Haze';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { ClientError } from '@/lib/client/fetcher';
import { removeEntry } from '@/lib/client/entries';
import { LogIcon, LOG_KIND_WORDS } from './icons';
import { filtered, LOG_FILTERS, logTime, type LogFilter, type LogRow } from './log';

const FILTER_WORDS: Record<LogFilter, string> = { all: 'All', readings: 'Readings', additions: 'Changes', notes: 'Notes', calls: 'Calls' };

/** Rows shown before `Show all`: a long log does not push everything else away. */
const FIRST = 25;

function TakeBack({ batchId, entryId }: { batchId: string; entryId: string }) {
  const [asked, setAsked] = useState(false);
  const [failed, setFailed] = useState<string | null>(null);
  if (!asked) {
    return (
      <button type="button" className="type-tick min-h-6 text-ink3 underline decoration-rule2 underline-offset-2 hover:text-ink max-strip:min-h-11" onClick={() => setAsked(true)}>
        take back
      </button>
    );
  }
  return (
    <span className="flex flex-wrap items-center justify-end gap-2">
      {failed && <FormError>{failed}</FormError>}
      <Button size="lane" look="final" onClick={() => void removeEntry(batchId, entryId).catch((error: unknown) => setFailed(error instanceof ClientError ? error.message : 'It is still there. Try again.'))}>
        Take it back
      </Button>
      <Button size="lane" look="quiet" onClick={() => setAsked(false)}>
        Keep it
      </Button>
    </span>
  );
}

function Row({ row, batchId, now, timeZone }: { row: LogRow; batchId: string; now: number; timeZone: string }) {
  return (
    <li className="arrives grid grid-cols-[22px_minmax(0,1fr)_auto] items-baseline gap-x-2 gap-y-0.5 border-b border-rule py-[7px] strip:grid-cols-[98px_22px_minmax(0,1fr)_auto_52px_92px]">
      <span className="row-start-1 translate-y-[3px] strip:col-start-2">
        <LogIcon kind={row.kind} />
        <span className="heard-only">{LOG_KIND_WORDS[row.kind]}</span>
      </span>
      <span className="type-label row-start-1 text-[0.71875rem] text-ink2 strip:col-start-1">
        {logTime(row.at, now, timeZone)}
        <span className="strip:hidden">, {row.who}</span>
      </span>
      <p className="type-body min-w-0 break-words max-strip:col-start-2 max-strip:row-start-2 strip:col-start-3">
        {row.text !== '' && <Sentence>{row.text}</Sentence>}
        {row.text !== '' && row.own !== null && ' '}
        {row.own !== null && (
          <span className="whitespace-pre-line">
            <Sentence>{row.own}</Sentence>
          </span>
        )}
      </p>
      <span className="justify-self-end max-strip:col-start-3 max-strip:row-start-2 strip:col-start-4">{row.mine && <TakeBack batchId={batchId} entryId={row.id} />}</span>
      <span className="row-start-1 text-right font-mono text-[0.84375rem] font-semibold max-strip:col-start-3 strip:col-start-5">{row.figure}</span>
      <span className="type-label truncate text-[0.71875rem] text-ink2 max-strip:hidden strip:col-start-6 strip:text-right" title={row.who}>
        {row.who}
      </span>
    </li>
  );
}

interface LogProps {
  batchId: string;
  /** Null: on their way. */
  rows: readonly LogRow[] | null;
  now: number;
  timeZone: string;
  /** Opens the form; absent for those who may not write. */
  onWrite: (() => void) | null;
}

/** All that happened, newest first. */
export function Log({ batchId, rows, now, timeZone, onWrite }: LogProps) {
  const [filter, setFilter] = useState<LogFilter>('all');
  const [all, setAll] = useState(false);
  const shown = filtered(rows ?? [], filter);
  const cut = all ? shown : shown.slice(0, FIRST);
  return (
    <section aria-label="Log" className="px-(--margin) pb-6 pt-3">
      <div className="flex flex-wrap items-center gap-x-5 gap-y-2 border-b-[1.5px] border-ink pb-2.5">
        <h2 className="type-sub">Log</h2>
        <FilterTabs label="Show" value={filter} onChoose={setFilter} tabs={LOG_FILTERS.map((value) => ({ value, name: FILTER_WORDS[value], count: rows ? filtered(rows, value).length : undefined }))} />
        {onWrite && (
          <Button look="first" onClick={onWrite} className="ml-auto max-strip:w-full">
            Write in the log
          </Button>
        )}
      </div>
      {rows === null ? (
        <Haze height={90} className="mt-3" label="Loading the log" />
      ) : shown.length === 0 ? (
        <p className="type-body border-b border-rule py-4 text-ink2">{filter === 'all' ? 'Nothing logged yet. The pitch is a good first line.' : 'Nothing of this kind yet.'}</p>
      ) : (
        <ol>
          {cut.map((row) => (
            <Row key={row.id} row={row} batchId={batchId} now={now} timeZone={timeZone} />
          ))}
        </ol>
      )}
      {cut.length < shown.length && (
        <Button look="quiet" className="mt-3" onClick={() => setAll(true)}>
          Show all {shown.length}
        </Button>
      )}
    </section>
  );
}

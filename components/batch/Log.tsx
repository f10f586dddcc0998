'use client';

import { useState } from 'react';
import { WaitingRows } from '@/components/offline/WaitingRows';
import { AddPhoto, Photos } from '@/components/photos/Photos';
import { Button } from '@/components/ui/Button';
import { FilterTabs } from '@/components/ui/FilterTabs';
import { Haze } from '@/components/ui/Haze';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { ClientError } from '@/lib/client/fetcher';
import { removeEntry, useRevisions } from '@/lib/client/entries';
import { LOGGED_KINDS, type EntryBody } from '@/lib/contracts/batches';
import { partOfWork } from '@/lib/contracts/work';
import { LogIcon, LOG_KIND_WORDS } from './icons';
import { How } from '@/components/ui/How';
import { howOfEntry } from './entry-words';
import { filtered, LOG_FILTERS, logTime, type LogFilter, type LogRow } from './log';
import { correctionsOf } from './revisions';

const FILTER_WORDS: Record<LogFilter, string> = { all: 'All', readings: 'Readings', additions: 'Changes', notes: 'Notes', calls: 'Calls' };

const isLogged = (kind: EntryBody['kind']) => (LOGGED_KINDS as readonly string[]).includes(kind);

/** Rows shown before `Show all`: a long log does not push everything else away. */
const FIRST = 25;

const SMALL = 'type-tick min-h-6 text-ink3 underline decoration-rule2 underline-offset-2 hover:text-ink max-strip:min-h-11';

function TakeBack({ batchId, entryId }: { batchId: string; entryId: string }) {
  const [asked, setAsked] = useState(false);
  const [failed, setFailed] = useState<string | null>(null);
  if (!asked) {
    return (
      <button type="button" className={SMALL} onClick={() => setAsked(true)}>
        take back
      </button>
    );
  }
  return (
    <span data-asked className="flex flex-wrap items-center justify-end gap-2">
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

/** What a line said before, correction by correction. */
function Corrections({ entry, now, timeZone }: { entry: EntryBody; now: number; timeZone: string }) {
  const { revisions, error, retry } = useRevisions(entry.batch_id, entry.id);
  if (error) {
    return (
      <p className="type-label text-ink2">
        What it said before could not be read. <button type="button" className={SMALL} onClick={retry}>try again</button>
      </p>
    );
  }
  if (!revisions) return <Haze height={24} label="Loading what it said before" />;
  return (
    <ol className="flex flex-col gap-1 border-l-[3px] border-rule2 py-1 pl-3">
      {correctionsOf(entry, revisions, now, timeZone).map((correction, index) => (
        <li key={index} className="type-label text-ink2">
          <span className="font-bold text-ink">{correction.at}</span>, {correction.by}:{' '}
          {correction.changes.map(({ name, before, after }) => `${name} ${before} → ${after}`).join('; ')}
        </li>
      ))}
    </ol>
  );
}

interface RowProps {
  row: LogRow;
  batchId: string;
  now: number;
  timeZone: string;
  onCorrect: (entry: EntryBody) => void;
}

function Row({ row, batchId, now, timeZone, onCorrect }: RowProps) {
  const [before, setBefore] = useState(false);
  const { entry } = row;
  return (
    <li className="arrives grid grid-cols-[22px_minmax(0,1fr)_auto] items-baseline gap-x-2 gap-y-0.5 border-b border-rule py-[7px] strip:grid-cols-[98px_22px_minmax(0,1fr)_auto_68px_92px]">
      <span className="row-start-1 translate-y-[3px] strip:col-start-2">
        <LogIcon kind={row.kind} />
        <span className="heard-only">{LOG_KIND_WORDS[row.kind]}</span>
      </span>
      <span className="type-label row-start-1 text-[0.71875rem] text-ink2 strip:col-start-1">
        {logTime(row.at, now, timeZone)}
        <span className="strip:hidden">, {row.who}</span>
      </span>
      <div className="min-w-0 max-strip:col-span-2 max-strip:col-start-2 max-strip:row-start-2 strip:col-start-3">
        <p className="type-body break-words">
          {row.text !== '' && <Sentence>{row.text}</Sentence>}
          {row.text !== '' && row.own !== null && ' '}
          {row.own !== null && (
            <span className="whitespace-pre-line">
              <Sentence>{row.own}</Sentence>
            </span>
          )}
        </p>
        {entry && howOfEntry(entry) && <How how={howOfEntry(entry)!} of={`gravity ${row.figure ?? ''}, ${logTime(row.at, now, timeZone)}`} />}
        {entry?.revised && (
          <button type="button" aria-expanded={before} className={SMALL} onClick={() => setBefore(!before)}>
            {before ? 'corrected: put it away' : 'corrected'}
          </button>
        )}
        {entry && <Photos adding={false} place={{ batch: batchId }} on={{ entry: entry.id }} />}
        {entry && before && <Corrections entry={entry} now={now} timeZone={timeZone} />}
      </div>
      <span className="not-printed flex flex-wrap items-center justify-end gap-x-3 justify-self-end max-strip:col-span-2 max-strip:col-start-2 max-strip:row-start-3 max-strip:gap-x-5 strip:col-start-4">
        {entry && <AddPhoto place={{ batch: batchId }} on={{ entry: entry.id }} />}
        {row.mine && entry && isLogged(entry.kind) && (
          <button type="button" className={SMALL} onClick={() => onCorrect(entry)}>
            correct
          </button>
        )}
        {row.mine && !(entry && partOfWork(entry)) && <TakeBack batchId={batchId} entryId={row.id} />}
      </span>
      <span className="row-start-1 whitespace-nowrap text-right font-mono text-[0.84375rem] font-semibold max-strip:col-start-3 strip:col-start-5">{row.figure}</span>
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
  /** Opens the form with a line that is there. */
  onCorrect: (entry: EntryBody) => void;
}

/** All that happened, newest first. */
export function Log({ batchId, rows, now, timeZone, onWrite, onCorrect }: LogProps) {
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
      <WaitingRows batchId={batchId} now={now} timeZone={timeZone} />
      {rows === null ? (
        <Haze height={90} className="mt-3" label="Loading the log" />
      ) : shown.length === 0 ? (
        <p className="type-body border-b border-rule py-4 text-ink2">{filter === 'all' ? 'Nothing logged yet. The pitch is a good first line.' : 'Nothing of this kind yet.'}</p>
      ) : (
        <ol>
          {cut.map((row) => (
            <Row key={row.id} row={row} batchId={batchId} now={now} timeZone={timeZone} onCorrect={onCorrect} />
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

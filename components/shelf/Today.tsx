'use client';

import Link from 'next/link';
import { useState } from 'react';
import { clock, dayName } from '@/components/charts/zone';
import type { Ticks } from '@/components/rounds/use-ticks';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { Sentence } from '@/components/ui/Sentence';
import { ClientError } from '@/lib/client/fetcher';
import { takeJob } from '@/lib/client/jobs';
import type { TodayJob } from './jobs';

interface TodayProps {
  jobs: readonly TodayJob[];
  ticks: Ticks;
  /** Said when there is nothing to do; for a guest, who the rounds are for. */
  nothing: string;
  now: number;
  timeZone: string;
  mayDo: boolean;
  loading: boolean;
}

const SHOWN = 5;
const SHOWN_ON_PHONE = 2;

const firstName = (name: string) => name.trim().split(/\s+/)[0] ?? name;
const tagOf = ({ job }: TodayJob) => job.batch?.tag ?? null;

function JobBox({ row, ticks, mayDo }: { row: TodayJob; ticks: Ticks; mayDo: boolean }) {
  const done = ticks.ticked.has(row.job.id);
  return <Box ticked={done} disabled={!mayDo} label={done ? `Take back: ${row.job.title}` : `Done: ${row.job.title}`} onTick={(on) => (on ? ticks.tick(row.job) : ticks.untick(row.job))} className="max-strip:pt-2.5" />;
}

function JobTime({ row, children }: { row: TodayJob; children?: React.ReactNode }) {
  return (
    <p className="type-label text-ink2">
      <span className={row.late ? 'text-madder' : 'text-ink'} style={{ fontWeight: 700 }}>
        {row.time}
      </span>{' '}
      {row.note}
      {children}
    </p>
  );
}

function JobName({ row, done }: { row: TodayJob; done: boolean }) {
  const { job } = row;
  return (
    <Link href={job.batch ? `/batches/${job.batch.id}` : '/rounds'} className={`two-lines py-px text-[0.96875rem]/[1.3125rem] font-[480] no-underline hover:underline ${done ? 'text-ink2 line-through' : 'text-ink'}`} title={job.title}>
      {job.title}
    </Link>
  );
}

/** Takes a job in hand, its alert with it. */
function useTake(ticks: Ticks) {
  const [taking, setTaking] = useState<string | null>(null);
  const take = (row: TodayJob) => {
    setTaking(row.job.id);
    takeJob(row.job.id)
      .catch((error: unknown) => ticks.fail(`${row.job.title} was not taken. ${error instanceof ClientError ? error.message : 'Try again.'}`))
      .finally(() => setTaking(null));
  };
  return { taking, take };
}

function JobWho({ row, ticks, mayDo }: { row: TodayJob; ticks: Ticks; mayDo: boolean }) {
  const { taking, take } = useTake(ticks);
  const { job, late } = row;
  const tag = tagOf(row) === null ? '' : `tag ${tagOf(row)} · `;
  if (ticks.ticked.has(job.id)) {
    return (
      <p role="status" className="type-label text-ink2">
        {ticks.saved.has(job.id) || ticks.waiting.has(job.id) ? (
          <>
            {ticks.saved.has(job.id) ? 'done.' : 'done, waits to be sent.'}{' '}
            <button type="button" className="underline underline-offset-2" onClick={() => ticks.untick(job)}>
              take it back
            </button>
          </>
        ) : (
          'saving'
        )}
      </p>
    );
  }
  if (taking === job.id) return <p className="type-label text-ink2">{tag}taking it</p>;
  if (job.taken_by) return <p className="type-label truncate text-ink2">{`${tag}${firstName(job.taken_by.name)} has it`}</p>;
  return (
    <p className={`type-label ${late ? 'text-madder' : 'text-ink2'}`} style={{ fontWeight: late ? 600 : 500 }}>
      {tag}nobody
      {mayDo && (
        <>
          ,{' '}
          <button type="button" className="underline underline-offset-2" onClick={() => take(row)} aria-label={`take it: ${job.title}`}>
            take it
          </button>
        </>
      )}
    </p>
  );
}

/** `2 to do, 1 in hand` */
function countWords(jobs: readonly TodayJob[], ticks: Ticks): string {
  const left = jobs.filter((row) => !ticks.ticked.has(row.job.id));
  const taken = left.filter((row) => row.job.taken_by !== null).length;
  const open = left.length - taken;
  return [open > 0 ? `${open} to do` : null, taken > 0 ? `${taken} in hand` : null].filter((part) => part !== null).join(', ');
}

/** The day's rounds above the lanes: late ones first, in madder with the word. */
export function Today({ jobs, ticks, nothing, now, timeZone, mayDo, loading }: TodayProps) {
  const shown = jobs.slice(0, SHOWN);
  const more = jobs.length - shown.length;
  return (
    <section aria-labelledby="today" className="grid min-h-20 border-b bg-desk max-wide:grid-cols-2 wide:grid-cols-[200px_repeat(5,minmax(0,1fr))]">
      <div className="flex flex-col justify-center py-1.5 pl-(--margin) pr-3 max-wide:col-span-full">
        <h2 id="today" className="mb-0.5 text-[1.4375rem]/[1.625rem] font-[780]">
          Today
        </h2>
        <p className="type-label leading-5! text-ink2">
          {dayName(now, timeZone)}, {clock(now, timeZone)}
        </p>
        <p className="type-label leading-5! text-ink2">
          {!loading && countWords(jobs, ticks)}
          {more > 0 && (
            <>
              {', '}
              <Link href="/rounds" className="text-ink underline underline-offset-2">
                and {more} more
              </Link>
            </>
          )}
        </p>
      </div>
      {shown.length === 0 ? (
        <p className="col-span-full flex items-center border-l px-4 py-3 text-[0.96875rem]/[1.3125rem] wide:col-span-5">{!loading && <span><Sentence>{nothing}</Sentence></span>}</p>
      ) : (
        shown.map((row) => (
          <div key={row.job.id} className="flex min-w-0 gap-3 px-3 pb-1.5 pt-[9px] max-wide:border-t max-wide:odd:border-l max-wide:even:pl-(--margin) wide:border-l">
            <JobBox row={row} ticks={ticks} mayDo={mayDo} />
            <div className="min-w-0 flex-1">
              <JobTime row={row} />
              <JobName row={row} done={ticks.ticked.has(row.job.id)} />
              <JobWho row={row} ticks={ticks} mayDo={mayDo} />
            </div>
          </div>
        ))
      )}
      {ticks.failed && (
        <p role="alert" className="type-label col-span-full border-t px-(--margin) py-1.5 text-madder">
          {ticks.failed}
        </p>
      )}
    </section>
  );
}

/** Two jobs at the top of a phone, the rest behind one line. */
export function PhoneToday({ jobs, ticks, nothing, mayDo, loading }: TodayProps) {
  const { taking, take } = useTake(ticks);
  const shown = jobs.slice(0, SHOWN_ON_PHONE);
  const more = jobs.length - shown.length;
  return (
    <section aria-label="Today" className="border-b bg-desk px-(--margin)">
      {shown.map((row) => {
        const { job } = row;
        const done = ticks.ticked.has(job.id);
        return (
          <div key={job.id} className="flex flex-wrap items-center justify-end gap-x-3 border-b py-1">
            <div className="flex min-w-0 flex-1 basis-[11rem] items-center">
              <JobBox row={row} ticks={ticks} mayDo={mayDo} />
              <div className="-ml-3 min-w-0 flex-1">
                <JobTime row={row}>{tagOf(row) !== null && `, tag ${tagOf(row)}`}</JobTime>
                <JobName row={row} done={done} />
              </div>
            </div>
            {done ? (
              <Button disabled={!ticks.saved.has(job.id) && !ticks.waiting.has(job.id)} onClick={() => ticks.untick(job)}>
                {ticks.saved.has(job.id) || ticks.waiting.has(job.id) ? 'Take it back' : 'Saving'}
              </Button>
            ) : job.taken_by ? (
              <span className="type-label text-ink2">{firstName(job.taken_by.name)} has it</span>
            ) : (
              mayDo && (
                <Button onClick={() => take(row)} disabled={taking === job.id} aria-label={`Take it: ${job.title}`}>
                  Take it
                </Button>
              )
            )}
          </div>
        );
      })}
      {ticks.failed && (
        <p role="alert" className="type-label py-1.5 text-madder">
          {ticks.failed}
        </p>
      )}
      {jobs.length === 0 ? (
        <p className="flex min-h-11 items-center py-2 text-[0.9375rem]">{!loading && <span><Sentence>{nothing}</Sentence></span>}</p>
      ) : (
        <div className="flex min-h-11 flex-wrap items-center justify-between gap-x-4">
          <span className="type-label text-ink2">{more > 0 ? `${more} more today` : countWords(jobs, ticks)}</span>
          <Link href="/rounds" className="type-label flex min-h-11 items-center text-ink2 no-underline">
            all rounds ›
          </Link>
        </div>
      )}
    </section>
  );
}

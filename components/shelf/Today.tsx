'use client';

import Link from 'next/link';
import { clock, dayName } from '@/components/charts/zone';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { Sentence } from '@/components/ui/Sentence';
import type { Job } from './jobs';
import type { JobTicks } from './use-job-ticks';

interface TodayProps {
  jobs: readonly Job[];
  ticks: JobTicks;
  /** Said when there is nothing to do. */
  nothing: string;
  now: number;
  timeZone: string;
  mayTake: boolean;
  loading: boolean;
}

const SHOWN = 5;
const SHOWN_ON_PHONE = 2;

const isTaken = (job: Job, ticks: JobTicks) => job.who !== null || ticks.waiting.has(job.key);

function JobBox({ job, ticks, mayTake }: { job: Job; ticks: JobTicks; mayTake: boolean }) {
  const taken = isTaken(job, ticks);
  return <Box ticked={taken} notYet={job.alertId === null} disabled={taken || !mayTake} label={`I have it: ${job.text}`} onTick={() => void ticks.take(job)} className="max-strip:pt-2.5" />;
}

function JobTime({ job }: { job: Job }) {
  return (
    <p className="type-label text-ink2">
      <span className={job.late ? 'text-madder' : 'text-ink'} style={{ fontWeight: 700 }}>
        {job.time}
      </span>{' '}
      {job.note}
    </p>
  );
}

function JobName({ job }: { job: Job }) {
  return (
    <Link href={`/batches/${job.batchId}`} className="two-lines py-px wide:block wide:truncate text-[0.96875rem]/[1.3125rem] font-[480] text-ink no-underline hover:underline" title={job.text}>
      {job.text}
    </Link>
  );
}

function JobWho({ job, ticks, mayTake }: { job: Job; ticks: JobTicks; mayTake: boolean }) {
  const tag = job.tag === null ? '' : `tag ${job.tag} · `;
  if (ticks.waiting.has(job.key)) return <p className="type-label text-ink2">{tag}taking it</p>;
  if (job.who !== null) return <p className="type-label text-ink2">{`${tag}${job.who} has it`}</p>;
  if (job.alertId === null) return <p className="type-label text-ink2">{`${tag}not yet`}</p>;
  return (
    <p className={`type-label ${job.late ? 'text-madder' : 'text-ink2'}`} style={{ fontWeight: job.late ? 600 : 500 }}>
      {tag}nobody
      {mayTake && (
        <>
          ,{' '}
          <button type="button" className="underline underline-offset-2" onClick={() => void ticks.take(job)} aria-label={`take it: ${job.text}`}>
            take it
          </button>
        </>
      )}
    </p>
  );
}

/** `2 to do, 1 in hand` */
function countWords(jobs: readonly Job[]): string {
  const taken = jobs.filter((job) => job.who !== null).length;
  const open = jobs.length - taken;
  return [open > 0 ? `${open} to do` : null, taken > 0 ? `${taken} in hand` : null].filter((part) => part !== null).join(', ');
}

/** The day's jobs above the lanes: late ones first, in madder with the word. */
export function Today({ jobs, ticks, nothing, now, timeZone, mayTake, loading }: TodayProps) {
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
          {!loading && countWords(jobs)}
          {more > 0 && (
            <>
              {', '}
              <Link href="/alerts" className="text-ink underline underline-offset-2">
                and {more} more
              </Link>
            </>
          )}
        </p>
      </div>
      {shown.length === 0 ? (
        <p className="col-span-full flex items-center border-l px-4 py-3 text-[0.96875rem]/[1.3125rem] wide:col-span-5">{!loading && <span><Sentence>{nothing}</Sentence></span>}</p>
      ) : (
        shown.map((job) => (
          <div key={job.key} className="flex min-w-0 gap-3 px-3 pb-1.5 pt-[9px] max-wide:border-t max-wide:odd:border-l max-wide:even:pl-(--margin) wide:border-l">
            <JobBox job={job} ticks={ticks} mayTake={mayTake} />
            <div className="min-w-0 flex-1">
              <JobTime job={job} />
              <JobName job={job} />
              <JobWho job={job} ticks={ticks} mayTake={mayTake} />
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
export function PhoneToday({ jobs, ticks, nothing, mayTake, loading }: TodayProps) {
  const shown = jobs.slice(0, SHOWN_ON_PHONE);
  const more = jobs.length - shown.length;
  return (
    <section aria-label="Today" className="border-b bg-desk px-(--margin)">
      {shown.map((job) => (
        <div key={job.key} className="flex flex-wrap items-center justify-end gap-x-3 border-b py-1">
          <div className="flex min-w-0 flex-1 basis-[11rem] items-center">
            <JobBox job={job} ticks={ticks} mayTake={mayTake} />
            <div className="-ml-3 min-w-0 flex-1">
              <p className="type-label text-ink2">
                <span className={job.late ? 'text-madder' : 'text-ink'} style={{ fontWeight: 700 }}>
                  {job.time}
                </span>{' '}
                {job.note}
                {job.tag !== null && `, tag ${job.tag}`}
              </p>
              <JobName job={job} />
            </div>
          </div>
          {job.who !== null ? (
            <span className="type-label text-ink2">{job.who}</span>
          ) : (
            job.alertId !== null &&
            mayTake && (
              <Button onClick={() => void ticks.take(job)} disabled={ticks.waiting.has(job.key)} aria-label={`Take it: ${job.text}`}>
                Take it
              </Button>
            )
          )}
        </div>
      ))}
      {ticks.failed && (
        <p role="alert" className="type-label py-1.5 text-madder">
          {ticks.failed}
        </p>
      )}
      {jobs.length === 0 ? (
        <p className="flex min-h-11 items-center py-2 text-[0.9375rem]">{!loading && <span><Sentence>{nothing}</Sentence></span>}</p>
      ) : (
        <div className="flex min-h-11 flex-wrap items-center justify-between gap-x-4">
          <span className="type-label text-ink2">{more > 0 ? `${more} more today` : countWords(jobs)}</span>
          <Link href="/alerts" className="type-label flex min-h-11 items-center text-ink2 no-underline">
            all alerts ›
          </Link>
        </div>
      )}
    </section>
  );
}

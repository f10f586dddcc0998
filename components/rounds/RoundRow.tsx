'use client';

import Link from 'next/link';
import { useEffect, useState } from 'react';
import { AskHow } from '@/components/how/AskHow';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { Sentence } from '@/components/ui/Sentence';
import { Vessel } from '@/components/vessel/Vessel';
import { ClientError } from '@/lib/client/fetcher';
import { snoozeJob, takeJob } from '@/lib/client/jobs';
import type { jobSchema } from '@/lib/contracts/jobs';
import { howOfJob } from '@/lib/core/how/jobs';
import { NECKS } from '@/lib/core/types';
import { VESSEL_KINDS } from '@/lib/contracts/batches';
import type { z } from 'zod';
import { about, countdown, laterTimes, type RoundRow as Row } from './rows';
import type { Ticks } from './use-ticks';

/** A clock that runs down by the second; said once, not every second. */
function Countdown({ dueAt }: { dueAt: string }) {
  const left = () => Date.parse(dueAt) / 1000 - Date.now() / 1000;
  const [seconds, setSeconds] = useState(left);
  useEffect(() => {
    const timer = setInterval(() => setSeconds(Date.parse(dueAt) / 1000 - Date.now() / 1000), 1000);
    return () => clearInterval(timer);
  }, [dueAt]);
  return (
    <span role="timer" aria-live="off" className={`type-fig-lg ${seconds < 0 ? 'text-madder' : ''}`}>
      {countdown(seconds)}
    </span>
  );
}

function JobVessel({ batch }: { batch: NonNullable<z.infer<typeof jobSchema>['batch']> }) {
  return (
    <Vessel
      silentPicture
      height={56}
      vessel={{
        kind: VESSEL_KINDS.find((kind) => kind === batch.vessel_kind) ?? 'demijohn',
        neck: NECKS.find((neck) => neck === batch.neck) ?? 'airlock',
        level: Math.min(1, batch.volume_l / batch.vessel_l),
        drink: batch.drink_colour,
        clearness: 'clearing',
        krausen: false,
        lees: 'none',
        tag: null,
        silent: false,
      }}
    />
  );
}

const firstName = (name: string) => name.trim().split(/\s+/)[0] ?? name;

interface RoundRowProps {
  row: Row;
  ticks: Ticks;
  mayDo: boolean;
  me: string;
  now: number;
  timeZone: string;
}

/** One stop of the walk: tick it, take it, or put it off, with one thumb. */
export function RoundRow({ row, ticks, mayDo, me, now, timeZone }: RoundRowProps) {
  const { job } = row;
  const [later, setLater] = useState(false);
  const [busy, setBusy] = useState(false);
  const done = ticks.ticked.has(job.id);
  const saved = ticks.saved.has(job.id);
  const waiting = ticks.waiting.has(job.id);
  const mine = job.taken_by?.id === me;
  const how = howOfJob(job);

  async function send(act: () => Promise<unknown>) {
    setBusy(true);
    try {
      await act();
      setLater(false);
    } catch (error) {
      ticks.fail(`${job.title}: ${error instanceof ClientError ? error.message : 'not saved. Try again.'}`);
    }
    setBusy(false);
  }

  return (
    <li className={`border-b px-(--margin) py-2 strip:flex strip:items-center strip:gap-6 ${row.late && !done ? 'bg-lit' : ''}`}>
      <div className="flex min-w-0 items-start gap-3 strip:flex-1">
        <Box ticked={done} disabled={!mayDo} label={done ? `Take back: ${job.title}` : `Done: ${job.title}`} onTick={(on) => (on ? ticks.tick(job) : ticks.untick(job))} className="min-h-11 min-w-9 pt-3" />
        <div className="min-w-0 flex-1 py-1">
          <p className="type-label text-ink2">
            <span className={row.late ? 'text-madder' : 'text-ink'} style={{ fontWeight: 700 }}>
              {row.time}
            </span>{' '}
            {row.note}
            {job.repeat_days && `, every ${job.repeat_days} days`}
          </p>
          <p className="text-[1.0625rem]/[1.375rem] font-[560]">
            {job.batch ? (
              <Link href={`/batches/${job.batch.id}`} className="relative no-underline hover:underline max-strip:after:absolute max-strip:after:inset-x-0 max-strip:after:-inset-y-3 max-strip:after:content-['']">
                <Sentence>{job.title}</Sentence>
              </Link>
            ) : (
              <Sentence>{job.title}</Sentence>
            )}
          </p>
          {(job.note ?? how) && (
            <p className="type-reason text-ink2">
              {job.note && <Sentence>{job.note}</Sentence>} {how && <AskHow tight of={job.title} answers={() => [{ name: 'why, and from when', says: [row.time, row.note].filter(Boolean).join(' '), how }]} />}
            </p>
          )}
          <p className="type-label text-ink2">
            {[about(job), job.taken_by ? `${mine ? 'you have' : `${firstName(job.taken_by.name)} has`} it` : 'nobody has it'].filter(Boolean).join(' · ')}
          </p>
        </div>
        {row.left !== null && !done && (
          <Countdown dueAt={job.due_at} />
        )}
        {job.batch && <span className="max-strip:hidden"><JobVessel batch={job.batch} /></span>}
      </div>
      {done ? (
        <div className="flex shrink-0 items-center justify-end gap-3">
          <span role="status" className="type-label text-ink2">{saved ? 'Done and logged.' : waiting ? 'Done. Waits to be sent.' : 'Saving'}</span>
          <Button disabled={!saved && !waiting} onClick={() => ticks.untick(job)}>Take it back</Button>
        </div>
      ) : (
        mayDo && (
          <div className="flex flex-wrap items-center justify-end gap-2 strip:max-w-[55%] strip:shrink-0">
            {later && (
              <div role="group" aria-label={`Put off until: ${job.title}`} className="flex flex-wrap gap-2 max-strip:grid max-strip:w-full max-strip:grid-cols-2">
                {laterTimes(now, timeZone).map((time) => (
                  <Button key={time.name} look="quiet" disabled={busy} onClick={() => void send(() => snoozeJob(job, new Date(time.at * 1000).toISOString()))}>
                    {time.name}
                  </Button>
                ))}
              </div>
            )}
            <Button look="quiet" aria-expanded={later} aria-label={`Put off: ${job.title}`} onClick={() => setLater(!later)}>
              {later ? 'not later' : 'later'}
            </Button>
            <Button disabled={busy} aria-label={`${mine ? 'Leave it to others' : 'Take it'}: ${job.title}`} onClick={() => void send(() => takeJob(job.id, !mine))}>
              {mine ? 'Leave it' : 'Take it'}
            </Button>
            <Button look="first" aria-label={`Done: ${job.title}`} onClick={() => ticks.tick(job)}>
              Done
            </Button>
          </div>
        )
      )}
    </li>
  );
}

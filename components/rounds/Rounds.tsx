'use client';

import { useState } from 'react';
import { clock, dayName, when } from '@/components/charts/zone';
import { Sheet } from '@/components/ui/Sheet';
import { Button } from '@/components/ui/Button';
import { FilterTabs } from '@/components/ui/FilterTabs';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState, FormError } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { useMe } from '@/lib/client/me';
import { useJobs } from '@/lib/client/jobs';
import { AirNote } from './AirNote';
import { CalendarFeed } from './CalendarFeed';
import { NewJob } from './NewJob';
import { PrintedRounds } from './PrintedRounds';
import { RoundRow } from './RoundRow';
import { countWords, tonight, walk } from './rows';
import { WaitingActs } from '@/components/offline/WaitingActs';
import { useTicks } from './use-ticks';

type Shown = 'today' | 'coming' | 'done';

/** The walk through the cellar: what is due today, place by place. */
export function Rounds() {
  const { me, may } = useMe();
  const clockMs = useNow();
  if (!me || clockMs === null) return <Haze height={300} className="m-(--margin)" label="Loading the rounds" />;
  if (!may('jobs.read')) {
    return (
      <>
        <PageHead title="Rounds" />
        <EmptyState title="The rounds are for those who work here">Ask a keeper of {me.cellar.name} for the role of a hand.</EmptyState>
      </>
    );
  }
  return <Walk now={clockMs / 1000} timeZone={me.cellar.time_zone} me={me.person.id} mayDo={may('jobs.do')} />;
}

function Walk({ now, timeZone, me, mayDo }: { now: number; timeZone: string; me: string; mayDo: boolean }) {
  const [shown, setShown] = useState<Shown>('today');
  const [opened, setOpened] = useState<'job' | 'calendar' | null>(null);
  const ticks = useTicks();
  const open = useJobs({ state: 'open', order: 'walk', limit: 200 });
  const done = useJobs({ state: 'done', limit: 50 });
  const { jobs, error, retry } = open;

  const until = tonight(now, timeZone);
  const all = [...(jobs ?? []).filter((job) => !ticks.ticked.has(job.id)), ...ticks.ticked.values()];
  const dueToday = all.filter((job) => Date.parse(job.due_at) / 1000 < until);
  const coming = all.filter((job) => Date.parse(job.due_at) / 1000 >= until);
  const stops = walk(shown === 'today' ? dueToday : coming, now, timeZone);
  const next = coming.map((job) => Date.parse(job.due_at) / 1000).sort((a, b) => a - b)[0];
  const close = () => setOpened(null);

  const head = `${dayName(now, timeZone)}, ${clock(now, timeZone)}${jobs ? `: ${countWords(stops.flatMap((stop) => stop.rows).filter((row) => !ticks.ticked.has(row.job.id)))}` : ''}`;

  return (
    <>
      <div className="not-printed">
        <PageHead title="Rounds" meta={head}>
          <div className="flex flex-wrap gap-2">
            <Button look="quiet" onClick={() => window.print()}>
              Print
            </Button>
            <Button look="quiet" onClick={() => setOpened('calendar')}>
              Calendar
            </Button>
            {mayDo && <Button onClick={() => setOpened('job')}>Add a job</Button>}
          </div>
        </PageHead>
        <div className="border-b bg-desk px-(--margin) py-2.5">
          <FilterTabs
            label="Show"
            value={shown}
            onChoose={setShown}
            tabs={[
              { value: 'today', name: 'Today', count: jobs ? dueToday.length - ticks.ticked.size : undefined },
              { value: 'coming', name: 'Coming', count: jobs ? coming.length : undefined },
              { value: 'done', name: 'Done' },
            ]}
          />
        </div>
        {shown === 'today' && <AirNote />}
        <WaitingActs now={now} timeZone={timeZone} />
        {ticks.failed && <FormError>{ticks.failed}</FormError>}
        {error && !jobs ? (
          <ErrorState title="The rounds did not load" onRetry={retry}>
            {error.message} Nothing ticked is lost.
          </ErrorState>
        ) : !jobs ? (
          <Haze height={200} className="m-(--margin)" label="Loading the jobs" />
        ) : shown === 'done' ? (
          <DoneList jobs={done.jobs} error={done.error} retry={done.retry} now={now} timeZone={timeZone} />
        ) : stops.length === 0 ? (
          <EmptyState title={shown === 'today' ? 'Nothing due today.' : 'Nothing is coming yet.'}>{shown === 'today' && next !== undefined ? `Next: ${when(next, now, timeZone)}.` : 'Jobs come from the calls, from clocks, and from people.'}</EmptyState>
        ) : (
          stops.map((stop) => (
            <section key={stop.place} aria-label={stop.place}>
              <GroupBar word={stop.place} note={stop.rows.length === 1 ? '1 job' : `${stop.rows.length} jobs`} />
              <ol>
                {stop.rows.map((row) => (
                  <RoundRow key={row.job.id} row={row} ticks={ticks} mayDo={mayDo} me={me} now={now} timeZone={timeZone} />
                ))}
              </ol>
            </section>
          ))
        )}
        {opened === 'job' && (
          <Sheet title="Add a job" onClose={close}>
            <NewJob now={now} timeZone={timeZone} onDone={close} />
          </Sheet>
        )}
        {opened === 'calendar' && (
          <Sheet title="Rounds in a calendar" onClose={close}>
            <CalendarFeed now={now} timeZone={timeZone} />
          </Sheet>
        )}
      </div>
      {jobs && <PrintedRounds stops={stops} head={head} />}
    </>
  );
}

function DoneList({ jobs, error, retry, now, timeZone }: Pick<ReturnType<typeof useJobs>, 'jobs' | 'error' | 'retry'> & { now: number; timeZone: string }) {
  if (error && !jobs) {
    return (
      <ErrorState title="What was done did not load" onRetry={retry}>
        {error.message}
      </ErrorState>
    );
  }
  if (!jobs) return <Haze height={120} className="m-(--margin)" label="Loading what was done" />;
  if (jobs.length === 0) return <EmptyState title="Nothing ticked yet.">What is done stays here with its time and who did it.</EmptyState>;
  const newest = [...jobs].sort((a, b) => (b.done_at ?? '').localeCompare(a.done_at ?? ''));
  return (
    <ol>
      {newest.map((job) => (
        <li key={job.id} className="grid grid-cols-[minmax(0,1fr)_auto] items-baseline gap-x-4 border-b px-(--margin) py-2.5">
          <span className="type-body">{job.title}</span>
          <span className="type-label text-right text-ink2">
            {job.done_by?.name ?? 'Fallbright'}
            {job.done_at && `, ${when(Date.parse(job.done_at) / 1000, now, timeZone)}`}
          </span>
        </li>
      ))}
    </ol>
  );
}

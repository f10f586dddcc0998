'use client';

import { useState } from 'react';
import { clock, dayName, instantOf } from '@/components/charts/zone';
import { Button, buttonClass } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { FilterTabs } from '@/components/ui/FilterTabs';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState } from '@/components/ui/Notice';
import { trailFile, useTrail } from '@/lib/client/account';
import { useMe, useMembers } from '@/lib/client/me';
import type { TrailKind, TrailLine } from '@/lib/contracts/people';

const KINDS: readonly { value: TrailKind | 'all'; name: string }[] = [
  { value: 'all', name: 'All' },
  { value: 'access', name: 'Access' },
  { value: 'override', name: 'Overrides' },
  { value: 'deletion', name: 'Deletions' },
  { value: 'sensor', name: 'Sensors' },
  { value: 'work', name: 'Work' },
];
const DAY_S = 86_400;

/** Midnight of a day from a date field, in the cellar's zone; null where none is chosen. */
function midnight(day: string, timeZone: string, plusDays = 0): string | null {
  const [year, month, date] = day.split('-').map(Number);
  if (!year || !month || !date) return null;
  return new Date((instantOf({ year, month, day: date }, timeZone) + plusDays * DAY_S) * 1000).toISOString();
}

function Line({ line, timeZone }: { line: TrailLine; timeZone: string }) {
  const at = Date.parse(line.at) / 1000;
  return (
    <li className="grid items-baseline gap-x-5 border-b border-rule px-(--margin) py-1.5 strip:grid-cols-[9.5rem_minmax(0,1fr)_auto]">
      <span className="type-label text-ink2">
        {dayName(at, timeZone)} {clock(at, timeZone)}
      </span>
      <p className="type-body min-w-0 break-words">
        <b className="font-bold">{line.person?.name ?? 'Fallbright, or somebody who has gone'}</b> {line.says}
        {line.kind === 'override' && typeof line.detail.reason === 'string' && <span className="text-ink2">: “{line.detail.reason}”</span>}
      </p>
      <span className="type-label text-ink2 strip:text-right">
        {line.address ?? ''}
        {line.means && line.means !== 'session' && `, ${line.means === 'open' ? 'not signed in' : line.means}`}
      </span>
    </li>
  );
}

/** Who did what, when, from where; narrowed down, and saved. */
export function AuditTrail() {
  const { me } = useMe();
  const { members } = useMembers();
  const [kind, setKind] = useState<TrailKind | 'all'>('all');
  const [person, setPerson] = useState('');
  const [from, setFrom] = useState('');
  const [to, setTo] = useState('');
  const [limit, setLimit] = useState(50);
  const timeZone = me?.cellar.time_zone ?? 'UTC';
  const filter = { kind: kind === 'all' ? null : kind, person: person || null, from: midnight(from, timeZone), to: midnight(to, timeZone, 1) };
  const { lines, more, loading, error, retry } = useTrail('/audit', filter, limit);
  return (
    <>
      <div className="flex flex-col gap-3 border-b bg-desk px-(--margin) py-3">
        <FilterTabs label="What" value={kind} onChoose={setKind} tabs={KINDS} />
        <div className="flex flex-wrap items-end gap-3">
          <Select label="who" value={person} className="w-56 max-strip:w-full" onChange={(event) => setPerson(event.target.value)}>
            <option value="">anybody</option>
            {members?.map((member) => (
              <option key={member.person.id} value={member.person.id}>
                {member.person.name}
              </option>
            ))}
          </Select>
          <Field label="from" type="date" value={from} className="w-44 max-strip:flex-1 max-strip:basis-[42%]" onChange={(event) => setFrom(event.target.value)} />
          <Field label="until, that day too" type="date" value={to} className="w-44 max-strip:flex-1 max-strip:basis-[42%]" onChange={(event) => setTo(event.target.value)} />
          <div className="flex gap-2 strip:ml-auto">
            <a className={buttonClass('plain', 'normal')} href={trailFile('csv', filter)} download>
              Save as CSV
            </a>
            <a className={buttonClass('plain', 'normal')} href={trailFile('json', filter)} download>
              JSON
            </a>
          </div>
        </div>
      </div>
      {loading ? (
        <Haze height={160} label="Loading the trail" className="mx-(--margin) my-3" />
      ) : !lines ? (
        <ErrorState title="The trail did not load" onRetry={retry}>
          {error?.message}
        </ErrorState>
      ) : lines.length === 0 ? (
        <EmptyState title="None of these">Nothing of the kind was done in that time.</EmptyState>
      ) : (
        <ul>
          {lines.map((line) => (
            <Line key={line.id} line={line} timeZone={timeZone} />
          ))}
        </ul>
      )}
      {more && (
        <div className="px-(--margin) py-3">
          {limit < 200 ? <Button onClick={() => setLimit(Math.min(200, limit + 50))}>Show more</Button> : <p className="type-reason text-ink2">Older ones: narrow the dates, or save the whole trail.</p>}
        </div>
      )}
    </>
  );
}

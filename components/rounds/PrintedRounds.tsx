import { Sentence } from '@/components/ui/Sentence';
import { about, type RoundRow, type Stop } from './rows';

/** Above this many jobs their notes are left off, so that the walk stays on one page. */
const WITH_NOTES = 14;

function Line({ row: { job, time, note }, notes }: { row: RoundRow; notes: boolean }) {
  // The name stands in the job's own words as a rule; the tag is what one looks for.
  const what = job.batch && job.title.includes(job.batch.name) ? job.batch.tag !== null && `tag ${job.batch.tag}` : about(job);
  return (
    <li className={`grid break-inside-avoid grid-cols-[1.125rem_8.5rem_minmax(0,1fr)_6rem_6.5rem] items-baseline gap-x-2 border-b text-[0.6875rem]/[0.875rem] ${notes ? 'py-1' : 'py-[3px]'}`}>
      <span>☐</span>
      <span className="font-mono text-[0.6875rem] font-semibold">
        {time} <span className="font-normal">{note}</span>
      </span>
      <span className="min-w-0 break-words">
        <span className="font-semibold">
          <Sentence>{job.title}</Sentence>
        </span>
        {what && <span className="font-mono text-[0.6875rem]"> · {what}</span>}
        {notes && job.note && (
          <span className="block text-[0.6875rem]/[0.875rem]">
            <Sentence>{job.note}</Sentence>
          </span>
        )}
      </span>
      <span className="truncate font-mono text-[0.6875rem]">{job.taken_by ? job.taken_by.name : ''}</span>
      <span className="self-end border-b border-dotted" />
    </li>
  );
}

/** The walk on one page, for a pocket: only printed, never on the screen. */
export function PrintedRounds({ stops, head }: { stops: readonly Stop[]; head: string }) {
  const many = stops.reduce((sum, stop) => sum + stop.rows.length, 0);
  return (
    <section className="work-sheet hidden px-2 print:block" aria-hidden>
      <div className="border-b-[1.5px] border-ink pb-1">
        <p className="type-head">Rounds</p>
        <p className="type-tick">{head}</p>
      </div>
      {stops.map((stop) => (
        <div key={stop.place} className="break-inside-avoid">
          <p className="type-tick grid grid-cols-[1.125rem_8.5rem_minmax(0,1fr)_6rem_6.5rem] gap-x-2 border-b pt-1.5 font-bold">
            <span className="col-span-3">{stop.place}</span>
            <span>in hand</span>
            <span>done by, at</span>
          </p>
          <ol>
            {stop.rows.map((row) => (
              <Line key={row.job.id} row={row} notes={many <= WITH_NOTES} />
            ))}
          </ol>
        </div>
      ))}
      {many === 0 && <p className="type-body pt-2">Nothing due.</p>}
      {many > WITH_NOTES && <p className="type-tick pt-1">The notes of the jobs are left off here; they stand on the screen.</p>}
    </section>
  );
}

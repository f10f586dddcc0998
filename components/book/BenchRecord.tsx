import { How } from '@/components/ui/How';
import { GroupBar } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import type { LotBody } from '@/lib/contracts/lots';

/** How the bench judged it; a stop that was put aside stays for good. */
export function BenchRecord({ lot, day }: { lot: LotBody; day: (at: string) => string }) {
  const { bench, override } = lot;
  const worst = lot.bottles.toSorted((a, b) => b.worst_bar - a.worst_bar)[0];
  return (
    <section aria-label="From the bench">
      <GroupBar word="From the bench" />
      <div className="border-b px-(--margin) py-3">
        <State state={override ? 'Stop' : 'Ready'} word={override ? 'Stop, put aside' : 'Held, even at worst'} />
        <p className="type-verdict-now">{bench.headline}</p>
        <ul className="type-reason text-ink2">
          {bench.problems.map((problem) => (
            <li key={problem}>
              <Sentence>{problem}</Sentence>
            </li>
          ))}
          <li>
            <Sentence>{`At most ${bench.worst_bar.toFixed(1)} bar, standing no warmer than ${bench.warmest_store_c} °C.`}</Sentence>
          </li>
        </ul>
        {worst && <How how={worst.how.worst} of="the worst case" />}
        {override && (
          <blockquote className="type-body mt-2 border-l-[3px] border-madder pl-3">
            {override.reason}
            <span className="type-label block text-ink2">
              {override.by?.name ?? 'somebody who has left'}, {day(override.at)}
            </span>
          </blockquote>
        )}
        {bench.cautions.length > 0 && (
          <ul className="type-reason mt-2 list-disc pl-4 text-ink2">
            {bench.cautions.map((caution) => (
              <li key={caution}>{caution}</li>
            ))}
          </ul>
        )}
      </div>
      {lot.next_time.length > 0 && (
        <div className="border-b px-(--margin) py-3">
          <h3 className="type-name-low">Next time</h3>
          <ul className="type-body">
            {lot.next_time.map((note) => (
              <li key={`${note.at} ${note.note}`} className="py-0.5 break-words">
                {note.note}
                <span className="type-label block text-ink2">
                  {note.by ?? 'a taster'}, {day(note.at)}
                </span>
              </li>
            ))}
          </ul>
        </div>
      )}
    </section>
  );
}

import { useState, type ReactNode } from 'react';
import { sizeWords } from '@/components/bench/words';
import { FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { ClientError } from '@/lib/client/fetcher';
import { undoOpening } from '@/lib/client/lots';
import type { LotBody } from '@/lib/contracts/lots';
import { became } from './became';
import { OPENING_WORDS } from './words';

/** Day, what happened, who: one line on a wide page; on a phone what happened stands below, over the whole width. */
function Line({ day, note, who, act, children }: { day: string; note?: ReactNode; who: string | undefined; act?: ReactNode; children: ReactNode }) {
  return (
    <li className="grid grid-cols-[minmax(0,1fr)_auto] items-baseline gap-x-4 border-b border-rule px-(--margin) py-1.5 strip:grid-cols-[12ch_minmax(0,1fr)_auto]">
      <span className="text-ink2">{day}</span>
      <span className="flex min-w-0 flex-wrap items-baseline gap-x-4 max-strip:order-last max-strip:col-span-2">
        {children}
        {note}
      </span>
      <span className="flex items-baseline justify-end gap-x-4 text-ink2">
        <span className="max-w-[20ch] truncate max-strip:max-w-[16ch]" title={who}>
          {who}
        </span>
        {act}
      </span>
    </li>
  );
}

/** What became of a lot's bottles. */
export function Became({ lot, day, mayUndo }: { lot: LotBody; day: (at: string) => string; mayUndo: boolean }) {
  const [failed, setFailed] = useState<string | null>(null);
  const happenings = became(lot);
  if (happenings.length === 0) return null;
  async function undo(id: string) {
    try {
      await undoOpening(lot.id, id);
      setFailed(null);
    } catch (error) {
      setFailed(error instanceof ClientError ? error.message : 'It was not put back. Try again.');
    }
  }
  return (
    <section aria-label="What became of them">
      <GroupBar word="What became of them" />
      {failed && <FormError>{failed}</FormError>}
      <ul className="type-label">
        {happenings.map((happening, index) => {
          if (happening.what === 'move') {
            const { row } = happening;
            return (
              <Line key={`move ${index}`} day={day(row.at)} who={row.by?.name} note={row.override_reason && <span className="type-reason min-w-0 text-madder">against a stop: {row.override_reason}</span>}>
                <span className="min-w-0">
                  {row.count} × {sizeWords(row.size_ml)} from {row.from?.name ?? 'no named place'} to {row.to?.name ?? 'no named place'}
                </span>
              </Line>
            );
          }
          const { row } = happening;
          return (
            <Line
              key={row.id}
              day={day(row.at)}
              who={row.by?.name}
              note={row.note && <span className="type-reason min-w-0 text-ink2">{row.note}</span>}
              act={
                mayUndo && (
                  <button type="button" onClick={() => void undo(row.id)} className="min-h-8 shrink-0 underline underline-offset-4 max-strip:min-h-11">
                    Put back
                  </button>
                )
              }
            >
              <span className={`min-w-0 ${row.kind === 'gushed' ? 'font-semibold text-madder' : 'font-semibold'}`}>
                {row.count} × {sizeWords(row.size_ml)} {OPENING_WORDS[row.kind]}
                {row.to && ` to ${row.to}`}
              </span>
            </Line>
          );
        })}
      </ul>
    </section>
  );
}

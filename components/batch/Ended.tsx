import { dayName } from '@/components/charts/zone';
import { Button, LinkButton } from '@/components/ui/Button';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { gravityText } from '@/components/ui/units';
import type { BatchBody, EntryBody } from '@/lib/contracts/batches';

interface EndedProps {
  batch: BatchBody;
  entries: readonly EntryBody[];
  timeZone: string;
  /** Null: the person may not. */
  onReopen: (() => void) | null;
  className: string;
}

/** The lot that the last bottling made, where there was one. */
function lastBottling(entries: readonly EntryBody[]): { lotId: string | null } | null {
  const [last] = entries.filter((entry) => entry.kind === 'bottling').sort((a, b) => b.at.localeCompare(a.at));
  if (!last) return null;
  const lotId = last.detail?.lot_id;
  return { lotId: typeof lotId === 'string' ? lotId : null };
}

/** The watch is over: what became of the batch stands before the calls that were made of it. */
export function Ended({ batch, entries, timeZone, onReopen, className }: EndedProps) {
  const bottled = lastBottling(entries);
  const gravity = batch.assessment?.gravity?.value;
  const day = batch.ended_at === null ? '' : ` ${dayName(Date.parse(batch.ended_at) / 1000, timeZone)}`;
  return (
    <section aria-label="How it ended" className={`border-b px-(--margin) py-3 wide:px-[18px] ${className}`}>
      <State state="Done" />
      <h2 className="type-verdict-now mt-1 text-[1.0625rem]">
        <Sentence strong>{`${bottled ? 'Bottled' : 'Ended'}${day}.`}</Sentence>
      </h2>
      {gravity !== undefined && (
        <p className="type-reason mt-1 text-ink2">
          <Sentence>{`Last at ${gravityText(gravity)}.`}</Sentence>
        </p>
      )}
      {(bottled?.lotId || onReopen) && (
        <div className="mt-2 flex flex-wrap justify-end gap-2">
          {onReopen && (
            <Button size="lane" look="quiet" onClick={onReopen}>
              Open it again
            </Button>
          )}
          {bottled?.lotId && (
            <LinkButton href={`/book/${bottled.lotId}`} size="lane">
              To its bottles
            </LinkButton>
          )}
        </div>
      )}
    </section>
  );
}

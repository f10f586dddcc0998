'use client';

import Link from 'next/link';
import { litres } from '@/components/batch/figures';
import { vesselOf } from '@/components/vessel/describe';
import { Vessel } from '@/components/vessel/Vessel';
import { LinkButton } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState } from '@/components/ui/Notice';
import { PageHead } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { useBatches } from '@/lib/client/batches';
import type { BatchBody } from '@/lib/contracts/batches';
import type { Verdict } from '@/lib/core/types';

const RANK: Record<Verdict, number> = { yes: 0, soon: 1, unknown: 2, hold: 3, no: 4 };
/** Those that may be bottled first. */
const rank = (batch: BatchBody) => RANK[batch.assessment?.calls.bottle.verdict ?? 'unknown'];

/** Which batch stands on the bench. */
export function BenchList() {
  const { batches, error, retry } = useBatches();
  if (error && !batches) {
    return (
      <>
        <PageHead title="Bottling bench" />
        <ErrorState title="The batches did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      </>
    );
  }
  if (!batches) return <Haze height={320} label="Loading the batches" className="m-(--margin)" />;
  const open = batches.filter((batch) => batch.state !== 'ended').toSorted((a, b) => rank(a) - rank(b) || a.name.localeCompare(b.name));
  return (
    <>
      <PageHead title="Bottling bench" meta="Which batch? Each is judged from its own log." />
      {open.length === 0 && (
        <EmptyState title="Nothing to bottle" action={<LinkButton href="/shelf">To the shelf</LinkButton>}>
          No vessel holds a batch.
        </EmptyState>
      )}
      <ul>
        {open.map((batch) => {
          const call = batch.assessment?.calls.bottle;
          const ready = call?.verdict === 'yes';
          return (
            <li key={batch.id} className={`border-b ${ready ? 'bg-lit' : ''}`}>
              <Link href={`/bench/${batch.id}`} className="flex min-h-[84px] items-center gap-4 px-(--margin) py-2 no-underline -outline-offset-2 hover:bg-desk">
                <Vessel vessel={vesselOf(batch)} height={64} silentPicture />
                <span className="grid min-w-0 flex-1 gap-x-6 strip:grid-cols-[15rem_minmax(0,1fr)] strip:items-center">
                  <span className="min-w-0">
                    <span className="type-name block break-words">{batch.name}</span>
                    <span className="type-label text-ink2">
                      {batch.tag !== null && `tag ${batch.tag}, `}
                      {litres(batch.volume_l)}
                    </span>
                  </span>
                  <span className="min-w-0">
                    <State state={ready ? 'Ready' : call?.verdict === 'unknown' || !call ? 'Check' : 'Leave be'} word={ready ? 'Ready' : call?.verdict === 'unknown' || !call ? 'Not known' : 'Not yet'} />
                    <span className="type-reason two-lines text-ink2">
                      <Sentence>{call?.reason ?? 'Not judged yet.'}</Sentence>
                    </span>
                  </span>
                </span>
              </Link>
            </li>
          );
        })}
      </ul>
    </>
  );
}

'use client';

import { useState } from 'react';
import { AskHow } from '@/components/how/AskHow';
import { answersOfLane } from '@/components/how/judged';
import { LaneMuted } from '@/components/messages/BatchMute';
import { Button, LinkButton } from '@/components/ui/Button';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { acknowledgeAlert } from '@/lib/client/alerts';
import { ClientError } from '@/lib/client/fetcher';
import type { LaneView } from './lanes';

/** Where the figures of the lane and of its call come from; above the link that covers the lane. */
export function HowLane({ view: { lane, attention } }: { view: LaneView }) {
  return <AskHow tight of={`figures of ${lane.name}`} answers={() => answersOfLane(lane, attention.call)} className="z-10 shrink-0" />;
}

/** At most one: take it while nobody has it, else go and look. */
export function LaneButton({ view, mayTake }: { view: LaneView; mayTake: boolean }) {
  const [busy, setBusy] = useState(false);
  const [failed, setFailed] = useState<string | null>(null);
  const { openAlert, attention, lane } = view;
  if (attention.group !== 'now') return null;
  if (!openAlert || !mayTake) {
    return (
      <LinkButton href={`/batches/${lane.id}`} size="lane" className="relative z-10" aria-label={`Look at ${lane.name}`}>
        Look
      </LinkButton>
    );
  }
  const take = async () => {
    setBusy(true);
    setFailed(null);
    try {
      await acknowledgeAlert(openAlert.id);
    } catch (error) {
      setFailed(error instanceof ClientError ? error.message : 'It was not taken. Try again.');
    } finally {
      setBusy(false);
    }
  };
  return (
    <span className="relative z-10 flex flex-col items-end gap-1">
      {failed && (
        <span role="alert" className="type-label max-w-48 text-right text-madder">
          {failed}
        </span>
      )}
      <Button size="lane" look={attention.state === 'Now' || attention.state === 'Stop' ? 'first' : 'plain'} disabled={busy} onClick={() => void take()} aria-label={`I have it: ${lane.name}`}>
        I have it
      </Button>
    </span>
  );
}

const VERDICT = { now: 'type-verdict-now', next: 'type-verdict', leave: 'type-verdict-leave' } as const;

/** The call of a lane: state, when, verdict, reason, at most one button. */
export function LaneCall({ view, mayTake }: { view: LaneView; mayTake: boolean }) {
  const { attention, headline, reason } = view;
  const low = attention.group === 'leave';
  return (
    <div className={`flex min-w-0 flex-col ${low ? 'py-[5px]' : attention.group === 'now' ? 'pb-2 pt-[7px]' : 'pb-1 pt-[6px]'}`}>
      <div className="flex items-center justify-between gap-3">
        <span aria-hidden className="leading-none">
          <State state={attention.state} />
        </span>
        <LaneMuted batchId={view.lane.id} />
        <span className="type-label ml-auto flex items-baseline gap-3 text-right text-ink2">
          <HowLane view={view} />
          {view.when}
        </span>
      </div>
      {low ? (
        <p className="two-lines type-verdict-leave">
          <Sentence strong>{headline}</Sentence>{' '}
          <span className="type-reason text-ink2">
            <Sentence>{reason}</Sentence>
          </span>
        </p>
      ) : (
        <>
          <p className={VERDICT[attention.group]}>
            <Sentence strong>{headline}</Sentence>
          </p>
          <div className="flex items-end justify-between gap-3">
            <p className="two-lines type-reason self-start text-ink2">
              <Sentence>{reason}</Sentence>
            </p>
            <LaneButton view={view} mayTake={mayTake} />
          </div>
        </>
      )}
    </div>
  );
}

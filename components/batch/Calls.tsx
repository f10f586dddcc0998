'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { OnwardIcon } from '@/components/ui/icons';
import { Ruler } from '@/components/ui/Ruler';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { acknowledgeAlert } from '@/lib/client/alerts';
import { isLoud, type CallRow } from './calls';

/** Says that somebody has it; when to look again is asked on the alerts page. */
export function TakeIt({ alert }: { alert: string }) {
  const [state, setState] = useState<'idle' | 'sending' | 'failed'>('idle');
  return (
    <>
      <Button
        size="lane"
        disabled={state === 'sending'}
        onClick={() => {
          setState('sending');
          acknowledgeAlert(alert).then(
            () => setState('idle'),
            () => setState('failed'),
          );
        }}
      >
        I have it
      </Button>
      {state === 'failed' && (
        <span role="alert" className="type-label text-madder">
          Not saved. Try again.
        </span>
      )}
    </>
  );
}

function Evidence({ row }: { row: CallRow }) {
  return (
    <>
      <p className="type-reason mt-0.5 text-ink2">
        <Sentence>{row.reason}</Sentence>
      </p>
      {row.ruler && <Ruler {...row.ruler} state={row.state} />}
      <dl className="mt-1 grid grid-cols-[86px_1fr] gap-x-1 gap-y-0.5">
        {row.lines.map((line) => (
          <div key={line.label} className="col-span-2 grid grid-cols-subgrid">
            <dt className="type-label leading-[1.125rem] text-ink2">{line.label}</dt>
            <dd className="type-reason">
              <Sentence>{line.text}</Sentence>
            </dd>
          </div>
        ))}
      </dl>
    </>
  );
}

function LoudCall({ row, mayTake }: { row: CallRow; mayTake: boolean }) {
  const urgent = row.state === 'Stop' || row.state === 'Now' || row.state === 'Check';
  return (
    <section aria-label={`${row.word}: ${row.question}`} className={`border-b px-(--margin) py-3 wide:px-[18px] ${urgent ? 'bg-lit' : ''}`}>
      <div className="flex items-center justify-between gap-3">
        <State state={row.state} word={row.word} />
        <span className="type-label text-ink2">{row.question}</span>
      </div>
      <h3 className="type-verdict-now mt-1 text-[1.0625rem]">
        <Sentence strong>{row.headline}</Sentence>
      </h3>
      <Evidence row={row} />
      {(row.takenBy || (row.alert && mayTake)) && (
        <div className="mt-2 flex items-center justify-end gap-3">
          {row.takenBy && <span className="type-label text-ink2">{row.takenBy} has it</span>}
          {row.alert && mayTake && <TakeIt alert={row.alert} />}
        </div>
      )}
    </section>
  );
}

/** A call with nothing to do: one line, its evidence behind it. */
function QuietCall({ row }: { row: CallRow }) {
  return (
    <details className="group border-b">
      <summary className="cursor-pointer list-none px-(--margin) py-2.5 wide:px-[18px] [&::-webkit-details-marker]:hidden">
        <span className="flex items-center justify-between gap-3">
          <State state={row.state} word={row.word} />
          <span className="type-label text-ink2">{row.question}</span>
        </span>
        <span className="mt-0.5 flex items-start justify-between gap-3">
          <span className="type-verdict text-[0.9375rem]">
            <Sentence strong>{row.headline}</Sentence>
          </span>
          <OnwardIcon size={14} className="mt-1 text-ink2 transition-transform group-open:rotate-90" />
        </span>
      </summary>
      <div className="px-(--margin) pb-3 wide:px-[18px]">
        <Evidence row={row} />
      </div>
    </details>
  );
}

interface CallsProps {
  rows: readonly CallRow[];
  /** `14:31` */
  judgedAt: string;
  mayTake: boolean;
}

/** What the program makes of the batch, each with its evidence; what wants a person stands first and open. */
export function Calls({ rows, judgedAt, mayTake }: CallsProps) {
  return (
    <section aria-label="Calls">
      <h2 className="type-label border-b px-(--margin) py-2.5 text-ink2 max-wide:bg-desk wide:px-[18px]">
        Calls, judged <span className="fig">{judgedAt}</span>
      </h2>
      {rows.map((row) => (isLoud(row) ? <LoudCall key={row.name} row={row} mayTake={mayTake} /> : <QuietCall key={row.name} row={row} />))}
    </section>
  );
}

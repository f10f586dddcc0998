'use client';

import { useState } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { How } from '@/components/ui/How';
import { OnwardIcon } from '@/components/ui/icons';
import { Ruler } from '@/components/ui/Ruler';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { acknowledgeAlert } from '@/lib/client/alerts';
import { isLoud, type CallRow } from './calls';
import { Overrule, Overruled } from './Overrule';

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
      <How how={row.how} of={row.question} />
    </>
  );
}

/** What can be done about a call from here. */
export interface CallScene {
  batchId: string;
  now: number;
  timeZone: string;
  mayTake: boolean;
  mayOverrule: boolean;
  /** Where a call leads: the bench, cellar work. */
  leads: (row: CallRow) => { href: string; word: string } | null;
  /** What logs that it was done. */
  done: (row: CallRow) => { word: string; onDone: () => void } | null;
}

function Acts({ row, scene }: { row: CallRow; scene: CallScene }) {
  const lead = scene.leads(row);
  const done = scene.done(row);
  const mayOverrule = scene.mayOverrule && row.overruled === null && row.word !== 'Not known';
  if (!row.takenBy && !(row.alert && scene.mayTake) && !lead && !done && !mayOverrule) return null;
  return (
    <div className="mt-2 flex flex-wrap items-center justify-end gap-x-3 gap-y-2">
      {mayOverrule && (
        <span className="mr-auto max-w-full flex-auto">
          <Overrule row={row} batchId={scene.batchId} />
        </span>
      )}
      {row.takenBy && <span className="type-label text-ink2">{row.takenBy} has it</span>}
      {row.alert && scene.mayTake && <TakeIt alert={row.alert} />}
      {lead && (
        <LinkButton href={lead.href} size="lane">
          {lead.word}
        </LinkButton>
      )}
      {done && (
        <Button size="lane" onClick={done.onDone}>
          {done.word}
        </Button>
      )}
    </div>
  );
}

function LoudCall({ row, scene }: { row: CallRow; scene: CallScene }) {
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
      <Acts row={row} scene={scene} />
    </section>
  );
}

/** A call with nothing to do: one line, its evidence behind it. */
function QuietCall({ row, scene }: { row: CallRow; scene: CallScene }) {
  return (
    <details className="group border-b" open={row.overruled !== null}>
      <summary className="cursor-pointer list-none px-(--margin) py-2.5 wide:px-[18px] [&::-webkit-details-marker]:hidden">
        <span className="flex items-center justify-between gap-3">
          <State state={row.state} word={row.word} />
          <span className="type-label text-ink2">{row.question}</span>
        </span>
        <span className="mt-0.5 flex items-start justify-between gap-3">
          <span className={`type-verdict text-[0.9375rem] ${row.overruled ? 'text-ink2' : ''}`}>
            <Sentence strong>{row.headline}</Sentence>
          </span>
          <OnwardIcon size={14} className="mt-1 text-ink2 transition-transform group-open:rotate-90" />
        </span>
      </summary>
      <div className="px-(--margin) pb-3 wide:px-[18px]">
        <Overruled row={row} batchId={scene.batchId} now={scene.now} timeZone={scene.timeZone} mayTakeBack={scene.mayOverrule} />
        <Evidence row={row} />
        <Acts row={row} scene={scene} />
      </div>
    </details>
  );
}

interface CallsProps {
  /** The batch has ended: no call asks for anything any more. */
  over: boolean;
  rows: readonly CallRow[];
  /** `14:31` */
  judgedAt: string;
  /** Something was logged since; a newer judgement is on its way. */
  pending: boolean;
  scene: CallScene;
}

/** What the program makes of the batch, each with its evidence; what wants a person stands first and open. */
export function Calls({ over, rows, judgedAt, pending, scene }: CallsProps) {
  return (
    <section aria-label="Calls">
      <h2 className="type-label border-b px-(--margin) py-2.5 text-ink2 max-wide:bg-desk wide:px-[18px]">
        {over ? 'The last calls' : 'Calls'}, judged <span className="fig">{judgedAt}</span>
        {pending && ', being judged anew'}
      </h2>
      {rows.map((row) => (isLoud(row) && !over ? <LoudCall key={row.name} row={row} scene={scene} /> : <QuietCall key={row.name} row={row} scene={scene} />))}
    </section>
  );
}

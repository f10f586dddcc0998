'use client';

import Link from 'next/link';
import { useEffect, useRef, useState } from 'react';
import { rulerOf } from '@/components/batch/evidence';
import { BatchMute } from '@/components/messages/BatchMute';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { TextField } from '@/components/ui/Field';
import { BackIcon } from '@/components/ui/icons';
import { FormError } from '@/components/ui/Notice';
import { Ruler } from '@/components/ui/Ruler';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { acknowledgeAlert, resolveAlert } from '@/lib/client/alerts';
import { ClientError } from '@/lib/client/fetcher';
import type { AlertBody } from '@/lib/contracts/alerts';
import { alertFate, alertState, goneSentence, lookAgainTimes, standsSince, toldLines, type Rest } from './rows';

interface AlertDetailProps {
  alert: AlertBody;
  now: number;
  timeZone: string;
  /** When the reader is not to be woken. */
  rest: Rest | null;
  mayTake: boolean;
  mayClear: boolean;
  /** The person came to take it: the cursor goes to when they look again. */
  taking: boolean;
  onBack: () => void;
}

function Part({ name, children }: { name: string; children: React.ReactNode }) {
  return (
    <section>
      <h3 className="type-label border-b pb-1.5 text-ink2">{name}</h3>
      <div className="pt-2">{children}</div>
    </section>
  );
}

/** Open, waiting or failed, beside the word that says so. */
function ToldMark({ state }: { state: AlertBody['told'][number]['state'] }) {
  return (
    <svg viewBox="0 0 12 12" width="11" height="11" aria-hidden className="shrink-0 text-ink">
      <rect x="1" y="1" width="10" height="10" stroke="currentColor" strokeWidth="1.5" fill={state === 'sent' ? 'currentColor' : 'none'} strokeDasharray={state === 'waiting' || state === 'held' ? '2 1.5' : undefined} />
      {(state === 'failed' || state === 'dropped') && <path d={state === 'failed' ? 'M1 1 11 11' : 'M3 6h6'} stroke="currentColor" strokeWidth="1.5" />}
    </svg>
  );
}

function TakeForm({ alert, now, timeZone, rest, mayTake, mayClear, taking }: Omit<AlertDetailProps, 'onBack'>) {
  const [note, setNote] = useState('');
  // By the time itself: the list moves on while the page is open. Null: the first of them.
  const [look, setLook] = useState<number | 'none' | null>(null);
  // What can hurt someone wakes them anyway, and is looked at as soon as it should be.
  const times = lookAgainTimes(now, timeZone, alert.level === 'act' ? null : rest, typeof look === 'number' ? look : null);
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const form = useRef<HTMLDivElement>(null);
  const chosen = look === 'none' ? null : (times.find(({ at }) => at === look) ?? times[0] ?? null);

  useEffect(() => {
    if (taking) form.current?.querySelector<HTMLElement>('input:checked')?.focus();
  }, [taking]);

  async function run(act: () => Promise<unknown>) {
    setSending(true);
    setFailed(null);
    try {
      await act();
    } catch (error) {
      setFailed(error instanceof ClientError ? error.message : 'It was not saved. Try again.');
    }
    setSending(false);
  }

  const said = note.trim() === '' ? null : note.trim();
  return (
    <div ref={form} className="flex flex-col gap-3">
      <TextField label="Say what you will do (others see it)" rows={2} maxLength={500} value={note} onChange={(event) => setNote(event.target.value)} />
      {alert.state === 'open' && mayTake && (
        <Choice label="You look again" value={chosen ? String(chosen.at) : 'none'} onChoose={(value) => setLook(value === 'none' ? value : Number(value))} options={[...times.map(({ at, words }) => ({ value: String(at), name: words })), { value: 'none', name: 'not said' }]} />
      )}
      {failed && <FormError>{failed}</FormError>}
      <div className="flex flex-wrap gap-2 [&>*]:flex-1">
        {alert.state === 'open' && mayTake && (
          <Button look="first" disabled={sending} className="min-h-11" onClick={() => void run(() => acknowledgeAlert(alert.id, { note: said, look_again_at: chosen ? new Date(chosen.at * 1000).toISOString() : null }))}>
            {chosen ? `I have it, look ${chosen.words}` : 'I have it'}
          </Button>
        )}
        {mayClear && (
          <Button disabled={sending} className="min-h-11" onClick={() => void run(() => resolveAlert(alert.id, { note: said }))}>
            {alert.state === 'open' ? 'Not a fault, clear' : 'Done, clear'}
          </Button>
        )}
      </div>
    </div>
  );
}

/** What is wrong, its number, what to do, who was told; and to say that one has it. */
export function AlertDetail({ alert, now, timeZone, rest, mayTake, mayClear, taking, onBack }: AlertDetailProps) {
  const { state, word } = alertState(alert);
  const call = alert.evidence;
  const ruler = rulerOf(alert.call, call, null);
  const told = toldLines(alert, now, timeZone);
  const gone = alert.state === 'resolved' ? null : goneSentence(alert, now, timeZone);
  return (
    <article aria-label={`${word}, ${alert.batch.name}`} className="flex min-w-0 flex-col [overflow-wrap:anywhere] gap-5 px-(--margin) py-4 strip:bg-lit">
      <button type="button" onClick={onBack} className="type-label -mb-3 -ml-2 inline-flex min-h-11 items-center gap-1 self-start px-2 text-ink2 strip:hidden">
        <BackIcon size={11} /> Alerts
      </button>
      <header>
        <State state={state} size={18} word={`${word}, ${alert.batch.name}`} className="text-[0.84375rem]" />
        <h2 className="type-head mt-2">
          <Sentence strong>{call.headline}</Sentence>
        </h2>
        <p className="type-body mt-1">
          <Sentence>{call.reason}</Sentence>
        </p>
        <p className="type-label mt-1 text-ink2">{standsSince(alert, now, timeZone)}</p>
        {gone && (
          <p className="type-body mt-3 border-l-[3px] border-ink pl-3">
            <Sentence>{gone}</Sentence>
          </p>
        )}
      </header>
      {ruler && (
        <Part name="the number">
          <Ruler {...ruler} state={state} />
        </Part>
      )}
      {call.act && (
        <Part name="what to do">
          <p className="type-body">
            <Sentence>{call.act}</Sentence>
          </p>
          {call.changes_it && (
            <p className="type-reason mt-1 text-ink2">
              <Sentence>{call.changes_it}</Sentence>
            </p>
          )}
        </Part>
      )}
      <Part name="who was told">
        <ul className="flex flex-col gap-1">
          {told.length === 0 && <li className="type-body text-ink2">Nobody yet: only what people asked to hear is mailed.</li>}
          {told.map((line) => (
            <li key={line.text} className="type-body flex items-center gap-3">
              <ToldMark state={line.state} />
              <span>
                <Sentence>{line.text.charAt(0).toUpperCase() + line.text.slice(1)}</Sentence>
              </span>
            </li>
          ))}
        </ul>
        {alert.state !== 'open' && (
          <p className="type-label mt-2 text-ink2">
            {alertFate(alert, now, timeZone)
              .map((line) => line.text)
              .join(', ')}
            {alert.note !== null && <>: “{alert.note}”</>}
          </p>
        )}
      </Part>
      {alert.state !== 'resolved' && <BatchMute batch={alert.batch} now={now} timeZone={timeZone} />}
      {alert.state !== 'resolved' && (mayTake || mayClear) && <TakeForm key={alert.id} alert={alert} now={now} timeZone={timeZone} rest={rest} mayTake={mayTake} mayClear={mayClear} taking={taking} />}
      <Link href={`/batches/${alert.batch.id}`} className="type-label min-h-8 text-ink underline decoration-rule2 underline-offset-4">
        To {alert.batch.name}, its curve and its log
      </Link>
    </article>
  );
}

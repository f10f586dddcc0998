'use client';

import { useState } from 'react';
import Link from 'next/link';
import { clock, dayName, when } from '@/components/charts/zone';
import { fromLocal, toLocal } from '@/components/batch/entry-form';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { endMute, muteVessel } from '@/lib/client/messages';
import type { MuteBody } from '@/lib/contracts/messages';
import { useSaving } from './use-saving';
import { muteTimes } from './words';

const seconds = (iso: string) => Date.parse(iso) / 1000;

/** `Muted until 18:00 by Una` */
export function muteWords(mute: Pick<MuteBody, 'until' | 'by'>, now: number, timeZone: string): string {
  const until = seconds(mute.until);
  const time = until - now > 5 * 86_400 ? `${dayName(until, timeZone)} ${clock(until, timeZone)}` : when(until, now, timeZone);
  return `Muted until ${time}${mute.by ? ` by ${mute.by.name}` : ''}`;
}

/** A bell with a bar, drawn small beside its words. */
export function MuteMark({ size = 13 }: { size?: number }) {
  return (
    <svg viewBox="0 0 16 16" width={size} height={size} aria-hidden fill="none" stroke="currentColor" strokeWidth="1.5" strokeLinejoin="round" className="shrink-0">
      <path d="M3 12h10c-1.3-1.2-1.6-2.6-1.6-5A3.4 3.4 0 0 0 8 3.4 3.4 3.4 0 0 0 4.6 7c0 2.4-.3 3.8-1.6 5ZM6.7 14h2.6M8 3.4V2M2 14.5 14 1.5" />
    </svg>
  );
}

/** One line that says so, for the shelf, an alert and a batch's head. */
export function MutedLine({ mute, now, timeZone, className = '' }: { mute: Pick<MuteBody, 'until' | 'by'>; now: number; timeZone: string; className?: string }) {
  return (
    <span className={`type-label inline-flex items-center gap-1.5 text-ink2 ${className}`}>
      <MuteMark />
      <Sentence>{muteWords(mute, now, timeZone)}</Sentence>
    </span>
  );
}

/** Mutes a vessel for a time, says by whom it is, and ends it. */
export function MuteVessel({ batch, mute, now, timeZone, mayMute }: { batch: { id: string; name: string }; mute: MuteBody | null; now: number; timeZone: string; mayMute: boolean }) {
  const [open, setOpen] = useState(false);
  const [until, setUntil] = useState('');
  const { busy, failed, run } = useSaving('It was not done. Try again.');
  if (mute) {
    return (
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
        {failed && <FormError>{failed}</FormError>}
        <MutedLine mute={mute} now={now} timeZone={timeZone} />
        {mayMute && (
          <Button size="lane" disabled={busy} onClick={() => void run(() => endMute(mute.id))}>
            Tell us again
          </Button>
        )}
      </div>
    );
  }
  if (!mayMute) return null;
  const mute_ = (at: number) => run(() => muteVessel(batch.id, { until: new Date(at * 1000).toISOString() })).then((done) => done && setOpen(false));
  const chosen = fromLocal(until, timeZone);
  if (!open) {
    return (
      <Button size="lane" look="quiet" onClick={() => setOpen(true)}>
        Mute this vessel
      </Button>
    );
  }
  return (
    <div role="group" aria-label={`Mute ${batch.name}`} className="flex flex-col gap-2">
      <p className="type-reason text-ink2">Nobody is told of {batch.name} for that time; alerts stand here all the same. What can hurt someone is still told.</p>
      {failed && <FormError>{failed}</FormError>}
      <div className="flex flex-wrap gap-2">
        {muteTimes(now, timeZone).map((time) => (
          <Button key={time.words} size="lane" disabled={busy} onClick={() => void mute_(time.at)}>
            {time.words}
          </Button>
        ))}
        <Button size="lane" look="quiet" onClick={() => setOpen(false)}>
          Leave it
        </Button>
      </div>
      <div className="flex flex-wrap items-end gap-2">
        <Field label="Or until" type="datetime-local" min={toLocal(now, timeZone)} value={until} onChange={(event) => setUntil(event.target.value)} className="w-56" />
        <Button disabled={busy || chosen === null || seconds(chosen) <= now} onClick={() => void (chosen && mute_(seconds(chosen)))}>
          Mute it
        </Button>
      </div>
    </div>
  );
}

/** All mutes of the cellar, each to be ended. */
export function MuteList({ mutes, now, timeZone, mayMute }: { mutes: readonly MuteBody[]; now: number; timeZone: string; mayMute: boolean }) {
  const { busy, failed, run } = useSaving('It was not ended. Try again.');
  return (
    <>
      {failed && <FormError>{failed}</FormError>}
      <ul>
        {mutes.map((mute) => (
          <li key={mute.id} className="flex flex-wrap items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2">
            <Link href={`/batches/${mute.batch.id}`} className="type-name-low min-w-0 flex-1 basis-48 break-words">
              {mute.batch.name}
            </Link>
            <MutedLine mute={mute} now={now} timeZone={timeZone} />
            {mayMute && (
              <Button size="lane" disabled={busy} aria-label={`End the mute of ${mute.batch.name}`} onClick={() => void run(() => endMute(mute.id))}>
                Tell us again
              </Button>
            )}
          </li>
        ))}
      </ul>
    </>
  );
}

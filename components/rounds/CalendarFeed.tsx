'use client';

import { useState } from 'react';
import { when } from '@/components/charts/zone';
import { Button, buttonClass } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { FormError } from '@/components/ui/Notice';
import { endCalendar, makeCalendar, useCalendar } from '@/lib/client/jobs';
import { ClientError } from '@/lib/client/fetcher';

/** The person's own address of the rounds, for the calendar on a phone. */
export function CalendarFeed({ now, timeZone }: { now: number; timeZone: string }) {
  const { calendar, error } = useCalendar();
  const [busy, setBusy] = useState(false);
  const [copied, setCopied] = useState(false);
  const [failed, setFailed] = useState<string | null>(null);

  async function send(act: () => Promise<unknown>) {
    setBusy(true);
    setFailed(null);
    try {
      await act();
    } catch (problem) {
      setFailed(problem instanceof ClientError ? problem.message : 'It did not work. Try again.');
    }
    setBusy(false);
  }

  async function copy(url: string) {
    setFailed(null);
    try {
      await navigator.clipboard.writeText(url);
      setCopied(true);
    } catch {
      // a browser gives the clipboard only to pages it trusts
      setFailed('This browser does not copy for a page. Touch the address and copy it there.');
    }
  }

  if (error && !calendar) return <FormError>{error.message}</FormError>;
  if (!calendar) return <Haze height={72} label="Loading the calendar address" />;
  return (
    <div className="flex flex-col gap-4">
      <p className="type-body">The rounds in your own calendar. Whoever has the address can read the jobs, so keep it to yourself.</p>
      {calendar.url ? (
        <>
          <Field label="Address to subscribe to" readOnly value={calendar.url} onFocus={(event) => event.target.select()} hint={calendar.last_read_at ? `last read ${when(Date.parse(calendar.last_read_at) / 1000, now, timeZone)}` : 'not read by a calendar yet'} />
          <div className="flex flex-wrap items-center justify-end gap-2">
            {copied && (
              <span role="status" className="type-label text-ink2">
                Copied.
              </span>
            )}
            <a href={calendar.url.replace(/^https?:/, 'webcal:')} className={buttonClass('plain', 'normal')}>
              Open in a calendar
            </a>
            <Button look="first" onClick={() => void copy(calendar.url ?? '')}>
              Copy the address
            </Button>
          </div>
          <div className="flex flex-wrap justify-end gap-2 border-t pt-4">
            <Button look="final" disabled={busy} onClick={() => void send(endCalendar)}>
              End this address
            </Button>
            <Button disabled={busy} onClick={() => void send(makeCalendar)}>
              Make another
            </Button>
          </div>
        </>
      ) : (
        <Button look="first" className="self-end" disabled={busy} onClick={() => void send(makeCalendar)}>
          Make an address
        </Button>
      )}
      {failed && <FormError>{failed}</FormError>}
    </div>
  );
}

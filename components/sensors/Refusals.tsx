'use client';

import { when } from '@/components/charts/zone';
import { Haze } from '@/components/ui/Haze';
import { ErrorState } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { useRefusals } from '@/lib/client/sensors';

/** What it sent that was not taken, and why: whoever set the sensor up can put it right from this. */
export function Refusals({ sensorId, now, timeZone }: { sensorId: string; now: number; timeZone: string }) {
  const { refusals, error, loading, retry } = useRefusals(sensorId);
  return (
    <section aria-label="Refused">
      <GroupBar word="Refused" note={refusals ? `${refusals.length}, kept for 30 days` : 'kept for 30 days'} />
      {loading && (
        <div className="px-(--margin) py-3">
          <Haze height={60} label="Loading what was refused" />
        </div>
      )}
      {error && !refusals && (
        <ErrorState title="What was refused did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      )}
      {refusals?.length === 0 && <p className="type-body px-(--margin) py-3 text-ink2">Nothing was refused. A message that cannot be a reading would stand here with its reason.</p>}
      <ul>
        {refusals?.map((refusal) => (
          <li key={refusal.id} className="grid gap-x-5 border-b border-rule px-(--margin) py-2 strip:grid-cols-[7.5rem_3.5rem_minmax(0,1fr)]">
            <span className="type-label text-ink2">{when(Date.parse(refusal.received_at) / 1000, now, timeZone)}</span>
            <span className="type-label text-ink2">{refusal.road === 'mqtt' ? 'MQTT' : 'HTTP'}</span>
            <div className="min-w-0">
              <p className="type-body">{refusal.reason}</p>
              <details>
                <summary className="type-label inline-flex min-h-6 cursor-pointer items-center text-ink2">what it sent</summary>
                <pre tabIndex={0} className="max-h-48 overflow-auto whitespace-pre-wrap break-all bg-well px-2 py-1.5 font-mono text-[0.75rem]/[1.125rem]">
                  {refusal.body === '' ? '(nothing)' : refusal.body}
                </pre>
              </details>
            </div>
          </li>
        ))}
      </ul>
    </section>
  );
}

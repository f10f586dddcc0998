'use client';

import { when } from '@/components/charts/zone';
import { State } from '@/components/ui/StateMark';
import { useNow } from '@/components/ui/now';
import { useMe } from '@/lib/client/me';
import { useRawReadings, useRefusals } from '@/lib/client/sensors';
import { gravityWords, linkWords, temperatureWords } from './words';

const ASK_EVERY_MS = 2_000;

/** The first word of a sensor as it comes in: taken, or refused and why. `since` in ms. */
export function FirstMessage({ sensorId, since }: { sensorId: string; since: number }) {
  const { me } = useMe();
  const now = (useNow() ?? since) / 1000;
  const { data } = useRawReadings(sensorId, 5, ASK_EVERY_MS);
  const { refusals } = useRefusals(sensorId, ASK_EVERY_MS);
  const timeZone = me?.cellar.time_zone ?? 'UTC';
  const heard = data?.items.find((reading) => Date.parse(reading.received_at) >= since);
  const refused = refusals?.find((refusal) => Date.parse(refusal.received_at) >= since);
  return (
    <section aria-live="polite" aria-label="First message" className="flex flex-col gap-2 border-b px-(--margin) py-4">
      {heard ? (
        <>
          <State state="Done" word="Heard" />
          <p className="type-verdict-now">It arrived at {when(Date.parse(heard.received_at) / 1000, now, timeZone)}</p>
          <dl className="grid grid-cols-2 gap-x-4 gap-y-2">
            {(
              [
                ['gravity', gravityWords(heard.gravity)],
                ['inclination', heard.inclination === null ? null : `${heard.inclination.toFixed(1)}°`],
                ['foam', heard.foam === null ? null : `${Math.round(heard.foam)} mm`],
                ['temperature', temperatureWords(heard.temperature)],
                ['cell', heard.battery === null ? null : `${heard.battery.toFixed(2)} V`],
                ['link', heard.signal === null ? null : linkWords(heard.signal)],
                ['number', heard.sequence === null ? null : String(heard.sequence)],
              ] as const
            ).map(([name, value]) =>
              value === null || value === '–' ? null : (
                <div key={name}>
                  <dt className="type-label text-ink2">{name}</dt>
                  <dd className="font-mono text-[0.9375rem]/[1.25rem] font-semibold">{value}</dd>
                </div>
              ),
            )}
          </dl>
          {heard.gravity === null && heard.inclination !== null && <p className="type-body text-ink2">It sends its inclination: calibrate it, and this turns into gravity.</p>}
        </>
      ) : (
        <>
          <State state="Leave be" word="Waiting" />
          <p className="type-verdict-now">Nothing yet</p>
        </>
      )}
      {refused && (
        <div className="border-l-[3px] border-ochre pl-3">
          <State state="Check" word="Refused" />
          <p className="type-body">{refused.reason}</p>
        </div>
      )}
    </section>
  );
}

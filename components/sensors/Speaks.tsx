'use client';

import { useState } from 'react';
import { when } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Select } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { State } from '@/components/ui/StateMark';
import type { SensorBody } from '@/lib/contracts/sensors';
import { setSensor } from '@/lib/client/sensors';
import { IntervalOptions } from './Intervals';
import { useAct } from '@/components/ui/use-act';
import { everyWords } from './words';

/** How often it is to speak, sent down to it; it confirms by itself with its next word. */
export function Speaks({ sensor, now, timeZone }: { sensor: SensorBody; now: number; timeZone: string }) {
  const [chosen, setChosen] = useState(String(sensor.settings?.interval_s ?? sensor.interval_s));
  const { busy, failed, act } = useAct('The settings were not sent. Try again.');
  const { settings } = sensor;
  const at = (time: string) => when(Date.parse(time) / 1000, now, timeZone);
  return (
    <div className="flex flex-col gap-3 border-b px-(--margin) py-4">
      {failed && <FormError>{failed}</FormError>}
      <div className="flex flex-wrap items-end gap-2">
        <Select label="tell it to speak every" value={chosen} onChange={(event) => setChosen(event.target.value)} className="min-w-36 flex-1">
          <IntervalOptions given={Number(chosen)} />
        </Select>
        <Button disabled={busy} onClick={() => void act(() => setSensor(sensor.id, Number(chosen)))}>
          Send it down
        </Button>
      </div>
      {settings ? (
        <div>
          <State state={settings.confirmed_at ? 'Done' : 'In hand'} word={settings.confirmed_at ? 'Confirmed' : 'Sent'} />
          <p className="type-reason text-ink2">
            Settings {settings.version}: every {everyWords(settings.interval_s)}, sent {at(settings.sent_at)}
            {settings.confirmed_at ? `, confirmed by the sensor ${at(settings.confirmed_at)}.` : '; it has not said yet that it took them.'}
          </p>
        </div>
      ) : (
        <p className="type-reason text-ink2">Lies on its settings topic for whenever it listens. A sensor that confirms says so with its next reading.</p>
      )}
    </div>
  );
}

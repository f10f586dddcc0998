'use client';

import { useState } from 'react';
import { dayName } from '@/components/charts/zone';
import { Button, LinkButton } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { State } from '@/components/ui/StateMark';
import type { SensorBody } from '@/lib/contracts/sensors';
import { useMe } from '@/lib/client/me';
import { useSensor } from '@/lib/client/sensors';
import { ConnectLines, type Doors } from './ConnectLines';
import { Naming } from './Naming';
import { Placement, useSensorChange } from './Placement';
import { Refusals } from './Refusals';
import { cellWords, everyWords, gravityWords, heardWords, linkWords, sensorState, temperatureWords } from './words';

function Facts({ sensor, now, timeZone }: { sensor: SensorBody; now: number; timeZone: string }) {
  const facts = [
    { name: 'last heard', value: heardWords(sensor, now, timeZone) },
    { name: 'speaks every', value: everyWords(sensor.interval_s) },
    { name: 'gravity', value: gravityWords(sensor.last?.gravity) },
    { name: 'temperature', value: temperatureWords(sensor.last?.temperature) },
    { name: 'cell', value: cellWords(sensor.last?.battery) },
    { name: 'link', value: linkWords(sensor.last?.signal) },
    { name: 'refused in 24 h', value: String(sensor.refused_24h) },
    { name: 'added', value: dayName(Date.parse(sensor.created_at) / 1000, timeZone) },
  ];
  return (
    <dl className="grid grid-cols-2 border-b strip:grid-cols-4">
      {facts.map((fact) => (
        <div key={fact.name} className="border-b border-rule px-(--margin) py-2 [&:nth-last-child(-n+2)]:border-b-0 strip:[&:nth-last-child(-n+4)]:border-b-0">
          <dt className="type-label text-ink2">{fact.name}</dt>
          <dd className="font-mono text-[0.9375rem]/[1.25rem] font-semibold">{fact.value}</dd>
        </div>
      ))}
    </dl>
  );
}

/** Off: its credential no longer opens anything. Asked twice, since a sensor at work falls silent. */
function OnOff({ sensor }: { sensor: SensorBody }) {
  const { busy, failed, change } = useSensorChange(sensor.id);
  const [sure, setSure] = useState(false);
  return (
    <>
      {failed && <FormError>{failed}</FormError>}
      {sensor.disabled ? (
        <Button disabled={busy} onClick={() => void change({ disabled: false })}>
          Switch it on
        </Button>
      ) : sure ? (
        <>
          <span className="type-label text-ink2">It will be refused until it is switched on again.</span>
          <Button look="final" disabled={busy} onClick={() => void change({ disabled: true }).then(() => setSure(false))}>
            Switch it off
          </Button>
          <Button onClick={() => setSure(false)}>Leave it on</Button>
        </>
      ) : (
        <Button onClick={() => setSure(true)}>Switch it off</Button>
      )}
    </>
  );
}

/** One sensor: how it is, where it is, what it sent that was refused, how to reach this house with it. */
export function SensorPage({ id, doors }: { id: string; doors: Doors }) {
  const { me, may } = useMe();
  const { sensor, error, loading, retry } = useSensor(id);
  const nowMs = useNow();
  const now = (nowMs ?? 0) / 1000;
  const timeZone = me?.cellar.time_zone ?? 'UTC';
  if (loading || (!sensor && !error)) {
    return (
      <div className="px-(--margin) py-4">
        <Haze height={180} label="Loading the sensor" />
      </div>
    );
  }
  if (!sensor) {
    return error?.status === 404 ? (
      <ErrorState title="There is no such sensor here">
        <p className="pb-3">The address may be mistyped, or it belongs to another cellar.</p>
        <LinkButton href="/sensors">To the sensors</LinkButton>
      </ErrorState>
    ) : (
      <ErrorState title="The sensor did not load" onRetry={retry}>
        {error?.message}
      </ErrorState>
    );
  }
  const { state, word } = sensorState(sensor, now);
  return (
    <>
      <PageHead
        title={sensor.name}
        size="title"
        meta={
          <span className="flex flex-wrap items-center gap-x-4">
            <State state={state} word={word} />
            {sensor.id}
          </span>
        }
      >
        {may('sensors.manage') && <OnOff sensor={sensor} />}
      </PageHead>
      <div className="wide:grid wide:grid-cols-[minmax(0,1fr)_424px]">
        <div className="min-w-0">
          <Facts sensor={sensor} now={now} timeZone={timeZone} />
          <Refusals sensorId={id} now={now} timeZone={timeZone} />
        </div>
        <div className="wide:border-l">
          <GroupBar word="Vessel" />
          <Placement sensor={sensor} mayAssign={may('sensors.assign')} timeZone={timeZone} />
          {may('sensors.manage') && (
            <>
              <GroupBar word="Name" />
              <Naming sensor={sensor} />
            </>
          )}
          <GroupBar word="How it reaches this house" />
          <div className="px-(--margin) py-4">
            <p className="type-body pb-4 text-ink2">Its secret was shown when it was added and is not kept; put it where the lines say SECRET.</p>
            <ConnectLines sensor={sensor.id} secret={null} doors={doors} />
          </div>
        </div>
      </div>
    </>
  );
}

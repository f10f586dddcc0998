'use client';

import { useState } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { State } from '@/components/ui/StateMark';
import type { CreatedSensorBody, SensorBody } from '@/lib/contracts/sensors';
import { useMe } from '@/lib/client/me';
import { useSensor, useSensorHealth } from '@/lib/client/sensors';
import { Calibration } from './Calibration';
import { ConnectLines, type Doors } from './ConnectLines';
import { Credential } from './Credential';
import { Health, RefusedReasons } from './Health';
import { Naming } from './Naming';
import { Hanging, Placement, useSensorChange } from './Placement';
import { ProbeReadings } from './ProbeReadings';
import { Refusals } from './Refusals';
import { SecretShown } from './SecretShown';
import { Speaks } from './Speaks';
import { Stays } from './Stays';
import { KIND_WORDS, sensorState } from './words';

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
  const { data: health } = useSensorHealth(id);
  const [renewed, setRenewed] = useState<{ sensor: CreatedSensorBody; at: number } | null>(null);
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
  if (renewed) return <SecretShown sensor={renewed.sensor} doors={doors} since={renewed.at} onDone={() => setRenewed(null)} />;
  const { state, word } = sensorState(sensor, now, health?.findings);
  return (
    <>
      <PageHead
        title={sensor.name}
        size="title"
        meta={
          <span className="flex flex-wrap items-center gap-x-4">
            <State state={state} word={word} />
            <span>{KIND_WORDS[sensor.kind].name.toLowerCase()}</span>
            <span className="break-all">{sensor.id}</span>
          </span>
        }
      >
        {may('sensors.manage') && <OnOff sensor={sensor} />}
      </PageHead>
      <div className="flex flex-col wide:grid wide:grid-cols-[minmax(0,1fr)_424px] wide:grid-rows-[auto_1fr]">
        <div className="min-w-0 max-wide:order-2 wide:row-span-2">
          {sensor.kind === 'float' ? <Calibration sensor={sensor} mayChange={may('sensors.calibrate')} now={now} timeZone={timeZone} /> : <ProbeReadings sensor={sensor} now={now} timeZone={timeZone} />}
          <Stays id={id} timeZone={timeZone} />
          <RefusedReasons id={id} />
          <Refusals sensorId={id} now={now} timeZone={timeZone} />
          <GroupBar word="How it reaches this house" />
          <div className="px-(--margin) py-4">
            <p className="type-body pb-4 text-ink2">Its secret was shown once and is not kept; put it where the lines say SECRET.</p>
            <ConnectLines sensor={sensor.id} secret={null} doors={doors} kind={sensor.kind} />
          </div>
        </div>
        <div className="max-wide:order-1 wide:border-l">
          <GroupBar word="Health" />
          <Health sensor={sensor} now={now} timeZone={timeZone} />
          {sensor.kind === 'room' && (
            <>
              <GroupBar word="Place" />
              <Hanging sensor={sensor} mayAssign={may('sensors.assign')} />
            </>
          )}
          <GroupBar word="Vessel" />
          <Placement sensor={sensor} mayAssign={may('sensors.assign')} timeZone={timeZone} now={now} />
        </div>
        <div className="max-wide:order-3 wide:col-start-2 wide:border-l">
          {may('sensors.manage') && (
            <>
              <GroupBar word="Settings sent down" />
              <Speaks sensor={sensor} now={now} timeZone={timeZone} />
              <GroupBar word="Name" />
              <Naming sensor={sensor} />
              <GroupBar word="Credential" />
              <Credential sensor={sensor} onNewSecret={(made) => setRenewed({ sensor: made, at: nowMs ?? 0 })} />
            </>
          )}
        </div>
      </div>
    </>
  );
}

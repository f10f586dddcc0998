'use client';

import Link from 'next/link';
import { useMemo, useState } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { PageHead } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import type { SensorBody, SensorHealthList, SensorLimits } from '@/lib/contracts/sensors';
import { useMe } from '@/lib/client/me';
import { useSensors, useSensorsHealth } from '@/lib/client/sensors';
import { daysLeftWords } from './Health';
import { cellWords, gravityWords, heardWords, limitWords, linkWords, sensorState, temperatureWords } from './words';

type SensorHealth = SensorHealthList['items'][number];

const COLUMNS = 'strip:grid strip:grid-cols-[8.5rem_minmax(8rem,1.3fr)_minmax(8rem,1.4fr)_6.5rem_8.5rem_8.5rem_8rem_5rem] strip:items-center strip:gap-x-4';

/** A figure under its name on a phone, in its column elsewhere. */
function Cell({ name, children, right = false }: { name: string; children: React.ReactNode; right?: boolean }) {
  return (
    <div className={`type-label min-w-0 max-strip:flex max-strip:gap-[1ch] ${right ? 'strip:text-right' : ''}`}>
      <dt className="text-ink2 strip:hidden">{name}</dt>
      <dd className="min-w-0 text-ink">{children}</dd>
    </div>
  );
}

function Row({ sensor, health, limits, now, timeZone }: { sensor: SensorBody; health: SensorHealth | undefined; limits: SensorLimits | undefined; now: number; timeZone: string }) {
  const findings = health?.findings.filter((finding) => finding.of !== 'silence') ?? [];
  const { state, word } = sensorState(sensor, now, findings);
  const found = (of: SensorHealth['findings'][number]['of']) => (findings.some((finding) => finding.of === of) ? 'font-semibold text-ochre' : undefined);
  const days = sensor.last && daysLeftWords(health?.battery_days ?? null);
  return (
    <li className="relative border-b border-rule px-(--margin) py-3 hover:bg-lit strip:py-0">
      <div className={`${COLUMNS} strip:min-h-[52px]`}>
        <span className="max-strip:hidden">
          <State state={state} word={word} />
        </span>
        <div className="flex min-w-0 flex-wrap items-baseline justify-between gap-x-3">
          <h2 className="type-name-low min-w-0 break-words">
            <Link href={`/sensors/${sensor.id}`} className="no-underline after:absolute after:inset-0 after:content-[''] focus-visible:outline-none focus-visible:after:outline-3 focus-visible:after:-outline-offset-3 focus-visible:after:outline-mercury">
              {sensor.name}
            </Link>
          </h2>
          <span className="strip:hidden">
            <State state={state} word={word} />
          </span>
        </div>
        <dl className="grid grid-cols-[3fr_2fr] gap-x-4 strip:contents">
          <Cell name="in">
            {sensor.batch ? (
              <Link href={`/batches/${sensor.batch.id}`} className="relative z-10 block truncate underline-offset-2 hover:underline strip:font-serif strip:text-[0.875rem]">
                {sensor.batch.name}
              </Link>
            ) : (
              <span className="break-words text-ink2">{sensor.place ?? 'no vessel'}</span>
            )}
          </Cell>
          <Cell name="heard">{heardWords(sensor, now, timeZone)}</Cell>
          <Cell name="said">
            {sensor.last ? (
              <>
                {sensor.kind === 'float' && <b className="font-semibold">{gravityWords(sensor.last.gravity)}</b>} {temperatureWords(sensor.last.temperature)}
              </>
            ) : (
              '–'
            )}
          </Cell>
          <Cell name="link">
            <span className={found('signal')}>{linkWords(sensor.last?.signal, limits?.weak_signal_dbm)}</span>
          </Cell>
          <Cell name="cell">
            <span className={sensor.last ? found('battery') : undefined}>{cellWords(sensor.last?.battery)}</span>
            {days && <span className="whitespace-nowrap text-ink2 max-strip:before:content-[',_'] strip:block">{days}</span>}
          </Cell>
          <Cell name="refused" right>
            <span className={sensor.refused_24h > 0 ? 'font-semibold text-ochre' : 'text-ink2'}>{sensor.refused_24h}</span>
          </Cell>
        </dl>
      </div>
      {findings.length > 0 && (
        <p className="type-reason pt-1 text-ink2 strip:pb-2 strip:pl-[9.5rem]">
          <Sentence>{findings.map((finding) => finding.says).join(' ')}</Sentence>
        </p>
      )}
    </li>
  );
}

const URGENT = ['Silent', 'Check'];

/** What wants a look first, then by name, figures in it as numbers. */
function inOrder(sensors: readonly SensorBody[], healthOf: ReadonlyMap<string, SensorHealth>, now: number): SensorBody[] {
  const rank = (sensor: SensorBody) => {
    const at = URGENT.indexOf(sensorState(sensor, now, healthOf.get(sensor.id)?.findings).state);
    return at < 0 ? URGENT.length : at;
  };
  return [...sensors].sort((a, b) => rank(a) - rank(b) || a.name.localeCompare(b.name, 'en', { numeric: true }));
}

/** What one answer holds at most. */
const PAGE = 200;

/** All sensors of the cellar: where they are, when they were heard, how they are. */
export function SensorList() {
  const { me, may } = useMe();
  const [cursor, setCursor] = useState<string | null>(null);
  const { sensors, nextCursor, error, loading, retry } = useSensors({ limit: PAGE, ...(cursor !== null && { cursor }) });
  const { data: health } = useSensorsHealth();
  const healthOf = useMemo(() => new Map(health?.items.map((item) => [item.sensor, item])), [health]);
  const nowMs = useNow();
  const timeZone = me?.cellar.time_zone ?? 'UTC';
  const now = (nowMs ?? 0) / 1000;
  const silent = sensors?.filter((sensor) => sensorState(sensor, now).state === 'Silent').length ?? 0;
  const create = may('sensors.manage') && (
    <LinkButton href="/sensors/new" look="first">
      Add a sensor
    </LinkButton>
  );
  return (
    <>
      <PageHead title="Sensors" meta={sensors && sensors.length > 0 && `${cursor !== null || nextCursor !== null ? `${sensors.length} shown` : `${sensors.length} in this cellar`}${silent > 0 ? `, ${silent} silent` : ''}`}>
        {sensors && sensors.length > 0 && create}
      </PageHead>
      {loading && (
        <div className="px-(--margin) py-4">
          <Haze height={120} label="Loading the sensors" />
        </div>
      )}
      {error && !sensors && (
        <ErrorState title={error.status === 403 ? 'Sensors are not shown to guests' : 'The sensors did not load'} {...(error.status === 403 ? {} : { onRetry: retry })}>
          {error.message}
        </ErrorState>
      )}
      {sensors?.length === 0 && (
        <EmptyState title="No sensor yet" action={create}>
          A float sensor tells gravity and temperature by itself, over MQTT or HTTP. Readings by hand work without one.
        </EmptyState>
      )}
      {sensors && sensors.length > 0 && (
        <>
          <div aria-hidden className={`type-label border-b bg-desk px-(--margin) py-0.5 text-ink2 max-strip:hidden ${COLUMNS}`}>
            <span>state</span>
            <span>sensor</span>
            <span>in</span>
            <span>last heard</span>
            <span>last word</span>
            <span>link</span>
            <span>cell, days left</span>
            <span className="text-right">refused</span>
          </div>
          <ul>
            {inOrder(sensors, healthOf, now).map((sensor) => (
              <Row key={sensor.id} sensor={sensor} health={healthOf.get(sensor.id)} limits={health?.limits} now={now} timeZone={timeZone} />
            ))}
          </ul>
          {(cursor !== null || nextCursor !== null) && (
            <div className="flex flex-wrap items-center gap-3 border-b bg-desk px-(--margin) py-2">
              <p className="type-body mr-auto">This cellar has more sensors than one list holds.</p>
              {cursor !== null && <Button onClick={() => setCursor(null)}>Back to the first</Button>}
              {nextCursor !== null && <Button onClick={() => setCursor(nextCursor)}>Show the next</Button>}
            </div>
          )}
          {health && (
            <p className="type-reason border-b px-(--margin) py-2 text-ink2">
              This list says so when <Sentence>{limitWords(health.limits)}</Sentence>{' '}
              {may('sensors.manage') && (
                <Link href="/settings/sensors" className="underline underline-offset-2">
                  Change the limits
                </Link>
              )}
            </p>
          )}
        </>
      )}
    </>
  );
}

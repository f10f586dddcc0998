'use client';

import { duration } from '@/components/charts/zone';
import { Haze } from '@/components/ui/Haze';
import { ErrorState } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import type { SensorBody, SensorHealthBody } from '@/lib/contracts/sensors';
import { useSensorHealth } from '@/lib/client/sensors';
import { cellWords, everyWords, gravityWords, heardWords, linkWords, temperatureWords } from './words';

/** `about 90 days, 70–120`; the high end may be further off than a line reaches. */
export function daysWords(days: { value: number; lo: number | null; hi: number | null } | null): string | null {
  if (!days) return null;
  const value = Math.round(days.value);
  if (value < 1) return 'flat';
  const [lo, hi] = [days.lo === null ? null : Math.floor(days.lo), days.hi === null ? null : Math.ceil(days.hi)];
  const named = value === 1 ? 'day' : 'days';
  if (lo === null || lo === value) return `about ${value} ${named}`;
  return hi === null ? `about ${value} ${named}, ${lo} at least` : `about ${value} ${named}, ${lo}–${hi}`;
}

/** The same in a list: `79–86 days`, `at least 118 days`. */
export function daysLeftWords(days: { value: number; lo: number | null; hi: number | null } | null): string | null {
  if (!days) return null;
  if (days.value < 1) return 'flat';
  const [lo, hi] = [Math.floor(days.lo ?? days.value), days.hi === null ? null : Math.ceil(days.hi)];
  return hi === null ? `${lo} days or more` : lo === hi ? `${lo} ${lo === 1 ? 'day' : 'days'}` : `${lo}–${hi} days`;
}

function clockWords(offset: number | null): string {
  if (offset === null) return 'sends no time';
  if (Math.abs(offset) < 5) return 'right to 5 s';
  return `${duration(Math.abs(offset))} ${offset > 0 ? 'fast' : 'slow'}`;
}

function factsOf(sensor: SensorBody, health: SensorHealthBody | undefined, now: number, timeZone: string): { name: string; value: string; note?: string | null }[] {
  const { battery, signal, gaps } = health ?? {};
  const own =
    sensor.kind === 'float'
      ? [{ name: 'gravity', value: gravityWords(sensor.last?.gravity) }]
      : [];
  return [
    { name: 'last heard', value: heardWords(sensor, now, timeZone) },
    { name: 'speaks every', value: everyWords(sensor.interval_s), note: sensor.settings && !sensor.settings.confirmed_at ? `asked for ${everyWords(sensor.settings.interval_s)}` : null },
    ...own,
    { name: 'temperature', value: temperatureWords(sensor.last?.temperature) },
    { name: 'cell', value: cellWords(sensor.last?.battery), note: daysWords(battery?.days ?? null) },
    { name: 'link', value: linkWords(signal?.dbm ?? sensor.last?.signal, health?.limits.weak_signal_dbm), note: signal ? `weakest −${Math.abs(Math.round(signal.weakest))} dBm` : null },
    { name: 'missed in 24 h', value: gaps ? `${gaps.missed} of ${gaps.heard + gaps.missed}` : 'sends no numbers', note: gaps && gaps.restarts > 0 ? `started again ${gaps.restarts} ×` : null },
    { name: 'its clock', value: health ? clockWords(health.clock_offset_s) : '–' },
  ];
}

/** What a sensor tells of itself; what it does not tell is not called good. */
function toldOf(sensor: SensorBody, { signal, gaps, clock_offset_s: offset }: SensorHealthBody): string[] {
  const told = [sensor.last?.battery != null && 'cell', signal && 'link', offset !== null && 'clock', gaps && 'numbers'];
  return told.filter((word): word is string => typeof word === 'string');
}

function soundWords(told: readonly string[]): string {
  if (told.length === 0) return 'It is heard. Of its cell, link, clock and numbers it tells nothing.';
  const names = told.length === 1 ? told[0]! : `${told.slice(0, -1).join(', ')} and ${told.at(-1)}`;
  return `${names.charAt(0).toUpperCase()}${names.slice(1)} ${told.length === 1 && told[0] !== 'numbers' ? 'is' : 'are'} within the cellar’s limits.${told.length < 4 ? ' Of the rest it tells nothing.' : ''}`;
}

function Findings({ sensor, health }: { sensor: SensorBody; health: SensorHealthBody }) {
  return health.findings.length === 0 ? (
    <div className="border-b px-(--margin) py-3">
      <State state="Done" word="As it should be" />
      <p className="type-body pt-1 text-ink2">{soundWords(toldOf(sensor, health))}</p>
    </div>
  ) : (
    <ul>
      {health.findings.map((finding) => (
        <li key={`${finding.of}${finding.says}`} className="flex flex-col gap-0.5 border-b border-rule bg-lit px-(--margin) py-2.5 last:border-rule2">
          <State state={finding.of === 'silence' ? 'Silent' : 'Check'} word={finding.of === 'silence' ? 'Silent' : 'Check'} />
          <p className="type-verdict">
            <Sentence strong>{finding.says}</Sentence>
          </p>
          <p className="type-reason text-ink2">
            <Sentence>{finding.act}</Sentence>
          </p>
        </li>
      ))}
    </ul>
  );
}

/** How the sensor does: what is not as it should be first, then its figures. */
export function Health({ sensor, now, timeZone }: { sensor: SensorBody; now: number; timeZone: string }) {
  const { data: health, error, loading, retry } = useSensorHealth(sensor.id);
  return (
    <section aria-label="Health">
      {loading && <Haze height={48} label="Loading its health" className="mx-(--margin) my-3" />}
      {error && !health && (
        <ErrorState title="Its health did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      )}
      {health && <Findings sensor={sensor} health={health} />}
      <dl className="grid grid-cols-2 border-b strip:grid-cols-4 wide:grid-cols-2">
        {factsOf(sensor, health, now, timeZone).map((fact) => (
          <div key={fact.name} className="min-w-0 border-b border-rule px-(--margin) py-2">
            <dt className="type-label text-ink2">{fact.name}</dt>
            <dd className="break-words font-mono text-[0.9375rem]/[1.25rem] font-semibold">{fact.value}</dd>
            {fact.note && <dd className="type-label text-ink2">{fact.note}</dd>}
          </div>
        ))}
      </dl>
      {health && health.call && sensor.batch && (
        <p className="type-reason border-b px-(--margin) py-2 text-ink2">
          The watch says: <Sentence>{health.call.headline}</Sentence> <Sentence>{health.call.reason}</Sentence>
        </p>
      )}
    </section>
  );
}

/** Refused messages by their reason, above the list of them. */
export function RefusedReasons({ id }: { id: string }) {
  const { data } = useSensorHealth(id);
  if (!data || data.refused.length === 0) return null;
  return (
    <>
      <GroupBar word="Refused, by reason" />
      <ul>
        {data.refused.map((group) => (
          <li key={group.reason} className="grid grid-cols-[3.5rem_minmax(0,1fr)] gap-x-4 border-b border-rule px-(--margin) py-1.5">
            <span className="font-mono text-[0.875rem] font-semibold">{group.count} ×</span>
            <span className="type-body break-words">{group.reason}</span>
          </li>
        ))}
      </ul>
    </>
  );
}

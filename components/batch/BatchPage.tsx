'use client';

import { useMemo, useState } from 'react';
import { pictureOf } from '@/components/charts/from-wire';
import { dayWords } from '@/components/book/words';
import { wholeSpan, type Span } from '@/components/charts/picture';
import { isWhole, within } from '@/components/charts/zoom';
import { clock, when } from '@/components/charts/zone';
import { LinkButton } from '@/components/ui/Button';
import { MuteBar } from '@/components/messages/BatchMute';
import { Shares } from '@/components/share/Shares';
import { Haze } from '@/components/ui/Haze';
import { usePageLayout } from '@/components/ui/layout';
import { ErrorState } from '@/components/ui/Notice';
import { useSettled } from '@/components/ui/use-settled';
import { useNow } from '@/components/ui/now';
import { EmptyVessel } from '@/components/vessel/Vessel';
import { vesselOf } from '@/components/vessel/describe';
import { useBatch, useJudgement, useSeries, useVerdictChanges } from '@/lib/client/batches';
import { useSurroundings } from '@/lib/client/sensors';
import { useEntries } from '@/lib/client/entries';
import { useMe } from '@/lib/client/me';
import type { BatchBody, EntryBody, SeriesBody } from '@/lib/contracts/batches';
import { BatchHead, PhoneFacts, PhoneHead } from './BatchHead';
import { Calls, type CallScene } from './Calls';
import { callRows, type CallRow } from './calls';
import { Decision, type DoneAct } from './Decision';
import { Ended } from './Ended';
import { EntryForm } from './EntryForm';
import type { EntryDraft, EntryKind } from './entry-form';
import { Evidence } from './Evidence';
import { factsOf, type LastReading } from './facts';
import { litres } from './figures';
import { Log } from './Log';
import { logRows } from './log';
import { OtherCurves } from './OtherCurves';
import { SetupForm } from './SetupForm';
import { Sheet } from '@/components/ui/Sheet';
import { usePlays } from './use-plays';
import { WhatIf } from './WhatIf';
import { dayOf, STAGE_WORDS } from './words';

/** Points asked for: about one for every two pixels of the chart. */
const POINTS = 400;
function Loading() {
  return (
    <div className="px-(--margin) py-4" aria-busy="true">
      <div className="flex items-end gap-6">
        <EmptyVessel height={132} />
        <Haze height={48} className="max-w-[360px] flex-1" label="Loading the batch" />
      </div>
      <Haze height={336} className="mt-6" label="Loading its readings" />
    </div>
  );
}

export function BatchPage({ id }: { id: string }) {
  const { batch, error, retry } = useBatch(id);
  if (batch) return <Loaded batch={batch} />;
  if (error?.status === 404) {
    return (
      <ErrorState title="There is no such batch here">
        <p>It may be in another cellar, or it was taken away.</p>
        <LinkButton href="/shelf" className="mt-2">
          To the shelf
        </LinkButton>
      </ErrorState>
    );
  }
  if (error) {
    return (
      <ErrorState title="The batch did not load" onRetry={retry}>
        {error.message} Nothing logged is lost.
      </ErrorState>
    );
  }
  return <Loading />;
}

type Opened = { form: 'entry'; kind: EntryKind; neck?: EntryDraft['neck']; entry?: EntryBody } | { form: 'setup' } | null;

function Loaded({ batch }: { batch: BatchBody }) {
  const { me, may } = useMe();
  const timeZone = me?.cellar.time_zone ?? 'UTC';
  const phone = usePageLayout() === 'strip';
  const nowMs = useNow();
  const [chosen, setChosen] = useState<Span | null>(null);
  const [opened, setOpened] = useState<Opened>(null);

  const asked = useSettled(chosen);
  const iso = (at: number) => new Date(at * 1000).toISOString();
  const series = useSeries(batch.id, asked ? { from: iso(asked.from), to: iso(asked.to), points: POINTS } : { points: POINTS });
  const last = useMemo(() => lastReading(series.series, series.error !== undefined), [series.series, series.error]);
  const now = nowOf(nowMs ?? Date.parse(batch.assessment?.at ?? batch.created_at), last?.at ?? null);
  const { judgement, error: judgementError, retry: retryJudgement } = useJudgement(batch.id);
  const { entries, error: entriesError, retry: retryEntries } = useEntries(batch.id, { limit: 200 });
  const { changes } = useVerdictChanges(batch.id);

  const judged = judgement ?? batch.assessment;
  const judging = judged === null && judgement === undefined && judgementError === undefined;
  const shown = useMemo(() => ({ ...batch, assessment: judged }), [batch, judged]);
  const footing = judgement?.footing ?? null;
  // What has ended is looked at from its end.
  const asOf = batch.state === 'ended' && batch.ended_at !== null ? Math.min(now, Date.parse(batch.ended_at) / 1000) : now;
  const plays = usePlays(batch, footing, now, timeZone);
  const { laid } = plays;
  const picture = useMemo(
    () => ({ ...pictureOf({ batch: shown, series: series.series, drawn: judgement, entries: entries ?? [] }, asOf, timeZone), ended: asOf < now, laid }),
    [shown, series.series, judgement, entries, asOf, now, timeZone, laid],
  );
  const whole = useMemo(() => wholeSpan(picture, batch.pitched_at === null ? null : Date.parse(batch.pitched_at) / 1000), [picture, batch.pitched_at]);
  const span = chosen ? within(chosen, whole) : whole;

  const rows = useMemo(() => (judged ? callRows(batch, judged, now, timeZone) : []), [batch, judged, now, timeZone]);
  const log = useMemo(() => logRows(entries ?? [], changes ?? []), [entries, changes]);
  const facts = factsOf(shown, last, asOf, timeZone, useSurroundings(batch.id).data?.probes, judging);
  const racked = judged?.stage === 'terminal' && (entries ?? []).some((entry) => entry.kind === 'rack');
  const vessel = vesselOf(shown, racked);

  const working = batch.state === 'working';
  const open = (kind: EntryKind, neck?: EntryDraft['neck']) => setOpened({ form: 'entry', kind, ...(neck === undefined ? {} : { neck }) });
  const onRead = working && may('entries.create') ? () => open('reading') : null;
  const actions = {
    onRead,
    onAdd: working && may('entries.create') ? () => open(may('entries.alter') ? 'addition' : 'observation') : null,
    onSetup: may('batches.update') ? () => setOpened({ form: 'setup' }) : null,
    work: may('entries.create') ? `/batches/${batch.id}/work` : null,
  };
  const first = rows[0] ?? null;
  const known = { pitched: batch.pitched_at !== null, originalGravity: footing ? 1 + footing.effectiveOg / 1000 : batch.original_gravity };
  const close = () => setOpened(null);
  const scene: CallScene = {
    batchId: batch.id,
    now,
    timeZone,
    mayTake: may('alerts.acknowledge'),
    mayOverrule: working && may('entries.alter'),
    leads: (row) => leadOf(row, batch.id, { bench: working && may('lots.bottle'), work: working && may('cellarwork.do') }),
    done: (row) => (working && row.name !== 'rack' && may('entries.create') ? doneAct(row, batch, open, may('entries.alter')) : null),
  };
  const trouble = [
    { what: 'The readings', error: series.error },
    { what: 'The judgement', error: judgementError },
    { what: 'The log', error: entriesError },
  ].find(({ error }) => error !== undefined);
  const retryAll = () => [series.retry, retryJudgement, retryEntries].forEach((retry) => retry());
  const heard = batch.sensor?.last_heard_at ? Date.parse(batch.sensor.last_heard_at) / 1000 : null;
  const day = dayOf(batch.pitched_at, asOf, timeZone);

  return (
    <>
      <PhoneHead batch={batch} onSetup={actions.onSetup} meta={phoneMeta(day === null ? 'not pitched' : `day ${day}`, litres(batch.volume_l), heard === null ? null : `heard ${when(heard, now, timeZone)}`)} />
      <BatchHead batch={shown} vessel={vessel} facts={facts} actions={actions} />
      {!working && <Ended batch={shown} entries={entries ?? []} timeZone={timeZone} onReopen={actions.onSetup} className="bg-lit strip:hidden" />}
      {working && first && <Decision row={first} vessel={vessel} when={whenOf(first, judged, now, timeZone)} done={may('entries.create') ? doneAct(first, batch, open, may('entries.alter')) : null} onRead={onRead} mayTake={may('alerts.acknowledge')} />}
      <PhoneFacts batch={shown} facts={facts} work={actions.work} />
      <div className="wide:grid wide:grid-cols-[minmax(0,1fr)_424px] wide:grid-rows-[auto_1fr]">
        <div className="wide:col-start-1 wide:row-start-1">
          <Evidence name={batch.name} picture={picture} span={span} whole={whole} onSpan={(next) => setChosen(isWhole(next, whole) ? null : next)} timeZone={timeZone} phone={phone} arriving={series.loading} trouble={trouble ? `${trouble.what} did not arrive (${trouble.error?.status ? `error ${trouble.error.status}` : 'no answer'}). Shown is what was known before.` : null} onRetry={retryAll} plays={footing ? plays : null}>
            {footing && plays.open === 'what-if' && <WhatIf draft={plays.draft} played={plays.played} present={{ gravity: (1 + footing.finalGravity.value / 1000).toFixed(3), temperature: footing.temperatureC?.toFixed(1) ?? '20' }} onChange={plays.setDraft} onClose={plays.close} />}
            {footing && plays.open === 'curve' && <OtherCurves chosen={plays.curve} words={plays.curveWords} onChoose={plays.setCurve} onClose={plays.close} />}
          </Evidence>
        </div>
        <div className="wide:col-start-2 wide:row-span-2 wide:row-start-1 wide:border-l">
          {!working && <Ended batch={shown} entries={entries ?? []} timeZone={timeZone} onReopen={actions.onSetup} className="max-strip:hidden" />}
          {judged ? (
            <Calls over={!working} rows={rows} judgedAt={clock(Date.parse(judged.at) / 1000, timeZone)} pending={judgement?.pending ?? false} scene={scene} />
          ) : judging ? (
            <Haze height={260} label="Loading the calls" className="m-(--margin)" />
          ) : (
            <p className="type-body px-(--margin) py-3 text-ink2">Not judged yet. {batch.pitched_at === null ? 'Log the pitch; the calls follow.' : `It is ${STAGE_WORDS.unknown} how it goes until the first readings are in.`}</p>
          )}
          {working && <MuteBar batch={batch} now={now} timeZone={timeZone} />}
          {may('shares.manage') && <Shares batchId={batch.id} day={(at) => dayWords(at, timeZone, now)} folded />}
        </div>
        <div className="wide:col-start-1 wide:row-start-2">
          <Log batchId={batch.id} rows={entries ? log : null} now={now} timeZone={timeZone} onWrite={may('entries.create') ? () => open('observation') : null} onCorrect={(entry) => setOpened({ form: 'entry', kind: entry.kind as EntryKind, entry })} />
        </div>
      </div>
      {opened?.form === 'entry' && (
        <Sheet title={opened.entry ? `Correct the log of ${batch.name}` : batch.name} onClose={close}>
          <EntryForm batchId={batch.id} kind={opened.kind} neck={opened.neck} entry={opened.entry} known={known} now={now} timeZone={timeZone} mayAlter={may('entries.alter')} onDone={close} />
        </Sheet>
      )}
      {opened?.form === 'setup' && (
        <Sheet title={`Set-up of ${batch.name}`} onClose={close}>
          <SetupForm batch={batch} timeZone={timeZone} now={now} onDone={close} />
        </Sheet>
      )}
    </>
  );
}

/** Two short lines, so that the name has the room. */
const phoneMeta = (day: string, volume: string, heard: string | null) => (heard === null ? [day, volume] : [`${day}, ${volume}`, heard]);

/** The page's clock moves by the minute; a reading that has just come in is now. */
function nowOf(clockMs: number, lastAt: number | null): number {
  const now = Math.round(clockMs / 1000);
  return lastAt !== null && lastAt > now && lastAt < now + 120 ? lastAt : now;
}

/** Undefined while the readings are on their way. */
function lastReading(series: SeriesBody | undefined, failed: boolean): LastReading | null | undefined {
  if (!series && !failed) return undefined;
  const index = series?.gravity.findLastIndex((value) => value !== null) ?? -1;
  return series && index >= 0 ? { at: series.at[index]!, gravity: series.gravity[index]! } : null;
}

/** `Thu 14:00` for what is due, `since Tue 07:30` for what is so. */
function whenOf(row: CallRow, judged: BatchBody['assessment'], now: number, timeZone: string): string | null {
  const call = judged?.calls[row.name];
  if (!call) return null;
  const at = (text: string) => when(Date.parse(text) / 1000, now, timeZone);
  if (row.state === 'Due') return call.expected_at ? at(call.expected_at) : call.since && `since ${at(call.since)}`;
  if (row.state === 'Leave be') return call.expected_at && `until ${at(call.expected_at)}`;
  return call.since && `since ${at(call.since)}`;
}

/** Where a call leads to. */
function leadOf(row: CallRow, batchId: string, may: { bench: boolean; work: boolean }): { href: string; word: string } | null {
  if (row.name === 'bottle' && may.bench) return { href: `/bench/${batchId}`, word: 'To the bench' };
  if (row.name === 'rack' && may.work && row.state === 'Ready') return { href: `/batches/${batchId}/work?do=rack`, word: 'Rack it' };
  return null;
}

/** The button that logs what the first call asks for. */
function doneAct(row: CallRow, batch: BatchBody, open: (kind: EntryKind, neck?: EntryDraft['neck']) => void, mayAlter: boolean): DoneAct | null {
  if (row.name === 'neck' && row.state === 'Due') return { word: 'Swapped', onDone: () => open('neck', 'airlock') };
  if (row.name === 'neck' && (row.state === 'Now' || row.state === 'Stop') && batch.neck === 'bung') return { word: 'Bung is out', onDone: () => open('neck') };
  if (row.name === 'neck' && (row.state === 'Now' || row.state === 'Stop') && batch.neck !== 'blow_off') return { word: 'Tube is on', onDone: () => open('neck', 'blow_off') };
  if (row.name === 'rack' && row.state === 'Ready' && mayAlter) return { word: 'Racked', onDone: () => open('rack') };
  return null;
}

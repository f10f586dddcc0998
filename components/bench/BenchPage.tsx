'use client';

import { degrees, gravityText } from '@/components/batch/figures';
import { useMemo, useState } from 'react';
import { NotKeptYet } from '@/components/ui/NotKeptYet';
import { useKept } from '@/components/ui/use-kept';
import Link from 'next/link';
import type { CSSProperties } from 'react';
import { drinkHex } from '@/components/charts/palette';
import { AskHow } from '@/components/how/AskHow';
import { FilterTabs } from '@/components/ui/FilterTabs';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState } from '@/components/ui/Notice';
import { LinkButton } from '@/components/ui/Button';
import { useNow } from '@/components/ui/now';
import { How } from '@/components/ui/How';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { Vessel } from '@/components/vessel/Vessel';
import type { VesselState } from '@/components/vessel/describe';
import { useBench } from '@/lib/client/lots';
import { useMe } from '@/lib/client/me';
import type { BenchFacts } from '@/lib/contracts/bench';
import type { BenchRequest, BenchVerdict, BottlePicture } from '@/lib/core/bottling/bench';
import { PRESSURE_CAUTIONS } from '@/lib/core/bottling/bottles';
import { drinkPressure } from '@/lib/core/bottling/co2';
import { howOfWeeks, pressureByDay } from '@/lib/core/bottling/conditioning';
import { primes } from '@/lib/core/bottling/judge';
import { judgeBench } from '@/lib/core/bottling/verdict';
import { howReadByHand } from '@/lib/core/how/judged';
import { After } from './After';
import { BenchForm } from './BenchForm';
import { BottleIt } from './BottleIt';
import { BottleTable } from './BottleTable';
import { Done } from './Done';
import { formOf, newDraft, requestOf, takeWay, type BenchErrors } from './draft';
import { limitOf, scaleTop, Tubes } from './Tubes';
import { Verdict, Ways } from './Verdict';
import { Weeks } from './Weeks';
import { assumedWords, FIELD_WORDS, SHORT_BOTTLE, sizeWords } from './words';

/** The bench of one batch. */
export function BenchPage({ id }: { id: string }) {
  const { facts, error, retry } = useBench(id);
  const { me, may } = useMe();
  if (error && !facts) {
    return (
      <ErrorState title="The bench did not load" onRetry={retry}>
        {error.message} Nothing is filled until it is judged here.
      </ErrorState>
    );
  }
  if (!facts || !me) return <Haze height={420} label="Loading the bench" className="m-(--margin)" />;
  if (facts.batch.state === 'ended') {
    return (
      <EmptyState title={`${facts.batch.name} has ended`} action={<LinkButton href="/bench">Another batch</LinkButton>}>
        Nothing is left in the vessel to bottle.
      </EmptyState>
    );
  }
  // What was typed for another volume is not what is bottled now.
  const keptAs = [me.person.id, 'bench', facts.batch.id, facts.batch.volume_l].join(' ');
  return <Bench key={facts.batch.id} keptAs={keptAs} facts={facts} timeZone={me.cellar.time_zone} mayBottle={may('lots.bottle')} mayOverride={may('lots.override')} />;
}

const drawn = ({ batch, done }: BenchFacts): VesselState => ({
  kind: batch.vessel_kind as VesselState['kind'],
  neck: batch.neck as VesselState['neck'],
  level: Math.min(1, batch.volume_l / batch.vessel_l),
  drink: batch.drink_colour,
  clearness: done.verdict === 'done' ? 'bright' : 'hazy',
  krausen: false,
  lees: 'thin',
  tag: batch.tag,
  silent: false,
});

interface BenchProps {
  keptAs: string;
  facts: BenchFacts;
  timeZone: string;
  mayBottle: boolean;
  mayOverride: boolean;
}

function Bench({ keptAs, facts, timeZone, mayBottle, mayOverride }: BenchProps) {
  const [draft, setDraft, found, forget] = useKept(keptAs, () => newDraft(facts));
  const { form, errors } = useMemo(() => formOf(draft, facts), [draft, facts]);
  const request = useMemo(() => form && requestOf(form, facts), [form, facts]);
  const verdict = useMemo(() => request && judgeBench(request), [request]);
  const now = useNow();
  const { batch, done } = facts;
  const assumed = assumedWords(facts);
  return (
    <div className="drink wide:grid wide:min-h-[calc(100dvh-var(--header))] wide:grid-cols-[412px_minmax(0,1fr)] wide:grid-rows-[auto_1fr]" style={{ '--drink': drinkHex(batch.drink_colour) } as CSSProperties}>
      <div className="bg-desk px-(--margin) py-3 max-wide:border-b-[1.5px] max-wide:border-ink wide:border-r-[1.5px] wide:border-ink">
        <h1 className="type-head">Bottling bench</h1>
        <div className="flex items-center gap-4 pt-1">
          <Vessel vessel={drawn(facts)} height={64} silentPicture />
          <div className="min-w-0">
            <p className="type-sub break-words">
              <Link href={`/batches/${batch.id}`} className="no-underline hover:underline">
                {batch.name}
              </Link>
            </p>
            <p className="type-label text-ink2">
              {batch.tag !== null && `tag ${batch.tag}, `}
              {done.gravity === null ? 'not read by hand' : `${gravityText(done.gravity)} by hand`}
              <br />
              {done.remaining === null ? 'what may still ferment is not known' : `may still ferment: ${done.remaining.value.hi.toFixed(1)} points`}
            </p>
            {(done.gravity !== null || done.remaining !== null) && (
              <AskHow
                of={`${batch.name} on the bench`}
                answers={() => [
                  ...(done.gravity === null ? [] : [{ name: 'by hand', says: gravityText(done.gravity), how: howReadByHand(done.gravity) }]),
                  ...(done.remaining === null ? [] : [{ name: 'may still ferment, at most', says: `${done.remaining.value.hi.toFixed(1)} points`, how: done.remaining.how }]),
                ]}
              />
            )}
          </div>
        </div>
      </div>
      <div className="border-b-[1.5px] border-ink">{verdict ? <Verdict verdict={verdict} /> : <Unfilled errors={errors ?? {}} facts={facts} />}</div>
      <div className="bg-desk px-(--margin) pb-4 wide:border-r-[1.5px] wide:border-ink">
        {found && <NotKeptYet className="-mx-(--margin)" />}
        <Done facts={facts} timeZone={timeZone} />
        <BenchForm draft={draft} errors={errors ?? {}} facts={facts} onChange={(part) => setDraft({ ...draft, ...part })} />
        <div className="mt-4">
          <BottleIt facts={facts} form={form} request={request} verdict={verdict} mayBottle={mayBottle} mayOverride={mayOverride} onBottled={forget} />
        </div>
      </div>
      <div className="min-w-0 max-wide:border-t-[1.5px] max-wide:border-ink">
        {verdict && request && <Pictures verdict={verdict} request={request} timeZone={timeZone} />}
        {verdict?.verdict === 'stop' && <Ways ways={verdict.ways} onUse={(way) => way.request && setDraft(takeWay(draft, way.request))} />}
        {verdict?.verdict === 'safe' && request && now !== null && <After now={now} cellarC={request.cellarC} primed={primes(request)} timeZone={timeZone} />}
        {verdict && request && <BottleTable verdict={verdict} request={request} />}
        {assumed && <p className="type-reason border-t px-(--margin) py-2 text-ink2">{assumed}</p>}
        <Cautions />
      </div>
    </div>
  );
}

/** Nothing is judged while something is missing; it says what. */
function Unfilled({ errors, facts: { batch, done } }: { errors: BenchErrors; facts: BenchFacts }) {
  const [path = '', wrong = ''] = Object.entries(errors)[0] ?? [];
  const field = FIELD_WORDS[path.split('.').at(-1) ?? ''];
  // Without a reading no answer of the form would let anything be filled: that comes first.
  if (done.gravity === null)
    return (
      <section aria-label="Verdict" className="bg-lit px-(--margin) py-4">
        <State state="Check" word="Not judged yet" />
        <h2 className="type-verdict-top">Nothing is filled before it is read by hand</h2>
        <p className="type-body pb-3 text-ink2">
          <Sentence>{`Asked: ${done.changes_it[0]!.toLowerCase()}${done.changes_it.slice(1)}`}</Sentence>
        </p>
        <LinkButton href={`/batches/${batch.id}`}>To the batch</LinkButton>
      </section>
    );
  return (
    <section aria-label="Verdict" className="bg-lit px-(--margin) py-4">
      <State state="Check" word="Not judged yet" />
      <h2 className="type-verdict-top">Nothing is filled until the bench knows this</h2>
      <p className="type-body text-ink2">
        {field ? `${field}: ` : ''}
        {wrong}
      </p>
    </section>
  );
}

/** Tubes and weeks of one bottle; the one with the least to spare first. */
function Pictures({ verdict, request, timeZone }: { verdict: BenchVerdict; request: BenchRequest; timeZone: string }) {
  const now = useNow();
  const [chosen, setChosen] = useState<string | null>(null);
  const bottles = verdict.bottles.toSorted((a, b) => limitOf(a) - a.worst.bar - (limitOf(b) - b.worst.bar));
  const bottle = bottles.find((one) => one.key === chosen) ?? bottles[0];
  if (!bottle || now === null) return null;
  return (
    <div>
      {bottles.length > 1 && (
        <div className="px-(--margin) pt-3">
          <FilterTabs label="Bottle" value={bottle.key} onChoose={setChosen} tabs={bottles.map((one) => ({ value: one.key, name: `${SHORT_BOTTLE[one.choice.kind]} ${sizeWords(one.choice.sizeMl)}` }))} />
        </div>
      )}
      <BottlePictures bottle={bottle} verdict={verdict} request={request} timeZone={timeZone} now={now} />
    </div>
  );
}

function BottlePictures({ bottle, verdict, request, timeZone, now }: { bottle: BottlePicture; verdict: BenchVerdict; request: BenchRequest; timeZone: string; now: number }) {
  const { residual, remaining } = verdict;
  const low = (celsius: number) => Math.max(0, drinkPressure(bottle.volumes.value.lo, celsius, request.drink).gaugeBar);
  const inBottle = useMemo(
    () => ({
      residualVolumes: residual.value.hi,
      addedVolumes: Math.max(0, bottle.volumes.value.hi - residual.value.hi),
      remainingPoints: remaining.value.hi,
      drink: bottle.asBottled,
    }),
    [bottle, residual, remaining],
  );
  const points = useMemo(() => pressureByDay(inBottle, now, request.warmestStoreC), [inBottle, now, request]);
  return (
    <div className="grid wide:grid-cols-2">
      <div className="min-w-0 px-(--margin) pt-3">
        <h3 className="type-label text-ink2">
          <span className="font-bold text-ink">Pressure in one bottle</span>, three ways
        </h3>
        <Tubes bottle={bottle} lows={{ cellar: low(request.cellarC), warm: low(request.warmestStoreC) }} />
      </div>
      <div className="min-w-0 px-(--margin) pt-3 wide:border-l">
        <h3 className="type-label text-ink2">
          <span className="font-bold text-ink">Week by week</span> at <span className="fig">{degrees(request.warmestStoreC)}</span>
        </h3>
        <Weeks points={points} limit={limitOf(bottle)} top={scaleTop(bottle)} celsius={request.warmestStoreC} timeZone={timeZone} />
        <p className="type-reason text-ink2">The course in between is a guess; the end is reckoned.</p>
        <How of="The weeks" how={howOfWeeks(inBottle, request.warmestStoreC)} />
      </div>
    </div>
  );
}

function Cautions() {
  return (
    <section aria-label="Cautions" className="border-t px-(--margin) py-3">
      <h3 className="type-sub">Before anything is filled</h3>
      <ul className="type-body max-w-[80ch] list-disc pl-5 text-ink2">
        {PRESSURE_CAUTIONS.map((caution) => (
          <li key={caution}>{caution}</li>
        ))}
        <li>What may be made, kept and given away is for the law where you live.</li>
      </ul>
    </section>
  );
}

'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { degrees, typedNumber } from '@/components/batch/figures';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { Field, Select, TextField } from '@/components/ui/Field';
import { How } from '@/components/ui/How';
import { useMoney } from '@/components/ui/money';
import { FormError } from '@/components/ui/Notice';
import { ClientError } from '@/lib/client/fetcher';
import { bottleBatch, usePlaces } from '@/lib/client/lots';
import { focusFirstError } from '@/lib/client/focus';
import type { BenchFacts, BenchForm } from '@/lib/contracts/bench';
import type { BenchRequest, BenchSafe, BenchVerdict } from '@/lib/core/bottling/bench';
import { BOTTLES } from '@/lib/core/bottling/bottles';
import { howOfAbvAdded, howOfDrops, USUAL_DROP_G } from '@/lib/core/bottling/priming';
import { REASON_MIN_LETTERS } from '@/lib/core/bottling/verdict';
import { sizeWords } from './words';

/** What goes in; only a safe bench has it. */
function Dose({ verdict, request }: { verdict: BenchSafe; request: BenchRequest }) {
  const { dose, plan } = verdict;
  if (dose.way === 'none') return <p className="type-fig-lg">no sugar</p>;
  if (dose.way === 'drops') {
    const grams = request.priming.way === 'drops' ? request.priming.gramsEach : USUAL_DROP_G;
    return (
      <>
        <p className="type-fig-lg">{dose.totalDrops} drops</p>
        <p className="type-label text-ink2">{plan.filled.map((filled) => `${dose.drops[filled.key] ?? 0} in each ${sizeWords(filled.sizeMl)}`).join(', ')}</p>
        <How of="Drops in all" how={howOfDrops(grams, dose.totalDrops)} />
      </>
    );
  }
  return (
    <>
      <p className="type-fig-lg">{dose.totalG >= 10 ? dose.totalG.toFixed(0) : dose.totalG.toFixed(1)} g</p>
      <p className="type-label text-ink2">
        {dose.sugar.name}, {dose.gPerL.toFixed(1)} g/L
        {verdict.abvAddedPercent >= 0.05 && `, adds up to ${verdict.abvAddedPercent.toFixed(1)} % vol`}
      </p>
      <How of="Sugar in all" how={dose.how} />
      {verdict.abvAddedPercent >= 0.05 && <How named of="what it adds" how={howOfAbvAdded(dose.sugar, verdict.abvAddedPercent)} />}
    </>
  );
}

interface BottleItProps {
  facts: BenchFacts;
  form: BenchForm | null;
  /** The same as the core takes it. */
  request: BenchRequest | null;
  verdict: BenchVerdict | null;
  mayBottle: boolean;
  mayOverride: boolean;
  onBottled: () => void;
}

/** The dose, and the act. Stopped: no dose, the button held back, and for a brewer the written reason. */
export function BottleIt({ facts, form, request, verdict, mayBottle, mayOverride, onBottled }: BottleItProps) {
  const router = useRouter();
  const { places } = usePlaces();
  const { currency } = useMoney();
  const [open, setOpen] = useState(false);
  const [code, setCode] = useState(facts.suggested_code);
  const [name, setName] = useState(facts.batch.name);
  const [place, setPlace] = useState('');
  const [cost, setCost] = useState('');
  const [ends, setEnds] = useState(true);
  const [reason, setReason] = useState('');
  const [errors, setErrors] = useState<Record<string, string[]>>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const stopped = verdict?.verdict === 'stop';
  const overridable = verdict?.verdict === 'stop' && verdict.problems.every((problem) => problem.overridable);
  const mayGo = verdict !== null && (!stopped || (overridable && mayOverride));
  const letters = (reason.match(/\p{L}/gu) ?? []).length;

  async function send() {
    if (!form) return;
    const other = typedNumber(cost);
    if (stopped && letters < REASON_MIN_LETTERS) {
      setErrors({ override_reason: [`write why, in at least ${REASON_MIN_LETTERS} letters: it stays on the lot`] });
      return focusFirstError();
    }
    if (Number.isNaN(other)) {
      setErrors({ other_cost: ['must be a number'] });
      return focusFirstError();
    }
    setSending(true);
    setErrors({});
    setFailed(null);
    try {
      const lot = await bottleBatch(facts.batch.id, { ...form, at: new Date().toISOString(), code: code.trim() || null, name: name.trim() || null, place_id: place || null, ends_batch: ends, other_cost: other, override_reason: stopped ? reason.trim() : null });
      onBottled();
      router.push(`/book/${lot.id}`);
    } catch (error) {
      setSending(false);
      const told = error instanceof ClientError ? error : null;
      setErrors(told?.fields ?? {});
      setFailed(told?.message ?? 'It was not bottled. Try again.');
      focusFirstError();
    }
  }

  return (
    <section aria-label="Bottle it" className="border-t-[1.5px] border-ink py-4">
      <div className="flex items-end justify-between gap-4">
        <div className="min-w-0">
          <p className="type-label text-ink2">sugar in all</p>
          {verdict?.verdict === 'safe' && request ? (
            <Dose verdict={verdict} request={request} />
          ) : (
            <>
              <p className="type-fig-lg">held back</p>
              <p className="type-label text-ink2">{stopped ? 'no dose is shown while stopped' : 'fill in the bench first'}</p>
            </>
          )}
        </div>
        {mayBottle && !open && (
          <Button look={verdict?.verdict === 'safe' ? 'first' : 'held'} disabled={verdict?.verdict !== 'safe'} size="tall" onClick={() => setOpen(true)}>
            Bottle it
          </Button>
        )}
      </div>
      {mayBottle && stopped && !open && mayOverride && overridable && (
        <button type="button" className="type-label mt-3 min-h-11 text-left text-ink2 underline underline-offset-4" onClick={() => setOpen(true)}>
          Put the stop aside, with a written reason
        </button>
      )}
      {verdict?.verdict === 'stop' && !overridable && <p className="type-reason pt-2 text-ink2">No reason puts this stop aside.</p>}
      {!mayBottle && <p className="type-reason pt-2 text-ink2">Bottling is for brewers. You can try the bench; nothing is filled from here.</p>}
      {open && mayGo && (
        <div className="mt-3 flex flex-col gap-3 border-t pt-3">
          {stopped && (
            <>
              <p className="type-body border-l-[3px] border-madder pl-3">
                Glass may burst. {verdict.problems.map((problem) => problem.sentence).join(' ')} The stop, your name and your reason stay on the lot.
              </p>
              <TextField label="why it is filled all the same" value={reason} error={errors.override_reason?.[0]} onChange={(event) => setReason(event.target.value)} />
            </>
          )}
          <div className="grid grid-cols-2 gap-3">
            <Field label="code on the lot" value={code} error={errors.code?.[0]} onChange={(event) => setCode(event.target.value)} />
            <Field label="bottles, caps, sugar cost" unit={currency} placeholder="not told" inputMode="decimal" value={cost} error={errors.other_cost?.[0]} onChange={(event) => setCost(event.target.value)} />
          </div>
          <Field label="name" value={name} error={errors.name?.[0]} onChange={(event) => setName(event.target.value)} />
          <Select label="they will stand" value={place} error={errors.place_id?.[0]} onChange={(event) => setPlace(event.target.value)}>
            <option value="">no place named</option>
            {(places ?? []).map((one) => (
              <option key={one.id} value={one.id}>
                {one.name}
                {one.temperature_c === null ? '' : `, up to ${degrees(one.temperature_c)}`}
                {one.capacity === null ? '' : `, room for ${Math.max(0, one.capacity - one.bottles)}`}
              </option>
            ))}
          </Select>
          <Box ticked={ends} onTick={setEnds}>
            <span className="type-body">The vessel is empty then; the batch ends.</span>
          </Box>
          {failed && <FormError>{failed}</FormError>}
          <div className="flex flex-wrap justify-end gap-2">
            <Button look="quiet" onClick={() => setOpen(false)}>
              Not now
            </Button>
            <Button look={stopped ? 'final' : 'first'} disabled={sending || !form} onClick={() => void send()}>
              {stopped ? 'Fill against the stop' : `Bottled: ${verdict?.plan.bottles} filled`}
            </Button>
          </div>
        </div>
      )}
      {verdict && verdict.bottles.some((bottle) => bottle.holds.rating !== 'never' && !bottle.holds.confirmed) && (
        <p className="type-reason pt-3 text-ink2">
          Not confirmed: {verdict.bottles.filter((bottle) => !bottle.holds.confirmed).map((bottle) => BOTTLES[bottle.choice.kind].name).join(', ')}. Read what the maker says and write it in; a reused or scratched bottle holds less.
        </p>
      )}
    </section>
  );
}

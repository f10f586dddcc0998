'use client';

import { useEffect, useState } from 'react';
import { timeTyped } from '@/components/batch/entry-form';
import { WhenField } from '@/components/batch/WhenField';
import { litres } from '@/components/batch/figures';
import { when } from '@/components/charts/zone';
import { countdown } from '@/components/rounds/rows';
import { Button } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { OnwardIcon } from '@/components/ui/icons';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { secondDose, startFining, useFinings } from '@/lib/client/cellarwork';
import { ClientError } from '@/lib/client/fetcher';
import type { FiningBody } from '@/lib/contracts/family';
import { FININGS } from '@/lib/core/additions/fining';
import { HAZES } from '@/lib/core/additions/haze';

/** The demijohn that usual doses are told for, L. */
const USUAL_FOR_L = 4.5;

function Running({ fining, now, timeZone, mayDo, onFail }: { fining: FiningBody; now: number; timeZone: string; mayDo: boolean; onFail: (message: string) => void }) {
  const [seconds, setSeconds] = useState<number | null>(null);
  const [busy, setBusy] = useState(false);
  const { due_at: due } = fining;
  useEffect(() => {
    if (!due) return;
    const tell = () => setSeconds((Date.parse(due) - Date.now()) / 1000);
    const timer = setInterval(tell, 1000);
    return () => clearInterval(timer);
  }, [due]);
  const at = (text: string) => when(Date.parse(text) / 1000, now, timeZone);
  const waits = fining.state === 'waiting_for_second' || fining.state === 'second_due';
  const over = seconds !== null && seconds < 0;
  return (
    <li className="flex flex-wrap items-center gap-x-4 gap-y-2 border-b py-3">
      <div className="min-w-0 flex-1 basis-56">
        <State state={waits ? (over || fining.state === 'second_due' ? 'Now' : 'Due') : fining.state === 'settling' ? 'Leave be' : 'Done'} word={waits ? (over || fining.state === 'second_due' ? 'Second dose now' : 'Second dose waits') : fining.state === 'settling' ? 'Settling' : 'Settled'} />
        <p className="type-verdict">
          {fining.name}
          {waits && `: ${fining.parts[1] ?? ''}`}
        </p>
        <p className="type-reason text-ink2">
          <Sentence>{`First dose ${at(fining.first_at)}.${fining.state === 'waiting_for_second' ? ' Whoever put it in is told when the second is due.' : ''}${fining.bright_from ? ` Look again ${at(fining.bright_from)}.` : ''} ${fining.caution}`}</Sentence>
        </p>
      </div>
      {waits && due && (
        <span role="timer" aria-live="off" className={`type-fig-lg ${over ? 'text-madder' : ''}`}>
          {seconds === null ? '' : countdown(seconds)}
        </span>
      )}
      {waits && mayDo && (
        <Button
          look="first"
          disabled={busy}
          onClick={() => {
            setBusy(true);
            secondDose(fining.id, { at: new Date().toISOString() })
              .catch((error: unknown) => onFail(error instanceof ClientError ? error.message : 'It was not saved. Try again.'))
              .finally(() => setBusy(false));
          }}
        >
          Second dose is in
        </Button>
      )}
    </li>
  );
}

/** Finings in one or two doses with their clock, and why a drink may stay cloudy. */
export function Finings({ batchId, volumeL, now, timeZone, mayDo }: { batchId: string; volumeL: number; now: number; timeZone: string; mayDo: boolean }) {
  const { finings, error, retry } = useFinings(batchId);
  /** Empty: now, so that a page left open does not start the clock late. */
  const [at, setAt] = useState('');
  const [key, setKey] = useState('two-part');
  const [dose, setDose] = useState('');
  const [failed, setFailed] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  /** One a dose, so that a second try after a lost answer keeps one. */
  const [clientId, setClientId] = useState(() => crypto.randomUUID());
  const chosen = FININGS.find((item) => item.key === key);

  const times = volumeL / USUAL_FOR_L;

  async function start() {
    const firstAt = timeTyped(at, timeZone);
    if (firstAt === '') return setFailed('When it went in is not a whole day and time yet. Clear it for now.');
    setBusy(true);
    setFailed(null);
    try {
      await startFining(batchId, { at: firstAt, fining: key, dose: dose.trim() === '' ? null : dose.trim(), client_id: clientId });
      setDose('');
      setAt('');
      setClientId(crypto.randomUUID());
    } catch (error) {
      setFailed(error instanceof ClientError ? error.message : 'It was not saved. Try again; saving twice keeps one.');
    }
    setBusy(false);
  }

  return (
    <div className="flex max-w-[700px] flex-col gap-4">
      {error && !finings ? (
        <ErrorState title="The finings did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      ) : (
        !finings && <Haze height={64} label="Loading the finings" />
      )}
      {finings && finings.length > 0 && (
        <ul className="border-t">
          {finings.map((fining) => (
            <Running key={fining.id} fining={fining} now={now} timeZone={timeZone} mayDo={mayDo} onFail={setFailed} />
          ))}
        </ul>
      )}
      {mayDo && (
        <>
          <div className="grid gap-3 strip:grid-cols-2">
            <Select label="Fining" value={key} onChange={(event) => setKey(event.target.value)}>
              {FININGS.map((item) => (
                <option key={item.key} value={item.key}>
                  {item.name}
                </option>
              ))}
            </Select>
            <Field label="Dose, as measured" autoComplete="off" maxLength={60} hint="As the packet says for this volume." value={dose} onChange={(event) => setDose(event.target.value)} />
            <WhenField label={chosen?.intervalMin === null ? 'Went in' : 'First dose went in'} value={at} onType={setAt} now={now} timeZone={timeZone} />
          </div>
          {chosen && (
            <p className="type-reason border-l-[3px] border-ochre pl-3">
              <Sentence>{`Takes ${chosen.takes}. Usual for ${USUAL_FOR_L} L: ${chosen.usualDose}.${times > 1.15 || times < 0.85 ? ` Here are ${litres(volumeL)}: ${Number(times.toFixed(1))} times that.` : ''}${chosen.intervalMin === null ? '' : ` Second part after ${chosen.intervalMin} min.`} Settles in ${chosen.settleDays.lo} to ${chosen.settleDays.hi} days. ${chosen.allergens.length > 0 ? `Allergen: ${chosen.allergens.join(', ')}. ` : ''}${chosen.caution}`}</Sentence>
              <span className="type-tick block text-ink2">{chosen.source}</span>
            </p>
          )}
          <Button look="first" className="self-end" disabled={busy} onClick={() => void start()}>
            {chosen?.intervalMin === null ? 'It is in' : 'First dose is in'}
          </Button>
        </>
      )}
      {failed && <FormError>{failed}</FormError>}
      <section aria-labelledby="haze">
        <h3 id="haze" className="type-sub border-b-[1.5px] border-ink pb-1">
          Still cloudy?
        </h3>
        <p className="type-tick py-1 text-ink2">{HAZES[0]?.source}. Law and packet go before it.</p>
        {HAZES.map((haze) => (
          <details key={haze.cause} className="group border-b">
            <summary className="flex min-h-11 cursor-pointer list-none items-center justify-between gap-3 py-2.5 strip:min-h-9 [&::-webkit-details-marker]:hidden">
              <span className="type-name-low flex flex-wrap items-baseline gap-x-3">
                {haze.cause[0]?.toUpperCase()}
                {haze.cause.slice(1)} <span className="type-reason font-[420] text-ink2">{haze.where}</span>
              </span>
              <OnwardIcon size={14} className="shrink-0 text-ink2 transition-transform group-open:rotate-90" />
            </summary>
            <dl className="type-body grid grid-cols-[5rem_minmax(0,1fr)] gap-x-3 pb-3">
              <dt className="type-label text-ink2">test</dt>
              <dd><Sentence>{`${haze.test} ${haze.shows}`}</Sentence></dd>
              <dt className="type-label text-ink2">remedy</dt>
              <dd><Sentence>{haze.remedy}</Sentence></dd>
              {haze.caution && (
                <>
                  <dt className="type-label text-ochre">caution</dt>
                  <dd><Sentence>{haze.caution}</Sentence></dd>
                </>
              )}
            </dl>
          </details>
        ))}
      </section>
    </div>
  );
}

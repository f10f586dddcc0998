'use client';

import { useState, type FormEvent } from 'react';
import { NotKeptYet } from '@/components/ui/NotKeptYet';
import { useKept } from '@/components/ui/use-kept';
import { timeTyped } from '@/components/batch/entry-form';
import { TagField } from '@/components/batch/TagField';
import { WhenField } from '@/components/batch/WhenField';
import { litres, points, typedGravity, typedNumber } from '@/components/batch/figures';
import { NECK_WORDS } from '@/components/batch/words';
import { Button } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { How } from '@/components/ui/How';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { UnitField } from '@/components/units/UnitField';
import { useBatches } from '@/lib/client/batches';
import { rackBatch, topUpBatch, useDrink } from '@/lib/client/cellarwork';
import { ClientError } from '@/lib/client/fetcher';
import { focusFirstError } from '@/lib/client/focus';
import type { BatchBody } from '@/lib/contracts/batches';
import { rackForm, topUpBatchForm, type MovedBody } from '@/lib/contracts/family';
import { NECKS } from '@/lib/core/types';
import { Comes } from './Comes';
import { poured } from './poured';
import { SulphiteHint } from './SulphiteHint';
import { sentencesOf } from '@/lib/contracts/issues';

type What = '' | 'water' | 'must' | 'drink' | 'batch';

/** What a racking or a topping up did to the drink. */
function Effect({ moved }: { moved: MovedBody }) {
  const { effect } = moved;
  return (
    <section aria-live="polite" className="max-w-[600px] self-start border-l-[3px] border-green bg-lit py-2 pl-3">
      <p className="type-verdict">Done and logged.</p>
      {effect ? (
        <>
          <p className="type-body">
            <Sentence>{`${effect.before.volume_l.toFixed(2)} L at ${effect.before.gravity.toFixed(3)} became ${effect.after.volume_l.toFixed(2)} L at ${effect.after.gravity.toFixed(3)}: ${points(effect.gravity_change_points)}, strength ${effect.after.abv_percent.toFixed(1)} %.`}</Sentence>
          </p>
          {effect.cautions.map((caution) => (
            <p key={caution} className="type-reason text-ink2">
              <Sentence>{caution}</Sentence>
            </p>
          ))}
          <How how={effect.how} of="what it did" />
        </>
      ) : (
        <p className="type-reason text-ink2">No gravity is known yet, so what it did to the strength is not reckoned.</p>
      )}
    </section>
  );
}

const FIELD_OF: Record<string, string> = { left_l: 'left', 'vessel.vessel_l': 'vessel', 'vessel.tag': 'tag', 'vessel.place': 'place', sulphite_g: 'sulphite', at: 'at' };
const fieldOf = (path: string): string => FIELD_OF[path] ?? (/top_up(\.\d+)?\.volume_l$/.test(path) ? 'topUp' : /original_gravity$/.test(path) ? 'original' : /gravity$/.test(path) ? 'gravity' : /batch_id$/.test(path) ? 'from' : path);

/** Racking off the lees, or topping up alone: what stayed behind, where it went, what filled the room. */
export function RackForm({ keptAs, batch, rack, now, timeZone }: { keptAs: string; batch: BatchBody; rack: boolean; now: number; timeZone: string }) {
  const { batches } = useBatches({ state: 'working' });
  const { drink } = useDrink(batch.id);
  const [draft, setDraft, found, forget] = useKept(keptAs, () => ({ left: '', vessel: '', tag: '', place: '', neck: '', sulphite: '', what: (rack ? '' : 'water') as What, topUp: '', gravity: '', original: '', from: '', at: '', text: '', clientId: crypto.randomUUID() as string }));
  const [errors, setErrors] = useState<Record<string, string>>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const [moved, setMoved] = useState<MovedBody | null>(null);
  const set = (field: keyof typeof draft) => (event: { target: { value: string } }) => setDraft({ ...draft, [field]: event.target.value });

  function tell(fields: Record<string, readonly string[]>) {
    const known = Object.fromEntries(Object.entries(fields).flatMap(([path, said]) => (said[0] ? [[fieldOf(path), said[0]]] : [])));
    setErrors(known);
    const stray = Object.keys(known).find((field) => !(field in draft));
    if (stray) setFailed(known[stray] ?? null);
    focusFirstError();
  }

  async function send(event: FormEvent) {
    event.preventDefault();
    setErrors({});
    setFailed(null);
    const number = (text: string) => typedNumber(text);
    const words = (text: string) => (text.trim() === '' ? null : text.trim());
    const topUp = draft.what === '' ? null : { what: draft.what, volume_l: number(draft.topUp) ?? NaN, gravity: typedGravity(draft.gravity), original_gravity: typedGravity(draft.original), batch_id: words(draft.from) };
    const base = { at: timeTyped(draft.at, timeZone), text: words(draft.text), client_id: draft.clientId };
    const vessel = {
      ...(draft.vessel.trim() === '' ? {} : { vessel_l: number(draft.vessel) ?? NaN }),
      ...(draft.tag.trim() === '' ? {} : { tag: number(draft.tag) }),
      ...(draft.place.trim() === '' ? {} : { place: words(draft.place) }),
      ...(draft.neck === '' ? {} : { neck: NECKS.find((neck) => neck === draft.neck) }),
    };
    const form = rack ? rackForm.safeParse({ ...base, left_l: number(draft.left) ?? NaN, vessel, top_up: topUp ? [topUp] : [], sulphite_g: number(draft.sulphite) }) : topUpBatchForm.safeParse({ ...base, top_up: topUp });
    if (!form.success) return tell(sentencesOf(form.error.issues));
    setSending(true);
    try {
      setMoved('left_l' in form.data ? await rackBatch(batch.id, form.data) : await topUpBatch(batch.id, form.data));
      forget();
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      if (told && Object.keys(told.fields).length > 0) tell(told.fields);
      else setFailed(told?.message ?? 'It was not saved. Try again; saving twice keeps one.');
    }
    setSending(false);
  }

  const { drink: other } = useDrink(draft.what === 'batch' && draft.from !== '' ? draft.from : null);
  if (moved) return <Effect moved={moved} />;
  const result = poured(drink, batch.volume_l, rack ? (typedNumber(draft.left) ?? NaN) : 0, typedNumber(draft.vessel) ?? batch.vessel_l, {
    what: draft.what,
    litres: typedNumber(draft.topUp),
    gravity: typedGravity(draft.gravity),
    original: typedGravity(draft.original),
    from: other ?? null,
  });
  const waits = result === null ? 'Say how much stays on the lees.' : drink && (drink.gravity === null || drink.effective_og === null) ? 'Gravity and strength follow once an original gravity and a reading are logged.' : 'Gravity and strength follow once it is told what goes in.';
  const before = batch.volume_l - (rack ? (typedNumber(draft.left) ?? 0) : 0);
  const comes = <Comes batch={batch} neck={NECKS.find((neck) => neck === draft.neck) ?? batch.neck} result={result} waits={waits} />;
  const room = (typedNumber(draft.vessel) ?? batch.vessel_l) - before;
  const given = (name: keyof typeof draft) => ({ value: draft[name], onChange: set(name), error: errors[name] });
  const field = (name: keyof typeof draft, label: string) => <Field label={label} autoComplete="off" {...given(name)} />;
  return (
    <div className="flex flex-col gap-6 wide:grid wide:grid-cols-[600px_minmax(0,424px)] wide:gap-x-12">
      <form onSubmit={(event) => void send(event)} noValidate className="flex max-w-[600px] flex-col gap-4">
        {found && <NotKeptYet />}
        {rack && (
          <>
            <UnitField measure="volume" label="Left on the lees and in the hose" {...given('left')} />
            <fieldset className="grid grid-cols-2 gap-3">
              <legend className="type-verdict mb-2">Into another vessel, where it changed</legend>
              <UnitField measure="volume" label={`It holds (was ${litres(batch.vessel_l)})`} {...given('vessel')} />
              <TagField label={`Tag (was ${batch.tag ?? 'none'})`} batchId={batch.id} {...given('tag')} />
              {field('place', 'Place')}
              <Select label="The neck now" value={draft.neck} onChange={set('neck')}>
                <option value="">as it was</option>
                {NECKS.map((neck) => (
                  <option key={neck} value={neck}>
                    {NECK_WORDS[neck]}
                  </option>
                ))}
              </Select>
            </fieldset>
          </>
        )}
        <fieldset className="grid grid-cols-2 gap-3">
          <legend className="type-verdict mb-2">Topped up with</legend>
          <Select label="What" value={draft.what} onChange={set('what')}>
            {rack && <option value="">nothing</option>}
            <option value="water">water</option>
            <option value="must">juice or must</option>
            <option value="batch">another batch here</option>
            <option value="drink">a drink from elsewhere</option>
          </Select>
          {draft.what !== '' && <UnitField measure="volume" label="How much" hint={room > 0 ? `To the brim: ${litres(room)}.` : 'It is full.'} {...given('topUp')} />}
          {(draft.what === 'must' || draft.what === 'drink') && <UnitField measure="gravity" label="Its gravity" {...given('gravity')} />}
          {draft.what === 'drink' && <UnitField measure="gravity" label="Its original gravity" {...given('original')} />}
          {draft.what === 'batch' && (
            <Select label="Which batch" className="col-span-full" value={draft.from} onChange={set('from')} error={errors.from}>
              <option value="">Choose</option>
              {(batches ?? [])
                .filter((item) => item.id !== batch.id)
                .map((item) => (
                  <option key={item.id} value={item.id}>
                    {item.name}
                  </option>
                ))}
            </Select>
          )}
        </fieldset>
        {rack && (
          <>
            <Field label="Potassium metabisulphite with it" unit="g" inputMode="decimal" autoComplete="off" {...given('sulphite')} hint={<SulphiteHint drink={drink} volumeL={result?.litres ?? batch.volume_l} />} />
            <p className="type-reason text-ink2">Keep air out: a full vessel and a hose that reaches the bottom. Lift a full glass vessel with both hands, one under it, never by its neck; nothing hot into cold glass.</p>
          </>
        )}
        <WhenField value={draft.at} onType={(at) => setDraft({ ...draft, at })} now={now} timeZone={timeZone} error={errors.at} />
        <Field label="Note" autoComplete="off" maxLength={2000} value={draft.text} onChange={set('text')} />
        {failed && <FormError>{failed}</FormError>}
        <div className="wide:hidden">{comes}</div>
        <div className="flex justify-end">
          <Button look="first" type="submit" disabled={sending}>
            {sending ? 'Saving' : rack ? 'Racked' : 'Topped up'}
          </Button>
        </div>
      </form>
      <aside className="max-wide:hidden wide:sticky wide:top-4 wide:self-start">{comes}</aside>
    </div>
  );
}

'use client';

import type { ReactNode } from 'react';
import { drinkHex } from '@/components/charts/palette';
import { Choice } from '@/components/ui/Choice';
import { Field, Select } from '@/components/ui/Field';
import { Sentence } from '@/components/ui/Sentence';
import { UnitField } from '@/components/units/UnitField';
import { DRINK_COLOURS, VESSEL_KINDS } from '@/lib/contracts/batches';
import { DRINK_KINDS, NECKS } from '@/lib/core/types';
import { withKind, type BatchDraft, type BatchErrors } from './batch-form';
import { roomNote, type RoomPromise } from './room';
import { TagField } from './TagField';
import { KIND_WORDS, NECK_WORDS } from './words';

interface BatchFieldsProps {
  draft: BatchDraft;
  errors: BatchErrors;
  onChange: (draft: BatchDraft) => void;
  /** Local time that the pitch cannot lie after. */
  latest: string;
  /** The usual figures follow the kind while a batch is being started; afterwards they are the batch's own. */
  fresh: boolean;
  /** What its must sheet says of the vessel it proposes. */
  promise?: RoomPromise | undefined;
  /** The batch whose set-up it is. */
  batchId?: string;
  /** More fields beside the yeast's: the sensor. */
  children?: ReactNode;
}

function Group({ title, note, children }: { title: string; note?: ReactNode; children: ReactNode }) {
  return (
    <fieldset className="border-t pt-3 first:border-t-0 first:pt-0">
      <legend className="type-name float-left w-full pb-2">{title}</legend>
      {note && <p className="type-reason clear-left max-w-[60ch] pb-2 text-ink2">{note}</p>}
      <div className="clear-left grid grid-cols-2 gap-x-3 gap-y-4">{children}</div>
    </fieldset>
  );
}

function Colours({ value, onChoose }: { value: string; onChoose: (colour: string) => void }) {
  return (
    <fieldset className="col-span-2">
      <legend className="type-label mb-1 text-ink2">Colour of the drink</legend>
      <div className="flex flex-wrap gap-2">
        {DRINK_COLOURS.map((colour) => (
          <label key={colour} className="type-label relative inline-flex min-h-11 items-center gap-2 rounded border border-ink3 px-2 has-checked:border-2 has-checked:border-ink has-checked:font-semibold strip:min-h-8">
            <input type="radio" name="drink colour" value={colour} checked={value === colour} onChange={() => onChoose(colour)} className="absolute inset-0 appearance-none" />
            <span aria-hidden className="h-4 w-4 border border-ink" style={{ background: drinkHex(colour) }} />
            {colour}
          </label>
        ))}
        <label className="type-label inline-flex min-h-11 items-center gap-2 rounded border border-ink3 px-2 has-checked:border-ink strip:min-h-8">
          <input type="color" aria-label="Another colour" value={drinkHex(value)} onChange={(event) => onChoose(event.target.value)} className="h-5 w-6 border border-ink bg-transparent" />
          another
        </label>
      </div>
    </fieldset>
  );
}

/** The fields that starting a batch and changing its set-up share. */
export function BatchFields({ draft, errors, onChange, latest, fresh, promise, batchId, children }: BatchFieldsProps) {
  const set = (field: keyof BatchDraft) => (event: { target: { value: string } }) => onChange({ ...draft, [field]: event.target.value });
  const text = (field: keyof BatchDraft) => ({ value: draft[field], onChange: set(field), error: errors[field], autoComplete: 'off' });
  const figure = (field: keyof BatchDraft) => ({ ...text(field), inputMode: 'decimal' as const });
  const room = roomNote(draft, promise);
  return (
    <div className="flex flex-col gap-5">
      <Group title="The drink">
        <Field className="col-span-2" label="Name" maxLength={80} {...text('name')} />
        <Choice className="col-span-2" label="Kind" value={draft.kind} onChoose={(kind) => onChange(fresh ? withKind(draft, kind) : { ...draft, kind })} options={DRINK_KINDS.map((value) => ({ value, name: KIND_WORDS[value] }))} />
        <Colours value={draft.colour} onChoose={(colour) => onChange({ ...draft, colour })} />
      </Group>
      <Group title="The vessel">
        <Select label="Vessel" value={draft.vesselKind} onChange={set('vesselKind')} error={errors.vesselKind}>
          {VESSEL_KINDS.map((kind) => (
            <option key={kind}>{kind}</option>
          ))}
        </Select>
        <UnitField measure="volume" label="It holds, brim full" {...text('vessel')} />
        <UnitField measure="volume" label="In it now" {...text('volume')} />
        <Select label="What closes the neck" value={draft.neck} onChange={set('neck')} error={errors.neck}>
          {NECKS.map((neck) => (
            <option key={neck} value={neck}>
              {NECK_WORDS[neck]}
            </option>
          ))}
        </Select>
        {room && (
          <p role="status" className={`type-reason col-span-2 border-l-[3px] pl-3 ${room.tight ? 'border-ochre' : 'border-rule2 text-ink2'}`}>
            <Sentence>{room.text}</Sentence>
          </p>
        )}
        {draft.neck === 'bung' && <p className="type-reason col-span-2 border-l-[3px] border-madder pl-3">Never stop a vessel that works: the pressure can break the glass.</p>}
        <TagField label="Number on its tag" batchId={batchId} {...text('tag')} />
        <Field label="Where it stands" maxLength={80} {...text('place')} />
      </Group>
      <Group title="The start">
        <Field className="col-span-2" label="Pitched, local time" type="datetime-local" max={latest} hint="Empty: not pitched yet. Log the pitch when it is done." {...text('pitchedAt')} />
        <UnitField measure="gravity" className="col-span-2" label={<Sentence>Original gravity, at 20 °C</Sentence>} placeholder="1.048" hint="Empty: not measured. Strength and attenuation are then not known." {...text('gravity')} />
      </Group>
      <Group title="The yeast" note={fresh ? `Filled in ${promise ? 'from the must sheet' : `with what is usual for ${KIND_WORDS[draft.kind]} (common practice)`}. The packet of your yeast goes before it.` : undefined}>
        <Field className="col-span-2" label="Yeast" maxLength={80} {...text('yeast')} />
        <Field label="Attenuation, from" unit="%" {...figure('attenuationMin')} />
        <Field label="to" unit="%" {...figure('attenuationMax')} />
        <UnitField measure="temperature" label="Temperature, from" {...text('temperatureMin')} />
        <UnitField measure="temperature" label="to" {...text('temperatureMax')} />
        <Field label="Bears alcohol up to" unit="%" {...figure('tolerance')} />
        {children}
      </Group>
    </div>
  );
}

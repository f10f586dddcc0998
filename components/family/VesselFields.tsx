import { TagField } from '@/components/batch/TagField';
import { NECK_WORDS } from '@/components/batch/words';
import { typedNumber } from '@/components/batch/figures';
import { Field, Select } from '@/components/ui/Field';
import { UnitField } from '@/components/units/UnitField';
import { VESSEL_KINDS } from '@/lib/contracts/batches';
import { NECKS } from '@/lib/core/types';
import type { PathErrors } from '@/lib/client/use-send';

/** A vessel that drink goes into, as it is typed. */
export interface VesselDraft {
  name: string;
  kind: string;
  holds: string;
  tag: string;
  place: string;
  neck: string;
}

export const newVessel = (name: string): VesselDraft => ({ name, kind: 'demijohn', holds: '', tag: '', place: '', neck: 'airlock' });

/** As the contract has it; what is not a number is left for the schema to refuse. */
export const vesselBody = (draft: VesselDraft) => ({
  name: draft.name,
  vessel_kind: draft.kind,
  vessel_l: typedNumber(draft.holds) ?? NaN,
  tag: typedNumber(draft.tag),
  place: draft.place.trim() || null,
  neck: draft.neck,
});

const FIELDS = ['name', 'vessel_kind', 'vessel_l', 'tag', 'place', 'neck'];
export const showsVessel = (path: string, prefix: string): boolean => FIELDS.some((field) => path === `${prefix}.${field}`);

/** Where drink goes that gets a log of its own. */
export function VesselFields({ draft, errors, prefix, onChange }: { draft: VesselDraft; errors: PathErrors; prefix: string; onChange: (draft: VesselDraft) => void }) {
  const set = (field: keyof VesselDraft) => (event: { target: { value: string } }) => onChange({ ...draft, [field]: event.target.value });
  const at = (field: string) => errors[`${prefix}.${field}`];
  return (
    <>
      <Field className="col-span-full" label="Name" autoComplete="off" maxLength={80} value={draft.name} onChange={set('name')} error={at('name')} />
      <Select label="Vessel" value={draft.kind} onChange={set('kind')} error={at('vessel_kind')}>
        {VESSEL_KINDS.map((kind) => (
          <option key={kind}>{kind}</option>
        ))}
      </Select>
      <UnitField measure="volume" label="It holds, brim full" value={draft.holds} onChange={set('holds')} error={at('vessel_l')} />
      <Select label="What closes the neck" value={draft.neck} onChange={set('neck')} error={at('neck')}>
        {NECKS.map((neck) => (
          <option key={neck} value={neck}>
            {NECK_WORDS[neck]}
          </option>
        ))}
      </Select>
      <TagField label="Tag" value={draft.tag} onChange={set('tag')} error={at('tag')} />
      <Field className="col-span-full" label="Place" autoComplete="off" maxLength={80} value={draft.place} onChange={set('place')} error={at('place')} />
      {draft.neck === 'bung' && <p className="type-reason col-span-full border-l-[3px] border-madder pl-3">Never stop a vessel that works: the pressure can break the glass.</p>}
    </>
  );
}

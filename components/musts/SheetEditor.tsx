'use client';

import { useState, type ReactNode } from 'react';
import { Sheet } from '@/components/ui/Sheet';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field, Select, TextField } from '@/components/ui/Field';
import { temperatureNumber, temperatureText } from '@/components/ui/units';
import { UnitField } from '@/components/units/UnitField';
import { useMe } from '@/lib/client/me';
import { useCatalogue } from '@/lib/client/musts';
import type { CatalogueBody, IngredientBody } from '@/lib/contracts/catalogue';
import { INGREDIENT_KINDS } from '@/lib/core/must/ingredients';
import { DRINK_KINDS } from '@/lib/core/types';
import { newLine, type LineDraft, type SheetDraft, type SheetErrors } from './draft';
import { LINE_COLUMNS, LineRow } from './LineRow';
import { draftOfKind, emptyYeast } from './own-draft';
import { IngredientOfOurs, YeastOfOurs } from './OwnForms';
import { DRINK_WORDS, KIND_WORDS } from './words';

/** The choice that opens a form instead. */
const NOT_LISTED = 'not listed';

/** An ingredient as the sheet keeps it: without the id of the catalogue's row. */
function kept({ id: _row, ...ingredient }: IngredientBody & { id: string | null }): IngredientBody {
  return ingredient;
}

function AddLine({ catalogue, mayExtend, onAdd }: { catalogue: CatalogueBody | undefined; mayExtend: boolean; onAdd: (line: LineDraft) => void }) {
  const [key, setKey] = useState('');
  const [own, setOwn] = useState(false);
  const chosen = catalogue?.ingredients.find((item) => item.key === key);
  return (
    <div className="flex flex-wrap items-end gap-2 py-3">
      <Select label="From the catalogue" className="min-w-0 flex-1 basis-56" value={key} onChange={(event) => setKey(event.target.value)} disabled={!catalogue}>
        <option value="">{catalogue ? 'Choose an ingredient' : 'Loading the catalogue'}</option>
        {INGREDIENT_KINDS.map((kind) => {
          const items = catalogue?.ingredients.filter((item) => item.kind === kind) ?? [];
          return (
            items.length > 0 && (
              <optgroup key={kind} label={KIND_WORDS[kind]}>
                {items.map((item) => (
                  <option key={item.key} value={item.key}>
                    {item.name}
                  </option>
                ))}
              </optgroup>
            )
          );
        })}
      </Select>
      <Button
        disabled={!chosen}
        onClick={() => {
          if (!chosen) return;
          onAdd(newLine(kept(chosen)));
          setKey('');
        }}
      >
        Add the line
      </Button>
      {mayExtend && (
        <Button look="quiet" onClick={() => setOwn(true)}>
          Not in the list
        </Button>
      )}
      {own && (
        <Sheet title="An ingredient of your own" onClose={() => setOwn(false)}>
          <IngredientOfOurs
            id={null}
            start={draftOfKind('fruit', '')}
            onKept={(item) => {
              if (item.sort === 'ingredient') onAdd(newLine(kept(item.ingredient)));
              setOwn(false);
            }}
          />
        </Sheet>
      )}
    </div>
  );
}

interface SheetEditorProps {
  draft: SheetDraft;
  errors: SheetErrors;
  onChange: (draft: SheetDraft) => void;
  children?: ReactNode;
}

/** The sheet as a form. */
export function SheetEditor({ draft, errors, onChange, children }: SheetEditorProps) {
  const { catalogue } = useCatalogue();
  const { may } = useMe();
  const [ownYeast, setOwnYeast] = useState(false);
  const set = (change: Partial<SheetDraft>) => onChange({ ...draft, ...change });
  const setLine = (next: LineDraft) => set({ lines: draft.lines.map((line) => (line.id === next.id ? next : line)) });
  const move = (index: number, by: -1 | 1) => {
    const lines = [...draft.lines];
    const [line] = lines.splice(index, 1);
    if (line) lines.splice(index + by, 0, line);
    set({ lines });
  };
  const yeasts = catalogue?.yeasts ?? [];
  const known = draft.yeast === null || yeasts.some((yeast) => yeast.name === draft.yeast?.name);

  return (
    <div className="flex flex-col gap-4">
      <Field label="Name" maxLength={80} autoComplete="off" value={draft.name} onChange={(event) => set({ name: event.target.value })} error={errors.name} />
      <Choice label="What it becomes" value={draft.kind} onChoose={(kind) => set({ kind })} options={DRINK_KINDS.map((value) => ({ value, name: DRINK_WORDS[value] }))} />
      <div className="grid grid-cols-2 gap-3 strip:grid-cols-[minmax(0,1fr)_9rem_9rem]">
        <Select
          label="Yeast"
          className="max-strip:col-span-full"
          value={draft.yeast?.name ?? ''}
          onChange={(event) => {
            const found = yeasts.find((yeast) => yeast.name === event.target.value);
            if (event.target.value === NOT_LISTED) return setOwnYeast(true);
            if (!found) return set({ yeast: null });
            const { id: _row, ...yeast } = found;
            set({ yeast });
          }}
          hint={draft.yeast ? `bears ${draft.yeast.tolerance_abv.lo} to ${draft.yeast.tolerance_abv.hi} % vol, ${temperatureNumber(draft.yeast.temperature_c.min, 0)} to ${temperatureText(draft.yeast.temperature_c.max, 0)}, nitrogen need ${draft.yeast.nitrogen_need}` : 'Not chosen: all the sugar is taken to ferment.'}
        >
          <option value="">not chosen yet</option>
          {!known && draft.yeast && <option value={draft.yeast.name}>{draft.yeast.name}</option>}
          {yeasts.map((yeast) => (
            <option key={yeast.name} value={yeast.name}>
              {yeast.name}
            </option>
          ))}
          {may('catalogue.write') && <option value={NOT_LISTED}>another, by its packet</option>}
        </Select>
        <UnitField measure="volume" label="Vessel holds" value={draft.vessel} onChange={(event) => set({ vessel: event.target.value })} error={errors.vessel} />
        <UnitField measure="volume" label="Boiled away" value={draft.boiled} onChange={(event) => set({ boiled: event.target.value })} error={errors.boiled} />
      </div>
      {ownYeast && (
        <Sheet title="A yeast of your own" onClose={() => setOwnYeast(false)}>
          <YeastOfOurs
            id={null}
            start={emptyYeast()}
            onKept={(item) => {
              if (item.sort === 'yeast') {
                const { id: _row, ...yeast } = item.yeast;
                set({ yeast });
              }
              setOwnYeast(false);
            }}
          />
        </Sheet>
      )}
      <section aria-labelledby="lines">
        <div className="flex flex-wrap items-baseline gap-x-4 border-b-[1.5px] border-ink pb-1.5">
          <h2 id="lines" className="type-sub">
            What goes in
          </h2>
          <p className="type-label text-ink2">Judged by eye is fine: about half a jar, or 300 to 380 g.</p>
        </div>
        {draft.lines.length > 0 && (
          <div aria-hidden className={`type-label grid gap-x-2 border-b border-rule py-1 text-ink2 max-strip:hidden ${LINE_COLUMNS}`}>
            <span>What, and what it brings</span>
            <span>Amount</span>
            <span>Unit</span>
          </div>
        )}
        {draft.lines.length === 0 && <p className="type-body py-3 text-ink2">No lines yet. Begin with the juice, the honey or the water.</p>}
        <ol>
          {draft.lines.map((line, index) => (
            <LineRow
              key={line.id}
              line={line}
              error={errors[line.id]}
              first={index === 0}
              last={index === draft.lines.length - 1}
              onChange={setLine}
              onMove={(by) => move(index, by)}
              onRemove={() => set({ lines: draft.lines.filter((item) => item.id !== line.id) })}
            />
          ))}
        </ol>
        <AddLine catalogue={catalogue} mayExtend={may('catalogue.write')} onAdd={(line) => set({ lines: [...draft.lines, line] })} />
      </section>
      <TextField label="Method, in your words" rows={4} maxLength={5000} value={draft.method} onChange={(event) => set({ method: event.target.value })} />
      {children}
    </div>
  );
}

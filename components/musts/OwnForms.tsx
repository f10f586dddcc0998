'use client';

import { useState, type FormEvent } from 'react';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field, Select, TextField } from '@/components/ui/Field';
import { UnitField } from '@/components/units/UnitField';
import { FormError } from '@/components/ui/Notice';
import { addToCatalogue, updateCatalogue } from '@/lib/client/musts';
import { useSend, type PathErrors } from '@/lib/client/use-send';
import { catalogueForm, type CatalogueForm, type CatalogueItem } from '@/lib/contracts/catalogue';
import { ALLERGENS, INGREDIENT_KINDS, NITROGEN_NEEDS } from '@/lib/core/must/ingredients';
import { draftOfKind, ingredientOf, yeastOf, type IngredientDraft, type YeastDraft } from './own-draft';
import { KIND_WORDS, PRESERVATIVE_WORDS } from './words';

/** What is wrong at a path or below it. */
const under = (errors: PathErrors, path: string): string | undefined => Object.entries(errors).find(([key]) => key === path || key.startsWith(`${path}.`))?.[1];

/** A new item, or a changed one where `id` is given. */
function useKeep(id: string | null, onKept: (item: CatalogueItem) => void) {
  return useSend(
    catalogueForm,
    async (form: CatalogueForm) => onKept(id === null ? await addToCatalogue(form) : await updateCatalogue(id, form)),
    () => true,
  );
}

/** An ingredient of the cellar's own: the usual figures of its kind, written over by what its label says. */
export function IngredientOfOurs({ id, start, onKept }: { id: string | null; start: IngredientDraft; onKept: (item: CatalogueItem) => void }) {
  const [draft, setDraft] = useState(start);
  const { errors, failed, sending, submit } = useKeep(id, onKept);
  const set = (field: keyof IngredientDraft) => (event: { target: { value: string } }) => setDraft((before) => ({ ...before, [field]: event.target.value }));
  const at = (path: string) => under(errors, `ingredient.${path}`);
  const send = (event: FormEvent) => {
    event.preventDefault();
    void submit({ sort: 'ingredient', ingredient: ingredientOf(draft) });
  };
  const figure = (field: keyof IngredientDraft & string, label: string, unit: string, path: string, hint?: string) => (
    <Field className={field === 'sugar' ? 'col-span-full' : ''} label={label} unit={unit} inputMode="text" autoComplete="off" value={String(draft[field])} onChange={set(field)} error={at(path)} hint={hint} />
  );
  return (
    <form onSubmit={send} noValidate className="flex flex-col gap-4">
      <Field label="Name" maxLength={80} autoComplete="off" value={draft.name} onChange={set('name')} error={at('name')} />
      <Select
        label="What it is"
        value={draft.kind}
        onChange={(event) => {
          const kind = INGREDIENT_KINDS.find((item) => item === event.target.value) ?? 'sugar';
          setDraft((before) => draftOfKind(kind, before.name));
        }}
        error={at('kind')}
        hint="The usual figures of its kind follow; write over them what the label says. A figure may be a range: 10 to 14."
      >
        {INGREDIENT_KINDS.map((kind) => (
          <option key={kind} value={kind}>
            {KIND_WORDS[kind]}
          </option>
        ))}
      </Select>
      <div className="grid grid-cols-2 gap-3">
        {figure('sugar', draft.kind === 'juice' ? 'Its strength' : draft.kind === 'grain' ? 'Extract of a laboratory mash' : 'Sugar and what else dissolves', draft.kind === 'juice' ? '°Bx' : '%', 'extract_share')}
        {figure('fermentable', 'Of that, yeast can use', '%', 'fermentable_share')}
        {figure('insoluble', 'Pulp, skins, husks', '%', 'insoluble_share')}
        {figure('days', 'Gives up its sugar over', 'days', 'releases_over_days', 'Empty: at once.')}
        {draft.kind === 'grain' && figure('efficiency', 'The mash wins', '%', 'mash')}
        {figure('density', 'Weighs, by volume', 'g/ml', 'density_g_per_ml', 'Empty: only weighed.')}
        <Field label="One is called" maxLength={30} autoComplete="off" placeholder="jar, piece, tablet" value={draft.pieceName} onChange={set('pieceName')} error={at('each.name')} />
        {figure('pieceGrams', 'One weighs', 'g', 'each.grams', 'Empty: not counted.')}
        {figure('nitrogen', 'Nitrogen for yeast', 'mg/g', 'yan_mg_per_g')}
        {figure('sulphite', 'Sulphite', 'mg/g', 'sulphite_mg_per_g')}
        <Select label="Preservative in it" className="col-span-full" value={draft.preservative} onChange={set('preservative')}>
          {Object.entries(PRESERVATIVE_WORDS).map(([value, name]) => (
            <option key={value} value={value}>
              {name}
            </option>
          ))}
        </Select>
      </div>
      <fieldset>
        <legend className="type-label pb-1 text-ink2">Allergens in it</legend>
        <div className="grid grid-cols-2 gap-x-3 gap-y-1">
          {ALLERGENS.map((allergen) => (
            <Box key={allergen} ticked={draft.allergens.includes(allergen)} onTick={(on) => setDraft((before) => ({ ...before, allergens: on ? [...before.allergens, allergen] : before.allergens.filter((item) => item !== allergen) }))}>
              <span className="type-body">{allergen}</span>
            </Box>
          ))}
        </div>
      </fieldset>
      <TextField label="Caution" rows={2} maxLength={300} value={draft.caution} onChange={set('caution')} error={at('caution')} />
      {failed && <FormError>{failed}</FormError>}
      <Button look="first" type="submit" className="self-end" disabled={sending}>
        {sending ? 'Keeping' : id === null ? 'Add to the catalogue' : 'Keep it'}
      </Button>
    </form>
  );
}

/** A yeast by its packet. */
export function YeastOfOurs({ id, start, onKept }: { id: string | null; start: YeastDraft; onKept: (item: CatalogueItem) => void }) {
  const [draft, setDraft] = useState(start);
  const { errors, failed, sending, submit } = useKeep(id, onKept);
  const set = (field: keyof YeastDraft) => (event: { target: { value: string } }) => setDraft((before) => ({ ...before, [field]: event.target.value }));
  const at = (path: string) => under(errors, `yeast.${path}`);
  const send = (event: FormEvent) => {
    event.preventDefault();
    void submit({ sort: 'yeast', yeast: yeastOf(draft) });
  };
  return (
    <form onSubmit={send} noValidate className="flex flex-col gap-4">
      <Field label="Name on the packet" maxLength={80} autoComplete="off" value={draft.name} onChange={set('name')} error={at('name')} />
      <div className="grid grid-cols-2 gap-3">
        <Field label="Bears up to" unit="% vol" autoComplete="off" placeholder="12 to 14" value={draft.tolerance} onChange={set('tolerance')} error={at('tolerance_abv')} />
        <Field label="Attenuation in wort" unit="%" autoComplete="off" placeholder="73 to 80" value={draft.attenuation} onChange={set('attenuation')} error={at('attenuation')} hint="Empty: takes all the sugar." />
        <UnitField measure="temperature" label="Works from" value={draft.coldest} onChange={set('coldest')} error={at('temperature_c.min')} />
        <UnitField measure="temperature" label="to" value={draft.warmest} onChange={set('warmest')} error={at('temperature_c.max')} />
      </div>
      <Choice label="Need of nitrogen" value={draft.need} onChoose={(need) => setDraft((before) => ({ ...before, need }))} options={NITROGEN_NEEDS.map((value) => ({ value, name: value }))} />
      <Box ticked={draft.diastatic} onTick={(diastatic) => setDraft((before) => ({ ...before, diastatic }))}>
        <span className="type-body">It is diastatic: it eats on what other yeasts leave, in the bottle too.</span>
      </Box>
      {failed && <FormError>{failed}</FormError>}
      <Button look="first" type="submit" className="self-end" disabled={sending}>
        {sending ? 'Keeping' : id === null ? 'Add to the catalogue' : 'Keep it'}
      </Button>
    </form>
  );
}

'use client';

import { useState } from 'react';
import { Sheet } from '@/components/batch/Sheet';
import { Button, LinkButton } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { temperatureNumber, temperatureText } from '@/components/ui/units';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState, FormError } from '@/components/ui/Notice';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { ClientError } from '@/lib/client/fetcher';
import { useMe } from '@/lib/client/me';
import { removeFromCatalogue, useCatalogue } from '@/lib/client/musts';
import type { CatalogueBody } from '@/lib/contracts/catalogue';
import { draftOfIngredient, draftOfKind, draftOfYeast, emptyYeast } from './own-draft';
import { IngredientOfOurs, YeastOfOurs } from './OwnForms';
import { ends, KIND_WORDS } from './words';

type Ingredient = CatalogueBody['ingredients'][number];
type Yeast = CatalogueBody['yeasts'][number];
type Opened = { sort: 'ingredient'; item: Ingredient | null } | { sort: 'yeast'; item: Yeast | null };

const sugarWords = ({ kind, extract_share: share }: Ingredient) => (share.hi === 0 ? null : `${ends({ lo: 100 * share.lo, value: 100 * share.value, hi: 100 * share.hi }, 1)} ${kind === 'juice' ? '°Bx' : '% sugar'}`);
const yeastWords = (yeast: Yeast) => `bears ${ends(yeast.tolerance_abv, 0)} % vol, ${temperatureNumber(yeast.temperature_c.min, 0)} to ${temperatureText(yeast.temperature_c.max, 0)}, nitrogen need ${yeast.nitrogen_need}${yeast.diastatic ? ', diastatic' : ''}`;

/** All that a must sheet can be written with: the program's and the cellar's own, which may be changed. */
export function CataloguePage() {
  const { me, may } = useMe();
  const { catalogue, error, retry } = useCatalogue();
  const [asked, setAsked] = useState('');
  const [opened, setOpened] = useState<Opened | null>(null);
  const [failed, setFailed] = useState<string | null>(null);
  const close = () => setOpened(null);
  const write = may('catalogue.write');
  const wanted = (name: string) => name.toLowerCase().includes(asked.trim().toLowerCase());

  async function takeOut(id: string) {
    setFailed(null);
    try {
      await removeFromCatalogue(id);
    } catch (problem) {
      setFailed(problem instanceof ClientError ? problem.message : 'It was not taken out. Try again.');
    }
  }

  const row = (name: string, says: string, id: string | null, onChange: () => void) => (
    <li key={id ?? name} className="flex flex-wrap items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2">
      <span className="min-w-0 flex-1 basis-64">
        <span className="type-name-low block break-words">{name}</span>
        <span className="type-label text-ink2">{says}</span>
      </span>
      {id !== null && <span className="type-label">own</span>}
      {id !== null && write && (
        <span className="flex gap-2">
          <Button look="quiet" size="lane" aria-label={`Change ${name}`} onClick={onChange}>
            Change
          </Button>
          <Button look="quiet" size="lane" aria-label={`Take ${name} out`} onClick={() => void takeOut(id)}>
            Take out
          </Button>
        </span>
      )}
    </li>
  );

  const ownFirst = <T extends { id: string | null; name: string }>(items: readonly T[]) => items.filter((item) => wanted(item.name)).toSorted((a, b) => Number(a.id === null) - Number(b.id === null));
  const ingredients = ownFirst(catalogue?.ingredients ?? []);
  const yeasts = ownFirst(catalogue?.yeasts ?? []);
  return (
    <>
      <PageHead title="Catalogue" meta="Usual figures; a label or a measurement goes before them. A sheet keeps what it was written with.">
        <div className="flex flex-wrap gap-2">
          <LinkButton look="quiet" href="/musts">
            To the sheets
          </LinkButton>
          {write && <Button onClick={() => setOpened({ sort: 'yeast', item: null })}>Add a yeast</Button>}
          {write && (
            <Button look="first" onClick={() => setOpened({ sort: 'ingredient', item: null })}>
              Add an ingredient
            </Button>
          )}
        </div>
      </PageHead>
      <div className="border-b bg-desk px-(--margin) py-3">
        <Field label="Find by name" type="search" className="strip:max-w-80" maxLength={80} value={asked} onChange={(event) => setAsked(event.target.value)} />
      </div>
      {failed && <FormError>{failed}</FormError>}
      {error && !catalogue ? (
        <ErrorState title="The catalogue did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      ) : !catalogue || !me ? (
        <Haze height={300} className="m-(--margin)" label="Loading the catalogue" />
      ) : ingredients.length + yeasts.length === 0 ? (
        <EmptyState title="Nothing has that name">{write ? 'Add it as your own.' : 'A brewer can add it.'}</EmptyState>
      ) : (
        <>
          <GroupBar word="Ingredients" note={`${ingredients.length}`} />
          <ul>{ingredients.map((item) => row(item.name, [KIND_WORDS[item.kind].toLowerCase(), sugarWords(item), item.allergens.length > 0 ? `holds ${item.allergens.join(', ')}` : null].filter(Boolean).join(', '), item.id, () => setOpened({ sort: 'ingredient', item })))}</ul>
          <GroupBar word="Yeasts" note={`${yeasts.length}`} />
          <ul>{yeasts.map((item) => row(item.name, yeastWords(item), item.id, () => setOpened({ sort: 'yeast', item })))}</ul>
        </>
      )}
      {opened && (
        <Sheet title={opened.item ? opened.item.name : opened.sort === 'yeast' ? 'A yeast of your own' : 'An ingredient of your own'} onClose={close}>
          {opened.sort === 'yeast' ? (
            <YeastOfOurs id={opened.item?.id ?? null} start={opened.item ? draftOfYeast(opened.item) : emptyYeast()} onKept={close} />
          ) : (
            <IngredientOfOurs id={opened.item?.id ?? null} start={opened.item ? draftOfIngredient(opened.item) : draftOfKind('fruit', asked.trim())} onKept={close} />
          )}
        </Sheet>
      )}
    </>
  );
}

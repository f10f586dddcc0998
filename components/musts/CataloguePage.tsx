'use client';

import { useState } from 'react';
import { Sheet } from '@/components/ui/Sheet';
import { Button, LinkButton } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState, FormError } from '@/components/ui/Notice';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { ClientError } from '@/lib/client/fetcher';
import { useMe } from '@/lib/client/me';
import { removeFromCatalogue, useCatalogue } from '@/lib/client/musts';
import type { CatalogueBody } from '@/lib/contracts/catalogue';
import { INGREDIENT_KINDS } from '@/lib/core/must/ingredients';
import { CatalogueHead, IngredientRow, YeastRow } from './CatalogueRow';
import { draftOfIngredient, draftOfKind, draftOfYeast, emptyYeast } from './own-draft';
import { IngredientOfOurs, YeastOfOurs } from './OwnForms';
import { KIND_WORDS } from './words';

type Ingredient = CatalogueBody['ingredients'][number];
type Yeast = CatalogueBody['yeasts'][number];
/** `id` null: a new one, perhaps begun from one of the program's. */
type Opened = { sort: 'ingredient'; id: string | null; from: Ingredient | null } | { sort: 'yeast'; id: string | null; from: Yeast | null };

/** One's own is told apart from what it was begun from. */
const nameFor = ({ id, from }: Opened) => (id === null ? `${from?.name ?? ''}, ours` : (from?.name ?? ''));

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

  /** Ours may be changed; of the program's one's own is made. */
  const acts = (name: string, id: string | null, open: (id: string | null) => void) =>
    write && (
      <>
        <Button look="quiet" size="lane" aria-label={id === null ? `Make ${name} our own` : `Change ${name}`} onClick={() => open(id)}>
          {id === null ? 'Make it ours' : 'Change'}
        </Button>
        {id !== null && (
          <Button look="quiet" size="lane" aria-label={`Take ${name} out`} onClick={() => void takeOut(id)}>
            Take out
          </Button>
        )}
      </>
    );

  const ownFirst = <T extends { id: string | null; name: string }>(items: readonly T[]) => items.filter((item) => wanted(item.name)).toSorted((a, b) => Number(a.id === null) - Number(b.id === null));
  const ingredients = ownFirst(catalogue?.ingredients ?? []);
  const yeasts = ownFirst(catalogue?.yeasts ?? []);
  return (
    <>
      <PageHead title="Catalogue" meta="Usual figures; a label or a measurement goes before them.">
        <div className="flex flex-wrap gap-2">
          <LinkButton look="quiet" href="/musts">
            To the sheets
          </LinkButton>
          {write && <Button onClick={() => setOpened({ sort: 'yeast', id: null, from: null })}>Add a yeast</Button>}
          {write && (
            <Button look="first" onClick={() => setOpened({ sort: 'ingredient', id: null, from: null })}>
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
          {ingredients.length > 0 && <CatalogueHead of="ingredients" />}
          {INGREDIENT_KINDS.map((kind) => {
            const items = ingredients.filter((item) => item.kind === kind);
            return (
              items.length > 0 && (
                <section key={kind} aria-label={KIND_WORDS[kind]}>
                  <GroupBar word={KIND_WORDS[kind]} note={`${items.length}`} />
                  <ul>
                    {items.map((item) => (
                      <IngredientRow key={item.key} item={item}>
                        {acts(item.name, item.id, (id) => setOpened({ sort: 'ingredient', id, from: item }))}
                      </IngredientRow>
                    ))}
                  </ul>
                </section>
              )
            );
          })}
          {yeasts.length > 0 && (
            <section aria-label="Yeasts">
              <GroupBar word="Yeasts" note={`${yeasts.length}`} />
              <CatalogueHead of="yeasts" />
              <ul>
                {yeasts.map((item) => (
                  <YeastRow key={item.id ?? item.name} item={item}>
                    {acts(item.name, item.id, (id) => setOpened({ sort: 'yeast', id, from: item }))}
                  </YeastRow>
                ))}
              </ul>
            </section>
          )}
        </>
      )}
      {opened && (
        <Sheet title={opened.id !== null && opened.from ? opened.from.name : opened.sort === 'yeast' ? 'A yeast of your own' : 'An ingredient of your own'} onClose={close}>
          {opened.sort === 'yeast' ? (
            <YeastOfOurs id={opened.id} start={opened.from ? { ...draftOfYeast(opened.from), name: nameFor(opened) } : emptyYeast()} onKept={close} />
          ) : (
            <IngredientOfOurs id={opened.id} start={opened.from ? { ...draftOfIngredient(opened.from), name: nameFor(opened) } : draftOfKind('fruit', asked.trim())} onKept={close} />
          )}
        </Sheet>
      )}
    </>
  );
}

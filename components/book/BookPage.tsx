'use client';

import { useDeferredValue, useState } from 'react';
import Link from 'next/link';
import type { CSSProperties } from 'react';
import { KIND_WORDS } from '@/components/batch/words';
import { drinkHex } from '@/components/charts/palette';
import { AskHow } from '@/components/how/AskHow';
import { buttonClass, LinkButton } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { FilterTabs } from '@/components/ui/FilterTabs';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState } from '@/components/ui/Notice';
import { useMoney } from '@/components/ui/money';
import { useNow } from '@/components/ui/now';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { State } from '@/components/ui/StateMark';
import { lotsCsvUrl, useLots, usePlaces, type LotSearch } from '@/lib/client/lots';
import { useMe } from '@/lib/client/me';
import type { LOT_SORTS, LotSummary } from '@/lib/contracts/lots';
import { DRINK_KINDS, type DrinkKind } from '@/lib/core/types';
import { Places } from './Places';
import { answersOfLot, costWords, dayWords, leftWords, SPARKLE_WORDS, strengthWords } from './words';

type StateTab = NonNullable<LotSearch['state']>;
type Sort = (typeof LOT_SORTS)[number];

const TABS: readonly { value: StateTab; name: string }[] = [
  { value: 'all', name: 'All' },
  { value: 'cellared', name: 'In the cellar' },
  { value: 'ready', name: 'Ready' },
  { value: 'caution', name: 'With a caution' },
  { value: 'empty', name: 'Empty' },
];
const SORTS: Record<Sort, { name: string; order: 'asc' | 'desc' }> = {
  bottled: { name: 'newest first', order: 'desc' },
  ready: { name: 'ready first', order: 'asc' },
  name: { name: 'by name', order: 'asc' },
  left: { name: 'most left', order: 'desc' },
  abv: { name: 'strongest', order: 'desc' },
  score: { name: 'best tasted', order: 'desc' },
};

function LotRow({ lot, timeZone, now }: { lot: LotSummary; timeZone: string; now: number }) {
  const day = (at: string) => dayWords(at, timeZone, now);
  const score = lot.tastings.score;
  const { money } = useMoney();
  return (
    <li className="flex items-center border-b hover:bg-lit">
      <Link href={`/book/${lot.id}`} className="drink grid min-w-0 flex-1 grid-cols-[minmax(0,1fr)] gap-x-5 gap-y-1 py-2.5 pl-(--margin) pr-(--margin) no-underline -outline-offset-2 strip:grid-cols-[10px_minmax(0,1.4fr)_minmax(0,1fr)_minmax(0,1fr)] strip:items-center" style={{ '--drink': drinkHex(lot.batch.drink_colour) } as CSSProperties}>
        <span aria-hidden className="hidden h-full min-h-9 border border-ink bg-(--drink-fill) strip:block" />
        <span className="min-w-0">
          <span className="type-name block break-words">{lot.name}</span>
          <span className="type-label text-ink2">
            {lot.code}, {KIND_WORDS[lot.batch.kind]}, {SPARKLE_WORDS[lot.sparkle]}, {strengthWords(lot.abv_percent)}
          </span>
        </span>
        <span className="type-label">
          <span className="block font-semibold">{leftWords(lot.counts)}</span>
          <span className="text-ink2">
            {lot.places.join(', ') || 'no place named'}
            {lot.cost_per_litre && `; ${costWords(lot, money)} a litre`}
          </span>
        </span>
        <span className="type-label">
          {lot.caution ? <State state="Stop" word="Caution" size={13} /> : lot.counts.left === 0 ? <State state="Done" word="Empty" size={13} /> : lot.ready ? <State state="Ready" size={13} /> : <State state="Leave be" word={`Ready ${day(lot.ready_from)}`} size={13} />}
          <span className="block text-ink2">
            bottled {day(lot.bottled_at)}
            {score && `; tasted ${score.mean.toFixed(1)} of 10 by ${score.count}`}
          </span>
        </span>
      </Link>
      <AskHow of={`figures of ${lot.name}, ${lot.code}`} answers={() => answersOfLot(lot, money)} className="shrink-0 pr-(--margin)" />
    </li>
  );
}

/** Every lot that was bottled: how much is left, where it stands, and what became of the rest. */
export function BookPage() {
  const { me, may } = useMe();
  const now = useNow();
  const [words, setWords] = useState('');
  const [state, setState] = useState<StateTab>('all');
  const [kind, setKind] = useState<DrinkKind | ''>('');
  const [place, setPlace] = useState('');
  const { places } = usePlaces();
  const [sort, setSort] = useState<Sort>('bottled');
  const q = useDeferredValue(words.trim());
  const query: LotSearch = { state, sort, order: SORTS[sort].order, limit: 200, ...(q ? { q } : {}), ...(kind ? { kind } : {}), ...(place ? { place } : {}) };
  const { lots, nextCursor, error, retry } = useLots(query);
  const asked = q !== '' || kind !== '' || place !== '' || state !== 'all';
  // In a book without a line there is nothing to look for. Once looked for, the way back stays.
  const [looked, setLooked] = useState(false);
  if ((asked || words !== '') && !looked) setLooked(true);
  const bare = lots?.length === 0 && !looked;
  return (
    <>
      <PageHead title="Cellar book" meta={lots && `${lots.length}${nextCursor ? ' or more' : ''} ${lots.length === 1 ? 'lot' : 'lots'}, ${lots.reduce((sum, lot) => sum + lot.counts.left, 0)} bottles left`}>
        {!bare && (
          <a href={lotsCsvUrl(query)} download className={buttonClass('plain', 'normal')}>
            Take it as CSV
          </a>
        )}
      </PageHead>
      {!bare && (
        <div className="not-printed flex flex-wrap items-end gap-x-4 gap-y-3 border-b bg-desk px-(--margin) py-3">
          <Field label="look for" type="search" value={words} onChange={(event) => setWords(event.target.value)} className="w-56 max-strip:w-full" />
          <Select label="kind" value={kind} onChange={(event) => setKind(event.target.value as DrinkKind | '')} className="w-44 max-strip:w-[calc(50%-0.5rem)]">
            <option value="">every kind</option>
            {DRINK_KINDS.map((one) => (
              <option key={one} value={one}>
                {KIND_WORDS[one]}
              </option>
            ))}
          </Select>
          {(places ?? []).length > 0 && (
            <Select label="place" value={place} onChange={(event) => setPlace(event.target.value)} className="w-44 max-strip:w-[calc(50%-0.5rem)]">
              <option value="">every place</option>
              {(places ?? []).map((one) => (
                <option key={one.id} value={one.id}>
                  {one.name}
                </option>
              ))}
            </Select>
          )}
          <Select label="order" value={sort} onChange={(event) => setSort(event.target.value as Sort)} className="w-40 max-strip:w-[calc(50%-0.5rem)]">
            {(Object.keys(SORTS) as Sort[]).map((one) => (
              <option key={one} value={one}>
                {SORTS[one].name}
              </option>
            ))}
          </Select>
          <FilterTabs label="Show" value={state} onChoose={setState} tabs={TABS} />
        </div>
      )}
      {error && !lots ? (
        <ErrorState title="The cellar book did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      ) : !lots || !me || now === null ? (
        <Haze height={300} label="Loading the cellar book" className="m-(--margin)" />
      ) : lots.length === 0 ? (
        asked ? (
          <EmptyState title="Nothing in the book is like that">Look for less, or show all.</EmptyState>
        ) : (
          <EmptyState title="Nothing is bottled yet" action={<LinkButton href="/bench">To the bench</LinkButton>}>
            A lot stands here from the day it is bottled until the last bottle is opened.
          </EmptyState>
        )
      ) : (
        <ul aria-label="Lots">
          {lots.map((lot) => (
            <LotRow key={lot.id} lot={lot} timeZone={me.cellar.time_zone} now={now} />
          ))}
        </ul>
      )}
      <section aria-label="Places" className="mt-6">
        <GroupBar word="Places" note="where bottles stand, and how many fit" />
        <Places mayManage={may('places.manage')} />
      </section>
    </>
  );
}

'use client';

import Link from 'next/link';
import { useState } from 'react';
import { dayName } from '@/components/charts/zone';
import { AskHow } from '@/components/how/AskHow';
import { Button, LinkButton } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FilterTabs } from '@/components/ui/FilterTabs';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState } from '@/components/ui/Notice';
import { PageHead } from '@/components/ui/Page';
import { gravityEnds, gravityText, volumeText } from '@/components/ui/units';
import { useMe } from '@/lib/client/me';
import { useMusts } from '@/lib/client/musts';
import type { MustList as Musts } from '@/lib/contracts/musts';
import { answersOfMust } from './answers';
import { DRINK_WORDS, ends } from './words';

const COLUMNS = 'strip:grid-cols-[minmax(0,1fr)_9rem_9rem_7rem_9rem]';

/** Over the columns of a wide page. */
const Head = () => (
  <div aria-hidden className="type-label hidden border-b bg-desk text-ink2 strip:flex">
    <div className={`grid min-w-0 flex-1 gap-x-6 px-(--margin) py-1 ${COLUMNS}`}>
      <span>sheet</span>
      <span>original gravity</span>
      <span>strength</span>
      <span>volume</span>
      <span className="text-right">changed</span>
    </div>
    <span className="invisible pr-(--margin)">how?</span>
  </div>
);

/** Nothing where the ends are the figure itself. */
const unless = (said: string, same: string) => (said === same ? null : said);

function Row({ must, timeZone }: { must: Musts['items'][number]; timeZone: string }) {
  return (
    <li className="flex items-center border-b hover:bg-desk">
      <Link href={`/musts/${must.id}`} className={`grid min-h-14 min-w-0 flex-1 grid-cols-[minmax(0,1fr)_auto] items-baseline gap-x-6 gap-y-0.5 px-(--margin) py-2.5 no-underline ${COLUMNS}`}>
        <div className="min-w-0">
          <p className="type-name break-words">{must.name}</p>
          <p className="type-label text-ink2">
            {DRINK_WORDS[must.kind]}, version {must.version}
            {must.copied_from && `, from ${must.copied_from.name}`}
            {must.change_note && `: ${must.change_note}`}
          </p>
        </div>
        <p className="text-right font-mono text-[0.9375rem] font-semibold strip:text-left">{must.original_gravity ? gravityText(must.original_gravity.value) : ''}<span className="type-label block text-ink2">{must.original_gravity ? unless(gravityEnds(must.original_gravity), gravityText(must.original_gravity.value)) : 'not reckoned yet'}</span></p>
        <p className="font-mono text-[0.9375rem] font-semibold max-strip:hidden">{must.abv_percent && `${must.abv_percent.value.toFixed(1)} %`}<span className="type-label block text-ink2">{must.abv_percent && unless(ends(must.abv_percent, 1), must.abv_percent.value.toFixed(1))}</span></p>
        <p className="type-label text-ink2 max-strip:hidden">{must.volume_l && volumeText(must.volume_l.value, 1)}</p>
        <p className="type-label text-right text-ink2 max-strip:hidden">
          {must.batches === 0 ? 'no batch yet' : must.batches === 1 ? '1 batch' : `${must.batches} batches`}
          <span className="block">{dayName(Date.parse(must.changed_at) / 1000, timeZone)}</span>
        </p>
      </Link>
      <AskHow of={`figures of ${must.name}`} answers={() => answersOfMust(must)} className="shrink-0 pr-(--margin)" />
    </li>
  );
}

/** All must sheets of the cellar, newest first. */
export function MustList() {
  const [asked, setAsked] = useState('');
  const [archived, setArchived] = useState<'no' | 'yes'>('no');
  const [limit, setLimit] = useState(50);
  const { me, may } = useMe();
  const { musts, nextCursor, error, retry } = useMusts({ ...(asked.trim() ? { q: asked.trim() } : {}), archived, limit });
  const timeZone = me?.cellar.time_zone ?? 'UTC';
  const write = may('musts.write') && (
    <LinkButton look="first" href="/musts/new">
      New sheet
    </LinkButton>
  );
  const empty = archived === 'no' && asked.trim() === '';
  return (
    <>
      <PageHead title="Must sheets" meta="What goes in, and what it promises.">
        <div className="flex flex-wrap gap-2">
          <LinkButton look="quiet" href="/musts/catalogue">
            Catalogue
          </LinkButton>
          {write}
        </div>
      </PageHead>
      <div className="flex flex-wrap items-end gap-x-4 gap-y-3 border-b bg-desk px-(--margin) py-3">
        <Field label="Find by name" type="search" className="flex-1 basis-44 strip:max-w-80" maxLength={80} value={asked} onChange={(event) => setAsked(event.target.value)} />
        <FilterTabs label="Show" value={archived} onChoose={setArchived} tabs={[{ value: 'no', name: 'In use' }, { value: 'yes', name: 'Put away' }]} />
      </div>
      {error && !musts ? (
        <ErrorState title="The sheets did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      ) : !musts ? (
        <Haze height={160} className="m-(--margin)" label="Loading the sheets" />
      ) : musts.length === 0 ? (
        <EmptyState title={empty ? 'No must sheet yet' : 'None of these'} action={empty ? write : undefined}>
          {empty ? 'A sheet tells the original gravity, the strength and the foam before anything is poured.' : 'No sheet here has that name.'}
        </EmptyState>
      ) : (
        <>
        <Head />
        <ul>
          {musts.map((must) => (
            <Row key={must.id} must={must} timeZone={timeZone} />
          ))}
        </ul>
        </>
      )}
      {nextCursor && (
        <Button look="quiet" className="m-(--margin)" onClick={() => setLimit(200)}>
          Show more
        </Button>
      )}
    </>
  );
}

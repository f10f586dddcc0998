'use client';

import Link from 'next/link';
import { useState } from 'react';
import { Additions } from '@/components/additions/Additions';
import { Finings } from '@/components/additions/Finings';
import { degrees, litres, percent } from '@/components/batch/figures';
import { LinkButton } from '@/components/ui/Button';
import { FilterTabs } from '@/components/ui/FilterTabs';
import { Haze } from '@/components/ui/Haze';
import { ErrorState } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { PageHead } from '@/components/ui/Page';
import { useBatch } from '@/lib/client/batches';
import { useDrink } from '@/lib/client/cellarwork';
import { useMe } from '@/lib/client/me';
import type { DrinkBody } from '@/lib/contracts/family';
import { Family } from './Family';
import { RackForm } from './RackForm';

const TABS = [
  { value: 'additions', name: 'Additions' },
  { value: 'rack', name: 'Rack' },
  { value: 'top-up', name: 'Top up' },
  { value: 'fine', name: 'Fine' },
  { value: 'family', name: 'Family' },
] as const;
type Tab = (typeof TABS)[number]['value'];

/** What is in the vessel by the log, in one ruled line. */
function InIt({ drink }: { drink: DrinkBody }) {
  const facts = [
    ['in it', litres(drink.volume_l)],
    ['original gravity', drink.effective_og?.toFixed(3) ?? 'not told'],
    ['gravity', drink.gravity === null ? 'not read' : `${drink.gravity.toFixed(3)}${drink.gravity_by ? ` by ${drink.gravity_by}` : ''}`],
    ['strength', drink.strength ? percent(drink.strength.balling.value.value) : 'not known'],
    ['temperature', drink.temperature_c === null ? 'not told' : degrees(drink.temperature_c)],
    ['sulphite added', drink.sulphite_added ? `${Math.ceil(drink.total_sulphite_mg_l.hi)} mg/L at most` : 'none logged'],
  ] as const;
  return (
    <dl className="grid grid-cols-2 border-b bg-desk strip:grid-cols-3 wide:grid-cols-6">
      {facts.map(([name, says]) => (
        <div key={name} className="px-(--margin) py-2">
          <dt className="type-label text-ink2">{name}</dt>
          <dd className="font-mono text-[0.875rem] font-semibold">{says}</dd>
        </div>
      ))}
    </dl>
  );
}

/** What is done to a batch in the cellar: additions, racking, topping up, fining; and its family. */
export function CellarWork({ batchId }: { batchId: string }) {
  const [tab, setTab] = useState<Tab>('additions');
  const { me, may } = useMe();
  const { batch, error, retry } = useBatch(batchId);
  const { drink, error: noDrink, retry: askDrink } = useDrink(batchId);
  const clockMs = useNow();
  if (error && !batch) {
    return (
      <ErrorState title={error.status === 404 ? 'There is no such batch here' : 'The batch did not load'} {...(error.status === 404 ? {} : { onRetry: retry })}>
        {error.message}
      </ErrorState>
    );
  }
  if (!batch || !me || clockMs === null) return <Haze height={300} className="m-(--margin)" label="Loading the batch" />;
  const timeZone = me.cellar.time_zone;
  const now = clockMs / 1000;
  const mayAlter = may('entries.alter') && batch.state === 'working';
  const mayMove = may('cellarwork.do') && batch.state === 'working';
  const shown = TABS.filter((item) => mayMove || (item.value !== 'rack' && item.value !== 'top-up'));

  return (
    <>
      <PageHead
        title="Cellar work"
        meta={
          <Link href={`/batches/${batch.id}`} className="text-ink">
            {batch.name}
            {batch.tag !== null && `, tag ${batch.tag}`}
          </Link>
        }
      >
        <LinkButton look="quiet" href={`/batches/${batch.id}`}>
          To the batch
        </LinkButton>
      </PageHead>
      {drink && <InIt drink={drink} />}
      <div className="border-b px-(--margin) py-2.5">
        <FilterTabs label="Do" value={tab} onChoose={setTab} tabs={shown} />
      </div>
      <div className="px-(--margin) py-4">
        {tab === 'additions' &&
          (drink ? (
            <Additions batchId={batch.id} drink={drink} kind={batch.kind} mayLog={mayAlter} />
          ) : noDrink ? (
            <ErrorState title="What is in it did not load" onRetry={askDrink}>
              {noDrink.message}
            </ErrorState>
          ) : (
            <Haze height={160} label="Loading what is in it" />
          ))}
        {tab === 'rack' && <RackForm key="rack" batch={batch} rack now={now} timeZone={timeZone} />}
        {tab === 'top-up' && <RackForm key="top-up" batch={batch} rack={false} now={now} timeZone={timeZone} />}
        {tab === 'fine' && <Finings batchId={batch.id} now={now} timeZone={timeZone} mayDo={mayMove} />}
        {tab === 'family' && <Family batchId={batch.id} timeZone={timeZone} />}
      </div>
    </>
  );
}

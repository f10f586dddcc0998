'use client';

import Link from 'next/link';
import { useSearchParams } from 'next/navigation';
import { useState } from 'react';
import { Additions } from '@/components/additions/Additions';
import { Finings } from '@/components/additions/Finings';
import { degrees, gravityText, litres, percent } from '@/components/batch/figures';
import { LinkButton } from '@/components/ui/Button';
import { Facts } from '@/components/ui/Facts';
import { FilterTabs } from '@/components/ui/FilterTabs';
import { Haze } from '@/components/ui/Haze';
import { ErrorState } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { PageHead } from '@/components/ui/Page';
import { useBatch } from '@/lib/client/batches';
import { useDrink } from '@/lib/client/cellarwork';
import { useMe } from '@/lib/client/me';
import type { DrinkBody } from '@/lib/contracts/family';
import { how, type How as HowAnswer } from '@/lib/core/how/how';
import { SOURCES } from '@/lib/core/how/sources';
import { BlendForm } from './BlendForm';
import { Family } from './Family';
import { RackForm } from './RackForm';
import { SplitForm } from './SplitForm';

const TABS = [
  { value: 'additions', name: 'Additions' },
  { value: 'rack', name: 'Rack' },
  { value: 'top-up', name: 'Top up' },
  { value: 'fine', name: 'Fine' },
  { value: 'split', name: 'Split' },
  { value: 'blend', name: 'Blend' },
  { value: 'family', name: 'Family' },
] as const;
type Tab = (typeof TABS)[number]['value'];
/** Work that may change the family, which stands beside it. */
const MOVES: readonly Tab[] = ['split', 'blend'];

/** The gravity that a must with all the sugar so far would have had. */
const WITH_ADDITIONS = (drink: DrinkBody): HowAnswer =>
  how('original gravity with all that went in since: masses of liquid, extract and alcohol are conserved', SOURCES.massBalance, [['at the pitch', drink.original_gravity, 'SG']]);

const AS_TOLD: HowAnswer = how('as told in the set-up, or the reading at the pitch; nothing that went in since has moved it', SOURCES.told);

const VOLUME_BY_LOG: HowAnswer = how('what was told at the pitch, with every racking, topping up, split, blend and bottling of the log since', SOURCES.told);

const BY_WORDS = { float: 'the curve through the readings of its float', hydrometer: 'the last hydrometer reading, at 20 °C', refractometer: 'the last refractometer reading, with the alcohol reckoned in; good to 0.004, and what alcohol adds to it is recalled, not checked' } as const;
const GRAVITY_BY = ({ gravity_by: by, gravity_at: at }: DrinkBody): HowAnswer | undefined => (by ? how(BY_WORDS[by], SOURCES.told, [['at', at === null ? null : at.slice(0, 16).replace('T', ' '), 'UTC']]) : undefined);
const LAST_TOLD: HowAnswer = how('the last that its sensor, or somebody with a thermometer, told', SOURCES.told);

const SULPHITE_SO_FAR: HowAnswer = how('all sulphite that the must brought and the log adds ÷ the volume at the time, thinned by every top-up; what binds and what goes off is not taken off', SOURCES.practice);

/** What is in the vessel by the log, in one ruled line. */
function InIt({ drink }: { drink: DrinkBody }) {
  const facts = [
    { name: 'in it', says: litres(drink.volume_l), how: VOLUME_BY_LOG },
    { name: drink.effective_og === drink.original_gravity ? 'original gravity' : 'original gravity, all counted', says: drink.effective_og === null ? 'not told' : gravityText(drink.effective_og), how: drink.effective_og === null ? undefined : drink.effective_og === drink.original_gravity ? AS_TOLD : WITH_ADDITIONS(drink) },
    { name: 'gravity', says: drink.gravity === null ? 'not read' : `${gravityText(drink.gravity)}${drink.gravity_by ? ` by ${drink.gravity_by}` : ''}`, how: drink.gravity === null ? undefined : GRAVITY_BY(drink) },
    { name: 'strength', says: drink.strength ? percent(drink.strength.balling.value.value) : 'not known', how: drink.strength?.balling.how },
    { name: 'temperature', says: drink.temperature_c === null ? 'not told' : degrees(drink.temperature_c), how: drink.temperature_c === null ? undefined : LAST_TOLD },
    { name: 'sulphite added', says: drink.sulphite_added ? `${Math.ceil(drink.total_sulphite_mg_l.hi)} mg/L at most` : 'none logged', how: drink.sulphite_added ? SULPHITE_SO_FAR : undefined },
  ];
  return <Facts facts={facts} columns="grid-cols-2 strip:grid-cols-3 wide:grid-cols-6" className="bg-desk" />;
}

/** What is done to a batch in the cellar: additions, racking, topping up, fining; and its family. */
export function CellarWork({ batchId }: { batchId: string }) {
  const asked = useSearchParams().get('do');
  const [tab, setTab] = useState<Tab>(TABS.find((item) => item.value === asked)?.value ?? 'additions');
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
  const work = `${me.person.id} ${batch.id}`;
  const turnTo = (next: Tab) => {
    setTab(next);
    // A reload stays where the work is.
    window.history.replaceState(null, '', `?do=${next}`);
  };
  const mayAlter = may('entries.alter') && batch.state === 'working';
  const mayMove = may('cellarwork.do') && batch.state === 'working';
  const shown = TABS.filter((item) => mayMove || !['rack', 'top-up', 'split', 'blend'].includes(item.value));

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
        <FilterTabs label="Do" value={tab} onChoose={turnTo} tabs={shown} />
      </div>
      <div className={`px-(--margin) py-4 ${MOVES.includes(tab) ? 'wide:grid wide:grid-cols-[600px_minmax(0,1fr)] wide:gap-x-12' : ''}`}>
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
        {tab === 'rack' && <RackForm key={`rack ${work}`} keptAs={`rack ${work}`} batch={batch} rack now={now} timeZone={timeZone} />}
        {tab === 'top-up' && <RackForm key={`top-up ${work}`} keptAs={`top-up ${work}`} batch={batch} rack={false} now={now} timeZone={timeZone} />}
        {tab === 'fine' && <Finings batchId={batch.id} volumeL={batch.volume_l} now={now} timeZone={timeZone} mayDo={mayMove} />}
        {tab === 'split' && <SplitForm key={`split ${work}`} keptAs={`split ${work}`} batch={batch} now={now} timeZone={timeZone} />}
        {tab === 'blend' && <BlendForm key={`blend ${work}`} keptAs={`blend ${work}`} batch={batch} now={now} timeZone={timeZone} />}
        {tab === 'family' && <Family batchId={batch.id} timeZone={timeZone} />}
        {MOVES.includes(tab) && (
          <aside aria-label="Family" className="max-wide:mt-8 max-wide:border-t-[1.5px] max-wide:border-ink max-wide:pt-4">
            <h2 className="type-sub pb-2">Family</h2>
            <Family batchId={batch.id} timeZone={timeZone} />
          </aside>
        )}
      </div>
    </>
  );
}

'use client';

import Link from 'next/link';
import { useState, type CSSProperties } from 'react';
import { Sheet } from '@/components/ui/Sheet';
import { drinkHex } from '@/components/charts/palette';
import { Shares } from '@/components/share/Shares';
import { Photos } from '@/components/photos/Photos';
import { Tastings } from '@/components/tasting/Tastings';
import { Button, LinkButton } from '@/components/ui/Button';
import { Facts, type Fact } from '@/components/ui/Facts';
import { Haze } from '@/components/ui/Haze';
import { ErrorState } from '@/components/ui/Notice';
import { useMoney } from '@/components/ui/money';
import { useNow } from '@/components/ui/now';
import { PageHead } from '@/components/ui/Page';
import { gravityText } from '@/components/ui/units';
import { useLot } from '@/lib/client/lots';
import { useMe } from '@/lib/client/me';
import type { LotBody } from '@/lib/contracts/lots';
import { HOW_COUNTED } from '@/lib/core/how/lots';
import { Became } from './Became';
import { BenchRecord } from './BenchRecord';
import { Caution, Lifted } from './Caution';
import { EditLot } from './EditLot';
import { LotBottles } from './LotBottles';
import { Serve } from './Serve';
import { costWords, dayWords, leftWords, SPARKLE_WORDS, strengthWords } from './words';

/** One lot of the cellar book. */
export function LotPage({ id }: { id: string }) {
  const { lot, error, retry } = useLot(id);
  const { me, may } = useMe();
  const now = useNow();
  const { money } = useMoney();
  const [opened, setOpened] = useState<'serve' | 'edit' | null>(null);
  if (error && !lot) {
    return (
      <ErrorState title={error.status === 404 ? 'There is no such lot in this cellar' : 'The lot did not load'} onRetry={retry}>
        {error.message}
      </ErrorState>
    );
  }
  if (!lot || !me || now === null) return <Haze height={420} label="Loading the lot" className="m-(--margin)" />;
  const timeZone = me.cellar.time_zone;
  const day = (at: string) => dayWords(at, timeZone, now);
  return (
    <div className="drink" style={{ '--drink': drinkHex(lot.batch.drink_colour) } as CSSProperties}>
      <PageHead
        size="title"
        title={lot.name}
        meta={
          <>
            lot {lot.code}, from{' '}
            <Link href={`/batches/${lot.batch.id}`} className="underline underline-offset-4">
              {lot.batch.name}
            </Link>
          </>
        }
      >
        {may('lots.serve') && lot.counts.left > 0 && <Button onClick={() => setOpened('serve')}>Open, give, move</Button>}
        {may('lots.update') && <Button onClick={() => setOpened('edit')}>Write on it</Button>}
        {may('labels.print') && <LinkButton href={`/labels?lot=${lot.id}`}>Labels</LinkButton>}
        <LinkButton look="quiet" href={`/compare?batches=${lot.batch.id}`}>
          Compare
        </LinkButton>
      </PageHead>
      <Caution lot={lot} mayLift={may('lots.override')} />
      <Facts facts={factsOf(lot, day, money)} columns="grid-cols-2 strip:grid-cols-4 wide:grid-cols-8" />
      {lot.note && <p className="type-body border-b px-(--margin) py-2 break-words">{lot.note}</p>}
      <div className="border-b px-(--margin) py-2">
        <Photos place={{ lot: lot.id }} on={{ lot: lot.id }} />
      </div>
      <div className="wide:grid wide:grid-cols-[minmax(0,1fr)_424px]">
        <div className="min-w-0">
          <LotBottles lot={lot} />
          <Tastings lotId={lot.id} timeZone={timeZone} now={now} mayTaste={may('tastings.write')} />
          <Became lot={lot} day={day} mayUndo={may('lots.serve')} />
        </div>
        <div className="min-w-0 wide:border-l">
          <BenchRecord lot={lot} day={day} />
          <Lifted lot={lot} day={day} />
          {may('shares.manage') && <Shares batchId={lot.batch.id} day={day} />}
        </div>
      </div>
      {opened === 'serve' && (
        <Sheet title={`${lot.name}, ${leftWords(lot.counts)}`} onClose={() => setOpened(null)}>
          <Serve lot={lot} onDone={() => setOpened(null)} />
        </Sheet>
      )}
      {opened === 'edit' && (
        <Sheet title={`Lot ${lot.code}`} onClose={() => setOpened(null)}>
          <EditLot lot={lot} timeZone={timeZone} onDone={() => setOpened(null)} />
        </Sheet>
      )}
    </div>
  );
}

function factsOf(lot: LotBody, day: (at: string) => string, money: (amount: number) => string): Fact[] {
  return [
    { name: 'left', says: `${lot.counts.left} of ${lot.counts.bottled}`, how: HOW_COUNTED },
    { name: 'bottled', says: day(lot.bottled_at) },
    { name: 'ready from', says: lot.ready ? `${day(lot.ready_from)}, ready` : day(lot.ready_from), how: lot.how.ready },
    { name: 'sparkle', says: SPARKLE_WORDS[lot.sparkle], how: lot.how.sparkle },
    { name: 'strength', says: strengthWords(lot.abv_percent), how: lot.how.strength },
    { name: 'gravity', says: `${lot.original_gravity === null ? '?' : gravityText(lot.original_gravity)} to ${lot.final_gravity === null ? '?' : gravityText(lot.final_gravity)}`, how: lot.how.gravity },
    { name: 'opened, given', says: `${lot.counts.opened}, ${lot.counts.given}`, how: HOW_COUNTED },
    { name: 'cost a litre', says: costWords(lot, money), how: lot.how.cost },
  ];
}

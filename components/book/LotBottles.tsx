import { degrees } from '@/components/batch/figures';
import { BottleDrawing } from '@/components/bench/BottleDrawing';
import { sizeWords } from '@/components/bench/words';
import { How } from '@/components/ui/How';
import { GroupBar } from '@/components/ui/Page';
import type { LotBody } from '@/lib/contracts/lots';
import { BOTTLES, CLOSURE_CATALOGUE } from '@/lib/core/bottling/bottles';
import type { How as HowAnswer } from '@/lib/core/how/how';
import { useMoney } from '@/components/ui/money';
import { leftWords } from './words';

interface Figure {
  name: string;
  says: string;
  how: HowAnswer | null;
}

/** What is known of one kind of bottle, each figure with where it comes from. */
function figuresOf(bottle: LotBody['bottles'][number], lot: LotBody, money: (amount: number) => string): Figure[] {
  const { cellar_c, warmest_store_c } = lot.bench;
  return [
    { name: 'holds', says: bottle.rating === 'never' ? 'still drink' : `${bottle.rating.toFixed(1)} bar${bottle.rating_confirmed ? '' : ', not confirmed'}`, how: bottle.how.holds },
    { name: `in the cellar, ${degrees(cellar_c)}`, says: `${bottle.cellar_bar.toFixed(1)} bar`, how: bottle.how.cellar },
    { name: `warmest, ${degrees(warmest_store_c)}`, says: `${bottle.warm_bar.toFixed(1)} bar`, how: bottle.how.warm },
    { name: 'if the last sugar goes', says: `${bottle.worst_bar.toFixed(1)} bar`, how: bottle.how.worst },
    ...(bottle.cost_each ? [{ name: 'cost of one', says: `${money(bottle.cost_each.value)}${lot.cost_known ? '' : ' or more'}`, how: lot.how.cost }] : []),
  ];
}

/** The bottles of a lot: how many are left and where, what they hold and what is in them at most. */
export function LotBottles({ lot }: { lot: LotBody }) {
  const { money } = useMoney();
  return (
    <section aria-label="Bottles">
      <GroupBar word="Bottles" note={leftWords(lot.counts)} />
      <ul>
        {lot.bottles.map((bottle) => (
          <li key={bottle.id} className="flex items-start gap-4 border-b px-(--margin) py-2">
            <BottleDrawing kind={bottle.kind} filled={bottle.left > 0} height={58} />
            <div className="min-w-0 flex-1">
              <p className="type-name-low">
                {sizeWords(bottle.size_ml)} {BOTTLES[bottle.kind].name}, {CLOSURE_CATALOGUE[bottle.closure].name}
              </p>
              <p className="type-label">
                {bottle.left} of {bottle.bottled} left
                {bottle.stands.filter((stand) => stand.count > 0).map((stand) => `; ${stand.count} in ${stand.place?.name ?? 'no named place'}`)}
              </p>
              <dl className="type-label flex flex-wrap gap-x-6 pt-1 text-ink2">
                {figuresOf(bottle, lot, money).map((figure) => (
                  <div key={figure.name} className="min-w-0">
                    <dt>{figure.name}</dt>
                    <dd className="font-semibold text-ink">
                      {figure.says}
                      {figure.how && <How how={figure.how} of={`${figure.name}, ${sizeWords(bottle.size_ml)}`} />}
                    </dd>
                  </div>
                ))}
              </dl>
            </div>
          </li>
        ))}
      </ul>
    </section>
  );
}

import { How } from '@/components/ui/How';
import { volumeText } from '@/components/ui/units';
import type { BenchRequest, BenchVerdict } from '@/lib/core/bottling/bench';
import { BOTTLES, CLOSURE_CATALOGUE, howOfHolds } from '@/lib/core/bottling/bottles';
import { howOfPlan } from '@/lib/core/bottling/plan';
import { limitOf } from './Tubes';
import { sizeWords } from './words';

const range = ({ lo, hi }: { lo: number; hi: number }) => (hi - lo < 0.05 ? hi.toFixed(1) : `${lo.toFixed(1)}–${hi.toFixed(1)}`);

/** What stands beside the bottle, in its order. */
const COLUMNS = { count: 'count', volumes: 'volumes', cellar: 'cellar', warm: 'warmest', worst: 'at worst', holds: 'holds' } as const;

/** A figure's name, where there is no head over it. */
const Name = ({ children }: { children: string }) => <span className="text-ink2 strip:hidden">{children} </span>;

/** Every bottle of the plan: how many, the gas and the pressure in it, and what it holds. */
export function BottleTable({ verdict, request }: { verdict: BenchVerdict; request: BenchRequest }) {
  const { plan, bottles, residual, remaining } = verdict;
  return (
    <section aria-label="Plan" className="border-t">
      <p className="type-body px-(--margin) pb-1 pt-3">
        {plan.filled.map((filled) => (
          <span key={filled.key} className="fig">
            {filled.count} × {sizeWords(filled.sizeMl)}{' '}
          </span>
        ))}
        {plan.bottles > 0 && (
          <>
            takes <span className="fig">{volumeText(plan.bottledL)}</span>; <span className="fig">{volumeText(plan.lostL)}</span> stays on the lees
            {plan.overL >= 0.01 && (
              <>
                , <span className="fig">{volumeText(plan.overL)}</span> over for a tasting glass
              </>
            )}
            .{' '}
          </>
        )}
      </p>
      <How of="How many bottles" how={howOfPlan(request.volumeL, plan, request.bottles.map(({ key, choice, atHand }) => ({ key, sizeMl: choice.sizeMl, atHand })))} className="px-(--margin)" />
      <div className="type-label flex flex-wrap gap-x-6 px-(--margin) pb-2 text-ink2">
        <span>
          gas there already {range(residual.value)} volumes <How of="Gas there already" how={residual.how} />
        </span>
        <span>
          may still ferment, at most {remaining.value.hi.toFixed(1)} points <How of="Sugar that may still ferment" how={remaining.how} />
        </span>
      </div>
      {bottles.length > 0 && (
        <div className="relative overflow-x-auto" tabIndex={0} role="region" aria-label="Every bottle">
          <table className="type-label w-full border-t text-left max-strip:block strip:min-w-[640px]">
            {/* A phone has a line for each figure: none may stand where only a finger finds it. */}
            <thead className="max-strip:hidden">
              <tr className="bg-desk text-ink2 [&>th]:px-2 [&>th]:py-1 [&>th]:font-medium [&>th:first-child]:pl-(--margin)">
                <th scope="col">bottle</th>
                {Object.values(COLUMNS).map((name) => (
                  <th key={name} scope="col">
                    {name}
                  </th>
                ))}
              </tr>
            </thead>
            <tbody className="max-strip:block">
              {bottles.map((bottle) => {
                const limit = limitOf(bottle);
                const over = bottle.worst.bar > limit;
                return (
                  <tr key={bottle.key} className="border-t border-rule max-strip:grid max-strip:grid-cols-2 max-strip:gap-x-4 max-strip:px-(--margin) max-strip:py-2 strip:[&>*]:px-2 strip:[&>*]:py-1.5 strip:[&>*:first-child]:pl-(--margin)">
                    <th scope="row" className="font-medium max-strip:col-span-2 max-strip:pb-1">
                      {BOTTLES[bottle.choice.kind].name}, {sizeWords(bottle.choice.sizeMl)}
                      <span className="block text-ink2">{CLOSURE_CATALOGUE[bottle.choice.closure].name}</span>
                    </th>
                    <td>
                      <Name>{COLUMNS.count}</Name>
                      {bottle.count}
                    </td>
                    <td>
                      <Name>{COLUMNS.volumes}</Name>
                      {range(bottle.volumes.value)} <How of="Gas as asked" how={bottle.volumes.how} />
                    </td>
                    {(['cellar', 'warm', 'worst'] as const).map((at) => (
                      <td key={at} className={at === 'worst' && over ? 'font-semibold text-madder' : ''}>
                        <Name>{COLUMNS[at]}</Name>
                        {bottle[at].bar.toFixed(1)} bar{at === 'worst' && over ? ', over' : ''} <How of={`Pressure ${at === 'cellar' ? 'in the cellar' : at === 'warm' ? 'at the warmest' : 'at worst'}`} how={bottle[at].how} />
                      </td>
                    ))}
                    <td>
                      <Name>{COLUMNS.holds}</Name>
                      {bottle.holds.rating === 'never' ? 'still only' : `${limit.toFixed(1)} bar${bottle.holds.confirmed ? '' : ', usual'}`}{' '}
                      <How of="What it holds" how={howOfHolds(bottle.choice)} />
                    </td>
                  </tr>
                );
              })}
            </tbody>
          </table>
        </div>
      )}
    </section>
  );
}

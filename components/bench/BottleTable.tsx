import { How } from '@/components/ui/How';
import { volumeText } from '@/components/ui/units';
import type { BenchRequest, BenchVerdict } from '@/lib/core/bottling/bench';
import { BOTTLES, CLOSURE_CATALOGUE, howOfHolds } from '@/lib/core/bottling/bottles';
import { howOfPlan } from '@/lib/core/bottling/plan';
import { limitOf } from './Tubes';
import { sizeWords } from './words';

const range = ({ lo, hi }: { lo: number; hi: number }) => (hi - lo < 0.05 ? hi.toFixed(1) : `${lo.toFixed(1)}–${hi.toFixed(1)}`);

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
          <table className="type-label w-full min-w-[640px] border-t text-left">
            <thead>
              <tr className="bg-desk text-ink2 [&>th]:px-2 [&>th]:py-1 [&>th]:font-medium [&>th:first-child]:pl-(--margin)">
                <th scope="col">bottle</th>
                <th scope="col">count</th>
                <th scope="col">volumes</th>
                <th scope="col">cellar</th>
                <th scope="col">warmest</th>
                <th scope="col">at worst</th>
                <th scope="col">holds</th>
              </tr>
            </thead>
            <tbody>
              {bottles.map((bottle) => {
                const limit = limitOf(bottle);
                const over = bottle.worst.bar > limit;
                return (
                  <tr key={bottle.key} className="border-t border-rule [&>*]:px-2 [&>*]:py-1.5 [&>*:first-child]:pl-(--margin)">
                    <th scope="row" className="font-medium">
                      {BOTTLES[bottle.choice.kind].name}, {sizeWords(bottle.choice.sizeMl)}
                      <span className="block text-ink2">{CLOSURE_CATALOGUE[bottle.choice.closure].name}</span>
                    </th>
                    <td>{bottle.count}</td>
                    <td>
                      {range(bottle.volumes.value)} <How of="Gas as asked" how={bottle.volumes.how} />
                    </td>
                    {(['cellar', 'warm', 'worst'] as const).map((at) => (
                      <td key={at} className={at === 'worst' && over ? 'font-semibold text-madder' : ''}>
                        {bottle[at].bar.toFixed(1)} bar{at === 'worst' && over ? ', over' : ''} <How of={`Pressure ${at === 'cellar' ? 'in the cellar' : at === 'warm' ? 'at the warmest' : 'at worst'}`} how={bottle[at].how} />
                      </td>
                    ))}
                    <td>
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

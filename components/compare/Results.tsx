import Link from 'next/link';
import { percent } from '@/components/batch/figures';
import { KIND_WORDS } from '@/components/batch/words';
import { GroupBar } from '@/components/ui/Page';
import { How } from '@/components/ui/How';
import { gravityText } from '@/components/ui/units';
import { how, type How as HowAnswer } from '@/lib/core/how/how';
import { HOW_TASTED } from '@/lib/core/how/lots';
import { SOURCES } from '@/lib/core/how/sources';
import type { Compared } from './curves';

const ATTENUATION = how('(original gravity − gravity) ÷ (original gravity − 1), with all the sugar that went in counted as there from the start; alcohol is lighter than water, so a dry drink passes 100 %', SOURCES.practice);
const TO_THE_END = how('from the pitch to the hour from which its readings are judged to stand still', SOURCES.ownRule);

const ORIGINAL = how('as told in the set-up, or the reading at the pitch; what was added since is not in it', SOURCES.told);
const LAST = how('last reading by hydrometer, else the float’s level; corrected to 20 °C where the sample’s temperature was logged', SOURCES.told);
const LOTS = how('lots bottled from it that stand in the cellar book', SOURCES.told);

const days = (hours: number): string => `${(hours / 24).toFixed(1)} days`;

/** What became of each, side by side. */
export function Results({ items }: { items: readonly Compared[] }) {
  const rows: Array<{ name: string; says: (item: Compared) => string; how?: HowAnswer }> = [
    { name: 'kind', says: ({ batch }) => KIND_WORDS[batch.kind] },
    { name: 'yeast', says: ({ batch }) => batch.yeast ?? 'not told' },
    { name: 'original gravity', says: ({ batch }) => (batch.original_gravity === null ? 'not told' : gravityText(batch.original_gravity)), how: ORIGINAL },
    { name: 'gravity', says: ({ result }) => (result.gravity === null ? 'not read' : gravityText(result.gravity)), how: LAST },
    { name: 'attenuation', says: ({ result }) => (result.attenuation_percent === null ? 'not known' : `${result.attenuation_percent.toFixed(0)} %`), how: ATTENUATION },
    { name: 'from pitch to the end', says: ({ batch, result }) => (result.hours_to_terminal === null ? (batch.state === 'ended' ? 'not known' : 'not yet') : days(result.hours_to_terminal)), how: TO_THE_END },
    { name: 'lots', says: ({ result }) => String(result.lots), how: LOTS },
    { name: 'tasted', says: ({ result }) => (result.score === null ? 'by nobody' : `${result.score.toFixed(1)} of 10`), how: HOW_TASTED },
  ];
  return (
    <section aria-label="Results">
      <GroupBar word="Results" />
      <div className="relative overflow-x-auto" tabIndex={0} role="group" aria-label="Results side by side">
        <table className="w-full border-collapse">
          <thead>
            <tr className="border-b text-left align-bottom">
              <td className="pl-(--margin)" />
              {items.map(({ batch }) => (
                <th key={batch.id} scope="col" className="min-w-36 py-2 pr-5 font-normal">
                  <Link href={`/batches/${batch.id}`} className="type-name-low break-words">
                    {batch.name}
                  </Link>
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            <tr className="border-b border-rule align-baseline">
              <th scope="row" className="type-label py-1.5 pl-(--margin) pr-4 text-left font-medium text-ink2">strength</th>
              {items.map(({ batch, result }) => (
                <td key={batch.id} className="py-1.5 pr-5">
                  <div className="flex flex-wrap items-baseline gap-x-4">
                    <span className="font-mono text-[0.875rem] font-semibold">{result.abv_percent === null ? 'not known' : percent(result.abv_percent)}</span>
                    {result.how && <How how={result.how} of={`strength of ${batch.name}`} className="open:basis-full" />}
                  </div>
                </td>
              ))}
            </tr>
            {rows.map((row) => (
              <tr key={row.name} className="border-b border-rule align-baseline">
                <th scope="row" className="type-label py-1.5 pl-(--margin) pr-4 text-left font-medium text-ink2">
                  <div className="flex flex-wrap items-baseline gap-x-4">
                    {row.name}
                    {row.how && <How how={row.how} of={row.name} className="max-w-56 open:basis-full" />}
                  </div>
                </th>
                {items.map((item) => (
                  <td key={item.batch.id} className="py-1.5 pr-5 font-mono text-[0.875rem] font-semibold">
                    {row.says(item)}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </section>
  );
}

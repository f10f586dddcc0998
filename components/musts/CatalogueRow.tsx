import type { ReactNode } from 'react';
import { How } from '@/components/ui/How';
import { temperatureNumber, temperatureText } from '@/components/ui/units';
import type { CatalogueBody } from '@/lib/contracts/catalogue';
import { how } from '@/lib/core/how/how';
import { practice } from '@/lib/core/how/sources';
import { times, type Range } from '@/lib/core/units/range';
import { ends } from './words';

type Ingredient = CatalogueBody['ingredients'][number];
type Yeast = CatalogueBody['yeasts'][number];

/** Name, three figures, what else it holds, where it is from, and what may be done with it. */
const COLUMNS = 'wide:grid-cols-[minmax(0,1.4fr)_8.5rem_8.5rem_9rem_minmax(0,1fr)_3rem_13rem]';

function Figure({ name, says }: { name: string; says: string | null }) {
  return (
    <span className={says === null ? 'max-wide:hidden' : ''}>
      {says !== null && (
        <>
          <span className="type-label text-ink2 wide:hidden">{name} </span>
          <span className="font-mono text-[0.8125rem] font-medium">{says}</span>
        </>
      )}
    </span>
  );
}

/** Over the columns of a wide page; on a narrow one each figure has its name beside it. */
export const CatalogueHead = ({ of }: { of: 'ingredients' | 'yeasts' }) => (
  <div aria-hidden className={`type-label hidden gap-x-4 border-b bg-desk px-(--margin) py-1 text-ink2 wide:grid ${COLUMNS}`}>
    {['name', ...(of === 'yeasts' ? ['bears', 'works at', 'need of nitrogen'] : ['sugar', 'of it ferments', 'nitrogen']), 'what else'].map((name) => (
      <span key={name}>{name}</span>
    ))}
  </div>
);

function Row({ name, own, figures, holds, origin, children }: { name: string; own: boolean; figures: readonly (readonly [string, string | null])[]; holds: string; origin: ReactNode; children: ReactNode }) {
  return (
    <li className={`border-b border-rule px-(--margin) py-1.5 wide:grid wide:items-center wide:gap-x-4 ${COLUMNS}`}>
      <p className="type-name-low break-words">
        {name}
        {own && <span className="type-label font-normal text-ink2">, our own</span>}
      </p>
      <div className="flex flex-wrap gap-x-4 wide:contents">
        {figures.map(([of, says]) => (
          <Figure key={of} name={of} says={says} />
        ))}
      </div>
      <p className="type-label text-ink2">{holds}</p>
      <div className="flex flex-wrap items-center justify-between gap-x-3 wide:contents">
        <div className="has-[details[open]]:col-span-full max-wide:has-[details[open]]:basis-full">{origin}</div>
        <div className="flex flex-wrap justify-end gap-2">{children}</div>
      </div>
    </li>
  );
}

const percent = (share: Range, unit: string) => (share.hi === 0 ? null : `${ends(times(share, 100), 1).replaceAll('.0', '')} ${unit}`);
const nitrogen = ({ yan_mg_per_g: range }: Ingredient) => (range.hi === 0 ? null : `${ends(range, range.hi < 1 ? 2 : range.hi < 3 ? 1 : 0)} mg/g`);

/** What else is to be known of it, in words. */
function holdsOf(item: Ingredient): string {
  return [
    item.releases_over_days && `gives it up in ${ends(item.releases_over_days, 0)} days`,
    item.mash && `mashed, ${ends(times(item.mash.efficiency, 100), 0)} % of it`,
    item.each && `a ${item.each.name} is ${ends(item.each.grams, item.each.grams.hi < 1 ? 2 : item.each.grams.hi < 10 ? 1 : 0).replaceAll('.0', '')} g`,
    item.preservative && (item.preservative === 'unknown' ? 'a preservative' : item.preservative),
    item.allergens.length > 0 && `holds ${item.allergens.join(', ')}`,
  ]
    .filter(Boolean)
    .join('; ');
}

export function IngredientRow({ item, children }: { item: Ingredient; children: ReactNode }) {
  const origin = how('usual figures; a label or a measurement goes before them', item, [
    ['usual dose', item.usual_g_per_l && ends(item.usual_g_per_l, 2), 'g/L'],
    ['density', item.density_g_per_ml && ends(item.density_g_per_ml, 2), 'g/ml'],
    ['of it insoluble', Number((100 * item.insoluble_share).toFixed(1)), '%'],
  ]);
  return (
    <Row
      name={item.name}
      own={item.id !== null}
      figures={[
        ['sugar', percent(item.extract_share, item.kind === 'juice' ? '°Bx' : '%')],
        ['ferments', item.extract_share.hi === 0 ? null : percent(item.fermentable_share, '%')],
        ['nitrogen', nitrogen(item)],
      ]}
      holds={holdsOf(item)}
      origin={<How how={origin} of={item.name} />}
    >
      {children}
    </Row>
  );
}

export function YeastRow({ item, children }: { item: Yeast; children: ReactNode }) {
  const origin = how('what strains of this kind usually do; the packet goes before it', { ...practice('the sheets of dry yeasts'), status: item.status }, [['attenuation in wort', item.attenuation && ends(times(item.attenuation, 100), 0), '%']]);
  return (
    <Row
      name={item.name}
      own={item.id !== null}
      figures={[
        ['bears', `${ends(item.tolerance_abv, 0)} % vol`],
        ['works at', `${temperatureNumber(item.temperature_c.min, 0)} to ${temperatureText(item.temperature_c.max, 0)}`],
        ['need of nitrogen', item.nitrogen_need],
      ]}
      holds={[item.attenuation && `takes ${ends(times(item.attenuation, 100), 0)} % of a wort`, item.diastatic && 'diastatic: it eats on in the bottle'].filter(Boolean).join('; ')}
      origin={<How how={origin} of={item.name} />}
    >
      {children}
    </Row>
  );
}

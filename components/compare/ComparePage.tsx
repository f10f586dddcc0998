'use client';

import Link from 'next/link';
import { useRouter, useSearchParams } from 'next/navigation';
import { useMemo, useState } from 'react';
import { drinkHex } from '@/components/charts/palette';
import type { Span } from '@/components/charts/picture';
import { useSettled } from '@/components/ui/use-settled';
import { dayName } from '@/components/charts/zone';
import { Box } from '@/components/ui/Box';
import { Choice } from '@/components/ui/Choice';
import { Field } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState } from '@/components/ui/Notice';
import { PageHead } from '@/components/ui/Page';
import { useBatches } from '@/lib/client/batches';
import { useCompare } from '@/lib/client/lots';
import { useMe } from '@/lib/client/me';
import type { BatchBody } from '@/lib/contracts/batches';
import { CompareChart } from './CompareChart';
import { closer, curveOf, tableDays, valueAt, written, type Curve, type Measure } from './curves';
import { Results } from './Results';
import { wholeOf } from './scales';

const MOST = 8;
/** Enough of a curve to look at it closely. */
const POINTS = 800;
const HOUR_S = 3600;
/** Seen closer than this share of the whole, the readings of the span are asked for. */
const CLOSE = 0.5;
const MEASURES: readonly { value: Measure; name: string }[] = [
  { value: 'gravity', name: 'gravity' },
  { value: 'share', name: 'share of the fall' },
  { value: 'temperature', name: 'temperature' },
];

/** Any batches over each other, aligned at their pitch, and what became of them. */
export function ComparePage() {
  const { me } = useMe();
  const router = useRouter();
  const asked = useSearchParams().get('batches');
  const { batches, error, retry } = useBatches({ limit: 200 });
  const known = new Set((batches ?? []).map((batch) => batch.id));
  const chosen = (asked ?? '').split(',').filter((id) => known.has(id)).slice(0, MOST);
  const choose = (ids: readonly string[]) => router.replace(ids.length > 0 ? `/compare?batches=${ids.join(',')}` : '/compare', { scroll: false });
  return (
    <>
      <PageHead title="Compare" meta={chosen.length < 2 ? 'Choose two batches or more.' : `${chosen.length} batches, day 0 the pitch of each`} />
      {error && !batches ? (
        <ErrorState title="The batches did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      ) : !batches || !me ? (
        <Haze height={420} className="m-(--margin)" label="Loading the batches" />
      ) : batches.length === 0 ? (
        <EmptyState title="No batch to compare">Start one; it can be laid over others from its first reading on.</EmptyState>
      ) : (
        <div className="wide:grid wide:grid-cols-[minmax(0,1fr)_340px]">
          <div className="min-w-0">{chosen.length === 0 ? <p className="type-body px-(--margin) py-8 text-ink2">Tick batches of the list: their curves begin together, and their results stand side by side.</p> : <Over ids={chosen} />}</div>
          <Picker batches={batches} chosen={chosen} timeZone={me.cellar.time_zone} onChoose={choose} />
        </div>
      )}
    </>
  );
}

function Picker({ batches, chosen, timeZone, onChoose }: { batches: readonly BatchBody[]; chosen: readonly string[]; timeZone: string; onChoose: (ids: readonly string[]) => void }) {
  const [words, setWords] = useState('');
  const shown = batches.filter((batch) => chosen.includes(batch.id) || batch.name.toLowerCase().includes(words.trim().toLowerCase()));
  return (
    <aside aria-label="Batches" className="bg-desk px-(--margin) py-4 max-wide:border-t-[1.5px] max-wide:border-ink wide:min-h-[calc(100dvh-var(--header)-62px)] wide:border-l">
      <Field label="Find by name" type="search" maxLength={80} value={words} onChange={(event) => setWords(event.target.value)} />
      {chosen.length >= MOST && <p className="type-reason pt-2 text-ink2">At most {MOST} lie over each other well.</p>}
      <ul className="mt-2">
        {shown.map((batch) => {
          const ticked = chosen.includes(batch.id);
          return (
            <li key={batch.id} className="border-b border-rule py-1.5">
              <Box ticked={ticked} disabled={!ticked && chosen.length >= MOST} onTick={(on) => onChoose(on ? [...chosen, batch.id] : chosen.filter((id) => id !== batch.id))}>
                <span className="min-w-0">
                  <span className="type-name-low block break-words">{batch.name}</span>
                  <span className="type-label text-ink2">
                    {batch.pitched_at ? `pitched ${dayName(Date.parse(batch.pitched_at) / 1000, timeZone)}` : 'not pitched'}
                    {batch.state === 'ended' && ', ended'}
                  </span>
                </span>
              </Box>
            </li>
          );
        })}
      </ul>
    </aside>
  );
}

function Over({ ids }: { ids: readonly string[] }) {
  const { compared, error, retry } = useCompare(ids, POINTS);
  const [span, setSpan] = useState<Span | null>(null);
  const [measure, setMeasure] = useState<Measure>('gravity');
  const settled = useSettled(span);
  const whole = useMemo(() => wholeOf((compared ?? []).map((item) => curveOf(item, measure, ''))), [compared, measure]);
  // What is looked at closely has all its points.
  const close = settled && settled.to - settled.from < CLOSE * (whole.to - whole.from) ? { from: Math.max(0, Math.floor(settled.from / HOUR_S) - 1), to: Math.ceil(settled.to / HOUR_S) + 1 } : null;
  const { compared: near } = useCompare(close ? ids : [], POINTS, close ?? undefined);
  const items = useMemo(() => (compared ?? []).map((item) => closer(item, near?.find(({ batch }) => batch.id === item.batch.id))), [compared, near]);
  const curves = useMemo(() => items.map((item) => curveOf(item, measure, drinkHex(item.batch.drink_colour))), [items, measure]);
  if (error && !compared) {
    return (
      <ErrorState title="The curves did not load" onRetry={retry}>
        {error.message}
      </ErrorState>
    );
  }
  if (!compared) return <Haze height={420} className="m-(--margin)" label="Loading the curves" />;
  const unpitched = compared.filter((item) => item.zero_at === null);
  return (
    <>
      <div className="px-(--margin) py-3">
        <Choice label="Drawn" bare value={measure} onChoose={setMeasure} options={MEASURES} className="max-w-[520px]" />
      </div>
      <CompareChart curves={curves} measure={measure} whole={whole} span={span} onSpan={setSpan} />
      {unpitched.map((item) => (
        <p key={item.batch.id} className="type-reason px-(--margin) pb-2 text-ink2">
          <Link href={`/batches/${item.batch.id}`}>{item.batch.name}</Link> has not been pitched: there is nothing to align.
        </p>
      ))}
      <Results items={compared} />
      <Table curves={curves} measure={measure} />
    </>
  );
}

/** The curves as numbers, for those who do not see them. */
function Table({ curves, measure }: { curves: readonly Curve[]; measure: Measure }) {
  return (
    <details className="border-t px-(--margin) py-2">
      <summary className="type-label flex min-h-11 cursor-pointer items-center text-ink2 underline decoration-rule2 underline-offset-4 strip:min-h-8">The same numbers as a table</summary>
      <div className="relative overflow-x-auto" tabIndex={0} role="group" aria-label="The curves as a table">
        <table className="type-label border-collapse">
          <thead>
            <tr className="border-b text-left">
              <th scope="col" className="py-1 pr-4 font-medium">day</th>
              {curves.map((curve) => (
                <th key={curve.id} scope="col" className="py-1 pr-6 font-medium">
                  {curve.name}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {tableDays(curves).map((day) => (
              <tr key={day} className="border-b border-rule">
                <th scope="row" className="py-1 pr-4 text-left font-medium">{day}</th>
                {curves.map((curve) => {
                  const value = valueAt(curve.points, day);
                  return (
                    <td key={curve.id} className="py-1 pr-6 font-semibold">
                      {value === null ? '' : written(value, measure)}
                    </td>
                  );
                })}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </details>
  );
}

import { dayName } from '@/components/charts/zone';
import { camelKeys } from '@/lib/contracts/case';
import type { MustBody } from '@/lib/contracts/musts';
import { pitchChecklist } from '@/lib/core/must/pitch';
import { amountText } from './amount';
import { DRINK_WORDS, ends, SWEET_WORDS, unitWord } from './words';

const PLACES = ['measured gravity', 'sample °C', 'must °C', 'pitched at', 'vessel and tag', 'by'];

/** The kept version on one page, for the table: only printed, never on the screen. */
export function WorkSheet({ must, timeZone }: { must: MustBody; timeZone: string }) {
  const { sheet, result } = must;
  const outcome = result.ok ? result.outcome : null;
  const check = pitchChecklist({ yeast: sheet.yeast && camelKeys(sheet.yeast), dryYeastG: null, mustC: null, glass: true, sulphitedHoursAgo: null });
  const at = must.versions.find((item) => item.version === must.version)?.at ?? must.created_at;
  const facts = outcome
    ? [
        ['original gravity', `${outcome.original_gravity.value.value.toFixed(3)} (${ends(outcome.original_gravity.value, 3)})`],
        ['volume', `${outcome.volume_l.value.value.toFixed(1)} L`],
        ['strength, Balling', `${outcome.strength.balling.value.value.toFixed(1)} % (${ends(outcome.strength.balling.value, 1)})`],
        ['ends', `${outcome.final_gravity.value.value.toFixed(3)}, ${SWEET_WORDS[outcome.sweetness.from]}${outcome.sweetness.to === outcome.sweetness.from ? '' : ` to ${SWEET_WORDS[outcome.sweetness.to]}`}`],
        ['yeast', sheet.yeast ? `${sheet.yeast.name}, ${sheet.yeast.temperature_c.min} to ${sheet.yeast.temperature_c.max} °C` : 'not chosen'],
        ['neck', outcome.neck?.sentence ?? 'no vessel chosen'],
      ]
    : [];
  return (
    <section className="work-sheet hidden px-2 print:block" aria-hidden>
      <div className="flex items-baseline justify-between border-b-[1.5px] border-ink pb-1">
        <p className="type-title">{sheet.name}</p>
        <p className="type-label">
          {DRINK_WORDS[sheet.kind]}, version {must.version}, {dayName(Date.parse(at) / 1000, timeZone)}
        </p>
      </div>
      <dl className="mt-2 grid grid-cols-2 gap-x-6">
        {facts.map(([name, says]) => (
          <div key={name} className="grid grid-cols-[9rem_1fr] border-b py-0.5">
            <dt className="type-label">{name}</dt>
            <dd className="font-mono text-[0.75rem] font-semibold">{says}</dd>
          </div>
        ))}
      </dl>
      <table className="mt-3 w-full border-collapse">
        <thead>
          <tr className="type-label border-b-[1.5px] border-ink text-left">
            <th className="w-8 font-medium">in</th>
            <th className="font-medium">what</th>
            <th className="font-medium">amount</th>
            <th className="font-medium">weighed</th>
            <th className="font-medium">note</th>
          </tr>
        </thead>
        <tbody>
          {sheet.lines.map((line) => (
            <tr key={line.id} className="border-b align-baseline">
              <td className="py-1">☐</td>
              <td className="type-body">{line.ingredient.name}</td>
              <td className="font-mono text-[0.8125rem] font-semibold">
                {amountText(line.amount.quantity)} {unitWord(line.amount.unit, line.ingredient)}
              </td>
              <td className="w-24" />
              <td className="type-reason">{line.note}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {sheet.method && <p className="type-reason mt-2 whitespace-pre-line">{sheet.method}</p>}
      <ol className="mt-3">
        {check.steps.map((step) => (
          <li key={step.key} className="type-reason">
            ☐ {step.sentence} {step.caution}
          </li>
        ))}
      </ol>
      <dl className="mt-4 grid grid-cols-3 gap-x-5 gap-y-4">
        {PLACES.map((name) => (
          <div key={name}>
            <dt className="type-label">{name}</dt>
            <dd className="h-6 border-b" />
          </div>
        ))}
      </dl>
      {outcome && outcome.notes.length > 0 && (
        <ul className="mt-3">
          {outcome.notes.slice(0, 8).map((note) => (
            <li key={note.sentence} className="type-tick">
              {note.sentence}
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}

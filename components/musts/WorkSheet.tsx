import { dayName } from '@/components/charts/zone';
import { camelKeys } from '@/lib/contracts/case';
import type { MustBody } from '@/lib/contracts/musts';
import { pitchChecklist, sulphited } from '@/lib/core/must/pitch';
import { Sentence } from '@/components/ui/Sentence';
import { gravityEnds, gravityName, gravityText, temperatureName, temperatureNumber, temperatureText, volumeText } from '@/components/ui/units';
import { amountText } from './amount';
import { DRINK_WORDS, ends, SWEET_WORDS, unitWord } from './words';

/** Places to write in, in the units that the person reads. */
const places = () => [`measured gravity${gravityName()}`, `sample ${temperatureName()}`, `must ${temperatureName()}`, 'pitched at', 'vessel and tag', 'by'];

/** Above this many lines they stand in two columns, so that all of it stays on one page. */
const ONE_COLUMN = 14;
/** Most of the notes that are printed; what may stop the batch comes first. */
const NOTES = { few: 10, many: 6 } as const;
const GRAVE: readonly string[] = ['preservative', 'tolerance', 'diastatic', 'volume', 'allergen'];

/** What goes in, each with a box to tick and a place for what was weighed. */
function Lines({ lines }: { lines: MustBody['sheet']['lines'] }) {
  const two = lines.length > ONE_COLUMN;
  return (
    <>
      <div className={`mt-2 border-b-[1.5px] border-ink ${two ? 'grid grid-cols-2 gap-x-6' : ''}`}>
        {(two ? ['left', 'right'] : ['left']).map((side) => (
          <p key={side} className="type-tick grid grid-cols-[1.125rem_minmax(0,1fr)_auto_3.5rem] gap-x-2">
            <span />
            <span>what</span>
            <span>amount</span>
            <span>weighed</span>
          </p>
        ))}
      </div>
      <ul className={two ? 'columns-2 gap-x-6' : ''}>
        {lines.map((line) => (
          <li key={line.id} className={`grid break-inside-avoid grid-cols-[1.125rem_minmax(0,1fr)_auto_3.5rem] items-baseline gap-x-2 border-b ${two ? 'py-px' : 'py-1'}`}>
            <span>☐</span>
            <span className={two ? 'text-[0.75rem]/[1rem]' : 'type-body'}>
              {line.ingredient.name}
              {line.note && <span className={`block ${two ? 'text-[0.625rem]/[0.75rem]' : 'text-[0.75rem]/[1rem]'}`}>{line.note}</span>}
            </span>
            <span className={`whitespace-nowrap font-mono font-semibold ${two ? 'text-[0.6875rem]' : 'text-[0.8125rem]'}`}>
              {amountText(line.amount.quantity)} {unitWord(line.amount.unit, line.ingredient)}
            </span>
            <span className="self-end border-b border-dotted" />
          </li>
        ))}
      </ul>
    </>
  );
}

/** The kept version on one page, for the table: only printed, never on the screen. */
export function WorkSheet({ must, timeZone }: { must: MustBody; timeZone: string }) {
  const { sheet, result } = must;
  const outcome = result.ok ? result.outcome : null;
  const check = pitchChecklist({ yeast: sheet.yeast && camelKeys(sheet.yeast), dryYeastG: null, mustC: null, glass: true, sulphited: sulphited(sheet.lines) });
  const at = must.versions.find((item) => item.version === must.version)?.at ?? must.created_at;
  const dense = sheet.lines.length > ONE_COLUMN;
  const weight = (kind: string) => (GRAVE.includes(kind) ? GRAVE.indexOf(kind) : GRAVE.length);
  const notes = [...(outcome?.notes ?? [])].sort((a, b) => weight(a.kind) - weight(b.kind)).slice(0, dense ? NOTES.many : NOTES.few).map((note) => note.sentence);
  const facts = outcome
    ? [
        ['original gravity', `${gravityText(outcome.original_gravity.value.value)} (${gravityEnds(outcome.original_gravity.value)})`],
        ['volume', volumeText(outcome.volume_l.value.value, 1)],
        ['strength, Balling', `${outcome.strength.balling.value.value.toFixed(1)} % (${ends(outcome.strength.balling.value, 1)})`],
        ['ends', `${gravityText(outcome.final_gravity.value.value)}, ${SWEET_WORDS[outcome.sweetness.from]}${outcome.sweetness.to === outcome.sweetness.from ? '' : ` to ${SWEET_WORDS[outcome.sweetness.to]}`}`],
        ['yeast', sheet.yeast ? `${sheet.yeast.name}, ${temperatureNumber(sheet.yeast.temperature_c.min, 0)} to ${temperatureText(sheet.yeast.temperature_c.max, 0)}` : 'not chosen'],
        ['neck', outcome.neck?.sentence ?? 'no vessel chosen'],
      ]
    : [];
  return (
    <section className="work-sheet hidden px-2 print:block" aria-hidden>
      <div className="border-b-[1.5px] border-ink pb-1">
        <p className={sheet.name.length > 36 ? 'type-sub' : 'type-head'}>{sheet.name}</p>
        <p className="type-tick">
          {DRINK_WORDS[sheet.kind]}, version {must.version}, {dayName(Date.parse(at) / 1000, timeZone)}
        </p>
      </div>
      <dl className="mt-2 grid grid-cols-2 gap-x-6">
        {facts.map(([name, says]) => (
          <div key={name} className="grid grid-cols-[7.5rem_1fr] border-b py-px">
            <dt className="type-label">{name}</dt>
            <dd className="font-mono text-[0.6875rem]/[1.125rem] font-semibold">{name === 'neck' ? <Sentence>{says ?? ''}</Sentence> : says}</dd>
          </div>
        ))}
      </dl>
      <Lines lines={sheet.lines} />
      {sheet.method && <p className={`mt-2 whitespace-pre-line ${dense ? 'text-[0.75rem]/[1rem]' : 'text-[0.8125rem]/[1.125rem]'}`}>{sheet.method}</p>}
      <ol className="mt-2 columns-2 gap-x-6">
        {check.steps.map((step) => (
          <li key={step.key} className="grid break-inside-avoid grid-cols-[1rem_1fr] pb-0.5 text-[0.6875rem]/[0.875rem]">
            <span>☐</span>
            <span>
              <Sentence>{`${step.sentence} ${step.caution ?? ''}`}</Sentence>
            </span>
          </li>
        ))}
      </ol>
      <dl className="mt-2 grid grid-cols-3 gap-x-5 gap-y-1.5">
        {places().map((name) => (
          <div key={name} className="flex items-end gap-2">
            <dt className="type-tick shrink-0">{name}</dt>
            <dd className="h-6 flex-1 border-b" />
          </div>
        ))}
      </dl>
      {outcome && notes.length > 0 && (
        <ul className="mt-2 columns-2 gap-x-6">
          {notes.map((note) => (
            <li key={note} className="break-inside-avoid text-[0.6875rem]/[0.875rem]">
              <Sentence>{note}</Sentence>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}

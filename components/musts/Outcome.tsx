import type { ReactNode } from 'react';
import { How } from '@/components/ui/How';
import { useMoney } from '@/components/ui/money';
import { Sentence } from '@/components/ui/Sentence';
import { Spread } from '@/components/ui/Spread';
import { State } from '@/components/ui/StateMark';
import { Vessel } from '@/components/vessel/Vessel';
import type { How as HowAnswer } from '@/lib/core/how/how';
import type { MustOutcome, MustResult } from '@/lib/core/must/sheet';
import type { DrinkKind } from '@/lib/core/types';
import { USUAL } from '@/components/batch/kinds';
import { gravityEnds, gravityText, volumeEnds, volumeText } from '@/components/ui/units';
import { ends, SWEET_WORDS } from './words';

function Row({ name, says, between, how, children }: { name: string; says: string; between?: string | undefined; how: HowAnswer; children?: ReactNode }) {
  return (
    <div className="grid grid-cols-[minmax(0,8.5rem)_minmax(0,1fr)_auto] items-baseline gap-x-3 border-b border-rule py-1">
      <dt className="type-label text-ink2">{name}</dt>
      <dd className="min-w-0">
        <span className="font-mono text-[0.9375rem] font-semibold">{says}</span>
        {between && <span className="type-label text-ink2"> {between}</span>}
        {children}
      </dd>
      <dd className="justify-self-end has-[details[open]]:col-span-full has-[details[open]]:w-full">
        <How how={how} of={name} />
      </dd>
    </div>
  );
}

const spread = (range: { lo: number; hi: number; value: number }, digits: number) => (range.lo.toFixed(digits) === range.hi.toFixed(digits) ? undefined : ends(range, digits));

function Strengths({ outcome }: { outcome: MustOutcome }) {
  const { strength } = outcome;
  const rows = [
    { name: 'by Balling', figure: strength.balling, says: `${strength.balling.value.value.toFixed(1)} %`, between: spread(strength.balling.value, 1) },
    { name: 'by 131.25', figure: strength.simple, says: `${strength.simple.value.value.toFixed(1)} %`, between: spread(strength.simple.value, 1) },
    {
      name: 'by excise factors',
      figure: strength.excise,
      says: strength.excise.value ? `${strength.excise.value.truncated.toFixed(1)} %` : 'none published',
      between: strength.excise.value ? spread(strength.excise.value, 1) : undefined,
    },
  ];
  return (
    <section aria-labelledby="strength" className="mt-4">
      <h3 id="strength" className="type-verdict border-b pb-1">
        Strength, three ways
      </h3>
      <dl>
        {rows.map((row) => (
          <Row key={row.name} name={row.name} says={row.says} between={row.between} how={row.figure.how} />
        ))}
      </dl>
      <details className="mt-1">
        <summary className="type-label min-h-8 cursor-pointer py-1.5 text-ink2 max-strip:min-h-11">They part by {strength.difference.toFixed(1)} % vol: why</summary>
        <p className="type-reason pb-2 text-ink2">
          <Sentence>{strength.why}</Sentence>
        </p>
      </details>
    </section>
  );
}

/** Pieces give their sugar, and fruit its juice, over days: the must may rise or fall until then. */
const pitchWords = (pitch: number, whole: number): string => (pitch < whole ? `${gravityText(pitch)} at the pitch, the rest of the sugar comes over days` : `${gravityText(pitch)} at the pitch, before the fruit has let go of its juice`);

/** What may spoil the batch or hold it up is said first; what is only good to know stands below the figures. */
const LOUD: ReadonlySet<MustOutcome['notes'][number]['kind']> = new Set(['preservative', 'tolerance', 'diastatic', 'dose']);
const sentence = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

function LoudNotes({ outcome }: { outcome: MustOutcome }) {
  const notes = [...outcome.notes.filter((note) => LOUD.has(note.kind)).map((note) => note.sentence), ...outcome.nitrogen.notes];
  if (notes.length === 0) return null;
  return (
    <section aria-label="To check" className="mt-3 border-l-[3px] border-ochre pl-3">
      <State state="Check" word={notes.length === 1 ? 'Check' : `Check ${notes.length} things`} />
      <ul>
        {notes.map((text) => (
          <li key={text} className="type-reason border-b border-rule py-1 last:border-b-0">
            <Sentence>{sentence(text)}</Sentence>
          </li>
        ))}
      </ul>
    </section>
  );
}

function QuietNotes({ outcome }: { outcome: MustOutcome }) {
  // That it does not fit is said at the vessel.
  const notes = outcome.notes.filter((note) => !LOUD.has(note.kind) && note.kind !== 'volume');
  if (notes.length === 0) return null;
  return (
    <section aria-labelledby="notes" className="mt-4">
      <h3 id="notes" className="type-verdict border-b pb-1">
        To mind
      </h3>
      <ul>
        {notes.map((note) => (
          <li key={note.sentence} className="type-reason border-b border-rule py-1.5">
            <Sentence>{sentence(note.sentence)}</Sentence>
          </li>
        ))}
      </ul>
    </section>
  );
}

/** What the must promises: the decision first, its figures below, each with its how. */
export function Outcome({ result, kind, vesselL, missing }: { result: MustResult; kind: DrinkKind; vesselL: number | null; /** Lines not filled in yet. */ missing: number }) {
  const { money } = useMoney();
  if (!result.ok) {
    return (
      <div className="px-(--margin) py-4">
        <State state="Leave be" word="Not reckoned yet" />
        {result.problems.map((problem) => (
          <p key={problem.sentence} className="type-verdict mt-1">
            <Sentence>{problem.sentence}</Sentence>
          </p>
        ))}
        {missing > 0 && <p className="type-reason mt-1 text-ink2">{missing === 1 ? 'One line has no amount yet.' : `${missing} lines have no amount yet.`}</p>}
      </div>
    );
  }
  const { outcome } = result;
  const { neck } = outcome;
  const og = outcome.originalGravity.value;
  const level = vesselL === null ? null : Math.min(1, outcome.fillL.value.value / vesselL);
  const pitchDiffers = Math.abs(outcome.gravityAtPitch.value.value - og.value) >= 0.0005;
  return (
    <div className="px-(--margin) pb-4 pt-5">
      <div className="flex items-end gap-4">
        <Vessel
          height={118}
          vessel={{ kind: vesselL !== null && vesselL > 8 ? 'carboy' : 'demijohn', neck: neck?.startOn ?? 'open', level, drink: USUAL[kind].colour, clearness: 'hazy', krausen: neck?.foam === 'high' && neck.fits, lees: 'none', tag: null, silent: false }}
        />
        <div className="min-w-0 pb-1">
          {neck ? <State state={neck.fits ? (neck.foam === 'high' ? 'Check' : 'Ready') : 'Stop'} word={neck.fits ? (neck.foam === 'high' ? 'Foam' : 'It fits') : 'Too much'} /> : <State state="Leave be" word="No vessel chosen" />}
          <p className="type-verdict mt-1" aria-live="polite">
            <Sentence strong>{neck?.sentence ?? 'Choose the vessel: its headspace and foam follow.'}</Sentence>
          </p>
          {neck && <How how={neck.how} of="foam and gas" />}
        </div>
      </div>
      <LoudNotes outcome={outcome} />
      {missing > 0 && <p className="type-reason mt-2 border-l-[3px] border-ochre pl-3">{missing === 1 ? 'One line without an amount is left out.' : `${missing} lines without an amount are left out.`}</p>}
      <div className="mt-4">
        <div className="flex items-baseline justify-between gap-3">
          <h3 className="type-verdict">Original gravity</h3>
          <span className="type-fig-lg">{gravityText(og.value)}</span>
        </div>
        <Spread name="Original gravity" {...og} from={1} to={og.hi > 1.13 ? 1.2 : 1.14} write={gravityText} />
        <p className="type-label mt-0.5 text-ink2">
          {[
            gravityText(og.lo) !== gravityText(og.hi) && gravityEnds(og),
            pitchDiffers && pitchWords(outcome.gravityAtPitch.value.value, og.value),
          ]
            .filter(Boolean)
            .join('; ')}
        </p>
        <How how={outcome.originalGravity.how} of="original gravity" />
      </div>
      <dl className="border-t">
        <Row name="volume" says={volumeText(outcome.volumeL.value.value, 1)} between={volumeEnds(outcome.volumeL.value)} how={outcome.volumeL.how} />
        <Row name="fills" says={volumeText(outcome.fillL.value.value, 1)} between="with its pulp" how={outcome.fillL.how} />
        {neck && <Row name="headspace" says={volumeText(neck.headspaceL.value.value, 1)} between={volumeEnds(neck.headspaceL.value)} how={neck.headspaceL.how} />}
        <Row name="fermentable" says={`${Math.round(100 * outcome.fermentableShare.value.value)} %`} between={`${Math.round(100 * outcome.fermentableShare.value.lo)} to ${Math.round(100 * outcome.fermentableShare.value.hi)}`} how={outcome.fermentableShare.how} />
        <Row name="ends at" says={gravityText(outcome.finalGravity.value.value)} between={gravityEnds(outcome.finalGravity.value)} how={outcome.finalGravity.how} />
        <Row
          name="sweetness"
          says={outcome.sweetness.from === outcome.sweetness.to ? SWEET_WORDS[outcome.sweetness.from] : `${SWEET_WORDS[outcome.sweetness.from]} to ${SWEET_WORDS[outcome.sweetness.to]}`}
          between={`${ends({ ...outcome.sugarLeftGPerL.value, lo: Math.max(0, outcome.sugarLeftGPerL.value.lo) }, 0)} g/L left`}
          how={outcome.sweetness.how}
        />
      </dl>
      <Strengths outcome={outcome} />
      <dl className="mt-4 border-t">
        <Row name="nitrogen needed" says={`${Math.round(outcome.nitrogen.neededMgL.value.value)} mg/L`} between={spread(outcome.nitrogen.neededMgL.value, 0)} how={outcome.nitrogen.neededMgL.how} />
        <Row name="nitrogen given" says={`${Math.round(outcome.nitrogen.givenMgL.value.value)} mg/L`} between={spread(outcome.nitrogen.givenMgL.value, 0)} how={outcome.nitrogen.givenMgL.how} />
        <Row name="sulphite" says={`${Math.ceil(outcome.sulphiteMgPerL.value.hi)} mg/L`} between="at most, without the yeast’s own" how={outcome.sulphiteMgPerL.how} />
        {outcome.cost.value.hi > 0 && <Row name="cost" says={money(outcome.cost.value.value)} between={[spread(outcome.cost.value, 2), outcome.cost.known ? null : 'some lines have no cost'].filter(Boolean).join('; ')} how={outcome.cost.how} />}
      </dl>
      <QuietNotes outcome={outcome} />
    </div>
  );
}

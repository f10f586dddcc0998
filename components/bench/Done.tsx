import { dayName, clock } from '@/components/charts/zone';
import { How } from '@/components/ui/How';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { gravityText } from '@/components/ui/units';
import type { BenchFacts } from '@/lib/contracts/bench';
import { DONE_WORDS, EXPLAINED } from './words';

const SHOWN = 4;

/** Is it done? The readings, what they say, and what would settle it. */
export function Done({ facts, timeZone }: { facts: BenchFacts; timeZone: string }) {
  const { done, readings, drink } = facts;
  const says = DONE_WORDS[done.verdict];
  const at = (time: string) => `${dayName(Date.parse(time) / 1000, timeZone)} ${clock(Date.parse(time) / 1000, timeZone)}`;
  const strength = drink.strength?.balling;
  return (
    <section aria-label="Is it done" className="border-t py-3">
      <div className="flex items-center justify-between gap-3">
        <State state={says.state} word={says.word} />
        <How of="Is it done" how={done.how} />
      </div>
      <h2 className="type-verdict-now pt-1">
        {says.sentence}
        {done.explanation && ` ${EXPLAINED[done.explanation][0]!.toUpperCase()}${EXPLAINED[done.explanation].slice(1)}.`}
      </h2>
      <ul className="type-reason text-ink2">
        {done.reasons.map((reason) => (
          <li key={reason}>
            <Sentence>{reason}</Sentence>
          </li>
        ))}
        <li>
          <Sentence>{`Changes it: ${done.changes_it[0]!.toLowerCase()}${done.changes_it.slice(1)}`}</Sentence>
        </li>
        {done.read_again_at && readings.length > 0 && <li>Read it again from <span className="fig">{at(done.read_again_at)}</span>.</li>}
      </ul>
      {readings.length > 0 && (
        <ul className="type-label mt-2 border-t border-rule" aria-label="Readings by hand">
          {readings.slice(-SHOWN).toReversed().map((reading) => (
            <li key={reading.at} className="flex justify-between border-b border-rule py-0.5">
              <span className="text-ink2">{at(reading.at)}</span>
              <span>{gravityText(reading.gravity)}</span>
            </li>
          ))}
        </ul>
      )}
      {strength && (
        <div className="type-label flex justify-between gap-3 pt-1">
          <span className="text-ink2">strength so far</span>
          <span className="flex flex-col items-end">
            {strength.value.lo.toFixed(1)}–{strength.value.hi.toFixed(1)} % <How of="Strength so far" how={strength.how} />
          </span>
        </div>
      )}
    </section>
  );
}

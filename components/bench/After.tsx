import { dayName } from '@/components/charts/zone';
import { degrees } from '@/components/batch/figures';
import { How } from '@/components/ui/How';
import { Sentence } from '@/components/ui/Sentence';
import { StateMark } from '@/components/ui/StateMark';
import type { StateWord } from '@/lib/core/calls/attention';
import { readyFrom, TEST_AFTER_DAYS } from '@/lib/core/bottling/conditioning';
import type { How as HowAnswer } from '@/lib/core/how/how';

const DAY_MS = 86_400_000;

interface Step {
  state: StateWord;
  when: string;
  title: string;
  sentence: string;
  how?: HowAnswer;
}

/** What comes after a safe filling, with its days; the rounds take it over once it is bottled. */
export function After({ now, cellarC, primed, timeZone }: { now: number; cellarC: number; primed: boolean; timeZone: string }) {
  const ready = readyFrom(now, cellarC, primed);
  const day = (at: number) => dayName(at / 1000, timeZone);
  const steps: Step[] = [
    {
      state: 'Due',
      when: `until ${day(ready.at)}`,
      title: primed ? 'Let the sugar work' : 'Let it rest',
      sentence: primed ? `At ${degrees(cellarC)} ready to open after ${ready.days} days, sooner at 18 to 22 °C. Boxed, upright, a towel over the box.` : `${ready.days} days, then it may be opened.`,
      how: ready.how,
    },
    ...(primed ? [{ state: 'Due' as const, when: day(now + TEST_AFTER_DAYS * DAY_MS), title: 'Open one and judge', sentence: 'Chill it overnight first. Open it outdoors or over a sink, away from faces.' }] : []),
    { state: 'Ready', when: 'any day', title: 'Labels', sentence: 'With the fall of this batch, its strength and what has to be told of it.' },
  ];
  return (
    <section aria-label="After it is filled" className="border-t">
      <p className="type-label px-(--margin) pt-3 text-ink2">After it is filled. It stands on the rounds once it is bottled.</p>
      <ul className="grid strip:grid-cols-2 wide:grid-cols-3">
        {steps.map((step) => (
          <li key={step.title} className="px-(--margin) py-3 strip:border-r strip:border-rule">
            <p className="type-label flex items-center gap-2" style={{ fontWeight: 600 }}>
              <StateMark state={step.state} size={13} />
              {step.when}
            </p>
            <h3 className="type-verdict-now">{step.title}</h3>
            <p className="type-body text-ink2">
              <Sentence>{step.sentence}</Sentence>
            </p>
            {step.how && <How how={step.how} of="Ready to open" />}
          </li>
        ))}
      </ul>
    </section>
  );
}

import { Sentence } from '@/components/ui/Sentence';
import { How } from '@/components/ui/How';
import { StateMark } from '@/components/ui/StateMark';
import { Button } from '@/components/ui/Button';
import type { BenchVerdict, WayOut } from '@/lib/core/bottling/bench';
import { howOfWay } from '@/lib/core/bottling/ways';

/** Safe or stop, in one sentence; everything else that is wrong below it. */
export function Verdict({ verdict }: { verdict: BenchVerdict }) {
  const stop = verdict.verdict === 'stop';
  const more = verdict.verdict === 'stop' ? verdict.problems.slice(1) : [];
  return (
    <section aria-label="Verdict" aria-live="polite" className={`flex h-full gap-5 border-l-[10px] bg-lit px-(--margin) py-4 ${stop ? 'border-l-madder' : 'border-l-green'}`}>
      <StateMark state={stop ? 'Stop' : 'Ready'} size={40} className="mt-1 max-strip:hidden" />
      <div className="min-w-0">
        <p className={`type-label flex items-center gap-2 ${stop ? 'text-madder' : 'text-green'}`} style={{ fontWeight: 600 }}>
          <StateMark state={stop ? 'Stop' : 'Ready'} size={15} className="strip:hidden" />
          {stop ? 'Stop' : 'Ready'}
        </p>
        <h2 className="type-stop max-strip:text-[1.4375rem]! max-strip:leading-[1.6875rem]!">{verdict.headline}</h2>
        <p className="mt-1 max-w-[78ch] text-[1rem] leading-6">
          <Sentence>{verdict.sentence}</Sentence>
        </p>
        {more.length > 0 && (
          <ul className="type-body mt-1 text-ink2">
            {more.map((problem) => (
              <li key={problem.kind + (problem.bottle ?? '')}>
                <Sentence>{problem.sentence}</Sentence>
              </li>
            ))}
          </ul>
        )}
      </div>
    </section>
  );
}

/** Each way out of a stop with its own worst case. */
export function Ways({ ways, onUse }: { ways: readonly WayOut[]; onUse: (way: WayOut) => void }) {
  if (ways.length === 0) return <p className="type-body border-t px-(--margin) py-4 text-ink2">Nothing on the bench makes it safe as it stands. Read it by hand, and wait.</p>;
  return (
    <ul className="grid border-t strip:grid-cols-2 wide:grid-cols-3" aria-label="Ways out">
      {ways.map((way) => (
        <li key={way.kind + way.title} className="flex flex-col items-start gap-1 border-b px-(--margin) py-3 strip:border-r">
          <p className="type-label flex items-center gap-2 text-green" style={{ fontWeight: 600 }}>
            <StateMark state={way.request ? 'Ready' : 'Due'} size={13} />
            worst case {way.worstBar.toFixed(1)} bar{way.rated === 'never' ? ', still' : `, holds ${way.rated.toFixed(1)}`}
          </p>
          <h3 className="type-verdict-now">
            <Sentence strong>{way.title}</Sentence>
          </h3>
          <p className="type-body pb-1 text-ink2">
            <Sentence>{way.sentence}</Sentence>
          </p>
          <How of={way.title} how={howOfWay(way)} />
          {way.request && (
            <Button className="mt-auto" onClick={() => onUse(way)}>
              Use this
            </Button>
          )}
        </li>
      ))}
    </ul>
  );
}

import { State } from '@/components/ui/StateMark';
import { gravityText, volumeText } from '@/components/ui/units';
import type { MustResult } from '@/lib/core/must/sheet';

/** The promise in one line, for a page too narrow to have it beside the lines. */
export function Glance({ result, at }: { result: MustResult; /** Id of the whole of it. */ at: string }) {
  const outcome = result.ok ? result.outcome : null;
  const figures = outcome && [gravityText(outcome.originalGravity.value.value), volumeText(outcome.volumeL.value.value, 1), `${outcome.strength.balling.value.value.toFixed(1)} %`];
  const word = outcome?.neck && (outcome.neck.fits ? (outcome.neck.foam === 'high' ? 'Foam' : null) : 'Too much');
  return (
    <a href={`#${at}`} className="sticky top-0 z-10 flex min-h-11 items-center justify-between gap-3 border-b-[1.5px] border-ink bg-desk px-(--margin) no-underline wide:hidden">
      <span className="flex gap-4 font-mono text-[0.875rem] font-semibold">
        {figures ? figures.map((figure) => <span key={figure}>{figure}</span>) : <span className="type-label text-ink2">not reckoned yet</span>}
      </span>
      {word ? <State state={word === 'Foam' ? 'Check' : 'Stop'} word={word} size={13} /> : <span className="type-label text-ink2">all of it</span>}
    </a>
  );
}

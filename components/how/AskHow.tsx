'use client';

import { useState } from 'react';
import { Sheet } from '@/components/ui/Sheet';
import { HOW_LINK, HowBody } from '@/components/ui/How';
import type { How } from '@/lib/core/how/how';

/** A figure as it is shown, with where it comes from. */
export interface Answer {
  name: string;
  says: string;
  how: How;
}

/** One question for the figures of a row or a strip that has no room for an answer below each: they are answered together, over the page. */
export function AskHow({ of, answers, tight = false, className = '' }: { /** What the figures are of, for those who hear the page. */ of: string; /** Asked for when somebody wants to know. */ answers: () => readonly Answer[]; /** In a line of words that must not grow. */ tight?: boolean; className?: string }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <button type="button" onClick={() => setOpen(true)} className={`${HOW_LINK} text-ink2 decoration-rule2 ${tight ? 'min-h-0! max-strip:after:-inset-y-[15px]!' : ''} ${className}`}>
        how?<span className="heard-only"> {of}</span>
      </button>
      {open && (
        <Sheet title={`How: ${of}`} onClose={() => setOpen(false)}>
          <dl className="flex flex-col gap-3">
            {answers().map((answer) => (
              <div key={answer.name}>
                <dt className="type-label flex flex-wrap justify-between gap-x-4 border-b pb-1">
                  <span>{answer.name}</span>
                  <span className="font-semibold">{answer.says}</span>
                </dt>
                <dd className="pt-1">
                  <HowBody how={answer.how} />
                </dd>
              </div>
            ))}
          </dl>
        </Sheet>
      )}
    </>
  );
}

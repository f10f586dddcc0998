'use client';

import { useId, useState } from 'react';
import type { How as HowAnswer } from '@/lib/core/how/how';
import { HOW_LINK, HowBody } from './How';

export interface Fact {
  name: string;
  says: string;
  /** Where the figure comes from; none for what somebody told as it stands. */
  how?: HowAnswer | null | undefined;
}

/** Figures side by side in one ruled strip. One that is asked "how?" answers below the strip, over its whole width. */
export function Facts({ facts, columns, className = '' }: { facts: readonly Fact[]; /** Classes of the grid for its columns. */ columns: string; className?: string }) {
  const [asked, setAsked] = useState<string | null>(null);
  const panel = useId();
  const how = facts.find((fact) => fact.name === asked)?.how;
  return (
    <div className={`border-b ${className}`}>
      <dl className={`grid ${columns}`}>
        {facts.map((fact) => (
          <div key={fact.name} className={`border-r border-rule px-3 py-2 first:pl-(--margin) ${columns.includes('grid-cols-2') ? 'max-strip:odd:pl-(--margin)' : ''}`}>
            <dt className="type-label text-ink2">{fact.name}</dt>
            <dd>
              <span className="block font-mono text-[0.9375rem] font-semibold leading-5 break-words">{fact.says}</span>
              {fact.how && (
                <button
                  type="button"
                  aria-expanded={asked === fact.name}
                  aria-controls={panel}
                  onClick={() => setAsked(asked === fact.name ? null : fact.name)}
                  className={`${HOW_LINK} ${asked === fact.name ? 'text-ink decoration-ink' : 'text-ink2 decoration-rule2'}`}
                >
                  how?<span className="heard-only"> {fact.name}</span>
                </button>
              )}
            </dd>
          </div>
        ))}
      </dl>
      <div id={panel} aria-live="polite" className="not-printed max-w-[72ch] px-(--margin)">
        {how && (
          <>
            <p className="type-label pb-1 font-semibold">{asked}</p>
            <HowBody how={how} />
          </>
        )}
      </div>
    </div>
  );
}

'use client';

import { useId } from 'react';
import type { How as Origin } from '@/lib/core/how/how';

const figure = (value: number | string | null) => (value === null ? 'not known' : typeof value === 'number' ? String(Number(value.toPrecision(5))).replace(/^-/, '−') : value);

/** "How?" beside a figure: its formula, what went in, where it comes from and how far that may be trusted. */
export function How({ of, how, className = '' }: { of: string; how: Origin; className?: string }) {
  const id = useId();
  return (
    <>
      <button
        type="button"
        popoverTarget={id}
        aria-label={`How: ${of}`}
        className={`type-tick inline-flex items-center whitespace-nowrap text-ink2 underline decoration-dotted underline-offset-4 hover:text-ink max-strip:min-h-11 max-strip:px-1 not-printed ${className}`}
      >
        how?
      </button>
      <div id={id} popover="auto" role="dialog" aria-label={`How: ${of}`} className="m-auto max-h-[80dvh] w-[min(30rem,calc(100vw-2rem))] overflow-auto whitespace-normal border-[1.5px] border-ink bg-lit p-4 text-left text-ink backdrop:bg-ink/35">
        <div className="flex items-baseline justify-between gap-4 border-b pb-2">
          <p className="type-sub">{of}</p>
          <button type="button" popoverTarget={id} popoverTargetAction="hide" className="type-label min-h-8 text-ink underline underline-offset-4">
            Close
          </button>
        </div>
        <p className="type-label break-words border-b border-rule py-2">{how.formula}</p>
        {how.inputs.length > 0 && (
          <dl className="type-label grid grid-cols-[minmax(0,1fr)_auto] gap-x-4 border-b border-rule py-2">
            {how.inputs.map((input) => (
              <div key={input.name} className="contents">
                <dt className="text-ink2">{input.name}</dt>
                <dd className="text-right">
                  {figure(input.value)} {input.value === null ? '' : input.unit}
                </dd>
              </div>
            ))}
          </dl>
        )}
        <p className="type-reason pt-2 text-ink2">
          {how.source} <span className="type-label whitespace-nowrap">({how.status})</span>
        </p>
      </div>
    </>
  );
}

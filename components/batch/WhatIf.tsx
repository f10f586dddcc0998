'use client';

import { useEffect, useRef } from 'react';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Sentence } from '@/components/ui/Sentence';
import { UnitField } from '@/components/units/UnitField';
import { NOTHING_ELSE, isTouched, type Played, type WhatIfDraft } from './what-if';

interface WhatIfProps {
  draft: WhatIfDraft;
  played: Played;
  /** What the fields stand at as it is. */
  present: { gravity: string; temperature: string };
  onChange: (draft: WhatIfDraft) => void;
  onClose: () => void;
}

/** Plays with one thing at a time, beside what is judged. Escape puts everything back. */
export function WhatIf({ draft, played, present, onChange, onClose }: WhatIfProps) {
  const panel = useRef<HTMLElement>(null);
  const touched = isTouched(draft);
  const set = (field: keyof WhatIfDraft) => ({
    value: draft[field],
    error: played.errors[field],
    inputMode: 'decimal' as const,
    autoComplete: 'off',
    onChange: (event: { target: { value: string } }) => onChange({ ...draft, [field]: event.target.value }),
  });

  useEffect(() => {
    panel.current?.querySelector('input')?.focus();
  }, []);

  return (
    <section
      ref={panel}
      aria-label="What if"
      className="border-b border-dashed bg-desk px-(--margin) pb-4 pt-3"
      onKeyDown={(event) => {
        if (event.key !== 'Escape') return;
        event.stopPropagation();
        if (touched) onChange(NOTHING_ELSE);
        else onClose();
      }}
    >
      <div className="flex flex-wrap items-center gap-x-4 gap-y-1">
        <h3 className="type-name">What if</h3>
        <p className="type-label text-ink2">Not real. Nothing is kept.</p>
        <div className="ml-auto flex gap-2">
          {touched && (
            <Button size="lane" onClick={() => onChange(NOTHING_ELSE)}>
              As it is (Esc)
            </Button>
          )}
          <Button size="lane" look="quiet" onClick={onClose}>
            Close
          </Button>
        </div>
      </div>
      <div className="mt-3 grid gap-x-8 gap-y-4 strip:grid-cols-[minmax(0,420px)_minmax(0,1fr)]">
        <div className="grid grid-cols-2 content-start gap-x-3 gap-y-3">
          <UnitField measure="gravity" label="it stopped at" placeholder={present.gravity} {...set('gravity')} />
          <UnitField measure="temperature" label="it stood at" placeholder={present.temperature} {...set('temperature')} />
          <Field className="col-span-2" label="sugar went in now" unit="g" placeholder="0" {...set('sugar')} />
          <UnitField measure="volume" label="or must, juice, syrup" placeholder="0" {...set('volume')} />
          <UnitField measure="gravity" label="of a gravity of" placeholder="1.050" {...set('liquidGravity')} />
        </div>
        <div aria-live="polite" className="min-w-0">
          {played.rows.length === 0 ? (
            <p className="type-reason text-ink2">Fill in what might be otherwise: the curve, the end, the strength, the gas and the neck follow, from this batch’s own curve.</p>
          ) : (
            <table className="w-full max-w-[520px] text-left">
              <thead>
                <tr className="type-label text-ink2 [&>th]:border-b [&>th]:border-rule2 [&>th]:pb-1 [&>th]:font-medium">
                  <th scope="col">
                    <span className="heard-only">figure</span>
                  </th>
                  <th scope="col">as judged</th>
                  <th scope="col">what if</th>
                </tr>
              </thead>
              <tbody>
                {played.rows.map((row) => (
                  <tr key={row.name} className="[&>*]:border-b [&>*]:border-rule [&>*]:py-1 [&>*]:pr-3">
                    <th scope="row" className="type-label font-medium text-ink2">
                      {row.name}
                    </th>
                    <td className="font-mono text-[0.8125rem] text-ink2">{row.judged}</td>
                    <td className={`font-mono text-[0.8125rem] ${row.same ? 'text-ink2' : 'font-semibold'}`}>{row.same ? 'the same' : row.otherwise}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          )}
          {played.cautions.map((caution) => (
            <p key={caution} className="type-reason mt-2 max-w-[60ch] border-l-[3px] border-ochre pl-3">
              <Sentence>{caution}</Sentence>
            </p>
          ))}
        </div>
      </div>
    </section>
  );
}

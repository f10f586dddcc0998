'use client';

import { useState, type ReactNode } from 'react';
import { Button } from '@/components/ui/Button';
import { How } from '@/components/ui/How';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { createEntry } from '@/lib/client/entries';
import { ClientError } from '@/lib/client/fetcher';
import type { EntryDetail } from '@/lib/contracts/batches';
import type { How as HowAnswer } from '@/lib/core/how/how';

export interface Told {
  /** `1.2 g of potassium metabisulphite` */
  says: string;
  grams: number;
  substance: NonNullable<EntryDetail['substance']>;
  name: string;
  /** Key of the catalogue, by which its nitrogen and sulphite are counted. */
  ingredient: string | null;
  how: HowAnswer;
  /** Of the other figures that stand beside it. */
  also?: readonly { of: string; how: HowAnswer }[];
  /** What stands beside it, in sentences. */
  facts: readonly string[];
  cautions: readonly string[];
  /** Nothing to add now; said in place of the button. */
  none: string | null;
}

/** One dose: what it needs to know, what it comes to, its caution, and one tap that logs it. */
export function Dose({ title, batchId, mayLog, told, needs, children }: { title: string; batchId: string; mayLog: boolean; told: Told | null; /** What is still missing. */ needs: string; children: ReactNode }) {
  const [state, setState] = useState<'open' | 'sending' | { done: string }>('open');
  const [failed, setFailed] = useState<string | null>(null);
  /** One a dose, so that a second try after a lost answer keeps one. */
  const [clientId, setClientId] = useState(() => crypto.randomUUID());
  const done = typeof state === 'object' ? state.done : null;

  async function log(dose: Told) {
    setState('sending');
    setFailed(null);
    try {
      await createEntry(batchId, { kind: 'addition', at: new Date().toISOString(), detail: { substance: dose.substance, name: dose.name, ingredient: dose.ingredient, grams: dose.grams }, client_id: clientId });
      setState({ done: dose.says });
      setClientId(crypto.randomUUID());
    } catch (error) {
      setFailed(error instanceof ClientError ? error.message : 'It was not saved. Try again.');
      setState('open');
    }
  }

  return (
    <section className="border-b py-4" aria-label={title}>
      <h3 className="type-sub">{title}</h3>
      <div className="mt-2 grid grid-cols-2 gap-3 strip:grid-cols-4">{children}</div>
      <div aria-live="polite" className="mt-3">
        {!told ? (
          <p className="type-body text-ink2">{needs}</p>
        ) : (
          <>
            <p className="type-verdict-now">
              <Sentence strong>{told.none ?? told.says}</Sentence>
            </p>
            {told.facts.map((fact) => (
              <p key={fact} className="type-body">
                <Sentence>{fact}</Sentence>
              </p>
            ))}
            <div className="flex flex-wrap gap-x-4">
              <How how={told.how} of={title} className="[&[open]]:basis-full" />
              {told.also?.map((other) => (
                <How key={other.of} how={other.how} of={other.of} named className="[&[open]]:basis-full" />
              ))}
            </div>
            {told.cautions.length > 0 && (
              <ul className="border-l-[3px] border-ochre pl-3">
                {told.cautions.map((caution) => (
                  <li key={caution} className="type-reason py-0.5">
                    <Sentence>{caution}</Sentence>
                  </li>
                ))}
              </ul>
            )}
          </>
        )}
      </div>
      {failed && <FormError>{failed}</FormError>}
      {mayLog && told && told.none === null && (
        <div className="mt-3 flex items-center justify-end gap-3">
          {done && <p role="status" className="type-label text-ink2">Logged: {done}</p>}
          {done !== told.says && (
            <Button look="first" disabled={state === 'sending' || !(told.grams > 0)} onClick={() => void log(told)}>
              Added
            </Button>
          )}
        </div>
      )}
    </section>
  );
}

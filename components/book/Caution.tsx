'use client';

import { useState, type FormEvent } from 'react';
import { Button } from '@/components/ui/Button';
import { TextField } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { State } from '@/components/ui/StateMark';
import { ClientError } from '@/lib/client/fetcher';
import { liftCaution } from '@/lib/client/lots';
import type { LotBody } from '@/lib/contracts/lots';

/** The caution on a lot, above all else; a brewer takes it off with a reason. */
export function Caution({ lot, mayLift }: { lot: LotBody; mayLift: boolean }) {
  const [open, setOpen] = useState(false);
  if (!lot.caution) return null;
  return (
    <section aria-label="Caution" className="border-b border-l-[10px] border-l-madder bg-lit px-(--margin) py-3">
      <State state="Stop" word="Caution" />
      <p className="type-verdict-now">
        <Sentence strong>{lot.caution}</Sentence>
      </p>
      {mayLift &&
        (open ? (
          <Lift lot={lot} onDone={() => setOpen(false)} />
        ) : (
          <button type="button" className="type-label min-h-11 text-ink2 underline underline-offset-4 strip:min-h-8" onClick={() => setOpen(true)}>
            Take it off, with a written reason
          </button>
        ))}
    </section>
  );
}

function Lift({ lot, onDone }: { lot: LotBody; onDone: () => void }) {
  const [reason, setReason] = useState('');
  const [wrong, setWrong] = useState<string | undefined>();
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);

  async function send(event: FormEvent) {
    event.preventDefault();
    setWrong(undefined);
    setFailed(null);
    if (reason.trim() === '') return setWrong('write why it is no longer needed');
    setSending(true);
    try {
      await liftCaution(lot.id, reason);
      onDone();
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      setWrong(told?.fields.reason?.[0]);
      if (!told?.fields.reason) setFailed(told?.message ?? 'The caution stands. Try again.');
      setSending(false);
    }
  }

  return (
    <form onSubmit={(event) => void send(event)} noValidate className="mt-2 flex max-w-[640px] flex-col gap-3">
      <TextField label="why it is no longer needed" rows={2} maxLength={1000} value={reason} error={wrong} hint="Your name, the reason and the caution stay in the lot’s history." onChange={(event) => setReason(event.target.value)} />
      {failed && <FormError>{failed}</FormError>}
      <div className="flex flex-wrap justify-end gap-2">
        <Button look="quiet" onClick={onDone}>
          Leave it on
        </Button>
        <Button look="final" type="submit" disabled={sending}>
          Take the caution off
        </Button>
      </div>
    </form>
  );
}

/** Cautions that were taken off, each with who did it and why. */
export function Lifted({ lot, day }: { lot: LotBody; day: (at: string) => string }) {
  if (lot.lifted.length === 0) return null;
  return (
    <div className="border-b px-(--margin) py-3">
      <h3 className="type-name-low">Cautions taken off</h3>
      <ul>
        {lot.lifted.map((lift) => (
          <li key={lift.at} className="py-1">
            <p className="type-reason text-ink2">{lift.caution}</p>
            <blockquote className="type-body border-l-[3px] border-rule2 pl-3 break-words">
              {lift.reason}
              <span className="type-label block text-ink2">
                {lift.by?.name ?? 'somebody who has left'}, {day(lift.at)}
              </span>
            </blockquote>
          </li>
        ))}
      </ul>
    </div>
  );
}

'use client';

import { useState } from 'react';
import { LogIcon, LOG_KIND_WORDS } from '@/components/batch/icons';
import { logTime } from '@/components/batch/log';
import { Button } from '@/components/ui/Button';
import { Sentence } from '@/components/ui/Sentence';
import { sendUnsent } from '@/lib/client/unsent/send';
import { dropUnsent, isUnsentEntry, setUnsent, type UnsentEntry } from '@/lib/client/unsent/store';
import { useUnsent } from '@/lib/client/unsent/use-unsent';
import { unsentRow } from './words';

function Row({ entry, now, timeZone }: { entry: UnsentEntry; now: number; timeZone: string }) {
  const [sure, setSure] = useState(false);
  const { kind, at, text, own, figure } = unsentRow(entry);
  const refused = entry.state === 'refused';
  const again = async () => {
    await setUnsent(entry.order!, 'waiting');
    await sendUnsent();
  };
  return (
    <li className="grid grid-cols-[22px_minmax(0,1fr)_auto] items-baseline gap-x-2 gap-y-1 border-b border-dashed border-ink3 py-[7px] strip:grid-cols-[98px_22px_minmax(0,1fr)_52px]">
      <span className="row-start-1 translate-y-[3px] strip:col-start-2">
        <LogIcon kind={kind} />
        <span className="heard-only">{LOG_KIND_WORDS[kind]}</span>
      </span>
      <span className="type-label row-start-1 text-[0.71875rem] text-ink2 strip:col-start-1">{logTime(at, now, timeZone)}</span>
      <div className="min-w-0 max-strip:col-span-3 max-strip:row-start-2 max-strip:pl-[30px] strip:col-start-3">
        <p className="type-body break-words">
          {text !== '' && <Sentence>{text}</Sentence>} {own !== null && <span className="whitespace-pre-line">{own}</span>}
        </p>
        <p role="status" className={`type-label ${refused ? 'text-madder' : 'text-ink2'}`} style={{ fontWeight: refused ? 600 : 500 }}>
          {refused ? `Not taken: ${entry.reason ?? 'the server said no.'}` : 'Waiting to be sent'}
        </p>
        <span className="mt-1 flex flex-wrap gap-2">
          <Button size="lane" look="quiet" onClick={() => void again()}>
            {refused ? 'Send it again' : 'Send now'}
          </Button>
          {sure ? (
            <>
              <Button size="lane" look="final" onClick={() => void dropUnsent(entry.order!)}>
                Throw it away
              </Button>
              <Button size="lane" look="quiet" onClick={() => setSure(false)}>
                Keep it
              </Button>
            </>
          ) : (
            <Button size="lane" look="quiet" onClick={() => setSure(true)}>
              Discard
            </Button>
          )}
        </span>
      </div>
      <span className="row-start-1 text-right font-mono text-[0.84375rem] font-semibold max-strip:col-start-3 strip:col-start-4">{figure}</span>
    </li>
  );
}

/** At the head of a log: what was written here and has not left this device yet, newest first. */
export function WaitingRows({ batchId, now, timeZone }: { batchId: string; now: number; timeZone: string }) {
  const entries = useUnsent().filter(isUnsentEntry).filter((entry) => entry.batchId === batchId);
  if (entries.length === 0) return null;
  return (
    <ol aria-label="Waiting to be sent">
      {entries.toReversed().map((entry) => (
        <Row key={entry.id} entry={entry} now={now} timeZone={timeZone} />
      ))}
    </ol>
  );
}

'use client';

import { when } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Sentence } from '@/components/ui/Sentence';
import { sendUnsent } from '@/lib/client/unsent/send';
import { dropUnsent, isUnsentJob, setUnsent, type UnsentJob } from '@/lib/client/unsent/store';
import { useUnsent } from '@/lib/client/unsent/use-unsent';

const at = (time: string, now: number, timeZone: string) => when(Date.parse(time) / 1000, now, timeZone);

/** `Read the tun, put off until tomorrow 08:00.` */
function words({ job, act }: UnsentJob, now: number, timeZone: string): string {
  return act.does === 'done' ? `${job.title}, done ${at(act.at, now, timeZone)}.` : `${job.title}, put off until ${at(act.until, now, timeZone)}.`;
}

/** On the rounds: what was done to jobs here and the server has not, or would not, take. A tick that only waits stands in its own row. */
export function WaitingActs({ now, timeZone }: { now: number; timeZone: string }) {
  const acts = useUnsent()
    .filter(isUnsentJob)
    .filter((unsent) => unsent.state === 'refused' || unsent.act.does === 'snooze');
  if (acts.length === 0) return null;
  const again = async (order: number) => {
    await setUnsent(order, 'waiting');
    await sendUnsent();
  };
  return (
    <ol aria-label="Waiting to be sent" className="not-printed">
      {acts.map((unsent) => (
        <li key={unsent.id} className="flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-dashed border-ink3 px-(--margin) py-2">
          <span className="min-w-0 flex-1 basis-[16rem]">
            <span className="type-body block break-words">
              <Sentence>{words(unsent, now, timeZone)}</Sentence>
            </span>
            <span role="status" className={`type-label ${unsent.state === 'refused' ? 'text-madder' : 'text-ink2'}`} style={{ fontWeight: unsent.state === 'refused' ? 600 : 500 }}>
              {unsent.state === 'refused' ? `Not taken: ${unsent.reason ?? 'the server said no.'}` : 'Waiting to be sent'}
            </span>
          </span>
          <span className="flex gap-2">
            {unsent.state === 'refused' && (
              <Button size="lane" look="quiet" onClick={() => void again(unsent.order!)}>
                Send it again
              </Button>
            )}
            <Button size="lane" look="quiet" onClick={() => void dropUnsent(unsent.order!)}>
              {unsent.state === 'refused' ? 'Let it go' : 'Take it back'}
            </Button>
          </span>
        </li>
      ))}
    </ol>
  );
}

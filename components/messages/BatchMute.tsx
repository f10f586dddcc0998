'use client';

import { when } from '@/components/charts/zone';
import { useNow } from '@/components/ui/now';
import { useMe } from '@/lib/client/me';
import { useMutes } from '@/lib/client/messages';
import { MuteMark, MuteVessel } from './Muted';

/** The mute of one vessel: who and until when, or the way to mute it. Nothing for those who are told nothing. */
export function BatchMute({ batch, now, timeZone }: { batch: { id: string; name: string }; now: number; timeZone: string }) {
  const { may } = useMe();
  const { mutes } = useMutes(may('alerts.read'));
  if (!mutes) return null;
  return <MuteVessel batch={batch} mute={mutes.find((mute) => mute.batch.id === batch.id) ?? null} now={now} timeZone={timeZone} mayMute={may('alerts.mute')} />;
}

/** On the shelf, short: `muted until 18:00, Una`. */
export function LaneMuted({ batchId }: { batchId: string }) {
  const { me, may } = useMe();
  const { mutes } = useMutes(may('alerts.read'));
  const nowMs = useNow();
  const mute = mutes?.find((item) => item.batch.id === batchId);
  if (!mute || !me || nowMs === null) return null;
  return (
    <span className="type-label inline-flex items-center gap-1 whitespace-nowrap text-ink2">
      <MuteMark />
      <span>
        until {when(Date.parse(mute.until) / 1000, nowMs / 1000, me.cellar.time_zone)}
        {mute.by && `, ${mute.by.name.split(' ')[0]}`}
        <span className="heard-only"> muted</span>
      </span>
    </span>
  );
}

/** Below the calls of a batch, drawn only for those whom they tell. */
export function MuteBar(props: { batch: { id: string; name: string }; now: number; timeZone: string }) {
  const { may } = useMe();
  if (!may('alerts.read')) return null;
  return (
    <div className="flex min-h-9 items-center px-(--margin) py-3">
      <BatchMute {...props} />
    </div>
  );
}

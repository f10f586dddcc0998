'use client';

import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { GroupBar } from '@/components/ui/Page';
import { useMe } from '@/lib/client/me';
import { useMessages } from '@/lib/client/messages';
import { Exceptions } from './Exceptions';
import { Means } from './Means';
import { MuteList } from './Muted';
import { Rules } from './Rules';
import { Times } from './Times';
import { Turns } from './Turns';

/** Who is told of what, when, and by which means. */
export function MessagesPage() {
  const { me, may } = useMe();
  const { messages, error, retry } = useMessages();
  const nowMs = useNow();
  if (me && !may('alerts.read')) return <EmptyState title="Messages are for those who tend the vessels">As a guest of {me.cellar.name} you are told nothing, day or night.</EmptyState>;
  if (error && !messages) {
    return (
      <ErrorState title="The messages did not load" onRetry={retry}>
        {error.message} What was set still holds.
      </ErrorState>
    );
  }
  if (!messages || !me || nowMs === null) return <Haze height={420} label="Loading the messages" className="m-(--margin)" />;
  const now = nowMs / 1000;
  const timeZone = messages.time_zone;
  return (
    <>
      <Means messages={messages} email={me.person.email} now={now} timeZone={timeZone} />
      <Times messages={messages} />
      <Rules messages={messages} maySet={may('cellar.manage')} />
      <Exceptions messages={messages} maySet={may('cellar.manage')} />
      <Turns messages={messages} maySet={may('cellar.manage')} />
      <section aria-label="Muted">
        <GroupBar word="Muted" note={messages.mutes.length === 0 ? 'no vessel is; mute one from its page or an alert' : `${messages.mutes.length} now`} />
        <MuteList mutes={messages.mutes} now={now} timeZone={timeZone} mayMute={may('alerts.mute')} />
      </section>
    </>
  );
}

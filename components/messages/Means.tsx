'use client';

import { useState } from 'react';
import { when } from '@/components/charts/zone';
import { browserWords } from '@/components/settings/browser-words';
import { Row } from '@/components/settings/Row';
import { Button } from '@/components/ui/Button';
import { FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { sendTest } from '@/lib/client/messages';
import { removeDevice, usePush, type PushState } from '@/lib/client/push';
import type { MessagesBody } from '@/lib/contracts/messages';
import { useSaving } from './use-saving';

const HERE: Record<PushState, string> = {
  unknown: 'Looking whether this browser can.',
  unsupported: 'This browser takes no messages here. On a phone, add Fallbright to the home screen first; elsewhere it needs an https address.',
  blocked: 'This browser was told to refuse messages from here. Allow them in its settings for this site, then come back.',
  off: 'No messages come to this device.',
  on: 'Messages come to this device, also while Fallbright is closed.',
};

/** Where messages go: the mail address, this device, the others; and a try. */
export function Means({ messages, email, now, timeZone }: { messages: MessagesBody; email: string; now: number; timeZone: string }) {
  const push = usePush(messages.push_key);
  const { busy, failed, run } = useSaving('That did not work. Try again.');
  const [tried, setTried] = useState(false);
  return (
    <section aria-label="Where messages go">
      <GroupBar word="Where messages go" note="by mail, and to the devices you allow" />
      {failed && <FormError>{failed}</FormError>}
      <Row name="mail">
        <span className="font-mono text-[0.8125rem]">{email}</span>
      </Row>
      <Row name="this device">
        <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
          <span className="min-w-0 flex-1 basis-64">{HERE[push.state]}</span>
          {push.state === 'off' && (
            <Button look="first" disabled={busy} onClick={() => void run(push.turnOn)}>
              Tell me here
            </Button>
          )}
          {push.state === 'on' && (
            <Button disabled={busy} onClick={() => void run(push.turnOff)}>
              Not here any more
            </Button>
          )}
        </div>
      </Row>
      {messages.devices.length > 0 && (
        <Row name="devices">
          <ul className="flex flex-col gap-2">
            {messages.devices.map((device) => (
              <li key={device.id} className="flex flex-wrap items-center gap-x-4 gap-y-1">
                <span className="min-w-0 flex-1 basis-52">
                  {browserWords(device.user_agent)}
                  {device.this_sign_in && ', this one'}
                  <span className="type-label block text-ink2">
                    <Sentence>{device.last_error !== null ? `last try failed: ${device.last_error}` : device.last_taken_at ? `last told ${when(Date.parse(device.last_taken_at) / 1000, now, timeZone)}` : 'nothing told yet'}</Sentence>
                  </span>
                </span>
                <Button size="lane" disabled={busy} aria-label={`Take away ${browserWords(device.user_agent)}`} onClick={() => void run(() => removeDevice(device.id))}>
                  Take away
                </Button>
              </li>
            ))}
          </ul>
        </Row>
      )}
      <Row name="a try">
        <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
          <span role="status" className="min-w-0 flex-1 basis-64">
            {tried ? 'On its way. If nothing comes in a minute, look where mails are sorted out.' : 'One message by every means above.'}
          </span>
          <Button disabled={busy} onClick={() => void run(sendTest).then((sent) => setTried(sent))}>
            Send me one
          </Button>
        </div>
      </Row>
    </section>
  );
}

import { devicesOf, forgetDevice, noteDevice } from '@/db/queries/devices';
import { asFailure } from '@/lib/mail/smtp';
import { composePush } from '@/lib/push/compose';
import type { PushTransport } from '@/lib/push/transport';
import { textsFor } from '@/lib/texts/texts';
import { NobodyThere, type Means } from './means';

/** What is wrong now may be right tomorrow: a device that is off that long misses it, and sees it on the page. */
const KEPT_S = 12 * 3_600;

export interface ByPush {
  transport: PushTransport;
  now: () => number;
}

/** To every device of the person; one that takes it is enough. An address that its browser gave up is forgotten. */
export function byPush({ transport, now }: ByPush): Means {
  return {
    name: 'push',
    async send(ready) {
      const notice = composePush(
        ready.map(({ payload }) => payload),
        await textsFor(ready[0]!.row),
      );
      const message = { body: JSON.stringify(notice), topic: topicOf(notice.tag), urgent: notice.urgent, ttlS: KEPT_S };
      let taken = 0;
      let failure: unknown;
      for (const device of await devicesOf(ready[0]!.row.personId)) {
        try {
          if ((await transport.send(device, message)) === 'gone') await forgetDevice(device.id);
          else {
            taken += 1;
            await noteDevice(device.id, new Date(now()), null);
          }
        } catch (error) {
          failure = error;
          await noteDevice(device.id, new Date(now()), asFailure(error).message);
        }
      }
      if (taken > 0) return;
      throw failure ?? new NobodyThere('no device takes messages any more');
    },
    close: () => undefined,
  };
}

/** RFC 8030 5.4: at most 32 characters of the base64url alphabet. */
const topicOf = (tag: string) => tag.replace(/[^A-Za-z0-9_-]/g, '').slice(-32);

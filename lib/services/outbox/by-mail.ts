import { createHash } from 'node:crypto';
import { compose } from '@/lib/mail/compose';
import { textsFor } from '@/lib/texts/texts';
import type { MailTransport } from '@/lib/mail/transport';
import { dedupeKey } from '@/lib/services/alerts/tell';
import { takeUrlsFor } from '@/lib/services/alerts/take-links';
import type { Means, Ready } from './means';

export interface ByMail {
  transport: MailTransport;
  /** Where links lead. */
  publicUrl: string;
  /** The part behind the @ of message identifiers. */
  messageHost: string;
  now: () => number;
}

/** All that a person is owed in one mail. */
export function byMail({ transport, publicUrl, messageHost, now }: ByMail): Means {
  return {
    name: 'mail',
    async send(ready) {
      const first = ready[0]!;
      const takeUrls = await takeUrlsFor(ready, publicUrl, now());
      const mail = compose(
        ready.map(({ payload }) => payload),
        { publicUrl, takeUrls, texts: await textsFor(first.row) },
      );
      await transport.send({
        ...mail,
        to: { name: first.row.name, address: first.row.email },
        messageId: messageId(
          ready.map(({ row }) => row.dedupeKey),
          messageHost,
        ),
        inReplyTo: ready.length === 1 ? followed(first, messageHost) : null,
      });
    },
    close: () => transport.close(),
  };
}

/** Always the same for the same mail, whoever sends it and however often. */
export function messageId(keys: readonly string[], host: string): string {
  return `<${createHash('sha256').update(keys.toSorted().join('\n')).digest('hex').slice(0, 40)}@${host}>`;
}

/** The mail that told the same alert's opening. */
function followed({ row, payload }: Ready, host: string): string | null {
  if (payload.template !== 'alert' || payload.event === 'opened') return null;
  return messageId([dedupeKey(`alert:${payload.alert.id}:opened`, row.personId)], host);
}

import { simpleParser, type AddressObject } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import type { MailStore } from './store';

const LARGEST_MAIL_BYTES = 5_000_000;

const written = (address: AddressObject | AddressObject[] | undefined) => [address ?? []].flat().map((item) => item.text).join(', ');

/** Takes every mail, for whomever; says that it has it when it is on the disk. */
export function smtpServer(store: MailStore, onError: (error: unknown) => void): SMTPServer {
  const server = new SMTPServer({
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: LARGEST_MAIL_BYTES,
    banner: 'Fallbright mailbox: keeps every mail here and sends none on',
    onData(stream, session, callback) {
      simpleParser(stream)
        .then((mail) => {
          if (stream.sizeExceeded) throw Object.assign(new Error('too large'), { responseCode: 552 });
          return store.add(
            {
              envelope: { from: session.envelope.mailFrom ? session.envelope.mailFrom.address : '', to: session.envelope.rcptTo.map((item) => item.address) },
              from: written(mail.from),
              to: written(mail.to),
              subject: mail.subject ?? '',
              message_id: mail.messageId ?? null,
              in_reply_to: mail.inReplyTo ?? null,
              text: mail.text ?? '',
              html: mail.html || null,
            },
            new Date(),
          );
        })
        .then(
          () => callback(),
          (error: Error & { responseCode?: number }) => {
            onError(error);
            callback(Object.assign(new Error('could not be kept; try again'), { responseCode: error.responseCode ?? 451 }));
          },
        );
    },
  });
  // A client that drops its line is its own affair.
  server.on('error', onError);
  return server;
}

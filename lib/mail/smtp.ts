import { createTransport } from 'nodemailer';
import { MailFailure, type FailureKind, type MailTransport, type OutgoingMail } from './transport';

export interface SmtpOptions {
  /** `smtp://[user:password@]host[:port]` or `smtps://...`. */
  url: string;
  /** `Name <address>`. */
  from: string;
  /** A server that does not speak within this is not there, ms. */
  connectTimeoutMs?: number;
  /** One mail may take this long in all, ms. */
  sendTimeoutMs?: number;
}

/** Mail over SMTP, one connection a mail: a cellar sends few, and a dead connection is never reused. */
export function smtpTransport({ url, from, connectTimeoutMs = 10_000, sendTimeoutMs = 60_000 }: SmtpOptions): MailTransport {
  const transporter = createTransport(url, { from, disableFileAccess: true, disableUrlAccess: true });
  Object.assign(transporter.options, { connectionTimeout: connectTimeoutMs, greetingTimeout: connectTimeoutMs, socketTimeout: sendTimeoutMs });
  return {
    async send(mail: OutgoingMail) {
      // socketTimeout starts anew with every byte: a server that drips needs a limit of its own.
      let timer: NodeJS.Timeout | undefined;
      const limit = new Promise<never>((_, reject) => {
        timer = setTimeout(() => reject(new MailFailure('unavailable', `the mail server took longer than ${Math.round(sendTimeoutMs / 1000)} s`)), sendTimeoutMs);
      });
      try {
        await Promise.race([
          transporter.sendMail({
            to: mail.to,
            subject: mail.subject,
            text: mail.text,
            html: mail.html,
            messageId: mail.messageId,
            ...(mail.inReplyTo ? { inReplyTo: mail.inReplyTo, references: mail.inReplyTo } : {}),
            // RFC 3834: nobody's holiday answer should come back.
            headers: { 'Auto-Submitted': 'auto-generated' },
          }),
          limit,
        ]);
      } catch (error) {
        throw asFailure(error);
      } finally {
        clearTimeout(timer);
      }
    },
    close: () => transporter.close(),
  };
}

/** The server shuts down (RFC 5321), or does not let the house in (RFC 4954): every mail would fare the same, and none is at fault. */
const NOT_OF_THE_MAIL = new Set([421, 454, 530, 534, 535, 538]);

function kindOf(responseCode: number | undefined, code: string | undefined): FailureKind {
  // Without an answer it was not reached, unless the mail never left: its address is none.
  if (responseCode === undefined) return code === 'EENVELOPE' ? 'refused' : 'unavailable';
  if (NOT_OF_THE_MAIL.has(responseCode)) return 'unavailable';
  return responseCode >= 500 ? 'refused' : 'deferred';
}

/** What nodemailer reports, as one of our three. */
export function asFailure(error: unknown): MailFailure {
  if (error instanceof MailFailure) return error;
  const { responseCode, code, message = String(error) } = error as { responseCode?: number; code?: string; message?: string };
  // Servers write many lines; the first says it.
  return new MailFailure(kindOf(responseCode, code), message.split(/[\r\n]/, 1)[0]!.slice(0, 300), { cause: error });
}

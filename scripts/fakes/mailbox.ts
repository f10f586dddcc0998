import { join } from 'node:path';
import { env } from '@/lib/config/env';
import { logFor } from '@/lib/log';
import { startMailbox } from './mailbox/start';

/** The mailbox of a machine that has no mail server: everything sent stays here and can be read. */
const log = logFor('mailbox');
const { MAILBOX_SMTP_PORT: smtpPort, MAILBOX_PORT: httpPort, DATA_DIR } = env();
const mailbox = await startMailbox({ smtpPort, httpPort, folder: join(DATA_DIR, 'mailbox'), onError: (error) => log.warn({ err: error }, 'the mailbox stumbled') });
log.info({ smtpPort, page: `http://127.0.0.1:${httpPort}` }, 'mailbox ready');

for (const signal of ['SIGINT', 'SIGTERM'] as const) {
  process.once(signal, () => {
    void mailbox.stop().then(() => process.exit(0));
    setTimeout(() => process.exit(1), 5_000).unref();
  });
}

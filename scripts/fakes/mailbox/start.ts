import { once } from 'node:events';
import { httpServer } from './http';
import { smtpServer } from './smtp';
import { MailStore } from './store';

export interface MailboxOptions {
  smtpPort: number;
  httpPort: number;
  /** Where mails are kept. */
  folder: string;
  onError?: (error: unknown) => void;
}

/** This machine only: whoever reads the mailbox can reset passwords. */
const HOST = '127.0.0.1';

/** Starts the mail server that sends nothing on, and the page to read what it took. */
export async function startMailbox({ smtpPort, httpPort, folder, onError = () => undefined }: MailboxOptions): Promise<{ stop(): Promise<void> }> {
  const store = await MailStore.open(folder);
  const smtp = smtpServer(store, onError);
  const http = httpServer(store, onError);
  await Promise.all([new Promise<void>((resolve, reject) => smtp.server.once('error', reject) && smtp.listen(smtpPort, HOST, resolve)), once(http.listen(httpPort, HOST), 'listening')]);
  return {
    stop: async () => {
      http.closeAllConnections();
      await Promise.all([new Promise<void>((resolve) => http.close(() => resolve())), new Promise<void>((resolve) => smtp.close(() => resolve()))]);
    },
  };
}

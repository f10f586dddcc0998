import { once } from 'node:events';
import { simpleParser, type ParsedMail } from 'mailparser';
import { SMTPServer, type SMTPServerOptions } from 'smtp-server';

export interface Taken {
  to: string[];
  subject: string;
  messageId: string;
  inReplyTo: string | null;
  text: string;
  mail: ParsedMail;
}

/** How a mail server behaves towards one mail. `drop` takes it and hangs up before it says so. */
export type Temper = 'takes' | 'later' | 'refuses' | 'drops' | 'hangs';

export interface MailServer {
  port: number;
  url: string;
  /** What it took, in order; a mail that it dropped after taking is among them. */
  taken: Taken[];
  /** Connections it was asked for. */
  connections(): number;
  /** Decides for each mail, with how many came before it. */
  temper: (count: number) => Temper;
  /** How long it thinks before it says that it has a mail, ms. */
  slowMs: number;
  stop(): Promise<void>;
}

/** A real SMTP server with a temper. @param port 0: any free one */
export async function startMailServer(port = 0): Promise<MailServer> {
  let count = 0;
  let connections = 0;
  const held: MailServer = { port, url: '', taken: [], connections: () => connections, temper: () => 'takes', slowMs: 0, stop: async () => undefined };

  const options: SMTPServerOptions = {
    disabledCommands: ['AUTH', 'STARTTLS'],
    closeTimeout: 100,
    onConnect(_session, callback) {
      connections += 1;
      callback();
    },
    onData(stream, session, callback) {
      const temper = held.temper(count);
      count += 1;
      const take = (mail: ParsedMail) => {
        if (temper === 'later') return callback(Object.assign(new Error('try again later'), { responseCode: 451 }));
        if (temper === 'refuses') return callback(Object.assign(new Error('no such mailbox'), { responseCode: 550 }));
        if (temper === 'hangs') return;
        held.taken.push({ to: session.envelope.rcptTo.map((item) => item.address), subject: mail.subject ?? '', messageId: mail.messageId ?? '', inReplyTo: mail.inReplyTo ?? null, text: mail.text ?? '', mail });
        if (temper === 'takes') return void setTimeout(callback, held.slowMs);
        for (const connection of server.connections) (connection as unknown as { _socket: { destroy(): void } })._socket.destroy();
      };
      // A sender that dies in the middle of a mail has sent none.
      simpleParser(stream).then(take, () => undefined);
    },
  };
  const server = new SMTPServer(options);
  server.on('error', () => undefined);
  server.listen(port, '127.0.0.1');
  await once(server.server, 'listening');
  held.port = (server.server.address() as { port: number }).port;
  held.url = `smtp://127.0.0.1:${held.port}`;
  held.stop = () => new Promise((resolve) => server.close(() => resolve()));
  return held;
}

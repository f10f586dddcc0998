import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { freePort } from '@/scripts/lib/postgres';
import { startProcess, type Running } from './processes';
import { SECRET, startWeb, type Web } from './web';

/** All of Fallbright on free ports, as start runs it, with a database of the caller's. */
export interface House {
  web: Web;
  mqttPort: number;
  mailboxUrl: string;
  mails(): Promise<Array<{ subject: string; to: string; text: string }>>;
  /** For a further process of the house, the simulators say. */
  variables: Record<string, string>;
  stop(): Promise<void>;
}

const STOPS_WITHIN_MS = 20_000;

/** Every part ends by itself soon after it is told to. */
function inTime<T>(name: string, ended: Promise<T>): Promise<T> {
  return Promise.race([ended, new Promise<never>((_, reject) => setTimeout(() => reject(new Error(`${name} did not end within ${STOPS_WITHIN_MS / 1000} s.`)), STOPS_WITHIN_MS).unref())]);
}

export async function startHouse(databaseUrl: string): Promise<House> {
  const folder = await mkdtemp(join(tmpdir(), 'fallbright-house-'));
  const web = await startWeb({ databaseUrl, variables: { DATA_DIR: folder } });
  // Only now: while the web server starts, another suite would take them.
  const [mqttPort, smtpPort, mailboxPort] = [await freePort(20_000), await freePort(26_000), await freePort(14_000)];
  const variables = {
    DATABASE_URL: databaseUrl,
    DATA_DIR: folder,
    MQTT_PORT: String(mqttPort),
    MAILBOX_SMTP_PORT: String(smtpPort),
    MAILBOX_PORT: String(mailboxPort),
    PUBLIC_URL: web.url,
    AUTH_SECRET: SECRET,
  };
  const running: Array<[string, Running]> = [];
  running.push(['scripts/fakes/mailbox.ts', await startProcess('scripts/fakes/mailbox.ts', variables, 'mailbox ready')]);
  running.push(['broker/server.ts', await startProcess('broker/server.ts', variables, 'broker ready')]);
  running.push(['broker/worker.ts', await startProcess('broker/worker.ts', variables, 'worker ready')]);
  const mailboxUrl = `http://127.0.0.1:${mailboxPort}`;
  return {
    web,
    mqttPort,
    mailboxUrl,
    variables,
    async mails() {
      const response = await fetch(`${mailboxUrl}/api/mails`);
      return ((await response.json()) as { items: Array<{ subject: string; to: string; text: string }> }).items;
    },
    async stop() {
      for (const [name, part] of running.reverse()) {
        part.kill('SIGTERM');
        await inTime(name, part.ended);
      }
      await inTime('the web server', web.stop());
      await rm(folder, { recursive: true, force: true });
    },
  };
}

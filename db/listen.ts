import { Client } from 'pg';
import { databaseUrl } from '../lib/config/env';

export interface Listener {
  close(): Promise<void>;
}

export interface ListenOptions {
  channel: string;
  onMessage(payload: string): void;
  /** Called after each connection, the first too: what was said in between went unheard, so look at everything. */
  onConnect?(): void;
  onError?(error: unknown): void;
  /** For a test; else the process's database. */
  url?: string;
}

const FIRST_WAIT_MS = 250;
const LONGEST_WAIT_MS = 10_000;

/** Hears a PostgreSQL channel on a connection of its own, and connects again whenever it breaks. */
export function listen({ channel, onMessage, onConnect, onError, url = databaseUrl() }: ListenOptions): Listener {
  let client: Client | null = null;
  let timer: NodeJS.Timeout | undefined;
  let closed = false;
  let wait = FIRST_WAIT_MS;

  const again = () => {
    if (closed) return;
    clearTimeout(timer);
    // Spread, so that all listeners of a fallen database do not come back in one instant.
    timer = setTimeout(connect, wait * (0.5 + Math.random()));
    wait = Math.min(wait * 2, LONGEST_WAIT_MS);
  };

  const connect = () => {
    const fresh = new Client({ connectionString: url, application_name: 'fallbright listen', keepAlive: true, connectionTimeoutMillis: 5_000 });
    client = fresh;
    let lost = false;
    const drop = (error?: unknown) => {
      if (lost) return;
      lost = true;
      if (error && !closed) onError?.(error);
      void fresh.end().catch(() => undefined);
      again();
    };
    fresh.on('error', drop);
    fresh.on('end', () => drop());
    fresh.on('notification', (message) => onMessage(message.payload ?? ''));
    fresh
      .connect()
      .then(() => fresh.query(`listen "${channel.replaceAll('"', '""')}"`))
      .then(() => {
        wait = FIRST_WAIT_MS;
        onConnect?.();
      })
      .catch(drop);
  };

  connect();
  return {
    async close() {
      closed = true;
      clearTimeout(timer);
      await client?.end().catch(() => undefined);
    },
  };
}

import { afterAll, beforeAll } from 'vitest';
import { gateTo, type Gate } from './gate';
import { startWeb, type Web } from './web';

/** The built web server for a suite, whose road to its database can be cut or blocked; filled once the suite begins. */
export function useGatedWeb(db: { url: string }): { web: Web; gate: Gate } {
  const held = {} as { web: Web; gate: Gate };
  beforeAll(async () => {
    held.gate = await gateTo(db.url);
    held.web = await startWeb({ databaseUrl: held.gate.url });
  }, 700_000);
  afterAll(async () => {
    await held.gate?.open();
    await held.web?.stop();
    await held.gate?.close();
  });
  return held;
}

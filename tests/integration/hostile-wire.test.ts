import { afterAll, beforeAll, expect, it } from 'vitest';
import { useDatabase } from '../support/database';
import { HOSTILE_REQUESTS, sendRaw } from '../support/hostile/wire';
import { startWeb, type Web } from '../support/web';

const db = useDatabase();
let web: Web;
beforeAll(async () => {
  web = await startWeb({ databaseUrl: db.url });
}, 700_000);
afterAll(() => web?.stop());

it('requests as no browser sends them are refused or answered, never with a failure of ours, and the server stays', async () => {
  const cases = Object.entries(HOSTILE_REQUESTS);
  expect(cases.length).toBeGreaterThanOrEqual(20);
  const port = Number(new URL(web.url).port);
  const before = await web.memory();
  for (const [what, request] of cases) {
    const status = await sendRaw(port, request);
    if (status !== null) expect(status, what).toBeLessThan(500);
    expect((await fetch(`${web.url}/api/v1/openapi.json`)).status, `after ${what}`).toBe(200);
  }
  expect((await web.memory()) - before).toBeLessThan(200e6);
});

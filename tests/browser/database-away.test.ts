import { afterAll, beforeAll, describe, it } from 'vitest';
import { useBrowser } from '../support/browser';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember } from '../support/factories';
import { gateTo, type Gate } from '../support/gate';
import { startWeb, type Web } from '../support/web';

describe('a page that is opened while the database is away', () => {
  const db = useDatabase();
  const browser = useBrowser();
  let web: Web;
  let gate: Gate;
  beforeAll(async () => {
    gate = await gateTo(db.url);
    web = await startWeb({ databaseUrl: gate.url });
  }, 700_000);
  afterAll(async () => {
    await gate?.open();
    await web?.stop();
    await gate?.close();
  });

  it('says so in the look of the others, and is there at the first try once the database is back', async () => {
    const member = await buildMember('keeper');
    const batch = await buildBatch({ cellarId: member.cellarId, name: 'Long hedge' });
    const { page, context } = await browser.visitAs(member.personId, web.url, { phone: true });
    await gate.cut();
    await page.goto(`${web.url}/batches/${batch.id}`);
    await page.getByRole('heading', { name: 'This page could not be drawn' }).waitFor();
    await gate.open();
    await page.getByRole('button', { name: 'Try again' }).click();
    await page.getByRole('heading', { name: 'Long hedge' }).first().waitFor();
    await context.close();
  });
});

import { describe, expect, it } from 'vitest';
import { useBrowser } from '../support/browser';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember } from '../support/factories';
import { useGatedWeb } from '../support/gated-web';

describe('a page that is opened while the database is away', () => {
  const db = useDatabase();
  const browser = useBrowser();
  const house = useGatedWeb(db);

  it('says so in the look of the others, and is there at the first try once the database is back', async () => {
    const member = await buildMember('keeper');
    const batch = await buildBatch({ cellarId: member.cellarId, name: 'Long hedge' });
    const { page, context } = await browser.visitAs(member.personId, house.web.url, { phone: true });
    await page.goto(`${house.web.url}/settings`);
    await page.getByRole('radio', { name: 'Night' }).check();
    await house.gate.cut();
    await page.goto(`${house.web.url}/batches/${batch.id}`);
    await page.getByRole('heading', { name: 'This page could not be drawn' }).waitFor();
    await expect.poll(() => page.evaluate(() => document.documentElement.dataset.theme)).toBe('night');
    await house.gate.open();
    await page.getByRole('button', { name: 'Try again' }).click();
    await page.getByRole('heading', { name: 'Long hedge' }).first().waitFor();
    await context.close();
  });
});

import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/lib/auth/policies';
import { settled, tooLow, useBrowser } from '../support/browser';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';
import type { Things } from '../support/role-rows';
import { SCREENS, walkScreens } from '../support/screens';
import { things } from '../support/things';
import { startWeb, type Web } from '../support/web';

const APP = join(import.meta.dirname, '../../app');

/** By night at a desk: `every-screen-by-night`. */
describe('every screen, on a phone by day', () => {
  const db = useDatabase();
  const browser = useBrowser();
  let web: Web;
  let keeper: Actor;
  let there: Things;
  beforeAll(async () => {
    web = await startWeb({ databaseUrl: db.url });
    keeper = await buildMember('keeper');
    there = await things(keeper.cellarId, keeper.personId);
  }, 700_000);
  afterAll(async () => {
    await web?.stop();
  });

  it('is known here', () => {
    const pages = readdirSync(APP, { recursive: true, encoding: 'utf8' })
      .filter((file) => /(^|\/)page\.tsx$/.test(file))
      .map((file) => file.replace(/\/?page\.tsx$/, '').replace(/\([^)]*\)\/?/g, ''));
    expect(pages.sort()).toEqual(Object.keys(SCREENS).sort());
  });

  it('has no serious barrier, nothing wider than it is and nothing to complain of', () => walkScreens(browser, { web, keeper, there }, { phone: true, night: false }), 600_000);

  it('leaves a wet thumb its room on the rounds', async () => {
    const { page, context } = await browser.visitAs(keeper.personId, web.url, { phone: true });
    await page.goto(`${web.url}/rounds`);
    await settled(page);
    const rows = page.locator('main li');
    expect(await rows.count()).toBeGreaterThan(0);
    expect(await tooLow(rows.locator('a, button'))).toEqual([]);
    await context.close();
  });
});

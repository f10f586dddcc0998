import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { settled, tooLow } from '../support/browser';
import { SCREENS, useFullHouse, walkScreens } from '../support/screens';

const APP = join(import.meta.dirname, '../../app');

/** By night at a desk: `every-screen-by-night`. */
describe('every screen, on a phone by day', () => {
  const { browser, house } = useFullHouse();

  it('is known here', () => {
    const pages = readdirSync(APP, { recursive: true, encoding: 'utf8' })
      .filter((file) => /(^|\/)page\.tsx$/.test(file))
      .map((file) => file.replace(/\/?page\.tsx$/, '').replace(/\([^)]*\)\/?/g, ''));
    expect(pages.sort()).toEqual(Object.keys(SCREENS).sort());
  });

  it('has no serious barrier, nothing wider than it is and nothing to complain of', () => walkScreens(browser, house, { phone: true, night: false }), 600_000);

  it('leaves a wet thumb its room on the rounds', async () => {
    const { keeper, web } = house;
    const { page, context } = await browser.visitAs(keeper.personId, web.url, { phone: true });
    await page.goto(`${web.url}/rounds`);
    await settled(page);
    const rows = page.locator('main li');
    expect(await rows.count()).toBeGreaterThan(0);
    expect(await tooLow(rows.locator('a, button'))).toEqual([]);
    await context.close();
  });
});

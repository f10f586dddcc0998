import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Page } from 'playwright-core';
import { Membership, Person, Place } from '@/db/models';
import type { Role } from '@/lib/core/roles';
import { expectAccessible, expectNoSidewaysScroll, settled, tooLow, useBrowser } from '../support/browser';
import { useDatabase } from '../support/database';
import { buildCellar } from '../support/factories';
import { startHouse, type House } from '../support/house';

const db = useDatabase();
const browser = useBrowser();
const DAY = 86_400_000;
const BATCH = 'Wall orchard cider';
const NEXT_TIME = 'A sharper apple for a fifth of it.';

let house: House;
let cellarId: string;
const people = {} as Record<Extract<Role, 'brewer' | 'hand' | 'guest'>, Person>;
/** Where things came to stand, for the steps after. */
const at = { must: '', batch: '', lot: '', share: '' };

beforeAll(async () => {
  house = await startHouse(db.url);
  cellarId = (await buildCellar({ name: 'Stone loft', timeZone: 'UTC' })).id;
  for (const [role, name] of [['brewer', 'Wren Holt'], ['hand', 'Ivo Sand'], ['guest', 'Lin Dace']] as const) {
    people[role] = await Person.create({ name, email: `${role}@loft.example` });
    await Membership.create({ cellarId, personId: people[role].id, role });
  }
  await Place.create({ cellarId, name: 'cool rack', capacity: 24, temperatureC: 15 });
}, 600_000);

afterAll(async () => {
  await house.stop();
});

const local = (ms: number) => new Date(ms).toISOString().slice(0, 16);
const idOf = (page: Page) => new URL(page.url()).pathname.split('/').at(-1)!;
const visit = (role: keyof typeof people, options: { phone?: boolean; night?: boolean } = {}) => browser.visitAs(people[role].id, house.web.url, options);

async function readByHand(page: Page, gravity: string, when: number | null) {
  await page.goto(`${house.web.url}/batches/${at.batch}`);
  await page.getByRole('button', { name: /Read by hand/ }).filter({ visible: true }).first().click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel(/gravity/i).first().fill(gravity);
  if (when !== null) await dialog.getByLabel('When').fill(local(when));
  await dialog.getByRole('button', { name: 'Read', exact: true }).click();
  await dialog.waitFor({ state: 'hidden' });
}

describe('one batch, from the idea to the tasting note', () => {
  it('the brewer writes a must sheet and sees what it promises while it is written', async () => {
    const { page, context, complaints } = await visit('brewer');
    await page.goto(`${house.web.url}/musts/new`);
    await page.getByLabel('Name', { exact: true }).fill(BATCH);
    await page.getByLabel('Yeast').selectOption({ label: 'cider yeast' });
    await page.getByLabel('Vessel holds').fill('5');
    await page.getByLabel('From the catalogue').selectOption({ label: 'apple juice' });
    await page.getByRole('button', { name: 'Add the line' }).click();
    await page.getByLabel('Amount of apple juice').fill('4.4');
    // An ingredient that the catalogue does not have yet.
    await page.getByRole('button', { name: 'Not in the list' }).click();
    const own = page.getByRole('dialog');
    await own.getByLabel('Name', { exact: true }).fill('crab apple syrup');
    await own.getByLabel('What it is').selectOption({ label: 'Syrup' });
    await own.getByRole('button', { name: 'Add to the catalogue' }).click();
    await own.waitFor({ state: 'hidden' });
    await page.getByLabel('Amount of crab apple syrup').fill('about 60');
    const promise = page.getByRole('complementary', { name: 'What it promises' });
    await promise.getByRole('term').filter({ hasText: 'by Balling' }).waitFor();
    await promise.getByRole('term').filter({ hasText: 'headspace' }).waitFor();
    await page.getByRole('button', { name: 'Keep the sheet' }).click();
    await page.waitForURL(/musts\/[0-9a-f-]{36}$/);
    at.must = idOf(page);

    // Back from what is wanted to the amount of one line, and taken back again.
    await page.getByLabel('Wanted', { exact: true }).last().fill('1.060');
    await page.getByLabel('By changing').selectOption({ label: 'crab apple syrup' });
    await page.getByRole('button', { name: 'Work it out' }).click();
    await page.getByText(/crab apple syrup: .* was about 60/).waitFor();
    await page.getByRole('button', { name: 'Take it back' }).click();
    expect(await page.getByLabel('Amount of crab apple syrup').inputValue()).toBe('about 60');
    expect(complaints).toEqual([]);
    await context.close();
  });

  it('starts a batch from it', async () => {
    const { page, context } = await visit('brewer');
    await page.goto(`${house.web.url}/musts/${at.must}`);
    await page.getByRole('link', { name: 'Start a batch' }).click();
    await page.getByText('From its must sheet').waitFor();
    await page.getByLabel('Pitched, local time').fill(local(Date.now() - 40 * DAY));
    await page.getByLabel('Original gravity, at 20 °C').fill('1.052');
    await page.getByLabel('Where it stands').fill('long shelf');
    await page.getByRole('button', { name: 'Start the batch' }).click();
    await page.waitForURL(/batches\/[0-9a-f-]{36}$/);
    at.batch = idOf(page);
    await context.close();
  });

  it('the hand reads it on a phone, and the brewer racks and fines it; the second dose is ticked on the rounds', async () => {
    const hand = await visit('hand', { phone: true });
    await readByHand(hand.page, '0.996', Date.now() - 9 * DAY);

    const { page, context } = await visit('brewer');
    await page.goto(`${house.web.url}/batches/${at.batch}/work?do=rack`);
    await page.getByLabel('Left on the lees and in the hose').fill('0.2');
    await page.getByRole('button', { name: 'Racked', exact: true }).click();
    await page.getByText('Done and logged.').waitFor();
    await page.goto(`${house.web.url}/batches/${at.batch}/work?do=fine`);
    await page.getByRole('button', { name: 'First dose is in' }).click();
    await page.getByText('Second dose waits').waitFor();
    await context.close();

    await hand.page.goto(`${house.web.url}/rounds`);
    const kept = hand.page.waitForResponse((response) => response.url().endsWith('/done'));
    await hand.page.getByRole('button', { name: /^Done: Second dose/ }).click();
    await hand.page.getByText('Done and logged.').first().waitFor();
    expect((await kept).status()).toBe(200);
    await expectNoSidewaysScroll(hand.page);
    await hand.page.goto(`${house.web.url}/batches/${at.batch}/work?do=fine`);
    await hand.page.getByText('Settling').first().waitFor();
    await hand.context.close();
  });

  it('the bench holds it back while one reading is all there is, and for bottles that nobody looked up', async () => {
    const { page, context } = await visit('brewer');
    await page.goto(`${house.web.url}/bench/${at.batch}`);
    await page.getByLabel('warmest since it finished').fill('18');
    await page.getByText('held back').waitFor();
    expect(await page.getByRole('button', { name: 'Bottle it' }).isDisabled()).toBe(true);
    await readByHand(page, '0.996', null);
    await page.goto(`${house.web.url}/bench/${at.batch}`);
    await page.getByLabel('warmest since it finished').fill('18');
    await page.getByText('It is done.').first().waitFor();
    await page.getByText('held back').waitFor();
    await context.close();
  });

  it('is bottled once the maker’s figure is read, and stands in the cellar book', async () => {
    const { page, context, complaints } = await visit('brewer');
    await page.goto(`${house.web.url}/bench/${at.batch}`);
    await page.getByLabel('warmest since it finished').fill('18');
    await page.getByLabel('maker’s figure').fill('4.5');
    await page.getByLabel('left on lees').fill('0.1');
    await page.reload();
    await page.getByText('What you wrote here before is still on the page.').waitFor();
    expect(await page.getByLabel('maker’s figure').inputValue()).toBe('4.5');
    expect(await page.getByLabel('warmest since it finished').inputValue()).toBe('18');
    await page.getByRole('button', { name: /lightly sparkling/ }).click();
    await page.getByRole('button', { name: 'Bottle it' }).click();
    await page.getByLabel('they will stand').selectOption({ index: 1 });
    await page.getByRole('button', { name: /^Bottled: \d+ filled$/ }).click();
    await page.waitForURL(/book\/[0-9a-f-]{36}$/);
    at.lot = idOf(page);
    await page.getByText('8 of 8 left').first().waitFor();
    await page.getByText('8 in cool rack').waitFor();
    // Every figure can be asked how.
    await page.getByRole('button', { name: 'how? strength' }).click();
    await page.getByText('Balling from the gravity').waitFor();

    const labels = await page.request.get(`${house.web.url}/api/v1/lots/${at.lot}/labels.pdf?count=8`);
    expect(labels.status()).toBe(200);
    expect((await labels.body()).subarray(0, 5).toString()).toBe('%PDF-');

    // The preview is that file, drawn on the page: ink stands on its paper. Until then the page says what it waits for.
    let answer = () => {};
    const asked = new Promise<void>((resolve) => (answer = resolve));
    await page.route(/labels\.pdf/, async (route) => asked.then(() => route.continue()));
    await page.goto(`${house.web.url}/labels?lot=${at.lot}`);
    await page.getByText(/^1 of 3: /).waitFor();
    answer();
    const sheet = page.getByRole('img', { name: /sheet 1 of 1$/ });
    await sheet.waitFor();
    await page.getByText(/^\d of 3: /).waitFor({ state: 'hidden' });
    await page.unroute(/labels\.pdf/);
    await page.waitForFunction((canvas) => {
      const { data } = (canvas as HTMLCanvasElement).getContext('2d')!.getImageData(0, 0, (canvas as HTMLCanvasElement).width, (canvas as HTMLCanvasElement).height);
      return data.some((value, index) => index % 4 === 0 && value < 60 && data[index + 3]! > 200);
    }, await sheet.elementHandle());
    await page.goto(`${house.web.url}/book/${at.lot}`);

    await page.getByRole('button', { name: 'Make a link' }).click();
    const link = page.getByRole('link', { name: /\/share\// });
    await link.waitFor();
    at.share = (await link.getAttribute('href'))!;
    expect(complaints).toEqual([]);
    await context.close();
  });

  it('somebody with the label’s code in hand tastes it without an account, and sees no names', async () => {
    const { page, context, complaints } = await browser.visit({ phone: true });
    await page.goto(at.share);
    await page.getByRole('heading', { level: 1, name: BATCH }).waitFor();
    expect(await page.getByText('Wren Holt').count()).toBe(0);
    const asked = page.locator('button, summary').filter({ hasText: /^how\?/ });
    expect(await asked.count()).toBeGreaterThan(3);
    expect(await tooLow(asked)).toEqual([]);
    await page.getByLabel('score of 10').selectOption('8.5');
    await page.getByLabel('in your words').fill('Sharp, clean, gone too soon.');
    await page.getByLabel('next time').fill(NEXT_TIME);
    await page.getByLabel('your name, if you like').fill('Ash');
    await page.getByRole('button', { name: 'Tasted' }).click();
    await page.getByText('Your note stands with the others.').waitFor();
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
    expect(complaints).toEqual([]);
    await context.close();
  });

  it('the hand opens two; the guest of the house tastes and is offered nothing else', async () => {
    const hand = await visit('hand', { phone: true });
    await hand.page.goto(`${house.web.url}/book/${at.lot}`);
    await hand.page.getByRole('button', { name: 'Open, give, move' }).click();
    const dialog = hand.page.getByRole('dialog');
    await dialog.getByLabel('how many').fill('2');
    await dialog.getByRole('button', { name: 'Written down' }).click();
    await dialog.waitFor({ state: 'hidden' });
    await hand.page.getByText('6 of 8 left').first().waitFor();
    await hand.context.close();

    const { page, context } = await visit('guest');
    await page.goto(`${house.web.url}/book/${at.lot}`);
    await page.getByRole('button', { name: 'Taste it' }).click();
    const sheet = page.getByRole('dialog');
    await sheet.getByLabel('in your words').fill('Dry, and a little flat.');
    await page.keyboard.press('Escape');
    await sheet.getByText('What you wrote here is not kept yet.').waitFor();
    await sheet.getByRole('button', { name: 'Go on writing' }).click();
    expect(await sheet.getByLabel('in your words').inputValue()).toBe('Dry, and a little flat.');
    await sheet.getByLabel('score of 10').selectOption('7');
    await sheet.getByRole('button', { name: 'Tasted' }).click();
    await sheet.waitFor({ state: 'hidden' });
    await page.getByText(/^7\.8 ± .* of 10, by 2$/).waitFor();
    for (const name of ['Open, give, move', 'Write on it', 'Make a link']) expect(await page.getByRole('button', { name }).count()).toBe(0);
    await context.close();
  });

  it('what to do next time stands on the sheet, and goes along into its copy', async () => {
    const { page, context } = await visit('brewer');
    await page.goto(`${house.web.url}/musts/${at.must}`);
    await page.getByText(NEXT_TIME).first().waitFor();
    await page.getByRole('button', { name: 'Copy', exact: true }).click();
    const dialog = page.getByRole('dialog');
    expect(await dialog.getByLabel('The one change').inputValue()).toBe(NEXT_TIME);
    await dialog.getByRole('button', { name: 'Copy it' }).click();
    await page.waitForURL((url) => url.pathname.startsWith('/musts/') && !url.pathname.endsWith(at.must));
    await page.getByText(`copied from ${BATCH}`).waitFor();
    await page.getByText(NEXT_TIME).first().waitFor();
    await context.close();
  });

  it('a link that is revoked opens nothing', async () => {
    const { page, context } = await visit('brewer');
    await page.goto(`${house.web.url}/book/${at.lot}`);
    await page.getByRole('button', { name: 'Revoke' }).click();
    await page.getByText('revoked').first().waitFor();
    await page.goto(at.share);
    await page.getByText('This link no longer opens anything').waitFor();
    await context.close();
  });
});

describe('every screen of the job', () => {
  const screens = () => ['/musts', '/musts/catalogue', `/musts/${at.must}`, '/rounds', `/batches/${at.batch}/work`, '/bench', '/book', `/book/${at.lot}`, '/labels', `/compare?batches=${at.batch}`];

  it.each([[false, true], [true, false]])('has no serious barrier and nothing wider than the screen (phone: %s, night: %s)', async (phone, night) => {
    const { page, context } = await visit('brewer', { phone, night });
    for (const screen of screens()) {
      await page.goto(`${house.web.url}${screen}`);
      await settled(page);
      await expectAccessible(page);
      await expectNoSidewaysScroll(page);
    }
    await context.close();
  });
});

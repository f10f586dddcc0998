import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Page } from 'playwright-core';
import type { Actor } from '@/lib/auth/policies';
import { Entry } from '@/db/models';
import { createJob as createJobForm } from '@/lib/contracts/jobs';
import { createJob } from '@/lib/services/jobs/create';
import { createMust } from '@/lib/services/musts/create';
import { aLine, aSheet, ciderAt, readAt } from '../support/cellar';
import { expectNoSidewaysScroll, useBrowser } from '../support/browser';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';
import { startWeb, type Web } from '../support/web';

const db = useDatabase();
const browser = useBrowser();

let web: Web;
let brewer: Actor;

beforeAll(async () => {
  web = await startWeb({ databaseUrl: db.url });
  brewer = await buildMember('brewer');
}, 600_000);

afterAll(async () => {
  await web.stop();
});

const visit = (options: { phone?: boolean } = {}) => browser.visitAs(brewer.personId, web.url, options);
const open = (page: Page, path: string) => page.goto(`${web.url}${path}`);

/** Sheets of paper that the page takes, A4 with the margins of a house printer. */
async function pages(page: Page): Promise<number> {
  const margin = '12mm';
  const pdf = await page.pdf({ format: 'A4', margin: { top: margin, right: margin, bottom: margin, left: margin } });
  return (pdf.toString('latin1').match(/\/Type\s*\/Page[^s]/g) ?? []).length;
}

describe('a must sheet', () => {
  it('is written in words, loses nothing to a reload, and hands what was measured to the batch', async () => {
    const { page, context, complaints } = await visit({ phone: true });
    await open(page, '/musts/new');
    await page.getByLabel('Name', { exact: true }).fill('Hedge honey cider');
    await page.getByLabel('Yeast').selectOption({ label: 'cider yeast' });
    await page.getByLabel('Vessel holds').fill('5');
    for (const name of ['apple juice', 'honey']) {
      await page.getByLabel('From the catalogue').selectOption({ label: name });
      await page.getByRole('button', { name: 'Add the line' }).click();
    }
    await page.getByLabel('Amount of apple juice').fill('4 L');
    await page.getByLabel('Amount of honey').fill('about half a jar');
    // The unit follows what is written.
    expect(await page.getByLabel('Unit of honey').inputValue()).toBe('each');
    await page.getByLabel('Amount of apple juice').focus();
    expect(await page.getByLabel('Amount of honey').inputValue()).toBe('about half');
    // On a phone the promise stays in sight.
    const glance = page.getByRole('link', { name: /^1\.0\d\d/ });
    await glance.waitFor();
    const promised = await glance.innerText();
    await page.reload();
    await page.getByText('It is not kept yet.').waitFor();
    expect(await page.getByLabel('Amount of honey').inputValue()).toBe('about half');
    expect(await page.getByRole('link', { name: /^1\.0\d\d/ }).innerText()).toBe(promised);
    await expectNoSidewaysScroll(page);
    await page.getByRole('button', { name: 'Keep the sheet' }).click();
    await page.waitForURL(/musts\/[0-9a-f-]{36}$/);

    await page.getByRole('button', { name: 'Measure and pitch' }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('Gravity as read').fill('1.062');
    await dialog.getByLabel('Sample').fill('28');
    // Warm must shows too little: the corrected gravity is higher.
    await dialog.getByText('1.0643').waitFor();
    await dialog.getByLabel('Must now').fill('45');
    await dialog.getByText('the yeast dies').waitFor();
    await dialog.getByLabel('Must now').fill('20');
    await dialog.getByRole('link', { name: 'Start a batch with it' }).click();
    await page.getByText('From its must sheet').waitFor();
    expect(await page.getByLabel('Original gravity, at 20 °C').inputValue()).toBe('1.0643');
    expect(complaints).toEqual([]);
    await context.close();
  });

  it('of 25 lines is printed on one page', async () => {
    const keys = ['apple-juice', 'honey', 'damson', 'table-sugar', 'raisins'];
    const lines = Array.from({ length: 25 }, (_, index) => ({ ...aLine(keys[index % keys.length]!, 200 + index, 'g', { id: `line-${index}` }), note: index % 3 === 0 ? 'from the second picking, the soft ones taken out' : null }));
    const must = await createMust(brewer, aSheet({ name: 'All that the hedge gave this year, and the wall as well', lines: [aLine('water', 12, 'L'), ...lines.slice(1)], vessel_l: 25, method: 'Stone and crush the fruit. Water over it at 40 °C, stir, cover. Next day the enzyme, then the yeast.' }));
    const { page, context } = await visit();
    await open(page, `/musts/${must.id}`);
    await page.getByRole('button', { name: 'Print' }).waitFor();
    expect(await pages(page)).toBe(1);
    await context.close();
  });
});

describe('the rounds', () => {
  it('of 25 jobs in five places are printed on one page, each of them', async () => {
    const walker = await buildMember('brewer');
    const batches = await Promise.all(['by the sink', 'long shelf', 'north wall', 'under the stairs'].map((place, index) => ciderAt(walker, { batch: { place, tag: index + 1, name: `Perry ${index + 1}` } })));
    const titles = Array.from({ length: 25 }, (_, index) => `Water in the airlock, number ${index + 1}`);
    for (const [index, title] of titles.entries()) await createJob(walker, createJobForm.parse({ title, note: 'Top it up with boiled water.', due_at: new Date(Date.now() - 60_000).toISOString(), batch_id: batches[index % 5]?.id ?? null }));
    const { page, context } = await browser.visitAs(walker.personId, web.url);
    await open(page, '/rounds');
    await page.getByRole('checkbox').nth(24).waitFor();
    await page.emulateMedia({ media: 'print' });
    for (const title of titles) await page.locator('.work-sheet').getByText(title, { exact: true }).waitFor();
    expect(await pages(page)).toBe(1);
    await context.close();
  });
});

describe('what is done to a drink', () => {
  it('is not logged for now where its time is typed half way', async () => {
    const batch = await ciderAt(brewer);
    const racked = () => Entry.count({ where: { batchId: batch.id, kind: 'rack' } });
    const { page, context } = await visit();
    await open(page, `/batches/${batch.id}/work?do=rack`);
    await page.getByLabel('Left on the lees and in the hose').fill('0.3');
    const when = page.getByLabel('When', { exact: true });
    await when.focus();
    await page.keyboard.type('12');
    await page.getByRole('button', { name: 'Racked', exact: true }).click();
    await page.getByText('is not a whole day and time yet').waitFor();
    expect(await racked()).toBe(0);
    await when.focus();
    await page.keyboard.press('Backspace');
    await page.getByRole('button', { name: 'Racked', exact: true }).click();
    await expect.poll(racked).toBe(1);
    await context.close();
  });

  it('is told before it is done, and the log agrees', async () => {
    const batch = await ciderAt(brewer);
    const { page, context, complaints } = await visit();
    await open(page, `/batches/${batch.id}/work`);
    const sugar = page.getByRole('region', { name: 'Sugar and honey' });
    await sugar.getByRole('radio', { name: 'points' }).check();
    await sugar.getByLabel('Should rise by').fill('10');
    // What is reckoned anew stands empty for a moment: the sentence itself is waited for and read.
    const [, asIf] = /begun at (1\.\d{3})/.exec((await sugar.getByText(/as if it had begun at 1\.0\d\d/).textContent())!)!;
    await sugar.getByRole('button', { name: 'Added' }).click();
    await sugar.getByText('Logged:').waitFor();
    await page.getByRole('definition').filter({ hasText: asIf! }).first().waitFor();

    await page.getByText('Rack', { exact: true }).first().click();
    await page.getByLabel('Left on the lees and in the hose').fill('0.3');
    await page.reload();
    await page.getByText('What you wrote here before is still on the page.').waitFor();
    expect(await page.getByLabel('Left on the lees and in the hose').inputValue()).toBe('0.3');
    await page.getByLabel('What', { exact: true }).selectOption('water');
    const comes = page.getByRole('region', { name: 'What it comes to' }).filter({ visible: true });
    await page.getByLabel('How much').fill('0.4');
    await comes.getByText('Much air above it').waitFor();
    await page.getByLabel('How much').fill('0.6');
    await comes.getByText('It fits').waitFor();
    const [, gravity, strength] = /(1\.\d{3}), (\d+\.\d %)/.exec(await comes.getByText(/1\.\d{3}, \d+\.\d %/).first().innerText())!;
    await page.getByRole('button', { name: 'Racked', exact: true }).click();
    await page.getByText('Done and logged.').waitFor();
    const said = await page.getByText(/became/).innerText();
    expect(said).toContain(gravity);
    expect(said).toContain(strength);
    expect(complaints).toEqual([]);
    await context.close();
  });

  it('splits into two vessels, is blended with another, and its family shows both', async () => {
    const [long, sharp] = [await ciderAt(brewer, { volumeL: 10, vesselL: 11, batch: { name: 'Long hedge' } }), await ciderAt(brewer, { batch: { name: 'Sharp crab', tag: 31 } })];
    const { page, context, complaints } = await visit();
    await open(page, `/batches/${long.id}/work?do=split`);
    await page.getByLabel('Tag', { exact: true }).fill('31');
    await page.getByText('Tag 31 is on Sharp crab too.').waitFor();
    await page.getByLabel('Tag', { exact: true }).fill('32');
    await expect.poll(() => page.getByText('is on Sharp crab too').count()).toBe(0);
    await page.getByRole('button', { name: 'Split', exact: true }).last().click();
    await expect.poll(() => page.getByLabel('How much goes in').evaluate((field) => field === document.activeElement)).toBe(true);
    await page.getByLabel('How much goes in').fill('4');
    await page.getByLabel('It holds, brim full').fill('4.6');
    await page.getByText('6 L stays in Long hedge.').waitFor();
    await page.reload();
    await page.getByText('What you wrote here before is still on the page.').waitFor();
    await page.getByText('6 L stays in Long hedge.').waitFor();
    await page.getByRole('button', { name: 'Split', exact: true }).last().click();
    await page.getByText('Done and logged.').waitFor();
    // Another batch rests on it, so that the house would refuse to take it back.
    await open(page, `/batches/${long.id}`);
    const line = page.getByRole('region', { name: 'Log' }).getByRole('listitem').filter({ hasText: 'Split, 4 L went over.' });
    await line.waitFor();
    expect(await line.getByRole('button', { name: 'take back' }).count()).toBe(0);

    await open(page, `/batches/${long.id}/work?do=blend`);
    const second = page.getByLabel('Batch', { exact: true }).nth(1);
    await second.selectOption({ label: 'Long hedge, second vessel' });
    expect(await page.getByLabel('How much').nth(1).inputValue()).toBe('4');
    await second.selectOption({ label: sharp.name });
    expect(await page.getByLabel('How much').nth(1).inputValue()).toBe(String(sharp.volumeL));
    await page.getByLabel('How much').nth(0).fill('7');
    await page.getByText('7 L are asked of Long hedge, which has 6 L.').waitFor();
    await page.getByLabel('How much').nth(0).fill('3');
    await page.getByLabel('How much').nth(1).fill('2');
    await page.reload();
    await page.getByText('What you wrote here before is still on the page.').waitFor();
    await page.getByLabel('It holds, brim full').fill('5.5');
    await page.getByRole('region', { name: 'What it comes to' }).waitFor();
    await page.getByRole('button', { name: 'Blended', exact: true }).click();
    await page.getByText('Done and logged.').waitFor();
    await page.getByRole('link', { name: 'Long hedge, blended', exact: true }).click();
    await page.waitForURL((url) => !url.pathname.includes(long.id));
    await open(page, `${new URL(page.url()).pathname}/work?do=family`);
    const from = page.getByRole('region', { name: 'Where it comes from' });
    await from.getByText('3 L blended in').waitFor();
    await from.getByText('2 L blended in').waitFor();
    await page.getByText('60 % Long hedge, 40 % Sharp crab').waitFor();
    expect(complaints).toEqual([]);
    await context.close();
  });
});

describe('a batch at work', () => {
  it('is shared from its page, says at the field what is wrong, and tells of a link that could not be revoked', async () => {
    const batch = await ciderAt(brewer, { readDaysAgo: [], batch: { name: 'Early windfall' } });
    const { page, context } = await visit({ phone: true });
    await open(page, `/batches/${batch.id}`);
    const links = page.getByRole('region', { name: 'Share links' });
    await links.getByRole('button', { name: 'Share it by a link' }).click();
    await links.getByLabel('open for').fill('0');
    await links.getByRole('button', { name: 'Make a link' }).click();
    await links.getByText('must be at least a day').waitFor();
    expect(await links.getByLabel('open for').getAttribute('aria-invalid')).toBe('true');
    await links.getByLabel('open for').fill('30');
    await links.getByRole('button', { name: 'Make a link' }).click();
    const address = await links.getByRole('link', { name: /\/share\// }).getAttribute('href');
    expect((await fetch(address!)).status).toBe(200);

    // Left open elsewhere it shows what is read meanwhile, and says when it was revoked.
    const guest = await browser.visit({ phone: true });
    await guest.page.clock.install();
    await guest.page.goto(address!);
    await guest.page.getByText('not known', { exact: true }).first().waitFor();
    await readAt(batch, 0.998, Date.now());
    await guest.page.clock.fastForward(61_000);
    await guest.page.getByText('0.998', { exact: true }).first().waitFor();
    // The picture that came with it is as wide as the page.
    await guest.page.getByRole('img', { name: /^Gravity fell/ }).waitFor();
    await expect.poll(() => guest.page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)).toBe(0);

    await page.reload();
    await page.route('**/api/v1/**', (route) => (route.request().method() === 'DELETE' ? route.abort() : route.continue()));
    await links.getByRole('button', { name: 'Revoke' }).click();
    await links.getByRole('alert').waitFor();
    await page.unroute('**/api/v1/**');
    await links.getByRole('button', { name: 'Revoke' }).click();
    await links.getByRole('link', { name: /\/share\// }).waitFor({ state: 'hidden' });
    await guest.page.clock.fastForward(61_000);
    await guest.page.getByRole('heading', { name: 'This link no longer opens anything' }).waitFor();
    await guest.context.close();
    await expectNoSidewaysScroll(page);
    await context.close();
  });
});

describe('the rounds', () => {
  it('go into a calendar by a private address, until it is ended', async () => {
    const { page, context } = await visit({ phone: true });
    await open(page, '/rounds');
    await page.getByRole('button', { name: 'Add a job' }).click();
    await page.getByLabel('What is to be done').fill('Wash twelve half-litre bottles; count them, too');
    await page.getByRole('button', { name: 'Put it down' }).click();
    await page.getByText('Wash twelve half-litre bottles').first().waitFor();
    await page.getByRole('button', { name: 'Calendar' }).click();
    await page.getByRole('button', { name: 'Make an address' }).click();
    const address = await page.getByLabel('Address to subscribe to').inputValue();
    const answer = await fetch(address);
    expect(answer.headers.get('content-type')).toContain('text/calendar');
    const text = await answer.text();
    // RFC 5545: lines of at most 75 octets, folded; text escaped.
    for (const line of text.split('\r\n')) expect(Buffer.byteLength(line)).toBeLessThanOrEqual(75);
    expect(text.replaceAll('\r\n ', '')).toContain('SUMMARY:Wash twelve half-litre bottles\\; count them\\, too');
    await page.getByRole('button', { name: 'End this address' }).click();
    await page.getByRole('button', { name: 'Make an address' }).waitFor();
    expect((await fetch(address)).status).toBe(404);
    await context.close();
  });
});

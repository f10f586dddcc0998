import { readFile } from 'node:fs/promises';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { Batch, Entry, ImportRun, Lot, Webhook } from '@/db/models';
import { readingsOfBatch } from '@/db/queries/batch-readings';
import { expectAccessible, expectNoSidewaysScroll, useBrowser, type Visit } from '../support/browser';
import { ciderAt } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember } from '../support/factories';
import { until } from '../support/processes';
import { startWeb, type Web } from '../support/web';

const db = useDatabase();
const browser = useBrowser();
let web: Web;
let keeper: Awaited<ReturnType<typeof buildMember>>;
let batch: Batch;
const visits: Visit[] = [];

beforeAll(async () => {
  web = await startWeb({ databaseUrl: db.url });
  keeper = await buildMember('keeper', { name: 'Una Thorne' });
  batch = await buildBatch({ cellarId: keeper.cellarId, name: '<b>Oat</b> stout', pitchedAt: new Date(Date.now() - 3 * 86_400_000), originalGravity: 1.05 });
}, 700_000);
afterAll(() => web?.stop());
afterEach(() => Promise.all(visits.splice(0).map(({ context }) => context.close())));

async function settings(page: string, options: Parameters<typeof browser.visitAs>[2] = {}, personId = keeper.personId): Promise<Visit> {
  const visit = await browser.visitAs(personId, web.url, options);
  visits.push(visit);
  await visit.page.goto(`${web.url}/settings/${page}`);
  return visit;
}
async function expectGood({ page, complaints }: Visit): Promise<void> {
  await expectAccessible(page);
  await expectNoSidewaysScroll(page);
  expect(complaints).toEqual([]);
}
const csv = (rows: string) => ({ name: 'log.csv', mimeType: 'text/csv', buffer: Buffer.from(`time;SG;temp\n${rows}`) });

describe('data in and out', () => {
  it('shows what a log file would bring, keeps it in a batch, and takes it out again', async () => {
    const visit = await settings('data');
    const { page } = visit;
    const day = new Date(Date.now() - 86_400_000).toISOString().slice(0, 10);
    await page.getByLabel('file').setInputFiles(csv(`${day} 06:00;1,049;18,5\n${day} 07:00;1,048;18,6\nnever;1,047;18\n`));
    await page.getByText('2 lines understood, 1 not.').waitFor();
    await page.getByText('“never” is no time').waitFor();
    expect(await ImportRun.count()).toBe(0);
    await expectGood(visit);
    await page.getByLabel('into').selectOption({ label: '<b>Oat</b> stout' });
    await page.getByRole('button', { name: 'Keep 2 readings' }).click();
    await page.getByText('Kept: 2 readings, 0 doubled, 1 refused.').waitFor();
    expect((await readingsOfBatch(batch.id)).map(({ gravity }) => gravity)).toEqual([1.049, 1.048]);
    await page.getByRole('button', { name: 'Take out', exact: true }).click();
    await page.getByRole('button', { name: 'Take all of it out' }).click();
    await until('the readings gone', async () => (await readingsOfBatch(batch.id)).length === 0, 20_000);
    await page.getByText(/^Kept:/).waitFor({ state: 'hidden' });
  });

  it('says beside the batch that is chosen what is from before its pitch, and no more of it for another', async () => {
    const late = await buildBatch({ cellarId: keeper.cellarId, name: 'Late pitch', pitchedAt: new Date(Date.now() - 3_600_000) });
    const visit = await settings('data', { phone: true });
    const { page } = visit;
    const day = new Date(Date.now() - 2 * 86_400_000).toISOString().slice(0, 10);
    await page.getByLabel('file').setInputFiles(csv(`${day} 06:00;1,049;18,5\n${day} 07:00;1,048;18,6\n`));
    await page.getByLabel('into').selectOption({ label: 'Late pitch' });
    const note = page.getByText('from before Late pitch was pitched');
    await note.waitFor();
    await expectGood(visit);
    await page.getByLabel('into').selectOption({ label: '<b>Oat</b> stout' });
    await note.waitFor({ state: 'hidden' });
    await late.destroy();
  });

  it('keeps a choice of column that was made before the answer to the one before it', async () => {
    const visit = await settings('data');
    const { page } = visit;
    const day = new Date(Date.now() - 86_400_000).toISOString().slice(0, 10);
    await page.getByLabel('file').setInputFiles({ name: 'log.csv', mimeType: 'text/csv', buffer: Buffer.from(`a;b;c\n${day} 06:00;18,5;1,049\n`) });
    await page.getByText('0 lines understood, 1 not.').waitFor();
    // A slow network, and the first answer later than the last.
    let asked = 0;
    await page.route('**/api/v1/imports/preview', async (route) => {
      asked += 1;
      await new Promise((resolve) => setTimeout(resolve, asked === 1 ? 3_000 : 800));
      await route.continue();
    });
    await page.getByLabel('time', { exact: true }).selectOption('a');
    await page.getByLabel('gravity', { exact: true }).selectOption('c');
    await page.getByLabel('temperature', { exact: true }).selectOption('b');
    await page.getByText('1 line understood.').waitFor();
    await new Promise((resolve) => setTimeout(resolve, 3_500));
    expect(await page.getByText('1 line understood.').count()).toBe(1);
    expect(await page.getByLabel('gravity', { exact: true }).inputValue()).toBe('2');
    await page.context().close();
  });

  it('says what is wrong with a file that is none, and keeps nothing', async () => {
    const visit = await settings('data', { phone: true, night: true });
    const { page } = visit;
    await page.getByLabel('file').setInputFiles({ name: 'a.csv', mimeType: 'text/csv', buffer: Buffer.from('time,gravity\n"2026') });
    await page.getByText(/The file cannot be read at line \d+: a quote is never closed\./).waitFor();
    await page.getByRole('radio', { name: 'Archive' }).check();
    await page.getByLabel('file').setInputFiles({ name: 'a.json', mimeType: 'application/json', buffer: Buffer.from('{"format":"else"}') });
    await page.getByText(/no archive of this house/).waitFor();
    expect(await ImportRun.count({ where: { undoneAt: null } })).toBe(0);
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
  });

  it('saves the cellar as a file, which another cellar takes in by the same page', async () => {
    const cider = await ciderAt(keeper, { now: Date.now() });
    const visit = await settings('data');
    const download = visit.page.waitForEvent('download');
    await visit.page.getByRole('listitem').filter({ hasText: 'Archive (JSON)' }).getByRole('link', { name: 'Save' }).click();
    const file = await readFile(await (await download).path());
    const other = await buildMember('keeper', { name: 'Una Thorne' });
    const there = await settings('data', { night: true }, other.personId);
    await there.page.getByRole('radio', { name: 'Archive' }).check();
    await there.page.getByLabel('file').setInputFiles({ name: 'cellar.json', mimeType: 'application/json', buffer: file });
    await there.page.getByText('2 batches understood.').waitFor();
    await expectGood(there);
    await there.page.getByRole('button', { name: 'Keep 2 batches' }).click();
    await there.page.getByText(/^Kept: 2 batches, 3 entries/).waitFor();
    expect((await Batch.findAll({ where: { cellarId: other.cellarId }, order: [['createdAt', 'ASC']] })).map(({ name }) => name)).toEqual([batch.name, cider.name]);
    expect(await Entry.count({ where: { cellarId: other.cellarId, kind: 'reading' } })).toBe(2);
    expect(await Lot.count({ where: { cellarId: other.cellarId } })).toBe(0);
  });
});

describe('webhooks', () => {
  it('show their key once, say what is wrong with an address, and are switched off and removed', async () => {
    const visit = await settings('webhooks');
    const { page } = visit;
    await page.getByText('None yet.').waitFor();
    await page.getByLabel('address').fill('https://localhost/x');
    await page.getByRole('button', { name: 'Add it' }).click();
    await page.getByText('leads into this network; the operator has to allow that').waitFor();
    await page.getByLabel('address').fill('https://listener.example/fallbright');
    await page.getByRole('button', { name: 'Add it' }).click();
    await page.getByText(/whsec_/).waitFor();
    visit.complaints.splice(0);
    await expectGood(visit);
    await page.getByRole('button', { name: 'It is kept' }).click();
    expect(await page.getByText(/whsec_/).count()).toBe(0);
    await page.getByRole('button', { name: 'Try it' }).click();
    // In the log and, once the list is asked again, beside the address.
    await page.getByText('Waits').first().waitFor();
    await Webhook.update({ disabledAt: new Date(), givenUpAt: new Date(), failingSince: new Date(Date.now() - 6 * 86_400_000) }, { where: { cellarId: keeper.cellarId } });
    await page.reload();
    await page.getByText(/Switched off by the house .*: nothing arrived since/).waitFor();
    await expectGood(visit);
    await page.getByRole('button', { name: 'Switch it on' }).click();
    await page.getByRole('button', { name: 'Switch it off' }).waitFor();
    await page.getByRole('button', { name: 'Remove' }).click();
    await page.getByRole('button', { name: 'Remove it with its log' }).click();
    await page.getByText('None yet.').waitFor();
  });
});

describe('the page of the API', () => {
  it('finds a call, sends it, and asks twice before it changes something', async () => {
    const visit = await settings('api', { night: true });
    const { page } = visit;
    await page.getByText('/batches', { exact: true }).first().waitFor();
    await page.getByText('/batches', { exact: true }).first().click();
    await page.getByRole('button', { name: 'Send it' }).first().click();
    await page.getByText('answered 200').waitFor();
    await page.getByText('"name": "<b>Oat</b> stout"').waitFor();
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
  });

  it.each([{ phone: true }, { phone: true, night: true }])('fits a phone, for every eye: %j', async (options) => {
    const visit = await settings('api', options);
    await visit.page.getByText('/batches', { exact: true }).first().waitFor();
    await expectGood(visit);
  });
});

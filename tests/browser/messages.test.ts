import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { Alert, type Batch } from '@/db/models';
import { keepTakeLinks } from '@/db/queries/take-links';
import { choicesOf, messageTimesOf, ruleSettingsOf } from '@/db/queries/messages';
import { mutesOf } from '@/db/queries/mutes';
import { hashLinkToken, linkTokenOf } from '@/lib/auth/link-tokens';
import type { Call } from '@/lib/core/types';
import { randomUUID } from 'node:crypto';
import { expectAccessible, expectNoSidewaysScroll, useBrowser, type Visit } from '../support/browser';
import { useDatabase } from '../support/database';
import { buildBatch, buildCellar, buildMember } from '../support/factories';
import { until } from '../support/processes';
import { startWeb, type Web } from '../support/web';

const db = useDatabase();
const browser = useBrowser();
/** An open page holds its event stream, and with it the server, for as long as it stands. */
const visits: Visit[] = [];
const visitAs = async (...given: Parameters<typeof browser.visitAs>) => held(await browser.visitAs(...given));
const held = (visit: Visit) => (visits.push(visit), visit);
let web: Web;
let una: Awaited<ReturnType<typeof buildMember>>;
let batch: Batch;
const EVIDENCE: Call = { verdict: 'yes', kind: 'stuck', since: 0, expectedAt: null, headline: 'Stopped at 1.041.', reason: 'No fall for 31 h.', act: 'Warm it.', changesIt: null, evidence: [] };

beforeAll(async () => {
  web = await startWeb({ databaseUrl: db.url });
  const { id: cellarId } = await buildCellar({ name: 'Stone loft' });
  una = await buildMember('keeper', { cellarId, name: 'Una Thorne' });
  await buildMember('brewer', { cellarId, name: 'Piet Marsh' });
  batch = await buildBatch({ cellarId, name: 'Oat stout', tag: 5, pitchedAt: new Date(Date.now() - 86_400_000) });
}, 700_000);
afterAll(() => web?.stop());
afterEach(() => Promise.all(visits.splice(0).map(({ context }) => context.close())));

const openAlert = () => Alert.create({ cellarId: una.cellarId, batchId: batch.id, call: 'stalled', kind: 'stuck', level: 'check', state: 'open', since: new Date(), openedAt: new Date(), evidence: EVIDENCE });

describe('the page of messages', () => {
  it('keeps quiet hours, a choice, a rule and who waits, and is for every hand and eye', async () => {
    const { page, complaints } = await visitAs(una.personId, web.url);
    const missing: string[] = [];
    page.on('response', (response) => response.status() >= 400 && missing.push(`${response.status()} ${response.url()}`));
    await page.goto(`${web.url}/settings/messages`);
    await page.getByRole('heading', { name: 'Ready to rack' }).waitFor();
    await page.getByRole('button', { name: 'Keep some' }).click();
    await page.getByLabel('From').fill('21:30');
    await page.getByRole('button', { name: 'Keep these' }).click();
    await page.getByText(/From\s+21:30\s+to\s+07:00/).waitFor();
    expect((await messageTimesOf(una.personId)).quiet).toEqual({ fromMin: 1290, toMin: 420 });

    await page.getByRole('checkbox', { name: 'Ready to rack, by mail' }).uncheck();
    await until('the choice', async () => (await choicesOf(una.cellarId, una.personId)).length === 1);

    await page.getByRole('button', { name: 'Set: Too warm or too cold' }).click();
    await page.getByLabel('Told after it was so for').selectOption({ label: '3 h' });
    await page.getByRole('button', { name: 'Set it so' }).click();
    await page.getByText(/outside the batch’s range for\s+3 h/).waitFor();
    expect(await ruleSettingsOf(una.cellarId, null)).toMatchObject([{ rule: 'temperature', forMin: 180, enabled: true }]);

    await page.getByLabel('Let somebody wait').selectOption({ label: 'Piet Marsh' });
    await page.getByRole('button', { name: 'Tell them so' }).click();
    await page.getByText(/after\s+30 min\s+without an answer/).waitFor();

    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
    expect(missing).toEqual([]);
    expect(complaints).toEqual([]);
    const phone = await visitAs(una.personId, web.url, { phone: true, night: true });
    await phone.page.goto(`${web.url}/settings/messages`);
    await phone.page.getByRole('heading', { name: 'Ready to rack' }).waitFor();
    await expectAccessible(phone.page);
    await expectNoSidewaysScroll(phone.page);
  });

  it('mutes a vessel from its alert, and says so there and on its page', async () => {
    const alert = await openAlert();
    const { page } = await visitAs(una.personId, web.url);
    await page.goto(`${web.url}/alerts?alert=${alert.id}`);
    await page.getByRole('button', { name: 'Mute this vessel' }).click();
    await page.getByRole('button', { name: '2 h', exact: true }).click();
    await page.getByText(/Muted until .* by Una Thorne/).waitFor();
    expect(await mutesOf(una.cellarId, new Date())).toHaveLength(1);
    await page.goto(`${web.url}/batches/${batch.id}`);
    await page.getByText(/Muted until .* by Una Thorne/).waitFor();
    await page.getByRole('button', { name: 'Tell us again' }).click();
    await page.getByRole('button', { name: 'Mute this vessel' }).waitFor();
    expect(await mutesOf(una.cellarId, new Date())).toEqual([]);
    await alert.destroy();
  });
});

describe('the page behind a mailed link', () => {
  it('takes nothing by being opened, and the alert by its button, with nobody signed in', async () => {
    const alert = await openAlert();
    const id = randomUUID();
    const token = linkTokenOf('take', id);
    await keepTakeLinks([{ id, alertId: alert.id, personId: una.personId, tokenHash: hashLinkToken(token) }], new Date(Date.now() + 3_600_000));
    const { page } = held(await browser.visit({ phone: true }));
    await page.goto(`${web.url}/take/${token}`);
    await page.getByRole('heading', { name: /Stopped at\s+1\.041/ }).waitFor();
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
    expect((await alert.reload()).state).toBe('open');
    await page.getByRole('button', { name: 'I have it' }).click();
    await page.getByText('Una Thorne has it.').waitFor();
    expect(await alert.reload()).toMatchObject({ state: 'acknowledged', acknowledgedBy: una.personId });
    await page.reload();
    await page.getByText('Una Thorne has it.').waitFor();
    expect(await page.getByRole('button', { name: 'I have it' }).count()).toBe(0);
  });

  it('says in a sentence that a made-up link opens nothing', async () => {
    const { page } = held(await browser.visit());
    await page.goto(`${web.url}/take/${'x'.repeat(32)}`);
    await page.getByText('This link no longer opens anything').waitFor();
  });
});

import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Page } from 'playwright-core';
import { Alert, Batch, Membership, Person } from '@/db/models';
import { hashPassword } from '@/lib/auth/passwords';
import { readingsTopic } from '@/lib/contracts/topics';
import { expectAccessible, expectNoSidewaysScroll, settled, useBrowser } from '../support/browser';
import { useDatabase } from '../support/database';
import { signIn } from '../support/devices';
import { buildCellar, buildMember, buildSensor } from '../support/factories';
import { startHouse, type House } from '../support/house';
import { startProcess, until } from '../support/processes';

const db = useDatabase();
const browser = useBrowser();
let house: House;
let brewer: Person;
let cellarId: string;
const PASSPHRASE = 'a slow bubble in the dark';

beforeAll(async () => {
  house = await startHouse(db.url);
  const cellar = await buildCellar({ name: 'Stone loft' });
  cellarId = cellar.id;
  brewer = await Person.create({ name: 'Wren Holt', email: 'wren@loft.example', passwordHash: await hashPassword(PASSPHRASE) });
  await Membership.create({ cellarId, personId: brewer.id, role: 'brewer' });
}, 600_000);

afterAll(async () => {
  await house.stop();
});

async function signInAt(page: Page, passphrase: string) {
  await page.goto(`${house.web.url}/sign-in`);
  await page.getByLabel('e-mail').fill('wren@loft.example');
  await page.getByLabel('passphrase').fill(passphrase);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

describe('somebody comes to an empty cellar', () => {
  it('is told in a sentence that a passphrase is wrong, and stays out', async () => {
    const { page, context } = await browser.visit();
    await page.goto(`${house.web.url}/shelf`);
    await page.waitForURL(/sign-in/);
    await signInAt(page, 'not the one');
    await page.getByText('do not belong together').waitFor();
    expect(page.url()).toContain('/sign-in');
    await context.close();
  });

  it('signs in, sees an empty shelf that offers a start, and no complaint of the browser', async () => {
    const { page, context, complaints } = await browser.visit();
    await signInAt(page, PASSPHRASE);
    await page.waitForURL(/shelf/);
    await page.getByRole('link', { name: 'Start a batch' }).first().waitFor();
    expect(complaints).toEqual([]);
    await context.close();
  });
});

describe('a batch from the form to its first readings', () => {
  it('starts a batch with a sensor, and a reading sent over MQTT stands on the open page within two seconds', async () => {
    const { sensor, secret } = await buildSensor({ cellarId, name: 'Float 21' });
    const { page, context, complaints } = await browser.visitAs(brewer.id, house.web.url);
    await page.goto(`${house.web.url}/batches/new`);
    await page.getByLabel('Name').fill('Rhubarb wine');
    await page.getByRole('radio', { name: 'country wine' }).check();
    await page.getByLabel('It holds, brim full').fill('5');
    await page.getByLabel('In it now').fill('4.5');
    await page.getByLabel('Original gravity').fill('1.080');
    await page.getByLabel('Sensor').selectOption({ label: 'Float 21' });
    await page.getByRole('button', { name: 'Start the batch' }).click();
    await page.waitForURL(/batches\/[0-9a-f-]{36}$/);
    await page.getByRole('heading', { level: 1, name: 'Rhubarb wine' }).filter({ visible: true }).waitFor();

    const client = await signIn({ port: house.mqttPort, sensor: sensor.identifier, secret });
    const marked = await page.evaluate(() => {
      (window as { sameDocument?: boolean }).sameDocument = true;
      return true;
    });
    expect(marked).toBe(true);
    await page.getByRole('button', { name: 'The same numbers as a table' }).or(page.getByText('The same numbers as a table')).first().click();
    await client.publishAsync(readingsTopic(sensor.identifier), JSON.stringify({ gravity: 1.0771, temperature: 18.6 }), { qos: 1 });
    const acknowledged = Date.now();
    await page.getByRole('cell', { name: '1.077' }).first().waitFor({ timeout: 5_000 });
    expect(Date.now() - acknowledged).toBeLessThan(2_000);
    expect(await page.evaluate(() => (window as { sameDocument?: boolean }).sameDocument)).toBe(true);
    await client.endAsync();
    expect(complaints).toEqual([]);
    await context.close();
  });

  it('tells what is wrong beside the field, and loses nothing that was typed', async () => {
    const { page, context } = await browser.visitAs(brewer.id, house.web.url);
    await page.goto(`${house.web.url}/batches/new`);
    await page.getByLabel('Name').fill('Too much of it');
    await page.getByLabel('It holds, brim full').fill('5');
    await page.getByLabel('In it now').fill('6');
    await page.getByRole('button', { name: 'Start the batch' }).click();
    await page.getByText('is more than the vessel holds').waitFor();
    expect(await page.getByLabel('Name').inputValue()).toBe('Too much of it');
    expect(page.url()).toContain('/batches/new');
    await context.close();
  });

  it('logs a hydrometer reading by hand on a phone', async () => {
    const { page, context } = await browser.visitAs(brewer.id, house.web.url, { phone: true });
    await page.goto(`${house.web.url}/shelf`);
    await page.getByRole('link', { name: /Rhubarb wine/ }).click();
    await page.getByRole('button', { name: /Read by hand/ }).filter({ visible: true }).first().click();
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel(/gravity/i).first().fill('1.076');
    await dialog.getByRole('button', { name: 'Read', exact: true }).click();
    await dialog.waitFor({ state: 'hidden' });
    await page.getByText('1.076').filter({ visible: true }).first().waitFor();
    await expectNoSidewaysScroll(page);
    await context.close();
  });
});

describe('a ferment that stalls', () => {
  it('comes to the page as an alert and to the mailbox as a mail, and is taken in hand', async () => {
    const { sensor, secret } = await buildSensor({ cellarId, name: 'Float 22' });
    const { page, context } = await browser.visitAs(brewer.id, house.web.url);
    const hours = 162;
    const from = Math.floor(Date.now() / 1000 - hours * 3600) * 1000;
    const created = await page.request.post(`${house.web.url}/api/v1/batches`, {
      headers: { 'sec-fetch-site': 'same-origin', origin: house.web.url },
      data: {
        name: 'Cold stout', kind: 'beer', drink_colour: 'stout', vessel_kind: 'carboy', tag: 5, place: 'by the door', volume_l: 10, vessel_l: 15, neck: 'airlock',
        pitched_at: new Date(from).toISOString(), original_gravity: 1.068, attenuation_min_percent: 72, attenuation_max_percent: 78, alcohol_tolerance_abv: 11,
        temperature_min_c: 18, temperature_max_c: 23, sensor: sensor.identifier,
      },
    });
    expect(created.status()).toBe(201);

    await page.goto(`${house.web.url}/alerts`);
    const simulator = await startProcess('devices/simulator/main.ts', house.variables, 'simulated floats at work', [
      '--scenario', 'stuck-cold', '--sensor', sensor.identifier, '--secret', secret, '--seed', '15', '--from', new Date(from).toISOString(), '--speed', '40000',
    ]);
    try {
      const row = page.getByRole('listitem').filter({ hasText: 'Cold stout' }).filter({ hasText: /Stopped at|No fall|flat/ });
      await row.first().waitFor({ timeout: 200_000 });
      const mail = await until('the mail about the stall', async () => (await house.mails()).find(({ text, to }) => to.includes('wren@loft.example') && /Cold stout/.test(text) && /(Stopped at|No fall|flat)/.test(text)), 60_000);
      expect(mail.text).toContain(`${house.web.url}/batches/`);
      expect(mail.text).toMatch(/by the door/);

      await row.first().getByRole('button', { name: 'I have it' }).click();
      // Whoever takes it says when they look again.
      await page.getByRole('button', { name: /^I have it, look/ }).click();
      await page.getByText('Wren Holt has it').first().waitFor();
      const alerts = (await (await page.request.get(`${house.web.url}/api/v1/alerts?state=acknowledged`)).json()) as { items: Array<{ call: string; acknowledged_by: { name: string } }> };
      expect(alerts.items.map(({ call, acknowledged_by }) => [call, acknowledged_by.name])).toContainEqual(['stalled', 'Wren Holt']);
    } finally {
      simulator.kill('SIGTERM');
      await simulator.ended;
      await context.close();
    }
  });
});

describe('every screen', () => {
  const SCREENS = ['/shelf', '/alerts', '/sensors', '/settings', '/batches/new', 'batch'];

  it.each([false, true])('has no serious barrier and no sideways scroll on a desk (night: %s)', async (night) => {
    const { page, context } = await browser.visitAs(brewer.id, house.web.url, { night });
    for (const screen of SCREENS) {
      await open(page, screen);
      await expectAccessible(page);
      await expectNoSidewaysScroll(page);
    }
    await context.close();
  });

  it.each([false, true])('has no serious barrier and no sideways scroll on a phone (night: %s)', async (night) => {
    const { page, context } = await browser.visitAs(brewer.id, house.web.url, { night, phone: true });
    for (const screen of SCREENS) {
      await open(page, screen);
      await expectAccessible(page);
      await expectNoSidewaysScroll(page);
    }
    await context.close();
  });

  async function open(page: Page, screen: string) {
    if (screen !== 'batch') await page.goto(`${house.web.url}${screen}`);
    else {
      const { items } = (await (await page.request.get(`${house.web.url}/api/v1/batches`)).json()) as { items: Array<{ id: string }> };
      await page.goto(`${house.web.url}/batches/${items[0]!.id}`);
    }
    await settled(page);
  }
});

describe('by keyboard', () => {
  it('goes from lane to lane by arrows and opens one by Enter', async () => {
    const { page, context } = await browser.visitAs(brewer.id, house.web.url);
    await page.goto(`${house.web.url}/shelf`);
    const lanes = page.locator('[data-lane]');
    await lanes.first().waitFor();
    await page.keyboard.press('ArrowDown');
    const first = await page.evaluate(() => document.activeElement?.getAttribute('data-lane'));
    await page.keyboard.press('ArrowDown');
    const second = await page.evaluate(() => document.activeElement?.getAttribute('data-lane'));
    expect(first).toBeTruthy();
    expect(second).toBeTruthy();
    expect(second).not.toBe(first);
    await page.keyboard.press('Enter');
    await page.waitForURL(new RegExp(`/batches/${second}`));
    await context.close();
  });
});

describe('a guest', () => {
  it('reads everything of the batch and is offered nothing to change', async () => {
    const guest = await Person.create({ name: 'Lin Dace', email: 'lin@loft.example' });
    await Membership.create({ cellarId, personId: guest.id, role: 'guest' });
    const { page, context } = await browser.visitAs(guest.id, house.web.url);
    await page.goto(`${house.web.url}/shelf`);
    await page.getByRole('link', { name: /Rhubarb wine/ }).click();
    await page.getByRole('heading', { level: 1, name: 'Rhubarb wine' }).filter({ visible: true }).waitFor();
    await page.getByText('1.076').filter({ visible: true }).first().waitFor();
    for (const name of ['Read by hand', 'Write in the log', 'Set-up', 'Add']) expect(await page.getByRole('button', { name, exact: true }).filter({ visible: true }).count()).toBe(0);
    await context.close();
  });
});

describe('a shelf of more vessels than one answer holds', () => {
  it('says how many are shown of how many, and shows the rest when asked', async () => {
    const keeper = await buildMember('keeper');
    const days = (count: number) => new Date(Date.now() - count * 86_400_000);
    const { cellarId: many } = keeper;
    await Batch.bulkCreate(Array.from({ length: 503 }, (_, index) => ({ cellarId: many, name: `Trial ${index + 1}`, kind: 'cider' as const, drinkColour: 'straw', vesselKind: 'demijohn' as const, volumeL: 4.5, vesselL: 5, neck: 'airlock' as const, state: 'working' as const, createdAt: days(index) })));
    // The oldest of all: by age alone it would be on no first page.
    const oldest = await Batch.findOne({ where: { cellarId: many, name: 'Trial 503' }, rejectOnEmpty: true });
    const call = { verdict: 'yes' as const, kind: 'stuck', since: Date.now(), expectedAt: null, headline: 'Stopped at 1.041.', reason: 'Flat for 31 h.', act: null, changesIt: null, evidence: [] };
    await Alert.create({ cellarId: many, batchId: oldest.id, call: 'stalled', kind: 'stuck', level: 'check', state: 'open', since: new Date(), openedAt: new Date(), evidence: call });
    const { page, context } = await browser.visitAs(keeper.personId, house.web.url, { phone: true });
    await page.goto(`${house.web.url}/shelf`);
    await page.getByText('Shown are 1 to 500 of 503 vessels').waitFor({ timeout: 60_000 });
    expect(await page.locator('[data-lane]').count()).toBe(500);
    expect(await page.locator(`[data-lane="${oldest.id}"]`).count()).toBe(1);
    await expectNoSidewaysScroll(page);
    await page.getByRole('button', { name: 'Show the next 3' }).click();
    await page.getByText('Shown are 501 to 503 of 503 vessels').waitFor({ timeout: 60_000 });
    expect(await page.locator('[data-lane]').count()).toBe(3);
    await page.getByRole('button', { name: 'Back to the first' }).click();
    await page.getByText('Shown are 1 to 500 of 503 vessels').waitFor({ timeout: 60_000 });
    await context.close();
  }, 240_000);
});

describe('without the network', () => {
  it('says since when, keeps what it showed, and catches up by itself', async () => {
    const { page, context } = await browser.visitAs(brewer.id, house.web.url);
    await page.goto(`${house.web.url}/shelf`);
    await page.locator('[data-lane]').first().waitFor();
    await context.setOffline(true);
    await page.getByText(/Offline( since|\. Shown as of)/).waitFor({ timeout: 60_000 });
    expect(await page.locator('[data-lane]').count()).toBeGreaterThan(0);
    await context.setOffline(false);
    await page.getByText(/Offline( since|\. Shown as of)/).waitFor({ state: 'hidden', timeout: 60_000 });
    await context.close();
  });
});

import type { Page } from 'playwright-core';
import { toString as drawCode } from 'qrcode';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { CalibrationPointRow, CalibrationRow, Entry, Membership, Person, Sensor, SensorLimit } from '@/db/models';
import { expectAccessible, expectNoSidewaysScroll, useBrowser } from '../support/browser';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember, buildSensor } from '../support/factories';
import { until } from '../support/processes';
import { startWeb, type Web } from '../support/web';

const db = useDatabase();
const browser = useBrowser();
let web: Web;
let keeper: Person;
let cellarId: string;

beforeAll(async () => {
  web = await startWeb({ databaseUrl: db.url });
  const made = await buildMember('keeper');
  ({ cellarId, person: keeper } = made);
  // Reads °P, °F and US gallons everywhere below.
  await keeper.update({ gravityUnit: 'plato', temperatureUnit: 'f', volumeUnit: 'us_gal' });
}, 700_000);
afterAll(async () => {
  await web?.stop();
});

const send = (id: string, secret: string, body: unknown) =>
  fetch(`${web.url}/api/v1/telemetry`, { method: 'POST', headers: { authorization: `Bearer ${id}:${secret}`, 'content-type': 'application/json' }, body: JSON.stringify(body) }).then((answer) => answer.json() as Promise<{ stored: number; refused: unknown[] }>);

async function sound(page: Page) {
  await expectAccessible(page);
  await expectNoSidewaysScroll(page);
}

describe('a new sensor', () => {
  it('is paired by a code and lines to paste, shows its first message, taken or refused, and its secret this once', async () => {
    const { page, context } = await browser.visitAs(keeper.id, web.url, { phone: true });
    await page.goto(`${web.url}/sensors/new`);
    await page.getByLabel('name', { exact: true }).fill('Float 21');
    await sound(page);
    await page.getByRole('button', { name: 'Add it' }).click();
    await page.getByRole('heading', { name: 'The secret is shown this one time' }).waitFor();
    const row = await Sensor.findOne({ where: { cellarId, name: 'Float 21' }, rejectOnEmpty: true });
    const lines = await page.locator('pre').allInnerTexts();
    expect(lines[0]).toBe(row.identifier);
    const secret = lines[1]!;
    const posted = lines.find((line) => line.startsWith('curl'))!;
    expect(posted).toContain(`Bearer ${row.identifier}:${secret}`);

    // The picture is the code of what its caption says, and of nothing else.
    const picture = page.getByRole('img', { name: /Code with the sensor’s identifier/ }).locator('img');
    const shown = decodeURIComponent((await picture.getAttribute('src'))!.replace('data:image/svg+xml;utf8,', ''));
    const mqtt = /-h (\S+) -p (\d+)/.exec(lines.find((line) => line.startsWith('mosquitto_pub'))!)!;
    const text = JSON.stringify({ sensor: row.identifier, secret, mqtt: `${mqtt[1]}:${mqtt[2]}`, topic: `fallbright/v1/${row.identifier}/readings`, http: /POST (\S+)/.exec(posted)![1] });
    expect(shown).toBe(await drawCode(text, { type: 'svg', errorCorrectionLevel: 'M', margin: 2, color: { dark: '#14201a', light: '#f9fbf6' } }));

    const first = page.getByRole('region', { name: 'First message' });
    await first.getByText('Nothing yet').waitFor();
    expect(await send(row.identifier, secret, { gravity: 9, temperature: 20 })).toMatchObject({ stored: 0, refused: [{}] });
    await first.getByText('Refused').waitFor();
    expect(await send(row.identifier, secret, { gravity: 1.04003, temperature: 20, battery: 4.1 })).toMatchObject({ stored: 1 });
    await first.getByText('Heard').waitFor();
    await first.getByText('10.0 °P').waitFor();
    await first.getByText('68.0 °F').waitFor();
    await sound(page);
    await page.getByRole('link', { name: 'It is in the sensor' }).click();
    await page.waitForURL(`**/sensors/${row.identifier}`);
    await page.getByRole('heading', { name: 'Float 21' }).waitFor();
    expect(await page.content()).not.toContain(secret);
    await sound(page);
    await context.close();
  });
});

describe('a calibration', () => {
  it('is made on the screen from points in the person’s own units, refused where it bends back, and kept as a version', async () => {
    const { sensor, secret } = await buildSensor({ cellarId, name: 'Leaning float' });
    expect(await send(sensor.identifier, secret, { inclination: 25.3, temperature: 20 })).toMatchObject({ stored: 1 });
    const { page, context } = await browser.visitAs(keeper.id, web.url);
    await page.goto(`${web.url}/sensors/${sensor.identifier}`);
    const bench = page.getByRole('region', { name: 'Calibration' });
    await bench.getByText('No points yet').waitFor();
    await sound(page);
    await bench.getByRole('radio', { name: 'Hydrometer' }).click();
    const note = async (gravity: string, leans: string) => {
      await bench.getByLabel(/gravity at/).fill(gravity);
      await bench.getByLabel('it leans').fill(leans);
      await bench.getByLabel('the liquid is').fill('68');
      await bench.getByRole('button', { name: 'Note the point' }).click();
      await until(`the field to be free after ${gravity}`, async () => (await bench.getByLabel('it leans').inputValue()) === '');
    };
    // Who reads °P may write an SG too.
    for (const [gravity, leans] of [['0', '25'], ['5', '36'], ['1.040', '47'], ['15', '60']] as const) await note(gravity, leans);
    const points = await CalibrationPointRow.findAll({ where: { sensorId: sensor.id }, order: [['gravity', 'ASC']] });
    // Bates et al., NBS Circular C440 (1942), table 114: 5 % sucrose is 1.01968, 15 % is 1.06109 (20/20 °C, in air).
    for (const [index, sg] of [1, 1.01968, 1.04, 1.06109].entries()) expect(points[index]!.gravity).toBeCloseTo(sg, 4);
    expect(points.map((point) => point.temperature)).toEqual([20, 20, 20, 20]);
    await bench.getByText(/^Right to/).waitFor();
    await sound(page);
    await bench.getByRole('button', { name: 'Keep this curve' }).click();
    await bench.getByText(/version 1 kept/).waitFor();
    expect(await CalibrationRow.count({ where: { sensorId: sensor.id } })).toBe(1);
    // With a curve each point has what is left over, and without it: the widest that the table gets.
    const phone = await browser.visitAs(keeper.id, web.url, { phone: true, night: true });
    await phone.page.goto(`${web.url}/sensors/${sensor.identifier}`);
    const there = phone.page.getByRole('region', { name: 'Calibration' });
    await there.getByText(/^Right to/).waitFor();
    await expectNoSidewaysScroll(phone.page);
    // A strong must that leans like a weak one: the curve would have to turn back.
    await note('25', '26');
    await bench.getByText('No curve').waitFor();
    expect(await bench.getByRole('button', { name: 'Keep this curve' }).isDisabled()).toBe(true);
    await sound(page);
    await context.close();

    await phone.page.reload();
    await there.getByText('No curve').waitFor();
    await sound(phone.page);
    await phone.context.close();
  });
});

describe('the limits of a cellar', () => {
  it('are kept by the keeper, said where they are wrong, and shown to a hand who cannot change them', async () => {
    const { page, context } = await browser.visitAs(keeper.id, web.url);
    await page.goto(`${web.url}/settings/sensors`);
    await page.getByLabel('messages missing').fill('400');
    await page.getByRole('button', { name: 'Keep it so' }).click();
    await page.getByText('must be 1 to 100').waitFor();
    expect(await page.getByLabel('messages missing').inputValue()).toBe('400');
    await sound(page);
    await page.getByLabel('messages missing').fill('12');
    await page.getByRole('button', { name: 'Keep it so' }).click();
    await page.getByText('kept', { exact: true }).waitFor();
    expect((await SensorLimit.findByPk(cellarId))?.missedPercent).toBe(12);
    await context.close();
    const hand = await buildMember('hand', { cellarId });
    const asHand = await browser.visitAs(hand.personId, web.url, { phone: true, night: true });
    await asHand.page.goto(`${web.url}/settings/sensors`);
    await asHand.page.getByLabel('messages missing').waitFor();
    expect(await asHand.page.getByLabel('messages missing').isDisabled()).toBe(true);
    expect(await asHand.page.getByRole('button', { name: 'Keep it so' }).count()).toBe(0);
    await sound(asHand.page);
    await asHand.context.close();
  });
});

describe('the list of sensors', () => {
  it('names what a sensor is found with by the cellar’s limits, says them in a sentence, and leads to where they are changed', async () => {
    const owner = await buildMember('keeper');
    const { sensor, secret } = await buildSensor({ cellarId: owner.cellarId, name: 'Weak float' });
    await buildSensor({ cellarId: owner.cellarId, name: 'Unheard float' });
    expect(await send(sensor.identifier, secret, { gravity: 1.04, temperature: 18, battery: 4.1, signal: -84 })).toMatchObject({ stored: 1 });
    const { page, context } = await browser.visitAs(owner.personId, web.url);
    await page.goto(`${web.url}/sensors`);
    const row = page.getByRole('listitem').filter({ hasText: 'Weak float' });
    await row.getByText('Link weak').filter({ visible: true }).waitFor();
    await row.getByText('Signal weak: −84 dBm.').waitFor();
    await page.getByText(/a link is .80 dBm or weaker/).waitFor();
    await sound(page);

    await page.getByRole('link', { name: 'Change the limits' }).click();
    await page.getByLabel('signal at or below').fill('-90');
    await page.getByRole('button', { name: 'Keep it so' }).click();
    await page.getByText('kept', { exact: true }).waitFor();
    await page.goto(`${web.url}/sensors`);
    await page.getByText(/a link is .90 dBm or weaker/).waitFor();
    const weak = page.getByRole('listitem').filter({ hasText: 'Weak float' });
    await weak.getByText('Heard', { exact: true }).filter({ visible: true }).waitFor();
    expect(await weak.getByText('Signal weak').count()).toBe(0);
    await context.close();

    const phone = await browser.visitAs(owner.personId, web.url, { phone: true, night: true });
    await phone.page.goto(`${web.url}/sensors`);
    await phone.page.getByRole('listitem').filter({ hasText: 'Weak float' }).getByText('Heard', { exact: true }).filter({ visible: true }).waitFor();
    await sound(phone.page);
    await phone.context.close();
  });
});

describe('a room probe and the person’s units', () => {
  it('show on the batch: the room of its place, and a reading typed in °P and °F that is kept as SG and °C', async () => {
    const batch = await buildBatch({ cellarId, name: 'Sloe wine', place: 'Back store', neck: 'airlock', pitchedAt: new Date(Date.now() - 86_400_000), originalGravity: 1.06 });
    const { sensor, secret } = await buildSensor({ cellarId, name: 'Wall', kind: 'room' });
    expect(await send(sensor.identifier, secret, { temperature: 15 })).toMatchObject({ stored: 1 });
    const { page, context } = await browser.visitAs(keeper.id, web.url);
    await page.goto(`${web.url}/sensors/${sensor.identifier}`);
    await page.getByLabel('it hangs').fill('Back store');
    await page.getByRole('region', { name: 'In which place' }).getByRole('button', { name: 'Keep it so' }).click();
    await page.getByText('Sloe wine stands there and shows its temperature.').waitFor();
    await sound(page);
    await page.goto(`${web.url}/batches/${batch.id}`);
    await page.getByText('59.0 °F').first().waitFor();
    await page.getByRole('button', { name: 'Read by hand' }).click();
    await page.getByLabel('Gravity as read').fill('10');
    await page.getByLabel('Sample temperature').fill('200');
    await page.getByRole('button', { name: 'Read', exact: true }).click();
    await page.getByText('must be between 14 and 140 °F').waitFor();
    expect(await page.getByLabel('Sample temperature').inputValue()).toBe('200');
    await sound(page);
    await page.getByLabel('Sample temperature').fill('68');
    await page.getByRole('button', { name: 'Read', exact: true }).click();
    await until('the reading', async () => (await Entry.count({ where: { batchId: batch.id, kind: 'reading' } })) === 1);
    const entry = await Entry.findOne({ where: { batchId: batch.id, kind: 'reading' }, rejectOnEmpty: true });
    expect(entry.gravity).toBeCloseTo(1.04003, 3);
    expect(entry.temperatureC).toBe(20);
    await context.close();
  });
});

it('keeps a guest out of the sensors, with a word that says so', async () => {
  const guest = await buildMember('guest', { cellarId });
  expect(await Membership.count({ where: { personId: guest.personId } })).toBe(1);
  const { page, context } = await browser.visitAs(guest.personId, web.url);
  await page.goto(`${web.url}/sensors`);
  await page.getByText('Sensors are not shown to guests').waitFor();
  await sound(page);
  await context.close();
});

import { TOTP, URI } from 'otpauth';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Membership, Person } from '@/db/models';
import { hashPassword } from '@/lib/auth/passwords';
import { removeMember } from '@/lib/services/cellars/members';
import { beginSecondFactor, confirmSecondFactor } from '@/lib/services/people/second-factor';
import { expectAccessible, expectNoSidewaysScroll, settled, useBrowser } from '../support/browser';
import { useDatabase } from '../support/database';
import { buildBatch, buildCellar, buildMember } from '../support/factories';
import { startHouse, type House } from '../support/house';
import { until } from '../support/processes';

const db = useDatabase();
const browser = useBrowser();
const PASSPHRASE = 'a lantern by the door';
let house: House;
let keeper: Person;
let cellarId: string;

beforeAll(async () => {
  house = await startHouse(db.url);
  cellarId = (await buildCellar({ name: 'Stone loft' })).id;
  keeper = await Person.create({ name: 'Wren Holt', email: 'wren@loft.example', passwordHash: await hashPassword(PASSPHRASE) });
  await Membership.create({ cellarId, personId: keeper.id, role: 'keeper' });
}, 700_000);
afterAll(() => house.stop());

/** The newest mail to somebody whose subject fits, once it has come. */
async function mailTo(address: string, subject: RegExp): Promise<{ text: string }> {
  let found: { text: string } | undefined;
  await until(`a mail to ${address} about ${subject}`, async () => {
    found = (await house.mails()).find((mail) => mail.to.includes(address) && subject.test(mail.subject));
    return found !== undefined;
  });
  return found!;
}
const linkIn = (mail: { text: string }) => /https?:\/\/\S+#\S+/.exec(mail.text)?.[0] ?? '';

async function signInAt(page: Page, email: string, passphrase: string) {
  await page.goto(`${house.web.url}/sign-in`);
  await page.getByLabel('e-mail').fill(email);
  await page.getByLabel('passphrase').fill(passphrase);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

describe('sharing a cellar', () => {
  it('invites by mail, somebody new joins, is made brewer, and is taken out of the page they look at', async () => {
    const asKeeper = await browser.visitAs(keeper.id, house.web.url);
    const desk = asKeeper.page;
    await desk.goto(`${house.web.url}/settings/people`);
    await desk.getByLabel('mail address').fill('ivy@elsewhere.example');
    await desk.getByLabel('as', { exact: true }).selectOption('guest');
    await desk.getByRole('button', { name: 'Invite' }).click();
    await desk.getByText('ivy@elsewhere.example').first().waitFor();

    const link = linkIn(await mailTo('ivy@elsewhere.example', /share the cellar Stone loft/));
    expect(link).toContain(`${house.web.url}/invitation#`);
    const asStranger = await browser.visit({ phone: true });
    const phone = asStranger.page;
    await phone.goto(link);
    await phone.getByRole('heading', { name: 'Share Stone loft' }).waitFor();
    // The secret is gone from the address at once.
    expect(phone.url()).not.toContain('#');
    await expectAccessible(phone);
    await expectNoSidewaysScroll(phone);
    await phone.getByLabel('your name').fill('Ivy Pell');
    await phone.getByLabel(/^passphrase/).fill('password1');
    await phone.getByRole('button', { name: 'Join' }).click();
    await phone.getByText('first that a guesser tries').waitFor();
    expect(await phone.getByLabel('your name').inputValue()).toBe('Ivy Pell');
    await phone.getByLabel(/^passphrase/).fill('nine wet corks in a row');
    await phone.getByRole('button', { name: 'Join' }).click();
    await phone.waitForURL(/\/shelf/);

    // The keeper's open page hears of it.
    await desk.getByText('Ivy Pell').first().waitFor();
    await desk.getByLabel('Role of Ivy Pell').selectOption('brewer');
    const ivy = await Person.findOne({ where: { email: 'ivy@elsewhere.example' }, rejectOnEmpty: true });
    await until('the new role', async () => (await Membership.findOne({ where: { personId: ivy.id } }))?.role === 'brewer');
    await phone.getByRole('link', { name: 'Start a batch' }).first().waitFor();

    const row = desk.getByRole('listitem').filter({ hasText: 'Ivy Pell' }).filter({ has: desk.getByRole('combobox') });
    await row.getByRole('button', { name: 'Take out' }).click();
    await row.getByRole('button', { name: 'Take out' }).click();
    await phone.waitForURL(/\/welcome/);
    await phone.getByRole('heading', { name: 'No cellar now, Ivy Pell' }).waitFor();
    await phone.getByText('You are no longer in Stone loft.').waitFor();
    await expectAccessible(phone);
    await mailTo('ivy@elsewhere.example', /no longer share/);

    // The link works once.
    const late = await browser.visit();
    await late.page.goto(link);
    await late.page.getByRole('heading', { name: 'This invitation is not open' }).waitFor();
    for (const visit of [asKeeper, asStranger, late]) await visit.context.close();
  });

  it('joins with an account that exists, after signing in, and switches between two cellars in the header', async () => {
    const other = await buildCellar({ name: 'Long shed' });
    const owner = await Person.create({ name: 'Oriel Sand', email: 'oriel@shed.example', passwordHash: await hashPassword(PASSPHRASE) });
    await Membership.create({ cellarId: other.id, personId: owner.id, role: 'keeper' });
    const { page: inviter, context } = await browser.visitAs(owner.id, house.web.url);
    await inviter.goto(`${house.web.url}/settings/people`);
    await inviter.getByLabel('mail address').fill('wren@loft.example');
    await inviter.getByRole('button', { name: 'Invite' }).click();
    const link = linkIn(await mailTo('wren@loft.example', /share the cellar Long shed/));

    const { page, context: theirs } = await browser.visit();
    await page.goto(link);
    await page.getByRole('link', { name: 'Sign in' }).click();
    await page.getByLabel('e-mail').fill('wren@loft.example');
    await page.getByLabel('passphrase').fill(PASSPHRASE);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByRole('button', { name: 'Join as Wren Holt' }).click();
    await page.waitForURL(/\/shelf/);
    await page.getByRole('button', { name: /Long shed.*Show another cellar/ }).click();
    await page.getByRole('button', { name: 'Stone loft' }).click();
    await page.getByRole('button', { name: /Stone loft.*Show another cellar/ }).waitFor();
    for (const visit of [context, theirs]) await visit.close();
  });
});

describe('taken out of one of two cellars', () => {
  it('is told so in words at the page of a batch, lands on the other’s shelf, and is told once', async () => {
    const [out, stays] = [await buildCellar({ name: 'Chalk cave' }), await buildCellar({ name: 'Hay store' })];
    const person = await Person.create({ name: 'Una Marsh', email: 'una@cave.example' });
    await Membership.bulkCreate([out, stays].map((cellar) => ({ cellarId: cellar.id, personId: person.id, role: 'hand' as const })));
    const batch = await buildBatch({ cellarId: out.id, name: 'Sloe wine' });
    const { page, context } = await browser.visitAs(person.id, house.web.url, { phone: true });
    await page.goto(`${house.web.url}/shelf`);
    await page.getByRole('button', { name: /Show another cellar/ }).click();
    await page.getByRole('button', { name: 'Chalk cave', exact: true }).click();
    await page.getByRole('button', { name: /Chalk cave.*Show another cellar/ }).waitFor();
    await page.goto(`${house.web.url}/batches/${batch.id}`);
    await page.getByRole('heading', { level: 1, name: 'Sloe wine' }).filter({ visible: true }).waitFor();

    const boss = await buildMember('keeper', { cellarId: out.id });
    await removeMember(boss, person.id);
    await page.getByText('You are no longer in Chalk cave. This is Hay store.').waitFor();
    await page.waitForURL(/\/shelf$/);
    // The new page's title comes with it, after its address.
    await settled(page);
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
    await page.getByRole('button', { name: 'I have read it' }).click();
    await page.reload();
    await page.getByRole('link', { name: 'Start a batch' }).or(page.getByText('Nothing due today')).first().waitFor();
    expect(await page.getByText('You are no longer in').count()).toBe(0);
    await context.close();
  });
});

describe('the ways in', () => {
  it('signs in by a mailed link with one button, and the link works once', async () => {
    const { page, context, complaints } = await browser.visit();
    await page.goto(`${house.web.url}/sign-in`);
    await page.getByRole('link', { name: 'Have a link mailed' }).click();
    // The page before has such a field too.
    await page.getByRole('heading', { name: 'Have a link mailed' }).waitFor();
    await page.getByLabel('e-mail').fill('wren@loft.example');
    await page.getByRole('button', { name: 'Send the link' }).click();
    await page.getByText('If wren@loft.example has an account').waitFor();
    await expectAccessible(page);
    const link = linkIn(await mailTo('wren@loft.example', /link to sign in/));
    // A scanner that only opens it uses nothing up.
    const scanner = await browser.visit();
    await scanner.page.goto(link);
    await scanner.page.getByRole('button', { name: 'Sign in' }).waitFor();
    await page.goto(link);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.waitForURL(/\/shelf/);
    await scanner.page.getByRole('button', { name: 'Sign in' }).click();
    await scanner.page.getByText('has been used').waitFor();
    expect(complaints).toEqual([]);
    for (const visit of [context, scanner.context]) await visit.close();
  });

  it('says the same for an address that nobody has', async () => {
    const { page, context } = await browser.visit();
    await page.goto(`${house.web.url}/sign-in/forgot`);
    await page.getByLabel('e-mail').fill('nobody@nowhere.example');
    await page.getByRole('button', { name: 'Send the link' }).click();
    await page.getByText('If nobody@nowhere.example has an account').waitFor();
    await context.close();
  });

  it('asks for a code where there is a second factor, keeps what was typed, and lets in with the right one', async () => {
    const person = await Person.create({ name: 'Tam Reed', email: 'tam@loft.example', passwordHash: await hashPassword(PASSPHRASE) });
    await Membership.create({ cellarId, personId: person.id, role: 'hand' });
    const { uri } = await beginSecondFactor(person.id, PASSPHRASE);
    const { secret } = URI.parse(uri) as TOTP;
    const code = (ahead = 0) => new TOTP({ secret }).generate({ timestamp: Date.now() + ahead });
    await confirmSecondFactor(person.id, code(-30_000));

    const { page, context } = await browser.visit();
    await signInAt(page, 'tam@loft.example', PASSPHRASE);
    await page.getByRole('heading', { name: 'One more thing' }).waitFor();
    await expectAccessible(page);
    await page.getByLabel(/code of your authenticator/).fill('aaaaa-aaaaa');
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByText('The code does not fit').waitFor();
    await page.getByLabel(/code of your authenticator/).fill(code());
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.waitForURL(/\/shelf/);
    await context.close();
  });

  it('sets a second factor up from its picture, shows ten recovery codes once, and one of them lets in', async () => {
    const person = await Person.create({ name: 'Nye Marl', email: 'nye@loft.example', passwordHash: await hashPassword(PASSPHRASE) });
    await Membership.create({ cellarId, personId: person.id, role: 'hand' });
    const { page, context } = await browser.visitAs(person.id, house.web.url);
    await page.goto(`${house.web.url}/settings/security`);
    const section = page.getByRole('region', { name: 'Second factor' });
    await section.getByLabel('your passphrase').fill(PASSPHRASE);
    await section.getByRole('button', { name: 'Set it up' }).click();
    const secret = (await section.locator('p.font-mono').innerText()).replaceAll(' ', '');
    await section.getByLabel('the code it shows').fill(new TOTP({ secret }).generate());
    await section.getByRole('button', { name: 'Turn it on' }).click();
    await page.getByRole('heading', { name: 'Ten recovery codes, shown this once' }).waitFor();
    const codes = await page.getByRole('region', { name: 'Recovery codes' }).getByRole('listitem').allInnerTexts();
    expect(codes).toHaveLength(10);
    await page.getByText('I have kept them.').click();
    await page.getByRole('button', { name: 'Done' }).click();
    await page.getByText('10 recovery codes are left').waitFor();
    await context.close();

    const again = await browser.visit();
    await signInAt(again.page, 'nye@loft.example', PASSPHRASE);
    await again.page.getByLabel(/code of your authenticator/).fill(codes[3]!);
    await again.page.getByRole('button', { name: 'Sign in' }).click();
    await again.page.waitForURL(/\/shelf/);
    await mailTo('nye@loft.example', /recovery code was used/);
    await again.context.close();
  });
});

describe('the settings', () => {
  const PAGES = ['', '/profile', '/security', '/tokens', '/cellar', '/people', '/shares', '/audit'];

  for (const [name, options] of [['by day', { night: false }], ['by night, on a phone', { night: true, phone: true }]] as const)
    it(`have no serious violation of WCAG A and AA and nothing wider than the screen, ${name}`, async () => {
      const { page, context } = await browser.visitAs(keeper.id, house.web.url, options);
      for (const path of PAGES) {
        await page.goto(`${house.web.url}/settings${path}`);
        await page.getByRole('heading', { level: 1 }).first().waitFor();
        await settled(page);
        await expectAccessible(page);
        await expectNoSidewaysScroll(page);
      }
      await context.close();
    });

  it('show a token once, which reads the batches from a program until it is revoked', async () => {
    const { page, context } = await browser.visitAs(keeper.id, house.web.url);
    await page.goto(`${house.web.url}/settings/tokens`);
    await page.getByLabel('what it is for').fill('wall clock');
    await page.getByRole('button', { name: 'Make it' }).click();
    const token = await page.getByRole('region', { name: 'The new token' }).locator('code').innerText();
    const status = () => fetch(`${house.web.url}/api/v1/batches`, { headers: { authorization: `Bearer ${token}` } }).then((answer) => answer.status);
    expect(await status()).toBe(200);
    await page.getByRole('button', { name: 'I have it' }).click();
    await page.getByText(`…${token.slice(-4)}`).waitFor();
    expect(await page.content()).not.toContain(token);
    await page.getByRole('button', { name: 'Revoke' }).click();
    await page.getByRole('button', { name: 'Revoke it' }).click();
    await page.getByText('No token yet').waitFor();
    expect(await status()).toBe(401);
    await page.goto(`${house.web.url}/settings/audit`);
    await page.getByText('revoked the token wall clock').waitFor();
    await context.close();
  });

  it('keep the units that a person chose', async () => {
    const { page, context } = await browser.visitAs(keeper.id, house.web.url);
    await page.goto(`${house.web.url}/settings/profile`);
    await page.getByRole('radio', { name: '°F' }).click();
    await until('the choice to be kept', async () => (await Person.findByPk(keeper.id))?.temperatureUnit === 'f');
    await page.reload();
    await page.getByRole('radio', { name: '°F', checked: true }).waitFor();
    await page.getByRole('radio', { name: '°C' }).click();
    await until('the old choice to be kept', async () => (await Person.findByPk(keeper.id))?.temperatureUnit === 'c');
    await context.close();
  });
});

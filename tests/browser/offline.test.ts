import { randomUUID } from 'node:crypto';
import type { BrowserContext, Page } from 'playwright-core';
import { Op } from 'sequelize';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { Batch, Entry, Job, Membership, SignIn } from '@/db/models';
import { hashPassword } from '@/lib/auth/passwords';
import { createMust } from '@/lib/services/musts/create';
import { aSheet } from '../support/cellar';
import { expectAccessible, expectNoSidewaysScroll, useBrowser, type Visit } from '../support/browser';
import { useDatabase } from '../support/database';
import { buildBatch, buildCellar, buildMember } from '../support/factories';
import { until } from '../support/processes';
import { sessionCookie, startWeb, type Web } from '../support/web';

const db = useDatabase();
const browser = useBrowser();
let web: Web;
let cellarId: string;
let batch: Batch;
let wren: Awaited<ReturnType<typeof buildMember>>;
let visits: Visit[] = [];

beforeAll(async () => {
  web = await startWeb({ databaseUrl: db.url });
  cellarId = (await buildCellar({ name: 'Stone loft' })).id;
  wren = await buildMember('brewer', { cellarId, name: 'Wren Holt' });
  batch = await buildBatch({ cellarId, name: 'Oat perry', pitchedAt: new Date(Date.now() - 3 * 86_400_000) });
}, 700_000);
afterAll(() => web?.stop());
afterEach(async () => {
  await Promise.all(visits.map(({ context }) => context.close()));
  visits = [];
  await Entry.destroy({ where: {} });
});

async function visit(options: { worker?: boolean } = {}): Promise<Visit> {
  const made = await browser.visitAs(wren.personId, web.url, options);
  visits.push(made);
  return made;
}

const names = (page: Page) => page.evaluate(async () => (await caches.keys()).toSorted());
const holds = (page: Page, path: string) => page.evaluate(async (wanted) => (await Promise.all((await caches.keys()).map(async (name) => (await caches.open(name)).match(wanted)))).some(Boolean), path);

/** On the shelf, with everything for the way kept. */
async function onTheShelf({ page }: Visit): Promise<void> {
  await page.goto(`${web.url}/shelf`);
  await page.getByRole('link', { name: batch.name }).first().waitFor();
  await page.evaluate(() => navigator.serviceWorker.ready);
  // The first visit was not the worker's yet: what it showed is asked for once more.
  await page.reload();
  await page.getByRole('link', { name: batch.name }).first().waitFor();
  await until('the kept shelf', () => holds(page, '/shelf'), 30_000);
  await until('the kept batch', async () => (await holds(page, `/batches/${batch.id}`)) && holds(page, `/api/v1/batches/${batch.id}/entries?limit=200`), 60_000);
}

async function onTheBatch(page: Page): Promise<void> {
  await page.goto(`${web.url}/batches/${batch.id}`);
  await page.getByRole('heading', { level: 1, name: batch.name }).filter({ visible: true }).first().waitFor();
}

async function begin(page: Page, text: string): Promise<void> {
  await page.getByRole('button', { name: 'Write in the log' }).first().click();
  const form = page.getByRole('dialog');
  await form.getByLabel('What happened').selectOption('note');
  await form.getByRole('textbox', { name: /note/i }).first().fill(text);
}

async function keep(page: Page): Promise<void> {
  const form = page.getByRole('dialog');
  await form.locator('button[type=submit]').click();
  await form.waitFor({ state: 'hidden' });
}

async function write(page: Page, text: string): Promise<void> {
  await begin(page, text);
  await keep(page);
}

const waiting = (page: Page) => page.getByRole('list', { name: 'Waiting to be sent' }).getByRole('listitem');
const logged = async () => (await Entry.findAll({ order: [['createdAt', 'ASC'], ['id', 'ASC']] })).map((entry) => entry.text);
const online = async (context: BrowserContext) => context.setOffline(false);

describe('without a network', () => {
  it('opens the shelf as it was last seen, with its age, and a batch from it', async () => {
    const made = await visit();
    const { page, context } = made;
    await onTheShelf(made);
    await context.setOffline(true);
    await page.reload();
    await page.getByRole('link', { name: batch.name }).first().waitFor();
    await page.getByText(/Shown as of \d\d:\d\d/).waitFor();
    await expectNoSidewaysScroll(page);
    await expectAccessible(page);
    await onTheBatch(page);
    await page.getByText(/Shown as of \d\d:\d\d/).waitFor();
    await online(context);
    await page.getByText(/Shown as of/).waitFor({ state: 'hidden', timeout: 60_000 });
  });

  it('shows a must sheet as it was last seen, for the kettle; not the bench, where an old log could make a bottle look safe', async () => {
    const must = await createMust(wren, aSheet({ name: 'Kettle sheet' }));
    const made = await visit();
    const { page, context } = made;
    await onTheShelf(made);
    await page.goto(`${web.url}/musts/${must.id}`);
    await page.getByRole('heading', { level: 1, name: 'Kettle sheet' }).waitFor();
    await until('the kept sheet', async () => (await holds(page, `/musts/${must.id}`)) && holds(page, `/api/v1/musts/${must.id}`), 30_000);
    await page.goto(`${web.url}/bench/${batch.id}`);
    await page.getByRole('heading', { level: 1 }).waitFor();
    await context.setOffline(true);
    await page.goto(`${web.url}/musts/${must.id}`);
    await page.getByRole('heading', { level: 1, name: 'Kettle sheet' }).waitFor();
    await page.getByText(/Shown as of \d\d:\d\d/).waitFor();
    await page.goto(`${web.url}/bench/${batch.id}`);
    await page.getByText('Nothing is filled until it is judged here.').waitFor();
  });

  it('says so in a sentence where a page was never kept', async () => {
    const made = await visit();
    const { page, context } = made;
    await onTheShelf(made);
    await context.setOffline(true);
    await page.goto(`${web.url}/musts/new`);
    await page.getByText('this page was not kept on this device').waitFor();
    await page.getByRole('link', { name: 'To the shelf' }).click();
    await page.getByRole('link', { name: batch.name }).first().waitFor();
  });

  it('keeps two entries through a reload and sends each once, in order, when the network is back', async () => {
    const made = await visit();
    const { page, context } = made;
    await onTheShelf(made);
    await onTheBatch(page);
    await context.setOffline(true);
    await write(page, 'First: foam has fallen.');
    await write(page, 'Second: water topped up.');
    await page.getByText('2 notes wait to be sent.').waitFor();
    await page.reload();
    await page.getByText('Second: water topped up.').waitFor();
    expect(await waiting(page).count()).toBe(2);
    expect(await logged()).toEqual([]);
    await online(context);
    await until('both entries', async () => (await logged()).length === 2, 60_000);
    await waiting(page).first().waitFor({ state: 'hidden' });
    await page.getByText('First: foam has fallen.').waitFor();
    expect(await logged()).toEqual(['First: foam has fallen.', 'Second: water topped up.']);
  });
});

describe('on the rounds without a network', () => {
  it('shows the jobs of rounds that were not opened before the network went', async () => {
    await Job.create({ cellarId, kind: 'other', title: 'Turn the demijohn', source: 'person', dueAt: new Date(Date.now() - 3_600_000), createdBy: wren.personId });
    const made = await visit();
    const { page, context } = made;
    await onTheShelf(made);
    await until('the kept rounds', () => holds(page, '/rounds'), 30_000);
    await context.setOffline(true);
    await page.goto(`${web.url}/rounds`);
    await page.getByRole('button', { name: 'Done: Turn the demijohn' }).waitFor();
    await page.getByText(/Shown as of \d\d:\d\d/).waitFor();
    await online(context);
    await Job.destroy({ where: {} });
  });

  it('ticks and what is put off are kept through a reload, can be taken back, and are sent once, as of when they were made', async () => {
    const job = (title: string) => Job.create({ cellarId, kind: 'other', title, source: 'person', dueAt: new Date(Date.now() - 3_600_000), createdBy: wren.personId });
    const [airlock, feed, lees] = [await job('Top up the airlock'), await job('Feed the mead'), await job('Look at the lees')];
    const made = await visit();
    const { page, context } = made;
    await onTheShelf(made);
    await page.goto(`${web.url}/rounds`);
    await page.getByText('Look at the lees').first().waitFor();
    await until('the kept rounds', () => holds(page, '/rounds'), 30_000);
    await context.setOffline(true);
    const before = Date.now();
    await page.getByRole('button', { name: 'Done: Top up the airlock' }).click();
    await page.getByRole('button', { name: 'Done: Feed the mead' }).click();
    await page.getByText('Done. Waits to be sent.').nth(1).waitFor();
    await page.getByRole('button', { name: 'Put off: Look at the lees' }).click();
    await page.getByRole('button', { name: /tomorrow/i }).first().click();
    await waiting(page).filter({ hasText: 'Look at the lees, put off until' }).waitFor();
    const after = Date.now();
    await page.reload();
    await page.getByText('Done. Waits to be sent.').nth(1).waitFor();
    await page.getByRole('listitem').filter({ hasText: 'Feed the mead' }).getByRole('button', { name: 'Take it back' }).click();
    await page.getByRole('button', { name: 'Done: Feed the mead' }).waitFor();
    await expectAccessible(page);
    await new Promise((resolve) => setTimeout(resolve, 1_000));
    await online(context);
    await until('the tick', async () => (await Job.findByPk(airlock.id))?.doneAt != null, 60_000);
    await until('what was put off', async () => (await Job.findByPk(lees.id))?.snoozedUntil != null, 60_000);
    await waiting(page).first().waitFor({ state: 'hidden' });
    const done = await Job.findByPk(airlock.id, { rejectOnEmpty: true });
    expect(done.doneBy).toBe(wren.personId);
    expect(done.doneAt!.getTime()).toBeGreaterThanOrEqual(before);
    expect(done.doneAt!.getTime()).toBeLessThanOrEqual(after);
    expect((await Job.findByPk(feed.id, { rejectOnEmpty: true })).doneAt).toBeNull();
    await Job.destroy({ where: {} });
  });
});

describe('an entry whose answer was lost', () => {
  it('is kept once, though it was sent twice', async () => {
    // A request that passes the service worker does not always come by here.
    const { page } = await visit({ worker: false });
    await onTheBatch(page);
    let sent = 0;
    await page.route(`**/api/v1/batches/${batch.id}/entries`, async (route) => {
      if (route.request().method() !== 'POST') return route.continue();
      sent += 1;
      if (sent > 1) return route.continue();
      // The server has it; its answer never arrives.
      await route.fetch();
      return route.abort('connectionreset');
    });
    await write(page, 'Smells of pears.');
    await until('the first sending', () => sent >= 1);
    await until('the second sending', () => sent >= 2, 60_000);
    await waiting(page).first().waitFor({ state: 'hidden' });
    expect(await logged()).toEqual(['Smells of pears.']);
  });
});

describe('two tabs with entries that wait', () => {
  it('send each once', async () => {
    const made = await visit();
    const { page, context } = made;
    await onTheShelf(made);
    await onTheBatch(page);
    const other = await context.newPage();
    await onTheBatch(other);
    await context.setOffline(true);
    for (let index = 1; index <= 4; index += 1) await write(index % 2 ? page : other, `Note ${index}.`);
    await until('all four in both tabs', async () => (await waiting(page).count()) === 4 && (await waiting(other).count()) === 4);
    await online(context);
    await until('all four entries', async () => (await logged()).length >= 4, 60_000);
    await waiting(other).first().waitFor({ state: 'hidden' });
    expect(await logged()).toEqual(['Note 1.', 'Note 2.', 'Note 3.', 'Note 4.']);
  });
});

describe('an entry that the server refuses later', () => {
  it('says why, is not lost, and can be sent again or thrown away', async () => {
    const made = await visit();
    const { page, context } = made;
    await onTheShelf(made);
    await onTheBatch(page);
    await context.setOffline(true);
    await write(page, 'Tastes dry.');
    await write(page, 'Never mind.');
    const membership = await Membership.findOne({ where: { personId: wren.personId, cellarId }, rejectOnEmpty: true });
    await membership.update({ role: 'guest' });
    await online(context);
    await page.getByText(/Not taken: .*guest/).first().waitFor({ timeout: 60_000 });
    await page.getByText('2 notes were not taken.').waitFor();
    await membership.update({ role: 'brewer' });
    await waiting(page).filter({ hasText: 'Tastes dry.' }).getByRole('button', { name: 'Send it again' }).click();
    await until('the entry', async () => (await logged()).length === 1, 30_000);
    await waiting(page).filter({ hasText: 'Never mind.' }).getByRole('button', { name: 'Discard' }).click();
    await page.getByRole('button', { name: 'Throw it away' }).click();
    await waiting(page).first().waitFor({ state: 'hidden' });
    expect(await logged()).toEqual(['Tastes dry.']);
  });
});

describe('a sign-in that has ended', () => {
  it('loses nothing that was written, and gives it to nobody else who signs in', async () => {
    const made = await visit();
    const { page, context } = made;
    await onTheBatch(page);
    await begin(page, 'Written after the sign-in had ended.');
    const told = page.waitForResponse((response) => new URL(response.url()).pathname === '/api/v1/me' && response.status() === 401);
    await SignIn.update({ endedAt: new Date() }, { where: { personId: wren.personId } });
    await told;
    await keep(page);
    await page.waitForURL(/sign-in\?said=ended/);
    // By the bar, or by the sign-in page where the page has gone there by then.
    await page.getByText(/note waits on this device/).waitFor({ timeout: 60_000 });
    expect(await logged()).toEqual([]);

    const other = await buildMember('brewer', { cellarId, name: 'Ines' });
    const signInAs = async (personId: string) => {
      const [name, value] = (await sessionCookie(personId)).cookie.split('=') as [string, string];
      await context.addCookies([{ name, value, url: web.url }]);
    };
    await signInAs(other.personId);
    await onTheBatch(page);
    await page.waitForTimeout(1_500);
    expect(await waiting(page).count()).toBe(0);
    expect(await logged()).toEqual([]);

    await signInAs(wren.personId);
    await onTheBatch(page);
    await until('the entry', async () => (await logged()).length === 1, 60_000);
    expect(await Entry.findOne({ rejectOnEmpty: true })).toMatchObject({ personId: wren.personId, text: 'Written after the sign-in had ended.' });
  });

  it('leaves nothing of the person on the device', async () => {
    const made = await visit();
    const { page, context } = made;
    await onTheShelf(made);
    expect((await names(page)).some((name) => name.startsWith('data '))).toBe(true);
    await page.getByRole('button', { name: 'Wren H.' }).click();
    await page.getByRole('button', { name: 'Sign out' }).click();
    await page.waitForURL(/sign-in/);
    await until('nothing kept', async () => (await names(page)).every((name) => name.startsWith('parts-')));
    await context.setOffline(true);
    await page.goto(`${web.url}/shelf`);
    await page.getByText('this page was not kept on this device').waitFor();
  });

  /** The page hears that nobody is signed in between the deed that ends the sign-in and the answer to it. */
  const hearsFirst = (page: Page) =>
    page.evaluate(() => {
      const ask = window.fetch;
      let heard = false;
      window.fetch = async (...request) => {
        const answer = await ask(...request);
        const url = String(request[0]);
        if (url.endsWith('/api/v1/me') && answer.status === 401) heard = true;
        const ends = url.endsWith('/signout') || (request[1]?.method === 'DELETE' && (url.endsWith('/sign-ins') || url.endsWith('/account')));
        for (; ends && answer.ok && !heard; await new Promise((done) => setTimeout(done, 200))) window.dispatchEvent(new Event('focus'));
        if (ends) await new Promise((done) => setTimeout(done, 500));
        return answer;
      };
    });

  it('goes one way out, also when the page hears first that nobody is signed in', async () => {
    const made = await visit();
    const { page } = made;
    await onTheShelf(made);
    await hearsFirst(page);
    await page.getByRole('button', { name: 'Wren H.' }).click();
    await page.getByRole('button', { name: 'Sign out' }).click();
    await page.waitForURL(/sign-in/);
    expect(new URL(page.url()).search).toBe('');
  });

  it('goes one way out of all its sign-ins', async () => {
    const { page } = await visit();
    await page.goto(`${web.url}/settings/security`);
    await page.getByRole('button', { name: 'Sign out everywhere' }).click();
    await hearsFirst(page);
    await page.getByRole('button', { name: 'End all of them' }).click();
    await page.waitForURL(/sign-in\b/);
    expect(new URL(page.url()).search).toBe('');
    expect(await SignIn.count({ where: { personId: wren.personId, endedAt: { [Op.is]: null } } })).toBe(0);
  });

  it('goes one way out of a deleted account', async () => {
    const passphrase = 'seven slow white geese';
    const leaver = await buildMember('brewer', { cellarId, name: 'Ivo Marl' });
    await leaver.person.update({ passwordHash: await hashPassword(passphrase) });
    const made = await browser.visitAs(leaver.personId, web.url);
    visits.push(made);
    const { page } = made;
    await page.goto(`${web.url}/settings/profile`);
    await page.getByRole('button', { name: 'Delete my account' }).click();
    await page.getByLabel(/type your address/).fill(leaver.person.email);
    await page.getByLabel('your passphrase', { exact: true }).last().fill(passphrase);
    await hearsFirst(page);
    await page.getByRole('button', { name: 'Delete it for good' }).click();
    await page.waitForURL(/sign-in\b/);
    expect(new URL(page.url()).search).toBe('?said=deleted');
  });

  it('says that the person is still signed in where the server is not reached', async () => {
    const made = await visit();
    const { page, context } = made;
    await onTheShelf(made);
    await context.setOffline(true);
    await page.getByRole('button', { name: 'Wren H.' }).click();
    await page.getByRole('button', { name: 'Sign out' }).click();
    const bar = page.getByRole('status').filter({ hasText: 'You are still signed in.' });
    await bar.waitFor();
    expect(new URL(page.url()).pathname).toBe('/shelf');
    await bar.getByRole('button', { name: 'Stay' }).click();
    await bar.waitFor({ state: 'detached' });
    await page.getByRole('button', { name: 'Wren H.' }).click();
    await page.getByRole('button', { name: 'Sign out' }).click();
    await bar.waitFor();
    await context.setOffline(false);
    await bar.getByRole('button', { name: 'Sign out' }).click();
    await page.waitForURL(/sign-in/);
    await until('nothing kept', async () => (await names(page)).every((name) => name.startsWith('parts-')));
  });

  it('shows nobody what another person last saw on the same browser', async () => {
    const made = await visit();
    const { page, context } = made;
    await onTheShelf(made);
    const stranger = await buildMember('keeper', { name: 'Otto' });
    const theirs = await buildBatch({ cellarId: stranger.cellarId, name: 'Sloe mead' });
    const [name, value] = (await sessionCookie(stranger.personId)).cookie.split('=') as [string, string];
    await context.addCookies([{ name, value, url: web.url }]);
    await page.goto(`${web.url}/shelf`);
    await page.getByRole('link', { name: theirs.name }).first().waitFor();
    await until('their answers alone', async () => (await names(page)).filter((item) => item.startsWith('data ')).join() === `data ${stranger.personId}.${stranger.cellarId}`);
    await context.setOffline(true);
    await page.reload();
    await page.getByRole('link', { name: theirs.name }).first().waitFor();
    expect(await page.getByText(batch.name).count()).toBe(0);
  });
});

describe('the installed app', () => {
  it('has a manifest whose icons are there in the sizes it names', async () => {
    const manifest = (await (await fetch(`${web.url}/manifest.webmanifest`)).json()) as { start_url: string; display: string; icons: Array<{ src: string; sizes: string; type: string; purpose?: string }> };
    expect(manifest).toMatchObject({ start_url: '/shelf', display: 'standalone' });
    expect(manifest.icons.some(({ purpose }) => purpose === 'maskable')).toBe(true);
    for (const icon of manifest.icons.filter(({ type }) => type === 'image/png')) {
      const answer = await fetch(web.url + icon.src);
      expect(answer.status).toBe(200);
      const { default: sharp } = await import('sharp');
      const { width, height } = await sharp(Buffer.from(await answer.arrayBuffer())).metadata();
      expect(`${width}x${height}`, icon.src).toBe(icon.sizes);
    }
  });

  it('shows a push message, and its button takes the alert in hand', async () => {
    const made = await visit();
    const { page, context } = made;
    await context.grantPermissions(['notifications'], { origin: web.url });
    await onTheShelf(made);
    const session = await context.newCDPSession(page);
    const registered = new Promise<string>((resolve) => session.on('ServiceWorker.workerRegistrationUpdated', ({ registrations }) => registrations[0] && resolve(registrations[0].registrationId)));
    await session.send('ServiceWorker.enable');
    const notice = { title: 'Check: Oat perry', body: 'Stopped at 1.041.', url: '/alerts', tag: `alert-${randomUUID()}`, alert: randomUUID(), urgent: false };
    await session.send('ServiceWorker.deliverPushMessage', { origin: web.url, registrationId: await registered, data: JSON.stringify(notice) });
    const shown = await until('the notice', () =>
      page.evaluate(async () => {
        const [first] = (await (await navigator.serviceWorker.ready).getNotifications()) as Array<Notification & { actions: { title: string }[] }>;
        return first && { title: first.title, body: first.body, tag: first.tag, actions: first.actions.map(({ title }) => title), data: first.data as unknown };
      }),
    );
    expect(shown).toEqual({ title: notice.title, body: notice.body, tag: notice.tag, actions: ['I have it'], data: { url: '/alerts', alert: notice.alert } });
  });
});

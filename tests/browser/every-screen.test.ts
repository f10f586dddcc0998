import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/lib/auth/policies';
import { expectAccessible, expectNoSidewaysScroll, useBrowser } from '../support/browser';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';
import type { Things } from '../support/role-rows';
import { things } from '../support/things';
import { startWeb, type Web } from '../support/web';

const APP = join(import.meta.dirname, '../../app');

/** Each page of the house, with what stands for its brackets; null: leads elsewhere, or is walked by a link of its own in `people`, `messages` and `whole-job`. */
const SCREENS: Record<string, ((there: Things) => string) | null> = {
  '': null,
  invitation: null,
  'mail-address': null,
  'sign-in/link': null,
  'sign-in/passphrase': null,
  'share/[token]': null,
  'take/[token]': null,
  settings: null,
  welcome: null,
  'sign-in': () => '/sign-in',
  'sign-in/forgot': () => '/sign-in/forgot',
  shelf: () => '/shelf',
  alerts: () => '/alerts',
  rounds: () => '/rounds',
  'batches/new': () => '/batches/new',
  'batches/[id]': (there) => `/batches/${there.finishedId}`,
  'batches/[id]/work': (there) => `/batches/${there.finishedId}/work`,
  bench: () => '/bench',
  'bench/[id]': (there) => `/bench/${there.finishedId}`,
  book: () => '/book',
  'book/[id]': (there) => `/book/${there.lotId}`,
  labels: () => '/labels',
  compare: (there) => `/compare?batches=${there.finishedId},${there.otherBatchId}`,
  musts: () => '/musts',
  'musts/new': () => '/musts/new',
  'musts/catalogue': () => '/musts/catalogue',
  'musts/[id]': (there) => `/musts/${there.mustId}`,
  sensors: () => '/sensors',
  'sensors/new': () => '/sensors/new',
  'sensors/[id]': (there) => `/sensors/${there.sensorId}`,
  ...Object.fromEntries(['api', 'audit', 'cellar', 'data', 'messages', 'people', 'profile', 'security', 'sensors', 'shares', 'tokens', 'webhooks'].map((part) => [`settings/${part}`, () => `/settings/${part}`])),
};

describe('every screen', () => {
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

  it.each([{ phone: true, night: false }, { night: true }])('has no serious barrier, nothing wider than it is and nothing to complain of: %o', async (how) => {
    const { page, context, complaints } = await browser.visitAs(keeper.personId, web.url, how);
    for (const path of Object.values(SCREENS).flatMap((screen) => (screen ? [screen(there)] : []))) {
      await page.goto(`${web.url}${path}`);
      await page.getByRole('heading').first().waitFor();
      await page.waitForLoadState('networkidle').catch(() => undefined);
      await expectAccessible(page).catch((error: unknown) => Promise.reject(new Error(path, { cause: error })));
      await expectNoSidewaysScroll(page).catch((error: unknown) => Promise.reject(new Error(path, { cause: error })));
      expect(complaints, path).toEqual([]);
    }
    await context.close();
  }, 600_000);
});

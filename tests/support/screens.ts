import { afterAll, beforeAll, expect } from 'vitest';
import type { Actor } from '@/lib/auth/policies';
import { expectAccessible, expectNoSidewaysScroll, settled, useBrowser } from './browser';
import { useDatabase } from './database';
import { buildMember } from './factories';
import type { Things } from './role-rows';
import { things } from './things';
import { startWeb, type Web } from './web';

/** Each page of the house, with what stands for its brackets; null: leads elsewhere, or is walked by a link of its own in `people`, `messages` and `whole-job`. */
export const SCREENS: Record<string, ((there: Things) => string) | null> = {
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

/** A house of the file's own with one of everything in it, and a browser. What `house` holds is there once the tests begin. */
export function useFullHouse() {
  const db = useDatabase();
  const browser = useBrowser();
  const house = { web: undefined as unknown as Web, keeper: undefined as unknown as Actor, there: undefined as unknown as Things };
  beforeAll(async () => {
    house.web = await startWeb({ databaseUrl: db.url });
    house.keeper = await buildMember('keeper');
    house.there = await things(house.keeper.cellarId, house.keeper.personId);
  }, 700_000);
  afterAll(async () => {
    await (house.web as Web | undefined)?.stop();
  });
  return { browser, house };
}

/** Each of them has no serious barrier, nothing wider than it is and nothing to complain of. */
export async function walkScreens(browser: ReturnType<typeof useBrowser>, { web, keeper, there }: { web: Web; keeper: Actor; there: Things }, how: { phone?: boolean; night: boolean }): Promise<void> {
  const { page, context, complaints } = await browser.visitAs(keeper.personId, web.url, how);
  for (const path of Object.values(SCREENS).flatMap((screen) => (screen ? [screen(there)] : []))) {
    await page.goto(`${web.url}${path}`);
    await settled(page).catch((error: unknown) => Promise.reject(new Error(path, { cause: error })));
    await expectAccessible(page).catch((error: unknown) => Promise.reject(new Error(path, { cause: error })));
    await expectNoSidewaysScroll(page).catch((error: unknown) => Promise.reject(new Error(path, { cause: error })));
    expect(complaints, path).toEqual([]);
  }
  await context.close();
}

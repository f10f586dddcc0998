import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { batchState } from '@/db/queries/batch-states';
import type { Actor } from '@/lib/auth/policies';
import type { AssessmentBody } from '@/lib/contracts/assessment';
import { assessBatch } from '@/lib/services/batches/assess';
import { expectAccessible, expectNoSidewaysScroll, useBrowser } from '../support/browser';
import { ciderAt } from '../support/cellar';
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

/** Screens of the job, from the must to the opened bottle: what they reckon can be asked how. */
const RECKONS = ['shelf', 'rounds', 'batches/[id]', 'batches/[id]/work', 'bench/[id]', 'book', 'book/[id]', 'labels', 'compare', 'musts', 'musts/[id]'];

/** A figure with its unit, or a gravity, that stands by itself. */
const FIGURE = /^[≈±−]?\s?\d+(?:\.\d+)?(?:[–-]\d+(?:\.\d+)?)?\s?(?:%|% vol|L|L\/h|g|g\/L|mg\/L|bar|volumes|points|°C|°Bx|°P)(?:[ ,].*)?$|^[01]\.\d{3}$/;
/** What somebody told or read stands as it is: the log, readings by hand, a chart's numbers, drawings, what is typed; a catalogue's usual ratings, each with its note below; and what an answer itself holds. */
const AS_TOLD = ['section[aria-label="Log"]', '[aria-label="Readings by hand"]', '[aria-label="Numbers of the chart"]', '[aria-label="The curves as a table"]', 'svg', 'select', 'button', 'p', 'label', '.heard-only', 'details[class*="group/how"]', '[aria-hidden="true"]', '.work-sheet', '.uplot'].join(',');

/** Figures on the page that nobody can ask how they came about. */
const unasked = (page: Page): Promise<string[]> =>
  page.evaluate(
    ({ figure, told }) => {
      const shape = new RegExp(figure);
      const asks = (place: Element | null) => [...(place?.querySelectorAll('button, summary') ?? [])].some((one) => one.textContent?.trim().startsWith('how?'));
      return [...document.querySelectorAll('main *')]
        .filter((one) => one.childElementCount === 0 && one.getClientRects().length > 0 && !one.closest(told) && shape.test(one.textContent?.trim() ?? ''))
        .filter((one) => {
          const row = one.closest('li, tr, dl, fieldset, header, form');
          return !asks(row) && !asks((row?.parentElement ?? one).closest('section, header, aside, form, li'));
        })
        .map((one) => `${one.textContent?.trim()} in ${one.closest('li, tr, dl, section')?.textContent?.trim().slice(0, 60)}`);
    },
    { figure: FIGURE.source, told: AS_TOLD },
  );

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

  it('answers how for every figure that it reckons', async () => {
    const { page, context } = await browser.visitAs(keeper.personId, web.url, {});
    const seen = new Set<string>();
    for (const screen of RECKONS) {
      await page.goto(`${web.url}${SCREENS[screen]!(there)}`);
      await page.getByRole('heading').first().waitFor();
      await page.waitForLoadState('networkidle').catch(() => undefined);
      expect(await unasked(page), screen).toEqual([]);
      if ((await page.locator('main').getByText(/^how\?/).count()) > 0) seen.add(screen);
    }
    // Were the pages empty there would be nothing to ask.
    expect([...seen].length).toBeGreaterThanOrEqual(RECKONS.length - 2);
    await context.close();
  }, 300_000);

  it('answers for a job with what its call was held to, and for a row of the book as the lot itself does', async () => {
    const cellar = { ...keeper, role: 'brewer' } as const;
    const done = await ciderAt(cellar, { now: Date.now(), readDaysAgo: [30, 20, 12, 9, 5, 1], batch: { name: 'Perry' } });
    await assessBatch(done.id);
    const { evidence } = (await batchState<AssessmentBody>(done.id))!.assessment.calls.bottle;
    expect(evidence.length).toBeGreaterThan(0);
    const { page, context } = await browser.visitAs(keeper.personId, web.url, {});
    await page.goto(`${web.url}/rounds`);
    await page.getByRole('button', { name: 'how? Bottle Perry' }).click();
    const inputs = page.getByRole('dialog').locator('dd dl');
    for (const { name, threshold } of evidence) {
      await inputs.getByText(name, { exact: true }).waitFor();
      expect(await inputs.getByText(`${name}, limit`, { exact: true }).count()).toBe(threshold === null ? 0 : 1);
    }

    await page.goto(`${web.url}/book`);
    await page.getByRole('button', { name: /^how\? figures of/ }).first().click();
    const row = page.getByRole('dialog');
    const inRow = (figure: string) => row.locator('div', { has: page.locator('dt', { hasText: figure }) }).last().locator('dd').first().textContent();
    const strength = await inRow('strength');
    expect(strength).toContain('sugar for fizz');
    await page.goto(`${web.url}/book/${there.lotId}`);
    const asked = page.getByRole('button', { name: 'how? strength' });
    await asked.click();
    // The strip answers below itself, in the panel that the button names.
    const panel = page.locator(`[id="${await asked.getAttribute('aria-controls')}"]`);
    expect(await panel.textContent()).toContain(strength);
    await context.close();
  }, 120_000);
});

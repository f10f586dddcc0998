import type { Page } from 'playwright-core';
import { describe, expect, it } from 'vitest';
import { batchState } from '@/db/queries/batch-states';
import type { AssessmentBody } from '@/lib/contracts/assessment';
import { assessBatch } from '@/lib/services/batches/assess';
import { settled } from '../support/browser';
import { ciderAt } from '../support/cellar';
import { SCREENS, useFullHouse, walkScreens } from '../support/screens';

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

describe('every screen, at a desk by night', () => {
  const { browser, house } = useFullHouse();

  it('has no serious barrier, nothing wider than it is and nothing to complain of', () => walkScreens(browser, house, { night: true }), 600_000);

  it('answers how for every figure that it reckons', async () => {
    const { web, keeper, there } = house;
    const { page, context } = await browser.visitAs(keeper.personId, web.url, {});
    const seen = new Set<string>();
    for (const screen of RECKONS) {
      await page.goto(`${web.url}${SCREENS[screen]!(there)}`);
      await settled(page);
      expect(await unasked(page), screen).toEqual([]);
      if ((await page.locator('main').getByText(/^how\?/).count()) > 0) seen.add(screen);
    }
    // Were the pages empty there would be nothing to ask.
    expect([...seen].length).toBeGreaterThanOrEqual(RECKONS.length - 2);
    await context.close();
  }, 300_000);

  it('answers for a job with what its call was held to, and for a row of the book as the lot itself does', async () => {
    const { web, keeper, there } = house;
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

import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { AxeResults, RunOptions } from 'axe-core';
import { chromium, type Browser, type BrowserContext, type Locator, type Page, type Request } from 'playwright-core';
import { afterAll, beforeAll, expect } from 'vitest';
import { until } from './processes';
import { sessionCookie } from './web';

/** Without these a headless Chromium looks for hosts that a test machine does not reach. */
const FLAGS = ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync'];

/** Run in the page itself and asked for what is wrong alone: no page here has frames, and the list of what is right takes longer than the finding. */
const AXE = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
const RULES: RunOptions = { runOnly: { type: 'tag', values: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa'] }, resultTypes: ['violations'] };

/** Nothing asked for so long: what an answer brings asks at once. */
const QUIET_MS = 150;

export const DESK = { width: 1440, height: 900 };
export const PHONE = { width: 390, height: 844 };

export interface Visit {
  context: BrowserContext;
  page: Page;
  /** What the page complained of in its console. */
  complaints: string[];
}

/** One Chromium for the file; each visit has its own cookies and is closed at the end. */
export function useBrowser() {
  let browser: Browser;
  beforeAll(async () => {
    browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: FLAGS });
  });
  afterAll(async () => {
    await browser.close();
  });

  async function visit(options: { viewport?: { width: number; height: number }; phone?: boolean; night?: boolean; worker?: boolean } = {}): Promise<Visit> {
    const context = await browser.newContext({
      viewport: options.viewport ?? (options.phone ? PHONE : DESK),
      hasTouch: options.phone ?? false,
      isMobile: options.phone ?? false,
      timezoneId: 'UTC',
      locale: 'en-GB',
      reducedMotion: 'reduce',
      serviceWorkers: options.worker === false ? 'block' : 'allow',
    });
    if (options.night !== undefined) await context.addInitScript((theme) => document.addEventListener('DOMContentLoaded', () => (document.documentElement.dataset.theme = theme)), options.night ? 'night' : 'day');
    const page = await context.newPage();
    // CI shares its two cores with others.
    page.setDefaultTimeout(process.env.CI ? 40_000 : 20_000);
    const complaints: string[] = [];
    page.on('console', (message) => {
      if (message.type() === 'error') complaints.push(`${message.text()} ${message.location().url}`.trim());
    });
    page.on('pageerror', (error) => complaints.push(error.message));
    const asked: Asked = { open: new Set(), last: Date.now() };
    ASKED.set(page, asked);
    page.on('request', (request) => {
      // A page that is left takes along what it had asked for.
      if (request.isNavigationRequest() && request.frame() === page.mainFrame()) asked.open.clear();
      // The live line stays open.
      if (request.resourceType() !== 'eventsource') asked.open.add(request);
    });
    const answered = (request: Request) => {
      if (asked.open.delete(request)) asked.last = Date.now();
    };
    page.on('requestfinished', answered);
    page.on('requestfailed', answered);
    return { context, page, complaints };
  }

  /** A visit by somebody who has signed in before. */
  async function visitAs(personId: string, url: string, options: Parameters<typeof visit>[0] = {}): Promise<Visit> {
    const made = await visit(options);
    const { cookie } = await sessionCookie(personId);
    const [name, value] = cookie.split('=') as [string, string];
    await made.context.addCookies([{ name, value, url }]);
    return made;
  }

  return { visit, visitAs };
}

interface Asked {
  open: Set<Request>;
  last: number;
}
const ASKED = new WeakMap<Page, Asked>();

/** Waits until nothing is on its way any more: no request, no haze where something is loading, no font. */
export async function settled(page: Page): Promise<void> {
  const asked = ASKED.get(page)!;
  await page.getByRole('heading').first().waitFor();
  await until('the page to have all it asked for', async () => asked.open.size === 0 && Date.now() - asked.last > QUIET_MS && (await page.evaluate(() => document.fonts.status === 'loaded' && document.querySelector('main [role="status"][aria-label^="Loading"]') === null)), 30_000);
}

/** No serious or critical violation of WCAG A and AA on the page as it stands. */
export async function expectAccessible(page: Page): Promise<void> {
  if (!(await page.evaluate(() => 'axe' in globalThis))) await page.evaluate(AXE);
  const violations = await page.evaluate(async (options) => {
    const { axe } = globalThis as unknown as { axe: { run: (options: RunOptions) => Promise<AxeResults> } };
    return (await axe.run(options)).violations.map(({ id, impact, nodes }) => ({ id, impact, nodes: nodes.map(({ html }) => ({ html })) }));
  }, RULES);
  const serious = violations.filter(({ impact }) => impact === 'serious' || impact === 'critical');
  expect(serious.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html.slice(0, 160)).join(' | ')}`)).toEqual([]);
}

/** Nothing is wider than the screen. */
export async function expectNoSidewaysScroll(page: Page): Promise<void> {
  const { wide, view } = await page.evaluate(() => ({ wide: document.documentElement.scrollWidth, view: document.documentElement.clientWidth }));
  expect(wide).toBeLessThanOrEqual(view);
}

/** What of `shown` a thumb has less room for than 44 px from top to bottom, by what answers there; each is looked at in the middle of the screen. */
export function tooLow(shown: Locator): Promise<string[]> {
  return shown.evaluateAll((all) =>
    all.flatMap((one) => {
      one.scrollIntoView({ block: 'center' });
      const box = one.getBoundingClientRect();
      if (box.width === 0) return [];
      const x = box.left + Math.min(box.width / 2, 14);
      const answers = (y: number) => one.contains(document.elementFromPoint(x, y));
      let [top, bottom] = [box.top + box.height / 2, box.top + box.height / 2];
      while (answers(top - 1) && bottom - top < 100) top--;
      while (answers(bottom + 1) && bottom - top < 100) bottom++;
      return bottom - top < 43 ? [`${one.textContent?.trim()}: ${Math.round(bottom - top)} px`] : [];
    }),
  );
}

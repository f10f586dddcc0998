import { readFileSync } from 'node:fs';
import { createContext, runInContext } from 'node:vm';
import { describe, expect, it, vi } from 'vitest';

const HOUSE = 'https://house.example';

interface Shown {
  title: string;
  options: { body: string; data: { url: string; alert: string | null }; actions: { action: string }[]; requireInteraction: boolean };
}

/** The service worker itself, run with a browser's parts around it that remember what it did. */
function worker({ windows = [] as { focus: () => Promise<void>; navigate: (url: string) => Promise<unknown> }[], answer = { ok: true } } = {}) {
  const handlers = new Map<string, (event: object) => void>();
  const shown: Shown[] = [];
  const opened: string[] = [];
  const asked: { path: string; method: string | undefined }[] = [];
  const self = {
    location: { href: `${HOUSE}/sw.js?v=test`, origin: HOUSE },
    addEventListener: (name: string, handler: (event: object) => void) => handlers.set(name, handler),
    skipWaiting: vi.fn(),
    registration: { showNotification: (title: string, options: Shown['options']) => Promise.resolve(void shown.push({ title, options })) },
    clients: { matchAll: () => Promise.resolve(windows), openWindow: (url: string) => Promise.resolve(void opened.push(url)), claim: vi.fn() },
  };
  const fetch = (path: string, init: { method?: string } = {}) => {
    asked.push({ path, method: init.method });
    return Promise.resolve(answer);
  };
  runInContext(readFileSync('public/sw.js', 'utf8'), createContext({ self, fetch, URL, Headers, Response, caches: {}, setTimeout, Promise, console }));
  const send = async (name: string, event: object) => {
    let work: Promise<unknown> = Promise.resolve();
    handlers.get(name)!({ ...event, waitUntil: (promise: Promise<unknown>) => (work = promise) });
    await work;
  };
  const push = (text: string | null) => send('push', { data: text === null ? null : { json: () => JSON.parse(text) as unknown } });
  const close = vi.fn();
  const click = (data: object | undefined, action = '') => send('notificationclick', { action, notification: { close, data } });
  return { push, click, shown, opened, asked, close };
}

describe('a message that is pushed', () => {
  it('is shown with what it says, and leads where it says', async () => {
    const { push, shown } = worker();
    await push(JSON.stringify({ title: 'Foam may reach the neck', body: 'Rye beer, tag 7', url: '/batches/b1', alert: 'a1', urgent: true, tag: 'a1' }));
    expect(shown).toMatchObject([{ title: 'Foam may reach the neck', options: { body: 'Rye beer, tag 7', data: { url: '/batches/b1', alert: 'a1' }, requireInteraction: true, actions: [{ action: 'take' }] } }]);
  });

  it.each([['nothing', null], ['no JSON', '{'], ['another shape', '[]']])('is shown all the same where it holds %s', async (_name, text) => {
    const { push, shown } = worker();
    await push(text);
    expect(shown).toMatchObject([{ title: 'Fallbright', options: { data: { url: '/alerts', alert: null }, actions: [] } }]);
  });

  it('opens its page in a window where there is none', async () => {
    const { click, opened, close } = worker();
    await click({ url: '/batches/b1', alert: 'a1' });
    expect(opened).toEqual([`${HOUSE}/batches/b1`]);
    expect(close).toHaveBeenCalledOnce();
  });

  it('brings the open window to the front and leads it there', async () => {
    const window = { focus: vi.fn(() => Promise.resolve()), navigate: vi.fn(() => Promise.resolve()) };
    const { click, opened } = worker({ windows: [window] });
    await click({ url: '/batches/b1' });
    expect(window.focus).toHaveBeenCalledOnce();
    expect(window.navigate).toHaveBeenCalledExactlyOnceWith(`${HOUSE}/batches/b1`);
    expect(opened).toEqual([]);
  });

  it('opens a window of its own where the open one cannot be led', async () => {
    const { click, opened } = worker({ windows: [{ focus: () => Promise.resolve(), navigate: () => Promise.reject(new TypeError('not controlled')) }] });
    await click({ url: '/rounds' });
    expect(opened).toEqual([`${HOUSE}/rounds`]);
  });

  it('takes the alert in hand without a page, and opens it where that fails', async () => {
    const good = worker();
    await good.click({ url: '/batches/b1', alert: 'a1' }, 'take');
    expect(good.asked).toEqual([{ path: '/api/v1/alerts/a1/acknowledge', method: 'POST' }]);
    expect(good.opened).toEqual([]);
    const bad = worker({ answer: { ok: false } });
    await bad.click({ url: '/batches/b1', alert: 'a1' }, 'take');
    expect(bad.opened).toEqual([`${HOUSE}/batches/b1`]);
  });

  it.each(['https://elsewhere.example/x', '//elsewhere.example/x', 'javascript:alert(1)', '\\\\elsewhere.example', 17, null, undefined])('never leads out of the house: %j', async (url) => {
    const { click, opened } = worker();
    await click({ url });
    expect(opened.map((address) => new URL(address).origin)).toEqual([HOUSE]);
  });
});

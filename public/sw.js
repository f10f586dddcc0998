// @ts-check
/**
 * Keeps Fallbright open without a network: pages and their parts, and what one
 * person last saw of one cellar. Shows push messages.
 *
 * Every answer of the API names whom it was for; it is kept under that name
 * alone, and all that was kept is dropped when somebody signs in or out, changes
 * the cellar, or the sign-in has ended.
 */

/** A build of its own has parts of its own. */
const BUILD = new URL(self.location.href).searchParams.get('v') ?? 'none';
/** The development server's parts keep their names when they change. */
const DEVELOPMENT = BUILD === 'dev';
const PARTS = `parts-${BUILD}`;
const PAGES = `pages-${BUILD}`;
const DATA = 'data ';

const FOR = 'x-fallbright-for';
const KEPT = 'x-fallbright-kept';

/** On bad Wi-Fi what is kept is better than nothing for long, ms. */
const PATIENCE_MS = 7_000;
/** Pages are fetched ahead at most this often, ms. */
const AHEAD_EVERY_MS = 30 * 60_000;
const MOST_DATA = 300;

/** What is worth keeping, and whether its query matters. */
const KEEP = [
  { path: /^\/api\/v1\/shelf$/, query: false },
  { path: /^\/api\/v1\/batches\/[^/]+\/(series|judgement|assessment)$/, query: false },
  { path: /^\/api\/v1\/(me|batches|alerts|jobs|mutes|sensors|sensor-health|members|lots|places|musts|catalogue)$/, query: true },
  // Not the bench: by an old log a bottle may look safe that is not.
  { path: /^\/api\/v1\/(lots\/[^/]+(\/tastings)?|musts\/[^/]+)$/, query: true },
  { path: /^\/api\/v1\/batches\/[^/]+(\/(entries|assessments|drink|family|finings))?$/, query: true },
];
/** Pages that stand on nobody's sign-in, or are somebody's key. */
const NOT_KEPT = /^\/(api|sign-in|share|take|invitation|mail-address|_next)(\/|$)/;
/** After these the browser may be somebody else's. */
const CHANGES_PERSON = /^\/api\/(auth\/(callback|signin|signout)|v1\/(cellars\/active|sign-ins))(\/|$)/;

const worker = /** @type {any} */ (self);
/** Counts the changes of person: what was asked before one is not kept after it. */
let epoch = 0;

worker.addEventListener('install', () => worker.skipWaiting());

worker.addEventListener('activate', (/** @type {any} */ event) => {
  event.waitUntil(
    (async () => {
      const names = await caches.keys();
      await Promise.all(names.filter((name) => /^(parts|pages)-/.test(name) && name !== PARTS && name !== PAGES).map((name) => caches.delete(name)));
      await worker.clients.claim();
    })(),
  );
});

/** Drops what was one person's. */
async function forget() {
  epoch += 1;
  const names = await caches.keys();
  await Promise.all(names.filter((name) => name.startsWith(DATA) || name.startsWith('pages-')).map((name) => caches.delete(name)));
}

/** @param {Response} response */
async function stamped(response) {
  const headers = new Headers(response.headers);
  headers.set(KEPT, new Date().toISOString());
  return new Response(await response.blob(), { status: response.status, statusText: response.statusText, headers });
}

/** @param {URL} url */
function keyOf(url) {
  const rule = KEEP.find(({ path }) => path.test(url.pathname));
  // Behind its first part a long shelf would stand in that one's place.
  if (url.pathname === '/api/v1/shelf' && url.searchParams.has('skip')) return null;
  return rule ? `${url.origin}${url.pathname}${rule.query ? url.search : ''}` : null;
}

/** The one cache of data there is; there are never two. */
async function dataName() {
  return (await caches.keys()).find((name) => name.startsWith(DATA)) ?? null;
}

/** @param {string} key @param {Response} response @param {number} asked */
async function keepAnswer(key, response, asked) {
  const owner = response.headers.get(FOR);
  if (owner === null || !response.ok) return;
  const copy = await stamped(response);
  if (asked !== epoch) return;
  const name = DATA + owner;
  for (const other of await caches.keys()) if (other.startsWith(DATA) && other !== name) await caches.delete(other);
  const cache = await caches.open(name);
  await cache.put(key, copy);
  const keys = await cache.keys();
  if (keys.length > MOST_DATA) await Promise.all(keys.slice(0, keys.length - MOST_DATA).map((old) => cache.delete(old)));
}

/** Goes on with it when the answer has gone already; then the browser may cut it short. @param {any} event @param {Promise<unknown>} work */
function afterwards(event, work) {
  const quiet = work.catch(() => undefined);
  try {
    event.waitUntil(quiet);
  } catch {
    // The event is over; the work runs on as long as the worker does.
  }
}

/** @param {string} key */
async function keptAnswer(key) {
  const name = await dataName();
  return name === null ? undefined : (await caches.open(name)).match(key);
}

/** From the network, else what was kept; what was kept too where the network takes its time. @param {any} event @param {string} key */
async function fromApi(event, key) {
  const asked = epoch;
  const network = fetch(event.request).then(async (response) => {
    if (response.status === 401) await forget();
    afterwards(event, keepAnswer(key, response.clone(), asked));
    return response;
  });
  // It may fail when nobody waits for it any more.
  network.catch(() => undefined);
  const late = new Promise((resolve) => setTimeout(resolve, PATIENCE_MS, null));
  try {
    const first = await Promise.race([network, late]);
    if (first) return first;
    return (await keptAnswer(key)) ?? (await network);
  } catch (error) {
    const kept = asked === epoch ? await keptAnswer(key) : undefined;
    if (kept) return kept;
    throw error;
  }
}

const AWAY = `<!doctype html><html lang="en"><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>Fallbright cannot be reached</title><style>body{margin:0;background:#F1F5ED;color:#14201A;font:17px/25px Georgia,serif}main{max-width:34rem;padding:44px 16px}h1{font-size:26px;line-height:29px}a{color:inherit;display:inline-block;padding:10px 0}@media(prefers-color-scheme:dark){body{background:#121511;color:#CECAB1}}</style><main><h1>Fallbright cannot be reached</h1><p>There is no network, and this page was not kept on this device. Nothing that was logged is lost.</p><p><a href="/shelf">To the shelf</a></p></main></html>`;

/** @param {any} event @param {URL} url */
async function fromPages(event, url) {
  const asked = epoch;
  try {
    const response = await fetch(event.request);
    if (isPage(response, url)) afterwards(event, keepPage(url.pathname, response.clone(), asked));
    return response;
  } catch {
    const pages = await caches.open(PAGES);
    const kept = (await pages.match(url.pathname)) ?? (url.pathname === '/' ? await pages.match('/shelf') : undefined);
    if (kept) return kept;
    return new Response(AWAY, { status: 503, headers: { 'content-type': 'text/html; charset=utf-8' } });
  }
}

/** @param {Response} response @param {URL} url */
const isPage = (response, url) => response.status === 200 && !response.redirected && !NOT_KEPT.test(url.pathname) && (response.headers.get('content-type') ?? '').startsWith('text/html');

/** The page, and every part that it names. @param {string} path @param {Response} response @param {number} asked */
async function keepPage(path, response, asked) {
  const copy = await stamped(response);
  const text = await copy.clone().text();
  if (asked !== epoch) return;
  await (await caches.open(PAGES)).put(path, copy);
  if (!DEVELOPMENT) await keepParts(text.match(/\/_next\/static\/[\w./~%@-]+\.(?:js|css|woff2)/g) ?? []);
}

/** @param {readonly string[]} paths */
async function keepParts(paths) {
  const parts = await caches.open(PARTS);
  for (const path of new Set(paths)) {
    if (await parts.match(path)) continue;
    const response = await fetch(path).catch(() => null);
    if (response?.ok) await parts.put(path, response);
  }
}

/** A part of this build never changes under its name. @param {Request} request */
async function fromParts(request) {
  const parts = await caches.open(PARTS);
  const kept = await parts.match(request);
  if (kept) return kept;
  const response = await fetch(request);
  if (response.ok) await parts.put(request, response.clone());
  return response;
}

/** What a page asks for that the shelf does not. @param {string} path */
function answersOf(path) {
  if (path === '/rounds') return ['/api/v1/jobs?state=open&order=walk&limit=200', '/api/v1/jobs?state=done&limit=50'];
  const batch = /^\/batches\/([0-9a-f-]{36})$/.exec(path)?.[1];
  return batch ? ['', '/entries?limit=200', '/judgement', '/series?points=400', '/assessments'].map((part) => `/api/v1/batches/${batch}${part}`) : [];
}

/** Pages that a person on the shelf may want next, with what they show. @param {readonly string[]} paths */
async function fetchAhead(paths) {
  const pages = await caches.open(PAGES);
  for (const path of paths) {
    const asked = epoch;
    const kept = await pages.match(path);
    if (kept && Date.now() - Date.parse(kept.headers.get(KEPT) ?? '') < AHEAD_EVERY_MS) continue;
    const url = new URL(path, self.location.origin);
    const response = await fetch(path, { headers: { accept: 'text/html' } }).catch(() => null);
    if (!response) return;
    if (isPage(response, url)) await keepPage(path, response, asked);
    for (const part of answersOf(path)) {
      const key = keyOf(new URL(part, self.location.origin));
      const answer = await fetch(part, { headers: { accept: 'application/json' } }).catch(() => null);
      if (key && answer) await keepAnswer(key, answer, asked);
    }
  }
}

worker.addEventListener('fetch', (/** @type {any} */ event) => {
  /** @type {Request} */
  const request = event.request;
  const url = new URL(request.url);
  if (url.origin !== self.location.origin) return;
  if (request.method !== 'GET') {
    if (CHANGES_PERSON.test(url.pathname))
      event.respondWith(
        (async () => {
          await forget();
          try {
            return await fetch(request);
          } finally {
            await forget();
          }
        })(),
      );
    return;
  }
  if (request.mode === 'navigate') {
    // A sign-in by a link, or a page that is only itself.
    if (!NOT_KEPT.test(url.pathname)) event.respondWith(fromPages(event, url));
    else if (CHANGES_PERSON.test(url.pathname)) event.waitUntil(forget());
    return;
  }
  if (url.pathname.startsWith('/_next/static/') && !DEVELOPMENT) event.respondWith(fromParts(request));
  else {
    const key = keyOf(url);
    if (key && !request.headers.has('authorization')) event.respondWith(fromApi(event, key));
  }
});

worker.addEventListener('message', (/** @type {any} */ event) => {
  const { type, paths } = event.data ?? {};
  if (type === 'forget') event.waitUntil(forget().then(() => event.ports[0]?.postMessage('forgotten')));
  // The development server makes each page when it is asked for: too dear to ask ahead.
  if (type === 'ahead' && !DEVELOPMENT && Array.isArray(paths)) event.waitUntil(fetchAhead(paths.filter((path) => typeof path === 'string' && path.startsWith('/') && !NOT_KEPT.test(path)).slice(0, 60)));
});

worker.addEventListener('push', (/** @type {any} */ event) => {
  /** @type {{ title?: string, body?: string, url?: string, tag?: string, alert?: string | null, take?: string, lang?: string, urgent?: boolean }} */
  let notice = {};
  try {
    notice = event.data?.json() ?? {};
  } catch {
    // A message that cannot be read still has to be shown: browsers take the leave away from those who show nothing.
  }
  event.waitUntil(
    worker.registration.showNotification(notice.title ?? 'Fallbright', {
      body: notice.body ?? 'Look at the alerts.',
      tag: notice.tag,
      lang: notice.lang,
      renotify: notice.tag !== undefined,
      requireInteraction: notice.urgent === true,
      icon: '/icon-192.png',
      badge: '/badge-96.png',
      data: { url: notice.url ?? '/alerts', alert: notice.alert ?? null },
      actions: notice.alert ? [{ action: 'take', title: notice.take ?? 'I have it' }] : [],
    }),
  );
});

/** A page of this house, whatever was said. @param {unknown} url */
function insideOf(url) {
  const { origin } = self.location;
  const wanted = typeof url === 'string' && URL.canParse(url, origin) ? new URL(url, origin) : null;
  return wanted?.origin === origin ? wanted.href : `${origin}/alerts`;
}

worker.addEventListener('notificationclick', (/** @type {any} */ event) => {
  event.notification.close();
  const { url, alert } = event.notification.data ?? {};
  event.waitUntil(
    (async () => {
      if (event.action === 'take' && alert) {
        const taken = await fetch(`/api/v1/alerts/${encodeURIComponent(alert)}/acknowledge`, { method: 'POST', headers: { 'content-type': 'application/json' }, body: '{}' }).catch(() => null);
        if (taken?.ok) return;
      }
      const target = insideOf(url);
      const [open] = await worker.clients.matchAll({ type: 'window', includeUncontrolled: true });
      if (!open) return worker.clients.openWindow(target);
      await open.focus();
      return open.navigate(target).catch(() => worker.clients.openWindow(target));
    })(),
  );
});

/** The browser has changed its address: the new one takes the old one's place. */
worker.addEventListener('pushsubscriptionchange', (/** @type {any} */ event) => {
  const options = event.oldSubscription?.options;
  if (!options) return;
  event.waitUntil(
    (async () => {
      const held = (event.newSubscription ?? (await worker.registration.pushManager.subscribe(options))).toJSON();
      await fetch('/api/v1/devices', { method: 'POST', headers: { 'content-type': 'application/json' }, body: JSON.stringify({ endpoint: held.endpoint, keys: { p256dh: held.keys.p256dh, auth: held.keys.auth } }) });
    })(),
  );
});

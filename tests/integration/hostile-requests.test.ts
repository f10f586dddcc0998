import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { QueryTypes } from 'sequelize';
import { Alert, Batch } from '@/db/models';
import { database } from '@/db/client';
import { endpoints, type Endpoint } from '@/lib/contracts/endpoints';
import { batchList, shelfSchema } from '@/lib/contracts/batches';
import { problem } from '@/lib/contracts/common';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember } from '../support/factories';
import { askRoute, type Asked } from '../support/routes';
import { sessionCookie } from '../support/web';

vi.mock('server-only', () => ({}));
useDatabase();

const LEAST = 20;
let cookie = '';
let batchId = '';
let cellarId = '';
beforeAll(async () => {
  const keeper = await buildMember('keeper');
  cellarId = keeper.cellarId;
  batchId = (await buildBatch({ cellarId })).id;
  cookie = (await sessionCookie(keeper.personId)).cookie;
});

const all: Endpoint[] = Object.values(endpoints);
const ask = (endpoint: Endpoint, asked: Asked = {}) => askRoute(endpoint, { cookie, ...asked });

async function refused(answer: Response, what: string, statuses: readonly number[]): Promise<void> {
  expect(statuses, `${what}: ${answer.status}`).toContain(answer.status);
  const said = problem.parse(await answer.json());
  expect(`${said.title}${said.detail ?? ''}`.length, what).toBeGreaterThan(8);
}

describe('an id that is none', () => {
  const IDS = ['1', '0', '-1', '1e3', '9223372036854775808', '2147483648', 'null', 'undefined', 'NaN', 'true', "' or true --", '1; drop table batches', '../../etc/passwd', '..', '.', '%2e%2e', '\u0000', 'a\nb', '00000000-0000-0000-0000', 'x'.repeat(3_000), '🍏', '{}', '[]', '*', 'zzzzzzzz-zzzz-4zzz-8zzz-zzzzzzzzzzzz', '550E8400-E29B-11D4-A716-44665544000', '{550e8400-e29b-41d4-a716-446655440000}', 'urn:uuid:550e8400-e29b-41d4-a716-446655440000', '__proto__', 'constructor'];
  // A sensor is called by a name of its own; some of these could be one, whose body is then looked at.
  const named = all.filter(({ path, access }) => /\{id\}/.test(path) && access !== 'anyone' && access !== 'sensor');
  it(`names nothing: 404, for ${IDS.length} ids at ${named.length} endpoints`, async () => {
    expect(IDS.length).toBeGreaterThanOrEqual(LEAST);
    expect(named.length).toBeGreaterThanOrEqual(LEAST);
    for (const endpoint of named) {
      for (const id of IDS) {
        const params = Object.fromEntries([...endpoint.path.matchAll(/\{(\w+)\}/g)].map((match) => [match[1]!, id]));
        const answer = await ask(endpoint, { params, ...(endpoint.body && { body: '{}' }) });
        await refused(answer, `${endpoint.method} ${endpoint.path} of ${JSON.stringify(id).slice(0, 40)}`, endpoint.path.startsWith('/sensors') ? [404, 422] : [404]);
      }
    }
  });

  it('names nothing where it is well formed and nobody’s, in any case of its letters', async () => {
    for (const endpoint of named.filter(({ body, query, method }) => !body && !query && method === 'GET')) {
      for (const id of [randomUUID(), randomUUID().toUpperCase()]) {
        const params = Object.fromEntries([...endpoint.path.matchAll(/\{(\w+)\}/g)].map((match) => [match[1]!, id]));
        await refused(await ask(endpoint, { params }), `${endpoint.path} of ${id}`, [404]);
      }
    }
  });
});

describe('a query that is wrong', () => {
  const QUERIES = ['limit=0', 'limit=-1', 'limit=201', 'limit=1e9', 'limit=1000000000', 'limit=1.5', 'limit=x', 'limit=', 'limit=NaN', 'limit=Infinity', 'limit=0x10', 'limit=10&limit=20', 'limit[]=10', 'limit=10&limit=10', 'cursor=x', 'cursor=bm90', 'cursor=e30', `cursor=${'a'.repeat(201)}`, 'cursor=a&cursor=b', `cursor=${Buffer.from('["2026-01-01","1; drop table batches"]').toString('base64url')}`, `cursor=${Buffer.from('[null,null]').toString('base64url')}`, `cursor=${Buffer.from('[{"$ne":1},1]').toString('base64url')}`];
  // A name that no list has, and sixteen.
  const TAKEN = new Set(['limit[]=10', 'limit=0x10']);
  const lists = [endpoints.listBatches, endpoints.listJobs, endpoints.listLots, endpoints.listMusts];
  it(`is refused by each list, ${QUERIES.length} times, and never answers everything`, async () => {
    expect(QUERIES.length).toBeGreaterThanOrEqual(LEAST);
    for (const endpoint of lists) {
      for (const query of QUERIES) {
        const answer = await ask(endpoint, { query });
        if (TAKEN.has(query)) expect(answer.status).toBe(200);
        else await refused(answer, `${endpoint.path}?${query}`, [422]);
      }
    }
  });

  const SORTS = ['sort=__proto__', 'sort=password_hash', 'sort=1', 'sort=name;drop', 'sort=name,code', 'sort=', 'sort=NAME', 'sort=name&sort=code', 'order=up', 'order=asc;', 'order=ASC', 'state=any', 'state=', 'state=all&state=ready', 'kind=soup', 'place=1', 'batch=..', `q=${'x'.repeat(81)}`, 'q=a&q=b', 'kind=__proto__', 'place=null', 'batch=%00'];
  it(`by an unknown column or way is refused by the book, ${SORTS.length} times`, async () => {
    expect(SORTS.length).toBeGreaterThanOrEqual(LEAST);
    for (const query of SORTS) await refused(await ask(endpoints.listLots, { query }), query, [422]);
  });
});

describe('a request from elsewhere', () => {
  const BODY = JSON.stringify({ name: 'Perry', kind: 'cider', volume_l: 4, vessel_l: 5 });
  const HEADERS: ReadonlyArray<readonly [Record<string, string>, number]> = [
    ...['cross-site', 'same-site', 'none', '', 'SAME-ORIGIN', 'same-origin, cross-site', 'x'].map((site) => [{ 'sec-fetch-site': site }, 403] as const),
    ...['https://evil.example', 'null', 'http://127.0.0.1.evil.example', 'http://evil.example/http://127.0.0.1', 'file://', '', 'https://127.0.0.1@evil.example'].map((origin) => [{ 'sec-fetch-site': 'cross-site', origin }, 403] as const),
    ...['text/plain', 'application/x-www-form-urlencoded', 'multipart/form-data; boundary=x', '', 'text/json', 'application/xml', 'application/octet-stream', 'json', 'application/jsonx', 'text/plain; application/json'].map((type) => [{ 'content-type': type }, 415] as const),
  ];
  it(`changes nothing: ${HEADERS.length} origins and forms of content`, async () => {
    expect(HEADERS.length).toBeGreaterThanOrEqual(LEAST);
    const before = await Batch.count();
    for (const [headers, status] of HEADERS) await refused(await ask(endpoints.createBatch, { body: BODY, headers }), JSON.stringify(headers), [status]);
    expect(await Batch.count()).toBe(before);
  });
});

describe('a body of 100 MB', () => {
  const CHUNK = Buffer.alloc(65_536, 0x20);
  const WHOLE = 100_000_000;
  const written = all.filter(({ body, access }) => body && access !== 'sensor' && access !== 'anyone');
  it(`is read no further than the endpoint’s limit, at ${written.length} endpoints`, async () => {
    expect(written.length).toBeGreaterThanOrEqual(LEAST);
    for (const endpoint of written) {
      let sent = 0;
      const body = new ReadableStream<Uint8Array>({ pull: (controller) => void (sent >= WHOLE ? controller.close() : (controller.enqueue(CHUNK), (sent += CHUNK.length))) });
      const params = Object.fromEntries([...endpoint.path.matchAll(/\{(\w+)\}/g)].map((match) => [match[1]!, randomUUID()]));
      const answer = await ask(endpoint, { params, body });
      await refused(answer, `${endpoint.method} ${endpoint.path}`, [413]);
      expect(sent, endpoint.path).toBeLessThanOrEqual((endpoint.limitBytes ?? 1_000_000) + 4 * CHUNK.length);
      // Where its length says so, not at all.
      const told = await ask(endpoint, { params, body: '{}', headers: { 'content-length': String(WHOLE) } });
      expect([413, 403, 404, 422], endpoint.path).toContain(told.status);
    }
  });
});

describe('ten thousand batches', () => {
  const MANY = 10_000;
  beforeAll(async () => {
    await database().query(`insert into batches (cellar_id, name, kind, drink_colour, vessel_kind, volume_l, vessel_l, neck, pitched_at, created_at) select $cellarId, 'Batch ' || n, 'cider', 'gold', 'demijohn', 4.5, 5, 'airlock', now() - n * interval '1 minute', now() - n * interval '1 second' from generate_series(1, ${MANY}) n`, { bind: { cellarId } });
  });
  afterAll(() => Batch.destroy({ where: { cellarId } }));

  it('are listed page by page, each once, none left out', async () => {
    const seen = new Set<string>();
    let cursor: string | null = null;
    do {
      const answer = await ask(endpoints.listBatches, { query: `limit=200${cursor === null ? '' : `&cursor=${encodeURIComponent(cursor)}`}` });
      const page = batchList.parse(await answer.json());
      for (const { id } of page.items) seen.add(id);
      cursor = page.next_cursor;
    } while (cursor !== null);
    expect(seen.size).toBe(MANY + 1);
    expect(seen.has(batchId)).toBe(true);
  });

  const shelf = async (skip: number) => {
    const from = performance.now();
    const answer = await ask(endpoints.getShelf, { query: `from=${new Date(Date.now() - 14 * 86_400_000).toISOString()}&to=${new Date(Date.now() + 14 * 86_400_000).toISOString()}${skip > 0 ? `&skip=${skip}` : ''}` });
    expect(answer.status).toBe(200);
    const text = await answer.text();
    expect(performance.now() - from).toBeLessThan(3_000);
    return shelfSchema.parse(JSON.parse(text));
  };

  it('stand on the shelf part by part, each part within its time, what wants a person first', async () => {
    // The last but one of all, and it wants somebody.
    const [oldest] = await database().query<{ id: string }>(`select id from batches where cellar_id = $cellarId and name = 'Batch ${MANY - 1}'`, { bind: { cellarId }, type: QueryTypes.SELECT });
    const alert = await Alert.create({ cellarId, batchId: oldest!.id, call: 'stalled', level: 'act', state: 'open', since: new Date(), openedAt: new Date(), evidence: { verdict: 'yes', kind: null, since: null, headline: 'Stalled.', reason: 'No fall.', act: null, changesIt: null, evidence: [] } } as never);
    const first = await shelf(0);
    expect(first.items[0]!.id).toBe(oldest!.id);
    expect(first.total).toBe(MANY + 1);
    const seen = new Set(first.items.map((item) => item.id));
    for (let skip = first.items.length; skip < first.total; ) {
      const part = await shelf(skip);
      for (const { id } of part.items) seen.add(id);
      skip += part.items.length;
    }
    expect(seen.size).toBe(MANY + 1);
    await alert.destroy();
  }, 120_000);
});

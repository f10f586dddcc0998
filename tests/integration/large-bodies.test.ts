import { randomBytes } from 'node:crypto';
import { once } from 'node:events';
import { connect } from 'node:net';
import sharp from 'sharp';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry, buildMember } from '../support/factories';
import { useObjectStore } from '../support/object-store';
import { sessionCookie, startWeb, type Web } from '../support/web';

const db = useDatabase();
const store = useObjectStore();
let web: Web;
beforeAll(async () => {
  web = await startWeb({ databaseUrl: db.url, variables: { S3_PORT: String(store.port) } });
}, 700_000);
afterAll(() => web?.stop());

const MB = 1e6;
const send = (path: string, body: string | Buffer<ArrayBuffer>, headers: Record<string, string>) => fetch(`${web.url}/api/v1${path}`, { method: 'POST', headers: { 'sec-fetch-site': 'same-origin', 'content-type': 'application/json', ...headers }, body });

it('a file as large as may come arrives whole', async () => {
  const { personId, cellarId } = await buildMember('keeper');
  const { cookie } = await sessionCookie(personId);
  const ROWS = 60_000;
  const text = `time,sg,remark\n${Array.from({ length: ROWS }, (_, row) => `${new Date(Date.UTC(2026, 0, 1) + row * 60_000).toISOString()},1.050,${'x'.repeat(200)}\n`).join('')}`;
  expect(text.length).toBeGreaterThan(13 * MB);
  const looked = await send('/imports/preview', JSON.stringify({ kind: 'readings', file_name: 'log.csv', text }), { cookie });
  expect(looked.status).toBe(200);
  expect(await looked.text()).toContain(`${ROWS}`);

  const entry = await buildEntry(await buildBatch({ cellarId }), { text: 'Looks clear.', personId });
  const picture = await sharp(randomBytes(2_100 * 2_100 * 3), { raw: { width: 2_100, height: 2_100, channels: 3 } }).png({ compressionLevel: 0 }).toBuffer();
  expect(picture.length).toBeGreaterThan(13 * MB);
  const kept = await send(`/photos?entry=${entry.id}`, picture as Buffer<ArrayBuffer>, { cookie, 'content-type': 'image/png' });
  expect(kept.status, await kept.text()).toBe(201);
}, 60_000);

it('who may send nothing is told so at once, and nothing of it is kept in memory', async () => {
  const before = await web.memory();
  const port = Number(new URL(web.url).port);
  const half = Buffer.alloc(9 * MB, 0x20);
  const lines = Array.from({ length: 30 }, () => connect(port, '127.0.0.1').on('error', () => undefined));
  const answers = lines.map(async (line) => {
    line.write(`POST /api/v1/batches HTTP/1.1\r\nHost: house\r\nSec-Fetch-Site: same-origin\r\nContent-Type: application/json\r\nContent-Length: ${2 * half.length}\r\n\r\n`);
    line.write(half);
    const [said] = (await once(line, 'data')) as [Buffer];
    return said.toString('latin1').split('\r\n', 1)[0];
  });
  expect(new Set(await Promise.all(answers))).toEqual(new Set(['HTTP/1.1 401 Unauthorized']));
  expect((await send('/batches', Buffer.alloc(60 * MB, 0x20), {})).status).toBe(401);
  expect((await web.memory()) - before).toBeLessThan(150 * MB);
  for (const line of lines) line.destroy();
}, 60_000);

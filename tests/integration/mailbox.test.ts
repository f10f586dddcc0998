import { mkdtemp, readdir, rm, writeFile } from 'node:fs/promises';
import { request } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { smtpTransport } from '@/lib/mail/smtp';
import { startMailbox } from '@/scripts/fakes/mailbox/start';
import type { StoredMail } from '@/scripts/fakes/mailbox/store';
import { freePort } from '@/scripts/lib/postgres';

let folder: string;
let smtpPort: number;
let httpPort: number;
let mailbox: Awaited<ReturnType<typeof startMailbox>>;

beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'fallbright-mailbox-'));
  [smtpPort, httpPort] = [await freePort(), await freePort()];
  mailbox = await startMailbox({ smtpPort, httpPort, folder });
});
afterEach(async () => {
  await mailbox.stop();
  await rm(folder, { recursive: true, force: true });
});

async function send(subject: string, html = '<p>Hello</p>') {
  const transport = smtpTransport({ url: `smtp://127.0.0.1:${smtpPort}`, from: 'Fallbright <watch@barn.example>' });
  await transport.send({ to: { name: 'Una', address: 'una@barn.example' }, subject, text: 'Hello', html, messageId: `<${subject.length}@barn.example>`, inReplyTo: null });
  transport.close();
}
const mails = async (query = '') => ((await (await fetch(`http://127.0.0.1:${httpPort}/api/mails${query}`)).json()) as { items: StoredMail[] }).items;
const page = (path: string, init?: RequestInit) => fetch(`http://127.0.0.1:${httpPort}${path}`, { redirect: 'manual', ...init });

/** fetch sets its own Host. */
const statusWithHost = (host: string) =>
  new Promise<number | undefined>((resolve, reject) => request({ port: httpPort, host: '127.0.0.1', path: '/api/mails', headers: { host } }, (response) => resolve(response.statusCode)).on('error', reject).end());

it('keeps a mail with all that a reader and a test want to know', async () => {
  await send('Foam at the neck');
  expect(await mails()).toMatchObject([{ subject: 'Foam at the neck', envelope: { to: ['una@barn.example'] }, text: 'Hello', html: '<p>Hello</p>', message_id: '<16@barn.example>' }]);
  expect(await mails('?to=nobody@barn.example')).toEqual([]);
  expect(await (await page('/')).text()).toContain('Foam at the neck');
});

it('has its mails after a restart, without those half written', async () => {
  await send('First');
  await send('Second');
  await mailbox.stop();
  await writeFile(join(folder, '99999999999999-broken.json'), '{"id": "9');
  mailbox = await startMailbox({ smtpPort, httpPort, folder });
  expect((await mails()).map((mail) => mail.subject)).toEqual(['Second', 'First']);
});

it('shows a mail in a frame that may run nothing', async () => {
  await send('<b>Bold</b>', '<script>alert(1)</script><p onclick="x()">"quoted"</p>');
  const [mail] = await mails();
  const response = await page(`/mails/${mail!.id}`);
  const body = await response.text();
  expect(response.headers.get('content-security-policy')).toContain("default-src 'none'");
  expect(body).not.toMatch(/<script|<b>Bold/);
  expect(/<iframe[^>]* sandbox="([^"]*)"/.exec(body)?.[1]).not.toContain('allow-scripts');
  expect(body).toContain('&lt;script&gt;alert(1)&lt;/script&gt;');
});

it('deletes all', async () => {
  await send('One');
  expect((await page('/delete-all', { method: 'POST' })).status).toBe(303);
  expect(await mails()).toEqual([]);
  expect(await readdir(folder)).toEqual([]);
  await send('Two');
  expect((await page('/api/mails', { method: 'DELETE' })).status).toBe(204);
  expect(await mails()).toEqual([]);
});

it('answers no page but its own, and under no name but this machine’s', async () => {
  await send('One');
  expect((await page('/delete-all', { method: 'POST', headers: { origin: 'https://elsewhere.example' } })).status).toBe(403);
  expect(await statusWithHost('mailbox.example')).toBe(403);
  expect(await statusWithHost(`localhost:${httpPort}`)).toBe(200);
  expect(await mails()).toHaveLength(1);
});

it('says so where there is no such mail or page', async () => {
  for (const path of ['/mails/nothing', '/api/mails/nothing', '/elsewhere', '/mails/..%2f..%2fetc%2fpasswd']) expect((await page(path)).status).toBe(404);
});

it('refuses what is larger than any mail of ours', async () => {
  await expect(send('Big', 'x'.repeat(6_000_000))).rejects.toMatchObject({ kind: 'refused' });
  expect(await mails()).toEqual([]);
});

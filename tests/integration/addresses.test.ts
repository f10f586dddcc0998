import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createShare as shareForm } from '@/lib/contracts/shares';
import { createJob as jobForm } from '@/lib/contracts/jobs';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { createJob } from '@/lib/services/jobs/create';
import { revokeShare } from '@/lib/services/shares/manage';
import { bottleForm, ciderAt, isoAt } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';
import { call, sessionCookie, startWeb, type Web } from '../support/web';

describe('addresses that are the key by themselves, and files', () => {
  const db = useDatabase();
  let web: Web;
  beforeAll(async () => {
    web = await startWeb({ databaseUrl: db.url });
  }, 700_000);
  afterAll(async () => {
    await web?.stop();
  });

  async function story() {
    const brewer = await buildMember('brewer');
    const now = Date.now();
    const batch = await ciderAt(brewer, { now });
    const lot = await bottleBatch(brewer, batch.id, bottleForm({ at: isoAt(now) }));
    return { brewer, batch, lot, cookie: (await sessionCookie(brewer.personId)).cookie };
  }

  it('show a shared batch and take a guest’s note without a session, until the link is revoked', async () => {
    const { brewer, batch, lot, cookie } = await story();
    // Through the server, so that its own secret makes the address.
    const made = await call(web, 'POST', `/api/v1/batches/${batch.id}/shares`, { cookie, body: shareForm.parse({}) });
    expect(made.status).toBe(201);
    const token = /\/share\/([A-Za-z0-9_-]{32})$/.exec(made.body.url)![1]!;
    const page = await call(web, 'GET', `/api/v1/share/${token}`, { headers: { 'sec-fetch-site': 'cross-site' } });
    expect(page.status).toBe(200);
    expect(page.body).toMatchObject({ name: 'Orchard cider', lots: [{ id: lot.id }] });
    expect(page.headers.get('cache-control')).toContain('no-store');
    const note = (body: unknown) => call(web, 'POST', `/api/v1/share/${token}/tastings`, { body });
    expect((await note({ lot_id: lot.id, score: 8 })).status).toBe(201);
    expect(await note({ lot_id: lot.id, score: 80 })).toMatchObject({ status: 422, body: { errors: { score: ['must be 1 to 10'] } } });
    await revokeShare(brewer, made.body.id);
    for (const answer of [await call(web, 'GET', `/api/v1/share/${token}`), await call(web, 'GET', '/api/v1/share/short'), await note({ lot_id: lot.id, score: 8 })]) expect(answer.status).toBe(404);
  });

  it('give the rounds as a calendar', async () => {
    const { brewer, cookie } = await story();
    await createJob(brewer, jobForm.parse({ title: 'Rack the perry', due_at: isoAt(Date.now()) }));
    const made = await call(web, 'POST', '/api/v1/calendar', { cookie });
    const path = new URL(made.body.url).pathname;
    const calendar = await call(web, 'GET', path);
    expect(calendar.status).toBe(200);
    expect(calendar.headers.get('content-type')).toBe('text/calendar; charset=utf-8');
    expect(calendar.body).toContain('SUMMARY:Rack the perry');
    await call(web, 'DELETE', '/api/v1/calendar', { cookie });
    expect((await call(web, 'GET', path)).status).toBe(404);
  });

  it('give labels as a PDF that only our own pages may frame, and the book as CSV', async () => {
    const { lot, cookie } = await story();
    const labels = await call(web, 'GET', `/api/v1/lots/${lot.id}/labels.pdf?stock=letter_6&design=bands`, { cookie });
    expect(labels.status).toBe(200);
    expect(labels.headers.get('content-type')).toBe('application/pdf');
    expect(labels.headers.get('content-security-policy')).toContain("frame-ancestors 'self'");
    expect(labels.headers.get('x-frame-options')).toBe('SAMEORIGIN');
    expect(String(labels.body).slice(0, 5)).toBe('%PDF-');
    const book = await call(web, 'GET', '/api/v1/lots.csv', { cookie });
    expect(book.headers.get('content-disposition')).toBe('attachment; filename="cellar-book.csv"');
    expect(book.body).toContain(lot.code);
    expect((await call(web, 'GET', `/api/v1/lots/${lot.id}`, { cookie })).headers.get('x-frame-options')).toBe('DENY');
  });

  it('stop a bottling of an unfinished batch over the wire, and say nothing of a dose', async () => {
    const keeper = await buildMember('keeper');
    const batch = await ciderAt(keeper, { now: Date.now(), fg: 1.02 });
    const { cookie } = await sessionCookie(keeper.personId);
    const form = { ...bottleForm(), at: isoAt(Date.now()) };
    const verdict = await call(web, 'POST', `/api/v1/batches/${batch.id}/bench`, { cookie, body: form });
    expect(verdict).toMatchObject({ status: 200, body: { verdict: 'stop' } });
    expect(JSON.stringify(verdict.body)).not.toMatch(/"(dose|total_g|g_per_l|total_drops)"/);
    const refused = await call(web, 'POST', `/api/v1/batches/${batch.id}/bottle`, { cookie, body: { ...form, done: { verdict: 'done' }, verdict: 'safe', dose: { way: 'weighed', total_g: 30 } } });
    expect(refused.status).toBe(409);
    expect(refused.body.detail).toMatch(/Do not bottle/);
    expect((await call(web, 'GET', `/api/v1/lots?batch=${batch.id}`, { cookie })).body.items).toEqual([]);
  });
});

import { setImmediate as turn } from 'node:timers/promises';
import sharp from 'sharp';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { POST as telemetry } from '@/app/api/v1/telemetry/route';
import { Entry, Photo } from '@/db/models';
import { endpoints } from '@/lib/contracts/endpoints';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry, buildMember, buildSensor } from '../support/factories';
import { useObjectStore } from '../support/object-store';
import { askRoute } from '../support/routes';
import { sessionCookie } from '../support/web';

vi.mock('server-only', () => ({}));
useDatabase();
useObjectStore();
afterEach(() => {
  vi.useRealTimers();
});

const MINUTE_MS = 60_000;
const good = { at: '2026-03-04T05:45:00Z', gravity: 1.048, temperature: 19.5 };

/** Asks with a body whose second half comes a minute after its first, or never: then the line breaks. */
async function slowly(ask: (body: ReadableStream<Uint8Array>) => Promise<Response>, body: Buffer, breaks = false): Promise<Response> {
  vi.useFakeTimers({ toFake: ['setTimeout', 'clearTimeout'] });
  let line: ReadableStreamDefaultController<Uint8Array> | undefined;
  let wanted = 0;
  const stream = new ReadableStream<Uint8Array>({ start: (controller) => void (line = controller), pull: () => void (wanted += 1) }, { highWaterMark: 0 });
  const answer = ask(stream);
  while (wanted === 0) await turn();
  line!.enqueue(body.subarray(0, body.length / 2));
  while (wanted === 1) await turn();
  await vi.advanceTimersByTimeAsync(MINUTE_MS);
  if (breaks) line!.error(new Error('aborted'));
  else {
    line!.enqueue(body.subarray(body.length / 2));
    line!.close();
  }
  return answer;
}

async function scene() {
  const hand = await buildMember('hand');
  const batch = await buildBatch({ cellarId: hand.cellarId });
  const { cookie } = await sessionCookie(hand.personId);
  return { hand, batch, cookie };
}

describe('a body on a slow line', () => {
  it('is waited for: a photo', async () => {
    const { hand, batch, cookie } = await scene();
    const entry = await buildEntry(batch, { text: 'Looks clear.', personId: hand.personId });
    const picture = await sharp({ create: { width: 640, height: 480, channels: 3, background: '#7a5230' } }).jpeg().toBuffer();
    const answer = await slowly((body) => askRoute(endpoints.keepPhoto, { cookie, query: `entry=${entry.id}`, body, headers: { 'content-type': 'image/jpeg' } }), picture);
    expect(answer.status, await answer.text()).toBe(201);
    expect(await Photo.count({ where: { entryId: entry.id } })).toBe(1);
  });

  it('is waited for: a line of the log', async () => {
    const { batch, cookie } = await scene();
    const note = Buffer.from(JSON.stringify({ kind: 'note', at: good.at, text: 'Smells clean.' }));
    const answer = await slowly((body) => askRoute(endpoints.createEntry, { cookie, params: { id: batch.id }, body }), note);
    expect(answer.status, await answer.text()).toBe(201);
  });

  it('is waited for: what a sensor sends', async () => {
    const { sensor, secret } = await buildSensor();
    const answer = await slowly((body) => telemetry(new Request('http://127.0.0.1/api/v1/telemetry', { method: 'POST', body, duplex: 'half', headers: { 'content-type': 'application/json', authorization: `Bearer ${sensor.identifier}:${secret}` } } as RequestInit)), Buffer.from(JSON.stringify(good)));
    expect(answer.status).toBe(202);
    expect(await answer.json()).toMatchObject({ stored: 1 });
  });

  it('that breaks off changes nothing, and is no fault of the house', async () => {
    const { batch, cookie } = await scene();
    const note = Buffer.from(JSON.stringify({ kind: 'note', at: good.at, text: 'Smells clean.' }));
    const answer = await slowly((body) => askRoute(endpoints.createEntry, { cookie, params: { id: batch.id }, body }), note, true);
    expect(answer.status).toBe(400);
    expect(await Entry.count({ where: { batchId: batch.id } })).toBe(0);
  });
});

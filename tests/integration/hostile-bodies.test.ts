import { randomUUID } from 'node:crypto';
import { NextRequest } from 'next/server';
import { QueryTypes } from 'sequelize';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { POST as acknowledgeAlert } from '@/app/api/v1/alerts/[id]/acknowledge/route';
import { GET as listBatches, POST as startBatch } from '@/app/api/v1/batches/route';
import { Batch } from '@/db/models';
import { problem } from '@/lib/contracts/common';
import { recordMessages } from '@/lib/services/readings/record';
import { useDatabase } from '../support/database';
import { buildMember, buildSensor } from '../support/factories';
import { HOSTILE_BODIES } from '../support/hostile/bodies';
import { sessionCookie } from '../support/web';

vi.mock('server-only', () => ({}));
const db = useDatabase();

const HOUSE = 'http://127.0.0.1';
let cookie = '';
let cellarId = '';
beforeAll(async () => {
  const keeper = await buildMember('keeper');
  cellarId = keeper.cellarId;
  cookie = (await sessionCookie(keeper.personId)).cookie;
});

const ask = (body: string | Buffer, headers: Record<string, string> = {}) =>
  startBatch(new NextRequest(`${HOUSE}/api/v1/batches`, { method: 'POST', body: typeof body === 'string' ? body : new Uint8Array(body), headers: { cookie, 'content-type': 'application/json', 'sec-fetch-site': 'same-origin', ...headers } }), {});

const LEAST = 20;
const counts: Record<string, number> = {};
afterAll(() => {
  for (const [name, count] of Object.entries(counts)) expect(count, name).toBeGreaterThanOrEqual(LEAST);
});

describe('a request without a body', () => {
  const bare = (headers: Record<string, string> = {}, body?: string) => ({ method: 'POST', body, headers: { cookie, 'sec-fetch-site': 'same-origin', ...headers } });
  it('is asked for no type: it leaves out all that may be left out', async () => {
    const id = randomUUID();
    const acknowledge = (init: ReturnType<typeof bare>) => acknowledgeAlert(new NextRequest(`${HOUSE}/api/v1/alerts/${id}/acknowledge`, init), { params: Promise.resolve({ id }) });
    expect((await acknowledge(bare())).status).toBe(404);
    expect((await acknowledge(bare({ 'content-type': 'text/plain' }))).status).toBe(415);
    expect((await startBatch(new NextRequest(`${HOUSE}/api/v1/batches`, bare()), {})).status).toBe(422);
  });
});

describe.each(Object.entries(HOSTILE_BODIES))('a new batch, %s', (name, cases) => {
  it(`is refused with a reason or kept as it was meant, ${cases.length} times`, async () => {
    counts[name] = cases.length;
    expect(cases.length).toBeGreaterThanOrEqual(LEAST);
    for (const { what, body, headers, kept } of cases) {
      const before = await Batch.count({ where: { cellarId } });
      const answer = await ask(body, headers);
      const said = (await answer.json()) as { name?: string };
      if (kept === undefined) {
        expect(answer.status, `${what}: ${JSON.stringify(said).slice(0, 200)}`).toBeGreaterThanOrEqual(400);
        expect(answer.status, what).toBeLessThan(500);
        const { detail, title, errors } = problem.parse(said);
        expect(`${title}${detail ?? ''}${Object.values(errors ?? {}).flat().join('')}`.length, what).toBeGreaterThan(5);
        expect(JSON.stringify(said).length, what).toBeLessThan(3_000);
        expect(await Batch.count({ where: { cellarId } }), what).toBe(before);
      } else {
        expect(answer.status, `${what}: ${JSON.stringify(said).slice(0, 200)}`).toBe(201);
        expect(said.name, what).toBe(kept);
        expect(await Batch.count({ where: { cellarId } }), what).toBe(before + 1);
      }
    }
    expect(({} as Record<string, unknown>).polluted).toBeUndefined();
    // The list still opens.
    expect((await listBatches(new NextRequest(`${HOUSE}/api/v1/batches?limit=200`, { headers: { cookie } }), {})).status).toBe(200);
  });
});

describe.each(Object.entries(HOSTILE_BODIES))('a sensor’s message, %s', (_name, cases) => {
  it('is set aside with its reason, acknowledged, and nothing of it lost', async () => {
    const { sensor } = await buildSensor({ cellarId });
    const messages = cases.map(({ body }) => ({ sensor: { id: sensor.id, cellarId, identifier: sensor.identifier }, road: 'mqtt' as const, body: Buffer.from(body as string), arrivedAt: Date.now() }));
    const { refused } = await recordMessages(messages);
    cases.forEach(({ what }, index) => {
      expect(refused[index]?.length, what).toBeGreaterThan(0);
      for (const { reason } of refused[index] ?? []) expect(reason.length, what).toBeGreaterThan(5);
    });
    const kept = await db.sequelize.query<{ n: number }>('select count(*)::int as n from refusals where sensor_id = $id', { bind: { id: sensor.id }, type: QueryTypes.SELECT });
    expect(kept[0]!.n).toBe(refused.reduce((sum, reasons) => sum + reasons.length, 0));
  });
});

import { QueryTypes } from 'sequelize';
import { describe, expect, it, vi } from 'vitest';
import { POST } from '@/app/api/v1/telemetry/route';
import { Sensor } from '@/db/models';
import { problem } from '@/lib/contracts/common';
import { telemetryResult } from '@/lib/contracts/telemetry';
import { metrics } from '@/lib/http/metrics';
import { useDatabase } from '../support/database';
import { buildSensor } from '../support/factories';

// The marker that keeps server code out of browsers has no meaning in a test's process.
vi.mock('server-only', () => ({}));

const db = useDatabase();
const good = { at: '2026-03-04T05:45:00Z', gravity: 1.048, temperature: 19.5 };

function send(body: BodyInit, headers: Record<string, string> = {}): Promise<Response> {
  return POST(new Request('http://127.0.0.1/api/v1/telemetry', { method: 'POST', body, headers: { 'content-type': 'application/json', ...headers } }));
}
async function sensorWithHeader() {
  const { sensor, secret } = await buildSensor();
  return { sensor, headers: { authorization: `Bearer ${sensor.identifier}:${secret}` } };
}
const count = async (table: 'readings' | 'refusals', sensor: Sensor) => (await db.sequelize.query<{ n: number }>(`select count(*)::int as n from ${table} where sensor_id = $1`, { bind: [sensor.id], type: QueryTypes.SELECT }))[0]!.n;
const problemOf = async (response: Response) => problem.parse(await response.json());

describe('POST /api/v1/telemetry', () => {
  it('takes what MQTT takes and answers 202 with counts once it is committed', async () => {
    const { sensor, headers } = await sensorWithHeader();
    const response = await send(JSON.stringify([good, good, { ...good, temperature: 99 }]), headers);
    expect(response.status).toBe(202);
    expect(telemetryResult.parse(await response.json())).toEqual({ stored: 1, duplicates: 1, refused: [{ index: 2, reason: 'temperature must be between -10 and 60 °C' }] });
    expect([await count('readings', sensor), await count('refusals', sensor)]).toEqual([1, 1]);
  });

  it('counts among the requests of the house, whatever came of it', async () => {
    const counted = async (status: number) => (await metrics().requests.get()).values.find(({ metricName, labels }) => metricName?.endsWith('_count') && labels.route === '/telemetry' && labels.status === status)?.value ?? 0;
    const [good202, bad401] = [await counted(202), await counted(401)];
    await send(JSON.stringify(good), (await sensorWithHeader()).headers);
    await send(JSON.stringify(good));
    expect([await counted(202), await counted(401)]).toEqual([good202 + 1, bad401 + 1]);
  });

  it('takes SenML by its content type', async () => {
    const { sensor, headers } = await sensorWithHeader();
    const pack = [{ bn: 'float:', bt: Date.parse(good.at) / 1000, n: 'density', u: 'kg/m3', v: 1046 }, { n: 'temperature', u: 'Cel', v: 19.5 }];
    const response = await send(JSON.stringify(pack), { ...headers, 'content-type': 'application/senml+json' });
    expect(await response.json()).toMatchObject({ stored: 1, refused: [] });
    expect(await count('readings', sensor)).toBe(1);
  });

  it('keeps a body that cannot be read as refused, with 202: sending it again would not help', async () => {
    const { sensor, headers } = await sensorWithHeader();
    for (const [body, reason] of [['', 'the message is empty'], ['{', 'the message is not JSON'], ['7', 'the message must be a JSON object or an array of them']] as const) {
      const response = await send(body, headers);
      expect(response.status).toBe(202);
      expect(await response.json()).toEqual({ stored: 0, duplicates: 0, refused: [{ index: 0, reason }] });
    }
    expect(await count('refusals', sensor)).toBe(3);
  });

  it.each([
    ['no credential', {}],
    ['a wrong secret', { authorization: 'Bearer fs-nobody:wrong' }],
    ['a person’s token', { authorization: 'Bearer fbt_abc' }],
    ['another scheme', { authorization: 'Basic ZnM6eA==' }],
    ['control characters', { authorization: 'Bearer fs-nobody:a\tb' }],
  ] as Array<[string, Record<string, string>]>)('answers 401 to %s', async (_name, headers) => {
    const response = await send(JSON.stringify(good), headers);
    expect(response.status).toBe(401);
    expect((await problemOf(response)).type).toBe('urn:fallbright:problem:unauthenticated');
  });

  it('answers 401 to a sensor that is switched off', async () => {
    const { sensor, secret } = await buildSensor({ disabledAt: new Date() });
    expect((await send(JSON.stringify(good), { authorization: `Bearer ${sensor.identifier}:${secret}` })).status).toBe(401);
  });

  it('answers 429 after many wrong secrets for one name, and says when to try again', async () => {
    const { sensor, headers } = await sensorWithHeader();
    for (let attempt = 0; attempt < 10; attempt += 1) expect((await send('{}', { authorization: `Bearer ${sensor.identifier}:guess${attempt}` })).status).toBe(401);
    const response = await send(JSON.stringify(good), headers);
    expect(response.status).toBe(429);
    expect(Number(response.headers.get('retry-after'))).toBeGreaterThan(0);
    expect(await count('readings', sensor)).toBe(0);
  });

  it('answers 413 to more than a message may have, read no further than that', async () => {
    const { sensor, headers } = await sensorWithHeader();
    const response = await send('x'.repeat(262_145), headers);
    expect(response.status).toBe(413);
    expect(await count('refusals', sensor)).toBe(0);
  });

  it('answers 503 while the database is stalled, and has lost nothing after', async () => {
    const { sensor, headers } = await sensorWithHeader();
    expect((await send(JSON.stringify(good), headers)).status).toBe(202);
    const lock = await db.sequelize.transaction();
    await db.sequelize.query('lock table readings in access exclusive mode', { transaction: lock });
    const next = JSON.stringify({ ...good, at: '2026-03-04T05:50:00Z' });
    try {
      const response = await send(next, headers);
      expect(response.status).toBe(503);
      expect(Number(response.headers.get('retry-after'))).toBeGreaterThan(0);
    } finally {
      await lock.rollback();
    }
    const again = telemetryResult.parse(await (await send(next, headers)).json());
    expect(again.stored + again.duplicates).toBe(1);
    expect(await count('readings', sensor)).toBe(2);
  });
});

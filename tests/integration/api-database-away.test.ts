import { describe, expect, it } from 'vitest';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember } from '../support/factories';
import { useGatedWeb } from '../support/gated-web';
import { until } from '../support/processes';
import { call, sessionCookie, signInOverHttp } from '../support/web';

/** Long enough for a busy machine, short enough for somebody who waits. */
const SOON_MS = 9_000;

describe('the web server when the database is away', () => {
  const db = useDatabase();
  const house = useGatedWeb(db);

  async function timed<T>(work: () => Promise<T>): Promise<[T, number]> {
    const from = Date.now();
    return [await work(), Date.now() - from];
  }

  it('says 503 soon while the database refuses, keeps running, and answers as before when it is back', async () => {
    const member = await buildMember('keeper');
    const batch = await buildBatch({ cellarId: member.cellarId });
    const { cookie } = await sessionCookie(member.personId);
    const ask = () => call(house.web, 'GET', `/api/v1/batches/${batch.id}`, { cookie });
    expect((await ask()).status).toBe(200);

    await house.gate.cut();
    for (let round = 0; round < 3; round += 1) {
      const [answer, took] = await timed(ask);
      expect(answer.status).toBe(503);
      expect(answer.body).toMatchObject({ type: 'urn:fallbright:problem:unavailable', status: 503 });
      expect(Number(answer.headers.get('retry-after'))).toBeGreaterThan(0);
      expect(took).toBeLessThan(SOON_MS);
    }
    const [health, took] = await timed(() => call(house.web, 'GET', '/api/health'));
    expect(health).toMatchObject({ status: 503, body: { parts: { database: 'down' } } });
    expect(took).toBeLessThan(SOON_MS);
    expect((await signInOverHttp(house.web, { email: member.person.email, password: 'any' }, { 'x-forwarded-for': '192.0.2.77' })).error).toBe('unavailable');

    await house.gate.open();
    await until('the server to answer again', async () => (await ask()).status === 200, 20_000);
  });

  it('says 503 soon while the database stalls, to many at once, and recovers', async () => {
    const member = await buildMember('keeper');
    const { cookie } = await sessionCookie(member.personId);
    const ask = () => call(house.web, 'GET', '/api/v1/batches', { cookie });
    expect((await ask()).status).toBe(200);

    house.gate.stall();
    const [answers, took] = await timed(() => Promise.all(Array.from({ length: 30 }, ask)));
    expect(new Set(answers.map((answer) => answer.status))).toEqual(new Set([503]));
    expect(took).toBeLessThan(SOON_MS);

    await house.gate.open();
    await until('the server to answer again', async () => (await ask()).status === 200, 40_000);
  });

  it('writes down that the database was away', () => {
    expect(house.web.output()).toContain('the database did not answer');
  });
});

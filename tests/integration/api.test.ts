import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Assignment, AuditRow, Batch, Entry, Sensor } from '@/db/models';
import { alertList } from '@/lib/contracts/alerts';
import { assessmentSchema, judgementSchema } from '@/lib/contracts/assessment';
import { batchList, batchSchema, entryList, shelfSchema } from '@/lib/contracts/batches';
import { problem } from '@/lib/contracts/common';
import { createdSensorSchema, sensorSchema } from '@/lib/contracts/sensors';
import { hashSensorSecret } from '@/lib/auth/sensors';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry, buildMember, buildSensor, writeReadings } from '../support/factories';
import { call, sessionCookie, startWeb, type Answer, type Web } from '../support/web';

const HOUR_MS = 3_600_000;
const DAY_MS = 24 * HOUR_MS;

describe('the web API', () => {
  const db = useDatabase();
  let web: Web;
  beforeAll(async () => {
    web = await startWeb({ databaseUrl: db.url });
  }, 700_000);
  afterAll(async () => {
    await web?.stop();
  });

  /** A keeper of a new cellar, and the API as they see it. */
  async function keeper() {
    const member = await buildMember('keeper');
    const { cookie } = await sessionCookie(member.personId);
    const ask = (method: string, path: string, body?: unknown, headers?: Record<string, string>): Promise<Answer> => call(web, method, `/api/v1${path}`, { cookie, body, headers });
    return { ...member, ask };
  }

  it('answers an address that it does not have with a problem document, whoever asks', async () => {
    const { ask } = await keeper();
    for (const answer of [await ask('GET', '/batch'), await ask('POST', '/batches/x/y/z', {}), await call(web, 'GET', '/api/nothing')]) {
      expect(answer.status).toBe(404);
      expect(answer.headers.get('content-type')).toBe('application/problem+json');
      expect(problem.parse(answer.body).type).toBe('urn:fallbright:problem:not-found');
    }
  });

  const CIDER = { name: 'Quince and crab', kind: 'cider', volume_l: 4.5, vessel_l: 5 };

  describe('batches', () => {
    it('starts a batch with its pitch in the log and its sensor in it from the pitch on', async () => {
      const { ask, cellarId } = await keeper();
      const { sensor } = await buildSensor({ cellarId });
      const pitched = new Date(Date.now() - DAY_MS).toISOString();
      const made = await ask('POST', '/batches', { ...CIDER, pitched_at: pitched, original_gravity: 1.058, neck: 'blow_off', sensor: sensor.identifier, attenuation_min_percent: 95, attenuation_max_percent: 105 });
      expect(made.status).toBe(201);
      const batch = batchSchema.parse(made.body);
      expect(batch).toMatchObject({ name: 'Quince and crab', state: 'working', pitched_at: pitched, original_gravity: 1.058, sensor: { id: sensor.identifier, last_heard_at: null }, assessment: null, alerts: [] });
      const log = entryList.parse((await ask('GET', `/batches/${batch.id}/entries`)).body);
      expect(log.items).toMatchObject([{ kind: 'pitch', at: pitched, gravity: 1.058, neck: 'blow_off', volume_l: 4.5 }]);
      const [assignment] = await Assignment.findAll({ where: { batchId: batch.id } });
      expect(assignment?.fromAt.toISOString()).toBe(pitched);
      expect(await AuditRow.count({ where: { subject: batch.id, action: 'batch.created' } })).toBe(1);
    });

    it('says by field what is wrong with a batch', async () => {
      const { ask } = await keeper();
      const answer = await ask('POST', '/batches', { name: '  ', kind: 'soup', volume_l: 6, vessel_l: 5, original_gravity: 1058, attenuation_min_percent: 90, pitched_at: '2026-02-30T00:00:00Z' });
      expect(answer.status).toBe(422);
      expect(answer.headers.get('content-type')).toBe('application/problem+json');
      const { type, errors } = problem.parse(answer.body);
      expect(type).toBe('urn:fallbright:problem:invalid');
      expect(Object.keys(errors ?? {})).toEqual(expect.arrayContaining(['name', 'kind', 'original_gravity', 'pitched_at']));
      const spans = await ask('POST', '/batches', { ...CIDER, volume_l: 6, attenuation_min_percent: 90 });
      expect(spans.body.errors).toMatchObject({ volume_l: ['is more than the vessel holds'], attenuation_max_percent: ['give both ends of the range, or neither'] });
      const ahead = await ask('POST', '/batches', { ...CIDER, pitched_at: new Date(Date.now() + DAY_MS).toISOString() });
      expect(Object.keys(ahead.body.errors)).toEqual(['pitched_at']);
    });

    it('lists the newest first, page by page, each once', async () => {
      const { ask, cellarId } = await keeper();
      for (let n = 0; n < 7; n += 1) await buildBatch({ cellarId, name: `B${n}` });
      const names: string[] = [];
      let cursor: string | null = '';
      while (cursor !== null) {
        const page: ReturnType<typeof batchList.parse> = batchList.parse((await ask('GET', `/batches?limit=3${cursor && `&cursor=${cursor}`}`)).body);
        names.push(...page.items.map((item) => item.name));
        cursor = page.next_cursor;
      }
      expect(names).toEqual(['B6', 'B5', 'B4', 'B3', 'B2', 'B1', 'B0']);
    });

    it('checks a change against what is kept of the batch', async () => {
      const { ask, cellarId } = await keeper();
      const batch = await buildBatch({ cellarId, volumeL: 4.5, vesselL: 5, temperatureMinC: 14, temperatureMaxC: 20 });
      const change = (body: unknown) => ask('PATCH', `/batches/${batch.id}`, body);
      expect((await change({ volume_l: 6 })).body.errors).toEqual({ volume_l: ['is more than the vessel holds'] });
      expect((await change({ temperature_min_c: 21 })).status).toBe(422);
      expect((await change({ temperature_min_c: null })).status).toBe(422);
      expect((await change({ volume_l: 6, vessel_l: 10, name: 'Bigger' })).body).toMatchObject({ volume_l: 6, vessel_l: 10, name: 'Bigger' });
      expect((await batch.reload()).temperatureMinC).toBe(14);
    });

    it('logs a change of neck, moves the pitch in the log, and takes the sensor out of a batch that ends', async () => {
      const { ask, cellarId } = await keeper();
      const made = batchSchema.parse((await ask('POST', '/batches', { ...CIDER, pitched_at: new Date(Date.now() - 2 * DAY_MS).toISOString(), neck: 'blow_off' })).body);
      const { sensor } = await buildSensor({ cellarId, batch: await Batch.findByPk(made.id, { rejectOnEmpty: true }), fromAt: new Date(Date.now() - DAY_MS) });
      const moved = new Date(Date.now() - DAY_MS).toISOString();
      const changed = await ask('PATCH', `/batches/${made.id}`, { neck: 'airlock', pitched_at: moved });
      expect(changed.body).toMatchObject({ neck: 'airlock', pitched_at: moved });
      const log = entryList.parse((await ask('GET', `/batches/${made.id}/entries`)).body).items;
      expect(log.map(({ kind, neck }) => [kind, neck])).toEqual([
        ['neck', 'airlock'],
        ['pitch', 'blow_off'],
      ]);
      expect(log[1]!.at).toBe(moved);
      const ended = await ask('PATCH', `/batches/${made.id}`, { state: 'ended' });
      expect(ended.body).toMatchObject({ state: 'ended', sensor: null });
      expect((await Assignment.findOne({ where: { sensorId: sensor.id } }))?.toAt).not.toBeNull();
      expect((await ask('PATCH', `/batches/${made.id}`, { state: 'working' })).body).toMatchObject({ state: 'working', ended_at: null });
    });
  });

  describe('the log', () => {
    it('keeps a reading as read and corrected to 20 °C', async () => {
      const { ask, cellarId } = await keeper();
      const batch = await buildBatch({ cellarId });
      const made = await ask('POST', `/batches/${batch.id}/entries`, { kind: 'reading', at: '2026-03-01T08:00:00Z', gravity: 1.05, temperature_c: 28 });
      expect(made.status).toBe(201);
      expect(made.body.gravity_read).toBe(1.05);
      // A warm sample floats the hydrometer lower: water alone loses 0.0020 from 20 to 28 °C (CRC Handbook of Chemistry and Physics, density of water: 0.99821 and 0.99626 g/mL).
      expect(made.body.gravity).toBeGreaterThan(1.0515);
      expect(made.body.gravity).toBeLessThan(1.0535);
      expect((await ask('POST', `/batches/${batch.id}/entries`, { kind: 'reading', at: '2026-03-01T08:00:00Z', gravity: 1.05, temperature_c: 55 })).body.errors.temperature_c).toHaveLength(1);
    });

    it('keeps one entry when the same one is sent twice, even at once', async () => {
      const { ask, cellarId } = await keeper();
      const batch = await buildBatch({ cellarId, volumeL: 3, vesselL: 5 });
      const entry = { kind: 'top_up', at: '2026-03-01T08:00:00Z', volume_l: 0.5, client_id: randomUUID() };
      const answers = await Promise.all(Array.from({ length: 6 }, () => ask('POST', `/batches/${batch.id}/entries`, entry)));
      expect(new Set(answers.map((answer) => answer.status))).toEqual(new Set([201]));
      expect(new Set(answers.map((answer) => answer.body.id)).size).toBe(1);
      expect((await batch.reload()).volumeL).toBe(3.5);
      const other = await buildBatch({ cellarId });
      expect((await ask('POST', `/batches/${other.id}/entries`, entry)).status).toBe(409);
    });

    it('lets neck, volume and pitch of the batch follow the log, a late entry only the past, and a taken back one be undone', async () => {
      const { ask } = await keeper();
      const made = batchSchema.parse((await ask('POST', '/batches', { ...CIDER, pitched_at: '2026-03-01T00:00:00Z', neck: 'blow_off' })).body);
      const log = (body: Record<string, unknown>) => ask('POST', `/batches/${made.id}/entries`, body);
      const now = async () => {
        const { neck, volume_l, pitched_at } = batchSchema.parse((await ask('GET', `/batches/${made.id}`)).body);
        return { neck, volume_l, pitched_at };
      };
      const swap = await log({ kind: 'neck', at: '2026-03-05T00:00:00Z', neck: 'airlock' });
      await log({ kind: 'neck', at: '2026-03-03T00:00:00Z', neck: 'open' });
      expect(await now()).toMatchObject({ neck: 'airlock' });
      const rack = await log({ kind: 'rack', at: '2026-03-10T00:00:00Z', volume_l: 4 });
      expect(await now()).toMatchObject({ volume_l: 4 });
      const top = await log({ kind: 'top_up', at: '2026-03-11T00:00:00Z', volume_l: 0.4 });
      expect((await now()).volume_l).toBeCloseTo(4.4, 6);
      expect((await log({ kind: 'top_up', at: '2026-03-12T00:00:00Z', volume_l: 2 })).body.errors).toEqual({ volume_l: ['the vessel holds 5 L'] });

      for (const [entry, expected] of [
        [top, { volume_l: 4 }],
        [rack, { volume_l: 4.5 }],
        [swap, { neck: 'open' }],
      ] as const) {
        expect((await ask('DELETE', `/batches/${made.id}/entries/${entry.body.id}`)).status).toBe(204);
        expect(await now()).toMatchObject(expected);
      }
      const repitch = await log({ kind: 'pitch', at: '2026-03-02T00:00:00Z' });
      expect((await now()).pitched_at).toBe('2026-03-02T00:00:00.000Z');
      await ask('DELETE', `/batches/${made.id}/entries/${repitch.body.id}`);
      expect((await now()).pitched_at).toBe('2026-03-01T00:00:00.000Z');
      expect(await Entry.count({ where: { batchId: made.id } })).toBe(6);
    });

    it('goes through a long log page by page, each entry once', async () => {
      const { ask, cellarId } = await keeper();
      const batch = await buildBatch({ cellarId });
      const at = new Date('2026-03-01T00:00:00Z');
      // Some at the very same time, so that time alone does not order them.
      for (let n = 0; n < 11; n += 1) await buildEntry(batch, { text: `n${n}`, at: new Date(at.getTime() + Math.floor(n / 3) * HOUR_MS) });
      const seen: string[] = [];
      let cursor: string | null = '';
      while (cursor !== null) {
        const page: ReturnType<typeof entryList.parse> = entryList.parse((await ask('GET', `/batches/${batch.id}/entries?limit=4${cursor && `&cursor=${cursor}`}`)).body);
        seen.push(...page.items.map((item) => item.text!));
        cursor = page.next_cursor;
      }
      expect(seen).toHaveLength(11);
      expect(new Set(seen).size).toBe(11);
    });

    it('says what an entry lacks', async () => {
      const { ask, cellarId } = await keeper();
      const batch = await buildBatch({ cellarId });
      const wrong = async (body: Record<string, unknown>) => Object.keys((await ask('POST', `/batches/${batch.id}/entries`, { at: '2026-03-01T00:00:00Z', ...body })).body.errors ?? {});
      expect(await wrong({ kind: 'reading' })).toEqual(['gravity']);
      expect(await wrong({ kind: 'neck' })).toEqual(['neck']);
      expect(await wrong({ kind: 'note' })).toEqual(['text']);
      expect(await wrong({ kind: 'addition' })).toEqual(['sugar_g']);
      expect(await wrong({ kind: 'note', text: 'x', at: new Date(Date.now() + DAY_MS).toISOString() })).toEqual(['at']);
      expect(await wrong({ kind: 'note', text: 'a\u0000b' })).toEqual(['text']);
      expect(await wrong({ kind: 'note', text: 'x', at: '2026-03-01T00:00:00' })).toEqual(['at']);
    });
  });

  describe('sensors', () => {
    it('shows a new sensor’s secret once and keeps only its hash', async () => {
      const { ask } = await keeper();
      const made = createdSensorSchema.parse((await ask('POST', '/sensors', { name: 'Float by the sink' })).body);
      expect(Buffer.from(made.secret, 'base64url').length).toBeGreaterThanOrEqual(16);
      expect(made.topic).toBe(`fallbright/v1/${made.id}/readings`);
      const row = await Sensor.findOne({ where: { identifier: made.id }, rejectOnEmpty: true });
      expect(row.secretHash.equals(hashSensorSecret(made.secret))).toBe(true);
      const again = await ask('GET', `/sensors/${made.id}`);
      expect(sensorSchema.parse(again.body).name).toBe('Float by the sink');
      expect(JSON.stringify(again.body)).not.toContain(made.secret);
    });

    it('moves a sensor: it leaves its batch, and the sensor that was in the new one comes out', async () => {
      const { ask, cellarId } = await keeper();
      const [first, second] = [await buildBatch({ cellarId }), await buildBatch({ cellarId })];
      const day = new Date(Date.now() - DAY_MS);
      const a = await buildSensor({ batch: first, fromAt: day });
      const b = await buildSensor({ batch: second, fromAt: day });
      expect((await ask('PATCH', `/sensors/${a.sensor.identifier}`, { batch_id: second.id })).body.batch).toMatchObject({ id: second.id });
      expect((await ask('GET', `/sensors/${b.sensor.identifier}`)).body.batch).toBeNull();
      expect((await ask('GET', `/batches/${first.id}`)).body.sensor).toBeNull();
      expect(await Assignment.count({ where: { batchId: second.id, toAt: null } })).toBe(1);
      expect((await ask('PATCH', `/sensors/${a.sensor.identifier}`, { batch_id: null })).body.batch).toBeNull();
    });

    it('puts no sensor that is switched off, and none into a batch that has ended', async () => {
      const { ask, cellarId } = await keeper();
      const batch = await buildBatch({ cellarId });
      const { sensor } = await buildSensor({ cellarId });
      await ask('PATCH', `/sensors/${sensor.identifier}`, { disabled: true });
      expect((await ask('PATCH', `/sensors/${sensor.identifier}`, { batch_id: batch.id })).status).toBe(409);
      await ask('PATCH', `/sensors/${sensor.identifier}`, { disabled: false });
      await batch.update({ state: 'ended', endedAt: new Date() });
      expect((await ask('PATCH', `/sensors/${sensor.identifier}`, { batch_id: batch.id })).status).toBe(409);
    });

    it('keeps what a sensor measured in an earlier batch there when a new batch is pitched in the past', async () => {
      const { ask, cellarId } = await keeper();
      const earlier = await buildBatch({ cellarId });
      const { sensor } = await buildSensor({ batch: earlier, fromAt: new Date(Date.now() - 10 * DAY_MS) });
      const out = new Date(Date.now() - 2 * DAY_MS);
      await Assignment.update({ toAt: out }, { where: { sensorId: sensor.id } });
      const made = await ask('POST', '/batches', { ...CIDER, pitched_at: new Date(Date.now() - 3 * DAY_MS).toISOString(), sensor: sensor.identifier });
      expect(made.status).toBe(201);
      expect((await Assignment.findOne({ where: { batchId: made.body.id } }))?.fromAt).toEqual(out);
    });

    it('shows what was refused and why, newest first', async () => {
      const { ask, cellarId } = await keeper();
      const { sensor } = await buildSensor({ cellarId });
      await db.sequelize.query(`insert into refusals (sensor_id, road, reason, body, received_at) values ($1, 'mqtt', 'not JSON', '\\x7b', now() - interval '1 hour'), ($1, 'http', 'gravity is required', '\\xff7b7d', now())`, { bind: [sensor.id] });
      const list = await ask('GET', `/sensors/${sensor.identifier}/refusals`);
      expect(list.body.items.map((item: { reason: string; body: string }) => [item.reason, item.body])).toEqual([
        ['gravity is required', '\ufffd{}'],
        ['not JSON', '{'],
      ]);
      expect((await ask('GET', `/sensors/${sensor.identifier}`)).body.refused_24h).toBe(2);
    });
  });

  describe('judgement and shelf', () => {
    /** A cider that falls for six days, with a reading each quarter of an hour. */
    async function falling(cellarId: string) {
      const start = Date.now() - 6 * DAY_MS;
      const batch = await buildBatch({ cellarId, kind: 'cider', pitchedAt: new Date(start), originalGravity: 1.06 });
      const { sensor } = await buildSensor({ batch });
      const readings = Array.from({ length: 6 * 96 }, (_, n) => ({ at: start + n * 900_000, gravity: 1.0 + 0.06 / (1 + Math.exp((n / 96 - 3) * 1.5)) }));
      await writeReadings(sensor.id, readings);
      return { batch, sensor, start, readings };
    }

    it('judges a batch now, and as it was known then', async () => {
      const { ask, cellarId } = await keeper();
      const { batch, start } = await falling(cellarId);
      const now = judgementSchema.parse((await ask('GET', `/batches/${batch.id}/judgement`)).body);
      expect(now.gravity?.value).toBeLessThan(1.01);
      expect(now.curve.length).toBeGreaterThan(10);
      expect(now.calls.started.verdict).toBe('yes');
      const early = assessmentSchema.parse((await ask('GET', `/batches/${batch.id}/assessment?at=${new Date(start + 3 * HOUR_MS).toISOString()}`)).body);
      expect(early.calls.started.verdict).not.toBe('yes');
      expect(early.at).toBe(new Date(start + 3 * HOUR_MS).toISOString());
      expect((await ask('GET', `/batches/${batch.id}/assessment?at=${new Date(Date.now() + HOUR_MS).toISOString()}`)).status).toBe(422);
    });

    it('judges anew after a new entry', async () => {
      const { ask, cellarId } = await keeper();
      const { batch } = await falling(cellarId);
      const neck = async () => assessmentSchema.parse((await ask('GET', `/batches/${batch.id}/assessment`)).body).calls.neck;
      const before = await neck();
      await ask('POST', `/batches/${batch.id}/entries`, { kind: 'neck', at: new Date(Date.now() - 5 * DAY_MS).toISOString(), neck: 'blow_off' });
      expect(await neck()).not.toEqual(before);
    });

    it('gives the whole shelf in one answer: curves, posts, and the batches that ended inside the span', async () => {
      const { ask, cellarId } = await keeper();
      const { batch, start } = await falling(cellarId);
      await buildEntry(batch, { kind: 'rack', at: new Date(start + 5 * DAY_MS) });
      const lately = await buildBatch({ cellarId, state: 'ended', endedAt: new Date(start + DAY_MS) });
      const longAgo = await buildBatch({ cellarId, state: 'ended', endedAt: new Date(start - 40 * DAY_MS) });
      const span = `from=${new Date(start - DAY_MS).toISOString()}&to=${new Date(start + 20 * DAY_MS).toISOString()}`;
      const shelf = shelfSchema.parse((await ask('GET', `/shelf?${span}`)).body);
      const ids = shelf.items.map((lane) => lane.id);
      expect(ids).toContain(lately.id);
      expect(ids).not.toContain(longAgo.id);
      const lane = shelf.items.find((item) => item.id === batch.id)!;
      expect(lane.series.count).toBe(6 * 96);
      expect(lane.series.at.length).toBeGreaterThan(6 * 23);
      expect(lane.series.at.length).toBeLessThanOrEqual(6 * 24 + 1);
      expect([...lane.series.at].sort((a, b) => a - b)).toEqual(lane.series.at);
      expect(lane.series.gravity[0]).toBeCloseTo(1.06, 2);
      expect(lane.entries).toMatchObject([{ kind: 'rack' }]);
      expect(Date.parse(shelf.now)).toBeGreaterThan(Date.now() - 60_000);
      expect((await ask('GET', `/shelf?from=${new Date().toISOString()}&to=${new Date(0).toISOString()}`)).status).toBe(422);
    });

    it('keeps past verdicts in order', async () => {
      const { ask, cellarId } = await keeper();
      const { batch } = await falling(cellarId);
      const assessment = (await ask('GET', `/batches/${batch.id}/assessment`)).body;
      for (const day of [1, 2, 3]) {
        await db.sequelize.query(`insert into assessments (cellar_id, batch_id, at, changed, assessment) values ($1, $2, $3, array['started'], $4)`, { bind: [cellarId, batch.id, new Date(Date.UTC(2026, 2, day)), JSON.stringify(assessment)] });
      }
      const first = (await ask('GET', `/batches/${batch.id}/assessments?limit=2`)).body;
      expect(first.items.map((item: { at: string }) => item.at.slice(0, 10))).toEqual(['2026-03-03', '2026-03-02']);
      const second = (await ask('GET', `/batches/${batch.id}/assessments?limit=2&cursor=${first.next_cursor}`)).body;
      expect(second.items).toHaveLength(1);
      expect(second.next_cursor).toBeNull();
    });

    it('answers with an empty list of alerts where there are none', async () => {
      const { ask } = await keeper();
      expect(alertList.parse((await ask('GET', '/alerts')).body)).toMatchObject({ items: [], counts: { open: 0 } });
    });
  });

  describe('at its edges', () => {
    it('answers 404 for a path that names nothing possible, and never 500', async () => {
      const { ask } = await keeper();
      for (const id of ['1', '1e3', '-1', '9223372036854775808', 'null', "'%20or%20true", '%2e%2e%2fetc', randomUUID(), 'x'.repeat(3000)]) {
        const answer = await ask('GET', `/batches/${id}`);
        expect(answer.status, id).toBe(404);
        expect(answer.headers.get('content-type'), id).toBe('application/problem+json');
      }
      for (const id of ['A', 'x'.repeat(65), randomUUID()]) expect((await ask('GET', `/sensors/${encodeURIComponent(id)}`)).status, id).toBe(404);
    });

    it('refuses queries that are wrong', async () => {
      const { ask, cellarId } = await keeper();
      const batch = await buildBatch({ cellarId });
      for (const query of ['limit=0', 'limit=1e9', 'limit=x', 'limit=1&limit=2', 'state=any', 'cursor=bm90', `cursor=${Buffer.from('["2026-01-01 00:00:00","1; drop table people"]').toString('base64url')}`]) expect((await ask('GET', `/batches?${query}`)).status, query).toBe(422);
      for (const query of ['points=1', 'points=1e9', 'from=yesterday', 'from=2026-02-30T00:00:00Z', 'to=1772841600']) expect((await ask('GET', `/batches/${batch.id}/series?${query}`)).status, query).toBe(422);
    });

    it('refuses bodies that are no JSON, too large, or of another type', async () => {
      const { ask } = await keeper();
      const raw = (body: string, type = 'application/json') => ask('POST', '/batches', body, { 'content-type': type });
      expect((await raw('{"name":')).body).toMatchObject({ status: 400, type: 'urn:fallbright:problem:malformed' });
      expect((await raw('name=x', 'application/x-www-form-urlencoded')).status).toBe(415);
      expect((await raw(JSON.stringify({ name: 'x'.repeat(1_000_001) }))).status).toBe(413);
      for (const body of ['[]', 'null', '3', '"x"', '{}', '{"__proto__":{"role":"keeper"}}', `${'['.repeat(10_000)}${']'.repeat(10_000)}`]) expect((await raw(body)).status, body.slice(0, 40)).toBe(422);
    });

    it('keeps hostile text as text', async () => {
      const { ask } = await keeper();
      for (const name of ["Robert'); drop table batches;--", '<script>alert(1)</script>', '=cmd|calc', '\u202etxt.exe', '🍏🍯 Ž ť č', '../../etc/passwd', '{{7*7}}']) {
        const made = await ask('POST', '/batches', { ...CIDER, name });
        expect(made.status, name).toBe(201);
        expect(made.body.name).toBe(name);
      }
      for (const name of ['a\r\nSet-Cookie: x=1', 'bell\u0007', 'nul\u0000', '\u001b[31mred', 'x'.repeat(81)]) expect((await ask('POST', '/batches', { ...CIDER, name })).status, JSON.stringify(name)).toBe(422);
      expect((await ask('POST', '/batches', `{"name":"\\ud800","kind":"cider","volume_l":4,"vessel_l":5}`, { 'content-type': 'application/json' })).status).toBe(422);
    });

    it('takes only the fields it knows', async () => {
      const { ask, cellarId } = await keeper();
      const made = await ask('POST', '/batches', { ...CIDER, id: randomUUID(), cellar_id: randomUUID(), created_by: randomUUID(), state: 'ended' });
      expect(made.status).toBe(201);
      expect(made.body.state).toBe('working');
      expect(await Batch.count({ where: { cellarId } })).toBe(1);
      expect(Object.keys(made.body)).not.toContain('cellar_id');
    });

    it('describes itself: every path, with the schema that checks it', async () => {
      const answer = await call(web, 'GET', '/api/v1/openapi.json');
      expect(answer.status).toBe(200);
      expect(answer.body.openapi).toBe('3.1.0');
      const create = answer.body.paths['/api/v1/batches'].post;
      expect(create.requestBody.content['application/json'].schema.required).toEqual(['name', 'kind', 'volume_l', 'vessel_l']);
      expect(create.responses['201'].content['application/json'].schema.properties.original_gravity).toBeDefined();
      const read = answer.body.paths['/api/v1/batches/{id}/series'].get;
      expect(read.parameters.map((parameter: { name: string; in: string; required: boolean }) => [parameter.name, parameter.in, parameter.required])).toEqual([
        ['id', 'path', true],
        ['from', 'query', false],
        ['to', 'query', false],
        ['points', 'query', false],
      ]);
      expect(JSON.stringify(answer.body)).not.toMatch(/secret_hash|password/);
    });

    it('tells its health: 503 until broker and worker say that they live, then 200, and 503 again when one falls silent', async () => {
      await db.sequelize.query('delete from heartbeats');
      const cold = await call(web, 'GET', '/api/health');
      expect(cold).toMatchObject({ status: 503, body: { status: 'down', parts: { database: 'ok', broker: 'down', worker: 'down' } } });
      await db.sequelize.query(`insert into heartbeats (part, instance, at) values ('broker', 'a', now()), ('worker', 'b', now())`);
      expect(await call(web, 'GET', '/api/health')).toMatchObject({ status: 200, body: { status: 'ok' } });
      await db.sequelize.query(`update heartbeats set at = now() - interval '30 seconds' where part = 'worker'`);
      expect(await call(web, 'GET', '/api/health')).toMatchObject({ status: 503, body: { parts: { broker: 'ok', worker: 'down' } } });
    });

    it('counts its requests for Prometheus', async () => {
      const { ask } = await keeper();
      await ask('GET', '/batches');
      const text = String((await call(web, 'GET', '/api/metrics')).body);
      expect(text).toMatch(/fallbright_http_request_seconds_count\{method="GET",route="\/batches",status="200"\} [1-9]/);
      expect(text).toMatch(/fallbright_part_up\{part="database"\} 1/);
      expect(text).toContain('process_resident_memory_bytes');
    });
  });
});

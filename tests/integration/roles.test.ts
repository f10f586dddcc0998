import { randomUUID } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Batch, Entry } from '@/db/models';
import { endpoints, type Endpoint, type EndpointName } from '@/lib/contracts/endpoints';
import type { Role } from '@/lib/core/roles';
import { useDatabase } from '../support/database';
import { buildBatch, buildCellar, buildEntry, buildMember, buildSensor } from '../support/factories';
import { jobRows } from '../support/job-rows';
import { dataRows } from '../support/data-rows';
import { messageRows } from '../support/message-rows';
import { buildToken, peopleRows } from '../support/people-rows';
import { EVERYBODY, SHELF_SPAN, watchRows, type RoleRow, type Things } from '../support/role-rows';
import { things } from '../support/things';
import { call, sessionCookie, startWeb, type Web } from '../support/web';

const ROUTES = join(import.meta.dirname, '../../app/api/v1');

/** A part of the API that brings routes brings its rows: name them here. */
const TABLE: Partial<Record<EndpointName, RoleRow>> = { ...watchRows, ...jobRows, ...peopleRows, ...messageRows, ...dataRows };

/** Tested where they are at home: by a sensor's credential, in the open, by an address or a secret that is the key, by a code of an authenticator, as a stream. */
const ELSEWHERE = new Set<string>(['postTelemetry', 'getOpenApi', 'streamEvents', 'readCalendar', 'getShared', 'tasteShared', 'getTakeLink', 'useTakeLink', 'lookAtInvitation', 'joinByInvitation', 'askForSignInLink', 'askForPassphraseLink', 'resetPassphrase', 'confirmMail', 'confirmSecondFactor', 'endSecondFactor', 'renewRecoveryCodes', 'keepPhoto', 'openPhoto', 'getArchiveSchema'] satisfies EndpointName[]);

describe('who may do what', () => {
  const db = useDatabase();
  let web: Web;
  beforeAll(async () => {
    web = await startWeb({ databaseUrl: db.url });
  }, 700_000);
  afterAll(async () => {
    await web?.stop();
  });

  /** `GET /batches/{id}`, for each method of each route file. */
  const routes = () =>
    readdirSync(ROUTES, { recursive: true, encoding: 'utf8' })
      .filter((file) => file.endsWith('/route.ts'))
      .flatMap((file) => {
        const path = `/${file.slice(0, -'/route.ts'.length)}`.replace(/\[(\w+)\]/g, '{$1}');
        const methods = [...readFileSync(join(ROUTES, file), 'utf8').matchAll(/export (?:const|async function|function) (GET|POST|PUT|PATCH|DELETE)\b/g)].map((match) => match[1]!);
        expect(methods.length, file).toBeGreaterThan(0);
        return methods.map((method) => `${method} ${path}`);
      });
  const named = Object.entries(endpoints).map(([name, endpoint]) => ({ name, call: `${endpoint.method} ${endpoint.path}` }));

  it('has a row in the table for every route and method there is', () => {
    const rows = new Set(named.filter(({ name }) => name in TABLE || ELSEWHERE.has(name)).map(({ call: key }) => key));
    expect(routes().filter((key) => !rows.has(key))).toEqual([]);
  });

  it('has a route for every endpoint that the API describes', () => {
    const there = new Set(routes());
    expect(named.filter(({ call: key }) => !there.has(key)).map(({ call: key }) => key)).toEqual([]);
  });

  /** Another cellar's things, for all rows: no request of a stranger may change them. */
  let theirs: Promise<Things> | undefined;
  const strangers = () => (theirs ??= buildMember('keeper').then((keeper) => things(keeper.cellarId, keeper.personId)));

  /** A member of a role with a cellar full of things. What only looks leaves them as they are: its rows share one a role. */
  type Own = Awaited<ReturnType<typeof anew>>;
  const anew = async (role: Role) => {
    const member = await buildMember(role);
    return { member, own: await things(member.cellarId, member.personId) };
  };
  const looking = new Map<Role, Promise<Own>>();
  const shared = (role: Role): Promise<Own> => {
    const known = looking.get(role) ?? anew(role);
    looking.set(role, known);
    return known;
  };
  const ownOf = (endpoint: Endpoint, role: Role) => (endpoint.method === 'GET' ? shared(role) : anew(role));

  for (const [name, row] of Object.entries(TABLE)) {
    const endpoint = endpoints[name as EndpointName];
    it.concurrent(`${endpoint.method} ${endpoint.path}: ${row.may.join(', ')}${row.names ? '; another cellar’s is not found' : ''}`, async () => {
      const ask = (things: Things, cookie?: string) => call(web, endpoint.method, `/api/v1${row.path(things)}`, { cookie, body: row.body?.(things) });
      const foreign = await strangers();

      for (const role of EVERYBODY as Role[]) {
        // Who may not is told so before anything of theirs is looked at.
        const { member, own } = row.may.includes(role) || row.byService ? await ownOf(endpoint, role) : { member: await buildMember(role), own: foreign };
        const { cookie } = await sessionCookie(member.personId);
        if (row.names && row.may.includes(role)) {
          const answer = await ask(foreign, cookie);
          expect(answer.status, `${role}, another cellar’s`).toBe(404);
          expect(answer.body).toMatchObject({ type: 'urn:fallbright:problem:not-found', status: 404 });
          expect(JSON.stringify(answer.body)).not.toContain(foreign.batchId);
        }
        const answer = await ask(own, cookie);
        expect(answer.status, `${role}, own: ${JSON.stringify(answer.body)}`).toBe(row.may.includes(role) ? row.good : 403);
        if (answer.status === 403) expect(answer.headers.get('content-type')).toBe('application/problem+json');
      }
      const answer = await ask(foreign);
      expect(answer.status, 'nobody').toBe(401);
    });
  }

  /** One request of a program for each row: with a token of the first role that may, of one that may not, and for another cellar's thing. */
  for (const [name, row] of Object.entries(TABLE)) {
    const endpoint: Endpoint = endpoints[name as EndpointName];
    const bySession = endpoint.access === 'person' || endpoint.by === 'session';
    it.concurrent(`${endpoint.method} ${endpoint.path}, with a token: ${bySession ? 'never' : 'as the role of the token'}`, async () => {
      const ask = (things: Things, token: string) => call(web, endpoint.method, `/api/v1${row.path(things)}`, { body: row.body?.(things), headers: { authorization: `Bearer ${token}`, 'sec-fetch-site': 'none' } });
      const { member: keeper, own } = await ownOf(endpoint, 'keeper');
      const tokenAs = async (role: Role) => (await buildToken(keeper.personId, keeper.cellarId, role)).token;
      const mayNot = EVERYBODY.find((role) => !row.may.includes(role)) as Role | undefined;
      // The role of the token decides, not the person's own, which is keeper.
      if (mayNot && !row.byService) expect((await ask(own, await tokenAs(mayNot))).status, mayNot).toBe(403);
      const token = await tokenAs(row.may[0] as Role);
      if (row.names && !bySession) expect((await ask(await strangers(), token)).status, 'another cellar’s').toBe(404);
      const answer = await ask(own, token);
      expect(answer.status, JSON.stringify(answer.body)).toBe(bySession ? 403 : row.good);
    });
  }

  it('shows lists of one cellar only', async () => {
    const [mine, theirs] = [await buildMember('keeper'), await buildMember('keeper')];
    await things(mine.cellarId, mine.personId);
    const foreign = await things(theirs.cellarId, theirs.personId);
    const { cookie } = await sessionCookie(mine.personId);
    for (const path of ['/batches', '/sensors', '/alerts', '/members', `/shelf?${SHELF_SPAN}`, '/musts', '/catalogue', '/jobs', '/lots', '/lots.csv', '/places', '/shares', '/mutes', '/messages', '/invitations', '/tokens', '/audit', '/audit.csv', '/audit.json']) {
      const answer = await call(web, 'GET', `/api/v1${path}`, { cookie });
      expect(answer.status).toBe(200);
      const text = JSON.stringify(answer.body);
      for (const secret of [foreign.batchId, foreign.sensorId, foreign.alertId, theirs.person.email, foreign.mustId, foreign.itemId, foreign.jobId, foreign.lotId, foreign.placeId, foreign.shareId, foreign.muteId, foreign.deviceId, foreign.invitationId, foreign.tokenId, foreign.memberId]) expect(text, path).not.toContain(secret);
    }
  });

  it('lets a hand log what they see, and not what changes the drink', async () => {
    const hand = await buildMember('hand');
    const batch = await buildBatch({ cellarId: hand.cellarId });
    const { cookie } = await sessionCookie(hand.personId);
    const log = (body: Record<string, unknown>) => call(web, 'POST', `/api/v1/batches/${batch.id}/entries`, { cookie, body: { at: '2026-03-01T00:00:00Z', ...body } }).then((answer) => answer.status);
    expect(await log({ kind: 'reading', gravity: 1.02 })).toBe(201);
    expect(await log({ kind: 'observation', text: 'Foam.' })).toBe(201);
    expect(await log({ kind: 'neck', neck: 'airlock' })).toBe(201);
    for (const body of [{ kind: 'rack', volume_l: 4 }, { kind: 'addition', sugar_g: 50 }, { kind: 'top_up', volume_l: 0.2 }, { kind: 'pitch' }, { kind: 'stabilise' }]) expect(await log(body), String(body.kind)).toBe(403);
  });

  it('lets a hand take back an own entry, and not another’s', async () => {
    const hand = await buildMember('hand');
    const batch = await buildBatch({ cellarId: hand.cellarId });
    const own = await buildEntry(batch, { text: 'x', personId: hand.personId });
    const other = await buildEntry(batch, { text: 'y', personId: (await buildMember('hand', { cellarId: hand.cellarId })).personId });
    const { cookie } = await sessionCookie(hand.personId);
    const list = await call(web, 'GET', `/api/v1/batches/${batch.id}/entries`, { cookie });
    expect(Object.fromEntries(list.body.items.map((item: { id: string; mine: boolean }) => [item.id, item.mine]))).toEqual({ [own.id]: true, [other.id]: false });
    expect((await call(web, 'DELETE', `/api/v1/batches/${batch.id}/entries/${other.id}`, { cookie })).status).toBe(403);
    expect((await call(web, 'DELETE', `/api/v1/batches/${batch.id}/entries/${own.id}`, { cookie })).status).toBe(204);
    expect((await call(web, 'DELETE', `/api/v1/batches/${batch.id}/entries/${own.id}`, { cookie })).status).toBe(404);
    expect((await Entry.findByPk(own.id))?.removedBy).toBe(hand.personId);
  });

  it('lets a brewer move a sensor, and not rename or switch it off', async () => {
    const brewer = await buildMember('brewer');
    const batch = await buildBatch({ cellarId: brewer.cellarId });
    const { sensor } = await buildSensor({ cellarId: brewer.cellarId });
    const { cookie } = await sessionCookie(brewer.personId);
    const change = (body: unknown) => call(web, 'PATCH', `/api/v1/sensors/${sensor.identifier}`, { cookie, body }).then((answer) => answer.status);
    expect(await change({ batch_id: batch.id })).toBe(200);
    expect(await change({ name: 'Mine' })).toBe(403);
    expect(await change({ disabled: true })).toBe(403);
  });

  it('never puts another cellar’s sensor into a batch, by either road', async () => {
    const keeper = await buildMember('keeper');
    const batch = await buildBatch({ cellarId: keeper.cellarId });
    const foreign = await buildSensor();
    const foreignBatch = await buildBatch();
    const own = await buildSensor({ cellarId: keeper.cellarId });
    const { cookie } = await sessionCookie(keeper.personId);
    expect((await call(web, 'POST', '/api/v1/batches', { cookie, body: { name: 'Perry', kind: 'cider', volume_l: 4, vessel_l: 5, sensor: foreign.sensor.identifier } })).status).toBe(404);
    expect(await Batch.count({ where: { cellarId: keeper.cellarId } })).toBe(1);
    expect((await call(web, 'PATCH', `/api/v1/sensors/${foreign.sensor.identifier}`, { cookie, body: { batch_id: batch.id } })).status).toBe(404);
    expect((await call(web, 'PATCH', `/api/v1/sensors/${own.sensor.identifier}`, { cookie, body: { batch_id: foreignBatch.id } })).status).toBe(404);
  });

  it('acts in the chosen cellar with the role that the person has there', async () => {
    const keeper = await buildMember('keeper');
    const elsewhere = await buildCellar({ name: 'Elsewhere' });
    await db.sequelize.query(`insert into memberships (cellar_id, person_id, role) values ($1, $2, 'guest')`, { bind: [elsewhere.id, keeper.personId] });
    const { cookie } = await sessionCookie(keeper.personId);
    const chosen = await call(web, 'POST', '/api/v1/cellars/active', { cookie, body: { cellar_id: elsewhere.id } });
    const both = `${cookie}; ${chosen.headers.getSetCookie()[0]!.split(';')[0]!}`;
    const me = await call(web, 'GET', '/api/v1/me', { cookie: both });
    expect(me.body).toMatchObject({ cellar: { id: elsewhere.id, role: 'guest' } });
    expect(me.body.cellars).toHaveLength(2);
    expect((await call(web, 'POST', '/api/v1/batches', { cookie: both, body: { name: 'x', kind: 'cider', volume_l: 4, vessel_l: 5 } })).status).toBe(403);
    // A cellar that the person has left, or never was in, falls back to one that is theirs.
    const strange = await call(web, 'GET', '/api/v1/me', { cookie: `${cookie}; fallbright-cellar=${randomUUID()}` });
    expect(strange.body.cellar.id).toBe(keeper.cellarId);
  });

  it('tells a person without a cellar so, and still lets them end their sign-ins', async () => {
    const member = await buildMember('guest');
    await db.sequelize.query('delete from memberships where person_id = $1', { bind: [member.personId] });
    const { cookie } = await sessionCookie(member.personId);
    expect((await call(web, 'GET', '/api/v1/me', { cookie })).status).toBe(403);
    expect((await call(web, 'DELETE', '/api/v1/sign-ins', { cookie })).status).toBe(204);
  });

  it('hides alerts from guests on the batch too', async () => {
    const guest = await buildMember('guest');
    const own = await things(guest.cellarId, guest.personId);
    const { cookie } = await sessionCookie(guest.personId);
    expect((await call(web, 'GET', `/api/v1/batches/${own.batchId}`, { cookie })).body.alerts).toEqual([]);
    const hand = await buildMember('hand', { cellarId: guest.cellarId });
    const seen = await call(web, 'GET', `/api/v1/batches/${own.batchId}`, { cookie: (await sessionCookie(hand.personId)).cookie });
    expect(seen.body.alerts).toMatchObject([{ id: own.alertId, call: 'stalled', state: 'open', taken_by: null }]);
  });

  it('takes readings only from a sensor’s own credential, not from a person', async () => {
    const keeper = await buildMember('keeper');
    const { cookie } = await sessionCookie(keeper.personId);
    expect((await call(web, 'POST', '/api/v1/telemetry', { cookie, body: { gravity: 1.05, temperature: 20 } })).status).toBe(401);
  });
});

import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ApiToken, AuditRow, Membership, Person, SignIn } from '@/db/models';
import { hashLinkToken, linkTokenOf } from '@/lib/auth/link-tokens';
import { hashPassword } from '@/lib/auth/passwords';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember } from '../support/factories';
import { buildToken, PASSPHRASE } from '../support/people-rows';
import { until } from '../support/processes';
import { call, sessionCookie, signInOverHttp, startWeb, type Web } from '../support/web';

/** Requirements of OWASP ASVS 5.0.0 that concern the way in, by number. What runs without a server stands in people.test.ts. Numbers 7.5.1 and 8.3.2 are from memory. */
describe('OWASP ASVS 5.0.0', () => {
  const db = useDatabase();
  let web: Web;
  let secure: Web;
  beforeAll(async () => {
    web = await startWeb({ databaseUrl: db.url });
    // The same house as the world reaches it: behind a proxy that speaks https.
    secure = await startWeb({ databaseUrl: db.url, variables: { PUBLIC_URL: 'https://barn.example' } });
  }, 700_000);
  afterAll(async () => {
    await web?.stop();
    await secure?.stop();
  });

  let hash: Promise<string> | undefined;
  const member = async (role: 'keeper' | 'brewer' | 'hand' | 'guest' = 'brewer', cellarId?: string) => {
    const made = await buildMember(role, cellarId === undefined ? {} : { cellarId });
    await made.person.update({ passwordHash: await (hash ??= hashPassword(PASSPHRASE)) });
    return made;
  };
  let last = 0;
  /** Each test comes from an address of its own, so that counts do not mix. */
  const from = () => ({ 'x-forwarded-for': `198.51.100.${(last += 1)}` });
  const choose = async (passphrase: string) => {
    const { personId } = await member();
    const { cookie } = await sessionCookie(personId);
    return call(web, 'POST', '/api/v1/account/passphrase', { cookie, body: { current: PASSPHRASE, passphrase }, headers: from() });
  };

  it('1.2.10: a cell of the exported trail that a spreadsheet would run is made text', async () => {
    const keeper = await member('keeper');
    const { cookie } = await sessionCookie(keeper.personId);
    for (const name of ['=HYPERLINK("http://evil.example")', '+1+1', '-2+3', '@SUM(A1)']) {
      await keeper.person.update({ name });
      await call(web, 'PATCH', '/api/v1/cellar', { cookie, body: { name: 'Renamed' } });
      const { body } = await call(web, 'GET', '/api/v1/audit.csv', { cookie });
      const cell = (body as string).split('\r\n')[1]!.split(',')[1]!;
      expect(cell.replace(/^"/, '')).toMatch(/^'/);
    }
  });

  it('2.2.1 to 2.2.3, 8.2.3: what a form does not ask for is not taken, what it asks for is held to its form', async () => {
    const { personId, person } = await member('guest');
    const { cookie } = await sessionCookie(personId);
    const patch = (body: unknown) => call(web, 'PATCH', '/api/v1/me', { cookie, body });
    expect((await patch({ name: 'Renamed', email: 'taken@evil.example', passwordHash: 'x', role: 'keeper', id: 'x', totp_confirmed_at: null })).status).toBe(204);
    expect(await Person.findByPk(personId)).toMatchObject({ name: 'Renamed', email: person.email });
    for (const body of [{ name: '' }, { name: 'a\u0000b' }, { name: 'two\nlines' }, { name: 'x'.repeat(81) }, { time_zone: 'Mars/Olympus' }, { locale: 'xx' }, { units: { gravity: 'stone' } }, { name: 7 }, { name: ['a'] }]) expect((await patch(body)).status, JSON.stringify(body)).toBe(422);
    expect((await Membership.findOne({ where: { personId }, rejectOnEmpty: true })).role).toBe('guest');
  });

  it('2.4.1: mails cannot be asked for without end, from one address or for one account', async () => {
    const address = from();
    const statuses: number[] = [];
    for (let index = 0; index < 24; index += 1) statuses.push((await call(web, 'POST', '/api/v1/sign-in-links', { body: { email: `flood${index}@loft.example` }, headers: address })).status);
    expect(statuses.slice(0, 20)).toEqual(Array(20).fill(202));
    expect(statuses.at(-1)).toBe(429);
  });

  it('3.3.1 to 3.3.4: over https the cookies are __Host-, Secure, HttpOnly and SameSite', async () => {
    const { person } = await member();
    const csrf = await fetch(`${secure.url}/api/auth/csrf`, { headers: from() });
    const { csrfToken } = (await csrf.json()) as { csrfToken: string };
    const jar = csrf.headers.getSetCookie().map((line) => line.split(';')[0]!);
    const answer = await fetch(`${secure.url}/api/auth/callback/credentials`, { method: 'POST', redirect: 'manual', headers: { 'content-type': 'application/x-www-form-urlencoded', cookie: jar.join('; '), ...from() }, body: new URLSearchParams({ csrfToken, email: person.email, password: PASSPHRASE, json: 'true' }) });
    const cookies = [...csrf.headers.getSetCookie(), ...answer.headers.getSetCookie()];
    expect(cookies.some((line) => line.startsWith('__Host-fallbright-session='))).toBe(true);
    for (const line of cookies) {
      expect(line).toMatch(/^__Host-/);
      for (const flag of [/; Secure/i, /; HttpOnly/i, /; SameSite=Lax/i, /; Path=\/(;|$)/i]) expect(line).toMatch(flag);
      expect(line).not.toMatch(/Domain=/i);
    }
  });

  it('3.4.1, 3.4.3, 3.4.4, 3.4.6: HSTS, a policy for content, nosniff and no frames, on pages and on the API', async () => {
    for (const path of ['/sign-in', '/sign-in/forgot', '/sign-in/link', '/invitation', '/mail-address', '/api/v1/me']) {
      const { headers } = await call(secure, 'GET', path);
      expect(headers.get('strict-transport-security'), path).toMatch(/max-age=31536000; includeSubDomains/);
      expect(headers.get('x-content-type-options'), path).toBe('nosniff');
      const policy = headers.get('content-security-policy') ?? '';
      expect(policy, path).toContain("frame-ancestors 'none'");
      expect(policy, path).not.toMatch(/script-src[^;]*('unsafe-inline'|'unsafe-eval'|\*|https:)/);
      if (!path.startsWith('/api')) for (const part of ["object-src 'none'", "base-uri 'none'", "form-action 'self'"]) expect(policy, path).toContain(part);
    }
  });

  it('3.5.1 to 3.5.3: what changes something comes from our own pages, by its method, as JSON', async () => {
    const { personId } = await member();
    const { cookie } = await sessionCookie(personId);
    const patch = (headers: Record<string, string>) => fetch(`${web.url}/api/v1/me`, { method: 'PATCH', headers: { cookie, 'content-type': 'application/json', ...headers }, body: '{"name":"Taken over"}' }).then(({ status }) => status);
    for (const headers of [{ 'sec-fetch-site': 'cross-site' }, { 'sec-fetch-site': 'same-site' }, { 'sec-fetch-site': 'none' }, { origin: 'https://evil.example' }, {}]) expect(await patch(headers as Record<string, string>)).toBe(403);
    // A form of another site can send text/plain without asking first.
    expect(await patch({ 'sec-fetch-site': 'same-origin', 'content-type': 'text/plain' })).toBe(415);
    expect(await call(web, 'GET', '/api/v1/cellar/leave', { cookie })).toMatchObject({ status: 405, body: { type: 'urn:fallbright:problem:method-not-allowed' } });
    expect((await Person.findByPk(personId, { rejectOnEmpty: true })).name).not.toBe('Taken over');
  });

  it('6.2.1: a passphrase has at least 8 characters', async () => {
    expect((await choose('seven77')).status).toBe(422);
    expect((await choose('tr4vertn')).status).toBe(204);
  });

  it('6.2.4: common ones are refused, whatever their case', async () => {
    for (const common of ['password', '12345678', 'qwertyuiop', 'iloveyou', 'Football', 'SUNSHINE', 'fallbright', 'aaaaaaaaaaaa']) {
      const { status, body } = await choose(common);
      expect(status, common).toBe(422);
      expect(body.errors.passphrase).toHaveLength(1);
    }
  });

  it('6.2.8, 6.2.9: it is taken as it was typed, spaces and any script too, up to 256 characters', async () => {
    for (const passphrase of [' led by two spaces ', 'пять бутылок на полке', '🍎🍏 cider 🍐🍇', 'x1y2'.repeat(64)]) {
      const { person, personId } = await member();
      const { cookie } = await sessionCookie(personId);
      expect((await call(web, 'POST', '/api/v1/account/passphrase', { cookie, body: { current: PASSPHRASE, passphrase }, headers: from() })).status, passphrase).toBe(204);
      expect((await signInOverHttp(web, { email: person.email, password: passphrase }, from())).cookie, passphrase).not.toBeNull();
      expect((await signInOverHttp(web, { email: person.email, password: `${passphrase.slice(0, -1)}?` }, from())).cookie).toBeNull();
    }
  });

  it('6.1.1 (the counts stand in DEVELOPERS.md), 6.3.1: after wrong guesses the account is locked for longer and longer, and a link by mail still opens it', async () => {
    const { person } = await member();
    for (let guess = 0; guess < 6; guess += 1) await signInOverHttp(web, { email: person.email, password: 'guess' }, from());
    expect((await signInOverHttp(web, { email: person.email, password: PASSPHRASE }, from())).error).toMatch(/^throttled:/);
    expect((await call(web, 'POST', '/api/v1/passphrase-links', { body: { email: person.email }, headers: from() })).status).toBe(202);
    await db.sequelize.query(`update sign_in_tries set locked_until = now() - interval '1 second'`);
    await signInOverHttp(web, { email: person.email, password: 'guess' }, from());
    const [[lock]] = (await db.sequelize.query(`select extract(epoch from max(locked_until) - now())::float8 as s from sign_in_tries where tries between 7 and 8`)) as unknown as [[{ s: number }]];
    expect(lock.s).toBeGreaterThan(45);
  });

  it('6.3.8: asking for a link answers the same in status, text and time, whether or not somebody has the address', async () => {
    const { person } = await member();
    for (const path of ['/sign-in-links', '/passphrase-links']) {
      const ask = async (email: string) => {
        const began = performance.now();
        const answer = await call(web, 'POST', `/api/v1${path}`, { body: { email }, headers: from() });
        return { ms: performance.now() - began, said: `${answer.status} ${JSON.stringify(answer.body)} ${answer.headers.get('content-type')}` };
      };
      const [known, unknown] = [[], []] as [number[], number[]];
      for (let round = 0; round < 6; round += 1) {
        await db.sequelize.query('delete from sign_in_tries');
        const [a, b] = [await ask(person.email), await ask(`nobody${round}@loft.example`)];
        expect(a.said).toBe(b.said);
        known.push(a.ms);
        unknown.push(b.ms);
      }
      const least = (times: number[]) => Math.min(...times);
      expect(least(unknown)).toBeGreaterThan(least(known) * 0.5);
      expect(least(known)).toBeGreaterThan(least(unknown) * 0.5);
    }
  });

  it('6.4.1, 6.5.1, 6.5.5: the secret of a mailed link stands nowhere in the database, and a wrong one is told nothing', async () => {
    const { person } = await member();
    await call(web, 'POST', '/api/v1/sign-in-links', { body: { email: person.email }, headers: from() });
    const [rows] = await db.sequelize.query(`select a.id, l.payload::text || row_to_json(a)::text as text, encode(a.token_hash, 'hex') as hash from letters l join account_links a on a.id::text = l.payload->>'link' where a.kind = 'sign-in'`);
    expect(rows.length).toBeGreaterThan(0);
    for (const { id, text, hash } of rows as Array<{ id: string; text: string; hash: string }>) {
      const secret = linkTokenOf('sign-in', id);
      expect(text).not.toContain(secret);
      expect(hash).toBe(hashLinkToken(secret).toString('hex'));
    }
    for (const [path, body] of [['/passphrase-resets', { passphrase: 'nine wet corks in a row' }], ['/mail-confirmations', {}], ['/invitations/look', {}], ['/invitations/join', { name: 'X', passphrase: 'nine wet corks in a row' }]] as const) {
      expect((await call(web, 'POST', `/api/v1${path}`, { body: { token: 'A'.repeat(32), ...body }, headers: from() })).status, path).toBe(404);
      expect((await call(web, 'POST', `/api/v1${path}`, { body: { token: "' or 1=1 --", ...body }, headers: from() })).status, path).toBe(422);
    }
  });

  it('7.2.3, 7.2.4: a sign-in is a row named by 122 random bits in a cookie sealed with 256, and new each time', async () => {
    const { person } = await member();
    const address = from();
    const first = await signInOverHttp(web, { email: person.email, password: PASSPHRASE }, address);
    const second = await signInOverHttp(web, { email: person.email, password: PASSPHRASE }, { ...address, cookie: first.cookie! });
    expect(second.cookie).not.toBe(first.cookie);
    expect(first.cookie!.length).toBeGreaterThan(150);
    expect((await call(web, 'GET', '/api/v1/me', { cookie: first.cookie! })).status).toBe(401);
    const rows = await SignIn.findAll({ where: { personId: person.id } });
    for (const row of rows) expect(first.cookie).not.toContain(row.id);
  });

  it('7.3.1, 7.3.2: a sign-in ends when it is not used, and at its time whatever its use', async () => {
    const { personId } = await member();
    const hours = (count: number) => new Date(Date.now() - count * 3_600_000);
    const status = async (overrides: Partial<SignIn>) => (await call(web, 'GET', '/api/v1/me', { cookie: (await sessionCookie(personId, overrides)).cookie })).status;
    expect(await status({ idleS: 4 * 3600, lastSeenAt: hours(3.9) })).toBe(200);
    expect(await status({ idleS: 4 * 3600, lastSeenAt: hours(4.1) })).toBe(401);
    expect(await status({ expiresAt: hours(0.01), lastSeenAt: new Date() })).toBe(401);
  });

  it('7.4.1 to 7.4.3: signing out, a new passphrase and the end of an account end the sessions at once', async () => {
    const { personId, person } = await member();
    const [here, there] = [await sessionCookie(personId), await sessionCookie(personId)];
    const status = (cookie: string) => call(web, 'GET', '/api/v1/me', { cookie }).then((answer) => answer.status);
    expect((await call(web, 'POST', '/api/v1/account/passphrase', { cookie: here.cookie, body: { current: PASSPHRASE, passphrase: 'nine wet corks in a row' }, headers: from() })).status).toBe(204);
    expect([await status(here.cookie), await status(there.cookie)]).toEqual([200, 401]);
    const again = await sessionCookie(personId);
    expect((await call(web, 'DELETE', `/api/v1/sign-ins/${again.signInId}`, { cookie: here.cookie })).status).toBe(204);
    expect(await status(again.cookie)).toBe(401);
    expect((await call(web, 'DELETE', '/api/v1/account', { cookie: here.cookie, body: { email: person.email, passphrase: 'nine wet corks in a row' }, headers: from() })).status).toBe(204);
    expect(await status(here.cookie)).toBe(401);
  });

  it('7.5.1 (from memory): what would hurt at an open screen asks for the passphrase again', async () => {
    const keeper = await member('keeper');
    const heir = await member('hand', keeper.cellarId);
    const { cookie } = await sessionCookie(keeper.personId);
    for (const [method, path, body] of [
      ['POST', '/account/passphrase', { current: 'wrong', passphrase: 'nine wet corks in a row' }],
      ['POST', '/account/mail-address', { email: 'new@loft.example', passphrase: 'wrong' }],
      ['POST', '/account/second-factor', { passphrase: 'wrong' }],
      ['POST', `/members/${heir.personId}/hand-over`, { passphrase: 'wrong' }],
    ] as const) {
      await db.sequelize.query('delete from sign_in_tries');
      expect((await call(web, method, `/api/v1${path}`, { cookie, body, headers: from() })).status, path).toBe(422);
    }
  });

  it('8.2.2, 8.4.1: a revoked, expired or orphaned token opens nothing, and a good one only its own cellar', async () => {
    const keeper = await member('keeper');
    const brewer = await member('brewer', keeper.cellarId);
    const other = await buildMember('keeper');
    await Membership.create({ cellarId: other.cellarId, personId: brewer.personId, role: 'brewer' });
    const foreign = await buildBatch({ cellarId: other.cellarId });
    const mine = await buildBatch({ cellarId: keeper.cellarId });
    const get = (token: string, path = '/batches', headers: Record<string, string> = {}) => call(web, 'GET', `/api/v1${path}`, { headers: { authorization: `Bearer ${token}`, ...headers, ...from() } });
    const { token, id } = await buildToken(brewer.personId, keeper.cellarId, 'brewer');

    const list = await get(token);
    expect(list.status).toBe(200);
    expect(JSON.stringify(list.body)).toContain(mine.id);
    // Its person belongs to the other cellar too: the token does not, not even with that cellar's cookie.
    expect((await get(token, `/batches/${foreign.id}`)).status).toBe(404);
    expect((await get(token, `/batches/${foreign.id}`, { cookie: `fallbright-cellar=${other.cellarId}` })).status).toBe(404);
    // Demoted: the token does no more than its person by now.
    await Membership.update({ role: 'guest' }, { where: { personId: brewer.personId, cellarId: keeper.cellarId } });
    expect((await get(token, '/sensors')).status).toBe(403);
    await Membership.update({ role: 'brewer' }, { where: { personId: brewer.personId, cellarId: keeper.cellarId } });
    await expect.poll(async () => (await ApiToken.findByPk(id))?.lastUsedAt ?? null).not.toBeNull();

    for (const bad of [`${token.slice(0, -1)}${token.endsWith('A') ? 'B' : 'A'}`, 'fbt_', 'fbt_short', `${token}x`]) expect((await get(bad)).status, bad).toBe(401);
    // A session beside a bad token does not help it.
    const { cookie } = await sessionCookie(brewer.personId);
    expect((await get('fbt_wrong', '/batches', { cookie })).status).toBe(401);
    const expired = await buildToken(brewer.personId, keeper.cellarId, 'hand', { expiresAt: new Date(Date.now() - 1000) });
    expect((await get(expired.token)).status).toBe(401);
    await ApiToken.update({ revokedAt: new Date() }, { where: { id } });
    expect((await get(token)).status).toBe(401);
    const orphan = await buildToken(brewer.personId, keeper.cellarId, 'hand');
    const { cookie: keeperCookie } = await sessionCookie(keeper.personId);
    expect((await call(web, 'DELETE', `/api/v1/members/${brewer.personId}`, { cookie: keeperCookie })).status).toBe(204);
    expect((await get(orphan.token)).status).toBe(401);
  });

  it('8.3.2 (from memory): a removed member’s open session and open streams, by cookie and by token, end within seconds', async () => {
    const keeper = await member('keeper');
    const hand = await member('hand', keeper.cellarId);
    const { cookie } = await sessionCookie(hand.personId);
    const { token } = await buildToken(hand.personId, keeper.cellarId, 'hand');
    const stream = async (headers: Record<string, string>) => {
      const state = { closed: false, text: '' };
      const response = await fetch(`${web.url}/api/v1/events`, { headers });
      expect(response.status).toBe(200);
      void (async () => {
        try {
          for await (const chunk of response.body!.pipeThrough(new TextDecoderStream())) state.text += chunk;
        } catch {
          // Cut off.
        }
        state.closed = true;
      })();
      await until('the first beat', () => state.text.includes('beat'));
      return state;
    };
    const { cookie: keeperCookie } = await sessionCookie(keeper.personId);
    const [theirs, byToken, own] = [await stream({ cookie }), await stream({ authorization: `Bearer ${token}` }), await stream({ cookie: keeperCookie })];
    const removed = Date.now();
    expect((await call(web, 'DELETE', `/api/v1/members/${hand.personId}`, { cookie: keeperCookie })).status).toBe(204);
    await until('both streams to end', () => theirs.closed && byToken.closed, 5_000);
    expect(Date.now() - removed).toBeLessThan(5_000);
    expect(own.closed).toBe(false);
    // Only that something changed was said, to those who are still there, and not about whom.
    await until('the keeper’s page to hear', () => own.text.includes('"member"'));
    expect(own.text).not.toContain(hand.personId);
    expect((await call(web, 'GET', '/api/v1/batches', { cookie })).status).toBe(403);
  });

  it('16.3.1 to 16.3.3: sign-ins, refusals and changes of access stand in the trail with who, when and from where', async () => {
    const keeper = await member('keeper');
    const hand = await member('hand', keeper.cellarId);
    const address = from();
    await signInOverHttp(web, { email: keeper.person.email, password: 'wrong' }, address);
    const { cookie } = await signInOverHttp(web, { email: keeper.person.email, password: PASSPHRASE }, address);
    await call(web, 'PATCH', `/api/v1/members/${hand.personId}`, { cookie: cookie!, body: { role: 'guest' }, headers: address });
    const rows = await AuditRow.findAll({ where: { personId: keeper.personId }, order: [['id', 'ASC']] });
    expect(rows.map(({ action }) => action)).toEqual(['sign-in.refused', 'sign-in.opened', 'member.role-changed']);
    for (const row of rows) expect(row.address).toBe(address['x-forwarded-for']);
    const { token } = await buildToken(keeper.personId, keeper.cellarId, 'keeper');
    await call(web, 'PATCH', '/api/v1/cellar', { body: { name: 'By a program' }, headers: { authorization: `Bearer ${token}`, ...address } });
    const { body } = await call(web, 'GET', '/api/v1/audit?kind=access&limit=1', { cookie: cookie! });
    expect(body.items[0]).toMatchObject({ action: 'cellar.updated', means: `token …${token.slice(-4)}`, person: { id: keeper.personId } });
    expect(JSON.stringify(body)).not.toContain(token);
  });

  it('16.4.1, 16.5.1: nothing that a person types forges a line of the log, and an error shows nothing of the inside', async () => {
    const { personId } = await member();
    const { cookie } = await sessionCookie(personId);
    const forged = 'x\r\n{"level":30,"msg":"forged"}';
    await signInOverHttp(web, { email: `a@b.example${forged}`, password: forged }, { ...from(), 'user-agent': 'plain' });
    await call(web, 'POST', '/api/v1/invitations/accept', { cookie, body: '{"token":' });
    expect(web.output()).not.toMatch(/^\{"level":30,"msg":"forged"\}/m);
    const { status, body } = await call(web, 'GET', '/api/v1/audit?cursor=1;drop', { cookie: (await sessionCookie((await member('keeper')).personId)).cookie });
    expect(status).toBe(422);
    expect(JSON.stringify(body)).not.toMatch(/sequelize|select |\/lib\/|at \w+ \(/i);
  });
});

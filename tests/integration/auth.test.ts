import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { AuditRow, SignIn } from '@/db/models';
import { hashPassword } from '@/lib/auth/passwords';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';
import { call, sessionCookie, signInOverHttp, startWeb, type Web } from '../support/web';

const PASSWORD = 'seven bungs and a funnel';

describe('signing in', () => {
  const db = useDatabase();
  let web: Web;
  beforeAll(async () => {
    web = await startWeb({ databaseUrl: db.url });
  }, 700_000);
  afterAll(async () => {
    await web?.stop();
  });

  const member = async () => {
    const made = await buildMember('brewer');
    await made.person.update({ passwordHash: await hashPassword(PASSWORD) });
    return made;
  };
  /** Each test comes from an address of its own, so that counts do not mix. */
  let last = 0;
  const from = () => ({ 'x-forwarded-for': `192.0.2.${(last += 1)}` });

  it('opens a sign-in with the right password, whatever the case of the address', async () => {
    const { person } = await member();
    const { cookie, setCookies } = await signInOverHttp(web, { email: person.email.toUpperCase(), password: PASSWORD }, from());
    expect(cookie).not.toBeNull();
    const session = setCookies.find((line) => line.startsWith('fallbright-session='));
    expect(session).toMatch(/HttpOnly/i);
    expect(session).toMatch(/SameSite=Lax/i);
    const me = await call(web, 'GET', '/api/v1/me', { cookie: cookie! });
    expect(me.status).toBe(200);
    expect(me.body).toMatchObject({ person: { id: person.id, email: person.email }, cellar: { role: 'brewer' } });
    expect(me.body.may).toContain('batches.create');
    expect(me.body.may).not.toContain('sensors.manage');
    expect(JSON.stringify(me.body)).not.toContain('argon2');
  });

  it('lasts 12 hours, or 30 days for those who stay signed in', async () => {
    const { person } = await member();
    const hours = async (stay: boolean) => {
      await signInOverHttp(web, { email: person.email, password: PASSWORD, stay }, from());
      const row = await SignIn.findOne({ where: { personId: person.id }, order: [['createdAt', 'DESC']], rejectOnEmpty: true });
      return (row.expiresAt.getTime() - row.createdAt.getTime()) / 3_600_000;
    };
    expect(await hours(false)).toBeCloseTo(12, 1);
    expect(await hours(true)).toBeCloseTo(720, 1);
  });

  it('answers alike for a wrong password, an unknown account and one without a password', async () => {
    const { person } = await member();
    const bare = await buildMember('hand');
    const answers = [];
    for (const email of [person.email, 'nobody@cellar.example', bare.person.email]) answers.push(await signInOverHttp(web, { email, password: 'wrong' }, from()));
    for (const answer of answers) expect(answer).toMatchObject({ cookie: null, error: 'CredentialsSignin' });
  });

  it('takes as long for an unknown account as for a wrong password', async () => {
    const time = async (email: string) => {
      const began = performance.now();
      await signInOverHttp(web, { email, password: 'wrong' }, from());
      return performance.now() - began;
    };
    const least = (times: number[]) => Math.min(...times);
    const known: number[] = [];
    const unknown: number[] = [];
    // The hash alone takes some 20 ms; an answer without it would be far below half, however often it is asked. A busy machine only needs more rounds.
    const alike = () => least(unknown) > least(known) * 0.5 && least(known) > least(unknown) * 0.5;
    for (let round = 0; round < 30 && (round < 5 || !alike()); round += 1) {
      const { person } = await member();
      known.push(await time(person.email));
      unknown.push(await time(`nobody${round}@cellar.example`));
    }
    expect(least(unknown)).toBeGreaterThan(least(known) * 0.5);
    expect(least(known)).toBeGreaterThan(least(unknown) * 0.5);
  });

  it('locks an account after five wrong guesses, even sent at once, and the right password does not open it meanwhile', async () => {
    const { person } = await member();
    const guesses = await Promise.all(Array.from({ length: 12 }, () => signInOverHttp(web, { email: person.email, password: 'guess' }, from())));
    const admitted = guesses.filter((answer) => answer.error === 'CredentialsSignin').length;
    expect(admitted).toBe(6);
    expect(guesses.filter((answer) => answer.error?.startsWith('throttled:')).length).toBe(6);
    const right = await signInOverHttp(web, { email: person.email, password: PASSWORD }, from());
    expect(right.cookie).toBeNull();
    expect(Number(right.error?.split(':')[1])).toBeGreaterThan(20);
    await db.sequelize.query(`update sign_in_tries set locked_until = now() - interval '1 second'`);
    expect((await signInOverHttp(web, { email: person.email, password: PASSWORD }, from())).cookie).not.toBeNull();
  });

  it('locks an unknown account in the same way', async () => {
    const errors = [];
    for (let guess = 0; guess < 7; guess += 1) errors.push((await signInOverHttp(web, { email: 'ghost@cellar.example', password: 'guess' }, from())).error);
    expect(errors.slice(0, 6)).toEqual(Array(6).fill('CredentialsSignin'));
    expect(errors[6]).toMatch(/^throttled:\d+$/);
  });

  it('locks an address that guesses at many accounts, and leaves other addresses alone', async () => {
    const { person } = await member();
    const hostile = from();
    let throttled = 0;
    for (let guess = 0; guess < 43; guess += 1) {
      const { error } = await signInOverHttp(web, { email: `someone${guess}@cellar.example`, password: 'guess' }, hostile);
      if (error?.startsWith('throttled')) throttled += 1;
    }
    expect(throttled).toBeGreaterThan(0);
    expect((await signInOverHttp(web, { email: person.email, password: PASSWORD }, from())).cookie).not.toBeNull();
  });

  it('refuses a sign-in without the token against forgery', async () => {
    const { person } = await member();
    const response = await fetch(`${web.url}/api/auth/callback/credentials`, { method: 'POST', redirect: 'manual', body: new URLSearchParams({ email: person.email, password: PASSWORD, json: 'true' }), headers: from() });
    expect(response.headers.getSetCookie().some((cookie) => /^fallbright-session=./.test(cookie))).toBe(false);
    expect(await SignIn.count({ where: { personId: person.id } })).toBe(0);
  });

  it('makes a new token at each sign-in and ends the one the browser held', async () => {
    const { person } = await member();
    const first = await signInOverHttp(web, { email: person.email, password: PASSWORD }, from());
    const second = await signInOverHttp(web, { email: person.email, password: PASSWORD }, { ...from(), cookie: first.cookie! });
    expect(second.cookie).not.toBe(first.cookie);
    expect((await call(web, 'GET', '/api/v1/me', { cookie: first.cookie! })).status).toBe(401);
    expect((await call(web, 'GET', '/api/v1/me', { cookie: second.cookie! })).status).toBe(200);
  });

  it('lists a person’s own sign-ins, ends one from afar, and never another person’s', async () => {
    const { person } = await member();
    const here = await sessionCookie(person.id, { userAgent: 'here' });
    const there = await sessionCookie(person.id, { userAgent: 'there' });
    const other = await buildMember('keeper');
    const foreign = await sessionCookie(other.personId);
    const list = await call(web, 'GET', '/api/v1/sign-ins', { cookie: here.cookie });
    expect(list.body.items).toHaveLength(2);
    expect(list.body.items.find((item: { current: boolean }) => item.current)).toMatchObject({ id: here.signInId, user_agent: 'here' });

    expect((await call(web, 'DELETE', `/api/v1/sign-ins/${there.signInId}`, { cookie: here.cookie })).status).toBe(204);
    expect((await call(web, 'GET', '/api/v1/me', { cookie: there.cookie })).status).toBe(401);
    expect((await call(web, 'DELETE', `/api/v1/sign-ins/${foreign.signInId}`, { cookie: here.cookie })).status).toBe(404);
    expect((await call(web, 'GET', '/api/v1/me', { cookie: foreign.cookie })).status).toBe(200);
  });

  it('signs out everywhere', async () => {
    const { person } = await member();
    const cookies = [await sessionCookie(person.id), await sessionCookie(person.id), await sessionCookie(person.id)];
    expect((await call(web, 'DELETE', '/api/v1/sign-ins', { cookie: cookies[0]!.cookie })).status).toBe(204);
    for (const { cookie } of cookies) expect((await call(web, 'GET', '/api/v1/me', { cookie })).status).toBe(401);
    expect(await AuditRow.count({ where: { personId: person.id, action: 'sign-in.ended-all' } })).toBe(1);
  });

  it('takes no cookie that is forged, changed, expired, or signed out', async () => {
    const { person } = await member();
    const { cookie } = await sessionCookie(person.id);
    const expired = await sessionCookie(person.id, { expiresAt: new Date(Date.now() - 1000) });
    const changed = `${cookie.slice(0, -8)}AAAAAAAA`;
    for (const bad of [changed, 'fallbright-session=eyJhbGciOiJub25lIn0.e30.', 'fallbright-session=', expired.cookie]) expect((await call(web, 'GET', '/api/v1/me', { cookie: bad })).status).toBe(401);
    expect((await call(web, 'GET', '/api/v1/me', { cookie })).status).toBe(200);
  });

  it('notes when a person was last seen, at most once a minute', async () => {
    const { person } = await member();
    const hourAgo = new Date(Date.now() - 3_600_000);
    const { cookie, signInId } = await sessionCookie(person.id, { lastSeenAt: hourAgo });
    await call(web, 'GET', '/api/v1/me', { cookie });
    await expect.poll(async () => (await SignIn.findByPk(signInId, { rejectOnEmpty: true })).lastSeenAt.getTime()).toBeGreaterThan(Date.now() - 30_000);
    const seen = (await SignIn.findByPk(signInId, { rejectOnEmpty: true })).lastSeenAt.getTime();
    await call(web, 'GET', '/api/v1/me', { cookie });
    expect((await SignIn.findByPk(signInId, { rejectOnEmpty: true })).lastSeenAt.getTime()).toBe(seen);
  });

  it('sends a page without a session to the sign-in page, and comes back to where it was', async () => {
    const answer = await call(web, 'GET', '/shelf?day=3', {});
    expect(answer.status).toBe(307);
    const target = new URL(answer.headers.get('location')!, web.url);
    expect(target.origin).toBe(web.url);
    expect(target.pathname).toBe('/sign-in');
    expect(target.searchParams.get('next')).toBe('/shelf?day=3');
  });

  it('refuses a change that another site asks for with the person’s cookie', async () => {
    const { person, cellarId } = await member();
    const { cookie } = await sessionCookie(person.id);
    const attempt = (headers: Record<string, string>) =>
      fetch(`${web.url}/api/v1/cellars/active`, { method: 'POST', headers: { cookie, 'content-type': 'application/json', ...headers }, body: JSON.stringify({ cellar_id: cellarId }) }).then((response) => response.status);
    expect(await attempt({ 'sec-fetch-site': 'cross-site', origin: 'https://evil.example' })).toBe(403);
    expect(await attempt({ 'sec-fetch-site': 'same-site' })).toBe(403);
    expect(await attempt({ origin: 'https://evil.example' })).toBe(403);
    expect(await attempt({ origin: 'null' })).toBe(403);
    expect(await attempt({})).toBe(403);
    expect(await attempt({ origin: web.url })).toBe(204);
    expect(await attempt({ 'sec-fetch-site': 'same-origin' })).toBe(204);
  });

  it('answers with the headers that keep a browser safe', async () => {
    const page = await call(web, 'GET', '/sign-in', {});
    expect(page.status).toBe(200);
    const policy = page.headers.get('content-security-policy') ?? '';
    expect(policy).toMatch(/script-src 'self' 'nonce-[A-Za-z0-9+/=]{20,}' 'strict-dynamic'/);
    expect(policy).not.toContain('unsafe-eval');
    expect(policy).toContain("frame-ancestors 'none'");
    expect(page.headers.get('x-content-type-options')).toBe('nosniff');
    const nonce = /'nonce-([^']+)'/.exec(policy)![1]!;
    for (const script of String(page.body).match(/<script\b[^>]*>/g) ?? []) expect(script).toContain(`nonce="${nonce}"`);
    const again = await call(web, 'GET', '/sign-in', {});
    expect(again.headers.get('content-security-policy')).not.toBe(policy);
    expect(page.headers.get('x-powered-by')).toBeNull();
  });
});

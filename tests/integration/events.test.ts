import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Membership } from '@/db/models';
import { inTransaction } from '@/db/client';
import { changeSchema, type Change } from '@/lib/contracts/events';
import { notifyChange } from '@/lib/services/changes';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember } from '../support/factories';
import { buildToken } from '../support/people-rows';
import { until } from '../support/processes';
import { call, sessionCookie, startWeb, type Web } from '../support/web';

interface Listening {
  status: number;
  type: string | null;
  changes: Change[];
  beats: number;
  closed: boolean;
  end(): void;
}

describe('live events', () => {
  const db = useDatabase();
  let web: Web;
  beforeAll(async () => {
    web = await startWeb({ databaseUrl: db.url });
  }, 700_000);
  afterAll(async () => {
    await web?.stop();
  });

  /** A page's event stream, read as it comes. */
  async function listening(cookie: string | undefined, headers: Record<string, string> = {}, server: Pick<Web, 'url'> = web): Promise<Listening> {
    const abort = new AbortController();
    const response = await fetch(`${server.url}/api/v1/events`, { headers: { accept: 'text/event-stream', ...(cookie && { cookie }), ...headers }, signal: abort.signal });
    const state: Listening = { status: response.status, type: response.headers.get('content-type'), changes: [], beats: 0, closed: false, end: () => abort.abort() };
    void (async () => {
      let rest = '';
      try {
        for await (const chunk of response.body!.pipeThrough(new TextDecoderStream())) {
          const messages = (rest + chunk).split('\n\n');
          rest = messages.pop()!;
          for (const message of messages) {
            if (message.includes('event: beat')) state.beats += 1;
            const data = /^event: change\ndata: (.*)$/m.exec(message)?.[1];
            if (data) state.changes.push(changeSchema.parse(JSON.parse(data)));
          }
        }
      } catch {
        // Cut off, as a page that goes or a server that dies does.
      }
      state.closed = true;
    })();
    if (response.ok) await until('the first beat', () => state.beats > 0);
    return state;
  }

  const say = (change: Change) => inTransaction((transaction) => notifyChange(change, transaction));

  it('tells a change of the cellar within two seconds, to every page that is open', async () => {
    const member = await buildMember('hand');
    const { cookie } = await sessionCookie(member.personId);
    const pages = [await listening(cookie), await listening(cookie)];
    const batch = await buildBatch({ cellarId: member.cellarId });
    const began = Date.now();
    const logged = await call(web, 'POST', `/api/v1/batches/${batch.id}/entries`, { cookie, body: { kind: 'note', at: new Date().toISOString(), text: 'Bubbles.' } });
    expect(logged.status).toBe(201);
    for (const page of pages) await until('the change', () => page.changes.length > 0, 2_000);
    expect(Date.now() - began).toBeLessThan(2_000);
    for (const page of pages) {
      expect(page.type).toContain('text/event-stream');
      expect(page.changes).toEqual([{ cellar: member.cellarId, kind: 'entry', batch: batch.id }]);
      page.end();
    }
  });

  it('says nothing of a change that was rolled back', async () => {
    const member = await buildMember('hand');
    const page = await listening((await sessionCookie(member.personId)).cookie);
    await expect(
      inTransaction(async (transaction) => {
        await notifyChange({ cellar: member.cellarId, kind: 'batch', batch: null }, transaction);
        throw new Error('no');
      }),
    ).rejects.toThrow('no');
    await say({ cellar: member.cellarId, kind: 'sensor', batch: null });
    await until('the later change', () => page.changes.length > 0);
    expect(page.changes.map((change) => change.kind)).toEqual(['sensor']);
    page.end();
  });

  it('tells nobody of another cellar, and guests nothing of alerts', async () => {
    const [mine, theirs] = [await buildMember('guest'), await buildMember('keeper')];
    const page = await listening((await sessionCookie(mine.personId)).cookie);
    await say({ cellar: theirs.cellarId, kind: 'reading', batch: null });
    await say({ cellar: mine.cellarId, kind: 'alert', batch: null });
    await say({ cellar: mine.cellarId, kind: 'reading', batch: null });
    await until('the own change', () => page.changes.length > 0);
    expect(page.changes).toEqual([{ cellar: mine.cellarId, kind: 'reading', batch: null }]);
    page.end();
  });

  it('tells a stream that opens what changed just before, once each: its page may have asked before the change', async () => {
    const [mine, theirs] = [await buildMember('guest'), await buildMember('keeper')];
    const early = await listening((await sessionCookie(mine.personId)).cookie);
    for (const change of [
      { cellar: mine.cellarId, kind: 'batch', batch: null },
      { cellar: theirs.cellarId, kind: 'lot', batch: null },
      { cellar: mine.cellarId, kind: 'alert', batch: null },
      { cellar: mine.cellarId, kind: 'member', batch: null },
      { cellar: mine.cellarId, kind: 'batch', batch: null },
    ] as const)
      await say(change);
    await until('all of them', () => early.changes.length === 3);
    const late = await listening((await sessionCookie(mine.personId)).cookie);
    await until('both of them', () => late.changes.length === 2);
    expect(late.changes.map(({ kind }) => kind).sort()).toEqual(['batch', 'member']);
    for (const page of [early, late]) page.end();
  });

  it('lets nobody listen without a session', async () => {
    expect((await listening(undefined)).status).toBe(401);
  });

  it('takes a Last-Event-ID and opens as ever', async () => {
    const member = await buildMember('hand');
    const page = await listening((await sessionCookie(member.personId)).cookie, { 'last-event-id': '12345; drop' });
    expect(page.status).toBe(200);
    page.end();
  });

  it('ends the stream within a minute of a sign-in that was ended, and of a membership that was taken away', async () => {
    const [out, removed, kept] = [await buildMember('hand'), await buildMember('hand'), await buildMember('hand')];
    const session = await sessionCookie(out.personId);
    const pages = [await listening(session.cookie), await listening((await sessionCookie(removed.personId)).cookie), await listening((await sessionCookie(kept.personId)).cookie)];
    expect((await call(web, 'DELETE', `/api/v1/sign-ins/${session.signInId}`, { cookie: session.cookie })).status).toBe(204);
    await Membership.destroy({ where: { personId: removed.personId } });
    await until('both streams to end', () => pages[0]!.closed && pages[1]!.closed, 60_000);
    expect(pages[2]!.closed).toBe(false);
    pages[2]!.end();
  }, 90_000);

  it('ends the stream within seconds of a sign-in that runs out, or has lain unused too long, though nobody says a word', async () => {
    const [expired, idle, kept] = [await buildMember('hand'), await buildMember('hand'), await buildMember('hand')];
    const [runsOut, liesUnused, stays] = [await sessionCookie(expired.personId), await sessionCookie(idle.personId), await sessionCookie(kept.personId)];
    const pages = [await listening(runsOut.cookie), await listening(liesUnused.cookie), await listening(stays.cookie)];
    await db.sequelize.query(`update sign_ins set expires_at = now() where id = '${runsOut.signInId}'`);
    await db.sequelize.query(`update sign_ins set last_seen_at = now() - make_interval(secs => idle_s + 1) where id = '${liesUnused.signInId}'`);
    await until('both streams to end', () => pages[0]!.closed && pages[1]!.closed, 8_000);
    await say({ cellar: kept.cellarId, kind: 'reading', batch: null });
    await until('the one that is still signed in to hear', () => pages[2]!.changes.length === 1);
    pages[2]!.end();
  });

  it('ends a program’s stream within seconds of its token running out', async () => {
    const member = await buildMember('hand');
    const { id, token } = await buildToken(member.personId, member.cellarId, 'hand');
    const page = await listening(undefined, { authorization: `Bearer ${token}` });
    expect(page.status).toBe(200);
    await db.sequelize.query(`update api_tokens set expires_at = now() where id = '${id}'`);
    await until('the stream to end', () => page.closed, 8_000);
  });

  it('ends streams when the line to the database breaks, so that pages ask again, and hears anew after', async () => {
    const member = await buildMember('hand');
    const { cookie } = await sessionCookie(member.personId);
    const page = await listening(cookie);
    await db.sequelize.query(`select pg_terminate_backend(pid) from pg_stat_activity where datname = current_database() and application_name = 'fallbright listen'`);
    await until('the stream to end', () => page.closed, 15_000);
    const again = await listening(cookie);
    await say({ cellar: member.cellarId, kind: 'reading', batch: null });
    await until('the change after the break', () => again.changes.length > 0);
    again.end();
  });

  it('forgets pages that went away', async () => {
    const member = await buildMember('hand');
    const { cookie } = await sessionCookie(member.personId);
    const open = async () => Number(/^fallbright_event_streams (\d+)$/m.exec(String((await call(web, 'GET', '/api/metrics')).body))?.[1]);
    await until('earlier pages to be gone', async () => (await open()) === 0);
    const pages = await Promise.all(Array.from({ length: 20 }, () => listening(cookie)));
    expect(await open()).toBe(20);
    for (const page of pages) page.end();
    await until('the streams to be forgotten', async () => (await open()) === 0);
  });

  it('stops within ten seconds while pages listen and come back', async () => {
    const other = await startWeb({ databaseUrl: db.url });
    const member = await buildMember('hand');
    const { cookie } = await sessionCookie(member.personId);
    /** As a browser does: it asks again for as long as somebody answers. */
    const page = async () => {
      for (;;) {
        const stream = await listening(cookie, {}, other).catch(() => null);
        if (stream?.status !== 200) return;
        await until('the stream to end', () => stream.closed, 60_000);
      }
    };
    const pages = Array.from({ length: 5 }, page);
    await until('the pages to listen', async () => (await call(other, 'GET', '/api/metrics')).body.toString().includes('fallbright_event_streams 5'));
    const took = await other.stop();
    expect(took).toBeLessThan(10_000);
    await Promise.all(pages);
  });
});

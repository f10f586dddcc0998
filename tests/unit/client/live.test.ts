import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { ClientError, getJson, withQuery } from '@/lib/client/fetcher';
import { touches } from '@/lib/client/live';

const BATCH = '3f0a1f3e-8f0f-4c55-9d5e-0c6f5e1d2a3b';
const OTHER = '9b2d7c1a-1111-4c55-9d5e-0c6f5e1d2a3b';

describe('what a change makes a page ask for again', () => {
  const asked = (kind: Parameters<typeof touches>[0]['kind'], path: string) => touches({ kind, batch: BATCH })(path);

  it('a reading: the series of its batch, the shelf and the sensors, and nothing of another batch', () => {
    for (const path of [`/batches/${BATCH}/series`, `/batches/${BATCH}/series?points=400`, '/shelf?from=a&to=b', '/sensors', '/sensors/fs-abc']) expect(asked('reading', path), path).toBe(true);
    for (const path of [`/batches/${OTHER}/series`, `/batches/${BATCH}/entries`, `/batches/${BATCH}/judgement`, '/me', '/alerts', '/batches']) expect(asked('reading', path), path).toBe(false);
  });

  it('a judgement: the batch and its verdicts, not its readings or its log', () => {
    for (const path of [`/batches/${BATCH}`, `/batches/${BATCH}/judgement`, `/batches/${BATCH}/assessments`, '/sensors/fs-abc/health', '/batches?state=working', '/shelf?from=a&to=b']) expect(asked('assessment', path), path).toBe(true);
    for (const path of [`/batches/${BATCH}/series`, `/batches/${BATCH}/entries`, `/batches/${OTHER}`, '/sensors/fs-abc/readings?limit=20']) expect(asked('assessment', path), path).toBe(false);
  });

  it('an entry: all of its batch', () => {
    for (const path of [`/batches/${BATCH}`, `/batches/${BATCH}/entries?limit=50`, `/batches/${BATCH}/judgement`, '/shelf']) expect(asked('entry', path), path).toBe(true);
    expect(asked('entry', `/batches/${OTHER}/entries`)).toBe(false);
  });

  it('an alert or a mute: the alerts, what is muted, and the batch that shows it', () => {
    for (const path of ['/alerts', '/alerts?state=open', '/mutes', '/messages', `/batches/${BATCH}`, '/shelf']) expect(asked('alert', path), path).toBe(true);
    expect(asked('alert', `/batches/${BATCH}/series`)).toBe(false);
  });
});

describe('asking the server', () => {
  const fetch = vi.fn<typeof globalThis.fetch>();
  beforeEach(() => void vi.stubGlobal('fetch', fetch));
  afterEach(() => void vi.unstubAllGlobals());

  it('turns a problem document into an error with its sentences by field', async () => {
    const problem = { type: 'urn:fallbright:problem:invalid', title: 'Some values are wrong', status: 422, detail: 'Look again.', errors: { volume_l: ['is more than the vessel holds'] } };
    fetch.mockResolvedValue(new Response(JSON.stringify(problem), { status: 422 }));
    const error = await getJson('/batches').catch((caught: unknown) => caught);
    expect(error).toBeInstanceOf(ClientError);
    expect(error).toMatchObject({ status: 422, code: 'invalid', message: 'Look again.', fields: problem.errors, transient: false });
  });

  it('says how long to wait where the server does', async () => {
    fetch.mockResolvedValue(new Response('{}', { status: 503, headers: { 'retry-after': '5' } }));
    expect(await getJson('/me').catch((caught: unknown) => caught)).toMatchObject({ status: 503, retryAfterS: 5, transient: true });
  });

  it('tells a server that cannot be reached from one that refuses, and survives an answer that is no JSON', async () => {
    fetch.mockRejectedValueOnce(new TypeError('fetch failed'));
    expect(await getJson('/me').catch((caught: unknown) => caught)).toMatchObject({ status: 0, code: 'unreachable', transient: true });
    fetch.mockResolvedValueOnce(new Response('<html>', { status: 502 }));
    expect(await getJson('/me').catch((caught: unknown) => caught)).toMatchObject({ status: 502, transient: true });
  });

  it('writes the same query the same way, without what is not given', () => {
    expect(withQuery('/shelf', { from: '2026-01-01T00:00:00Z', to: null, limit: 5, cursor: undefined })).toBe('/shelf?from=2026-01-01T00%3A00%3A00Z&limit=5');
    expect(withQuery('/me', {})).toBe('/me');
  });
});

import { randomUUID } from 'node:crypto';
import { describe, expect, it, vi } from 'vitest';
import { endpoints, type Endpoint, type EndpointName } from '@/lib/contracts/endpoints';
import type { Role } from '@/lib/core/roles';
import { dataRows } from '../support/data-rows';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';
import { jobRows } from '../support/job-rows';
import { messageRows } from '../support/message-rows';
import { peopleRows } from '../support/people-rows';
import { watchRows, type RoleRow } from '../support/role-rows';
import { askRoute } from '../support/routes';
import { things } from '../support/things';
import { sessionCookie } from '../support/web';

vi.mock('server-only', () => ({}));
vi.setConfig({ testTimeout: 30_000 });
useDatabase();

const AT_ONCE = 4;
const ROWS: Partial<Record<EndpointName, RoleRow>> = { ...watchRows, ...jobRows, ...peopleRows, ...messageRows, ...dataRows };
const changing = Object.entries(ROWS).flatMap(([name, row]) => {
  const endpoint: Endpoint = endpoints[name as EndpointName];
  return endpoint.method === 'GET' ? [] : [{ name, row, endpoint }];
});

/** What a path names, by the names that the endpoint gives its parts. */
function paramsOf(endpoint: Endpoint, path: string): Record<string, string> {
  const pattern = new RegExp(`^${endpoint.path.replace(/\{(\w+)\}/g, '(?<$1>[^/]+)')}$`);
  return { ...pattern.exec(path)?.groups };
}

const keyed = (endpoint: Endpoint) => 'client_id' in ((endpoint.body as { shape?: object } | undefined)?.shape ?? {});

async function prepared(endpoint: Endpoint, row: RoleRow) {
  const member = await buildMember(row.may[0] as Role);
  const own = await things(member.cellarId, member.personId);
  const { cookie } = await sessionCookie(member.personId);
  const body = row.body?.(own) as object | undefined;
  const [path, query] = row.path(own).split('?') as [string, string?];
  const sent = body && JSON.stringify({ ...body, ...(keyed(endpoint) && { client_id: randomUUID() }) });
  return () => askRoute(endpoint, { cookie, params: paramsOf(endpoint, path), query, body: sent });
}

describe('the same request, sent four times at once', () => {
  it.concurrent.each(changing)('$endpoint.method $endpoint.path is done, or refused with a reason', async ({ row, endpoint }) => {
    const ask = await prepared(endpoint, row);
    const answers = await Promise.all(Array.from({ length: AT_ONCE }, ask));
    const statuses = answers.map((answer) => answer.status);
    const told = await Promise.all(answers.map((answer) => answer.text()));
    expect(statuses, told.join('\n')).toContain(row.good);
    for (const [index, status] of statuses.entries()) expect(status === row.good || (status >= 400 && status < 500), told[index]).toBe(true);
  });
});

const named = changing.filter(({ endpoint }) => keyed(endpoint));
describe('a request with a number of its own', () => {
  it('is what every act on a vessel or a bottle takes', () => {
    expect(named.map(({ name }) => name)).toEqual(expect.arrayContaining(['createEntry', 'rackBatch', 'topUpBatch', 'splitBatch', 'blendBatches', 'startFining', 'bottleBatch', 'openBottles', 'createTasting']));
  });

  it.concurrent.each(named)('$endpoint.method $endpoint.path is done once, sent at once and again later', async ({ row, endpoint }) => {
    const ask = await prepared(endpoint, row);
    const answers = await Promise.all(Array.from({ length: AT_ONCE }, ask));
    for (const answer of [...answers, await ask()]) expect(answer.status, await answer.clone().text()).toBe(row.good);
  });
});

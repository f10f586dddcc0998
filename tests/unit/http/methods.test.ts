import { describe, expect, it } from 'vitest';
import { endpoints, type Endpoint } from '@/lib/contracts/endpoints';
import { problem } from '@/lib/contracts/common';
import { wrongMethod } from '@/lib/http/methods';

const ID = '00000000-0000-4000-8000-000000000000';
const addressOf = ({ path }: Endpoint) => `/api/v1${path.replace(/\{\w+\}/g, ID)}`;

describe('a method that an address does not have', () => {
  it('is answered by a problem document that names those it has', async () => {
    const answer = wrongMethod({ method: 'DELETE', pathname: `/api/v1/batches/${ID}` })!;
    expect(answer.status).toBe(405);
    expect(answer.headers.get('content-type')).toBe('application/problem+json');
    expect(answer.headers.get('allow')?.split(', ').toSorted()).toEqual(['GET', 'HEAD', 'OPTIONS', 'PATCH']);
    expect(problem.parse(await answer.json())).toMatchObject({ status: 405, type: 'urn:fallbright:problem:method-not-allowed' });
  });

  it.each(Object.entries<Endpoint>(endpoints))('lets %s pass', (_name, endpoint) => {
    expect(wrongMethod({ method: endpoint.method, pathname: addressOf(endpoint) })).toBeNull();
    if (endpoint.method === 'GET') expect(wrongMethod({ method: 'HEAD', pathname: addressOf(endpoint) })).toBeNull();
  });

  it('is nothing that is said of addresses outside the table', () => {
    for (const pathname of ['/api/health', '/api/v1/nowhere', `/api/v1/batches/${ID}/nowhere`, '/api/auth/session', '/api/v1/auditXcsv']) expect(wrongMethod({ method: 'PUT', pathname }), pathname).toBeNull();
  });
});

import { createServer, request as ask, Server, type IncomingMessage } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterEach, expect, it } from 'vitest';
import { guardApi } from '@/lib/http/api-door';

const { emit } = Server.prototype;
afterEach(() => {
  Server.prototype.emit = emit;
});

it('every address of the API, however it is written, says what browsers may do with it, and takes no method that it does not have', async () => {
  const heard: string[] = [];
  const server = createServer((request, response) => {
    heard.push(request.url ?? '');
    response.writeHead(204).end();
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  guardApi();
  const answer = (method: string, path: string) =>
    new Promise<IncomingMessage>((resolve, reject) => {
      ask({ port, host: '127.0.0.1', method, path, agent: false }, (response) => resolve(response.resume())).on('error', reject).end();
    });
  for (const path of ['/api/health', '/api/v1/me?x=1', '/%61pi/v1/me', `http://127.0.0.1:${port}/api/v1/me`]) {
    const { statusCode, headers } = await answer('GET', path);
    expect(statusCode, path).toBe(204);
    expect(headers, path).toMatchObject({ 'x-content-type-options': 'nosniff', 'x-frame-options': 'DENY', 'content-security-policy': "default-src 'none'; frame-ancestors 'none'" });
  }
  expect((await answer('GET', '/api/v1/lots/x/labels.pdf')).headers['x-frame-options']).toBe('SAMEORIGIN');
  expect((await answer('GET', '/apiary')).headers['x-frame-options']).toBeUndefined();
  const before = heard.length;
  expect(await answer('PUT', '/api/v1/me')).toMatchObject({ statusCode: 405, headers: { 'content-type': 'application/problem+json', allow: 'GET, HEAD, OPTIONS, PATCH', 'x-content-type-options': 'nosniff' } });
  expect(heard).toHaveLength(before);
  await new Promise((resolve) => server.close(resolve));
});

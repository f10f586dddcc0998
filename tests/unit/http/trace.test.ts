import { createServer, Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterEach, expect, it } from 'vitest';
import { refuseTrace } from '@/lib/http/trace';
import { sendRaw } from '../../support/hostile/wire';

const { emit } = Server.prototype;
afterEach(() => {
  Server.prototype.emit = emit;
});

it('TRACE is refused before anybody reads it, and all else is heard as ever', async () => {
  const heard: string[] = [];
  const server = createServer((request, response) => {
    heard.push(request.method ?? '');
    response.writeHead(204).end();
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  refuseTrace();
  for (const method of ['TRACE', 'GET', 'OPTIONS', 'TRACE', 'DELETE']) expect(await sendRaw(port, `${method} / HTTP/1.1\r\nHost: x\r\nConnection: close\r\n\r\n`), method).toBe(method === 'TRACE' ? 405 : 204);
  expect(heard).toEqual(['GET', 'OPTIONS', 'DELETE']);
  await new Promise((resolve) => server.close(resolve));
});

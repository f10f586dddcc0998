import { createServer, Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterEach, expect, it } from 'vitest';
import { refuseUnreadable } from '@/lib/http/refuse';
import { sendRaw } from '../../support/hostile/wire';

const { emit } = Server.prototype;
afterEach(() => {
  Server.prototype.emit = emit;
});

it('TRACE and addresses that cannot be decoded are refused before anybody reads them, a Range is left unheard, and all else is heard as ever', async () => {
  const heard: string[] = [];
  const ranges: (string | undefined)[] = [];
  const server = createServer((request, response) => {
    heard.push(request.method ?? '');
    ranges.push(request.headers.range);
    response.writeHead(204).end();
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  refuseUnreadable();
  for (const method of ['TRACE', 'GET', 'OPTIONS', 'TRACE', 'DELETE']) expect(await sendRaw(port, `${method} / HTTP/1.1\r\nHost: x\r\nConnection: close\r\n\r\n`), method).toBe(method === 'TRACE' ? 405 : 204);
  expect(heard).toEqual(['GET', 'OPTIONS', 'DELETE']);
  expect(await sendRaw(port, 'GET / HTTP/1.1\r\nHost: x\r\nRange: bytes=99-1\r\nConnection: close\r\n\r\n')).toBe(204);
  expect(ranges.at(-1)).toBeUndefined();
  for (const [path, status] of [['/%ff%fe%', 400], ['/%', 400], ['/a%zz', 400], ['/%c0%80', 400], ['/%e2%82%ac', 204], ['/a?b=%ff%', 204], ['/%00', 204], ['/%2e%2e/%25', 204]] as const) expect(await sendRaw(port, `GET ${path} HTTP/1.1\r\nHost: x\r\nConnection: close\r\n\r\n`), path).toBe(status);
  await new Promise((resolve) => server.close(resolve));
});

import { createServer } from 'node:http';
import { once } from 'node:events';
import type { AddressInfo } from 'node:net';
import { describe, expect, it } from 'vitest';
import { isPublicAddress, publicLookup } from '@/lib/push/public-address';
import { mayPushTo, webPushTransport } from '@/lib/push/transport';

describe('an address of the open Internet', () => {
  it.each(['9.9.9.9', '1.1.1.1', '172.15.255.255', '172.32.0.1', '2606:4700:4700::1111', '2a00:1450:4001::1'])('%s is one', (address) => {
    expect(isPublicAddress(address)).toBe(true);
  });
  it.each(['127.0.0.1', '127.9.9.9', '0.0.0.0', '10.0.0.1', '172.16.0.1', '172.31.255.255', '192.168.0.1', '169.254.169.254', '100.64.0.1', '198.18.0.1', '224.0.0.1', '255.255.255.255', '::1', '::', 'fc00::1', 'fd12::1', 'fe80::1', 'ff02::1', '::ffff:127.0.0.1', '::ffff:10.0.0.1', '64:ff9b::7f00:1', '2002:7f00:1::', 'not an address', ''])('%s is none', (address) => {
    expect(isPublicAddress(address)).toBe(false);
  });

  it('is looked up once, and the address that was checked is the one that is used', async () => {
    const found = await new Promise((resolve) => publicLookup('localhost', { all: true }, (error) => resolve(error?.name)));
    expect(found).toBe('PrivateAddressError');
  });
});

describe('where messages may be pushed', () => {
  it.each(['https://push.example/x', 'https://9.9.9.9/x', 'https://[2606:4700:4700::1111]/x'])('%s: yes', (endpoint) => {
    expect(mayPushTo(endpoint, false)).toBe(true);
  });
  it.each(['http://push.example/x', 'https://127.0.0.1/x', 'https://0x7f.1/x', 'https://2130706433/x', 'https://[::ffff:7f00:1]/x', 'https://intranet/x', 'https://host.internal/x', 'https://push.example@10.0.0.1/x', 'javascript:alert(1)', 'file:///etc/passwd', 'nonsense'])('%s: no', (endpoint) => {
    expect(mayPushTo(endpoint, false)).toBe(false);
  });

  it('reaches nothing inside by a name that leads there', async () => {
    let asked = 0;
    const server = createServer((_request, response) => {
      asked += 1;
      response.end();
    });
    server.listen(0, '127.0.0.1');
    await once(server, 'listening');
    const { port } = server.address() as AddressInfo;
    const transport = webPushTransport({ keys: () => ({ publicKey: '', privateKey: '' }), contact: 'mailto:a@b.example', allowPrivate: false });
    const target = { endpoint: `http://localhost:${port}/x`, p256dh: '', auth: '' };
    expect(await transport.send(target, { body: '{}', topic: 'x', urgent: false, ttlS: 1 })).toBe('gone');
    expect(asked).toBe(0);
    server.close();
  });
});

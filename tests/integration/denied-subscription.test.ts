import { Aedes } from 'aedes';
import { createServer, type AddressInfo } from 'node:net';
import { setTimeout as pause } from 'node:timers/promises';
import { describe, expect, it } from 'vitest';
import { OutsideBroker } from '@/broker/subscription';
import { useDatabase } from '../support/database';
import { until } from '../support/processes';

useDatabase();

describe('an outside broker that does not let us listen', () => {
  it('is asked again in peace, and heard once it does', async () => {
    let allowed = false;
    let connections = 0;
    const aedes = await Aedes.createBroker({ authorizeSubscribe: (_client, subscription, callback) => callback(null, allowed ? subscription : null) });
    aedes.on('client', () => (connections += 1));
    const server = createServer((socket) => void aedes.handle(socket));
    await new Promise<void>((done) => server.listen(0, '127.0.0.1', done));
    const subscribed = OutsideBroker.subscribe({ url: `mqtt://127.0.0.1:${(server.address() as AddressInfo).port}`, instance: 'test', record: () => Promise.reject(new Error('nothing comes')), connections: 1 });

    await until('the first try', () => connections > 0);
    await pause(2_500);
    expect(connections).toBeLessThanOrEqual(4);
    allowed = true;
    const outside = await subscribed;
    expect(outside.figures().connections).toBe(1);
    await outside.stop(100);
    await new Promise<void>((done) => aedes.close(() => server.close(() => done())));
  });
});

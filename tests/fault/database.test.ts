import { Client } from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { until } from '../support/processes';
import { House, untilServed } from '../support/house';
import { seeded } from '../support/random';

const DEVICES = 20;
const IN_FLIGHT = 3;
const KEEPALIVE_S = 3;
const TIMES = 5;
const MB = 1 << 20;
const random = seeded(42);
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

let house: House;
beforeAll(async () => {
  house = await House.build();
  await house.startBroker();
  await house.press(DEVICES, { inFlight: IN_FLIGHT, keepalive: KEEPALIVE_S, everyMs: 5 });
});
afterAll(() => house.close());

/** Keeps everybody out of the readings for as long as `during` takes. */
async function stalled(during: () => Promise<void>): Promise<void> {
  const locker = new Client({ connectionString: house.cluster.url });
  await locker.connect();
  try {
    await locker.query('begin; lock table readings in access exclusive mode');
    await during();
    await locker.query('commit');
  } finally {
    await locker.end();
  }
}

describe('the database under load', () => {
  it(`killed ${TIMES} times at random moments, has every acknowledged reading when it is back, and readings flow again`, async () => {
    const recoveries: number[] = [];
    for (let time = 0; time < TIMES; time += 1) {
      await pause(random() * 1_000);
      await house.killDatabase();
      await pause(random() * 1_000);
      await house.startDatabase();
      recoveries.push(await untilServed(house));
      expect(await house.missing()).toEqual([]);
    }
    console.log(`served again after the database was killed, ms from its start: ${recoveries.join(', ')}`);
  });

  it(`stopped at once ${TIMES} times, likewise`, async () => {
    for (let time = 0; time < TIMES; time += 1) {
      await pause(random() * 1_000);
      await house.cluster.stop('immediate');
      await house.startDatabase();
      await untilServed(house);
      expect(await house.missing()).toEqual([]);
    }
    await house.checkDatabase();
  });

  it(`stalled ${TIMES} times longer than a keep-alive, acknowledges nothing meanwhile, loses no connection, and holds little`, async () => {
    const before = await house.broker.memory();
    const reconnects = () => house.devices.reduce((sum, device) => sum + device.reconnects, 0);
    for (let time = 0; time < TIMES; time += 1) {
      await until('every device to be connected', () => house.devices.every((device) => device.client.connected));
      const connections = reconnects();
      await stalled(async () => {
        await pause(100);
        const acknowledged = house.acknowledged;
        await pause((KEEPALIVE_S * 1.6 + random() * 2) * 1_000);
        expect(house.acknowledged).toBe(acknowledged);
      });
      await untilServed(house);
      expect(reconnects()).toBe(connections);
      expect(await house.missing()).toEqual([]);
    }
    expect((await house.broker.memory()) - before).toBeLessThan(50 * MB);
  });

  it(`stalled ${TIMES} times with the broker killed inside, loses nothing`, async () => {
    for (let time = 0; time < TIMES; time += 1) {
      await stalled(async () => {
        await pause(random() * 1_000);
        await house.killBroker();
        await house.startBroker();
        await pause(random() * 1_000);
      });
      await untilServed(house);
      expect(await house.missing()).toEqual([]);
    }
  });

  it('refusing connections is asked again with growing pauses, not in a storm', async () => {
    await house.cluster.stop('fast');
    const from = house.broker.lines.length;
    await pause(5_000);
    const tries = house.broker.lines.slice(from).filter((line) => String(line.msg).startsWith('the database did not take a batch'));
    // Two lanes, pauses that double from 0.1 s: about six tries each in five seconds.
    expect(tries.length).toBeGreaterThan(0);
    expect(tries.length).toBeLessThan(30);
    await house.startDatabase();
    await untilServed(house);
    expect(await house.missing()).toEqual([]);
  });

  it('in the end every reading that was sent is there, once', async () => {
    await house.settle();
    expect(await house.missing()).toEqual([]);
    const sent = house.devices.reduce((sum, device) => sum + device.sent.length, 0);
    expect([house.acknowledged, await house.count('readings'), await house.count('refusals')]).toEqual([sent, sent, 0]);
    console.log(`sent ${sent}, acknowledged ${house.acknowledged}, rows ${await house.count('readings')}, refused 0`);
  });
});

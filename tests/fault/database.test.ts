import { Client } from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { until } from '../support/processes';
import { PressedBroker, untilServed } from '../support/pressed-broker';
import { seeded } from '../support/random';

const DEVICES = 20;
const IN_FLIGHT = 3;
const KEEPALIVE_S = 3;
const TIMES = 5;
const MB = 1 << 20;
const random = seeded(42);
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

let pressed: PressedBroker;
beforeAll(async () => {
  pressed = await PressedBroker.build();
  await pressed.startBroker();
  await pressed.press(DEVICES, { inFlight: IN_FLIGHT, keepalive: KEEPALIVE_S, everyMs: 5 });
});
afterAll(() => pressed.close());

/** Keeps everybody out of the readings for as long as `during` takes. */
async function stalled(during: () => Promise<void>): Promise<void> {
  const locker = new Client({ connectionString: pressed.cluster.url });
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
      await pressed.killDatabase();
      await pause(random() * 1_000);
      await pressed.startDatabase();
      recoveries.push(await untilServed(pressed));
      expect(await pressed.missing()).toEqual([]);
    }
    console.log(`served again after the database was killed, ms from its start: ${recoveries.join(', ')}`);
  });

  it(`stopped at once ${TIMES} times, likewise`, async () => {
    for (let time = 0; time < TIMES; time += 1) {
      await pause(random() * 1_000);
      await pressed.cluster.stop('immediate');
      await pressed.startDatabase();
      await untilServed(pressed);
      expect(await pressed.missing()).toEqual([]);
    }
    await pressed.checkDatabase();
  });

  it(`stalled ${TIMES} times longer than a keep-alive, acknowledges nothing meanwhile, loses no connection, and holds little`, async () => {
    const before = await pressed.broker.memory();
    const reconnects = () => pressed.devices.reduce((sum, device) => sum + device.reconnects, 0);
    for (let time = 0; time < TIMES; time += 1) {
      await until('every device to be connected', () => pressed.devices.every((device) => device.client.connected));
      const connections = reconnects();
      await stalled(async () => {
        await pause(100);
        const acknowledged = pressed.acknowledged;
        await pause((KEEPALIVE_S * 1.6 + random() * 2) * 1_000);
        expect(pressed.acknowledged).toBe(acknowledged);
      });
      await untilServed(pressed);
      expect(reconnects()).toBe(connections);
      expect(await pressed.missing()).toEqual([]);
    }
    expect((await pressed.broker.memory()) - before).toBeLessThan(50 * MB);
  });

  it(`stalled ${TIMES} times with the broker killed inside, loses nothing`, async () => {
    for (let time = 0; time < TIMES; time += 1) {
      await stalled(async () => {
        await pause(random() * 1_000);
        await pressed.killBroker();
        await pressed.startBroker();
        await pause(random() * 1_000);
      });
      await untilServed(pressed);
      expect(await pressed.missing()).toEqual([]);
    }
  });

  it('refusing connections is asked again with growing pauses, not in a storm', async () => {
    await pressed.cluster.stop('fast');
    const from = pressed.broker.lines.length;
    await pause(5_000);
    const tries = pressed.broker.lines.slice(from).filter((line) => String(line.msg).startsWith('the database did not take a batch'));
    // Two lanes, pauses that double from 0.1 s: about six tries each in five seconds.
    expect(tries.length).toBeGreaterThan(0);
    expect(tries.length).toBeLessThan(30);
    await pressed.startDatabase();
    await untilServed(pressed);
    expect(await pressed.missing()).toEqual([]);
  });

  it('in the end every reading that was sent is there, once', async () => {
    await pressed.settle();
    expect(await pressed.missing()).toEqual([]);
    const sent = pressed.devices.reduce((sum, device) => sum + device.sent.length, 0);
    expect([pressed.acknowledged, await pressed.count('readings'), await pressed.count('refusals')]).toEqual([sent, sent, 0]);
    console.log(`sent ${sent}, acknowledged ${pressed.acknowledged}, rows ${await pressed.count('readings')}, refused 0`);
  });
});

import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { House, untilServed } from '../support/house';
import { seeded } from '../support/random';

const DEVICES = 20;
const TIMES = 5;
const random = seeded(41);
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

let house: House;
beforeAll(async () => {
  house = await House.build();
  await house.startBroker();
  await house.press(DEVICES, { inFlight: 3 });
});
afterAll(() => house.close());

describe('the broker under load', () => {
  it(`killed ${TIMES} times at random moments, loses no acknowledged reading and is back at once`, async () => {
    const recoveries: number[] = [];
    for (let time = 0; time < TIMES; time += 1) {
      await pause(random() * 1_200);
      await house.killBroker();
      expect(await house.missing()).toEqual([]);
      await house.startBroker();
      recoveries.push(await untilServed(house));
    }
    console.log(`served again after a kill, ms from ready: ${recoveries.join(', ')}`);
    expect(Math.max(...recoveries)).toBeLessThan(5_000);
  });

  it(`told to stop ${TIMES} times, commits what it has within ten seconds and acknowledges nothing else`, async () => {
    for (let time = 0; time < TIMES; time += 1) {
      await pause(random() * 800);
      const began = Date.now();
      expect(await house.killBroker('SIGTERM')).toBe(0);
      expect(Date.now() - began).toBeLessThan(10_000);
      expect(house.broker.lines.find((line) => line.msg === 'broker stopped')).toMatchObject({ drained: true, waiting: 0 });
      expect(await house.missing()).toEqual([]);
      await house.startBroker();
      await untilServed(house);
    }
  });

  it(`killed together with the database ${TIMES} times in one instant, goes on in whichever order they start`, async () => {
    for (let time = 0; time < TIMES; time += 1) {
      await pause(random() * 800);
      await Promise.all([house.killDatabase(), house.killBroker()]);
      const starts = [() => house.startBroker(), () => house.startDatabase()];
      if (random() < 0.5) starts.reverse();
      await Promise.all([starts[0]!(), pause(random() * 500).then(starts[1]!)]);
      await untilServed(house);
      expect(await house.missing()).toEqual([]);
    }
    await house.checkDatabase();
  });

  it('in the end every reading that was sent is there, once', async () => {
    await house.settle();
    expect(await house.missing()).toEqual([]);
    const sent = house.devices.reduce((sum, device) => sum + device.sent.length, 0);
    expect(house.acknowledged).toBe(sent);
    expect(await house.count('readings')).toBe(sent);
    expect(await house.count('refusals')).toBe(0);
    console.log(`sent ${sent}, acknowledged ${house.acknowledged}, rows ${await house.count('readings')}, refused 0`);
  });
});

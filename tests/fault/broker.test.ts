import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { PressedBroker, untilServed } from '../support/pressed-broker';
import { seeded } from '../support/random';

const DEVICES = 20;
const TIMES = 5;
const random = seeded(41);
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

let pressed: PressedBroker;
beforeAll(async () => {
  pressed = await PressedBroker.build();
  await pressed.startBroker();
  await pressed.press(DEVICES, { inFlight: 3 });
});
afterAll(() => pressed.close());

describe('the broker under load', () => {
  it(`killed ${TIMES} times at random moments, loses no acknowledged reading and is back at once`, async () => {
    const recoveries: number[] = [];
    for (let time = 0; time < TIMES; time += 1) {
      await pause(random() * 1_200);
      await pressed.killBroker();
      expect(await pressed.missing()).toEqual([]);
      await pressed.startBroker();
      recoveries.push(await untilServed(pressed));
    }
    console.log(`served again after a kill, ms from ready: ${recoveries.join(', ')}`);
    expect(Math.max(...recoveries)).toBeLessThan(5_000);
  });

  it(`told to stop ${TIMES} times, commits what it has within ten seconds and acknowledges nothing else`, async () => {
    for (let time = 0; time < TIMES; time += 1) {
      await pause(random() * 800);
      const began = Date.now();
      expect(await pressed.killBroker('SIGTERM')).toBe(0);
      expect(Date.now() - began).toBeLessThan(10_000);
      expect(pressed.broker.lines.find((line) => line.msg === 'broker stopped')).toMatchObject({ drained: true, waiting: 0 });
      expect(await pressed.missing()).toEqual([]);
      await pressed.startBroker();
      await untilServed(pressed);
    }
  });

  it(`killed together with the database ${TIMES} times in one instant, goes on in whichever order they start`, async () => {
    for (let time = 0; time < TIMES; time += 1) {
      await pause(random() * 800);
      await Promise.all([pressed.killDatabase(), pressed.killBroker()]);
      const starts = [() => pressed.startBroker(), () => pressed.startDatabase()];
      if (random() < 0.5) starts.reverse();
      await Promise.all([starts[0]!(), pause(random() * 500).then(starts[1]!)]);
      await untilServed(pressed);
      expect(await pressed.missing()).toEqual([]);
    }
    await pressed.checkDatabase();
  });

  it('in the end every reading that was sent is there, once', async () => {
    await pressed.settle();
    expect(await pressed.missing()).toEqual([]);
    const sent = pressed.devices.reduce((sum, device) => sum + device.sent.length, 0);
    expect(pressed.acknowledged).toBe(sent);
    expect(await pressed.count('readings')).toBe(sent);
    expect(await pressed.count('refusals')).toBe(0);
    console.log(`sent ${sent}, acknowledged ${pressed.acknowledged}, rows ${await pressed.count('readings')}, refused 0`);
  });
});

import { describe, expect, it } from 'vitest';
import { Ingest } from '@/broker/ingest';
import type { Message, Recorded } from '@/lib/services/readings/record';

const sensor = (id: number) => ({ id, cellarId: 'c', identifier: `fs-${id}` });
const message = (id: number, text = 'x') => ({ sensor: sensor(id), road: 'mqtt' as const, body: Buffer.from(text), arrivedAt: 0 });
const nothingRefused = (messages: readonly Message[]): Recorded => ({ stored: messages.length, duplicates: 0, refused: messages.map(() => []) });
const turn = (ms = 5) => new Promise((resolve) => setTimeout(resolve, ms));

/** A database whose commits the test lets through one by one. */
function slowDatabase() {
  const batches: Array<{ messages: readonly Message[]; commit: () => void; fail: (error: Error) => void }> = [];
  const record = (messages: readonly Message[]) =>
    new Promise<Recorded>((resolve, reject) => batches.push({ messages, commit: () => resolve(nothingRefused(messages)), fail: reject }));
  return { batches, record };
}

describe('the ingest', () => {
  it('calls back after the commit and never before', async () => {
    const { batches, record } = slowDatabase();
    const ingest = new Ingest({ record });
    let committed = false;
    ingest.accept(message(1), () => (committed = true));
    await turn();
    expect(batches).toHaveLength(1);
    expect(committed).toBe(false);
    batches[0]!.commit();
    await turn();
    expect(committed).toBe(true);
    expect(ingest.counts).toMatchObject({ messages: 1, stored: 1, waiting: 0 });
  });

  it('puts what arrives during a commit into the next one', async () => {
    const { batches, record } = slowDatabase();
    const ingest = new Ingest({ record, lanes: 1 });
    ingest.accept(message(1), () => undefined);
    await turn();
    for (let index = 0; index < 40; index += 1) ingest.accept(message(index), () => undefined);
    await turn();
    expect(batches.map((batch) => batch.messages.length)).toEqual([1]);
    batches[0]!.commit();
    await turn();
    expect(batches.map((batch) => batch.messages.length)).toEqual([1, 40]);
  });

  it('keeps one sensor in one lane, so that its readings are never in two commits at once', async () => {
    const { batches, record } = slowDatabase();
    const ingest = new Ingest({ record, lanes: 2 });
    for (let index = 0; index < 6; index += 1) {
      ingest.accept(message(7, String(index)), () => undefined);
      await turn(1);
    }
    expect(batches).toHaveLength(1);
    ingest.accept(message(8), () => undefined);
    await turn();
    expect(batches).toHaveLength(2);
  });

  it('holds a batch that the database does not take and gives it again, unacknowledged meanwhile', async () => {
    const { batches, record } = slowDatabase();
    const ingest = new Ingest({ record });
    const done: string[] = [];
    ingest.accept(message(1, 'a'), () => done.push('a'));
    await turn();
    batches[0]!.fail(new Error('the database is away'));
    for (let waited = 0; batches.length < 2 && waited < 2_000; waited += 10) await turn(10);
    expect(batches[1]?.messages.map((item) => item.body.toString())).toEqual(['a']);
    expect(done).toEqual([]);
    expect(ingest.counts).toMatchObject({ failedCommits: 1, waiting: 1 });
    batches[1]!.commit();
    await turn();
    expect(done).toEqual(['a']);
  });

  it('says that it is full at its bound, and that it has room again at half of it', async () => {
    const { batches, record } = slowDatabase();
    const said: boolean[] = [];
    const ingest = new Ingest({ record, lanes: 1, onFull: (full) => said.push(full) });
    const big = Buffer.alloc(1 << 20);
    for (let index = 0; index < 32; index += 1) ingest.accept({ ...message(1), body: big }, () => undefined);
    expect(said).toEqual([true]);
    for (let index = 0; index < 16; index += 1) {
      await turn(2);
      expect(said).toEqual([true]);
      batches[index]!.commit();
    }
    await turn();
    expect(said).toEqual([true, false]);
  });

  it('bounds a batch by messages and by bytes', async () => {
    const { batches, record } = slowDatabase();
    const ingest = new Ingest({ record, lanes: 1 });
    for (let index = 0; index < 1_200; index += 1) ingest.accept(message(1), () => undefined);
    for (let next = 0; next < 3; next += 1) {
      await turn(2);
      batches[next]!.commit();
    }
    expect(batches.map((batch) => batch.messages.length)).toEqual([500, 500, 200]);
  });

  it('when it stops gives up on what the database did not take, unacknowledged', async () => {
    const { batches, record } = slowDatabase();
    const ingest = new Ingest({ record });
    let committed = false;
    ingest.accept(message(1), () => (committed = true));
    await turn();
    expect(await ingest.drain(50)).toBe(false);
    batches[0]!.fail(new Error('the database is away'));
    await turn(20);
    expect(committed).toBe(false);
    expect(batches).toHaveLength(1);
  });

  it('when it stops waits for a commit that is under way', async () => {
    const { batches, record } = slowDatabase();
    const ingest = new Ingest({ record });
    let committed = false;
    ingest.accept(message(1), () => (committed = true));
    await turn();
    const drained = ingest.drain(2_000);
    batches[0]!.commit();
    expect(await drained).toBe(true);
    expect(committed).toBe(true);
  });
});

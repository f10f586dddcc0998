import { setTimeout as pause } from 'node:timers/promises';
import { systemClock, type Clock } from '@/lib/clock';
import { logFor } from '@/lib/log';
import type { Message, Recorded } from '@/lib/services/readings/record';

const log = logFor('ingest');

/** Batches in flight at once. Two keep the database busy while the next one is read; a sensor always takes the same lane. */
const LANES = 2;
/** One commit holds at most this. Beyond a few hundred rows a larger batch gains little and waits longer. */
const BATCH_MESSAGES = 500;
const BATCH_BYTES = 1 << 20;
/** All that may wait for the database; then the doors stop reading until half of it is gone. */
const WAITING_MESSAGES = 20_000;
const WAITING_BYTES = 32 << 20;
/** Between two tries at a database that does not take a batch. */
const FIRST_PAUSE_MS = 100;
const LONGEST_PAUSE_MS = 5_000;

/** Why a retained message does not count, at either door. */
export const RETAINED = 'it was sent as a retained message; switch "retain" off in the sensor';

interface Waiting {
  message: Message;
  committed: () => void;
}

export interface IngestCounts {
  /** Since the start of the process. */
  messages: number;
  stored: number;
  duplicates: number;
  refused: number;
  failedCommits: number;
  /** Now. */
  waiting: number;
}

export interface IngestOptions {
  record: (messages: readonly Message[]) => Promise<Recorded>;
  clock?: Clock;
  lanes?: number;
  /** Told when the doors must stop reading (true) and when they may go on (false). */
  onFull?: (full: boolean) => void;
}

/**
 * What arrives while a commit is under way goes into the next one. A message's
 * `committed` is called after COMMIT and never before; while the database cannot
 * take a batch it is held and tried again, so that nothing is acknowledged that
 * is not on disk.
 */
export class Ingest {
  private readonly lanes: Waiting[][];
  private readonly busy: boolean[];
  private waitingMessages = 0;
  private waitingBytes = 0;
  private full = false;
  private readonly stopped = new AbortController();
  private readonly clock: Clock;
  private readonly totals = { messages: 0, stored: 0, duplicates: 0, refused: 0, failedCommits: 0 };

  constructor(private readonly options: IngestOptions) {
    this.clock = options.clock ?? systemClock;
    this.lanes = Array.from({ length: options.lanes ?? LANES }, () => []);
    this.busy = this.lanes.map(() => false);
  }

  /** Takes a message; `committed` is called once it is on disk, as a reading or as refused. */
  accept(message: Message, committed: () => void): void {
    if (this.stopped.signal.aborted) return;
    const lane = (message.sensor?.id ?? 0) % this.lanes.length;
    this.lanes[lane]!.push({ message, committed });
    this.waitingMessages += 1;
    this.waitingBytes += message.body.length;
    this.signalFull();
    if (!this.busy[lane]) {
      this.busy[lane] = true;
      // What comes in the same turn of the event loop goes into the same commit.
      setImmediate(() => void this.run(lane));
    }
  }

  get counts(): IngestCounts {
    return { ...this.totals, waiting: this.waitingMessages };
  }

  /** Waits until all that was accepted is committed, at most so long; then gives up on the rest, unacknowledged. */
  async drain(patienceMs: number): Promise<boolean> {
    const deadline = this.clock.now() + patienceMs;
    while (this.waitingMessages > 0 && this.clock.now() < deadline) await pause(20);
    this.stopped.abort();
    return this.waitingMessages === 0;
  }

  private async run(lane: number): Promise<void> {
    const queue = this.lanes[lane]!;
    while (queue.length > 0 && !this.stopped.signal.aborted) {
      const batch = queue.splice(0, sizeOfBatch(queue));
      const recorded = await this.commit(batch.map((waiting) => waiting.message));
      if (!recorded) break;
      this.totals.messages += batch.length;
      this.totals.stored += recorded.stored;
      this.totals.duplicates += recorded.duplicates;
      this.totals.refused += recorded.refused.reduce((sum, refused) => sum + refused.length, 0);
      for (const { message, committed } of batch) {
        this.waitingMessages -= 1;
        this.waitingBytes -= message.body.length;
        try {
          committed();
        } catch (error) {
          // The reading is safe; one sender's trouble must not keep the others from their acknowledgements.
          log.error({ err: error }, 'a committed message could not be acknowledged');
        }
      }
      this.signalFull();
    }
    this.busy[lane] = false;
  }

  /** Null when the process stops before the database took it. */
  private async commit(messages: Message[]): Promise<Recorded | null> {
    for (let attempt = 0; !this.stopped.signal.aborted; attempt += 1) {
      try {
        const recorded = await this.options.record(messages);
        if (attempt > 0) log.info({ attempt, messages: messages.length }, 'the database takes readings again');
        return recorded;
      } catch (error) {
        this.totals.failedCommits += 1;
        const wait = Math.random() * Math.min(LONGEST_PAUSE_MS, FIRST_PAUSE_MS * 2 ** attempt) + FIRST_PAUSE_MS / 2;
        log.warn({ err: error, attempt, messages: messages.length, waitMs: Math.round(wait) }, 'the database did not take a batch; it is held and tried again');
        await pause(wait, undefined, { signal: this.stopped.signal }).catch(() => undefined);
      }
    }
    return null;
  }

  private signalFull(): void {
    const share = Math.max(this.waitingMessages / WAITING_MESSAGES, this.waitingBytes / WAITING_BYTES);
    if (!this.full && share >= 1) this.full = true;
    else if (this.full && share <= 0.5) this.full = false;
    else return;
    this.options.onFull?.(this.full);
  }
}

function sizeOfBatch(queue: readonly Waiting[]): number {
  let bytes = 0;
  let count = 0;
  while (count < queue.length && count < BATCH_MESSAGES && (count === 0 || bytes < BATCH_BYTES)) {
    bytes += queue[count]!.message.body.length;
    count += 1;
  }
  return count;
}

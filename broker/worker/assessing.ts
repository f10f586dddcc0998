import { systemClock } from '@/lib/clock';
import { CHANGES_CHANNEL, changeSchema, type Change } from '@/lib/contracts/events';
import { listen } from '@/db/listen';
import { batchesToJudge } from '@/db/queries/batch-states';
import { logFor } from '@/lib/log';
import { watchIngest } from '@/lib/services/alerts/watch-ingest';
import { assessBatch } from '@/lib/services/batches/assess';
import { startLoop } from './loop';
import { Schedule } from './schedule';

/** What a judgement is made from; it tells of itself, its alerts and its jobs too. */
const JUDGED_BY: ReadonlySet<Change['kind']> = new Set<Change['kind']>(['reading', 'entry', 'batch', 'sensor']);

const log = logFor('worker');

/** Another worker has it: look again when it will be done. */
const BUSY_MS = 1_000;
const AFTER_FAILURE_MS = 2_000;
const LONGEST_AFTER_FAILURE_MS = 300_000;
const LONGEST_SLEEP_MS = 1_000;

export interface AssessingOptions {
  /** A batch is judged at most this often after new readings, ms. */
  spacingMs: number;
  /** How often it is looked whether the ingest is up, and which batches have waited long, ms. */
  tickMs: number;
  /** Every working batch is judged at least this often, with no new readings too, so that silence is noticed, ms. */
  idleMs: number;
  /** Told after an alert may have changed. */
  onJudged(): void;
}

export interface Assessing {
  figures(): Record<string, number>;
  stop(): Promise<void>;
}

/** Judges batches as their readings come, and all of them on a tick. */
export function startAssessing({ spacingMs, tickMs, idleMs, onJudged }: AssessingOptions): Assessing {
  const clock = systemClock;
  const schedule = new Schedule(spacingMs);
  const figures = { judged: 0, failed: 0 };
  /** How often in a row a batch could not be judged. */
  const failures = new Map<string, number>();
  let silenceCounts = false;
  let tickedAt = -Infinity;
  /** Changes may have gone unheard: every batch is looked at once. */
  let mayHaveMissed = true;

  const tick = async () => {
    const now = clock.now();
    ({ silenceCounts } = await watchIngest({ clock }));
    for (const batch of await batchesToJudge(new Date(mayHaveMissed ? now : now - idleMs))) schedule.ask(batch, now);
    mayHaveMissed = false;
    schedule.forget(now);
    tickedAt = now;
  };

  const judge = async (batch: string) => {
    try {
      const outcome = await assessBatch(batch, { clock, silenceCounts });
      if (outcome === 'busy') return schedule.askAfter(batch, clock.now() + BUSY_MS);
      failures.delete(batch);
      figures.judged += 1;
      onJudged();
    } catch (error) {
      figures.failed += 1;
      // One batch that cannot be judged must not hold up the others.
      log.error({ err: error, batch }, 'a batch could not be judged');
      const before = failures.get(batch) ?? 0;
      failures.set(batch, before + 1);
      schedule.askAfter(batch, clock.now() + Math.min(AFTER_FAILURE_MS * 2 ** before, LONGEST_AFTER_FAILURE_MS));
    }
  };

  const loop = startLoop(
    async () => {
      const now = clock.now();
      if (now - tickedAt >= tickMs || now < tickedAt) await tick();
      const batch = schedule.take(clock.now());
      if (batch) {
        await judge(batch);
        return 0;
      }
      const next = schedule.nextAt() ?? Infinity;
      return Math.max(1, Math.min(next - clock.now(), tickedAt + tickMs - clock.now(), LONGEST_SLEEP_MS));
    },
    (error) => {
      log.error({ err: error }, 'the watch stumbled');
      return AFTER_FAILURE_MS;
    },
  );

  const listener = listen({
    channel: CHANGES_CHANNEL,
    onMessage: (payload) => {
      const change = parsed(payload);
      if (!change?.batch || !JUDGED_BY.has(change.kind)) return;
      if (change.kind === 'reading') schedule.ask(change.batch, clock.now());
      else schedule.askSoon(change.batch, clock.now());
      loop.wake();
    },
    // What was said while nobody listened is found by looking at everything.
    onConnect: () => {
      mayHaveMissed = true;
      tickedAt = -Infinity;
      loop.wake();
    },
    onError: (error) => log.warn({ err: error }, 'changes go unheard; connecting again'),
  });

  return {
    figures: () => ({ ...figures, waiting: schedule.waiting }),
    stop: async () => {
      await listener.close();
      await loop.stop();
    },
  };
}

function parsed(payload: string) {
  try {
    return changeSchema.safeParse(JSON.parse(payload)).data ?? null;
  } catch {
    return null;
  }
}

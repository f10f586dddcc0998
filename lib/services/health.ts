import { QueryTypes } from 'sequelize';
import { database } from '@/db/client';
import { beatAge, type Part } from './heartbeat';

/** Four heartbeats missed. */
const FRESH_MS = 20_000;
/** Whoever asks wants to know now. */
const PATIENCE_MS = 2_000;

export type PartState = 'ok' | 'down';
export interface Health {
  status: PartState;
  parts: { database: PartState; broker: PartState; worker: PartState };
}

async function answers(work: () => Promise<boolean>): Promise<PartState> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<boolean>((resolve) => {
    timer = setTimeout(() => resolve(false), PATIENCE_MS);
  });
  try {
    return (await Promise.race([work(), late])) ? 'ok' : 'down';
  } catch {
    return 'down';
  } finally {
    clearTimeout(timer);
  }
}

const fresh = (part: Part) => answers(async () => ((await beatAge(part)) ?? Infinity) < FRESH_MS);

/** Whether each part of the house works now. */
export async function health(): Promise<Health> {
  const [db, broker, worker] = await Promise.all([answers(async () => (await database().query('select 1', { type: QueryTypes.SELECT })).length === 1), fresh('broker'), fresh('worker')]);
  const parts = { database: db, broker, worker };
  return { status: Object.values(parts).every((state) => state === 'ok') ? 'ok' : 'down', parts };
}

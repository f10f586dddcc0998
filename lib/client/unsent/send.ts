'use client';

import type { EntryBody } from '../../contracts/batches';
import type { MeBody } from '../../contracts/people';
import { isOfBatch } from '../batches';
import { ClientError, getFresh, sendJson } from '../fetcher';
import { isPath, refresh } from '../use-resource';
import type { JobBody } from '../../contracts/jobs';
import { addUnsent, allUnsent, dropUnsent, setUnsent, type JobAct, type NewEntry, type Task, type Unsent } from './store';

/** Who writes on this page, and in which cellar. */
export interface Writer {
  personId: string;
  cellarId: string;
}

let writer: Writer | null = null;

/** Set by the shell as soon as it is known; without it nothing can be kept, since nobody would know for whom. */
export function setWriter(now: Writer | null): void {
  writer = now;
}

/** A network that has not answered in this time is away; the entry is kept and asked for once more. */
const PATIENCE_MS = 12_000;
/** A page that was closed while it sent: another takes over after this. */
const ABANDONED_MS = 30_000;
const LOCK = 'fallbright-unsent';

const postEntry = (batchId: string, input: NewEntry) => sendJson<EntryBody>('POST', `/batches/${batchId}/entries`, input, AbortSignal.timeout(PATIENCE_MS));
const postAct = ({ id }: JobBody, act: JobAct) => (act.does === 'done' ? sendJson<JobBody>('POST', `/jobs/${id}/done`, { at: act.at }, AbortSignal.timeout(PATIENCE_MS)) : sendJson<JobBody>('POST', `/jobs/${id}/snooze`, { until: act.until }, AbortSignal.timeout(PATIENCE_MS)));
const post = (task: Task): Promise<EntryBody | JobBody> => (task.job ? postAct(task.job, task.act) : postEntry(task.batchId, task.input));

const isMine = (entry: Unsent) => writer !== null && entry.personId === writer.personId && entry.cellarId === writer.cellarId;

/** The server did not say no: it was not reached, is not there, or does not know who asks. */
const keeps = (error: unknown): boolean => error instanceof ClientError && (error.status === 0 || error.status === 401 || error.status === 408 || error.status === 429 || error.status >= 502);

export type Sent<T> = { sent: T } | { kept: true };

/** @throws ClientError */
export const sendOrKeepEntry = (batchId: string, input: NewEntry & { client_id: string }): Promise<Sent<EntryBody>> => sendOrKeep(input.client_id, { batchId, input }) as Promise<Sent<EntryBody>>;

/** @throws ClientError */
export const sendOrKeepAct = (job: JobBody, act: JobAct): Promise<Sent<JobBody>> => sendOrKeep(actId(job.id, act.does), { batchId: null, job, act }) as Promise<Sent<JobBody>>;

const actId = (jobId: string, does: JobAct['does']) => `${jobId} ${does}`;

/** Takes back what was done to a job and has not been sent. */
export async function dropAct(jobId: string, does: JobAct['does']): Promise<void> {
  const waiting = (await allUnsent()).find(({ id }) => id === actId(jobId, does));
  if (waiting?.order !== undefined) await dropUnsent(waiting.order);
}

/**
 * Sends it, or keeps it on the device until it can be sent: where others wait it
 * goes behind them, so that the order of writing stays. What the server refuses at
 * once is thrown back to the form, which still holds it.
 */
async function sendOrKeep(id: string, task: Task): Promise<Sent<EntryBody | JobBody>> {
  const held = writer;
  const order = held === null ? null : await addUnsent({ id, ...held, ...task, state: 'sending', since: Date.now(), reason: null }).catch(() => null);
  // No memory on this device, or nobody knows for whom: straight to the server, as ever.
  if (order === null) return { sent: await post(task) };
  const before = (await allUnsent()).some((entry) => isMine(entry) && entry.state === 'waiting' && entry.order! < order);
  if (before) {
    await setUnsent(order, 'waiting');
    void sendUnsent();
    return { kept: true };
  }
  try {
    const sent = await post(task);
    await dropUnsent(order);
    return { sent };
  } catch (error) {
    if (keeps(error)) {
      await setUnsent(order, 'waiting');
      return { kept: true };
    }
    await dropUnsent(order);
    throw error;
  }
}

/** One tab at a time, where the browser can; else the server's own care for doubles is enough. */
function alone<T>(work: () => Promise<T>): Promise<T | null> {
  const locks = typeof navigator === 'undefined' ? undefined : (navigator as Partial<Navigator>).locks;
  return locks ? locks.request(LOCK, { ifAvailable: true }, (lock) => (lock ? work() : null)) : work();
}

/** What stopped the sending: the person has to sign in, or the network is away; null: nothing did. */
export type Stopped = 'signed-out' | 'away' | null;

/** Sends what waits of this person in this cellar, oldest first, until something stands in the way. */
export async function sendUnsent(): Promise<Stopped> {
  return (await alone(sendInOrder)) ?? null;
}

async function sendInOrder(): Promise<Stopped> {
  const due = (entry: Unsent) => isMine(entry) && (entry.state === 'waiting' || (entry.state === 'sending' && Date.now() - entry.since > ABANDONED_MS));
  if (!(await allUnsent()).some(due)) return null;
  // Somebody else may have signed in here since: their name must not stand under it.
  try {
    const { person, cellar } = await getFresh<MeBody>('/me', AbortSignal.timeout(PATIENCE_MS));
    if (person.id !== writer?.personId || cellar.id !== writer.cellarId) return 'signed-out';
  } catch (error) {
    return error instanceof ClientError && error.status === 401 ? 'signed-out' : 'away';
  }
  for (let entry = (await allUnsent()).find(due); entry; entry = (await allUnsent()).find(due)) {
    try {
      await post(entry);
      await dropUnsent(entry.order!);
    } catch (error) {
      if (keeps(error)) return error instanceof ClientError && error.status === 401 ? 'signed-out' : 'away';
      await setUnsent(entry.order!, 'refused', reasonOf(error));
    }
    const { batchId } = entry;
    // Not waited for: an answer that never comes would hold up what is still to be sent.
    void refresh((path) => (batchId === null ? isPath('/jobs')(path) || isPath('/alerts')(path) : isOfBatch(batchId)(path) || isPath('/shelf')(path))).catch(() => undefined);
  }
  return null;
}

function reasonOf(error: unknown): string {
  if (!(error instanceof ClientError)) return 'It could not be read.';
  const [field] = Object.entries(error.fields);
  return field ? `${error.message} (${field[0]}: ${field[1][0]})` : error.message;
}

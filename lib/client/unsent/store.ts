'use client';

import { openDB, type DBSchema, type IDBPDatabase } from 'idb';
import type { z } from 'zod';
import type { createEntry as createEntrySchema } from '../../contracts/batches';
import type { JobBody } from '../../contracts/jobs';

/** What a form sends; what it leaves out takes the schema's defaults. */
export type NewEntry = z.input<typeof createEntrySchema>;

/** What was done to a job: ticked, when, or put off, until when. */
export type JobAct = { does: 'done'; at: string } | { does: 'snooze'; until: string };

/** A log entry of a batch, or something done to a job of the rounds; the job as it stood, so that it can be shown. */
export type Task = { batchId: string; input: NewEntry; job?: undefined } | { batchId: null; job: JobBody; act: JobAct };

/** Something written here that the server has not taken yet, kept on this device. */
export type Unsent = Task & {
  /** Order of writing. */
  order?: number;
  /** An entry's `client_id`: the server keeps it once, however often it is sent. A job's is its own with what was done: done twice it is done. */
  id: string;
  personId: string;
  cellarId: string;
  /** `sending`: on its way from the form. `waiting`: until the network is back. `refused`: the server said no. */
  state: 'sending' | 'waiting' | 'refused';
  /** When it came into this state, ms. */
  since: number;
  /** Why it was refused. */
  reason: string | null;
};

export type UnsentEntry = Extract<Unsent, { batchId: string }>;
export type UnsentJob = Extract<Unsent, { batchId: null }>;
export const isUnsentJob = (unsent: Unsent): unsent is UnsentJob => unsent.job !== undefined;
export const isUnsentEntry = (unsent: Unsent): unsent is UnsentEntry => unsent.job === undefined;

interface Schema extends DBSchema {
  unsent: { key: number; value: Unsent; indexes: { id: string } };
}

const CHANNEL = 'fallbright-unsent';

let opened: Promise<IDBPDatabase<Schema>> | undefined;

function db(): Promise<IDBPDatabase<Schema>> {
  opened ??= openDB<Schema>('fallbright', 1, {
    upgrade(database) {
      database.createObjectStore('unsent', { keyPath: 'order', autoIncrement: true }).createIndex('id', 'id', { unique: true });
    },
    terminated() {
      opened = undefined;
    },
  });
  opened.catch(() => (opened = undefined));
  return opened;
}

/** Tells the other tabs, and this one. */
const channel = typeof BroadcastChannel === 'undefined' ? null : new BroadcastChannel(CHANNEL);
const listeners = new Set<() => void>();
if (channel) channel.onmessage = () => listeners.forEach((listener) => listener());

function changed(): void {
  channel?.postMessage('changed');
  listeners.forEach((listener) => listener());
}

export function onUnsentChange(listener: () => void): () => void {
  listeners.add(listener);
  return () => void listeners.delete(listener);
}

/** In the order of writing. */
export const allUnsent = async (): Promise<Unsent[]> => (await db()).getAll('unsent');

/** @returns its place in the order */
export async function addUnsent(entry: Unsent): Promise<number> {
  const database = await db();
  const known = await database.getFromIndex('unsent', 'id', entry.id);
  const order = await database.put('unsent', known?.order === undefined ? entry : { ...entry, order: known.order });
  changed();
  return order;
}

export async function setUnsent(order: number, state: Unsent['state'], reason: string | null = null): Promise<void> {
  const database = await db();
  const transaction = database.transaction('unsent', 'readwrite');
  const entry = await transaction.store.get(order);
  if (entry) await transaction.store.put({ ...entry, state, reason, since: Date.now() });
  await transaction.done;
  changed();
}

export async function dropUnsent(order: number): Promise<void> {
  await (await db()).delete('unsent', order);
  changed();
}

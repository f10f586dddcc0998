import type { Transaction } from 'sequelize';
import { Batch, BatchLink, Entry } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import type { TopUpForm } from '@/lib/contracts/family';
import { takeVolume } from '@/lib/core/family/cellarwork';
import { contentsOf, readContents, unfermented, water, type Contents, type Readout } from '@/lib/core/family/contents';
import { ConflictError, InvalidError } from '@/lib/errors';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { drinkState } from '../drink/state';
import { takeOut } from '../sensors/place';

/** Rounding of litres typed with three decimals. */
const SLACK_L = 1e-6;
/** What is left below this is a wet glass. */
const EMPTY_L = 0.005;

/** What stands in the vessel, as masses; null where nobody has told its gravity, so that there is nothing to reckon from. */
export async function contentsIn(batch: Batch, at: Date, transaction: Transaction): Promise<Contents | null> {
  const state = await drinkState(batch, at, transaction);
  const og = state.ledger.effectiveOg;
  // A must that has not been pitched still has all of its sugar.
  const gravity = state.gravity ?? (batch.pitchedAt === null ? og : null);
  return og === null || gravity === null ? null : contentsOf({ volumeL: batch.volumeL, originalGravity: Math.max(og, gravity), gravity });
}

/** @throws InvalidError where nobody told the gravity: strength and sugar would be a guess. */
export async function knownContents(batch: Batch, at: Date, field: string, transaction: Transaction): Promise<Contents> {
  const contents = await contentsIn(batch, at, transaction);
  if (!contents) throw new InvalidError('Strength and sugar cannot be reckoned without a gravity.', { [field]: [`${batch.name} needs an original gravity and a reading first`] });
  return contents;
}

/** Several batches locked in one order, so that two people who pour at once wait for each other and do not lock each other out. */
export async function loadBatches(cellarId: string, ids: readonly string[], transaction: Transaction): Promise<Map<string, Batch>> {
  const found = new Map<string, Batch>();
  for (const id of [...new Set(ids)].sort()) found.set(id, await loadBatch(cellarId, id, transaction));
  return found;
}

/** Drink leaves a batch: its volume falls, its log says where to; an emptied one is over. */
export async function pourOut(actor: Actor, from: Batch, to: Pick<Batch, 'id' | 'name'>, litres: number, at: Date, transaction: Transaction): Promise<Entry> {
  if (from.state === 'ended') throw new ConflictError(`${from.name} is over.`);
  if (litres > from.volumeL + SLACK_L) throw new InvalidError('There is not that much in it.', { volume_l: [`${from.name} has ${from.volumeL} L`] });
  const entry = await Entry.create({ cellarId: from.cellarId, batchId: from.id, kind: 'split', at, volumeL: litres, text: `Into ${to.name}.`, detail: { batch_id: to.id }, personId: actor.personId }, { transaction });
  await lessen(from, litres, at, transaction);
  await notifyChange({ cellar: from.cellarId, kind: 'batch', batch: from.id }, transaction);
  return entry;
}

/** Takes litres off a batch; its part of the must sheet goes with them. */
export async function lessen(batch: Batch, litres: number, at: Date, transaction: Transaction): Promise<void> {
  const left = batch.volumeL - litres;
  const share = batch.volumeL > 0 ? Math.max(0, left) / batch.volumeL : 0;
  if (left > EMPTY_L) {
    await batch.update({ volumeL: left, mustShare: batch.mustShare * share, updatedAt: at }, { transaction });
    return;
  }
  await batch.update({ state: 'ended', endedAt: at, updatedAt: at }, { transaction });
  await takeOut({ batchId: batch.id }, at, transaction);
}

export const link = (actor: Actor, from: string, to: string, kind: BatchLink['kind'], litres: number, at: Date, transaction: Transaction) =>
  BatchLink.create({ cellarId: actor.cellarId, fromBatch: from, toBatch: to, kind, litres, at, personId: actor.personId }, { transaction });

/** What goes in with a top-up: its masses where they are known, and its line of the log. */
export interface Inflow {
  contents: Contents | null;
  litres: number;
  reading: Readout | null;
  source: Batch | null;
}

export async function inflowOf(topUp: TopUpForm, sources: ReadonlyMap<string, Batch>, at: Date, field: string, transaction: Transaction): Promise<Inflow> {
  const litres = topUp.volume_l;
  const told = (contents: Contents): Inflow => ({ contents, litres, reading: readContents(contents), source: null });
  switch (topUp.what) {
    case 'water':
      return told(water(litres));
    case 'must':
      return told(unfermented(litres, topUp.gravity!));
    case 'drink':
      if (topUp.original_gravity! < topUp.gravity!) throw new InvalidError('The original gravity is the higher one.', { [`${field}.original_gravity`]: ['is below the gravity'] });
      return told(contentsOf({ volumeL: litres, originalGravity: topUp.original_gravity!, gravity: topUp.gravity! }));
    case 'batch': {
      const source = sources.get(topUp.batch_id!);
      if (!source) throw new InvalidError('Choose the batch it comes from.', { [`${field}.batch_id`]: ['choose another batch'] });
      if (litres > source.volumeL + SLACK_L) throw new InvalidError('There is not that much in it.', { [`${field}.volume_l`]: [`${source.name} has ${source.volumeL} L`] });
      const all = await contentsIn(source, at, transaction);
      const contents = all && takeVolume(all, Math.min(litres, readContents(all)?.volumeL ?? 0)).taken;
      return { contents, litres, reading: contents && readContents(contents), source };
    }
  }
}

/** Writes a top-up into the log of the batch, and takes it from where it came. */
export async function pourIn(actor: Actor, batch: Batch, inflow: Inflow, topUp: TopUpForm, at: Date, transaction: Transaction): Promise<Entry> {
  const { reading, source, litres } = inflow;
  const fermented = reading !== null && reading.effectiveOg - reading.gravity > 1e-6;
  const entry = await Entry.create(
    {
      cellarId: batch.cellarId,
      batchId: batch.id,
      kind: 'top_up',
      at,
      volumeL: litres,
      gravity: topUp.what === 'water' ? null : (reading?.gravity ?? null),
      text: source ? `From ${source.name}.` : topUp.what === 'water' ? 'Water.' : null,
      detail: { ...(topUp.what === 'water' && { substance: 'water' }), ...(fermented && { original_gravity: reading.effectiveOg }), ...(source && { batch_id: source.id }) },
      personId: actor.personId,
    },
    { transaction },
  );
  if (source) {
    await link(actor, source.id, batch.id, 'top_up', litres, at, transaction);
    await pourOut(actor, source, batch, litres, at, transaction);
  }
  return entry;
}

/** An act that was sent twice: its first line, also where that was taken back since. */
export async function sentBefore(cellarId: string, clientId: string | null, transaction: Transaction): Promise<Entry | null> {
  return clientId === null ? null : Entry.findOne({ where: { cellarId, clientId }, transaction });
}

export const shownReadout = (readout: Readout) => ({ volume_l: readout.volumeL, effective_og: readout.effectiveOg, gravity: readout.gravity, abv_percent: readout.abvPercent });

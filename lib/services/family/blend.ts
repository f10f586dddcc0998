import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import { inTransaction } from '@/db/client';
import { Batch, BatchLink, Entry } from '@/db/models';
import { linksInto } from '@/db/queries/family';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { snakeKeys } from '@/lib/contracts/case';
import type { BlendForm, blendResult } from '@/lib/contracts/family';
import { blendInto, takeVolume } from '@/lib/core/family/cellarwork';
import { readContents, type Contents } from '@/lib/core/family/contents';
import { ConflictError, InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { getBatch } from '../batches/get';
import { notifyChange } from '../changes';
import { notAhead } from '../not-ahead';
import { knownContents, link, loadBatches, pourOut, sentBefore, shownReadout } from './flow';

const SLACK_L = 1e-6;

/** A part of a blend, as it is poured. */
interface Part {
  batch: Batch;
  litres: number;
  contents: Contents;
}

type Reading = NonNullable<ReturnType<typeof readContents>>;

/** Blends batches into one: masses add, so that sugar and alcohol are conserved. All of it happens, or nothing. */
export async function blendBatches(actor: Actor, input: BlendForm, clock: Clock = systemClock): Promise<z.infer<typeof blendResult>> {
  authorize(actor, 'cellarwork.do');
  const at = notAhead(input.at, clock.now());
  return inTransaction(async (transaction) => {
    const ids = input.parts.map((part) => part.batch_id);
    const batches = await loadBatches(actor.cellarId, [...ids, ...(input.into_batch_id ? [input.into_batch_id] : [])], transaction);
    const known = await sentBefore(actor.cellarId, input.client_id, transaction);
    if (known) return sameAgain(actor, known.batchId, ids, transaction);
    const { parts, moved } = await blended(batches, input, at, transaction);
    const reading = moved.reading;
    if (!reading) throw new InvalidError('Nothing goes in.', { parts: ['say how much of each'] });
    const target = input.into_batch_id ? batches.get(input.into_batch_id)! : await newBatch(actor, input, parts, reading, transaction);
    if (input.into_batch_id) await refuseLoop(actor.cellarId, target, ids, transaction);
    await pour(actor, input, target, parts, reading, at, transaction);
    await auditBy(actor, 'batch.blended', target.id, { from: input.parts.map((part) => ({ batch: part.batch_id, litres: part.volume_l })) }, transaction);
    return answer(actor, target.id, { parts, moved }, transaction);
  });
}

/** What went in is no longer where it came from: a blend that was sent twice is not reckoned again. */
async function sameAgain(actor: Actor, targetId: string, parts: readonly string[], transaction: Transaction): Promise<z.infer<typeof blendResult>> {
  const poured = await BatchLink.count({ where: { toBatch: targetId, fromBatch: [...parts], kind: 'blend' }, transaction });
  if (poured === 0) throw new ConflictError('This was sent for something else.');
  return { batch: await getBatch(actor, targetId, transaction), reading: null, how: null };
}

async function answer(actor: Actor, id: string, { moved }: Awaited<ReturnType<typeof blended>>, transaction: Transaction): Promise<z.infer<typeof blendResult>> {
  return { batch: await getBatch(actor, id, transaction), reading: moved.reading && shownReadout(moved.reading), how: snakeKeys(moved.how) };
}

async function blended(batches: ReadonlyMap<string, Batch>, input: BlendForm, at: Date, transaction: Transaction) {
  const parts: Part[] = [];
  for (const [index, part] of input.parts.entries()) {
    const batch = batches.get(part.batch_id)!;
    if (part.volume_l > batch.volumeL + SLACK_L) throw new InvalidError('There is not that much in it.', { [`parts.${index}.volume_l`]: [`${batch.name} has ${batch.volumeL} L`] });
    const all = await knownContents(batch, at, `parts.${index}.batch_id`, transaction);
    parts.push({ batch, litres: part.volume_l, contents: takeVolume(all, Math.min(part.volume_l, readContents(all)?.volumeL ?? 0)).taken });
  }
  return { parts, moved: blendInto(parts.map((part) => part.contents)) };
}

/** The new batch has the yeast of its largest part, and the ranges in which any of them may still work on. */
async function newBatch(actor: Actor, input: BlendForm, parts: readonly Part[], reading: Reading, transaction: Transaction): Promise<Batch> {
  const into = input.into!;
  const volumeL = Math.min(parts.reduce((sum, part) => sum + part.litres, 0), Infinity);
  if (volumeL > into.vessel_l + SLACK_L) throw new InvalidError('The vessel cannot hold it.', { 'into.vessel_l': [`${volumeL.toFixed(2)} L go in`] });
  const largest = parts.toSorted((a, b) => b.litres - a.litres)[0]!.batch;
  const all = (pick: (batch: Batch) => number | null) => parts.map((part) => pick(part.batch));
  /** Null where one of them is not known: then nothing is known of the blend. */
  const least = (values: Array<number | null>) => (values.includes(null) ? null : Math.min(...(values as number[])));
  const most = (values: Array<number | null>) => (values.includes(null) ? null : Math.max(...(values as number[])));
  const pitched = parts.flatMap((part) => (part.batch.pitchedAt ? [part.batch.pitchedAt.getTime()] : []));
  return Batch.create(
    {
      cellarId: actor.cellarId,
      name: into.name,
      kind: largest.kind,
      drinkColour: into.drink_colour,
      vesselKind: into.vessel_kind,
      tag: into.tag,
      place: into.place,
      volumeL: Math.min(volumeL, into.vessel_l),
      vesselL: into.vessel_l,
      neck: into.neck,
      pitchedAt: pitched.length > 0 ? new Date(Math.max(...pitched)) : null,
      originalGravity: reading.effectiveOg,
      yeast: largest.yeast,
      attenuationMinPercent: least(all((batch) => batch.attenuationMinPercent)),
      attenuationMaxPercent: most(all((batch) => batch.attenuationMaxPercent)),
      alcoholToleranceAbv: most(all((batch) => batch.alcoholToleranceAbv)),
      temperatureMinC: least(all((batch) => batch.temperatureMinC)),
      temperatureMaxC: most(all((batch) => batch.temperatureMaxC)),
      // Its cost comes from several sheets: none of them alone.
      mustVersionId: null,
      createdBy: actor.personId,
    },
    { transaction },
  );
}

async function pour(actor: Actor, input: BlendForm, target: Batch, parts: readonly Part[], reading: Reading, at: Date, transaction: Transaction): Promise<void> {
  const litres = parts.reduce((sum, part) => sum + part.litres, 0);
  const names = parts.map((part) => `${part.litres} L of ${part.batch.name}`).join(', ');
  if (input.into_batch_id) {
    if (target.state === 'ended') throw new ConflictError('This batch is over.');
    if (target.volumeL + litres > target.vesselL + SLACK_L) throw new InvalidError('The vessel cannot hold it.', { into_batch_id: [`the vessel has room for ${(target.vesselL - target.volumeL).toFixed(2)} L`] });
    for (const [index, part] of parts.entries()) {
      const own = readContents(part.contents)!;
      await Entry.create(
        { cellarId: actor.cellarId, batchId: target.id, kind: 'blend', at, volumeL: part.litres, gravity: own.gravity, text: index === 0 ? (input.text ?? `From ${part.batch.name}.`) : `From ${part.batch.name}.`, detail: { original_gravity: own.effectiveOg, batch_id: part.batch.id }, personId: actor.personId, clientId: index === 0 ? input.client_id : null },
        { transaction },
      );
    }
    await target.update({ volumeL: Math.min(target.vesselL, target.volumeL + litres), updatedAt: at }, { transaction });
  } else {
    // What it starts from is in the batch; the line says of what.
    await Entry.create({ cellarId: actor.cellarId, batchId: target.id, kind: 'note', at, text: input.text ?? `Blended from ${names}.`, personId: actor.personId, clientId: input.client_id, gravity: null, detail: { original_gravity: reading.effectiveOg } }, { transaction });
  }
  for (const part of parts) {
    await link(actor, part.batch.id, target.id, 'blend', part.litres, at, transaction);
    await pourOut(actor, part.batch, target, part.litres, at, transaction);
  }
  await notifyChange({ cellar: actor.cellarId, kind: 'batch', batch: target.id }, transaction);
}

/** @throws ConflictError where a part comes from the very batch it would go into, over however many steps: allowed in a cellar, but its shares could not be told any more. */
async function refuseLoop(cellarId: string, target: Batch, parts: readonly string[], transaction: Transaction): Promise<void> {
  for (const part of parts) {
    const sources = await linksInto(cellarId, part, transaction);
    if (sources.some((flow) => flow.from === target.id)) throw new ConflictError(`This part comes from ${target.name} itself. Blend both into a new batch.`);
  }
}

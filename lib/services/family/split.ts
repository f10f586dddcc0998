import { inTransaction } from '@/db/client';
import { Batch, Entry } from '@/db/models';
import { partsOfSplit } from '@/db/queries/family';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { z } from 'zod';
import type { SplitForm, splitResult } from '@/lib/contracts/family';
import { ConflictError, InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { getBatch } from '../batches/get';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { drinkState } from '../drink/state';
import { notAhead } from '../not-ahead';
import { lessen, link, pourOut, sentBefore } from './flow';

const SLACK_L = 1e-6;

/** Splits a batch into vessels of their own, in one act. Each part starts with the effective original gravity and the pitch of where it comes from. */
export async function splitBatch(actor: Actor, batchId: string, input: SplitForm, clock: Clock = systemClock): Promise<z.infer<typeof splitResult>> {
  authorize(actor, 'cellarwork.do');
  const at = notAhead(input.at, clock.now());
  return inTransaction(async (transaction) => {
    const batch = await loadBatch(actor.cellarId, batchId, transaction);
    const known = await sentBefore(actor.cellarId, input.client_id, transaction);
    if (known) {
      if (known.batchId !== batchId || known.kind !== 'split') throw new ConflictError('This was sent for another batch.');
      return { batch: await getBatch(actor, batchId, transaction), parts: await presentAll(actor, await partsOfSplit(known.id, transaction), transaction) };
    }
    const wanted = input.parts.reduce((sum, part) => sum + part.volume_l, 0) + input.lost_l;
    if (wanted > batch.volumeL + SLACK_L) throw new InvalidError('There is not that much in it.', { parts: [`${wanted.toFixed(2)} L from ${batch.volumeL} L`] });
    const state = await drinkState(batch, at, transaction);
    const volume = batch.volumeL;
    const shareOf = batch.mustShare;

    const parts: Batch[] = [];
    for (const [index, part] of input.parts.entries()) {
      const made = await Batch.create(
        {
          cellarId: actor.cellarId,
          name: part.name,
          kind: batch.kind,
          drinkColour: batch.drinkColour,
          vesselKind: part.vessel_kind,
          tag: part.tag,
          place: part.place,
          volumeL: part.volume_l,
          vesselL: part.vessel_l,
          neck: part.neck,
          pitchedAt: batch.pitchedAt,
          originalGravity: state.ledger.effectiveOg,
          yeast: batch.yeast,
          attenuationMinPercent: batch.attenuationMinPercent,
          attenuationMaxPercent: batch.attenuationMaxPercent,
          alcoholToleranceAbv: batch.alcoholToleranceAbv,
          temperatureMinC: batch.temperatureMinC,
          temperatureMaxC: batch.temperatureMaxC,
          mustVersionId: batch.mustVersionId,
          mustShare: shareOf * (part.volume_l / volume),
          createdBy: actor.personId,
        },
        { transaction },
      );
      await Entry.create({ cellarId: actor.cellarId, batchId: made.id, kind: 'note', at, text: `Split off from ${batch.name}.`, detail: { batch_id: batch.id }, personId: actor.personId }, { transaction });
      await link(actor, batch.id, made.id, 'split', part.volume_l, at, transaction);
      const line = await pourOut(actor, batch, made, part.volume_l, at, transaction);
      if (index === 0) await line.update({ clientId: input.client_id, text: input.text ?? line.text }, { transaction });
      await notifyChange({ cellar: actor.cellarId, kind: 'batch', batch: made.id }, transaction);
      parts.push(made);
    }
    if (input.lost_l > 0 && batch.state !== 'ended') await lessen(batch, input.lost_l, at, transaction);
    await auditBy(actor, 'batch.split', batchId, { into: parts.map((part) => part.id), lost: input.lost_l }, transaction);
    return { batch: await getBatch(actor, batchId, transaction), parts: await presentAll(actor, parts.map((part) => part.id), transaction) };
  });
}

async function presentAll(actor: Actor, ids: readonly string[], transaction: Parameters<typeof getBatch>[2]) {
  const bodies = [];
  for (const id of ids) bodies.push(await getBatch(actor, id, transaction));
  return bodies;
}

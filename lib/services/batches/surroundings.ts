import { Op, type Transaction } from 'sequelize';
import { Batch, FiningRun } from '@/db/models';
import { probesOf, type ProbeRow } from '@/db/queries/surroundings';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { SurroundingsBody } from '@/lib/contracts/surroundings';
import { brightFrom } from '@/lib/core/additions/fining';
import { foamOf } from '@/lib/core/calls/foam';
import type { BatchEvent, Instant } from '@/lib/core/types';
import { NotFoundError } from '@/lib/errors';

/** What the judgement takes from the probes around a batch. */
export interface Surroundings {
  roomC: number | null;
  /** Foam that a probe sees, as if somebody had looked and written it down; finings, with when they will have sunk. */
  events: readonly BatchEvent[];
}

/** A probe at the vessel knows its air better than one in the room; several are taken together. */
function roomOf(probes: readonly ProbeRow[]): number | null {
  for (const stands of ['vessel', 'place'] as const) {
    const said = probes.flatMap((probe) => (probe.kind === 'room' && probe.stands === stands && probe.temperatureC !== null ? [probe.temperatureC] : []));
    if (said.length > 0) return said.reduce((sum, celsius) => sum + celsius, 0) / said.length;
  }
  return null;
}

/** The room and the foam around a batch as they were known at a time. */
export async function surroundingsAt(batchId: string, at: Instant, transaction?: Transaction): Promise<Surroundings> {
  const probes = await probesOf(batchId, at, transaction);
  const events = probes.flatMap(({ foamMm, at: seen, receivedAt }): BatchEvent[] => (foamMm === null || seen === null ? [] : [{ at: Math.round(seen), kind: 'note', foam: foamOf(foamMm), knownAt: receivedAt === null ? null : Math.round(receivedAt) }]));
  return { roomC: roomOf(probes), events: [...events, ...(await finingsOf(batchId, at, transaction))] };
}

/** Finings given by a time, as notes that tell when they will have sunk. */
async function finingsOf(batchId: string, at: Instant, transaction?: Transaction): Promise<BatchEvent[]> {
  const runs = await FiningRun.findAll({ where: { batchId, firstAt: { [Op.lte]: new Date(at) } }, transaction });
  return runs.map(({ intervalMin, settleDays, firstAt, secondAt }) => {
    const second = secondAt !== null && secondAt.getTime() <= at ? secondAt.getTime() : null;
    return { at: second ?? firstAt.getTime(), kind: 'note', settlesAt: brightFrom({ intervalMin, settleDays, firstAt: firstAt.getTime(), secondAt: second }, at) };
  });
}

const iso = (at: number | null) => (at === null ? null : new Date(at).toISOString());

/** What the probes beside a batch and in its place say now. */
export async function getSurroundings(actor: Actor, batchId: string, clock: Clock = systemClock): Promise<SurroundingsBody> {
  authorize(actor, 'batches.read');
  const batch = await Batch.findOne({ where: { id: batchId, cellarId: actor.cellarId } });
  if (!batch) throw new NotFoundError('batch');
  const probes = await probesOf(batch.id, batch.endedAt?.getTime() ?? clock.now());
  return {
    probes: probes.map((probe) => ({
      sensor: probe.identifier,
      name: probe.name,
      kind: probe.kind,
      stands: probe.stands,
      at: iso(probe.at),
      temperature_c: probe.kind === 'room' ? probe.temperatureC : null,
      foam_mm: probe.foamMm,
      foam: probe.foamMm === null ? null : foamOf(probe.foamMm),
    })),
  };
}

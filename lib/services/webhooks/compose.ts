import { Op } from 'sequelize';
import { Alert, Batch } from '@/db/models';
import { batchState } from '@/db/queries/batch-states';
import type { DueDelivery } from '@/db/queries/webhooks';
import type { AssessmentBody } from '@/lib/contracts/assessment';
import { iso } from '../iso';

const HOUR_MS = 3_600_000;

async function dataOf(event: string, batchId: string | null, cellarId: string, now: number): Promise<Record<string, unknown>> {
  if (event === 'alert' && batchId) {
    const alerts = await Alert.findAll({ where: { cellarId, batchId, [Op.or]: [{ state: { [Op.ne]: 'resolved' } }, { resolvedAt: { [Op.gte]: new Date(now - HOUR_MS) } }] }, order: [['openedAt', 'DESC']], limit: 20 });
    return { alerts: alerts.map((alert) => ({ id: alert.id, call: alert.call, kind: alert.kind, level: alert.level, state: alert.state, since: iso(alert.since), opened_at: iso(alert.openedAt), says: alert.evidence.headline, why: alert.evidence.reason })) };
  }
  if (event === 'assessment' && batchId) {
    const assessment = (await batchState<AssessmentBody>(batchId))?.assessment;
    if (!assessment) return {};
    const calls = Object.fromEntries(Object.entries(assessment.calls).map(([name, call]) => [name, { verdict: call.verdict, kind: call.kind ?? null, says: call.headline }]));
    return { stage: assessment.stage, final_gravity: assessment.final_gravity, terminal_at: assessment.terminal_at, abv_percent: assessment.abv_percent, calls };
  }
  return {};
}

/** The body of a delivery: how things stand when it is first sent. Later tries send the same. */
export async function composeDelivery(delivery: Pick<DueDelivery, 'id' | 'cellarId' | 'event' | 'payload' | 'createdAt'>, now: number): Promise<string> {
  if (delivery.payload.body !== undefined) return delivery.payload.body;
  const batchId = delivery.payload.batch;
  const batch = batchId === null ? null : await Batch.findOne({ attributes: ['id', 'name'], where: { id: batchId, cellarId: delivery.cellarId } });
  return JSON.stringify({
    id: delivery.id,
    event: delivery.event,
    at: iso(delivery.createdAt),
    cellar: delivery.cellarId,
    batch: batch && { id: batch.id, name: batch.name },
    data: await dataOf(delivery.event, batch?.id ?? null, delivery.cellarId, now),
  });
}

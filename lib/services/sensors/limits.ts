import { inTransaction } from '@/db/client';
import { SensorLimit } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { SensorLimits } from '@/lib/contracts/sensors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';

/** Until a cellar says otherwise: two weeks to order a cell, the voltage at which a lithium cell's regulator gives up, weak Wi-Fi (common practice). */
const USUAL: SensorLimits = { low_battery_days: 14, empty_battery_v: 3.3, weak_signal_dbm: -80, missed_percent: 10, clock_offset_s: 300 };

export async function limitsOf(cellarId: string): Promise<SensorLimits> {
  const row = await SensorLimit.findByPk(cellarId);
  return row
    ? { low_battery_days: row.lowBatteryDays, empty_battery_v: row.emptyBatteryV, weak_signal_dbm: row.weakSignalDbm, missed_percent: row.missedPercent, clock_offset_s: row.clockOffsetS }
    : USUAL;
}

export async function getSensorLimits(actor: Actor): Promise<SensorLimits> {
  authorize(actor, 'sensors.read');
  return limitsOf(actor.cellarId);
}

export async function setSensorLimits(actor: Actor, input: Partial<SensorLimits>): Promise<SensorLimits> {
  authorize(actor, 'sensors.manage');
  const limits = { ...(await limitsOf(actor.cellarId)), ...input };
  await inTransaction(async (transaction) => {
    await SensorLimit.upsert(
      { cellarId: actor.cellarId, lowBatteryDays: limits.low_battery_days, emptyBatteryV: limits.empty_battery_v, weakSignalDbm: limits.weak_signal_dbm, missedPercent: limits.missed_percent, clockOffsetS: limits.clock_offset_s },
      { transaction },
    );
    await auditBy(actor, 'sensor-limits.changed', actor.cellarId, { ...input }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'sensor', batch: null }, transaction);
  });
  return limits;
}

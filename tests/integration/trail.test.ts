import { expect, it } from 'vitest';
import { Alert, AuditRow } from '@/db/models';
import { trailQuery } from '@/lib/contracts/people';
import { listTrail, trailAsCsv } from '@/lib/services/audit/list';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember, buildSensor } from '../support/factories';

useDatabase();

it('the trail says what was done to what, by the names that things have in this cellar', async () => {
  const keeper = await buildMember('keeper');
  const { cellarId, personId } = keeper;
  const heir = await buildMember('brewer', { cellarId });
  const batch = await buildBatch({ cellarId, name: 'Perry' });
  const { sensor } = await buildSensor({ cellarId, name: 'Float 4' });
  const alert = await Alert.create({ cellarId, batchId: batch.id, call: 'stalled', level: 'check', state: 'open', since: new Date(), openedAt: new Date(), evidence: {} } as never);
  const foreign = await buildBatch({ name: 'Another cellar’s' });
  const lines: Array<[action: string, subject: string, detail?: Record<string, unknown>]> = [
    ['batch.muted', batch.id],
    ['alert.acknowledge', alert.id],
    ['entry.created', '00000000-0000-4000-8000-000000000001', { batch: batch.id, kind: 'note' }],
    ['sensor.rotated', sensor.identifier],
    ['batch.created', batch.id, { name: 'Perry' }],
    ['member.removed', personId],
    ['calibration-point.added', sensor.identifier],
    ['sensor.set', sensor.identifier, { interval_s: 1800 }],
    ['import.kept', '00000000-0000-4000-8000-000000000004', { file: 'log.csv' }],
    // Who did it, and nobody twice.
    ['member.left', personId, { role: 'brewer' }],
    ['member.joined', personId, { role: 'hand', invited: 'una@loft.example' }],
    ['cellar.handed-over', cellarId, { to: heir.personId }],
    ['invitation.sent', '00000000-0000-4000-8000-000000000003', { role: 'hand' }],
    // None of ours, gone, or no identifier at all.
    ['batch.muted', foreign.id],
    ['batch.updated', '00000000-0000-4000-8000-000000000002'],
    ['batch.updated', "'; drop table batches; --"],
  ];
  for (const [action, subject, detail = {}] of lines) await AuditRow.create({ cellarId, personId, action, subject, detail });
  const { items } = await listTrail(keeper, trailQuery.parse({}));
  expect(items.map((line) => line.says).reverse()).toEqual([
    'muted a vessel: Perry',
    'took an alert in hand: Perry',
    'logged: note: Perry',
    'gave the sensor Float 4 a new secret',
    'started Perry',
    `took ${keeper.person.name} out of the cellar`,
    'noted a calibration point of Float 4',
    'told the sensor Float 4 to speak every 30 min',
    'brought in log.csv',
    'left the cellar',
    'joined as hand, invited at una@loft.example',
    `handed the cellar over to ${heir.person.name}`,
    'invited somebody who has gone as hand',
    'muted a vessel',
    'changed a batch',
    'changed a batch',
  ]);
  expect(await trailAsCsv(keeper, trailQuery.parse({}))).not.toContain('Another cellar');
});

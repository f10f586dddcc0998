import { Alert, SignIn } from '@/db/models';
import type { Call } from '@/lib/core/types';
import { dataThings } from './data-things';
import { buildBatch, buildEntry, buildMember, buildSensor } from './factories';
import { jobThings } from './job-things';
import { messageThings } from './message-rows';
import { peopleThings } from './people-rows';
import type { Things } from './role-rows';

const EVIDENCE: Call = { verdict: 'yes', kind: 'stuck', since: 0, expectedAt: null, headline: 'Warm it.', reason: 'No fall.', act: null, changesIt: null, evidence: [] };

/** One of each thing that a cellar can hold. */
export async function things(cellarId: string, personId: string): Promise<Things> {
  const batch = await buildBatch({ cellarId, pitchedAt: new Date(Date.now() - 86_400_000) });
  const other = await buildMember('brewer', { cellarId });
  const entry = await buildEntry(batch, { text: 'x', personId: other.personId });
  const { sensor } = await buildSensor({ batch });
  const alert = await Alert.create({ cellarId, batchId: batch.id, call: 'stalled', kind: 'stuck', level: 'check', state: 'open', since: new Date(), openedAt: new Date(), evidence: EVIDENCE });
  const signIn = await SignIn.create({ personId, expiresAt: new Date(Date.now() + 3_600_000) });
  return { batchId: batch.id, entryId: entry.id, sensorId: sensor.identifier, alertId: alert.id, signInId: signIn.id, cellarId, ...(await peopleThings(cellarId, personId)), ...(await messageThings({ cellarId, batchId: batch.id, personId, signInId: signIn.id })), ...(await jobThings({ ...other, role: 'brewer' }, personId)), ...(await dataThings({ ...other, role: 'brewer' })) };
}

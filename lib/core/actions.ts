/** What can be done in a cellar; `lib/auth/policies.ts` says which role may. */
export const ACTION_NAMES = [
  'batches.read',
  'batches.create',
  'batches.update',
  'entries.create',
  'entries.alter',
  'entries.remove-own',
  'entries.remove',
  'alerts.read',
  'alerts.acknowledge',
  'alerts.resolve',
  'sensors.read',
  'sensors.assign',
  'sensors.manage',
  'members.read',
  'members.manage',
  'cellar.manage',
] as const;
export type Action = (typeof ACTION_NAMES)[number];

import { ACTION_NAMES, type Action } from '../core/actions';
import type { Role } from '../core/roles';

export type { Action } from '../core/actions';

/**
 * Who may do what in a cellar, as data: the one place that decides. Every
 * service asks it through `authorize`, the screens read it through `may`.
 */
export const ACTIONS = {
  'batches.read': { roles: ['keeper', 'brewer', 'hand', 'guest'], says: 'see batches, their curves and their log' },
  'batches.create': { roles: ['keeper', 'brewer'], says: 'start a batch' },
  'batches.update': { roles: ['keeper', 'brewer'], says: 'change a batch' },
  'entries.create': { roles: ['keeper', 'brewer', 'hand'], says: 'log readings, observations and notes' },
  'entries.alter': { roles: ['keeper', 'brewer'], says: 'log rackings, additions and pitches' },
  'entries.remove-own': { roles: ['keeper', 'brewer', 'hand'], says: 'take back an own entry' },
  'entries.remove': { roles: ['keeper', 'brewer'], says: 'take back any entry' },
  'alerts.read': { roles: ['keeper', 'brewer', 'hand'], says: 'see alerts' },
  'alerts.acknowledge': { roles: ['keeper', 'brewer', 'hand'], says: 'take an alert in hand' },
  'alerts.resolve': { roles: ['keeper', 'brewer', 'hand'], says: 'clear an alert' },
  'alerts.mute': { roles: ['keeper', 'brewer', 'hand'], says: 'mute a vessel' },
  'sensors.read': { roles: ['keeper', 'brewer', 'hand'], says: 'see sensors' },
  'sensors.assign': { roles: ['keeper', 'brewer'], says: 'put a sensor in a batch' },
  'sensors.calibrate': { roles: ['keeper', 'brewer'], says: 'calibrate a sensor' },
  'sensors.manage': { roles: ['keeper'], says: 'make sensors and their credentials' },
  'musts.read': { roles: ['keeper', 'brewer', 'hand', 'guest'], says: 'see must sheets and the catalogue' },
  'musts.write': { roles: ['keeper', 'brewer'], says: 'write must sheets' },
  'catalogue.write': { roles: ['keeper', 'brewer'], says: 'add to the catalogue' },
  'cellarwork.do': { roles: ['keeper', 'brewer'], says: 'rack, top up, fine, split and blend' },
  'jobs.read': { roles: ['keeper', 'brewer', 'hand'], says: 'see the rounds' },
  'jobs.do': { roles: ['keeper', 'brewer', 'hand'], says: 'do, take and add jobs' },
  'jobs.manage': { roles: ['keeper', 'brewer'], says: 'change and drop other people’s jobs' },
  'lots.read': { roles: ['keeper', 'brewer', 'hand', 'guest'], says: 'see the cellar book' },
  'lots.bottle': { roles: ['keeper', 'brewer'], says: 'bottle a batch' },
  'lots.override': { roles: ['keeper', 'brewer'], says: 'put a stop aside' },
  'lots.update': { roles: ['keeper', 'brewer'], says: 'change a lot' },
  'lots.serve': { roles: ['keeper', 'brewer', 'hand'], says: 'move, open and give bottles' },
  'places.manage': { roles: ['keeper', 'brewer'], says: 'change the places where bottles stand' },
  'tastings.write': { roles: ['keeper', 'brewer', 'hand', 'guest'], says: 'write tasting notes' },
  'labels.print': { roles: ['keeper', 'brewer'], says: 'print labels' },
  'shares.manage': { roles: ['keeper', 'brewer'], says: 'make and revoke share links' },
  'members.read': { roles: ['keeper', 'brewer', 'hand', 'guest'], says: 'see who shares the cellar' },
  'members.manage': { roles: ['keeper'], says: 'invite, change and remove people' },
  'cellar.manage': { roles: ['keeper'], says: 'change the cellar’s settings' },
  'audit.read': { roles: ['keeper'], says: 'read the trail of who did what' },
  'data.import': { roles: ['keeper', 'brewer'], says: 'bring data in' },
  'data.export': { roles: ['keeper', 'brewer'], says: 'take data out' },
  'webhooks.manage': { roles: ['keeper'], says: 'set up webhooks' },
} as const satisfies Record<Action, { roles: readonly Role[]; says: string }>;

/** Who acts, and in which cellar. */
export interface Actor {
  personId: string;
  cellarId: string;
  role: Role;
}

export function may(role: Role, action: Action): boolean {
  return (ACTIONS[action].roles as readonly Role[]).includes(role);
}

/** All that a role may do, for the screens. */
export function actionsOf(role: Role): Action[] {
  return ACTION_NAMES.filter((action) => may(role, action));
}

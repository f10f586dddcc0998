import { describe, expect, it } from 'vitest';
import { authorize } from '@/lib/auth/authorize';
import { actionsOf, ACTIONS, may } from '@/lib/auth/policies';
import { ACTION_NAMES } from '@/lib/core/actions';
import { ROLES } from '@/lib/core/roles';
import { ForbiddenError } from '@/lib/errors';

describe('policies', () => {
  it('gives each role all that the next lower one may do', () => {
    for (const [index, role] of ROLES.entries()) {
      const lower = ROLES[index + 1];
      if (lower) expect(actionsOf(role)).toEqual(expect.arrayContaining(actionsOf(lower)));
    }
  });

  it('lets a guest look, write tasting notes, and change nothing else', () => {
    const changes = actionsOf('guest').filter((action) => !action.endsWith('.read'));
    expect(changes.filter((action) => String(action) !== 'tastings.write')).toEqual([]);
    for (const action of ['alerts.read', 'sensors.read'] as const) expect(may('guest', action)).toBe(false);
    for (const action of ['batches.read', 'members.read'] as const) expect(may('guest', action)).toBe(true);
  });

  it('keeps people, sensors and the cellar itself to the keeper', () => {
    for (const action of ['sensors.manage', 'members.manage', 'cellar.manage'] as const) expect(ROLES.filter((role) => may(role, action))).toEqual(['keeper']);
  });

  it('names every action in the table and no other', () => {
    expect(Object.keys(ACTIONS).sort()).toEqual([...ACTION_NAMES].sort());
  });

  it('says in the refusal who may not do what', () => {
    expect(() => authorize({ personId: 'p', cellarId: 'c', role: 'guest' }, 'batches.create')).toThrow(new ForbiddenError('As guest of this cellar you cannot start a batch.'));
    expect(() => authorize({ personId: 'p', cellarId: 'c', role: 'brewer' }, 'batches.create')).not.toThrow();
  });
});

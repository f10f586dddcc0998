import { describe, expect, it } from 'vitest';
import { says } from '@/lib/services/audit/words';

const LOT = 'a lot';
const row = (action: string, detail: Record<string, unknown>) => says({ action, detail, subject: LOT, personId: 'somebody else' }, new Map([[LOT, '26-001']]));

describe('a line of the trail', () => {
  it('names a fining as the trade does, not by its key', () => {
    expect(row('fining.started', { fining: 'two-part' })).toBe('fined with two-part finings: 26-001');
    expect(row('fining.started', { fining: 'something of old' })).toBe('fined with something of old: 26-001');
  });

  it('is a sentence for each thing that becomes of a bottle', () => {
    const said = ['opened', 'given', 'broken', 'gushed'].map((kind) => row(`lot.${kind}`, { count: 1 }));
    expect(said).toEqual(['opened 1 of a lot: 26-001', 'gave away 1 of a lot: 26-001', 'broke 1 of a lot: 26-001', 'had 1 of a lot gush: 26-001']);
  });
});

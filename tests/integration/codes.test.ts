import { describe, expect, it } from 'vitest';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { bottleForm, ciderAt, clockAt } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';

useDatabase();

describe('the code of a lot', () => {
  it('is its own, also where several people bottle in the same moment', async () => {
    const brewer = await buildMember('brewer');
    const batches = await Promise.all(Array.from({ length: 4 }, () => ciderAt(brewer)));
    const lots = await Promise.all(batches.map((batch) => bottleBatch(brewer, batch.id, bottleForm(), clockAt())));
    expect(lots.map((lot) => lot.code).toSorted()).toEqual(['26-001', '26-002', '26-003', '26-004']);
  });

  it('is one code in capitals and without, and a second one is told so at its field', async () => {
    const brewer = await buildMember('brewer');
    const [one, two] = [await ciderAt(brewer), await ciderAt(brewer)];
    await bottleBatch(brewer, one.id, bottleForm({ code: 'Quince-1' }), clockAt());
    await expect(bottleBatch(brewer, two.id, bottleForm({ code: 'quince-1' }), clockAt())).rejects.toMatchObject({ fields: { code: ['another lot has it'] } });
  });
});

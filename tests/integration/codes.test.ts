import { describe, expect, it } from 'vitest';
import { Cellar } from '@/db/models';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { getBench } from '@/lib/services/bench/get';
import { bottleForm, ciderAt, clockAt, isoAt } from '../support/cellar';
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

  it.each([
    ['Pacific/Auckland', '27-001'],
    ['America/Anchorage', '26-001'],
  ])('bears the year that the calendar on the wall shows: %s at noon UTC on the last of December, and six hours into January', async (timeZone, code) => {
    const brewer = await buildMember('brewer');
    await Cellar.update({ timeZone }, { where: { id: brewer.cellarId } });
    const now = timeZone.startsWith('Pacific') ? Date.UTC(2026, 11, 31, 12) : Date.UTC(2027, 0, 1, 6);
    const batch = await ciderAt(brewer, { now });
    expect((await getBench(brewer, batch.id, clockAt(now))).suggested_code).toBe(code);
    expect((await bottleBatch(brewer, batch.id, bottleForm({ at: isoAt(now) }), clockAt(now))).code).toBe(code);
  });
});

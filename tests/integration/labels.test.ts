import { describe, expect, it } from 'vitest';
import { createEntry as entryForm } from '@/lib/contracts/batches';
import { DESIGNS, labelQuery, STOCKS, type StockKey } from '@/lib/contracts/labels';
import { createShare as shareForm } from '@/lib/contracts/shares';
import { finingForm } from '@/lib/contracts/family';
import type { Actor } from '@/lib/auth/policies';
import { ForbiddenError, InvalidError, NotFoundError } from '@/lib/errors';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { createEntry } from '@/lib/services/entries/create';
import { startFining } from '@/lib/services/finings/start';
import { getLabelFacts } from '@/lib/services/labels/facts';
import { printLabels, volumeText } from '@/lib/services/labels/print';
import { createMust } from '@/lib/services/musts/create';
import { createShare, revokeShare } from '@/lib/services/shares/manage';
import { aLine, aSheet, bottleForm, ciderAt, clockAt, DAY, isoAt, NOON } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';

useDatabase();

const clock = clockAt();
const lotOf = async (actor: Actor, story: Parameters<typeof ciderAt>[1] = {}) => {
  const batch = await ciderAt(actor, story);
  return { batch, lot: await bottleBatch(actor, batch.id, bottleForm(), clock) };
};
/** pdfkit writes its objects plainly; only their streams are packed. */
const pagesOf = (pdf: Buffer) => pdf.toString('latin1').match(/\/Type \/Page\b(?!s)/g)?.length ?? 0;
const boxOf = (pdf: Buffer) => /\/MediaBox \[0 0 ([\d.]+) ([\d.]+)\]/.exec(pdf.toString('latin1'))!.slice(1).map(Number);

describe('labels', () => {
  it('are printed on every stock in every design, on paper of its size', async () => {
    const brewer = await buildMember('brewer');
    const { lot } = await lotOf(brewer, { batch: { name: 'Žďárská hruškovice from the long wall' } });
    for (const stock of Object.keys(STOCKS) as StockKey[]) {
      for (const design of DESIGNS) {
        const { pdf, filename } = await printLabels(brewer, lot.id, labelQuery.parse({ stock, design, colour: design === 'log' ? 'no' : 'yes' }));
        expect(pdf.subarray(0, 5).toString(), `${stock} ${design}`).toBe('%PDF-');
        expect(pagesOf(pdf)).toBe(1);
        expect(boxOf(pdf)[1]).toBeCloseTo((STOCKS[stock].page.height * 72) / 25.4, 0);
        expect(filename).toBe('labels-26-001.pdf');
      }
    }
  });

  it('fill as many sheets as it takes, from the first place that is free', async () => {
    const brewer = await buildMember('brewer');
    const { lot } = await lotOf(brewer);
    const pages = async (query: Record<string, unknown>) => pagesOf((await printLabels(brewer, lot.id, labelQuery.parse(query))).pdf);
    expect(await pages({ count: 8 })).toBe(1);
    expect(await pages({ count: 8, start: 2 })).toBe(2);
    expect(await pages({ count: 100 })).toBe(13);
    await expect(pages({ start: 9 })).rejects.toBeInstanceOf(InvalidError);
  });

  it('say what the log knows: a name by what is in it, strength, allergens of must and finings, sulphite that was added', async () => {
    const brewer = await buildMember('brewer');
    const must = await createMust(brewer, aSheet({ lines: [aLine('apple-juice', 3, 'L'), aLine('honey', 700, 'g')] }), clock);
    const batch = await ciderAt(brewer, { og: 1.06, batch: { mustVersionId: must.version_id } });
    await startFining(brewer, batch.id, finingForm.parse({ at: isoAt(NOON - 20 * DAY), fining: 'isinglass' }), clock);
    await createEntry(brewer, batch.id, entryForm.parse({ kind: 'addition', at: isoAt(NOON - 19 * DAY), detail: { substance: 'sulphite', ingredient: 'potassium-metabisulphite', grams: 0.3 } }), clock);
    const lot = await bottleBatch(brewer, batch.id, bottleForm(), clock);
    const facts = await getLabelFacts(brewer, lot.id);
    expect(facts.suggestion).toMatchObject({ name: 'cyser', rule: 'Honey and apple.' });
    expect(facts.suggestion.law).toMatch(/differs/);
    expect(facts.allergens.text).toBe('Contains sulphites, fish.');
    expect(facts.strength.text).toMatch(/^8\.\d % vol$/);
    expect(facts).toMatchObject({ code: lot.code, volumes: [{ size_ml: 750, count: 5 }], sparkle: 'sparkling', share: null });
  });

  it('lead to the batch’s open share link alone', async () => {
    const brewer = await buildMember('brewer');
    const hand = await buildMember('hand', { cellarId: brewer.cellarId });
    const { batch, lot } = await lotOf(brewer);
    const share = await createShare(brewer, batch.id, shareForm.parse({}));
    expect((await getLabelFacts(brewer, lot.id)).share).toEqual({ id: share.id, url: share.url });
    // Whoever may not hand the link out does not read it here either.
    expect((await getLabelFacts(hand, lot.id)).share).toBeNull();
    const size = async (query: Record<string, unknown>) => (await printLabels(brewer, lot.id, labelQuery.parse({ count: 1, ...query }))).pdf.length;
    expect(await size({})).toBeGreaterThan((await size({ qr: 'no' })) + 200);
    await revokeShare(brewer, share.id);
    expect(await size({})).toBeLessThan((await size({ qr: 'no' })) + 200);
    await expect(size({ share: share.id })).rejects.toBeInstanceOf(NotFoundError);
    await expect(printLabels(hand, lot.id, labelQuery.parse({}))).rejects.toBeInstanceOf(ForbiddenError);
  });

  it('write volumes as bottles have them', () => {
    expect([330, 750, 1000, 1500, 5000].map(volumeText)).toEqual(['330 ml', '750 ml', '1 L', '1.5 L', '5 L']);
  });
});

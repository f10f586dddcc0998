import { Entry, Job, Lot, Tasting } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import { catalogueForm } from '@/lib/contracts/catalogue';
import { finingForm } from '@/lib/contracts/family';
import { openBottles as openForm } from '@/lib/contracts/lots';
import { createShare as shareForm } from '@/lib/contracts/shares';
import { bottleBatch } from '@/lib/services/bench/bottle';
import { addToCatalogue } from '@/lib/services/catalogue/add';
import { startFining } from '@/lib/services/finings/start';
import { openBottles } from '@/lib/services/lots/open';
import { createMust } from '@/lib/services/musts/create';
import { createPlace } from '@/lib/services/places/write';
import { createShare } from '@/lib/services/shares/manage';
import { aSheet, bottleForm, ciderAt, isoAt } from './cellar';

/** What the whole job has in a cellar, made by a brewer of it. */
export interface JobThings {
  finishedId: string;
  otherBatchId: string;
  ownEntryId: string;
  mustId: string;
  itemId: string;
  jobId: string;
  finingId: string;
  placeId: string;
  emptyPlaceId: string;
  lotId: string;
  bottleId: string;
  openingId: string;
  tastingId: string;
  shareId: string;
}

export const ITEM = catalogueForm.parse({ sort: 'yeast', yeast: { name: 'own yeast', attenuation: null, tolerance_abv: { lo: 12, value: 13, hi: 14 }, temperature_c: { min: 12, max: 22 }, nitrogen_need: 'low', diastatic: false } });
const LONG_AGO = Date.UTC(2026, 2, 1);

/** `personId` is who asks: what only its owner may take back is theirs. */
export async function jobThings(brewer: Actor, personId: string): Promise<JobThings> {
  const now = Date.now();
  const { cellarId } = brewer;
  const finished = await ciderAt(brewer, { now });
  const bottled = await ciderAt(brewer, { now });
  const other = await ciderAt(brewer, { now, volumeL: 2 });
  const lot = await bottleBatch(brewer, bottled.id, bottleForm({ at: isoAt(now) }));
  const opened = await openBottles(brewer, lot.id, openForm.parse({ at: isoAt(now), kind: 'opened', bottle_id: lot.bottles[0]!.id, place_id: null }));
  await Lot.update({ caution: 'A bottle gushed.' }, { where: { id: lot.id } });
  const item = await addToCatalogue(brewer, ITEM);
  const entry = await Entry.create({ cellarId, batchId: finished.id, kind: 'note', at: new Date(LONG_AGO), text: 'x', personId });
  const job = await Job.create({ cellarId, kind: 'other', title: 'Look', source: 'person', dueAt: new Date(now), createdBy: personId });
  const fining = await startFining(brewer, finished.id, finingForm.parse({ at: isoAt(now - 3_600_000), fining: 'two-part' }));
  const tasting = await Tasting.create({ cellarId, lotId: lot.id, personId, at: new Date(now), score: 7 });
  const place = async (name: string) => (await createPlace(brewer, { name, capacity: null, temperature_c: 15 })).id;
  return {
    finishedId: finished.id,
    otherBatchId: other.id,
    ownEntryId: entry.id,
    mustId: (await createMust(brewer, aSheet())).id,
    itemId: item.sort === 'yeast' ? item.yeast.id : '',
    jobId: job.id,
    finingId: fining.id,
    placeId: await place('shelf'),
    emptyPlaceId: await place('empty'),
    lotId: lot.id,
    bottleId: lot.bottles[0]!.id,
    openingId: opened.openings[0]!.id,
    tastingId: tasting.id,
    shareId: (await createShare(brewer, finished.id, shareForm.parse({}))).id,
  };
}

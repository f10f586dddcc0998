import { Entry, type Batch } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import { ManualClock } from '@/lib/clock';
import { snakeKeys } from '@/lib/contracts/case';
import { bottleBatchForm, type BottleBatchForm } from '@/lib/contracts/bench';
import { mustSheetSchema, type MustSheetBody } from '@/lib/contracts/musts';
import { catalogued, YEASTS } from '@/lib/core/must/catalogue';
import { exactly } from '@/lib/core/units/range';
import type { MeasureUnit } from '@/lib/core/units/measures';
import type { z } from 'zod';
import { buildBatch } from './factories';

export const DAY = 86_400_000;
export const HOUR = 3_600_000;
/** Wed 4 March 2026, noon UTC. */
export const NOON = Date.UTC(2026, 2, 4, 12);
export const clockAt = (at = NOON) => new ManualClock(at);
export const isoAt = (at: number) => new Date(at).toISOString();

/** One line of a sheet, as the catalogue has the ingredient. */
export function aLine(key: string, quantity: number, unit: MeasureUnit, more: { id?: string; cost?: number } = {}): MustSheetBody['lines'][number] {
  const ingredient = catalogued(key);
  if (!ingredient) throw new Error(`the catalogue has no ${key}`);
  return { id: more.id ?? key, ingredient: snakeKeys(ingredient), amount: { quantity: exactly(quantity), unit }, cost_per_unit: more.cost ?? null, note: null };
}

/** A demijohn of cider. */
export function aSheet(overrides: Partial<MustSheetBody> = {}): MustSheetBody {
  const yeast = YEASTS.find((item) => item.name === 'cider yeast');
  return mustSheetSchema.parse({ name: 'Orchard cider', kind: 'cider', lines: [aLine('apple-juice', 4.2, 'L', { cost: 1.5 })], yeast: yeast ? snakeKeys(yeast) : null, boiled_away_l: 0, vessel_l: 5, method: null, ...overrides });
}

interface Story {
  og?: number;
  fg?: number;
  /** Days before now at which the hydrometer was read at the end. */
  readDaysAgo?: readonly number[];
  volumeL?: number;
  vesselL?: number;
  now?: number;
  batch?: Partial<Batch>;
}

/** A cider that was pitched forty days ago, with the readings by hand that are told. */
export async function ciderAt(actor: Actor, { og = 1.048, fg = 1.0, readDaysAgo = [9, 0.1], volumeL = 4.5, vesselL = 5, now = NOON, batch: overrides = {} }: Story = {}): Promise<Batch> {
  const pitchedAt = new Date(now - 40 * DAY);
  const batch = await buildBatch({ cellarId: actor.cellarId, name: 'Orchard cider', kind: 'cider', volumeL, vesselL, pitchedAt, originalGravity: og, attenuationMinPercent: 95, attenuationMaxPercent: 104, alcoholToleranceAbv: 12, ...overrides });
  await Entry.create({ cellarId: actor.cellarId, batchId: batch.id, kind: 'pitch', at: pitchedAt, gravity: og, gravityRead: og, volumeL });
  for (const days of readDaysAgo) await readAt(batch, fg, now - days * DAY);
  return batch;
}

export const readAt = (batch: Batch, gravity: number, at: number) => Entry.create({ cellarId: batch.cellarId, batchId: batch.id, kind: 'reading', at: new Date(at), gravity, gravityRead: gravity });

type BottleInput = z.input<typeof bottleBatchForm>;
type BottleRow = BottleInput['bottles'][number];

export const sparklingBottle = (more: Partial<BottleRow> = {}): BottleRow => ({ key: 'wine', kind: 'sparkling_wine', closure: 'wired_stopper', size_ml: 750, confirmed_bar: 6, ...more });
export const beerBottle = (more: Partial<BottleRow> = {}): BottleRow => ({ key: 'beer', kind: 'beer', closure: 'crown_26', size_ml: 500, confirmed_bar: 3, ...more });
export const stillBottle = (more: Partial<BottleRow> = {}): BottleRow => ({ key: 'still', kind: 'still_wine', closure: 'plain_cork', size_ml: 750, ...more });

/** Primed to two and a half volumes, which sparkling-wine bottles hold whatever happens. */
export function bottleForm(overrides: Partial<BottleInput> = {}): BottleBatchForm {
  return bottleBatchForm.parse({
    losses_l: 0.3,
    bottles: [sparklingBottle()],
    cellar_c: 14,
    warmest_store_c: 22,
    warmest_since_end_c: 18,
    priming: { way: 'weighed', sugar: 'sucrose', wanted_volumes: 2.5 },
    at: isoAt(NOON),
    ...overrides,
  });
}

import { Op, type Transaction } from 'sequelize';
import { Batch, CatalogueItem, Entry, FiningRun, MustVersion } from '@/db/models';
import { linksInto, type LinkRow } from '@/db/queries/family';
import { camelKeys } from '@/lib/contracts/case';
import type { MustSheetBody } from '@/lib/contracts/musts';
import { catalogued } from '@/lib/core/must/catalogue';
import type { Ingredient } from '@/lib/core/must/ingredients';
import { presentItem } from '../catalogue/present';
import { keptSheet } from '../musts/sheet';
import { detailOf } from './ledger';

/** All that the log knows of a batch and of those that flowed into it. */
export interface Story {
  batch: Batch;
  entries: Entry[];
  finings: FiningRun[];
  sheet: MustSheetBody | null;
}

export interface Stories {
  of: ReadonlyMap<string, Story>;
  links: readonly LinkRow[];
  /** Those of the cellar's own that an entry names, by key. */
  own: ReadonlyMap<string, Ingredient>;
}

const OWN_KEY = /^own-([0-9a-f-]{36})$/;

/** The cellar's own ingredients of these keys, those taken out of the catalogue too. */
export async function ownIngredients(cellarId: string, keys: readonly (string | null | undefined)[], transaction?: Transaction): Promise<Map<string, Ingredient>> {
  const ids = [...new Set(keys.flatMap((key) => OWN_KEY.exec(key ?? '')?.[1] ?? []))];
  if (ids.length === 0) return new Map();
  const rows = await CatalogueItem.findAll({ where: { id: ids, cellarId, sort: 'ingredient' }, transaction });
  return new Map(
    rows.flatMap((row) => {
      const item = presentItem(row);
      return item.sort === 'ingredient' ? [[item.ingredient.key, camelKeys(item.ingredient)] as const] : [];
    }),
  );
}

export const ingredientNamed = (key: string | null | undefined, own: ReadonlyMap<string, Ingredient>): Ingredient | undefined => (key ? (own.get(key) ?? catalogued(key)) : undefined);

/** Loads a batch's story with those of its sources, each table once. */
export async function loadStories(batch: Batch, transaction?: Transaction): Promise<Stories> {
  const links = await linksInto(batch.cellarId, batch.id, transaction);
  const others = [...new Set(links.map((link) => link.from))].filter((id) => id !== batch.id);
  const batches = [batch, ...(others.length ? await Batch.findAll({ where: { id: others, cellarId: batch.cellarId }, transaction }) : [])];
  const ids = batches.map((item) => item.id);
  const versions = [...new Set(batches.flatMap((item) => (item.mustVersionId === null || item.mustVersionId === undefined ? [] : [item.mustVersionId])))];
  const entries = await Entry.findAll({ where: { batchId: ids, removedAt: { [Op.is]: null } }, order: [['at', 'ASC'], ['createdAt', 'ASC']], transaction });
  const finings = await FiningRun.findAll({ where: { batchId: ids }, transaction });
  const sheets = versions.length ? await MustVersion.findAll({ where: { id: versions }, transaction }) : [];
  const sheetOf = new Map(sheets.map((version) => [version.id, keptSheet(version.body)]));
  const of = new Map<string, Story>(
    batches.map((item) => [
      item.id,
      {
        batch: item,
        entries: entries.filter((entry) => entry.batchId === item.id),
        finings: finings.filter((fining) => fining.batchId === item.id),
        sheet: item.mustVersionId ? (sheetOf.get(item.mustVersionId) ?? null) : null,
      },
    ]),
  );
  return { of, links, own: await ownIngredients(batch.cellarId, entries.map((entry) => detailOf(entry).ingredient), transaction) };
}

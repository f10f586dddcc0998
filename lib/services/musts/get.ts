import type { Transaction } from 'sequelize';
import { Must, MustVersion } from '@/db/models';
import { batchesOfMust, nextTimeOfMusts, type NextTimeRow } from '@/db/queries/musts';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { MustBody } from '@/lib/contracts/musts';
import { compareSheets } from '@/lib/core/must/compare';
import { namesOf } from '../entries/names';
import { iso, isoOrNull } from '../iso';
import { loadMust, loadVersion } from './load';
import { keptSheet, resultOf, sheetOf } from './sheet';

export const presentNextTime = (row: NextTimeRow): MustBody['next_time'][number] => ({ note: row.note, lot: { id: row.lotId, code: row.code }, by: row.by, at: iso(row.at) });

/** A must sheet with what it promises, all its versions, what they made, and what to do otherwise next time. */
export async function getMust(actor: Actor, id: string, query: { version?: number } = {}, transaction?: Transaction): Promise<MustBody> {
  authorize(actor, 'musts.read');
  const must = await loadMust(actor.cellarId, id, transaction);
  const shown = await loadVersion(must, query.version, transaction);
  const versions = await MustVersion.findAll({ where: { mustId: id }, order: [['version', 'DESC']], transaction });
  const source = await sourceOf(versions.at(-1), transaction);
  const names = await namesOf(versions.map((version) => version.createdBy), transaction);
  const batches = await batchesOfMust(id, transaction);
  const nextTime = await nextTimeOfMusts([id, ...(source ? [source.must.id] : [])], transaction);
  const sheet = keptSheet(shown.body);
  return {
    id,
    version_id: shown.id,
    version: shown.version,
    sheet,
    result: resultOf(sheet),
    versions: versions.map((version, index) => {
      const name = version.createdBy === null ? undefined : names.get(version.createdBy);
      const before = versions[index + 1] ?? source?.version;
      return {
        id: version.id,
        version: version.version,
        at: iso(version.createdAt),
        by: version.createdBy !== null && name !== undefined ? { id: version.createdBy, name } : null,
        change_note: version.changeNote,
        changes: before ? compareSheets(sheetOf(keptSheet(before.body)), sheetOf(keptSheet(version.body))).map((change) => change.sentence) : [],
      };
    }),
    copied_from: source && { id: source.must.id, name: source.must.name, version: source.version.version },
    next_time: nextTime.map(presentNextTime),
    batches: batches.map((batch) => ({ id: batch.id, name: batch.name, version: batch.version, pitched_at: isoOrNull(batch.pitchedAt) })),
    archived: must.archivedAt !== null,
    created_at: iso(must.createdAt),
  };
}

/** The sheet and version that the first version was copied from. */
async function sourceOf(first: MustVersion | undefined, transaction?: Transaction): Promise<{ must: Must; version: MustVersion } | null> {
  if (!first?.copiedFrom) return null;
  const version = await MustVersion.findByPk(first.copiedFrom, { transaction });
  const must = version && (await Must.findByPk(version.mustId, { transaction }));
  return version && must ? { must, version } : null;
}

import type { Transaction } from 'sequelize';
import { Batch, ImportRun } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { ImportBody } from '@/lib/contracts/imports';
import { NotFoundError } from '@/lib/errors';
import { namesOf } from '../entries/names';
import { iso, isoOrNull } from '../iso';

async function present(rows: readonly ImportRun[], transaction?: Transaction): Promise<ImportBody[]> {
  const names = await namesOf(rows.map((row) => row.createdBy), transaction);
  const batches = new Map((await Batch.findAll({ attributes: ['id', 'name'], where: { id: rows.flatMap((row) => row.batchId ?? []) }, transaction })).map((batch) => [batch.id, batch.name]));
  return rows.map((row) => ({
    id: row.id,
    kind: row.kind,
    file_name: row.fileName,
    counts: row.counts,
    batch: row.batchId === null ? null : { id: row.batchId, name: batches.get(row.batchId) ?? '' },
    by: row.createdBy === null ? null : (names.get(row.createdBy) ?? null),
    created_at: iso(row.createdAt),
    undone_at: isoOrNull(row.undoneAt),
  }));
}

export async function loadImport(actor: Actor, id: string, transaction?: Transaction): Promise<ImportBody> {
  const row = await ImportRun.findOne({ where: { id, cellarId: actor.cellarId }, transaction });
  if (!row) throw new NotFoundError('import');
  return (await present([row], transaction))[0]!;
}

/** The last imports of the cellar, newest first. */
export async function listImports(actor: Actor): Promise<{ items: ImportBody[] }> {
  authorize(actor, 'data.import');
  return { items: await present(await ImportRun.findAll({ where: { cellarId: actor.cellarId }, order: [['createdAt', 'DESC']], limit: 50 })) };
}

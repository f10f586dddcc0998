import type { Transaction } from 'sequelize';
import { Must, MustVersion } from '@/db/models';
import { NotFoundError } from '@/lib/errors';

/** @throws NotFoundError for another cellar's sheet as for none at all. */
export async function loadMust(cellarId: string, id: string, transaction?: Transaction): Promise<Must> {
  const must = await Must.findOne({ where: { id, cellarId }, transaction, ...(transaction && { lock: transaction.LOCK.UPDATE }) });
  if (!must) throw new NotFoundError('must sheet');
  return must;
}

/** The latest version, or the one asked for. */
export async function loadVersion(must: Must, version?: number, transaction?: Transaction): Promise<MustVersion> {
  const found = await MustVersion.findOne({ where: { mustId: must.id, version: version ?? must.latest }, transaction });
  if (!found) throw new NotFoundError('version');
  return found;
}

/** @throws NotFoundError where the cellar has no such version of any sheet. */
export async function loadVersionById(cellarId: string, id: string, transaction?: Transaction): Promise<MustVersion> {
  const found = await MustVersion.findOne({ where: { id, cellarId }, transaction });
  if (!found) throw new NotFoundError('must sheet');
  return found;
}
